import { tabulateComponents } from "../../../../../shared/figures/move-sheet/tabulate-components.ts";
import { tabulatePredicted } from "../../../../../shared/figures/move-sheet/tabulate-predicted.ts";
import { tabulateStacks } from "../../../../../shared/figures/move-sheet/tabulate-stacks.ts";
import { tabulateSteps, tabulateWatch } from "../../../../../shared/figures/move-sheet/tabulate-steps.ts";
import type { ShimMoveResult as Result } from "../../../../../shared/schemas/shim-moves.ts";
import type { MoveCall } from "../../../../../shared/figures/plan-elevation/plan-elevation-of-moves.ts";
import { NumberTable } from "../../../components/ui/number-table.tsx";
import { Remeasure } from "./remeasure.tsx";
import { Unreached } from "./unreached.tsx";

/** The sheet a crew works from: what cannot be reached, before and after, shims, steps in order, what to measure. */
export function MoveSheet({ call, result }: { call: MoveCall; result: Result }) {
  const { units } = call;
  const stacks = tabulateStacks(result, units);
  const watch = tabulateWatch(result, units);
  return (
    <div className="sheet-stack">
      <Unreached components={result.components} />
      <NumberTable table={tabulatePredicted(call, result)} />
      <NumberTable table={tabulateComponents(result, units)} />
      {stacks !== null && <NumberTable table={stacks} />}
      <Search search={result.search} />
      {result.steps.length === 0 ? (
        <p className="text-muted">Nothing has to be moved.</p>
      ) : (
        <div className="sheet-flow">
          {tabulateSteps(result, units).map((table) => (
            <NumberTable key={table.caption} table={table} />
          ))}
        </div>
      )}
      {watch !== null && <NumberTable table={watch} />}
      <Remeasure stations={result.remeasure} />
      <Advice advice={result.advice} />
    </div>
  );
}

const searchWords: Record<NonNullable<Result["search"]>["method"], string> = {
  alone: "each component by itself, the stock being enough for all",
  enumeration: "all components together, for the stock they share",
  mixed_integer_program: "all components together, for the stock they share",
  in_turn: "each component in its turn, from the stock that those before it leave",
};

/** How the shims were chosen, and how sure it is that none would do better. */
function Search({ search }: Pick<Result, "search">) {
  if (!search) return null;
  return (
    <p className="max-w-prose">
      Shims were chosen for {searchWords[search.method]}:{" "}
      {search.proved ? "no better choice exists." : unprovedWords(search.gap)}
    </p>
  );
}

function unprovedWords(gap: number | null): string {
  if (gap === null) return "a better choice may exist.";
  return `a better choice may exist, by ${Number(gap.toPrecision(3))} at most in what is made least.`;
}

function Advice({ advice }: { advice: Result["advice"] }) {
  if (advice.length === 0) return null;
  return (
    <section aria-label="Advice" className="keep-together">
      <h3 className="font-semibold">Advice</h3>
      <ul className="mt-2 grid gap-2">
        {advice.map(({ code, detail }, index) => (
          <li key={index} className="max-w-prose border-l border-rule pl-3">
            {detail} <span className="text-xs text-muted">{code}</span>
          </li>
        ))}
      </ul>
    </section>
  );
}
