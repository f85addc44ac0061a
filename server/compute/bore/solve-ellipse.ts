import { type PlaneCovariance, type PlaneVector } from "../plane.ts";
import { footOnEllipse } from "./ellipse-foot.ts";
import { fitEllipse } from "./ellipse-fit.ts";
import { ellipseParameters, shapeOf, type EllipseParameters } from "./ellipse-model.ts";
import type { LocalFrame } from "./local-frame.ts";
import type { WallReadings } from "./wall-readings.ts";

/** The ellipse through the readings in use, downstream view. */
export interface EllipseSolution {
  readonly centre: PlaneVector;
  /** Semi-axes. */
  readonly majorMm: number;
  readonly minorMm: number;
  /** Major − minor diameter. */
  readonly ovalityMm: number;
  /** Clock direction of the major axis, [0, 180). */
  readonly majorClockDeg: number;
  /** The same anticlockwise from the h axis. */
  readonly axisRad: number;
  readonly cofactors: EllipseCofactors;
  /** Σ(d/u)², or Σd² in mm² where nothing is stated. */
  readonly weightedSquares: number;
  readonly evenRingCofactor: number;
  /** Orthogonal distance from the ellipse, outwards positive, of every reading sent. */
  readonly residualsMm: readonly number[];
  /** Mean semi-axis: what residuals are small beside. */
  readonly radiusMm: number;
  readonly spacingMm: number;
  readonly iterations: number;
}

/** Variances and covariances for F = 1. */
export interface EllipseCofactors {
  readonly centre: PlaneCovariance;
  /** Of the mean diameter. */
  readonly diameterMm2: number;
  /** Of the ovality as a vector: along and across twice the direction of the h axis. */
  readonly ovality: PlaneCovariance;
}

/**
 * Fits the ellipse to the readings that `frame` holds and states it in millimetres. `before`: the ellipse of nearly the
 * same readings, where there is one, to start from.
 * @throws ComputeError rank_deficient, not_converged
 */
export function solveEllipse(
  readings: WallReadings,
  frame: LocalFrame,
  before: EllipseSolution | null,
  member: string,
): EllipseSolution {
  const near = before === null ? null : parametersIn(frame, before);
  const { theta, objective, weightSum, cofactors, iterations } = fitEllipse(frame, near, member);
  const { origin, originRest, scaleMm, unitVarianceMm2 } = frame;
  const { major, minor, axisRad } = shapeOf(theta);
  const at = (row: number, column: number) => cofactors[row * ellipseParameters + column]! * unitVarianceMm2;
  const clockDeg = 90 - (axisRad * 180) / Math.PI;
  const turned = clockDeg < 0 ? clockDeg + 180 : clockDeg;
  return {
    centre: {
      hMm: origin.hMm + (originRest.hMm + scaleMm * theta[0]!),
      vMm: origin.vMm + (originRest.vMm + scaleMm * theta[1]!),
    },
    majorMm: scaleMm * major,
    minorMm: scaleMm * minor,
    ovalityMm: 2 * scaleMm * Math.hypot(theta[2]! - theta[4]!, 2 * theta[3]!),
    majorClockDeg: turned >= 180 ? 0 : turned,
    axisRad,
    cofactors: {
      centre: { hhMm2: at(0, 0), hvMm2: at(0, 1), vvMm2: at(1, 1) },
      // Mean diameter: trace of S. Ovality vector: 2·(S_xx − S_yy), 4·S_xy.
      diameterMm2: at(2, 2) + 2 * at(2, 4) + at(4, 4),
      ovality: {
        hhMm2: 4 * (at(2, 2) - 2 * at(2, 4) + at(4, 4)),
        hvMm2: 8 * (at(2, 3) - at(4, 3)),
        vvMm2: 16 * at(3, 3),
      },
    },
    weightedSquares: (objective * scaleMm * scaleMm) / unitVarianceMm2,
    evenRingCofactor: (2 / weightSum) * unitVarianceMm2,
    residualsMm: residualsOf(readings, frame, theta),
    radiusMm: (scaleMm * (major + minor)) / 2,
    spacingMm: frame.spacingMm,
    iterations,
  };
}

function parametersIn(
  { origin, originRest, scaleMm }: LocalFrame,
  { centre, majorMm, minorMm, axisRad }: EllipseSolution,
): EllipseParameters {
  const mean = (majorMm + minorMm) / 2;
  const along = ((majorMm - minorMm) / 2) * Math.cos(2 * axisRad);
  const across = ((majorMm - minorMm) / 2) * Math.sin(2 * axisRad);
  return Float64Array.of(
    centre.hMm - origin.hMm - originRest.hMm,
    centre.vMm - origin.vMm - originRest.vMm,
    mean + along,
    across,
    mean - along,
  ).map((value) => value / scaleMm);
}

function residualsOf(
  { hMm, vMm }: WallReadings,
  { origin, originRest, scaleMm }: LocalFrame,
  theta: EllipseParameters,
): number[] {
  const { major, minor, axisRad } = shapeOf(theta);
  const cos = Math.cos(axisRad);
  const sin = Math.sin(axisRad);
  const foot = new Float64Array(2);
  return Array.from(hMm, (h, i) => {
    const dx = (h - origin.hMm - originRest.hMm) / scaleMm - theta[0]!;
    const dy = (vMm[i]! - origin.vMm - originRest.vMm) / scaleMm - theta[1]!;
    return scaleMm * footOnEllipse(major, minor, cos * dx + sin * dy, cos * dy - sin * dx, foot);
  });
}
