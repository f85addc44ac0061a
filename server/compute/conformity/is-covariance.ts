import type { PlaneCovariance } from "../plane.ts";

/** A covariance whose correlation passes 1 by no more than its decimals were rounded. */
const correlationSlack = 1e-9;

/** Whether a matrix (mm²) can be a covariance: variances of 0 or more, correlation within plus or minus 1. */
export function isCovariance({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance): boolean {
  const limit = Math.sqrt(hhMm2) * Math.sqrt(vvMm2) * (1 + correlationSlack);
  return hhMm2 >= 0 && vvMm2 >= 0 && Math.abs(hvMm2) <= limit;
}
