import type { Choice } from "./choose-readings.ts";
import { demandsOf, formAt, type Demand } from "./demands.ts";
import {
  informationOf,
  isDetermined,
  withReading,
  type Direction,
  type Sums,
  type Symmetric,
} from "./information.ts";

/** The fewest readings that any choice needs, and what proves it. */
export interface LeastCount {
  readonly count: number;
  readonly by: "taken" | "even_ring" | "relaxation";
}

/** Exponents of the smoothed largest variance, each begun where the one before ended. */
const exponents = [2, 8, 32, 128];
const stepsPerExponent = 60;
/** Counts at which the relaxation is solved. */
const roundsMax = 12;
const goldenSteps = 24;
const golden = (Math.sqrt(5) - 1) / 2;
/** A demand met to this share is met: a bound never lies over the truth by rounding. */
const slack = 4e-9;

/**
 * A lower bound of the number of readings to be added, by weak duality. Every demand Σw·(n − t)ᵀ·Z·(n − t) ≥ b of
 * `demandsOf` holds for any choice that meets the limits, at any t, and so does every mean of demands. A mean with
 * weights α is met at the soonest by the readings that give it most, so that their number is a bound whatever Z, t and α
 * are. Good ones come from the continuous relaxation: readings may be taken in part, and the E-optimal design (the
 * larger eigenvalue smoothed by its q-norm, q to 128) is sought by conditional gradients (M. Frank, P. Wolfe (1956)).
 * The even-ring bound Σw ≥ 2/τ (each wall distance adds 1/u² to the trace of the information) is the same with Z = I/2.
 * `floor` is known from those taken; stops at `enough`, which some choice is known to reach. Places × log(places) × some hundreds.
 */
export function leastCount(choice: Choice, middle: Direction, floor: number, enough: number): LeastCount {
  const evenRing = Math.min(enough, evenRingBound(choice, middle));
  let best: LeastCount =
    evenRing > floor ? { count: evenRing, by: "even_ring" } : { count: Math.min(enough, floor), by: "taken" };
  for (let round = 0; round < roundsMax && best.count < enough; round++) {
    const count = Math.min(enough, relaxedBound(choice, best.count));
    if (count <= best.count) break;
    best = { count, by: "relaxation" };
  }
  return best;
}

function evenRingBound(choice: Choice, middle: Direction): number {
  const { form, limits } = choice;
  const demand = (shape: Symmetric, limitMm2: number) => ({ shape, least: 1 / limitMm2, varianceMm2: 1 });
  if (form === "rotating_target") {
    const limit = limits.form === "radial" ? limits.worstMm2 : Math.min(limits.hMm2, limits.vMm2);
    return boundBy(choice, [demand({ xx: 1, xy: 0, yy: 1 }, limit)], [1], middle);
  }
  const [hLimit, vLimit] =
    limits.form === "radial" ? [limits.worstMm2, limits.worstMm2] : [limits.hMm2, limits.vMm2];
  const demands = [demand({ xx: 1, xy: 0, yy: 0 }, hLimit), demand({ xx: 0, xy: 0, yy: 1 }, vLimit)];
  return boundBy(choice, demands, [0.5, 0.5], middle);
}

/** The largest bound that the relaxation to `count` readings in all comes by; `count` itself where none is larger. */
function relaxedBound(choice: Choice, count: number): number {
  const total = choice.capacity.reduce((sum, times) => sum + times, 0);
  const part = Math.min(1, count / total);
  let sums = choice.capacity.reduce(
    (now, times, place) => withReading(now, choice.directions[place]!, choice.weight, part * times),
    choice.base,
  );
  let bound = count;
  for (const q of exponents) {
    for (let step = 0; step < stepsPerExponent; step++) {
      const information = informationOf(sums, choice.form);
      if (!isDetermined(information, sums)) return bound;
      const demands = demandsOf(information, choice.limits, choice.form);
      const weights = weightsOf(demands, q);
      const centre = { x: sums.x / sums.w, y: sums.y / sums.w };
      bound = Math.max(bound, boundBy(choice, demands, weights, centre));
      if (bound > count) return bound;
      const toward = bestVertex(choice, demands, weights, centre, count);
      const next = alongLine(choice, sums, toward, q);
      if (next === sums) break;
      sums = next;
    }
  }
  return bound;
}

