import type { PlaneCovariance } from "../plane.ts";
import type { AxisInput, AxisStation } from "./axis-input.ts";
import type { PerPlane } from "./axis-result.ts";

/** What one observation (centre − target) may be wrong by, in parts that were found with different degrees of freedom. */
export interface ErrorSource {
  /** Of the measurement, mm². */
  readonly measured: PlaneCovariance;
  /** Null: infinite. */
  readonly dof: number | null;
  /** Whether `measured` is the one scatter estimated from the residuals, the same number at every such station. */
  readonly isScatter: boolean;
  /** Of the target, mm²: taken as known, h and v apart. */
  readonly target: PerPlane;
  /** Both together, mm². */
  readonly total: PlaneCovariance;
}

/** That of an observation without any part in what is asked. */
export const noError: ErrorSource = {
  measured: { hhMm2: 0, hvMm2: 0, vvMm2: 0 },
  dof: null,
  isScatter: false,
  target: { h: 0, v: 0 },
  total: { hhMm2: 0, hvMm2: 0, vvMm2: 0 },
};

/** Standard deviation of one observation in each plane, estimated from the residuals of an unweighted fit. */
export interface Scatter {
  readonly mm: PerPlane;
  readonly dof: number;
}

/**
 * The error of every station's observation; null where nothing is known of it. A stated covariance stands. Where none
 * is, the scatter of an unweighted fit stands for it: at a reference station it holds the target's error already; at
 * another station the target's own uncertainty is added.
 */
export function errorSources(
  { stations, reference }: AxisInput,
  scatter: Scatter | null,
): (ErrorSource | null)[] {
  const isReference = new Set(reference);
  return stations.map((station, index) => {
    const target = targetVariance(station);
    if (station.covariance) return errorSource(station.covariance, station.dof, false, target);
    if (!scatter) return null;
    const measured = { hhMm2: scatter.mm.h ** 2, hvMm2: 0, vvMm2: scatter.mm.v ** 2 };
    return errorSource(measured, scatter.dof, true, isReference.has(index) ? { h: 0, v: 0 } : target);
  });
}

function errorSource(
  measured: PlaneCovariance,
  dof: number | null,
  isScatter: boolean,
  target: PerPlane,
): ErrorSource {
  const { hhMm2, hvMm2, vvMm2 } = measured;
  const total = { hhMm2: hhMm2 + target.h, hvMm2, vvMm2: vvMm2 + target.v };
  return { measured, dof, isScatter, target, total };
}

/** Variance of centre and target together, h and v apart, mm²: what a weight is the inverse of. Null where not stated. */
export function variancesOf(station: AxisStation): PerPlane | null {
  const { covariance } = station;
  if (!covariance) return null;
  const target = targetVariance(station);
  return { h: covariance.hhMm2 + target.h, v: covariance.vvMm2 + target.v };
}

function targetVariance({ targetUncertainty: { hMm, vMm } }: AxisStation): PerPlane {
  return { h: hMm ** 2, v: vMm ** 2 };
}
