import { radialMm, type PlaneCovariance, type PlaneVector } from "../plane.ts";
import { expandUncertainty, type ExpandedUncertainty } from "./expand-uncertainty.ts";
import { findToleranceFaults } from "./find-tolerance-faults.ts";
import type { PlaneTolerance, Tolerance, Verdict } from "./tolerance.ts";

/** guarded: acceptance held back, and rejection too, by the expanded uncertainty. simple: the deviation alone. */
export type DecisionRule = "guarded" | "simple";

export interface JudgeInput {
  readonly deviation: PlaneVector;
  /** Standard covariance of the deviation, mm²; null when it is not known. */
  readonly covariance: PlaneCovariance | null;
  /** Degrees of freedom of the covariance; null: infinite. */
  readonly dof: number | null;
  readonly tolerance: Tolerance;
  /** Coverage probability, between 0 and 1. */
  readonly level: number;
  readonly rule: DecisionRule;
}

export interface Judgement {
  readonly verdict: Verdict;
  /** |d|/T: share of the tolerance used, of the two planes the larger. */
  readonly ratio: number;
  /** Null when the covariance is. */
  readonly expandedUncertainty: ExpandedUncertainty | null;
}

/** A limit that is met to the rounding of its decimal digits is met, whatever unit the digits were in. */
const roundingSlack = 1e-12;

/** One comparison |d| against T with its uncertainty U. */
interface Comparison {
  readonly sizeMm: number;
  readonly limitMm: number;
  readonly uncertaintyMm: number;
  readonly slackMm: number;
}

/**
 * Judges a deviation against its tolerance: guarded acceptance (JCGM 106:2012, clause 8.3; the idea of ISO 14253-1)
 * with the expanded uncertainty U as guard band. `conforms` when |d| + U ≤ T, `exceeds` when |d| − U > T, else
 * `undecided`. A radial tolerance takes U = k₂·√λ; h and v tolerances take U = t·u each, conform when both do, exceed
 * when either does. A one-sided range [min, max] has T its half-width and d measured from its middle. Without a
 * covariance the guarded verdict is `undecided`; the simple rule takes U as 0.
 * @throws ComputeError tolerance_invalid at tolerance/…; result_overflow
 */
export function judge(input: JudgeInput): Judgement {
  const { deviation, covariance, dof, tolerance, level, rule } = input;
  const [fault] = findToleranceFaults(tolerance);
  if (fault) throw fault;
  const expandedUncertainty = covariance && expandUncertainty(covariance, dof, level);
  const guard = rule === "guarded" ? expandedUncertainty : null;
  const comparisons =
    tolerance.form === "radial"
      ? [compareLength(deviation, tolerance.halfWidthMm, guard?.radialMm ?? 0)]
      : [
          comparePlane(deviation.hMm, tolerance.h, guard?.hMm ?? 0),
          comparePlane(deviation.vMm, tolerance.v, guard?.vMm ?? 0),
        ];
  return {
    verdict: rule === "guarded" && guard === null ? "undecided" : verdictOf(comparisons),
    ratio: Math.max(...comparisons.map(({ sizeMm, limitMm }) => sizeMm / limitMm)),
    expandedUncertainty,
  };
}

function compareLength(deviation: PlaneVector, limitMm: number, uncertaintyMm: number): Comparison {
  return { sizeMm: radialMm(deviation), limitMm, uncertaintyMm, slackMm: roundingSlack * limitMm };
}

function comparePlane(valueMm: number, { minMm, maxMm }: PlaneTolerance, uncertaintyMm: number): Comparison {
  const middleMm = (minMm + maxMm) / 2;
  return {
    sizeMm: Math.abs(valueMm - middleMm),
    limitMm: (maxMm - minMm) / 2,
    uncertaintyMm,
    slackMm: roundingSlack * Math.max(Math.abs(minMm), Math.abs(maxMm)),
  };
}

function verdictOf(comparisons: readonly Comparison[]): Verdict {
  if (comparisons.some((c) => c.sizeMm - c.uncertaintyMm > c.limitMm + c.slackMm)) return "exceeds";
  return comparisons.every((c) => c.sizeMm + c.uncertaintyMm <= c.limitMm + c.slackMm)
    ? "conforms"
    : "undecided";
}