/** Derivative of Σ(variance/limit)^q by each demand's left side, but for a common factor. */
function weightsOf(demands: readonly Demand[], q: number): number[] {
  const largest = Math.max(...demands.map(({ least, varianceMm2 }) => least * varianceMm2));
  const scale = Math.max(...demands.map(({ varianceMm2 }) => varianceMm2));
  return demands.map(
    ({ least, varianceMm2 }) => ((least * varianceMm2) / largest) ** q * (varianceMm2 / scale),
  );
}

/** How many readings, those that give most first, the weighted mean of the demands needs; infinite when all do not do. */
function boundBy(
  choice: Choice,
  demands: readonly Demand[],
  weights: readonly number[],
  centre: Direction,
): number {
  const needed = demands.reduce((sum, { least }, k) => sum + weights[k]! * least, 0) * (1 - slack);
  let given = demands.reduce(
    (sum, { shape }, k) => sum + weights[k]! * momentAbout(choice.base, centre, shape),
    0,
  );
  let count = 0;
  for (const { gain, times } of gainsOf(choice, demands, weights, centre)) {
    if (given >= needed) return count;
    if (!(gain > 0)) return Infinity;
    const wanted = Math.min(times, Math.ceil((needed - given) / gain));
    given += wanted * gain;
    count += wanted;
  }
  return given >= needed ? count : Infinity;
}

/** The sums of `count` readings at the places that give most: the corner of all designs that the gradient points to. */
function bestVertex(
  choice: Choice,
  demands: readonly Demand[],
  weights: readonly number[],
  centre: Direction,
  count: number,
): Sums {
  let sums = choice.base;
  let left = count;
  for (const { place, times } of gainsOf(choice, demands, weights, centre)) {
    const taken = Math.min(left, times);
    if (taken <= 0) break;
    sums = withReading(sums, choice.directions[place]!, choice.weight, taken);
    left -= taken;
  }
  return sums;
}

function gainsOf(choice: Choice, demands: readonly Demand[], weights: readonly number[], centre: Direction) {
  return choice.directions
    .map((direction, place) => ({
      place,
      times: choice.capacity[place]!,
      gain:
        choice.weight *
        demands.reduce((sum, { shape }, k) => sum + weights[k]! * formAt(shape, direction, centre), 0),
    }))
    .filter(({ times }) => times > 0)
    .sort((one, other) => other.gain - one.gain || one.place - other.place);
}

/** Σw·(n − centre)ᵀ·shape·(n − centre). */
function momentAbout({ w, x, y, xx, xy, yy }: Sums, centre: Direction, shape: Symmetric): number {
  return (
    shape.xx * (xx - 2 * x * centre.x + w * centre.x ** 2) +
    2 * shape.xy * (xy - x * centre.y - y * centre.x + w * centre.x * centre.y) +
    shape.yy * (yy - 2 * y * centre.y + w * centre.y ** 2)
  );
}

/** The point between two designs of the least smoothed variance, by golden section; `from` itself when none is less. */
function alongLine(choice: Choice, from: Sums, to: Sums, q: number): Sums {
  const at = (part: number): Sums => ({
    w: from.w + part * (to.w - from.w),
    x: from.x + part * (to.x - from.x),
    y: from.y + part * (to.y - from.y),
    xx: from.xx + part * (to.xx - from.xx),
    xy: from.xy + part * (to.xy - from.xy),
    yy: from.yy + part * (to.yy - from.yy),
  });
  const valueAt = (part: number) => smoothed(choice, at(part), q);
  let low = 0;
  let high = 1;
  let left = high - golden;
  let right = golden;
  let leftValue = valueAt(left);
  let rightValue = valueAt(right);
  for (let step = 0; step < goldenSteps; step++) {
    if (leftValue <= rightValue) {
      high = right;
      right = left;
      rightValue = leftValue;
      left = high - golden * (high - low);
      leftValue = valueAt(left);
    } else {
      low = left;
      left = right;
      leftValue = rightValue;
      right = low + golden * (high - low);
      rightValue = valueAt(right);
    }
  }
  const part = (low + high) / 2;
  return valueAt(part) < valueAt(0) * (1 - slack) ? at(part) : from;
}

/** Logarithm-free q-norm of variance over limit. */
function smoothed({ form, limits }: Choice, sums: Sums, q: number): number {
  const information = informationOf(sums, form);
  if (!isDetermined(information, sums)) return Infinity;
  const shares = demandsOf(information, limits, form).map(({ least, varianceMm2 }) => least * varianceMm2);
  const largest = Math.max(...shares);
  return largest * shares.reduce((sum, share) => sum + (share / largest) ** q, 0) ** (1 / q);
}
