import { describe, expect, it } from "vitest";
import { entry, details, survey, reading, result } from "../../tests/support/job-entries.ts";
import { setUpCheckIds } from "../../shared/set-up-checks.ts";
import { readJobLog, type JobEntry } from "./job-log.ts";
import { surveyFlags } from "./survey-flags.ts";

describe("surveyFlags", () => {
  const flagsOf = (entries: JobEntry[]) => {
    const state = readJobLog([details, ...entries]);
    const [first] = state.surveys;
    return first ? surveyFlags(state, first).map(({ code }) => code) : [];
  };
  const checks = (answer: "yes" | "no" | "not_applicable", at: string) =>
    setUpCheckIds.map((check) => entry("check", { check, answer, at }));
  const two = [
    survey("found", "as_found"),
    reading("found", "brg-1", "2026-11-04T08:00:00Z"),
    reading("found", "cas-1", "2026-11-04T09:00:00Z"),
  ];
  const closing = reading("found", "brg-1", "2026-11-04T10:00:00Z", { closing: true });

  it("is silent where every check was answered before and the first station was read again", () => {
    expect(flagsOf([...checks("yes", "2026-11-04T07:00:00Z"), ...two, closing])).toEqual([]);
    expect(flagsOf([...checks("not_applicable", "2026-11-04T07:00:00Z"), ...two, closing])).toEqual([]);
  });

  it("marks a survey taken before the checks were answered, also when they are answered afterwards", () => {
    expect(flagsOf([...two, closing])).toEqual(["set_up_unchecked"]);
    expect(flagsOf([...checks("yes", "2026-11-04T11:00:00Z"), ...two, closing])).toEqual([
      "set_up_unchecked",
    ]);
  });

  it("marks every check that was answered no", () => {
    const flags = flagsOf([...checks("no", "2026-11-04T07:00:00Z"), ...two, closing]);
    expect(flags).toEqual(setUpCheckIds.map(() => "set_up_check_failed"));
  });

  it("asks for the closing reading of the first station, and takes no other's for it", () => {
    const all = [...checks("yes", "2026-11-04T07:00:00Z"), ...two];
    expect(flagsOf(all)).toEqual(["closing_reading_missing"]);
    const other = reading("found", "cas-1", "2026-11-04T10:00:00Z", { closing: true });
    expect(flagsOf([...all, other])).toEqual(["closing_reading_missing"]);
  });

  it("marks a survey that drifted farther than both readings explain, and says at which level", () => {
    const judged = (exceeds: boolean | null) => {
      const computed = result("found", []);
      const drift = { station: "brg-1", h: 0.05, v: 0, uncertainty: 0.03, level: 0.95, exceeds };
      const drifted = { ...computed, document: { ...computed.document, drift, readings: counting } };
      const entries = [...checks("yes", "2026-11-04T07:00:00Z"), ...two, closing, drifted];
      const state = readJobLog([details, ...entries]);
      return state.surveys.flatMap((one) => surveyFlags(state, one));
    };
    const counting = [...two.slice(1), closing].map(({ id }) => id);
    expect(judged(true).map(({ code, station }) => [code, station])).toEqual([["survey_drifted", "brg-1"]]);
    expect(judged(true)[0]?.detail).toContain("(95 %)");
    expect([judged(false), judged(null)]).toEqual([[], []]);
  });

  it("marks readings with the upper half off and an instrument past its calibration", () => {
    const late = entry("details", {
      title: "Outage",
      seen: "downstream",
      instruments: [{ id: "g", description: "Gauge", calibrationDueOn: "2026-11-03" }],
    });
    const off = reading("found", "brg-2", "2026-11-04T09:30:00Z", { upperHalf: "off", instrument: "g" });
    const flags = flagsOf([late, ...checks("yes", "2026-11-04T07:00:00Z"), ...two, off, closing]);
    expect(flags).toEqual(["upper_half_off", "calibration_overdue"]);
  });
});
