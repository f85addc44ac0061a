import { describe, expect, it } from "vitest";
import type { AxisDeviationResult } from "../../shared/schemas/axis-deviations.ts";
import type { ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import type { LoggedMove } from "../../shared/schemas/job-entries.ts";
import { setUpCheckIds } from "../../shared/set-up-checks.ts";
import type { MachineDocument } from "../../shared/schemas/machines.ts";
import type { ShimMoveResult } from "../../shared/schemas/shim-moves.ts";
import { readJobLog, type EntryDocuments, type JobEntry, type JobEntryKind } from "./job-log.ts";
import { moveEffectFlags, moveOrderFlags, stationsMovedBy } from "./move-order.ts";
import { signOffObstacles, type JobResults } from "./sign-off.ts";
import { surveyFlags } from "./survey-flags.ts";

/*
 * The rules of a job are facts of the trade: common practice, no source (set-up before survey, casings before bearings,
 * reference stations re-measured and repeating, every station conforming or conceded by name).
 */
const tolerance = { radial: 0.1 };
const machine: MachineDocument = {
  name: "A row of four bores",
  downstream: "Toward the generator.",
  units: { axial: "mm", bore: "mm", offset: "mm" },
  stations: [
    { id: "brg-1", kind: "bearing", z: 0, tolerance },
    { id: "cas-1", kind: "casing", z: 1000, tolerance },
    { id: "brg-2", kind: "bearing", z: 2000, tolerance },
    { id: "shr-1", kind: "shroud", z: 3000, tolerance },
  ],
  reference: ["brg-1", "shr-1"],
  components: [
    { id: "casing", kind: "casing", stations: ["cas-1"], supports: [] },
    { id: "bearing-2", kind: "bearing", stations: ["brg-2"], carriedBy: "casing", supports: [] },
    { id: "bearing-1", kind: "bearing", stations: ["brg-1"], supports: [] },
  ],
};

let serial = 0;
function entry<Kind extends JobEntryKind>(
  kind: Kind,
  document: EntryDocuments[Kind],
  id?: string,
): JobEntry<Kind> {
  serial += 1;
  return {
    kind,
    id: id ?? `entry-${serial}`,
    createdAt: new Date(Date.UTC(2026, 10, 1, 0, serial)),
    memberId: null,
    keyId: null,
    document,
  };
}
const details = entry("details", { title: "Outage", seen: "downstream" });
const survey = (id: string, stage: "as_found" | "as_left") =>
  entry("survey", { stage, sameSetUp: false }, id);
const reading = (surveyId: string, station: string, takenAt: string, more: object = {}, id?: string) =>
  entry(
    "reading",
    {
      survey: surveyId,
      reading: { station, takenAt, form: "points", points: [], ...more },
      sourceFile: null,
    },
    id,
  );
const result = (surveyId: string, readings: string[]) =>
  entry("survey_result", {
    survey: surveyId,
    boreFit: `fit-${surveyId}`,
    axisDeviation: `axis-${surveyId}`,
    engineVersion: "1.0.0",
    readings,
    drift: null,
  });
const move = (component: string, at: string, more: Partial<LoggedMove> = {}) =>
  entry("move", { component, at, finished: true, ...more });
const stations = ["brg-1", "cas-1", "brg-2", "shr-1"];
const surveyed = (id: string, stage: "as_found" | "as_left", day: string) => {
  const readings = stations.map((station, index) =>
    reading(id, station, `${day}T08:0${index}:00Z`, {}, `${id}-${station}`),
  );
  return [
    survey(id, stage),
    ...readings,
    result(
      id,
      readings.map((one) => one.id),
    ),
  ];
};

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
const found = () => surveyed("found", "as_found", "2026-11-04");
const left = () => surveyed("left", "as_left", "2026-11-10");
const confirmed = () => entry("confirmation", { before: "found", after: "left", calculation: "c" });

describe("readJobLog", () => {
  it("counts of each station the latest reading taken, whatever the order of entry", () => {
    const late = reading("found", "cas-1", "2026-11-04T10:00:00Z", {}, "late");
    const early = reading("found", "cas-1", "2026-11-04T08:00:00Z", {}, "early");
    const [state] = readJobLog([details, survey("found", "as_found"), late, early]).surveys;
    expect([...(state?.counting ?? [])]).toEqual(["late"]);
  });

  it("keeps the closing reading beside the opening one", () => {
    const opening = reading("found", "brg-1", "2026-11-04T08:00:00Z", {}, "opening");
    const closing = reading("found", "brg-1", "2026-11-04T10:00:00Z", { closing: true }, "closing");
    const [state] = readJobLog([details, survey("found", "as_found"), opening, closing]).surveys;
    expect([...(state?.counting ?? [])].sort()).toEqual(["closing", "opening"]);
  });

  it("falls back to the reading before when the latest is withdrawn, and calls the result outdated", () => {
    const first = reading("found", "cas-1", "2026-11-04T08:00:00Z", {}, "first");
    const second = reading("found", "cas-1", "2026-11-04T09:00:00Z", {}, "second");
    const entries = [details, survey("found", "as_found"), first, second, result("found", ["second"])];
    expect(readJobLog(entries).surveys[0]?.isCurrent).toBe(true);
    const withdrawn = [...entries, entry("withdrawal", { entry: "second", reason: "Wrong bore." })];
    const [state] = readJobLog(withdrawn).surveys;
    expect([...(state?.counting ?? [])]).toEqual(["first"]);
    expect(state?.isCurrent).toBe(false);
  });
});

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

describe("moveOrderFlags", () => {
  const plan = {
    components: [
      { id: "casing", realised: [{ support: "s", h: 0.1, v: 0 }] },
      { id: "bearing-2", realised: [{ support: "s", h: 0, v: 0.1 }] },
    ],
  } as unknown as ShimMoveResult;
  const at = "2026-11-06T08:00:00Z";
  const codes = (earlier: LoggedMove[], next: LoggedMove) =>
    moveOrderFlags(machine, plan, earlier, next).map(({ code }) => code);

  it("lets casings go first and bearings after", () => {
    const casing = { component: "casing", at, finished: true };
    expect(codes([], casing)).toEqual([]);
    expect(codes([casing], { component: "bearing-2", at, finished: true })).toEqual([]);
  });

  it("marks a bearing that moves before a casing that is planned", () => {
    expect(codes([], { component: "bearing-2", at, finished: true })).toEqual(["bearing_before_casing"]);
  });

  it("marks a casing that moves after a bearing", () => {
    const casing = { component: "casing", at, finished: true };
    const bearing = { component: "bearing-2", at, finished: true };
    expect(codes([casing, bearing], casing)).toEqual(["casing_after_bearing"]);
  });

  it("marks what was not locked before the next", () => {
    const open = { component: "casing", at, finished: false };
    expect(codes([open], { component: "bearing-2", at, finished: true })).toEqual([
      "bearing_before_casing",
      "previous_not_locked",
    ]);
    expect(codes([open], { ...open, finished: true })).toEqual([]);
  });

  it("takes along what a component carries, and tells of reference stations", () => {
    expect(stationsMovedBy(machine, "casing").sort()).toEqual(["brg-2", "cas-1"]);
    expect(moveEffectFlags(machine, ["brg-1"], { component: "bearing-1" }).map(({ code }) => code)).toEqual([
      "reference_moved",
    ]);
  });
});

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
    const accepted = entry("axis_acceptance", { survey: "left", name: "Ines Alder", reason: "New set-up." });
    expect(obstacles([...done, accepted], results({}, false))).toEqual([]);
  });

  it("asks for the new axis by name where a reference station itself was moved, repeating or not", () => {
    const done = [...found(), move("bearing-1", "2026-11-06T08:00:00Z"), ...left(), confirmed()];
    expect(obstacles(done)).toEqual([["axis_not_accepted", null]]);
    const wrong = entry("axis_acceptance", {
      survey: "found",
      name: "Ines Alder",
      reason: "Moved on purpose.",
    });
    expect(obstacles([...done, wrong])).toEqual([["axis_not_accepted", null]]);
    const right = entry("axis_acceptance", {
      survey: "left",
      name: "Ines Alder",
      reason: "Moved on purpose.",
    });
    expect(obstacles([...done, right])).toEqual([]);
  });

  it("asks for a part that was begun to be finished", () => {
    const open = move("casing", "2026-11-06T08:00:00Z", { finished: false });
    expect(obstacles([...found(), open, ...left(), confirmed()])).toEqual([["move_unfinished", null]]);
  });
});
