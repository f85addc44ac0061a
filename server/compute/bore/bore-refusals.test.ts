import { describe, expect, it } from "vitest";
import {
  clockAngles,
  pairsInput,
  pointsInput,
  refusalOf,
  targetInput,
  wallPoint,
} from "../../../tests/support/bore-inputs.ts";
import type { PointsInput } from "./bore-input.ts";
import { prepareBore } from "./fit-bore.ts";

type Pair = [number, number];
const corners: Pair[] = [
  [0, 10],
  [10, 0],
  [0, -10],
  [-10, 0],
];
const atPlanes = (pairs: Pair[], planes: number[]) =>
  pairs.map(([h, v], i) => wallPoint(h, v, { zMm: planes[i % planes.length]! }));

describe("fitBore refuses", () => {
  it.each([0, 1, 2])("%d points, which are fewer than a circle has unknowns", (count) => {
    expect(refusalOf(pairsInput(corners.slice(0, count)))).toEqual({ code: "too_few_points", at: "points" });
  });

  it("fewer points than a taper (4) or a tilt (5) has unknowns", () => {
    const three = atPlanes(corners.slice(0, 3), [0, 50]);
    expect(refusalOf(pointsInput(three, { taper: { form: "estimate" } })).code).toBe("too_few_points");
    expect(refusalOf(pointsInput(atPlanes(corners, [0, 50]))).code).toBe("too_few_points");
  });

  it.each<[string, (t: number) => Pair]>([
    ["level", (t) => [t, 3]],
    ["upright", (t) => [-7, t]],
    ["oblique, its coordinates rounded", (t) => [0.1 * t, 0.3 * t + 1e3]],
    ["far from its origin", (t) => [1e8 + t, 1e8 - 2 * t]],
    ["through the origin", (t) => [t / 3, t / 7]],
  ])("points in one line: %s", (_, at) => {
    for (const steps of [[0, 1, 5], [-3, 0, 0.5, 2, 2, 9], clockAngles(100)]) {
      expect(refusalOf(pairsInput(steps.map(at)))).toEqual({ code: "points_collinear", at: "points" });
    }
  });

  it("two places read twice, which a line joins", () => {
    const pairs = [corners[0]!, corners[1]!, corners[0]!, corners[1]!];
    expect(refusalOf(pairsInput(pairs)).code).toBe("points_collinear");
  });

  it.each([0, 0.1, 1e6 / 3, -1e9])("points at one place, %d", (at) => {
    const pairs = Array.from({ length: 5 }, (): Pair => [at, at]);
    expect(refusalOf(pairsInput(pairs))).toEqual({ code: "points_coincident", at: "points" });
    const jittered = pairs.map(([h, v], i): Pair => [h * (1 + (i % 2) * Number.EPSILON), v]);
    expect(refusalOf(pairsInput(jittered)).code).toBe("points_coincident");
  });

  it("points on a line but for rounding in their last digit", () => {
    const pairs = clockAngles(9, 0, 90).map((t, i): Pair => [100 + t, 200 + t / 3 + (i % 3) * 3e-14]);
    expect(refusalOf(pairsInput(pairs)).code).toBe("points_collinear");
  });

  it("points that a straight line fits better than any circle", () => {
    // Mirrored scatter about a line: no side for a centre to lie on.
    const pairs = [-2, -1, 1, 2].flatMap((t): Pair[] => [
      [t, 0.01],
      [t, -0.01],
    ]);
    expect(["arc_too_flat", "not_converged"]).toContain(refusalOf(pairsInput(pairs)).code);
  });

  it("weights so unlike that only two readings count", () => {
    const points = corners.map(([h, v], i) => wallPoint(h, v, { uMm: i < 2 ? 1e-12 : 1e9 }));
    expect(refusalOf(pointsInput(points))).toEqual({ code: "rank_deficient", at: "points" });
  });

  it("a tilt that one plane has a single point to tell by", () => {
    const points = [...atPlanes(corners, [0]), wallPoint(7, 7, { zMm: 100 })];
    expect(refusalOf(pointsInput(points))).toEqual({ code: "rank_deficient", at: "points" });
  });

  it("an unknown taper read in one plane, and a known one whose tip lies inside the bore", () => {
    const points = atPlanes([...corners, [6, 8]], [30]);
    expect(refusalOf(pointsInput(points, { taper: { form: "estimate" } }))).toEqual({
      code: "rank_deficient",
      at: "taper",
    });
    expect(refusalOf(pointsInput(points, { taper: { form: "known", halfAngleDeg: 45 } }))).toEqual({
      code: "radius_not_positive",
      at: "taper",
    });
  });

  it("z of some points only, u of some only, and a taper without any z: each for that reason alone", () => {
    const refusalsOf = (input: PointsInput) => {
      const prepared = prepareBore(input);
      return prepared.kind === "refused" ? prepared.refusals.map(({ code }) => code) : [];
    };
    const some = corners.map(([h, v], i) => wallPoint(h, v, i === 2 ? { zMm: 1, uMm: 0.1 } : {}));
    expect(refusalsOf(pointsInput(some.map((p) => ({ ...p, uMm: null }))))).toEqual(["combination_invalid"]);
    expect(refusalsOf(pointsInput(some.map((p) => ({ ...p, zMm: null }))))).toEqual([
      "uncertainty_incomplete",
    ]);
    expect(refusalsOf(pairsInput(corners, { taper: { form: "estimate" } }))).toEqual(["combination_invalid"]);
    expect(refusalsOf(pointsInput(some))).toEqual(["combination_invalid", "uncertainty_incomplete"]);
  });

  it("numbers whose squares are too large, instead of answering NaN or infinity", () => {
    for (const size of [1e160, 1e300, Number.MAX_VALUE]) {
      const pairs = [...corners, [6, 8] as Pair].map(([h, v]): Pair => [h * (size / 10), v * (size / 10)]);
      expect(refusalOf(pairsInput(pairs)).code).toMatch(
        /^(result_overflow|rank_deficient|points_coincident)$/,
      );
    }
    const spots = clockAngles(4).map((clockDeg) => ({ clockDeg, hMm: 1e200 * clockDeg, vMm: 0, uMm: null }));
    expect(refusalOf(targetInput({ spots })).code).toBe("result_overflow");
  });
});
