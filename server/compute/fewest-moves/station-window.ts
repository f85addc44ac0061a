import { expandUncertainty } from "../conformity/expand-uncertainty.ts";
import { findToleranceFaults } from "../conformity/find-tolerance-faults.ts";
import type { PlaneTolerance, Tolerance } from "../conformity/tolerance.ts";
import type { MoveStation, Plane } from "../moves/move-problem.ts";
import type { FewestMovesProblem } from "./fewest-moves-problem.ts";

/** What a deviation may be so that its verdict is `conforms`, with the margin kept free. */
export interface StationWindow {
  /** Inside a circle, or inside a range in each plane: as a tolerance, only narrower. */
  readonly within: Tolerance;
  /** Planes (null: the round tolerance) in which nothing is left. */
  readonly closed: readonly {
    readonly plane: Plane | null;
    readonly uncertaintyMm: number;
    readonly halfWidthMm: number;
  }[];
}

/**
 * The window of a station: |d| + U ≤ T (JCGM 106:2012, clause 8.3) read as |d| ≤ T − U, less the margin, U the expanded
 * uncertainty of the plane or, where the tolerance is round, in the worst direction. A move adds nothing to U, and
 * neither does an axis that is chosen. By the simple rule, and without a covariance, U is 0. Closed where T − U − margin is
 * 0 or less. Null without a tolerance.
 * @throws ComputeError tolerance_invalid, result_overflow
 */
export function windowOf(
  { tolerance, covariance, dof }: MoveStation,
  { rule, level, marginMm }: Pick<FewestMovesProblem, "rule" | "level" | "marginMm">,
): StationWindow | null {
  if (tolerance === null) return null;
  const [fault] = findToleranceFaults(tolerance);
  if (fault) throw fault;
  const expanded = rule === "guarded" && covariance ? expandUncertainty(covariance, dof, level) : null;
  if (tolerance.form === "radial") {
    const uncertaintyMm = expanded?.radialMm ?? 0;
    const { halfWidthMm } = tolerance;
    const left = halfWidthMm - uncertaintyMm - marginMm;
    const closed = left > 0 ? [] : [{ plane: null, uncertaintyMm, halfWidthMm }];
    return { within: { form: "radial", halfWidthMm: left }, closed };
  }
  const sides = [
    { plane: "h" as const, uncertaintyMm: expanded?.hMm ?? 0 },
    { plane: "v" as const, uncertaintyMm: expanded?.vMm ?? 0 },
  ].map(({ plane, uncertaintyMm }) => {
    const { minMm, maxMm } = tolerance[plane];
    const less = uncertaintyMm + marginMm;
    const halfWidthMm = (maxMm - minMm) / 2;
    const range: PlaneTolerance = { minMm: minMm + less, maxMm: maxMm - less };
    return { plane, uncertaintyMm, halfWidthMm, range, isClosed: !(halfWidthMm > less) };
  });
  const [h, v] = sides;
  return {
    within: { form: "planes", h: h!.range, v: v!.range },
    closed: sides
      .filter(({ isClosed }) => isClosed)
      .map(({ plane, uncertaintyMm, halfWidthMm }) => ({ plane, uncertaintyMm, halfWidthMm })),
  };
}
