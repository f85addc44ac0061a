import { describe, expect, it } from "vitest";
import {
  feetAt,
  padsAt,
  range,
  solvePart,
  stackOf,
  stationOff,
  unlimited,
} from "../../../tests/support/move-problems.ts";
import type { MoveSupport } from "./move-problem.ts";

const low = stationOff("s", 500, 0, -0.4);
const travelV = (minMm: number, maxMm: number) => ({ travel: { h: unlimited, v: range(minMm, maxMm) } });
const near = (got: number, wanted: number, within = 1e-12) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within); // mm, or a ratio
const still = (answer: ReturnType<typeof solvePart>["answer"]) => {
  for (const { hMm, vMm } of [...answer.ideal, ...answer.realised]) expect([hMm, vMm]).toEqual([0, 0]);
  for (const { changeMm } of answer.stacks) expect(changeMm).toBe(0);
};

describe("a component that cannot bring its stations inside", () => {
  it("is fixed", () => {
    const { answer, plan } = solvePart([low], [feetAt("f", 500)], {}, { fixed: true });
    expect(answer.fixed).toBe(true);
    expect(answer.unreachable).toEqual({ cause: "fixed", worst: { stationId: "s", ratio: 0.4 / 0.05 } });
    still(answer);
    expect(plan.predicted[0]).toEqual({ id: "s", deviation: { hMm: 0, vMm: -0.4 }, verdict: "exceeds" });
  });

  it("is fixed without a support as well", () => {
    expect(solvePart([low], [], {}, { fixed: true }).answer.unreachable?.cause).toBe("fixed");
    expect(() => solvePart([low], [])).toThrow(
      expect.objectContaining({ code: "supports_insufficient", details: { at: ["supports"] } }) as Error,
    );
  });

  it("holds a reference station, unless that may move", () => {
    const { answer, plan } = solvePart([low], [feetAt("f", 500)], { referenceIds: ["s"] });
    expect(answer.fixed).toBe(true);
    expect(answer.unreachable).toMatchObject({ cause: "reference", stationId: "s" });
    still(answer);
    expect(plan.advice).toContainEqual({ code: "reference_held", componentId: "part", stationIds: ["s"] });

    const moved = solvePart([low], [feetAt("f", 500)], { referenceIds: ["s"] }, { allowReferenceMove: true });
    near(moved.answer.realised[0]!.vMm, 0.4);
    expect(moved.answer.unreachable).toBe(null);
    expect(moved.plan.advice).toContainEqual({ code: "axis_survey_anew", stationIds: ["s"] });
  });

  it("is stopped by its travel: where, at how much, and how much was wanted", () => {
    const supports = [feetAt("f", 0, travelV(-1, 0.3)), feetAt("g", 1000)];
    const stations = [stationOff("a", 0, 0, -0.4), stationOff("b", 1000, 0, 0.1)];
    const { unreachable } = solvePart(stations, supports).answer;
    expect(unreachable).toMatchObject({
      cause: "limit",
      limit: { of: "travel", support: 0, plane: "v", side: "max" },
      worst: { stationId: "a" },
    });
    near(unreachable?.worst?.ratio ?? NaN, 0.1 / 0.05);
    if (unreachable?.cause !== "limit") return;
    near(unreachable.limitMm, 0.3);
    near(unreachable.wantedMm, 0.4);
  });

  it("is stopped by the least travel, with signs as stated", () => {
    const { unreachable } = solvePart(
      [stationOff("s", 0, 0.5, 0)],
      [feetAt("f", 0, { travel: { h: range(-0.2, 9), v: unlimited } })],
    ).answer;
    expect(unreachable).toMatchObject({ cause: "limit", limit: { of: "travel", plane: "h", side: "min" } });
    if (unreachable?.cause !== "limit") return;
    near(unreachable.limitMm, -0.2);
    near(unreachable.wantedMm, -0.5);
  });

  it("is stopped by a stack: a foot that can take no more, a pad that can give no more", () => {
    const full = stackOf(5, { maxMm: 5.1 });
    const feet = solvePart([low], [feetAt("f", 500, { stacks: { left: stackOf(5), right: full } })]).answer;
    expect(feet.unreachable).toMatchObject({
      cause: "limit",
      limit: { of: "stack", support: 0, place: "right", side: "max" },
    });
    const pads = solvePart([low], [padsAt("f", 500, [0, 135, 225], stackOf(3, { minMm: 2.9 }))]).answer;
    expect(pads.unreachable).toMatchObject({
      cause: "limit",
      limit: { of: "stack", support: 0, place: "p0", side: "min" },
    });
    near(pads.realised[0]!.vMm, 0.1);
  });

  it("names the limit that costs most where several bind", () => {
    const supports = [feetAt("f", 0, travelV(-1, 0.3)), feetAt("g", 1000, travelV(-0.1, 1))];
    const stations = [stationOff("a", 0, 0, -0.45), stationOff("b", 1000, 0, 0.4)];
    // 0.15 are missing in front, 0.3 behind.
    const { answer, plan } = solvePart(stations, supports);
    expect(answer.unreachable).toMatchObject({ cause: "limit", limit: { support: 1, side: "min" } });
    expect(plan.advice).toContainEqual({
      code: "limit_reached",
      componentId: "part",
      limits: [
        { of: "travel", support: 1, plane: "v", side: "min" },
        { of: "travel", support: 0, plane: "v", side: "max" },
      ],
    });
  });

  it("is blocked", () => {
    const supports = [feetAt("f", 0, { blocked: ["v"] }), feetAt("g", 1000)];
    const stations = [stationOff("a", 0, 0, -0.4), stationOff("b", 1000, 0, -0.4)];
    const { unreachable } = solvePart(stations, supports).answer;
    expect(unreachable).toMatchObject({
      cause: "blocked",
      support: 0,
      plane: "v",
      worst: { stationId: "a" },
    });
  });

  it("is rigid, and its bores do not lie straight to each other", () => {
    const supports = [feetAt("f", 0), feetAt("g", 1000)];
    const bent = [0.2, -0.2, 0.2].map((v, i) => stationOff(`s${i}`, 500 * i, 0, v));
    const { answer } = solvePart(bent, supports);
    expect(answer.unreachable).toMatchObject({ cause: "rigid", worst: { stationId: "s1" } });
  });

  it("has no shims that fine", () => {
    const stacks = { left: stackOf(5.1), right: stackOf(5.1) };
    const { answer } = solvePart([low], [feetAt("f", 500, { stacks })], { cutIncrementMm: 0.3 });
    expect(answer.unreachable).toMatchObject({ cause: "shims", worst: { stationId: "s" } });
    near(answer.realised[0]!.vMm, 0.3);
  });

  it("has limits that no move keeps: it stays, and they are named, though it were inside", () => {
    const one = [feetAt("f", 500, travelV(0.2, 0.1))];
    const two: MoveSupport[] = [feetAt("f", 500, travelV(-0.3, -0.2)), feetAt("g", 500, travelV(0.2, 0.3))];
    const stack: MoveSupport[] = [
      feetAt("f", 500, {
        ...travelV(-0.1, 0.1),
        stacks: { left: stackOf(1, { minMm: 2 }), right: stackOf(1) },
      }),
    ];
    for (const supports of [one, two, stack]) {
      for (const v of [0, -0.4]) {
        const { answer } = solvePart([stationOff("s", 500, 0, v)], supports);
        expect(answer.unreachable?.cause).toBe("contradiction");
        expect(answer.fixed).toBe(false);
        expect(answer.unreachable?.worst?.stationId).toBe(v === 0 ? undefined : "s");
        still(answer);
      }
    }
    const { unreachable } = solvePart([low], stack).answer;
    expect(unreachable?.cause === "contradiction" && unreachable.limits).toEqual(
      expect.arrayContaining([
        { of: "stack", support: 0, place: "left", side: "min" },
        { of: "travel", support: 0, plane: "v", side: "max" },
      ]),
    );
  });
});

describe("a component whose stations come inside", () => {
  it("has nothing unreachable, though a limit held it", () => {
    const { answer, plan } = solvePart([low], [feetAt("f", 500, travelV(-1, 0.38))]);
    expect(answer.unreachable).toBe(null);
    expect(plan.predicted[0]!.verdict).toBe("conforms");
    expect(plan.advice.map(({ code }) => code)).toContain("limit_reached");
  });

  it("is judged guarded where its covariance is known, simply where not", () => {
    const covariance = { hhMm2: 1e-4, hvMm2: 0, vvMm2: 1e-4 };
    const held = [feetAt("f", 500, travelV(-1, 0.36))];
    const verdict = (rest: object) => solvePart([{ ...low, ...rest }], held).plan.predicted[0]!.verdict;
    // 0.04 of 0.05 is used: inside by itself, not with U = 2.448·0.01.
    expect(verdict({})).toBe("conforms");
    expect(verdict({ covariance })).toBe("undecided");
    expect(verdict({ tolerance: null })).toBe(null);
  });
});
