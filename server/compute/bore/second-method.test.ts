import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import {
  differencedCovariance,
  gaussNewton,
  gridSearch,
  weightedSquares,
  type OraclePoint,
  type Surface,
} from "../../../tests/support/circle-oracle.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { WallFit } from "./bore-fit.ts";
import type { WallPoint } from "./bore-input.ts";
import { fitBore } from "./fit-bore.ts";

const centre = { hMm: 3.2, vMm: -1.7 };
const radiusMm = 220;

interface Survey {
  readonly what: string;
  readonly count: number;
  readonly overDeg: number;
  readonly scatterMm: number;
  /** Whether the readings are known unlike each other. */
  readonly uneven: boolean;
}

/** Scatter from 0.5 % of the radius, which bends the problem, down to a micrometre. */
const surveys: readonly Survey[] = [
  { what: "a full ring", count: 24, overDeg: 360, scatterMm: 0.02, uneven: false },
  {
    what: "a lower half, readings known unlike each other",
    count: 17,
    overDeg: 180,
    scatterMm: 0.05,
    uneven: true,
  },
  { what: "a quarter that is badly out of round", count: 12, overDeg: 90, scatterMm: 1.1, uneven: false },
  { what: "40 degrees", count: 9, overDeg: 40, scatterMm: 0.004, uneven: true },
  { what: "15 degrees", count: 30, overDeg: 15, scatterMm: 0.001, uneven: false },
];

/** Points at several planes of a bore that opens and leans, with scatter. */
function readWall({ count, overDeg, scatterMm, uneven }: Survey, surface: Surface): WallPoint[] {
  const random = seededRandom(count);
  return clockAngles(count, 140, overDeg).map((clockDeg, i) => {
    const zMm = [-90, 60, 150][i % 3]!;
    const opening = surface === "taper" ? 0.12 * zMm : 0;
    const lean = surface === "tilt" ? { hMm: 0.004 * zMm, vMm: -0.007 * zMm } : { hMm: 0, vMm: 0 };
    const at = { hMm: centre.hMm + lean.hMm, vMm: centre.vMm + lean.vMm };
    const uMm = scatterMm * (uneven ? 0.5 + 2 * random.uniform() : 1);
    const off = opening + uMm * random.normal();
    return { ...onRing(at, radiusMm, clockDeg, off), zMm: surface === "circle" ? null : zMm, uMm };
  });
}

const asSeen = ({ hMm, vMm, zMm, uMm }: WallPoint): OraclePoint => ({ h: hMm, v: vMm, z: zMm ?? 0, u: uMm! });

function parametersOf({ centre: { hMm, vMm }, diameterMm, taper, tilt }: WallFit): number[] {
  const found = [hMm, vMm, diameterMm! / 2];
  if (taper) return [...found, Math.tan((taper.halfAngleDeg * Math.PI) / 180)];
  return tilt ? [...found, tilt.h, tilt.v] : found;
}

const taperOf = (surface: Surface) => (surface === "taper" ? ({ form: "estimate" } as const) : null);
const surfaces: readonly Surface[] = ["circle", "taper", "tilt"];
const cases = surfaces.flatMap((surface) => surveys.map((survey) => ({ ...survey, surface })));

describe("fitBore beside a second method", () => {
  it.each(cases)("finds the $surface that Gauss–Newton with all unknowns finds: $what", (one) => {
    const points = readWall(one, one.surface);
    const seen = points.map(asSeen);
    const fit = fitBore(pointsInput(points, { taper: taperOf(one.surface) }));
    const found = parametersOf(fit);
    const wanted = gaussNewton(
      one.surface,
      seen,
      [centre.hMm, centre.vMm, radiusMm, 0, 0].slice(0, found.length),
    );
    const covariance = differencedCovariance(one.surface, seen, wanted);
    // Both stop at rounding: far inside what the readings themselves leave open.
    wanted.forEach((value, k) => {
      expect(Math.abs(found[k]! - value)).toBeLessThan(1e-6 * Math.sqrt(covariance[k]![k]!));
    });
    const chiSquare = weightedSquares(one.surface, seen, wanted);
    expect(Math.abs(fit.statistics.chiSquare! / chiSquare - 1)).toBeLessThan(1e-9);
  });

  it.each(cases)("has (JᵀWJ)⁻¹·F of a differenced Jacobian for covariance, $surface over $what", (one) => {
    const points = readWall(one, one.surface);
    const fit = fitBore(pointsInput(points, { taper: taperOf(one.surface) }));
    const scale = fit.statistics.varianceInflation!;
    const wanted = differencedCovariance(one.surface, points.map(asSeen), parametersOf(fit)).map((row) =>
      row.map((entry) => entry * scale),
    );
    const share = (got: number, row: number, column: number) =>
      Math.abs(got - wanted[row]![column]!) / Math.sqrt(wanted[row]![row]! * wanted[column]![column]!);
    const { hhMm2, hvMm2, vvMm2 } = fit.covariance!;
    const { diameterMm, factor } = fit.expandedUncertainty!;
    expect(share(hhMm2, 0, 0)).toBeLessThan(1e-6);
    expect(share(hvMm2, 0, 1)).toBeLessThan(1e-6);
    expect(share(vvMm2, 1, 1)).toBeLessThan(1e-6);
    expect(share((diameterMm! / factor / 2) ** 2, 2, 2)).toBeLessThan(1e-6);
    if (!fit.taper) return;
    const perTangent = Math.cos((fit.taper.halfAngleDeg * Math.PI) / 180) ** 2 * (180 / Math.PI);
    const ofTangent = (fit.taper.expandedUncertaintyDeg! / factor / perTangent) ** 2;
    expect(share(ofTangent, 3, 3)).toBeLessThan(1e-6);
  });

  it.each(surveys)("finds nothing better by brute force on a grid: $what", (survey) => {
    const points = readWall(survey, "circle");
    const fit = fitBore(pointsInput(points));
    const best = gridSearch(points.map(asSeen), [0, 0], radiusMm);
    const { chiSquare } = fit.statistics;
    expect(chiSquare!).toBeLessThan(best.squares * (1 + 1e-9));
    // The grid comes near: that it looks in the right place, and that the comparison can fail, is shown by this.
    expect(best.squares).toBeLessThan(chiSquare! * 1.001);
  });
});
