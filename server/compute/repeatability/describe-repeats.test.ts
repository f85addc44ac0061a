import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { describeCases, mismatches } from "../../../tests/reference/read-cases.ts";
import { exactMoments } from "../../../tests/support/exact-moments.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { PlaneVector } from "../plane.ts";
import { describeRepeats, type Repeats } from "./describe-repeats.ts";

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

/** The same readings in h and, turned over, in v. */
const inBoth = (values: readonly number[]): PlaneVector[] =>
  values.map((value) => ({ hMm: value, vMm: -value }));
const repeatsOf = (
  readings: readonly PlaneVector[],
  level = 0.95,
  times = readings.map((_, i) => i),
): Repeats => describeRepeats({ readings, times, level });

interface Univariate {
  readonly y: number[];
}
interface UnivariateAnswer {
  readonly mean: number;
  readonly sd: number;
  readonly autocorrelation_lag1: number;
}

function momentsOf({ mean, covariance, autocorrelation }: Repeats) {
  return {
    h: { mean: mean.hMm, sd: Math.sqrt(covariance.hhMm2), autocorrelation_lag1: autocorrelation.h ?? NaN },
    v: { mean: -mean.vMm, sd: Math.sqrt(covariance.vvMm2), autocorrelation_lag1: autocorrelation.v ?? NaN },
  };
}

describeCases<Univariate, UnivariateAnswer>(
  "describeRepeats on certified univariate data",
  ["univariate"],
  ({ input: { y }, expected, tolerance }) => {
    const exact = exactMoments(y);
    const got = momentsOf(repeatsOf(inBoth(y)));
    // Of the numbers as a double holds them: to the case's own tolerance.
    for (const plane of [got.h, got.v]) expect(mismatches({ expected: exact, tolerance }, plane)).toEqual([]);
    // Of the decimals as certified: what holding them as doubles changes comes on top, half a spacing each.
    const half = Number.EPSILON * Math.max(...y.map(Math.abs));
    const held = { mean: half, sd: 2 * half, autocorrelation_lag1: (8 * half) / expected.sd };
    for (const name of ["mean", "sd", "autocorrelation_lag1"] as const) {
      const own = (tolerance[name] as { rel: number }).rel * Math.abs(expected[name]);
      expect(Math.abs(got.h[name] - expected[name])).toBeLessThanOrEqual(own + held[name]);
    }
  },
);

describeCases<{ x: number[]; alpha: number }, { G: number; critical: number; outlier_index: number }>(
  "describeRepeats on Grubbs' test",
  ["outlier-test"],
  (reference) => {
    const { x, alpha } = reference.input;
    // One-tailed at alpha is two-tailed at 2·alpha.
    const { farthest } = repeatsOf(inBoth(x), 1 - 2 * alpha);
    for (const found of [farthest.h, farthest.v]) {
      const got = { G: found?.ratio, critical: found?.limit, outlier_index: found?.index };
      expect(mismatches(reference, got)).toEqual([]);
      expect(found?.standsOut).toBe(true);
    }
  },
);

describeCases<{ powers: number[]; x: number[]; y: number[] }, { coefficients: number[]; sd: number[] }>(
  "the drift of describeRepeats on certified regressions",
  ["linear-regression"],
  ({ input: { x, y }, expected }) => {
    const { drift } = repeatsOf(inBoth(y), 0.95, x);
    const slope = expected.coefficients[1] ?? NaN;
    const sd = expected.sd[1] ?? NaN;
    // 1e-12 relative: what double arithmetic can promise of NIST's 15 certified digits.
    for (const [plane, sign] of [
      ["h", 1],
      ["v", -1],
    ] as const) {
      expect(relative(drift![plane].slopeMm, sign * slope)).toBeLessThan(1e-12);
      expect(relative(drift![plane].standardErrorMm, sd)).toBeLessThan(1e-12);
      expect(relative(drift![plane].t!, (sign * slope) / sd)).toBeLessThan(2e-12);
      expect(drift![plane].significant).toBe(true);
    }
    // h and v are one and the same series: there is no scatter across them to test both with.
    expect(drift!.together).toBeNull();
  },
);

