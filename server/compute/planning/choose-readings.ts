import { shareOf, suffices, type Limits } from "./demands.ts";
import {
  informationOf,
  isDetermined,
  spreadOf,
  withReading,
  type Direction,
  type Sums,
} from "./information.ts";
import type { PlanForm } from "./plan-input.ts";

/** A better share by less than this is the same: the place that stands first in the list is kept, however it is turned. */
const tie = 1e-9;

/** Where readings can be added, to what, and for what. */
export interface Choice {
  readonly form: PlanForm;
  readonly limits: Limits;
  /** Of the readings taken. */
  readonly base: Sums;
  readonly directions: readonly Direction[];
  /** How many readings each place takes. */
  readonly capacity: readonly number[];
  /** 1/u² of a reading to be added. */
  readonly weight: number;
}

/** Readings added at each place, and their largest variance over its limit. */
export interface Chosen {
  readonly added: readonly number[];
  readonly count: number;
  readonly share: number;
}

/** Whether one is better than another by more than rounding. */
export function isBetter(one: Chosen, other: Chosen): boolean {
  return one.share < other.share * (1 - tie);
}

/** What is left of the pairs that exchanges may weigh: counted down by all of them together. */
export interface Budget {
  left: number;
}

/**
 * Adds the one reading that lowers the largest variance most, again and again, until the limits are met or `countMax`
 * are added; places first in the list win ties. Until the centre is determined at all, that which spreads the readings
 * most. The reduction is exact, not a first-order one: each candidate's covariance is inverted. Places × readings added.
 */
export function addGreedily(choice: Choice, countMax: number): Chosen {
  const added = choice.directions.map(() => 0);
  let sums = choice.base;
  let count = 0;
  let share = shareOfSums(choice, sums);
  while (!suffices(share) && count < countMax) {
    const best = bestPlace(choice, added, sums);
    if (best < 0) break;
    added[best]!++;
    count++;
    sums = sumsWith(choice, added);
    share = shareOfSums(choice, sums);
  }
  return { added, count, share };
}

/**
 * Moves one reading at a time to the place that lowers the largest variance most, until none does (Fedorov's exchange,
 * V. V. Fedorov, Theory of Optimal Experiments (1972), with the larger eigenvalue for the determinant), it suffices
 * where that is all that is `wanted`, or the budget is spent. A local optimum: no single move betters it.
 */
export function exchange(choice: Choice, chosen: Chosen, wanted: "enough" | "best", budget: Budget): Chosen {
  const added = [...chosen.added];
  let { share } = chosen;
  let better = true;
  const isDone = () => budget.left <= 0 || (wanted === "enough" && suffices(share));
  while (better && !isDone()) {
    better = false;
    for (let from = 0; from < added.length && !isDone(); from++) {
      if (added[from] === 0) continue;
      added[from]!--;
      const rest = sumsWith(choice, added);
      budget.left -= added.length;
      const to = bestPlace(choice, added, rest);
      const moved =
        to < 0 ? Infinity : shareOfSums(choice, withReading(rest, choice.directions[to]!, choice.weight));
      if (moved < share * (1 - tie)) {
        added[to]!++;
        share = moved;
        better = true;
      } else added[from]!++;
    }
  }
  return { added, count: chosen.count, share };
}

/** Without the reading that is missed least. */
export function dropOne(choice: Choice, chosen: Chosen): Chosen {
  const all = sumsWith(choice, chosen.added);
  let least = Infinity;
  let dropped = -1;
  for (const [place, times] of chosen.added.entries()) {
    if (times === 0) continue;
    const share = shareOfSums(choice, withReading(all, choice.directions[place]!, choice.weight, -1));
    if (dropped < 0 || share < least * (1 - tie)) {
      least = share;
      dropped = place;
    }
  }
  const added = chosen.added.map((times, place) => (place === dropped ? times - 1 : times));
  return { added, count: chosen.count - 1, share: shareWith(choice, added) };
}

/** All that can be added. */
export function addAll(choice: Choice): Chosen {
  const added = [...choice.capacity];
  const count = added.reduce((sum, times) => sum + times, 0);
  return { added, count, share: shareWith(choice, added) };
}

function bestPlace(choice: Choice, added: readonly number[], sums: Sums): number {
  let best = -1;
  let leastShare = Infinity;
  let widest = -1;
  for (let place = 0; place < added.length; place++) {
    if (added[place]! >= choice.capacity[place]!) continue;
    const next = withReading(sums, choice.directions[place]!, choice.weight);
    const share = shareOfSums(choice, next);
    if (share < leastShare * (1 - tie) || (leastShare === Infinity && share < Infinity)) {
      leastShare = share;
      best = place;
    }
    if (leastShare < Infinity) continue;
    const spread = spreadOf(informationOf(next, choice.form), next);
    if (spread > widest * (1 + tie)) {
      widest = spread;
      best = place;
    }
  }
  return best;
}

/** The share of `added` readings at each place. */
export function shareWith(choice: Choice, added: readonly number[]): number {
  return shareOfSums(choice, sumsWith(choice, added));
}

function shareOfSums({ form, limits }: Choice, sums: Sums): number {
  const information = informationOf(sums, form);
  return isDetermined(information, sums) ? shareOf(information, limits) : Infinity;
}

/** Summed afresh, so that no rounding is carried from move to move. */
function sumsWith({ base, directions, weight }: Choice, added: readonly number[]): Sums {
  return added.reduce(
    (sums, times, place) => (times === 0 ? sums : withReading(sums, directions[place]!, weight, times)),
    base,
  );
}
