import type { FewestMovesRequest } from "../../shared/schemas/fewest-moves.ts";
import type { ShimMoveRequest } from "../../shared/schemas/shim-moves.ts";
import type { Converter, Dimension } from "../../shared/units.ts";
import { judge } from "../compute/conformity/judge.ts";
import type { FewestChoice } from "../compute/fewest-moves/fewest-moves-problem.ts";
import { solveMoves } from "../compute/moves/solve-moves.ts";
import { attempt } from "./collect-faults.ts";
import { readMoveProblem } from "./shim-move-input.ts";
import { writeVector } from "./write-plane.ts";

/**
 * The call of shim-moves that follows a choice, all but its shims: stations from the new axis, parts that stay fixed. Its
 * objective is the first with which that call, each part by itself, brings every station inside; absent where neither
 * does. Null where nothing moves.
 */
export function handOver(
  request: FewestMovesRequest,
  choice: FewestChoice,
  convert: Record<Dimension, Converter>,
): ShimMoveRequest | null {
  const moved = new Set(choice.components.filter((each) => each.moved).map(({ id }) => id));
  if (moved.size === 0) return null;
  const body: ShimMoveRequest = {
    units: request.units,
    ...(request.level === undefined ? {} : { level: request.level }),
    stations: request.stations.map((station, k) => ({
      ...station,
      deviation: writeVector(choice.fromNewAxis[k]!, convert.offset),
    })),
    reference: (request.reference ?? []).map(({ id }) => id),
    components: request.components.map(({ cost: _cost, ...component }) =>
      moved.has(component.id) ? component : { ...component, fixed: true },
    ),
  };
  const rule = request.verdict?.rule ?? "guarded";
  const objective = (["least_squares", "minimax"] as const).find((each) =>
    conformsWith({ ...body, objective: each }, rule, convert),
  );
  return objective ? { ...body, objective } : body;
}

function conformsWith(
  body: ShimMoveRequest,
  rule: "guarded" | "simple",
  convert: Record<Dimension, Converter>,
): boolean {
  const problem = readMoveProblem(body, convert);
  const [plan] = attempt([], () => solveMoves(problem)).results;
  if (!plan) return false;
  return problem.stations.every(({ covariance, dof, tolerance }, k) => {
    if (tolerance === null) return true;
    const { deviation } = plan.predicted[k]!;
    const applied = covariance ? rule : "simple";
    return (
      judge({ deviation, covariance, dof, tolerance, level: problem.level, rule: applied }).verdict ===
      "conforms"
    );
  });
}
