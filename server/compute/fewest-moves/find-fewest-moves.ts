import { chooseCheapest, effortDefault, type Effort } from "./choose-cheapest.ts";
import { describeChoice } from "./describe-choice.ts";
import type { FewestMoves, FewestMovesProblem } from "./fewest-moves-problem.ts";
import { solveHeld } from "./hold-moved.ts";
import { modelOf } from "./machine-model.ts";
import { windowOf } from "./station-window.ts";

/**
 * The axis and the parts to move, together, so that the cost of the parts moved is least and every station conforms: the
 * axis floats within stated limits at the reference stations, each part moved makes any rigid move within its travel,
 * blocked directions and stack limits. A mixed-integer program (moves-program.ts); with the parts held, axis and moves are
 * those of least Σ(|d|/T)² (hold-moved.ts), so that the answer carries no tolerance of the solver. Of choices at one cost
 * the one with the least of that sum; then the least moves; then the parts sent first.
 * Lengths in mm. Ids are unique, every reference to them exists, nothing carries itself, reference stations stand apart.
 * Not possible: told with a set of limits that contradict each other, or the stations whose uncertainty fills their
 * tolerance. Work: at most exponential in the parts, ended by `effort`; then the best found, with its gap.
 * @throws ComputeError tolerance_invalid, result_overflow, not_converged
 */
export function findFewestMoves(problem: FewestMovesProblem, effort: Effort = effortDefault): FewestMoves {
  const uncertain = problem.stations.flatMap((station, k) =>
    (windowOf(station, problem)?.closed ?? []).map((closed) => ({ station: k, ...closed })),
  );
  if (uncertain.length > 0) return { possible: false, why: { cause: "uncertainty", stations: uncertain } };

  const model = modelOf(problem);
  const must = new Set([...model.blocks.keys()].filter((b) => model.blocks[b]!.mustMove));
  const still = solveHeld(model, must);
  if (still.feasible) {
    const search = { method: "none_needed", proved: true, betterBy: 0, cuts: 0, tied: 0 } as const;
    return { possible: true, choice: describeChoice(model, must, still, search) };
  }
  const every = solveHeld(model, new Set(model.blocks.keys()));
  if (!every.feasible) return { possible: false, why: { cause: "contradiction", limits: every.sources } };
  const { moved, best, search } = chooseCheapest(model, must, effort);
  return { possible: true, choice: describeChoice(model, moved, best, search) };
}
