import { dot, narrow, wholeSpace } from "./least-squares-in-order.ts";
import type { SearchBudget } from "./search-budget.ts";

/** Something chosen at one place. Its effect, rise and pushes add up over the places. */
export interface SearchOption {
  readonly effect: readonly number[];
  readonly rise: number;
  readonly pushes: readonly number[];
  /** Cost beside them, 0 when absent: of the pieces of stock that it takes. */
  readonly price?: number;
}

/** What can be chosen at one place. */
export interface SearchPlace<Option extends SearchOption> {
  readonly options: readonly Option[];
  /** Their effects lie in the span of these. */
  readonly columns: readonly (readonly number[])[];
  /** From the options before it: false where an option can be part of no choice that begins with them. */
  readonly allowed: (before: readonly Option[]) => (option: Option) => boolean;
}

/**
 * Visits every choice of one option per place, each allowed beside those before it, whose summed effect e, rise r, price
 * c and pushes p have |e|² + max(0, r) + c ≤ bound() and p ≤ `most`. The visitor may lower the bound as it finds better ones.
 * Depth first, each place's options in the order given. A branch is left when no choice at the places still open can
 * keep these: |e|² is at least that of the part of the sum outside the span of their columns (the sphere decoder's bound
 * of U. Fincke and M. Pohst, Mathematics of Computation 44 (1985) 463–471, from memory, in orthogonal projections),
 * rises and pushes at least their least. Nothing within the bounds is missed.
 * @throws ComputeError too_many_choices
 */
export function searchChoices<Option extends SearchOption>(
  places: readonly SearchPlace<Option>[],
  size: number,
  most: readonly number[],
  bound: () => number,
  visit: (choices: readonly Option[]) => void,
  budget: SearchBudget,
): void {
  const later = places.map((_, depth) => {
    const open = places.slice(depth + 1);
    const leastOf = (value: (option: Option) => number) =>
      open.reduce((sum, { options }) => sum + leastIn(options, value), 0);
    return {
      staying: outside(
        open.flatMap(({ columns }) => columns),
        size,
      ),
      leastRise: leastOf(({ rise }) => rise),
      leastPrice: leastOf(({ price = 0 }) => price),
      leastPushes: most.map((_, t) => leastOf(({ pushes }) => pushes[t] ?? 0)),
    };
  });
  const chosen: Option[] = [];

  const descend = (
    depth: number,
    sum: readonly number[],
    rise: number,
    price: number,
    pushes: readonly number[],
  ): void => {
    const place = places[depth];
    const rest = later[depth];
    if (!place || !rest) return visit(chosen);
    budget.spend(place.options.length);
    const allowed = place.allowed(chosen);
    for (const option of place.options) {
      if (!allowed(option)) continue;
      const pushed = pushes.map((push, t) => push + (option.pushes[t] ?? 0));
      if (pushed.some((push, t) => push + (rest.leastPushes[t] ?? 0) > (most[t] ?? 0))) continue;
      const next = sum.map((value, k) => value + (option.effect[k] ?? 0));
      const risen = rise + option.rise;
      const least = rest.staying.reduce((total, direction) => total + dot(direction, next) ** 2, 0);
      const paid = price + (option.price ?? 0);
      if (least + Math.max(0, risen + rest.leastRise) + paid + rest.leastPrice > bound()) continue;
      chosen.push(option);
      descend(depth + 1, next, risen, paid, pushed);
      chosen.pop();
    }
  };
  const none = most.map(() => 0);
  descend(0, new Array<number>(size).fill(0), 0, 0, none);
}

function leastIn<Option>(options: readonly Option[], value: (option: Option) => number): number {
  return options.reduce((least, option) => Math.min(least, value(option)), Infinity);
}

/** Orthonormal directions outside the span of `columns`. */
function outside(columns: readonly (readonly number[])[], size: number): readonly (readonly number[])[] {
  return narrow(wholeSpace(size), { rows: columns, targets: columns.map(() => 0) }).free;
}
