import { ComputeError } from "../compute-error.ts";
import { bestTurn, type Points, type Pull } from "./best-turn.ts";

/** A line through two points (`first`, `second`), least in Σ weight·|y − line|. */
export interface AbsoluteLine {
  readonly first: number;
  readonly second: number;
  readonly at0: number;
  readonly slope: number;
  /** Points it passes through. */
  readonly passed: readonly number[];
  /** Σ multiplier = 0, Σ multiplier·z = 0, |multiplier| ≤ weight: weight × sign of y − line where it does not pass. */
  readonly multipliers: Float64Array;
  /** Whether no other line has the same sum. */
  readonly unique: boolean;
}

const noPull: Pull = { at0: 0, slope: 0 };
const turnsMost = 2_000;
const restartsMost = 200;
/** Lines of one least sum that are looked at before one is chosen, and points of each to turn about. */
const equalLinesMost = 64;
const pivotsMost = 16;

/**
 * The line of least Σ weight·|y − line|, exactly. Such a line passes through two points. From one it is turned about
 * to the weighted median of the slopes, then about the point that it meets there, and so on (L. A. Karst, Linear curve
 * fitting using least deviations, JASA 53 (1958) 118, from memory), until neither turn lowers the sum. Where it passes
 * through more than two points that proves nothing yet: the multipliers of those are sought, by the same turns on
 * points lifted off the line as z²; either they exist, and prove the line the best, or a point is found about which a
 * turn still pays.
 *
 * Where several lines have the least sum, the one among those through two points with the least Σ weight·(y − line)²
 * is taken. z within ±1; `passedWithin` is the distance below which a line passes through a point. O(n log n) a turn,
 * some ten turns.
 * @throws ComputeError not_converged
 */
export function leastAbsoluteLine(points: Points, passedWithin: number): AbsoluteLine {
  let pivot = points.y.reduce((least, y, j) => (Math.abs(y) < Math.abs(points.y[least]!) ? j : least), 0);
  for (let restart = 0; restart < restartsMost; restart += 1) {
    const turned = turnToRest(points, pivot, noPull, passedWithin);
    if (!("first" in turned)) break;
    const proved = prove(points, lineThrough(points, turned), passedWithin);
    if ("multipliers" in proved) return chooseAmongEqual(points, proved, passedWithin);
    pivot = proved.pivot;
  }
  throw new ComputeError("not_converged", "The line of least sum could not be settled.");
}

/**
 * The proof for points that all lie on one line, whose multipliers are as if it bent by the least.
 * @throws ComputeError not_converged
 */
export function leastAbsoluteOfStraight(points: Points): AbsoluteLine {
  const line = { at0: 0, slope: 0, first: 0, second: 0 };
  const straight = { ...points, y: new Float64Array(points.y.length) };
  const proved = prove(straight, line, 1);
  if ("multipliers" in proved) return { ...proved, unique: true };
  throw new ComputeError("not_converged", "The line of least sum could not be settled.");
}

type Line = Pick<AbsoluteLine, "at0" | "slope" | "first" | "second">;
type Proved = Omit<AbsoluteLine, "unique">;
interface Pair {
  readonly first: number;
  readonly second: number;
  readonly slope: number;
}

function lineThrough({ z, y }: Points, { first, second, slope }: Pair): Line {
  return { first, second, slope, at0: y[first]! - slope * z[first]! };
}

const remainder = ({ z, y }: Points, { at0, slope }: Line, j: number): number => y[j]! - at0 - slope * z[j]!;

/** Turns about one point, then the next met, until a turn moves the line no farther than `within`. */
function turnToRest(
  points: Points,
  start: number,
  pull: Pull,
  within: number,
): Pair | { readonly pivot: number } {
  const begun = bestTurn(points, start, pull);
  if (begun === null) return { pivot: start };
  let pair = { first: start, second: begun.low.through, slope: begun.low.slope };
  for (let turn = 0; turn < turnsMost; turn += 1) {
    const { first, second, slope } = pair;
    const next = bestTurn(points, second, pull);
    if (next === null) return { pivot: second };
    const { low, high } = next;
    // Over a span of 2, at most: this far the line's ends move.
    if (slope >= low.slope - within / 2 && slope <= high.slope + within / 2) return { first, second, slope };
    const end = slope < low.slope ? low : high;
    pair = { first: second, second: end.through, slope: end.slope };
  }
  throw new ComputeError("not_converged", "The line of least sum did not come to rest.");
}

