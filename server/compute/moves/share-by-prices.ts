import { chooseShims } from "./choose-shims.ts";
import { pickColumns, type Picked } from "./pick-columns.ts";
import type { SearchBudget } from "./search-budget.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";
import { componentsOf, pricesOf, type StockProgram } from "./stock-program.ts";

/** One task, with the stock that could be there for it, and what it is known to be able to do. */
export interface PricedUnit {
  readonly component: number;
  readonly task: ShimTask;
  readonly known: readonly ShimChoice[];
}

export interface PricedPick {
  /** One choice for each unit. */
  readonly chosen: readonly ShimChoice[];
  readonly method: Picked["method"];
  readonly proved: boolean;
  readonly betterBy: number;
}

const roundsMost = 60;
/** Bounds this near, as a share of (1 + cost), are not worth another round. */
const nearEnough = 1e-6;
/** Trials that listing the choices between the bounds may take, as a share of a call's. */
const roundingRoom = 1e-9;

interface Bound {
  readonly value: number;
  readonly prices: readonly (readonly number[])[];
  readonly least: readonly number[];
}

/**
 * Choices of least Σ cost for units that share lines that are short, given that what is known of them already serves all.
 * With a price on every piece of a short line each unit is solved by itself, and Σ of their least (cost + price of the
 * pieces) less the price of the stock is a bound below every choice that keeps it (Lagrange). The prices are the duals of
 * the linear program over the choices known, and every round adds each unit's best at those prices (G. B. Dantzig and
 * P. Wolfe, Operations Research 8 (1960) 101–111, from memory). Then every choice whose priced cost lies within the gap
 * of its unit's least is listed: none but those can be part of anything better than the best pick so far, so that the
 * pick from them is the best there is.
 * @throws ComputeError too_many_choices, not_converged
 */
export function shareByPrices(
  units: readonly PricedUnit[],
  short: readonly number[],
  quantities: readonly number[],
  budget: SearchBudget,
): PricedPick | null {
  const pool = units.map(({ known }) => [...known]);
  const programOf = (choices: readonly (readonly ShimChoice[])[]): StockProgram => ({
    units: units.map(({ component }, u) => ({
      component,
      columns: (choices[u] ?? []).map((choice) => ({
        ...choice,
        net: short.map((line) => choice.net[line] ?? 0),
      })),
    })),
    quantities,
    of: ({ cost }) => cost,
    within: [],
    allowed: () => true,
  });
  let best: Bound | null = null;
  const search = () => {
    for (let round = 0; round < roundsMost; round++) {
      const program = programOf(pool);
      const duals = pricesOf(program);
      if (!duals) return;
      const prices = pricesByUnit(program, duals.byRow);
      const least: number[] = [];
      for (const [u, { task }] of units.entries()) {
        budget.startComponent();
        const own = { ...task, prices: prices[u] ?? [] };
        const { choices, proved } = chooseShims(own, 0, budget);
        if (!proved || choices.length === 0) return;
        least.push(Math.min(...choices.map((choice) => pricedCost(choice, short, prices[u] ?? []))));
        addNew(pool[u] ?? [], choices);
      }
      const paid = duals.byRow.reduce((sum, price, row) => {
        const line = Math.floor(row / componentsOf(program).length);
        return sum + (price === 0 ? 0 : price * (quantities[line] ?? 0));
      }, 0);
      const value = least.reduce((sum, one) => sum + one, 0) - paid;
      if (!best || value > best.value) best = { value, prices, least };
      if (duals.value - best.value <= nearEnough * (1 + duals.value)) return;
    }
  };
  budget.lasts(search, () => true);
  const first = pickColumns(programOf(pool).units, quantities, "least_squares");
  if (!first) return null;
  const chosenOf = (choices: readonly (readonly ShimChoice[])[], { picks }: Picked) =>
    picks.flatMap((pick, u) => choices[u]?.[pick] ?? []);
  const chosen = chosenOf(pool, first);
  const cost = chosen.reduce((sum, choice) => sum + choice.cost, 0);
  const bound: Bound | null = best;
  if (!bound) return { chosen, method: first.method, proved: false, betterBy: cost };
  const gap = Math.max(0, cost - boundValue(bound)) + roundingRoom * (1 + cost);
  const listed: ShimChoice[][] = [];
  let complete = true;
  const list = () => {
    for (const [u, { task }] of units.entries()) {
      budget.startComponent();
      const offer = chooseShims({ ...task, prices: pricesIn(bound, u) }, 0, budget, gap);
      complete &&= offer.proved;
      listed.push([...offer.choices]);
    }
  };
  complete = budget.lasts(list, () => true) && complete;
  if (!complete) return { chosen, method: first.method, proved: false, betterBy: gap };
  const last = pickColumns(programOf(listed).units, quantities, "least_squares");
  if (!last) return { chosen, method: first.method, proved: false, betterBy: gap };
  return {
    chosen: chosenOf(listed, last),
    method: last.method,
    proved: last.proved,
    betterBy: last.proved ? 0 : gap,
  };
}

const boundValue = ({ value }: Bound): number => value;
const pricesIn = ({ prices }: Bound, unit: number): readonly number[] => prices[unit] ?? [];

/** A unit's pieces are held to the numbers after its own component and after every later one. */
function pricesByUnit(program: StockProgram, byRow: readonly number[]): number[][] {
  const components = componentsOf(program);
  return program.units.map(({ component }) => {
    const from = components.indexOf(component);
    return program.quantities.map((_, line) =>
      components.reduce(
        (sum, __, at) => (at < from ? sum : sum + (byRow[line * components.length + at] ?? 0)),
        0,
      ),
    );
  });
}

const pricedCost = (choice: ShimChoice, short: readonly number[], prices: readonly number[]): number =>
  short.reduce((sum, line, k) => sum + (prices[k] ?? 0) * (choice.net[line] ?? 0), choice.cost);

function addNew(pool: ShimChoice[], choices: readonly ShimChoice[]): void {
  const keyOf = ({ cost, handled, totalMm, net }: ShimChoice) => [cost, handled, totalMm, ...net].join(" ");
  const known = new Set(pool.map(keyOf));
  for (const choice of choices) if (!known.has(keyOf(choice))) pool.push(choice);
}
