import { leastAbsoluteLine, leastAbsoluteOfStraight, type AbsoluteLine } from "./least-absolute-line.ts";
import { gainsOfPair, gainsOfParts, type LineOptimum, type LineProblem } from "./line-problem.ts";
import { problemAt, remaindersOf } from "./minimax-problem.ts";
import { effectsOf, pullsAt, pullsOf } from "./radial-sum-pulls.ts";
import { followSmoothedSums, minimiseSum, smoothingAtEnd, type SumProblem } from "./radial-sum.ts";

/** A station this near at the end of the path, in units of its smoothing, is one that the line passes through. */
const passedWithin = 1e3;
/**
 * The line whose sum of weight × distance from the stations is least, in one plane: through two of them at least.
 * @throws ComputeError not_converged
 */
export function leastSumInPlane(problem: LineProblem, zMm: readonly number[]): LineOptimum {
  const [offsets] = problem.offsets as [Float64Array];
  return throughPair(problem, zMm, absoluteLine(problem, offsets), [1]);
}

/**
 * The line in space whose sum of weight × radial distance from the stations is least. Convex: approached by Newton's
 * method on smoothed sums. There the stations that it passes through are told, two of which settle it; with one or
 * none the rest of it is settled by Newton's method on the other stations. Stations that all deviate in one direction
 * are a problem of one plane.
 *
 * Its gains are the derivatives of the line with the passed stations held passed: of two, the line through them; of
 * one or none, from the second derivatives of the sum, where every station counts.
 * @throws ComputeError not_converged, rank_deficient — lines of one sum that nothing tells apart
 */
export function leastRadialSum(problem: LineProblem, zMm: readonly number[]): LineOptimum {
  const [h, v] = problem.offsets as [Float64Array, Float64Array];
  const direction = commonDirection(h, v, problem.resolution);
  if (direction) {
    const projected = h.map((value, j) => value * direction[0] + v[j]! * direction[1]);
    return throughPair(problem, zMm, absoluteLine(problem, projected), direction);
  }
  const level = new Float64Array(h.length).fill(1);
  const whole: SumProblem = { design: [level, problem.along], offsets: [h, v], weights: problem.weights };
  const near = followSmoothedSums(whole);
  const remainders = remaindersOf(whole, near);
  const passed = [...h.keys()].filter(
    (j) => Math.hypot(remainders[0]![j]!, remainders[1]![j]!) <= passedWithin * smoothingAtEnd,
  );
  const byZ = [...passed].sort((a, b) => problem.along[a]! - problem.along[b]!);
  const [first, last] = [byZ[0], byZ.at(-1)];
  if (first === undefined || last === undefined) return smoothSum(problem, whole, near);
  if (problem.along[last]! === problem.along[first]!) return turnedSum(problem, whole, near, passed);
  const turn = (offset: Float64Array) =>
    (offset[last]! - offset[first]!) / (problem.along[last]! - problem.along[first]!);
  const x = whole.offsets.flatMap((offset) => {
    const slope = turn(offset);
    return [offset[first]! - slope * problem.along[first]!, slope];
  });
  return {
    gains: gainsOfPair(problem, zMm, first, last),
    multipliers: pullsAt(whole, x, passed, pullsOf(remainders, problem.weights)),
    setBy: [first, last],
    unique: true,
  };
}

function absoluteLine({ along, weights, straight, resolution }: LineProblem, y: Float64Array): AbsoluteLine {
  const points = { z: along, y, weight: weights };
  return straight ? leastAbsoluteOfStraight(points) : leastAbsoluteLine(points, resolution);
}

function throughPair(
  problem: LineProblem,
  zMm: readonly number[],
  { first, second, multipliers, unique }: AbsoluteLine,
  direction: readonly number[],
): LineOptimum {
  return {
    gains: gainsOfPair(problem, zMm, first, second),
    multipliers: direction.map((part) => multipliers.map((value) => value * part)),
    setBy: [first, second],
    unique,
  };
}

/** Unit vector that all offsets lie along, null when they do not. Offsets of 0 lie along any. */
function commonDirection(h: Float64Array, v: Float64Array, resolution: number): [number, number] | null {
  const farthest = h.reduce(
    (most, value, j) => (Math.hypot(value, v[j]!) > Math.hypot(h[most]!, v[most]!) ? j : most),
    0,
  );
  const length = Math.hypot(h[farthest]!, v[farthest]!);
  if (length === 0) return [1, 0];
  const [alongH, alongV] = [h[farthest]! / length, v[farthest]! / length];
  return h.every((value, j) => Math.abs(value * alongV - v[j]! * alongH) <= resolution)
    ? [alongH, alongV]
    : null;
}

/** The line passes through no station. */
function smoothSum(problem: LineProblem, whole: SumProblem, near: readonly number[]): LineOptimum {
  const x = minimiseSum(whole, near, 0);
  const effects = effectsOf(whole, x);
  return {
    gains: whole.offsets.map((_, a) =>
      whole.offsets.map((__, b) =>
        gainsOfParts(
          problem,
          0,
          [...problem.along.keys()].map((place) => {
            const [share, moment] = effects(place, b).slice(2 * a) as [number, number];
            return { place, share, moment };
          }),
        ),
      ),
    ),
    multipliers: pullsAt(whole, x, [], whole.offsets),
    setBy: [],
    unique: true,
  };
}

/** The line passes through stations at one z, and is turned about them. */
function turnedSum(
  problem: LineProblem,
  whole: SumProblem,
  near: readonly number[],
  passed: readonly number[],
): LineOptimum {
  const pivot = passed[0]!;
  const centreAlong = problem.along[pivot]!;
  const others = [...problem.along.keys()].filter((j) => !passed.includes(j));
  const arms = problem.along.map((z) => z - centreAlong);
  const from = whole.offsets.map((offset) => offset[pivot]!);
  const turning = problemAt(
    {
      design: [arms],
      offsets: whole.offsets.map((offset, d) => offset.map((value) => value - from[d]!)),
      weights: problem.weights,
    },
    others,
  );
  const slopes = minimiseSum(turning, [near[1]!, near[3]!], 0);
  const effects = effectsOf(turning, slopes);
  const x = slopes.flatMap((slope, d) => [from[d]! - slope * centreAlong, slope]);
  const parts = (a: number, b: number) => {
    const moments = others.map((place, c) => ({ place, share: 0, moment: effects(c, b)[a]! }));
    // What moves the pivot moves the other stations the other way, as seen from it.
    const total = moments.reduce((sum, { moment }) => sum + moment, 0);
    return [{ place: pivot, share: a === b ? 1 : 0, moment: -total }, ...moments];
  };
  return {
    gains: whole.offsets.map((_, a) =>
      whole.offsets.map((__, b) => gainsOfParts(problem, centreAlong, parts(a, b))),
    ),
    multipliers: pullsAt(whole, x, passed, pullsOf(remaindersOf(whole, near), problem.weights)),
    setBy: passed,
    unique: true,
  };
}