/** Multipliers for the points that the line passes through, or one of them about which a turn lowers the sum. */
function prove(points: Points, line: Line, passedWithin: number): Proved | { readonly pivot: number } {
  const { z, weight } = points;
  const multipliers = new Float64Array(z.length);
  const passed: number[] = [];
  const pull = { at0: 0, slope: 0 };
  for (let j = 0; j < z.length; j += 1) {
    const left = remainder(points, line, j);
    // Where weights or slopes are far apart, offsets are large, and so is their rounding.
    const rounding =
      8 * Number.EPSILON * (Math.abs(points.y[j]!) + Math.abs(line.at0) + Math.abs(line.slope));
    if (Math.abs(left) <= Math.max(passedWithin, rounding)) {
      passed.push(j);
      continue;
    }
    multipliers[j] = Math.sign(left) * weight[j]!;
    pull.at0 += multipliers[j]!;
    pull.slope += multipliers[j]! * z[j]!;
  }
  const { groups, lifted } = liftPassed(points, passed);
  const turned = turnToRest(lifted, 0, pull, 0);
  if (!("first" in turned)) return { pivot: groups[turned.pivot]![0]! };
  const { first, second } = turned;
  const side = lineThrough(lifted, turned);
  const open = { ...pull };
  const held = lifted.weight.map((heavy, g) =>
    g === first || g === second ? 0 : Math.sign(remainder(lifted, side, g)) * heavy,
  );
  for (const [g, value] of held.entries()) {
    open.at0 += value;
    open.slope += value * lifted.z[g]!;
  }
  held[second] = (open.at0 * lifted.z[first]! - open.slope) / (lifted.z[second]! - lifted.z[first]!);
  held[first] = -open.at0 - held[second];
  for (const [g, members] of groups.entries()) {
    for (const j of members) multipliers[j] = (held[g]! * weight[j]!) / lifted.weight[g]!;
  }
  return { ...line, first: groups[first]![0]!, second: groups[second]![0]!, passed, multipliers };
}

/** Points on the line lifted off it as z², so that no three lie on one line any more; those at one z together. */
function liftPassed({ z, weight }: Points, passed: readonly number[]) {
  const byZ = new Map<number, number[]>();
  for (const j of passed) byZ.set(z[j]!, [...(byZ.get(z[j]!) ?? []), j]);
  const groups = [...byZ.values()].sort((a, b) => z[a[0]!]! - z[b[0]!]!);
  const at = Float64Array.from(groups, ([j]) => z[j!]!);
  const lifted: Points = {
    z: at,
    y: at.map((along) => along * along),
    weight: Float64Array.from(groups, (members) => members.reduce((sum, j) => sum + weight[j]!, 0)),
  };
  return { groups, lifted };
}

/** Of the lines through two points with the same least sum, the one whose squares are least. */
function chooseAmongEqual(points: Points, found: Proved, passedWithin: number): AbsoluteLine {
  const equal = [found];
  for (const line of equal) {
    for (const pivot of line.passed.slice(0, pivotsMost)) {
      const turn = bestTurn(points, pivot, noPull);
      for (const end of turn ? [turn.low, turn.high] : []) {
        const other = lineThrough(points, { first: pivot, second: end.through, slope: end.slope });
        if (equal.length >= equalLinesMost || equal.some((one) => same(one, other, passedWithin))) continue;
        const proved = prove(points, other, passedWithin);
        if ("multipliers" in proved) equal.push(proved);
      }
    }
  }
  const squares = (line: Line) =>
    points.weight.reduce((sum, weight, j) => sum + weight * remainder(points, line, j) ** 2, 0);
  const sums = equal.map(squares);
  const least = Math.min(...sums);
  const chosen = equal.find((_, index) => sums[index]! <= least * (1 + 1e-12)) ?? found;
  return { ...chosen, unique: equal.length === 1 };
}

function same(one: Line, other: Line, within: number): boolean {
  return [-1, 1].every((z) => Math.abs(one.at0 - other.at0 + z * (one.slope - other.slope)) <= 2 * within);
}
