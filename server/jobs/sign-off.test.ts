import { describe, expect, it } from "vitest";
import {
  machine,
  entry,
  result,
  details,
  reading,
  move,
  stations,
  found,
  left,
  confirmed,
} from "../../tests/support/job-entries.ts";
import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import { readJobLog, type JobEntry } from "./job-log.ts";
import { signOffObstacles, type JobResults } from "./sign-off.ts";

type Verdict = "conforms" | "undecided" | "exceeds";
function results(
  verdicts: Partial<Record<string, Verdict>> = {},
  repeats: boolean | null = true,
): JobResults {
  const deviations = {
    stations: stations.map((id) => ({ id, verdict: verdicts[id] ?? "conforms" })),
  } as unknown as AxisDeviationResult;
  const confirmation = { reference: { repeats } } as unknown as ConfirmationResult;
  return {
    deviationsOf: ({ result: computed }) => (computed ? deviations : null),
    confirmationOf: () => confirmation,
  };
}
const obstacles = (entries: JobEntry[], of = results()) =>
  signOffObstacles(machine, readJobLog([details, ...entries]), of).map(({ code, station }) => [
    code,
    station,
  ]);

const accepted = (survey: string, surveyResult = `result-${survey}`) =>
  entry("axis_acceptance", { survey, surveyResult, name: "Ines Alder", reason: "Moved on purpose." });

describe("signOffObstacles", () => {
  it("lets a machine that was found conforming be signed without a move", () => {
    expect(obstacles(found())).toEqual([]);
  });

  it("asks for a survey, computed from the readings that count", () => {
    expect(obstacles([])).toEqual([["no_survey", null]]);
    const more = reading("found", "cas-1", "2026-11-05T08:00:00Z");
    expect(obstacles([...found(), more])).toEqual([
      ["survey_not_computed", null],
      ["no_survey", null],
    ]);
  });

  it("is done when all was measured again, repeats, and conforms", () => {
    expect(obstacles([...found(), move("casing", "2026-11-06T08:00:00Z"), ...left(), confirmed()])).toEqual(
      [],
    );
  });

  it("asks for the as-left survey, the moved stations and the reference stations after the last move", () => {
    const codes = obstacles([...found(), move("casing", "2026-11-06T08:00:00Z")]);
    expect(codes).toEqual([
      ["as_left_missing", null],
      ["station_not_remeasured", "cas-1"],
      ["station_not_remeasured", "brg-2"],
      ["reference_not_remeasured", "brg-1"],
      ["reference_not_remeasured", "shr-1"],
      ["not_confirmed", null],
    ]);
  });

  it("asks again when a part moves after the as-left survey", () => {
    const late = move("casing", "2026-11-12T08:00:00Z");
    const codes = obstacles([...found(), ...left(), confirmed(), late]).map(([code]) => code);
    expect(new Set(codes)).toEqual(new Set(["station_not_remeasured", "reference_not_remeasured"]));
  });

  it("does not take undecided for conforming, and takes a concession for either", () => {
    const verdicts = results({ "cas-1": "undecided", "brg-2": "exceeds" });
    expect(obstacles(found(), verdicts)).toEqual([
      ["station_does_not_conform", "cas-1"],
      ["station_does_not_conform", "brg-2"],
    ]);
    const concession = entry(
      "concession",
      { station: "cas-1", name: "Maren Oake", reason: "Within the band." },
      "c1",
    );
    expect(obstacles([...found(), concession], verdicts)).toEqual([["station_does_not_conform", "brg-2"]]);
    const back = entry("withdrawal", { entry: "c1", reason: "Granted in error." });
    expect(obstacles([...found(), concession, back], verdicts)).toHaveLength(2);
  });

  it("asks why reference stations do not repeat, or cannot be shown to, unless the axis is accepted by name", () => {
    const done = [...found(), move("casing", "2026-11-06T08:00:00Z"), ...left(), confirmed()];
    expect(obstacles(done, results({}, false))).toEqual([["reference_does_not_repeat", null]]);
    expect(obstacles(done, results({}, null))).toEqual([["reference_repeat_unknown", null]]);
    expect(obstacles([...done, accepted("left")], results({}, false))).toEqual([]);
  });

  it("takes no confirmation of a survey that was computed again since", () => {
    const done = [...found(), move("casing", "2026-11-06T08:00:00Z"), ...left(), confirmed()];
    expect(obstacles(done)).toEqual([]);
    for (const survey of ["found", "left"]) {
      const readings = stations.map((station) => `${survey}-${station}`);
      const again = { ...result(survey, readings), id: `again-${survey}` };
      expect(obstacles([...done, again])).toEqual([["not_confirmed", null]]);
    }
  });

  it("asks for the new axis by name where a reference station itself was moved, repeating or not", () => {
    const done = [...found(), move("bearing-1", "2026-11-06T08:00:00Z"), ...left(), confirmed()];
    expect(obstacles(done)).toEqual([["axis_not_accepted", null]]);
    expect(obstacles([...done, accepted("found")])).toEqual([["axis_not_accepted", null]]);
    expect(obstacles([...done, accepted("left")])).toEqual([]);
    const again = {
      ...result(
        "left",
        stations.map((station) => `left-${station}`),
      ),
      id: "again",
    };
    expect(obstacles([...done, accepted("left"), again])).toEqual([["axis_not_accepted", null]]);
    expect(obstacles([...done, accepted("left"), again, accepted("left", "again")])).toEqual([]);
  });

  it("asks for a part that was begun to be finished", () => {
    const open = move("casing", "2026-11-06T08:00:00Z", { finished: false });
    expect(obstacles([...found(), open, ...left(), confirmed()])).toEqual([["move_unfinished", null]]);
  });
});
