import { describe, expect, it } from "vitest";
import {
  feetAt,
  jointKeysAt,
  moveProblem,
  partOn,
  solvePart,
  stackOf,
  stationOff,
} from "../../../tests/support/move-problems.ts";
import { solveMoves } from "./solve-moves.ts";

const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm

describe("a part that rests in another", () => {
  // A bearing at z = 500 in a casing on feet at 0 and 1000; the casing's stations ask for 0.2 up at 0 and 0.4 at 1000.
  const stations = [
    stationOff("brg", 500, 0.05, -0.1),
    stationOff("fore", 0, 0, -0.2),
    stationOff("aft", 1000, 0, -0.4),
  ];
  const bearing = partOn("bearing", ["brg"], [feetAt("seat", 500, { stacks: {} })], {
    kind: "bearing",
    carriedById: "casing",
  });
  const casing = partOn("casing", ["fore", "aft"], [feetAt("a", 0), feetAt("b", 1000)]);
  const plan = solveMoves(moveProblem(stations, [bearing, casing], { referenceIds: ["fore"] }));
  const free = solveMoves(moveProblem(stations, [bearing, casing]));

  it("is solved after it, with its stations where the carrier's move leaves them", () => {
    // The casing rises 0.3 at the bearing, which is then 0.2 high: by hand.
    const move = free.components[0]!.realised[0]!;
    near(move.vMm, -0.2);
    near(move.hMm, -0.05);
    near(free.predicted[0]!.deviation.vMm, 0);
    expect(free.steps.map(({ componentId }) => componentId)).toEqual(["casing", "bearing"]);
  });

  it("follows a carrier that stays by nothing", () => {
    // The casing holds the reference station.
    expect(plan.components[1]!.fixed).toBe(true);
    near(plan.components[0]!.realised[0]!.vMm, 0.1);
  });

  it("has its stations watched while the carrier moves", () => {
    const [first] = free.steps;
    expect(first!.watch.map(({ stationId }) => stationId)).toEqual(["brg"]);
    near(first!.watch[0]!.change.vMm, 0.3);
    near(first!.watch[0]!.stopAt.v.minMm, 0.28);
    near(first!.watch[0]!.stopAt.v.maxMm, 0.32);
  });

  it("is carried through a part between", () => {
    const ring = partOn("ring", [], [feetAt("r", 500)], { carriedById: "casing" });
    const inRing = { ...bearing, carriedById: "ring" };
    const { components, predicted } = solveMoves(moveProblem(stations, [inRing, ring, casing]));
    near(components[0]!.realised[0]!.vMm, -0.2);
    near(predicted[0]!.deviation.vMm, 0);
  });

  it("asks for a new axis when its carrier takes a reference station along", () => {
    const held = solveMoves(moveProblem(stations, [bearing, casing], { referenceIds: ["brg"] }));
    expect(held.advice).toContainEqual({ code: "axis_survey_anew", stationIds: ["brg"] });
    near(held.predicted[0]!.deviation.vMm, 0.2);
    expect(held.remeasureIds).toEqual(["brg", "fore", "aft"]);
  });
});

describe("a coupling", () => {
  const stations = [stationOff("fore", 0, 0, -0.3), stationOff("brg", 100, 0, 0.01, 0.05)];
  const casing = partOn("casing", ["fore"], [feetAt("a", 0)]);
  const bearing = partOn("bearing", ["brg"], [feetAt("seat", 100)], { kind: "bearing" });
  const coupling = { componentId: "casing", supportId: "a", stationId: "brg", h: 0.5, v: 0.1 };

  it("shifts the station before its own part is solved, per unit of the support's move", () => {
    const { components, predicted, steps } = solveMoves(
      moveProblem(stations, [casing, bearing], { couplings: [coupling] }),
    );
    // 0.3 up × 0.1 = 0.03 more than the 0.01 found: by hand.
    near(components[1]!.realised[0]!.vMm, -0.04);
    near(predicted[1]!.deviation.vMm, 0);
    expect(steps[0]!.watch.map(({ stationId }) => stationId)).toEqual(["brg"]);
    near(steps[0]!.watch[0]!.change.vMm, 0.03);
  });

  it("onto a part already served is predicted and told", () => {
    const back = { componentId: "bearing", supportId: "seat", stationId: "fore", h: 0, v: 2 };
    const { predicted, advice, remeasureIds } = solveMoves(
      moveProblem(stations, [casing, bearing], { couplings: [back] }),
    );
    near(predicted[0]!.deviation.vMm, -0.02);
    expect(advice).toContainEqual({
      code: "shifted_afterwards",
      componentId: "casing",
      stationIds: ["fore"],
    });
    expect(remeasureIds).toContain("fore");
  });

  it("adds to others onto the same station, and counts for one that no part carries", () => {
    const loose = [...stations, stationOff("seal", 50, 0, 0)];
    const onto = (v: number) => ({ ...coupling, stationId: "seal", v });
    const { predicted } = solveMoves(
      moveProblem(loose, [casing, bearing], { couplings: [onto(0.1), onto(0.2)] }),
    );
    near(predicted[2]!.deviation.vMm, 0.09);
  });
});

