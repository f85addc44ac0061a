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

  /**
   * `elsewhere`: cost of the component's other planes, to which the rule of equal costs applies as well. `dearer`: how
   * much more than the least a choice may cost and still be of interest. `counted`: lines of the stock of which a choice
   * that takes fewer is not beaten; `prices`: what a piece of each costs beside.
   */
  constructor(
    private readonly elsewhere: number,
    private readonly dearer = 0,
    private readonly counted: readonly number[] = [],
    private readonly prices: readonly number[] = [],
  ) {}

  get found(): boolean {
    return this.kept.length > 0;
  }

  /** Choices that cost more are of no further interest. Twice the rule's width: it is applied to sums, later. */
  get ceiling(): number {
    return this.least + this.dearer + 2 * equalCost(this.least + this.dearer + this.elsewhere);
  }

  get choices(): readonly ShimChoice[] {
    return this.kept;
  }

  add(choice: ShimChoice): void {
    if (this.priced(choice) > this.ceiling || this.kept.some((other) => this.beatsOrEquals(other, choice)))
      return;
    this.least = Math.min(this.least, this.priced(choice));
    this.kept = [
      ...this.kept.filter(
        (other) => this.priced(other) <= this.ceiling && !this.beatsOrEquals(choice, other),
      ),
      choice,
    ];
  }

  /** Cost with the price of its pieces. */
  priced({ cost, net }: ShimChoice): number {
    return this.prices.reduce((sum, price, k) => sum + price * (net[this.counted[k] ?? -1] ?? 0), cost);
  }

  private beatsOrEquals(a: ShimChoice, b: ShimChoice): boolean {
    if (a.cost > b.cost || a.handled > b.handled || a.totalMm > b.totalMm + sameThicknessMm) return false;
    if (this.counted.some((line) => (a.net[line] ?? 0) > (b.net[line] ?? 0))) return false;
    const clear = a.handled < b.handled || a.totalMm < b.totalMm - sameThicknessMm;
    return clear || stockOrder(a.taken, b.taken) <= 0;
  }
}

/** Below 0 when `a` takes more pieces of the first line of the stock in which they differ. */
export function stockOrder(a: readonly number[], b: readonly number[]): number {
  const line = a.findIndex((count, k) => count !== b[k]);
  return line < 0 ? 0 : (b[line] ?? 0) - (a[line] ?? 0);
}

/**
 * One choice per set of planes, all taken together: the least cost; among equal costs the fewest pieces handled, then
 * the least total change, then stock order, then the first found.
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
    if (pieces !== 0) return pieces < 0 ? next : best;
    if (Math.abs(total) > sameThicknessMm) return total < 0 ? next : best;
    return stockOrder(takenTogether(next), takenTogether(best)) < 0 ? next : best;
  }, first);
}

const takenTogether = (choices: readonly ShimChoice[]): number[] =>
  (choices[0]?.taken ?? []).map((_, line) => choices.reduce((sum, { taken }) => sum + (taken[line] ?? 0), 0));
