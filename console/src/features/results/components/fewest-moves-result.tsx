import {
  tabulateChoice,
  tabulateFewestPredicted,
  tabulateFloat,
} from "../../../../../shared/figures/fewest-moves/tabulate-fewest-moves.ts";
import type {
  FewestMovesRequest,
  FewestMovesResult as Result,
} from "../../../../../shared/schemas/fewest-moves.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Tables } from "./tables.tsx";
import { Warnings } from "./warnings.tsx";

/** Which parts move, from which axis, and what is left; or why no choice does. */
export function FewestMovesResult({ request, result }: { request: FewestMovesRequest; result: Result }) {
  const { infeasible, advice } = result;
  const why = infeasible ? [{ where: null, code: infeasible.cause, detail: infeasible.reason }] : [];
  return (
    <div className="sheet-stack">
      <NumberTable table={tabulateFewestPredicted(request, result)} />
      {!infeasible && <Tables tables={[tabulateChoice(request, result), tabulateFloat(request, result)]} />}
      <Warnings warnings={[...why, ...advice.map((each) => ({ where: null, ...each }))]} />
    </div>
  );
}
