import { describe, expect, it } from "vitest";
import fc from "fast-check";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import { differencedCovariance } from "../../../tests/support/circle-oracle.ts";
import { worstVarianceMm2 } from "../plane.ts";
import { arcCoverage } from "./arc-coverage.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const origin = { hMm: 0, vMm: 0 };
const uMm = 0.01;
const codes = ({ warnings }: { warnings: readonly { code: string }[] }) => warnings.map(({ code }) => code);
const arc = (count: number, overDeg: number) =>
  fitBore(
    pointsInput(
      clockAngles(count, 77, overDeg).map((t) => onRing(origin, 300, t)),
      { readingUncertaintyMm: uMm },
    ),
  );

describe("the even-ring rule", () => {
  it.each([6, 15, 60])(
    "warns exactly when √λmax of the centre passes 3u√(2/n), %d readings on 30 to 360 degrees",
    (count) => {
      const warned = clockAngles(67, 30, 330).map((overDeg) => {
        const fit = arc(count, overDeg);
        const points = clockAngles(count, 77, overDeg).map((t) => {
          const { hMm, vMm } = onRing(origin, 300, t);
          return { h: hMm, v: vMm, z: 0, u: uMm };
        });
        const [[hh, hv], [, vv]] = differencedCovariance("circle", points, [0, 0, 300]) as [
          [number, number],
          [number, number],
        ];
        // Larger eigenvalue by its characteristic polynomial.
        const trace = hh + vv;
        const largest = trace / 2 + Math.sqrt((trace / 2) ** 2 - (hh * vv - hv * hv));
        const evenRing = uMm * Math.sqrt(2 / count);
        near(fit.statistics.dilution, Math.sqrt(largest) / evenRing, 1e-5 * fit.statistics.dilution);
        const wanted = Math.sqrt(largest) > 3 * evenRing;
        expect(codes(fit).includes("weak_arc")).toBe(wanted);
        return wanted;
      });
      // Both sides of the rule were met: the shortest arc is weak, the full ring is not.
      expect([warned[0], warned.at(-1)]).toEqual([true, false]);
      expect(warned.indexOf(false)).toBe(warned.lastIndexOf(true) + 1);
    },
  );

  it("finds an even full ring to be the measure itself, however many readings it has", () => {
    for (const count of [3, 4, 24, 101]) {
      const fit = arc(count, 360);
      near(fit.statistics.dilution, 1, 1e-9);
      near(worstVarianceMm2(fit.covariance!), (2 / count) * uMm ** 2, 1e-12);
    }
  });

  it("does not hang on what the uncertainty is, nor on whether it is stated", () => {
    const points = clockAngles(20, 0, 70).map((t, i) => onRing(origin, 300, t, 0.001 * Math.cos(3 * i)));
    const dilutions = [null, 1e-6, 10].map(
      (u) => fitBore(pointsInput(points, { readingUncertaintyMm: u })).statistics.dilution,
    );
    near(dilutions[1]!, dilutions[0]!, 1e-9);
    near(dilutions[2]!, dilutions[0]!, 1e-9);
  });
});

describe("arcCoverage", () => {
  /** Largest gap between neighbours of the sorted clock angles, the last and the first among them. */
  function gapBySorting(angles: readonly number[]): number {
    const sorted = angles.map((angle) => ((angle % 360) + 360) % 360).sort((a, b) => a - b);
    return sorted.reduce((most, angle, i) => Math.max(most, (sorted[i + 1] ?? sorted[0]! + 360) - angle), 0);
  }
  const readingsAt = (angles: readonly number[]) => ({
    hMm: Float64Array.from(angles, (t) => onRing(origin, 5, t).hMm),
    vMm: Float64Array.from(angles, (t) => onRing(origin, 5, t).vMm),
    zMm: null,
    uMm: null,
  });

  it("is what sorting the clock angles tells, of the readings in use only", () => {
    const angle = fc.double({ min: -360, max: 360, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(angle, fc.boolean()), { minLength: 1, maxLength: 50 }), (pairs) => {
        const used = pairs.map(([, inUse], i) => inUse || i === 0);
        const { coverageDeg, largestGapDeg } = arcCoverage(readingsAt(pairs.map(([t]) => t)), used, origin);
        near(largestGapDeg, gapBySorting(pairs.filter((_, i) => used[i]).map(([t]) => t)), 1e-9);
        near(coverageDeg + largestGapDeg, 360, 1e-12);
      }),
    );
  });

  it("is the same for readings in order, clockwise or not, from any start, once or twice round, some twice", () => {
    const ordered = fc.record({
      angles: fc.array(fc.double({ min: 0, max: 360, noNaN: true }), { minLength: 1, maxLength: 40 }),
      start: fc.nat(39),
      way: fc.constantFrom("clockwise", "anticlockwise"),
      rounds: fc.constantFrom(1, 2),
      twice: fc.boolean(),
    });
    fc.assert(
      fc.property(ordered, ({ angles, start, way, rounds, twice }) => {
        const once = angles.sort((a, b) => a - b).flatMap((angle) => (twice ? [angle, angle] : [angle]));
        const turned = [...once.slice(start % once.length), ...once.slice(0, start % once.length)];
        const round = way === "clockwise" ? turned : turned.reverse();
        const sent = rounds === 1 ? round : [...round, ...round];
        const used = sent.map((_, i) => i === 0 || i % 5 !== 3);
        const { largestGapDeg } = arcCoverage(readingsAt(sent), used, origin);
        near(largestGapDeg, gapBySorting(sent.filter((_, i) => used[i])), 1e-9);
      }),
      { numRuns: 1000 },
    );
  });

  it("covers a whole turn less one step, and nothing with one reading or all at one angle", () => {
    const cover = (angles: readonly number[]) =>
      arcCoverage(
        readingsAt(angles),
        angles.map(() => true),
        origin,
      ).coverageDeg;
    near(cover(clockAngles(24)), 345, 1e-9);
    near(cover([350, 10]), 20, 1e-9);
    near(cover([0, 90, 180]), 180, 1e-9);
    expect(cover([45])).toBe(0);
    expect(cover([45, 45, 45])).toBe(0);
  });

  it("is seen from the centre answered, not from the origin of the points", () => {
    const far = { hMm: 1e4, vMm: 0 };
    const fit = fitBore(pointsInput(clockAngles(13, 90, 180).map((t) => onRing(far, 300, t))));
    near(fit.arc.coverageDeg, 180, 1e-6);
  });
});
