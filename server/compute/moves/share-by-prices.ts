import { chooseShims } from "./choose-shims.ts";
import { pickColumns, type Picked } from "./pick-columns.ts";
import type { MoveAim } from "./move-problem.ts";
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
  /** Every choice met, unit by unit, and the cost below which none lies. */
  readonly pool: readonly (readonly ShimChoice[])[];
  readonly floor: number;
}

const roundsMost = 60;
/** Choices of one unit that one round adds. */
const newMost = 40;
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
 * `floor`: a cost below which none lies, from what was known before; `keepsRest`: whether choices keep the other lines.
 * @throws ComputeError too_many_choices, not_converged
 */
export function shareByPrices(
  units: readonly PricedUnit[],
  short: readonly number[],
  quantities: readonly number[],
  budget: SearchBudget,
  floor: number,
  keepsRest: (chosen: readonly ShimChoice[]) => boolean,
  aim: MoveAim = "least_squares",
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
      const met = sizeOf(pool);
      for (const [u, { task }] of units.entries()) {
        budget.startComponent();
        const own = { ...task, prices: prices[u] ?? [] };
        const { choices, proved } = chooseShims(own, 0, budget);
        if (choices.length === 0) return;
        const priced = (choice: ShimChoice) => pricedCost(choice, short, prices[u] ?? []);
        // What is not proved the least says nothing of the bound, and can be part of a better pick all the same.
        least.push(proved ? Math.min(...choices.map(priced)) : -Infinity);
        addNew(pool[u] ?? [], choices, priced);
      }
      const paid = duals.byRow.reduce((sum, price, row) => {
        const line = Math.floor(row / componentsOf(program).length);
        return sum + (price === 0 ? 0 : price * (quantities[line] ?? 0));
      }, 0);
      const value = least.reduce((sum, one) => sum + one, 0) - paid;
      if (value > (best?.value ?? -Infinity)) best = { value, prices, least };
      if (best && duals.value - best.value <= nearEnough * (1 + duals.value)) return;
      if (sizeOf(pool) === met) return;
    }
  };
  budget.lasts(search, () => true);
  const first = pickColumns(programOf(pool).units, quantities, "least_squares", undefined, "left");
  if (!first) return null;
  const chosenOf = (choices: readonly (readonly ShimChoice[])[], { picks }: Picked) =>
    picks.flatMap((pick, u) => choices[u]?.[pick] ?? []);
  const cost = chosenOf(pool, first).reduce((sum, choice) => sum + choice.cost, 0);
  const bound: Bound | null = best;
  const least = Math.max(floor, bound ? boundValue(bound) : floor);
  const gap = Math.max(0, cost - least) + roundingRoom * (1 + cost);
  const asFound = (): PricedPick => {
    const ties = pickColumns(programOf(pool).units, quantities, aim) ?? first;
    return {
      chosen: chosenOf(pool, ties),
      method: ties.method,
      proved: false,
      betterBy: gap,
      pool,
      floor: least,
    };
  };
  // What overdraws other lines is not the answer: those are counted next.
  if (!bound || aim !== "least_squares" || !keepsRest(chosenOf(pool, first))) return asFound();
  const listed: ShimChoice[][] = [];
  let complete = true;
  const list = () => {
    for (const [u, { task }] of units.entries()) {
      budget.startComponent();
      const offer = chooseShims({ ...task, prices: pricesIn(bound, u) }, 0, budget, gapOver(bound, cost));
      complete &&= offer.proved;
      listed.push([...offer.choices]);
    }
  };
  complete = budget.lasts(list, () => true) && complete;
  const last = complete ? pickColumns(programOf(listed).units, quantities, "least_squares") : null;
  if (!last) return asFound();
  return {
    chosen: chosenOf(listed, last),
    method: last.method,
    proved: last.proved,
    betterBy: last.proved ? 0 : gap,
    pool,
    floor: least,
  };
}

const gapOver = (bound: Bound, cost: number): number =>
  Math.max(0, cost - boundValue(bound)) + roundingRoom * (1 + cost);
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

const sizeOf = (pool: readonly (readonly ShimChoice[])[]): number =>
  pool.reduce((sum, choices) => sum + choices.length, 0);

/** Adds those that are not there, the cheapest with their prices, then those of fewest pieces, up to so many. */
function addNew(
  pool: ShimChoice[],
  choices: readonly ShimChoice[],
  priced: (choice: ShimChoice) => number,
): void {
  const keyOf = ({ cost, handled, totalMm, net }: ShimChoice) => [cost, handled, totalMm, ...net].join(" ");
  const known = new Set(pool.map(keyOf));
  const inOrder = choices
    .filter((choice) => !known.has(keyOf(choice)))
    .map((choice) => ({ choice, price: Math.round(priced(choice) * 1e9) }))
    .sort((a, b) => a.price - b.price || a.choice.handled - b.choice.handled);
  for (const { choice } of inOrder.slice(0, newMost)) pool.push(choice);
}
