import { ComputeError } from "../compute-error.ts";
import type { Taper } from "./bore-input.ts";
import { cofactorsOf, type Cofactors } from "./cofactors.ts";
import { fitSurface, type SurfaceFit } from "./fit-surface.ts";
import { localFrameOf, spreadRefusal, type LocalFrame } from "./local-frame.ts";
import { parametersOf, type SurfaceModel } from "./surface-model.ts";
import type { WallReadings } from "./wall-readings.ts";

/** The surface through the readings in use, in the station's plane z = 0. */
export interface WallSolution {
  readonly centre: { readonly hMm: number; readonly vMm: number };
  readonly radiusMm: number;
  readonly tangent: number;
  readonly slope: { readonly h: number; readonly v: number };
  readonly model: SurfaceModel;
  /** (JᵀWJ)⁻¹ with W = 1/u², or W = 1 where nothing is stated: to be multiplied by F. */
  readonly cofactors: Cofactors;
  /** Σ(r/u)², or Σr² in mm² where nothing is stated. */
  readonly weightedSquares: number;
  /** Variance of the centre that an even full ring of these weights would have. */
  readonly evenRingCofactor: number;
  /** Distance from the axis − radius there, of every reading sent. */
  readonly residualsMm: readonly number[];
  /** Spacing of numbers at the largest coordinate in use. */
  readonly spacingMm: number;
  readonly iterations: number;
}

/** Readings in use with a surface that they can determine. */
export interface FittableWall {
  readonly model: SurfaceModel;
  readonly frame: LocalFrame;
}

/** What the readings at `indices` (all when null) can be fitted with, or why with nothing. */
export function modelFor(
  readings: WallReadings,
  taper: Taper | null,
  indices: Int32Array | null,
  member: string,
): FittableWall | ComputeError {
  const count = indices?.length ?? readings.hMm.length;
  if (count === 0) return tooFew(count, 3, member);
  const frame = localFrameOf(readings, indices);
  const model = modelOf(taper, frame);
  const parameters = parametersOf(model);
  if (count < parameters) return tooFew(count, parameters, member);
  if (model.free === "taper" && frame.z === null) {
    const detail = "All points lie in one plane: the taper cannot be told from the diameter.";
    return new ComputeError("rank_deficient", detail, { at: ["taper"] });
  }
  return spreadRefusal(frame, member) ?? { model, frame };
}

/**
 * Fits the surface to the readings that `frame` holds and states it in the plane z = 0 with its cofactors.
 * @throws ComputeError rank_deficient, arc_too_flat, not_converged, radius_not_positive
 */
export function solveWall(
  readings: WallReadings,
  { model, frame }: FittableWall,
  member: string,
): WallSolution {
  const fit = fitSurface(frame, model, member);
  const { theta, meanExcess, weightSum } = fit;
  const { origin, originRest, scaleMm, unitVarianceMm2 } = frame;
  const toPlane = origin.zMm / scaleMm;
  const tangent = model.free === "taper" ? theta[2]! : model.tangent;
  const slope = model.free === "tilt" ? { h: theta[2]!, v: theta[3]! } : { h: 0, v: 0 };
  const localRadius = Math.hypot(theta[0]!, theta[1]!) + meanExcess;
  refuseTip(frame, localRadius, tangent, toPlane);
  return {
    centre: {
      hMm: origin.hMm + (originRest.hMm + scaleMm * (theta[0]! - toPlane * slope.h)),
      vMm: origin.vMm + (originRest.vMm + scaleMm * (theta[1]! - toPlane * slope.v)),
    },
    radiusMm: scaleMm * (localRadius - toPlane * tangent),
    tangent,
    slope,
    model,
    cofactors: cofactorsOf(fit, model, frame, toPlane, member),
    weightedSquares: (fit.objective * scaleMm * scaleMm) / unitVarianceMm2,
    evenRingCofactor: (2 / weightSum) * unitVarianceMm2,
    residualsMm: residualsOf(readings, fit, model, frame),
    spacingMm: frame.spacingMm,
    iterations: fit.iterations,
  };
}

function modelOf(taper: Taper | null, { z }: LocalFrame): SurfaceModel {
  if (taper?.form === "estimate") return { tangent: 0, free: "taper" };
  if (taper?.form === "known") {
    return { tangent: Math.tan((taper.halfAngleDeg * Math.PI) / 180), free: "nothing" };
  }
  return { tangent: 0, free: z === null ? "nothing" : "tilt" };
}

function tooFew(count: number, parameters: number, member: string): ComputeError {
  const detail = `${count} readings cannot determine ${parameters} unknowns.`;
  return new ComputeError("too_few_points", detail, { at: [member] });
}

/**
 * A cone ends at its tip: no wall has a radius of zero or less. Radius and tangent are those of the frame, at its z.
 * @throws ComputeError radius_not_positive
 */
export function refuseTip({ z, count }: LocalFrame, atFrame: number, tangent: number, toPlane: number): void {
  let least = atFrame - toPlane * tangent;
  for (let i = 0; z !== null && i < count; i++) least = Math.min(least, atFrame + z[i]! * tangent);
  if (least > 0) return;
  const detail = "With this taper the radius is not positive in the station's plane or at a reading.";
  throw new ComputeError("radius_not_positive", detail, { at: ["taper"] });
}

/** Distance from the axis − radius there, mm, of every reading, in use or not, in the order sent. */
export function residualsOf(
  { hMm, vMm, zMm }: WallReadings,
  { theta, meanExcess }: Pick<SurfaceFit, "theta" | "meanExcess">,
  { tangent, free }: SurfaceModel,
  { origin, originRest, scaleMm }: LocalFrame,
): number[] {
  const a = theta[0]!;
  const b = theta[1]!;
  const opening = free === "taper" ? theta[2]! : tangent;
  const slopeX = free === "tilt" ? theta[2]! : 0;
  const slopeY = free === "tilt" ? theta[3]! : 0;
  const originDistance = Math.hypot(a, b);
  const residuals = new Array<number>(hMm.length);
  for (let i = 0; i < residuals.length; i++) {
    const z = zMm === null ? 0 : (zMm[i]! - origin.zMm) / scaleMm;
    const px = (hMm[i]! - origin.hMm - originRest.hMm) / scaleMm - slopeX * z;
    const py = (vMm[i]! - origin.vMm - originRest.vMm) / scaleMm - slopeY * z;
    const both = Math.sqrt((px - a) ** 2 + (py - b) ** 2) + originDistance;
    const excess = both > 0 ? (px * (px - 2 * a) + py * (py - 2 * b)) / both : 0;
    residuals[i] = scaleMm * (excess - z * opening - meanExcess);
  }
  return residuals;
}
