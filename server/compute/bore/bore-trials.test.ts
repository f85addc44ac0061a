import { describe, expect, it } from "vitest";
import {
  gaugeInput,
  pointsInput,
  targetInput,
  wallPoint,
  wireInput,
} from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { ComputeError } from "../compute-error.ts";
import type { TrialSummary } from "../monte-carlo/confirm-interval.ts";
import type { BoreFit } from "./bore-fit.ts";
import type { BoreInput, PointsInput } from "./bore-input.ts";
import { runBoreTrials, type BoreTrials } from "./bore-trials.ts";
import type { CircleMethod } from "./circle-method.ts";
import { fitBore } from "./fit-bore.ts";
import { fitByCriterion } from "./fit-criterion.ts";

const radians = (deg: number) => (deg * Math.PI) / 180;
const plan = { trials: 10_000, seed: 7, digits: null, unitMm: 1 };

/** Points of an arc, with a fixed waviness. */
function arc(count: number, fromDeg: number, toDeg: number, radiusMm: number, wavinessMm: number) {
  return Array.from({ length: count }, (_, i) => {
    const turn = radians(fromDeg + ((toDeg - fromDeg) * i) / (toDeg - fromDeg === 360 ? count : count - 1));
    const at = radiusMm + wavinessMm * Math.cos(3 * turn + 2.1 * i);
    return wallPoint(3 + at * Math.sin(turn), -2 + at * Math.cos(turn));
  });
}
const ring = (count = 12, rest: Partial<PointsInput> = {}) =>
  pointsInput(arc(count, 0, 360, 180, 0.005), { readingUncertaintyMm: 0.01, ...rest });

function fitOf(input: BoreInput, method: CircleMethod): BoreFit {
  if (method === "least_squares") return fitBore(input as PointsInput);
  return fitByCriterion(input as PointsInput, method);
}

function tried(input: BoreInput, method: CircleMethod = "least_squares", rest: Partial<typeof plan> = {}) {
  const fit = fitOf(input, method);
  return { fit, trials: runBoreTrials(input, method, fit, "brg-1", { ...plan, ...rest }) };
}

/** Asserts that mean and standard deviation of the trials are those of first order, within four standard errors. */
function expectMoments(found: TrialSummary, value: number, standard: number, dof: number | null = null) {
  const spread = dof === null ? standard : standard * Math.sqrt(dof / (dof - 2));
  expect(Math.abs(found.mean! - value)).toBeLessThan((4 * spread) / Math.sqrt(plan.trials));
  // Kurtosis of Student's t: 3 + 6/(dof − 4).
  const excess = dof === null ? 0 : 6 / (dof - 4);
  const error = spread * Math.sqrt((2 + excess) / (4 * plan.trials));
  expect(Math.abs(found.standard! - spread)).toBeLessThan(4 * error);
}

const forms: readonly (readonly [string, BoreInput, CircleMethod])[] = [
  ["a ring of points", ring(), "least_squares"],
  [
    "points of unlike uncertainty",
    pointsInput(arc(12, 0, 360, 180, 0.004).map((one, i) => ({ ...one, uMm: 0.004 + 0.001 * i }))),
    "least_squares",
  ],
  ["points seen upstream", ring(12, { seen: "upstream" }), "least_squares"],
  [
    "a turned gauge",
    gaugeInput({
      readingUncertaintyMm: 0.02,
      gaugeSagMm: 0.3,
      readings: Array.from({ length: 9 }, (_, i) => ({
        clockDeg: 40 * i,
        readingMm: 0.4 * Math.cos(radians(40 * i - 70)),
        uMm: null,
      })),
    }),
    "least_squares",
  ],
  [
    "a wire with three readings",
    wireInput({ leftMm: 199.7, rightMm: 199.9, bottomMm: 200.2, sagMm: 0.1, readingUncertaintyMm: 0.02 }),
    "least_squares",
  ],
  [
    "a cone",
    pointsInput(
      arc(16, 0, 360, 300, 0.004).map((one, i) => ({ ...one, zMm: 40 * (i % 3) })),
      { readingUncertaintyMm: 0.01, taper: { form: "estimate" } },
    ),
    "least_squares",
  ],
  [
    "a tilted cylinder",
    pointsInput(
      arc(16, 0, 360, 300, 0.004).map((one, i) => ({ ...one, zMm: 40 * (i % 3) })),
      { readingUncertaintyMm: 0.01 },
    ),
    "least_squares",
  ],
  [
    "an ellipse",
    pointsInput(
      Array.from({ length: 16 }, (_, i) => {
        const turn = radians(22.5 * i);
        return wallPoint(300.4 * Math.sin(turn) + 0.003 * Math.cos(9 * i), 300.1 * Math.cos(turn));
      }),
      { readingUncertaintyMm: 0.01 },
    ),
    "ellipse",
  ],
];

