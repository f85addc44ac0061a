import { assertFinite } from "../compute-error.ts";
import { expandUncertainty } from "../conformity/expand-uncertainty.ts";
import { judge } from "../conformity/judge.ts";
import type { AxisInput } from "./axis-input.ts";
import type { StationDeviation, Warning } from "./axis-result.ts";
import type { PlaneFits } from "./fit-plane.ts";
import type { PropagatedError } from "./propagate-errors.ts";

const uncertaintyUnknown: Warning = {
  code: "uncertainty_unknown",
  detail: "No uncertainty is known for this deviation, so the guarded rule cannot decide.",
};

/**
 * One station's deviation as answered: with what is known of its error (null: nothing), and judged against its
 * tolerance where it has one.
 * @throws ComputeError result_overflow
 */
export function describeStation(
  { stations, level, rule }: AxisInput,
  fits: PlaneFits,
  index: number,
  reference: boolean,
  error: PropagatedError | null,
): StationDeviation {
  const { tolerance } = stations[index]!;
  const deviation = {
    hMm: assertFinite(fits.h.deviationsMm[index]!, "A deviation"),
    vMm: assertFinite(fits.v.deviationsMm[index]!, "A deviation"),
  };
  const covariance = error?.covariance ?? null;
  const dof = error?.dof ?? null;
  if (covariance) {
    for (const value of [covariance.hhMm2, covariance.hvMm2, covariance.vvMm2]) {
      assertFinite(value, "A variance of a deviation");
    }
  }
  const judgement = tolerance && judge({ deviation, covariance, dof, tolerance, level, rule });
  const guardUnknown = judgement !== null && rule === "guarded" && covariance === null;
  return {
    deviation,
    covariance,
    expandedUncertainty:
      judgement?.expandedUncertainty ?? (covariance && expandUncertainty(covariance, dof, level)),
    verdict: judgement?.verdict ?? null,
    ratio: judgement && assertFinite(judgement.ratio, "A share of the tolerance"),
    reference,
    warnings: guardUnknown ? [uncertaintyUnknown] : [],
  };
}
