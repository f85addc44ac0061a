import { shareWith, type Choice, type Chosen } from "./choose-readings.ts";

const wholeTurn = 360;
/** Gaps that differ by less than this, degrees, are the same: the place first in the list is begun at. */
const tieDeg = 1e-9;

/**
 * `count` readings spread evenly over all that the places take, round the clock from behind the widest gap between
 * places: a start from which exchanges find what adding one by one misses, above all the even ring.
 */
export function spreadEvenly(choice: Choice, clockDegs: readonly number[], count: number): Chosen {
  const all = orderRound(clockDegs).flatMap((place) =>
    new Array<number>(choice.capacity[place]!).fill(place),
  );
  const added = clockDegs.map(() => 0);
  for (let k = 0; k < count; k++) added[all[Math.floor(((k + 0.5) * all.length) / count)]!]!++;
  return { added, count, share: shareWith(choice, added) };
}

/** The places clockwise, the first behind the widest gap. */
function orderRound(clockDegs: readonly number[]): number[] {
  const turned = (deg: number) => ((deg % wholeTurn) + wholeTurn) % wholeTurn;
  const rising = clockDegs
    .map((_, place) => place)
    .sort((a, b) => turned(clockDegs[a]!) - turned(clockDegs[b]!) || a - b);
  let start = 0;
  let widest = -1;
  for (const [k, place] of rising.entries()) {
    const before = rising.at(k - 1)!;
    const gap = turned(clockDegs[place]! - clockDegs[before]!);
    const same = Math.abs(gap - widest) <= tieDeg;
    if (same ? place < rising[start]! : gap > widest) {
      start = k;
      widest = gap;
    }
  }
  return [...rising.slice(start), ...rising.slice(0, start)];
}