describe("runBoreTrials", () => {
  it.each(forms)("finds the covariance of %s again, and refutes no interval", (_, input, method) => {
    const { fit, trials } = tried(input, method);
    const { covariance, expandedUncertainty, centre } = fit;
    expect(expandedUncertainty!.dof).toBeNull();
    expectMoments(trials!.h, centre.hMm, Math.sqrt(covariance!.hhMm2));
    expectMoments(trials!.v, centre.vMm, Math.sqrt(covariance!.vvMm2));
    const { diameterMm, factor } = expandedUncertainty!;
    expectMoments(trials!.diameter!, (fit as { diameterMm: number }).diameterMm, diameterMm! / factor);
    const { h, v, diameter } = trials!;
    for (const one of [h, v, diameter!]) expect(one.confirmed).not.toBe(false);
    expect(trials!.failures.size).toBe(0);
  });

  it("finds the covariance of a turned target again, which is linear in its spots", () => {
    const spots = [0, 90, 200, 310].map((clockDeg, i) => ({
      clockDeg,
      hMm: 0.1 * i,
      vMm: 0.05 * i * i,
      uMm: 1 + 0.2 * i,
    }));
    const { fit, trials } = tried(targetInput({ spots }));
    expectMoments(trials!.h, fit.centre.hMm, Math.sqrt(fit.covariance!.hhMm2));
    expectMoments(trials!.v, fit.centre.vMm, Math.sqrt(fit.covariance!.vvMm2));
    expect(trials!.diameter).toBeNull();
  });

  it("draws the scatter too where nothing is stated: Student's t with n − p degrees of freedom", () => {
    const { fit, trials } = tried(ring(12, { readingUncertaintyMm: null }));
    expect(fit.expandedUncertainty!.dof).toBe(9);
    expectMoments(trials!.h, fit.centre.hMm, Math.sqrt(fit.covariance!.hhMm2), 9);
    const level = fit.expandedUncertainty!.hMm;
    expect(Math.abs(trials!.h.interval!.high - fit.centre.hMm - level)).toBeLessThan(
      2 * trials!.h.sampling!.high,
    );
    expect(trials!.h.confirmed).not.toBe(false);
  });

  it("draws with the scatter where it passes what is stated", () => {
    const { fit, trials } = tried(ring(12, { readingUncertaintyMm: 0.001 }));
    const { statistics, expandedUncertainty, covariance } = fit;
    expect(statistics.varianceInflation).toBeGreaterThan(5);
    expectMoments(trials!.v, fit.centre.vMm, Math.sqrt(covariance!.vvMm2), expandedUncertainty!.dof);
    expect(trials!.v.confirmed).not.toBe(false);
  });

  it("has no standard deviation with one degree of freedom left over, and no mean", () => {
    const { trials } = tried(ring(4, { readingUncertaintyMm: null }), "least_squares", { trials: 4_000 });
    expect(trials!.h).toMatchObject({ mean: null, standard: null });
    expect(trials!.h.interval).not.toBeNull();
  });

  it("has nothing to draw where no uncertainty is known", () => {
    expect(tried(ring(3, { readingUncertaintyMm: null })).trials).toBeNull();
    expect(tried(ring(12, { readingUncertaintyMm: null }), "minimum_zone").trials).toBeNull();
  });

  it("does not confirm a short arc of large uncertainty, whose centre is skewed and off", () => {
    const short = pointsInput(arc(9, 170, 190, 740, 0.1), { readingUncertaintyMm: 1 });
    const { fit, trials } = tried(short);
    expect(trials!.v.confirmed).toBe(false);
    expect(trials!.diameter!.confirmed).toBe(false);
    // Brute force beside it: another generator, and the whole fit.
    const random = seededRandom(99);
    const rounds = 20_000;
    const again = Float64Array.from({ length: rounds }, () => {
      const points = short.points.map(({ hMm, vMm }) =>
        wallPoint(hMm + random.normal(), vMm + random.normal()),
      );
      return fitBore({ ...short, points }).centre.vMm;
    }).sort();
    const { interval, sampling } = trials!.v;
    const ends = [again[0.025 * rounds - 1]!, again[0.975 * rounds - 1]!] as const;
    // Both are off by chance, the brute force by √2 as much.
    expect(Math.abs(ends[0] - interval!.low)).toBeLessThan(3 * sampling!.low);
    expect(Math.abs(ends[1] - interval!.high)).toBeLessThan(3 * sampling!.high);
    const { vMm: y } = fit.centre;
    const skew = interval!.high - y - (y - interval!.low);
    expect(skew).toBeGreaterThan(0.3 * fit.expandedUncertainty!.vMm);
  });

  it.each(["minimum_zone", "maximum_inscribed", "minimum_circumscribed"] as const)(
    "agrees with brute force over the whole fit for %s, which first order with fixed contacts does not",
    (method) => {
      const input = pointsInput(arc(8, 0, 360, 200, 0.002), { readingUncertaintyMm: 0.01 });
      const trials = 2_000;
      const found = tried(input, method, { trials }).trials!;
      const random = seededRandom(3);
      const again = Float64Array.from({ length: trials }, () => {
        const points = input.points.map(({ hMm, vMm }) =>
          wallPoint(hMm + 0.01 * random.normal(), vMm + 0.01 * random.normal()),
        );
        return fitByCriterion({ ...input, points }, method).diameterMm!;
      });
      const mean = again.reduce((sum, value) => sum + value, 0) / trials;
      const spread = Math.sqrt(again.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (trials - 1));
      const { diameter } = found;
      expect(Math.abs(diameter!.mean! - mean)).toBeLessThan(4 * spread * Math.sqrt(2 / trials));
      expect(Math.abs(diameter!.standard! / spread - 1)).toBeLessThan(4 / Math.sqrt(trials));
      if (method !== "minimum_zone") expect(diameter!.confirmed).toBe(false);
    },
  );

  it("keeps readings put aside out of every trial", () => {
    const slipped = arc(12, 0, 360, 180, 0.005).map((one, i) =>
      i === 5 ? { ...one, hMm: one.hMm + 4 } : one,
    );
    const { fit, trials } = tried(
      pointsInput(slipped, { readingUncertaintyMm: 0.01, outliers: { threshold: 3.5 } }),
    );
    const kept = pointsInput(
      slipped.filter((_, i) => i !== 5),
      { readingUncertaintyMm: 0.01 },
    );
    expect((fit as { exclusions: readonly unknown[] }).exclusions).toHaveLength(1);
    expect(trials!.h.interval).toEqual(tried(kept).trials!.h.interval);
    expect(trials!.diameter!.mean).toBe(tried(kept).trials!.diameter!.mean);
    expectMoments(trials!.h, fit.centre.hMm, Math.sqrt(fit.covariance!.hhMm2));
  });

  it("counts the trials that cannot be computed, and leaves open what they leave open", () => {
    const flat = pointsInput(arc(8, 177.5, 182.5, 180, 0), { readingUncertaintyMm: 0.2 });
    const { failures, v, h } = tried(flat, "least_squares", { trials: 4_000 }).trials!;
    const failed = [...failures.values()].reduce((sum, count) => sum + count, 0);
    expect(failed).toBeGreaterThan(0);
    expect([...failures.keys()].every((code) => /^[a-z_]+$/.test(code))).toBe(true);
    for (const { interval, sampling } of [h, v]) {
      expect(interval).not.toBeNull();
      expect(sampling === null || sampling.high > 0).toBe(true);
    }
  });

  it("counts a gauge reading that falls beyond the gauge's own axis", () => {
    const readings = [0, 90, 180, 270].map((clockDeg) => ({ clockDeg, readingMm: 0, uMm: null }));
    const input = gaugeInput({ nominalDiameterMm: 2, readings, readingUncertaintyMm: 0.5 });
    const { failures } = tried(input, "least_squares", { trials: 2_000 }).trials!;
    // Four readings of mean 1 and deviation 0.5: one is 0 or less with probability 1 − Φ(2)⁴ = 0.088.
    expect(Math.abs(failures.get("radius_not_positive")! / 2_000 - 0.088)).toBeLessThan(0.026);
  });

  it("is set by seed and name alone", () => {
    const of = (name: string, seed: number): BoreTrials =>
      runBoreTrials(ring(), "least_squares", fitBore(ring()), name, { ...plan, trials: 1_000, seed })!;
    expect(of("a", 1)).toEqual(of("a", 1));
    expect(of("a", 1).h.mean).not.toBe(of("a", 2).h.mean);
    expect(of("a", 1).h.mean).not.toBe(of("b", 1).h.mean);
  });

  it("never answers a number that is none, however wild the bore", () => {
    const wild = [
      pointsInput(arc(5, 0, 360, 1e-6, 1e-9), { readingUncertaintyMm: 1e9 }),
      pointsInput(arc(5, 0, 360, 1e9, 1e-6), { readingUncertaintyMm: 1e-12 }),
      pointsInput(arc(3, 0, 1, 180, 0), { readingUncertaintyMm: 50 }),
      ring(4, { readingUncertaintyMm: null, level: 0.999_9 }),
    ];
    for (const input of wild) {
      try {
        const { trials } = tried(input, "least_squares", { trials: 1_000 });
        const numbers = JSON.stringify(trials, (_, value: unknown) =>
          typeof value === "number" && !Number.isFinite(value) ? "NOT FINITE" : value,
        );
        expect(numbers).not.toContain("NOT FINITE");
      } catch (error) {
        expect(error).toBeInstanceOf(ComputeError);
      }
    }
  });
});