describe("a tilt tolerance", () => {
  const ends = [stationOff("fore", 0, 0, 0, 1), stationOff("aft", 200, 0, 0.2, 1)];
  const tiltTolerance = { h: 1e-4, v: 1e-4 };

  it("is asked of the part's supports together with its stations", () => {
    const { answer } = solvePart(ends, [feetAt("a", 0), feetAt("b", 200)], {}, { tiltTolerance });
    near(answer.tilt!.found.v, 1e-3);
    near(answer.tilt!.predicted.v, 0);
    expect(answer.unreachable).toBeNull();
  });

  it("weighs against the stations by its own width: the normal equations by hand", () => {
    // A part that only tilts (held at z = 0), one station asking for -0.2 at 200 of 1 wide, the tilt for 0 of 1e-3:
    // minimise (0.2 + x)² + ((0.2 + x)/200/1e-3)², both zero at x = -0.2; a third station at 100 asks for 0.
    const three = [ends[0]!, stationOff("mid", 100, 0, 0, 1), ends[1]!];
    const wide = { h: 1e-3, v: 1e-3 };
    const { answer } = solvePart(
      three,
      [feetAt("a", 0, { blocked: ["h", "v"] }), feetAt("b", 200)],
      {},
      { tiltTolerance: wide },
    );
    // d/dx [(0.2 + x)² + (x/2)² + 25·(0.2 + x)²] = 0: 26·(0.2 + x) + x/4 = 0.
    near(answer.realised[1]!.vMm, (-26 * 0.2) / 26.25, 1e-10);
  });

  it("that one support cannot serve is told, never silently a translation", () => {
    const { plan, answer } = solvePart(ends, [feetAt("a", 100)], {}, { tiltTolerance });
    expect(plan.advice).toContainEqual({
      code: "tilt_not_adjustable",
      componentId: "part",
      planes: ["h", "v"],
    });
    expect(answer.unreachable).toEqual({ worst: null, cause: "tilt", planes: ["v"] });
    near(answer.tilt!.predicted.v, 1e-3);
  });
});

describe("a roll", () => {
  // Feet 1000 to each side and 800 below the bore; 0.0002 rad clockwise.
  const roll = {
    radians: 2e-4,
    feet: [
      { supportId: "a", place: "left", hMm: -1000, vMm: -800 },
      { supportId: "a", place: "right", hMm: 1000, vMm: -800 },
    ],
  };
  const stations = [stationOff("s", 0, 0.16, -0.1)];

  it("comes out by unlike feet, and the bore moves by roll × height", () => {
    const { answer, stack, plan } = solvePart(stations, [feetAt("a", 0)], {}, { roll });
    // The clockwise-rolled part's right foot is low: it rises by 0.2, the left sinks by as much, and all rise by 0.1.
    near(stack("right").changeMm, 0.3);
    near(stack("left").changeMm, -0.1);
    near(answer.roll!.predictedRadians, 0, 1e-15);
    near(answer.roll!.boreShift.hMm, -0.16);
    // The bore was 0.16 to the right by its roll alone: no jack is needed.
    near(answer.realised[0]!.hMm, 0);
    near(plan.predicted[0]!.deviation.hMm, 0);
    near(plan.predicted[0]!.deviation.vMm, 0);
  });

  it("is left where a part may not move", () => {
    const { answer, stack } = solvePart(stations, [feetAt("a", 0)], {}, { roll, fixed: true });
    expect(stack("right").changeMm).toBe(0);
    expect(answer.roll).toEqual({
      foundRadians: 2e-4,
      predictedRadians: 2e-4,
      boreShift: { hMm: -0, vMm: 0 },
    });
  });

  it("is taken out with real shims as near as they can be cut", () => {
    const { answer, stack } = solvePart(
      stations,
      [feetAt("a", 0, { stacks: { left: stackOf(6), right: stackOf(6) } })],
      { cutIncrementMm: 0.03 },
      { roll },
    );
    const left = stack("left");
    const right = stack("right");
    for (const { addMm } of [left, right]) {
      for (const mm of addMm) expect(Math.abs(mm / 0.03 - Math.round(mm / 0.03))).toBeLessThan(1e-9);
    }
    near(answer.roll!.predictedRadians, 2e-4 - (right.changeMm - left.changeMm) / 2000);
    expect(Math.abs(answer.roll!.predictedRadians)).toBeLessThanOrEqual(0.03 / 2000);
  });

  it("comes out at the keys of a horizontal joint too", () => {
    const feet = roll.feet.map((foot, k) => ({ ...foot, place: k === 0 ? "key-left" : "key-right", vMm: 0 }));
    const { answer, stack } = solvePart(stations, [jointKeysAt("a", 0)], {}, { roll: { ...roll, feet } });
    near(stack("key-right").changeMm - stack("key-left").changeMm, 0.4);
    near(answer.roll!.boreShift.hMm, 0);
  });
});
