import { coverageRanks, numericalTolerance } from "./coverage-interval.ts";

/** What first-order propagation says of a quantity, all in one unit: y, u(y) and U at the level asked for. */
export interface FirstOrder {
  readonly value: number;
  readonly standard: number;
  readonly expanded: number;
}

export interface TrialRules {
  /** Coverage probability, in (0, 1). */
  readonly level: number;
  /** Significant digits of u that are taken to mean something, n_dig of JCGM 101; null: as u itself asks. */
  readonly digits: number | null;
  /** Size of the unit in which those digits are counted, in the unit of the values. */
  readonly unit: number;
  /** Least degrees of freedom among what was drawn; null: infinite. */
  readonly dof: number | null;
  /** What rounding alone can move an end by. */
  readonly rounding: number;
}

interface Ends {
  readonly low: number;
  readonly high: number;
}

/** What the trials say of a quantity, in the unit of their values. */
export interface TrialSummary {
  /** Null where the distribution drawn from has none: at one degree of freedom or less. */
  readonly mean: number | null;
  /** Null where the distribution has none: at two degrees of freedom or less. */
  readonly standard: number | null;
  /** Null where the trials are too few for one. */
  readonly interval: Ends | null;
  readonly tolerance: number;
  /** Significant digits that the tolerance was taken from. */
  readonly digits: number;
  /** d_low and d_high: how far the ends of both intervals lie apart. */
  readonly difference: Ends | null;
  /** How far each end may be off because only so many trials were made, and because some failed; null: any distance. */
  readonly sampling: Ends | null;
  /** Null where `sampling` leaves it open. */
  readonly confirmed: boolean | null;
}

/** Standard deviations of a rank that its end may be off by: 95 % of the time. */
const sampled = 2;

/**
 * Holds y ± U against the trials, as JCGM 101:2008, 8.1 does: confirmed when d_low = |y − U − y_low| and d_high =
 * |y + U − y_high| are both no more than δ. Mean and standard deviation of the trials as in 7.6, their interval as
 * in 7.7, δ as in 7.9.2. Ends found by few trials are themselves uncertain: the rank of either is binomial, and a trial
 * that failed might have fallen anywhere, so each end lies between the values 2·√(r·(1 − r/M)) + failed ranks down and
 * up. The comparison stands only when no place in between would turn it (8.2 asks for as many trials as that). Sorts
 * `values`, the results of the trials that could be computed. O(M log M).
 */
export function confirmInterval(
  values: Float64Array,
  failed: number,
  { value, standard, expanded }: FirstOrder,
  { level, digits, unit, dof, rounding }: TrialRules,
): TrialSummary {
  const moments = momentsOf(values);
  const taken = numericalTolerance(standard, digits, unit);
  const summary = {
    mean: dof !== null && dof <= 1 ? null : moments.mean,
    standard: dof !== null && dof <= 2 ? null : moments.standard,
    ...taken,
  };
  const ranks = coverageRanks(values.length, level);
  if (ranks === null) {
    return { ...summary, interval: null, difference: null, sampling: null, confirmed: null };
  }
  values.sort();
  const interval = { low: values[ranks.low - 1]!, high: values[ranks.high - 1]! };
  const difference = {
    low: Math.abs(value - expanded - interval.low),
    high: Math.abs(value + expanded - interval.high),
  };
  const low = reachOf(values, ranks.low, failed);
  const high = reachOf(values, ranks.high, failed);
  const sampling = Number.isFinite(low) && Number.isFinite(high) ? { low, high } : null;
  const allowed = taken.tolerance + rounding;
  return {
    ...summary,
    interval,
    difference,
    sampling,
    confirmed: sampling && judgeEnds(difference, sampling, allowed),
  };
}

function judgeEnds(difference: Ends, sampling: Ends, allowed: number): boolean | null {
  if (difference.low - sampling.low > allowed || difference.high - sampling.high > allowed) return false;
  return difference.low + sampling.low <= allowed && difference.high + sampling.high <= allowed ? true : null;
}

/** How far the sorted values lie from the one of this rank, as many ranks away as chance and failures can move it. */
function reachOf(sorted: Float64Array, rank: number, failed: number): number {
  const count = sorted.length;
  const ranks = Math.ceil(sampled * Math.sqrt(rank * (1 - rank / count))) + failed;
  if (rank - ranks < 1 || rank + ranks > count) return Infinity;
  const at = sorted[rank - 1]!;
  return Math.max(sorted[rank + ranks - 1]! - at, at - sorted[rank - ranks - 1]!);
}

/** Mean, and standard deviation with M − 1 (JCGM 101:2008, 7.6), by sums about a value near the mean. */
function momentsOf(values: Float64Array): { mean: number | null; standard: number | null } {
  const count = values.length;
  if (count === 0) return { mean: null, standard: null };
  const base = values[0]!;
  let sum = 0;
  for (let i = 0; i < count; i++) sum += values[i]! - base;
  const shift = sum / count;
  let squares = 0;
  for (let i = 0; i < count; i++) squares += (values[i]! - base - shift) ** 2;
  const standard = count < 2 ? null : Math.sqrt(squares / (count - 1));
  return { mean: finiteOrNull(base + shift), standard: finiteOrNull(standard) };
}

/** Squares of wild draws may pass what a number holds: then there is nothing to answer. */
function finiteOrNull(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}
