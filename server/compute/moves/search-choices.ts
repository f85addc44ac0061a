import { dot, narrow, wholeSpace } from "./least-squares-in-order.ts";
import type { SearchBudget } from "./search-budget.ts";

/** Something chosen at one place, and its effect: effects add up over the places. */
interface Option {
  readonly effect: readonly number[];
}

/**
 * Visits every choice of one option per place whose summed effect e has |e|² ≤ bound(), which the visitor may lower as
 * it finds better ones. Depth first, each place's options in the order given. A branch is left when no choice at the
 * places still open can bring |e|² within the bound: their effects lie in the span of `columns`, so the part of the sum
 * outside that span stays (the sphere decoder's bound of U. Fincke and M. Pohst, Mathematics of Computation 44 (1985)
 * 463–471, from memory, in orthogonal projections). Nothing within the bound is missed.
 * @throws ComputeError too_many_choices
 */
export function searchChoices<Choice extends Option>(
  places: readonly {
    readonly options: readonly Choice[];
    readonly columns: readonly (readonly number[])[];
  }[],
  size: number,
  bound: () => number,
  visit: (choices: readonly Choice[]) => void,
  budget: SearchBudget,
): void {
  const staying = places.map((_, depth) =>
    outside(
      places.slice(depth + 1).flatMap(({ columns }) => columns),
      size,
    ),
  );
  const chosen: Choice[] = [];

  const descend = (depth: number, sum: readonly number[]): void => {
    const place = places[depth];
    if (!place) return visit(chosen);
    budget.spend(place.options.length);
    for (const option of place.options) {
      const next = sum.map((value, k) => value + (option.effect[k] ?? 0));
      const least = (staying[depth] ?? []).reduce((total, direction) => total + dot(direction, next) ** 2, 0);
      if (least > bound()) continue;
      chosen.push(option);
      descend(depth + 1, next);
      chosen.pop();
    }
  };
  descend(0, new Array<number>(size).fill(0));
}

/** Orthonormal directions outside the span of `columns`. */
function outside(columns: readonly (readonly number[])[], size: number): readonly (readonly number[])[] {
  return narrow(wholeSpace(size), { rows: columns, targets: columns.map(() => 0) }).free;
}
