import { assertFinite } from "../compute-error.ts";
import type { PlaneCovariance } from "../plane.ts";
import { chiSquareQuantile } from "../statistics/chi-square.ts";
import { axisCovariance } from "./axis-covariance.ts";
import type { AxisInput } from "./axis-input.ts";
import type { Axis, AxisOptimum, PerPlane, Warning } from "./axis-result.ts";
import type { ErrorSource, Scatter } from "./error-source.ts";
import type { PlaneFits } from "./fit-plane.ts";
import { optimumWarnings } from "./optimum-warnings.ts";

/** Above this quantile the residuals say that the stated uncertainties are too small, or that a station moved. */
const chiSquareLevel = 0.95;

const noRedundancy: Warning = {
  code: "no_redundancy",
  detail: "Two reference stations without covariances: nothing shows how well the axis is known.",
};

const uncertaintyUnknown: Warning = {
  code: "uncertainty_unknown",
  detail:
    "A reference station that sets the axis states no covariance: nothing shows how well the axis is known.",
};

/**
 * The axis as answered: its lines, their covariance, and how well the reference stations agree with it. `sources`
 * are those of the reference stations, null when their errors cannot be known.
 * @throws ComputeError result_overflow
 */
export function describeAxis(
  { method, reference }: AxisInput,
  fits: PlaneFits,
  scatter: Scatter | null,
  sources: readonly ErrorSource[] | null,
  optimum: AxisOptimum | null,
): Axis {
  const dof = method === "least_squares" && reference.length > 2 ? reference.length - 2 : null;
  const chiSquare = dof !== null && sources && !scatter ? chiSquareOf(fits, reference, sources) : null;
  const axis = {
    method,
    h: fits.h.line,
    v: fits.v.line,
    covariance: sources && axisCovariance(fits, sources),
    chiSquare,
    scatterMm: scatter?.mm ?? null,
    dof,
    optimum,
    warnings: [
      ...(sources ? [] : [optimum ? uncertaintyUnknown : noRedundancy]),
      ...(optimum ? optimumWarnings(method, optimum, sources !== null) : []),
      ...(chiSquare && dof !== null ? chiSquareWarnings(chiSquare, dof) : []),
    ],
  };
  requireFinite(axis);
  return axis;
}

/** Σ(residual/u)² of the reference stations, in each plane. */
function chiSquareOf(
  fits: PlaneFits,
  reference: readonly number[],
  sources: readonly ErrorSource[],
): PerPlane {
  const of = (deviationsMm: Float64Array, variance: keyof PlaneCovariance) =>
    reference.reduce((sum, index, j) => sum + deviationsMm[index]! ** 2 / sources[j]!.total[variance], 0);
  return { h: of(fits.h.deviationsMm, "hhMm2"), v: of(fits.v.deviationsMm, "vvMm2") };
}

function chiSquareWarnings(chiSquare: PerPlane, dof: number): Warning[] {
  const limit = chiSquareQuantile(chiSquareLevel, dof);
  return (["h", "v"] as const)
    .filter((plane) => chiSquare[plane] > limit)
    .map((plane) => ({
      code: "chi_square_high",
      detail:
        `In ${plane} the reference stations lie farther from the axis than their stated uncertainties allow: ` +
        `chi-square ${chiSquare[plane].toPrecision(4)} passes ${limit.toPrecision(4)}, ` +
        `its 95 % limit at n − 2 = ${dof} degrees of freedom. The uncertainties were not enlarged.`,
    }));
}

function requireFinite({ h, v, covariance, chiSquare, optimum }: Omit<Axis, "warnings">): void {
  const values = [
    h.at0Mm,
    h.slope,
    v.at0Mm,
    v.slope,
    ...(covariance ? [covariance.h, covariance.v, covariance.hv].flat(2) : []),
    ...(chiSquare ? [chiSquare.h, chiSquare.v] : []),
    ...(optimum?.zone === "planes" ? [optimum.h.extentMm, optimum.v.extentMm] : []),
    ...(optimum?.zone === "cylinder" ? [optimum.both.extentMm] : []),
  ];
  for (const value of values) assertFinite(value, "A number of the axis");
}
