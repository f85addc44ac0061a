import type { Tolerance } from "../conformity/tolerance.ts";
import { worstVarianceMm2, type PlaneCovariance } from "../plane.ts";

/** Standard deviations that are set against the whole width of a tolerance. */
const spreadOfReadings = 6;

/** Per cent of the tolerance's width: of each plane, or of the worst direction where it is round. */
export type ShareOfTolerance = { readonly h: number; readonly v: number } | { readonly radial: number };

/**
 * How much of a tolerance the scatter of readings takes: 100·6·s/width, width = most − least, or twice the half-width
 * of a round one, s then being the standard deviation in the worst direction. Six standard deviations (AIAG,
 * Measurement Systems Analysis, 4th ed. 2010; the third still had 5.15 beside it, from memory). Variances in mm².
 */
export function shareOfTolerance(
  variances: { readonly hMm2: number; readonly vMm2: number; readonly covariance: PlaneCovariance },
  tolerance: Tolerance,
): ShareOfTolerance {
  const share = (varianceMm2: number, widthMm: number) =>
    (100 * spreadOfReadings * Math.sqrt(varianceMm2)) / widthMm;
  if (tolerance.form === "radial") {
    return { radial: share(worstVarianceMm2(variances.covariance), 2 * tolerance.halfWidthMm) };
  }
  return {
    h: share(variances.hMm2, tolerance.h.maxMm - tolerance.h.minMm),
    v: share(variances.vMm2, tolerance.v.maxMm - tolerance.v.minMm),
  };
}
