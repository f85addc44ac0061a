import { fillNormals, nextStudentScale } from "../monte-carlo/random-draws.ts";
import type { TrialPlan } from "../monte-carlo/trial-plan.ts";
import { streamOf } from "../monte-carlo/wichmann-hill.ts";
import type { ErrorSource, Scatter } from "./error-source.ts";

/** By trial, what the scatter of each plane is wrong by: it was found once for all stations. */
export interface SharedScatter {
  readonly h: Float64Array;
  readonly v: Float64Array;
}

/** Writes the error of trial t, (h, v) in mm. Asked for every trial once, in order from 0. */
export type ObservationErrors = (trial: number, into: Float64Array) => void;

/** √(ν/w) of each plane's scatter, drawn once a trial (JCGM 101:2008, 6.4.9); null where no scatter is used. */
export function drawScatter({ trials, seed }: TrialPlan, scatter: Scatter | null): SharedScatter | null {
  if (scatter === null) return null;
  const draw = (plane: string) => {
    const stream = streamOf(seed, `scatter ${plane}`);
    return Float64Array.from({ length: trials }, () => nextStudentScale(stream, scatter.dof));
  };
  return { h: draw("h"), v: draw("v") };
}

/**
 * The errors of one station's observation (centre − target) by trial: the measured part from the normal distribution
 * or, with finite degrees of freedom, the multivariate t (JCGM 102:2011, 5.3.2) of its covariance, by its Cholesky
 * factor (JCGM 101:2008, C.5); the target's part normal in h and in v. Asked anew it begins anew, with the same draws.
 */
export function observationErrors(
  { measured, dof, isScatter, target }: ErrorSource,
  name: string,
  { seed }: TrialPlan,
  shared: SharedScatter | null,
): ObservationErrors {
  const stream = streamOf(seed, `station ${name}`);
  const { hhMm2, hvMm2, vvMm2 } = measured;
  const hh = Math.sqrt(hhMm2);
  const vh = hh > 0 ? hvMm2 / hh : 0;
  // A covariance of full correlation leaves a remainder of rounding, which may be below 0.
  const vv = Math.sqrt(Math.max(0, vvMm2 - vh * vh));
  const targetH = Math.sqrt(target.h);
  const targetV = Math.sqrt(target.v);
  const normals = new Float64Array(targetH > 0 || targetV > 0 ? 4 : 2);
  return (trial, into) => {
    const own = isScatter ? 1 : nextStudentScale(stream, dof);
    fillNormals(stream, normals);
    const wideH = isScatter ? (shared?.h[trial] ?? 1) : own;
    const wideV = isScatter ? (shared?.v[trial] ?? 1) : own;
    into[0] = wideH * hh * normals[0]!;
    into[1] = wideV * (vh * normals[0]! + vv * normals[1]!);
    if (normals.length === 2) return;
    into[0] += targetH * normals[2]!;
    into[1] += targetV * normals[3]!;
  };
}
