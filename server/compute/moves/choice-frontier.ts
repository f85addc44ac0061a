import { sameThicknessMm } from "./shim-changes.ts";
import type { ShimChoice } from "./shim-task.ts";

/** Costs within this share of (1 + the smaller) are equal. */
const equalCostShare = 1e-9;

/** Most that the cost may exceed `least` to count as equal to it. */
export const equalCost = (least: number): number => equalCostShare * (1 + least);

/** The choices that no other beats in cost, pieces and total change at once, among those of about the least cost. */
export class ChoiceFrontier {
  private kept: ShimChoice[] = [];
  private least = Infinity;

  /** `elsewhere`: cost of the component's other planes, to which the rule of equal costs applies as well. */
  constructor(private readonly elsewhere: number) {}

  get found(): boolean {
    return this.kept.length > 0;
  }

  /** Choices that cost more are of no further interest. Twice the rule's width: it is applied to sums, later. */
  get ceiling(): number {
    return this.least + 2 * equalCost(this.least + this.elsewhere);
  }

  get choices(): readonly ShimChoice[] {
    return this.kept;
  }

  add(choice: ShimChoice): void {
    if (choice.cost > this.ceiling || this.kept.some((other) => beatsOrEquals(other, choice))) return;
    this.least = Math.min(this.least, choice.cost);
    this.kept = [
      ...this.kept.filter((other) => other.cost <= this.ceiling && !beatsOrEquals(choice, other)),
      choice,
    ];
  }
}

const beatsOrEquals = (a: ShimChoice, b: ShimChoice): boolean =>
  a.cost <= b.cost && a.handled <= b.handled && a.totalMm <= b.totalMm + sameThicknessMm;

/**
 * One choice per set of planes, all taken together: the least cost; among equal costs the fewest pieces handled, then
 * the least total change, then the first found.
 */
export function bestTogether(sets: readonly (readonly ShimChoice[])[]): ShimChoice[] | null {
  const combined = sets.reduce<ShimChoice[][]>(
    (all, choices) => all.flatMap((before) => choices.map((choice) => [...before, choice])),
    [[]],
  );
  const sumOf = (choices: readonly ShimChoice[], of: "cost" | "handled" | "totalMm") =>
    choices.reduce((sum, choice) => sum + choice[of], 0);
  const least = Math.min(...combined.map((choices) => sumOf(choices, "cost")));
  const [first, ...rest] = combined.filter((choices) => sumOf(choices, "cost") <= least + equalCost(least));
  if (!first) return null;
  return rest.reduce((best, next) => {
    const pieces = sumOf(next, "handled") - sumOf(best, "handled");
    const total = sumOf(next, "totalMm") - sumOf(best, "totalMm");
    return pieces < 0 || (pieces === 0 && total < -sameThicknessMm) ? next : best;
  }, first);
}
