import { ComputeError } from "../compute-error.ts";
import type { CentreProblem, Place } from "./centre-problem.ts";

const roundsMax = 10_000;
/** A point that is out by less is out by rounding. */
const outMin = 2e-15;
/** Angles nearer than this are rounding. */
const sameAngle = 1e-9;

/**
 * Centre of the smallest circle that holds all points: the least max gᵢ(c), which is convex and has one optimum,
 * carried by two or three points. The point farthest out is brought in and the smallest circle of it and those that
 * carried so far is taken, until none is out. The circle grows each time, though by less than rounding where a third
 * point only shifts a diameter across itself: carriers that come again end the rounds with the best centre met. With a
 * taper each point is a disc (K. Fischer, B. Gärtner, The smallest enclosing ball of balls, SoCG 2003). O(n) a round,
 * usually about ten rounds.
 * @throws ComputeError not_converged
 */
export function circumscribedCentre(problem: CentreProblem, member: string): Place {
  const first = farthest(problem, { x: 0, y: 0 }).index;
  let now: Carried = { carriers: [first], centre: placeOfPoint(problem, first), value: -Infinity };
  let best = { centre: now.centre, value: Infinity };
  const met = new Set<string>();
  for (let round = 0; round < roundsMax; round++) {
    const { index, value } = farthest(problem, now.centre);
    if (value < best.value) best = { centre: now.centre, value };
    const key = [...now.carriers].sort((a, b) => a - b).join();
    if (value <= now.value + outMin || now.carriers.includes(index) || met.has(key)) return best.centre;
    met.add(key);
    now = smallestOf(problem, now.carriers, index);
  }
  throw new ComputeError("not_converged", "The smallest circle round the points did not settle.", {
    at: [member],
  });
}

interface Carried {
  readonly carriers: readonly number[];
  readonly centre: Place;
  readonly value: number;
}

/** The smallest circle round the carriers and one point more, which it passes through. */
function smallestOf(problem: CentreProblem, carriers: readonly number[], added: number): Carried {
  const all = [...carriers, added];
  const sets = [
    [added],
    ...carriers.map((one) => [one, added]),
    ...carriers.flatMap((one, k) => carriers.slice(k + 1).map((other) => [one, other, added])),
  ];
  let best: Carried | null = null;
  for (const set of sets) {
    for (const centre of centresThrough(problem, set)) {
      // A circle that three points on one side of its centre carry can shrink, though perhaps by less than rounding.
      if (set.length === 3 && !surrounds(problem, set, centre)) continue;
      const value = Math.max(...all.map((i) => outOf(problem, i, centre)));
      if (best === null || value < best.value) best = { carriers: set, centre, value };
    }
  }
  // A single point is always a candidate.
  return best as Carried;
}

function surrounds({ x, y }: CentreProblem, set: readonly number[], centre: Place): boolean {
  const angles = set.map((i) => Math.atan2(y[i]! - centre.y, x[i]! - centre.x)).sort((a, b) => a - b);
  const [first, second, third] = angles as [number, number, number];
  return Math.max(second - first, third - second, first + 2 * Math.PI - third) <= Math.PI + sameAngle;
}

/** Centres of the circles, smallest for one or two points, that the points touch from inside. */
function centresThrough(problem: CentreProblem, set: readonly number[]): Place[] {
  const [first, second, third] = set as [number, number?, number?];
  const origin = placeOfPoint(problem, first);
  if (second === undefined) return [origin];
  const one = relative(problem, first, second);
  const apart = Math.hypot(one.x, one.y);
  if (third === undefined) {
    // From the first point toward the second, so that both reach equally far.
    const along = (apart - one.added) / 2;
    if (!(along >= 0 && along <= apart)) return [];
    return [{ x: origin.x + (along / apart) * one.x, y: origin.y + (along / apart) * one.y }];
  }
  const other = relative(problem, first, third);
  const determinant = one.x * other.y - one.y * other.x;
  if (determinant === 0) return [];
  // |c| = r and |q − c| = r + e for the two others: c = α + β·r, a quadratic for r.
  const solve = (first: number, second: number): Place => ({
    x: (first * other.y - second * one.y) / determinant,
    y: (one.x * second - other.x * first) / determinant,
  });
  const half = ({ x, y, added }: ReturnType<typeof relative>) => (x * x + y * y - added * added) / 2;
  const alpha = solve(half(one), half(other));
  const beta = solve(-one.added, -other.added);
  const square = alpha.x * alpha.x + alpha.y * alpha.y;
  const mixed = alpha.x * beta.x + alpha.y * beta.y;
  const discriminant = mixed * mixed + (1 - beta.x * beta.x - beta.y * beta.y) * square;
  if (!(discriminant >= 0)) return [];
  // Of the two radii the one that stays with the circumcircle when the taper vanishes: the other has no point inside.
  const r = square / (Math.sqrt(discriminant) - mixed);
  if (!(r > 0 && r + one.added >= 0 && r + other.added >= 0 && Number.isFinite(r))) return [];
  return [{ x: origin.x + alpha.x + beta.x * r, y: origin.y + alpha.y + beta.y * r }];
}

/** A point seen from another, and how much more its taper adds. */
function relative({ x, y, added }: CentreProblem, from: number, to: number) {
  return {
    x: x[to]! - x[from]!,
    y: y[to]! - y[from]!,
    added: added === null ? 0 : added[to]! - added[from]!,
  };
}

function placeOfPoint({ x, y }: CentreProblem, index: number): Place {
  return { x: x[index]!, y: y[index]! };
}

function outOf({ x, y, added }: CentreProblem, index: number, centre: Place): number {
  return Math.hypot(x[index]! - centre.x, y[index]! - centre.y) - (added === null ? 0 : added[index]!);
}

function farthest(problem: CentreProblem, centre: Place): { readonly index: number; readonly value: number } {
  let index = 0;
  let value = -Infinity;
  for (let i = 0; i < problem.count; i++) {
    const out = outOf(problem, i, centre);
    if (out > value) [index, value] = [i, out];
  }
  return { index, value };
}