describe("describeRepeats", () => {
  it("has a Type A uncertainty of s/√n, expanded by Student's t of n − 1 degrees of freedom", () => {
    const { covariance, meanCovariance, dof, expandedUncertainty } = repeatsOf(
      inBoth(Array.from({ length: 20 }, (_, i) => (i % 5) / 10)),
    );
    expect(dof).toBe(19);
    expect(relative(meanCovariance.hhMm2, covariance.hhMm2 / 20)).toBeLessThan(1e-15);
    // t at 0.95 and 19 degrees of freedom: JCGM 100:2008, table G.2
    expect(Math.abs(expandedUncertainty.k - 2.09)).toBeLessThan(0.005);
    const wanted = expandedUncertainty.k * Math.sqrt(meanCovariance.hhMm2);
    expect(relative(expandedUncertainty.hMm, wanted)).toBeLessThan(1e-15);
  });

  it("has the covariance of h and v, worked by hand", () => {
    const readings = [
      { hMm: 1, vMm: 2 },
      { hMm: 3, vMm: 8 },
      { hMm: 5, vMm: 5 },
    ];
    const { mean, covariance, drift } = repeatsOf(readings);
    expect(mean).toEqual({ hMm: 3, vMm: 5 });
    expect(covariance).toEqual({ hhMm2: 4, hvMm2: 3, vvMm2: 9 });
    // h rises by 2 each time without scatter; v by 1.5, residuals −1.5, 3, −1.5
    expect(drift?.h).toEqual({ slopeMm: 2, standardErrorMm: 0, t: null, pValue: 0, significant: true });
    expect(drift?.v.slopeMm).toBe(1.5);
    expect(Math.abs(drift!.v.standardErrorMm - Math.sqrt(13.5 / 2))).toBeLessThan(1e-12);
    expect(drift?.together).toBeNull();
  });

  it("says nothing of drift with two readings, and bounds no vector by them", () => {
    const { drift, expandedUncertainty, autocorrelation, farthest } = repeatsOf(inBoth([1, 2]));
    expect(drift).toBeNull();
    expect(expandedUncertainty).toMatchObject({ radialMm: null, kRadial: null });
    expect(autocorrelation).toEqual({ h: null, v: null });
    expect(farthest).toEqual({ h: null, v: null });
    expect(() => repeatsOf(inBoth([1]))).toThrow(expect.objectContaining({ code: "too_few_points" }));
  });

  it("calls readings that are one number flat, whatever the number", () => {
    for (const value of [0, 0.1, -7.3, 1e9 + 0.1]) {
      const { flat, covariance, drift, autocorrelation, farthest } = repeatsOf(
        Array.from({ length: 9 }, (_, i) => ({ hMm: value, vMm: i % 3 })),
      );
      expect(flat).toEqual(["h"]);
      expect(covariance).toMatchObject({ hhMm2: 0, hvMm2: 0 });
      expect(drift?.h).toMatchObject({ t: null, pValue: null, significant: false });
      expect(drift?.together).toBeNull();
      expect(autocorrelation.h).toBeNull();
      expect(farthest.h).toBeNull();
    }
  });

  it("tells that a scatter is near the spacing of numbers of that size", () => {
    const random = seededRandom(3);
    const far = Array.from({ length: 12 }, () => ({
      hMm: 1e9 + 1e-6 * random.normal(),
      vMm: random.normal(),
    }));
    expect(repeatsOf(far).atNumberResolution).toEqual(["h"]);
    expect(repeatsOf(far.map(({ vMm }) => ({ hMm: vMm, vMm }))).atNumberResolution).toEqual([]);
  });

  it("sees no drift where all were read at one time", () => {
    expect(repeatsOf(inBoth([1, 2, 4]), 0.95, [7, 7, 7]).drift).toBeNull();
  });

  const vectors = fc.array(
    fc.record({
      hMm: fc.integer({ min: -10_000, max: 10_000 }).map((n) => n / 1e4),
      vMm: fc.integer({ min: -10_000, max: 10_000 }).map((n) => n / 1e4),
    }),
    { minLength: 5, maxLength: 30 },
  );
  const spreads = ({ covariance: { hhMm2, hvMm2, vvMm2 } }: Repeats) =>
    hhMm2 > 1e-6 && vvMm2 > 1e-6 && hvMm2 ** 2 < 0.9 * hhMm2 * vvMm2;

  it("turns with the cross-section: covariance as a matrix, drift of both planes not at all", () => {
    fc.assert(
      fc.property(vectors, fc.double({ min: 0, max: 6.28, noNaN: true }), (readings, angle) => {
        const plain = repeatsOf(readings);
        fc.pre(spreads(plain) && plain.drift?.together !== null);
        const [c, s] = [Math.cos(angle), Math.sin(angle)];
        const turned = repeatsOf(
          readings.map(({ hMm, vMm }) => ({ hMm: c * hMm - s * vMm, vMm: s * hMm + c * vMm })),
        );
        const { hhMm2, hvMm2, vvMm2 } = plain.covariance;
        const wanted = c * c * hhMm2 - 2 * c * s * hvMm2 + s * s * vvMm2;
        expect(Math.abs(turned.covariance.hhMm2 - wanted)).toBeLessThan(1e-12);
        expect(turned.expandedUncertainty.radialMm! / plain.expandedUncertainty.radialMm! - 1).toBeLessThan(
          1e-9,
        );
        const [one, other] = [plain.drift!.together, turned.drift!.together!];
        expect(Math.abs(one.square - other.square)).toBeLessThan(1e-7 * (1 + one.square));
      }),
    );
  });

  it("follows a shift of all readings, a change of unit, and time run backwards", () => {
    fc.assert(
      fc.property(vectors, fc.integer({ min: -1000, max: 1000 }), (readings, shift) => {
        const plain = repeatsOf(readings);
        fc.pre(spreads(plain));
        const moved = repeatsOf(readings.map(({ hMm, vMm }) => ({ hMm: hMm + shift, vMm })));
        expect(Math.abs(moved.mean.hMm - plain.mean.hMm - shift)).toBeLessThan(1e-11);
        expect(relative(moved.covariance.hhMm2, plain.covariance.hhMm2)).toBeLessThan(1e-7);
        const scaled = repeatsOf(readings.map(({ hMm, vMm }) => ({ hMm: hMm * 25.4, vMm: vMm * 25.4 })));
        expect(relative(scaled.covariance.vvMm2, plain.covariance.vvMm2 * 25.4 ** 2)).toBeLessThan(1e-11);
        expect(Math.abs(scaled.drift!.h.pValue! - plain.drift!.h.pValue!)).toBeLessThan(1e-9);
        const back = repeatsOf([...readings].reverse());
        expect(Math.abs(back.drift!.h.slopeMm + plain.drift!.h.slopeMm)).toBeLessThan(1e-12);
        expect(Math.abs(back.autocorrelation.v! - plain.autocorrelation.v!)).toBeLessThan(1e-11);
      }),
    );
  });

  it("answers any finite readings with finite numbers", () => {
    const size = fc.double({ min: -1e9, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(fc.record({ hMm: size, vMm: size }), { minLength: 2, maxLength: 40 }),
        fc.double({ min: 0.501, max: 0.999, noNaN: true }),
        (readings, level) => {
          const text = JSON.stringify(repeatsOf(readings, level), (_, value: unknown) =>
            typeof value === "number" && !Number.isFinite(value) ? "not finite" : value,
          );
          expect(text).not.toContain("not finite");
        },
      ),
    );
  });

  it("raises as many false alarms of drift as its level says, in drawings with a fixed seed", () => {
    const random = seededRandom(29);
    const draws = 6_000;
    let inH = 0;
    let together = 0;
    for (let draw = 0; draw < draws; draw += 1) {
      const { drift } = repeatsOf(
        Array.from({ length: 7 }, () => {
          const hMm = random.normal();
          return { hMm, vMm: 0.8 * hMm + 0.1 * random.normal() };
        }),
      );
      if (drift?.h.significant) inH += 1;
      if (drift?.together?.significant) together += 1;
    }
    // Three standard errors of a share of 0.05.
    const allowed = 3 * Math.sqrt((0.05 * 0.95) / draws);
    expect(Math.abs(inH / draws - 0.05)).toBeLessThan(allowed);
    expect(Math.abs(together / draws - 0.05)).toBeLessThan(allowed);
  });
});
