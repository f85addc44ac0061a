import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { cautions } from "../../shared/cautions.ts";
import { confirmationResult, type ConfirmationResult } from "../../shared/schemas/confirmation-answers.ts";
import { confirmationRequest, type ConfirmationRequest } from "../../shared/schemas/confirmations.ts";
import { confirmed as base, surveyOf } from "../../tests/support/confirmation-requests.ts";
import { axisDeviationKind } from "./axis-deviation.ts";
import { confirmationKind } from "./confirmation.ts";

const confirm = (request: ConfirmationRequest): ConfirmationResult => confirmationKind.answer(request).result;
const codes = ({ warnings }: ConfirmationResult) => warnings.map(({ code }) => code);
const at = (time: string) => `2026-03-11T${time}:00+01:00`;

describe("confirmationKind.answer", () => {
  it("answers in the shape of its schema, with cautions", () => {
    const answer = confirmationKind.answer(base);
    expect(answer).toMatchObject({ units: base.units, level: 0.95, cautions });
    expect(confirmationResult.parse(answer.result)).toEqual(answer.result);
  });

  it("shows planned against achieved at every station of a part that moved, worked by hand", () => {
    const { frame, moved, unexpected, outstanding, reference } = confirm(base);
    expect(frame).toBe("fixed");
    expect(reference).toMatchObject({ repeats: true, cause: "none" });
    expect(moved.map(({ id }) => id)).toEqual(["cas-1", "cas-2"]);
    expect(Math.abs(moved[0]!.planned!.h + 0.1)).toBeLessThan(1e-15);
    expect(Math.abs(moved[1]!.planned!.v - 0.1)).toBeLessThan(1e-15);
    for (const { achieved, ratio, difference, agrees, statistic } of moved) {
      // Nine tenths of the plan, along it.
      expect(Math.abs(ratio! - 0.9)).toBeLessThan(1e-12);
      expect(Math.abs(achieved!.v + achieved!.h / 2)).toBeLessThan(1e-12);
      // (0.01, −0.005)·k off, Σ = 2u²[[1, 0.2], [0.2, 1]]: k²·(1 + 0.25 + 0.2)·1e-4/(0.96·2·0.005²)
      const k = difference!.h / 0.01;
      expect(Math.abs(statistic! - (k * k * 1.45e-4) / (0.96 * 5e-5))).toBeLessThan(1e-9);
      expect(agrees).toBe(statistic! <= 5.991464547107983);
    }
    expect(unexpected).toEqual([]);
    expect(outstanding).toEqual([]);
  });

  it("names what should not have moved and did: a neighbour, a reference station, a station planned to stay", () => {
    const after = surveyOf({
      "cas-1": [-0.1, 0.05],
      "cas-2": [0, 0],
      "noz-1": [0, 0.05],
      "brg-2": [0.06, 0],
    });
    const found = confirm({
      ...base,
      after,
      components: [],
      moves: [
        { station: "cas-1", h: 0, v: 0 },
        { station: "cas-2", h: 0, v: 0 },
      ],
    });
    expect(found.reference).toMatchObject({ repeats: false, cause: "station", moved: ["brg-2"] });
    expect(found.unexpected).toEqual(["cas-1", "noz-1", "brg-2"]);
    expect(found.moved.map(({ id, ratio }) => [id, ratio])).toEqual([
      ["cas-1", null],
      ["cas-2", null],
    ]);
    expect(found.unmoved.map(({ id, changed }) => [id, changed])).toEqual([["noz-1", true]]);
    expect(codes(found)).toEqual(["reference_moved_by_itself"]);
  });

  it("takes a common shift and tilt off every change, and says that it did", () => {
    const whole = [
      [0.3, -0.2],
      [-3e-5, 2e-5],
    ] as const;
    for (const sameSetUp of [true, false]) {
      const found = confirm({
        ...base,
        sameSetUp,
        after: surveyOf({ "cas-2": [0, 0.09], "noz-1": [0, 0.05] }, whole),
        components: [],
        moves: [{ station: "cas-2", h: 0, v: 0.1 }],
      });
      expect(found.frame).toBe("reference");
      expect(found.reference.repeats).toBe(sameSetUp ? false : true);
      expect(found.reference.cause).toBe(sameSetUp ? "common" : "none");
      expect(Math.abs(found.reference.shift!.h - 0.3)).toBeLessThan(1e-12);
      expect(Math.abs(found.reference.tilt!.v - 2e-5)).toBeLessThan(1e-15);
      expect(Math.abs(found.moved[0]!.ratio! - 0.9)).toBeLessThan(1e-9);
      expect(found.unexpected).toEqual(["noz-1"]);
      expect(codes(found)).toEqual(sameSetUp ? ["axis_moved"] : []);
    }
  });

  it("answers null, with a warning, where two reference stations of a new set-up prove nothing", () => {
    const found = confirm({ ...base, sameSetUp: false, reference: ["brg-1", "brg-2"] });
    expect(found.reference).toMatchObject({ repeats: null, cause: null });
    expect(codes(found)).toContain("two_references_prove_nothing");
    expect(found.reference.perStation.map(({ repeats, limit }) => [repeats, limit])).toEqual([
      [null, null],
      [null, null],
    ]);
  });

  it("names every reference station that changed where two of an untouched set-up cannot tell which moved", () => {
    const after = surveyOf({ "brg-2": [0.06, 0], "noz-1": [0, 0.05] });
    const found = confirm({ ...base, after, reference: ["brg-1", "brg-2"], components: [], moves: [] });
    expect(found.reference).toMatchObject({ repeats: false, cause: "undetermined", moved: [] });
    expect(found.unexpected).toEqual(["noz-1", "brg-2"]);
    expect(codes(found)).toEqual(["two_references_cannot_tell"]);
  });

  it("names no one, and warns, where three of a new set-up do not repeat", () => {
    const found = confirm({ ...base, sameSetUp: false, after: surveyOf({ "shr-1": [0.2, 0] }) });
    expect(found.reference).toMatchObject({ repeats: false, cause: "undetermined", moved: [] });
    expect(found.unexpected).not.toContain("shr-1");
    expect(codes(found)).toContain("three_references_cannot_name");
  });

  it("does not show that a reference station repeats which somebody moved, or which is in one survey only", () => {
    const moves = [...base.moves!, { station: "brg-2", h: 0.05, v: 0 }];
    const found = confirm({ ...base, moves, after: surveyOf({ "brg-2": [0.05, 0] }) });
    expect(found.reference).toMatchObject({ repeats: null, cause: null });
    expect(found.reference.perStation.map(({ id }) => id)).toEqual(["brg-1", "shr-1"]);
    expect(found.moved.map(({ id }) => id)).toContain("brg-2");
    expect(codes(found)).toContain("reference_moved");
    const stations = base.after.stations.filter(({ id }) => id !== "shr-1");
    const missing = confirm({ ...base, after: { stations } });
    expect(missing.reference.repeats).toBeNull();
    expect(codes(missing)).toContain("reference_missing");
    expect(missing.outstanding).toEqual(["shr-1"]);
  });

  it("compares without reference stations what was read, and without covariances untested", () => {
    const { reference: _none, ...rest } = base;
    const found = confirm(rest);
    expect(found.reference).toMatchObject({ repeats: null, shift: null, tilt: null, perStation: [] });
    expect(codes(found)).toEqual(["no_reference", "axis_not_determined"]);
    expect(found.verdicts).toEqual([]);
    const bare = (survey: { stations: ConfirmationRequest["after"]["stations"] }) => ({
      stations: survey.stations.map(({ covariance: _covariance, ...station }) => station),
    });
    const untested = confirm({ ...base, before: bare(base.before), after: bare(base.after) });
    expect(untested.reference.repeats).toBeNull();
    expect(untested.unmoved).toMatchObject([{ id: "noz-1", changed: null, covariance: null }]);
    expect(codes(untested)).toEqual(["uncertainty_unknown", "not_tested"]);
    expect(Math.abs(untested.moved[0]!.ratio! - 0.9)).toBeLessThan(1e-12);
  });

  it("moves what a part carries with it, and adds what that does by itself", () => {
    const components: ConfirmationRequest["components"] = [
      { id: "seat", stations: ["brg-1"], carriedBy: "casing", supports: [{ id: "s", z: 0 }] },
      ...base.components!,
    ];
    const moves = [...base.moves!, { component: "seat", support: "s", h: 0.02, v: 0.03 }];
    const { moved } = confirm({ ...base, components, moves, reference: ["shr-1", "brg-2"] });
    // At z = 0 the casing's plan, 0.1 a 620 mm, comes to 0; the seat adds its own.
    const planned = moved.find(({ id }) => id === "brg-1")!.planned!;
    expect(Math.hypot(planned.h - 0.02, planned.v - 0.03)).toBeLessThan(1e-12);
  });

  it("lists by the log what was not re-measured since its last move, reference stations first", () => {
    const log: ConfirmationRequest["log"] = [
      { at: at("13:00"), event: "measured", component: "casing" },
      { at: at("12:00"), event: "moved", component: "casing" },
      { at: "2026-03-11T12:30:00Z", event: "moved", station: "cas-2" },
      { at: at("13:40"), event: "measured", station: "brg-1" },
      { at: at("13:45"), event: "measured", station: "shr-1" },
    ];
    const found = confirm({ ...base, log });
    // 12:30 in Greenwich is half past one at the machine: after the casing was measured.
    expect(found.outstanding).toEqual(["brg-2", "cas-2"]);
    expect(codes(found)).toEqual(["reference_not_remeasured"]);
  });

  it("tells a move that the log has and nobody planned, and one that was planned and is not in the log", () => {
    const log: ConfirmationRequest["log"] = [{ at: at("12:00"), event: "moved", station: "noz-1" }];
    const found = confirm({ ...base, log });
    expect(found.moved.map(({ id, planned, ratio }) => [id, planned === null, ratio === null])).toEqual([
      ["cas-1", false, false],
      ["cas-2", false, false],
      ["noz-1", true, true],
    ]);
    expect(found.unexpected).toEqual([]);
    expect(codes(found)).toEqual(["reference_not_remeasured", "move_not_planned", "move_not_logged"]);
  });

  it("tells a plan that no rigid part can follow", () => {
    const components = [
      { ...base.components![0]!, supports: [620, 930, 1240].map((z, i) => ({ id: `s${i}`, z })) },
    ];
    const moves = [0, 0.2, 0].map((v, i) => ({ component: "casing", support: `s${i}`, h: 0, v }));
    expect(codes(confirm({ ...base, components, moves }))).toEqual(["plan_not_rigid"]);
  });

  it("judges the later survey as POST /v1/axis-deviations does, from the reference stations that stayed", () => {
    const { verdicts } = confirm({
      ...base,
      after: surveyOf({ "shr-1": [0.1, 0.1], "cas-1": [-0.1, 0.05] }),
      level: 0.9,
    });
    const { result } = axisDeviationKind.answer({
      units: base.units,
      level: 0.9,
      axis: { method: "least_squares", through: ["brg-1", "brg-2"] },
      stations: surveyOf({ "shr-1": [0.1, 0.1], "cas-1": [-0.1, 0.05] }).stations,
    });
    expect(verdicts).toEqual(result.stations.map(({ z: _z, ...station }) => station));
    const sight = confirm({ ...base, axis: { method: "line_of_sight" }, reference: [] });
    expect(sight.verdicts).toHaveLength(6);
    expect(sight.verdicts[0]!.deviation.v).toBe(-0.07);
  });

  it("works every example of the documentation", () => {
    const folder = new URL("../../examples/requests/confirmations/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThan(1);
    for (const file of files) {
      const request = confirmationRequest.parse(JSON.parse(readFileSync(new URL(file, folder), "utf8")));
      expect(confirmationResult.safeParse(confirm(request)).success).toBe(true);
    }
  });
});
