import { assertFinite, ComputeError } from "../compute-error.ts";
import type { Limit } from "../moves/quadratic-program.ts";

export type Nearest =
  | {
      readonly feasible: true;
      readonly point: readonly number[];
      /** One for each limit, of half the squared distance, for its row as sent; 0 where it does not bind. */
      readonly multipliers: readonly number[];
    }
  /** Limits that cannot all be met; without any one of them the others can. */
  | { readonly feasible: false; readonly conflict: readonly number[] };

/** A row of length 1 keeps less than this outside the rows that hold already: it depends on them. */
const dependentBelow = 1e-9;
/** Share of the size of a limit's own terms that is rounding. */
const roundingShare = 2e-14;
const negligible = 1e-11;

/**
 * The point within all limits that is nearest to the origin: the dual active-set method of D. Goldfarb and A. Idnani,
 * A numerically stable dual method for solving strictly convex quadratic programs, Mathematical Programming 27 (1983)
 * 1–33, from memory, for the identity as its matrix. The limit most broken comes in as an equation; those whose
 * multiplier would turn negative on the way leave. At the end the point is taken anew, in closed form, from the limits
 * that hold, and the conditions of Karush, Kuhn and Tucker are verified. `slackOf` widens what counts as rounding of a
 * limit. O(limits × size) a step, as a rule as many steps as limits hold at the end.
 * @throws ComputeError not_converged, result_overflow
 */
export function nearestWithin(
  size: number,
  limits: readonly Limit[],
  slackOf: (limit: number) => number = () => 0,
): Nearest {
  const lengths = limits.map(({ row, most }) => {
    assertFinite(most, "A limit");
    return assertFinite(Math.hypot(...row), "The row of a limit");
  });
  const unit = limits.map(({ row, most }, j) => {
    const length = lengths[j]! > 0 ? lengths[j]! : 1;
    return { row: Float64Array.from(row, (value) => value / length), most: most / length };
  });
  const slack = limits.map((_, j) => slackOf(j) / (lengths[j]! > 0 ? lengths[j]! : 1));
  const empty = unit.findIndex(({ most }, j) => lengths[j] === 0 && most < 0 - slack[j]! - Number.MIN_VALUE);
  if (empty >= 0) return { feasible: false, conflict: [empty] };

  const point = new Float64Array(size);
  const active: { readonly limit: number; multiplier: number }[] = [];
  let basis = basisOf([]);
  const stepsMost = 20 * limits.length + 200;
  for (let steps = 0; steps < stepsMost; steps++) {
    const entering = mostBroken(unit, slack, point, active, 1);
    if (entering === null) return settled(size, limits, unit, slack, lengths, active, basis);
    const { row, most } = unit[entering]!;
    let multiplier = 0;
    for (; steps < stepsMost; steps++) {
      const { shares, outside } = split(basis, row);
      const free = dot(outside, outside);
      const excess = dot(row, point) - most;
      const whole = free > dependentBelow ** 2 ? excess / free : Infinity;
      const leaving = firstToLeave(active, shares);
      const step = Math.min(assertOrder(whole), leaving.step);
      if (step === Infinity) {
        const against = active.filter((_, k) => (shares[k] ?? 0) < 0 - dependentBelow);
        return { feasible: false, conflict: [entering, ...against.map(({ limit }) => limit)] };
      }
      active.forEach((each, k) => (each.multiplier -= step * (shares[k] ?? 0)));
      multiplier += step;
      if (whole < Infinity) point.forEach((value, k) => (point[k] = value - step * outside[k]!));
      if (whole <= leaving.step) {
        active.push({ limit: entering, multiplier });
        basis = extended(basis, row);
        break;
      }
      active.splice(leaving.index, 1);
      basis = basisOf(active.map(({ limit }) => unit[limit]!.row));
    }
  }
  throw new ComputeError("not_converged", "The search for the nearest point within the limits did not end.");
}

/** A step that may be endless, and must be a number. */
function assertOrder(step: number): number {
  return step === Infinity ? step : assertFinite(step, "A step towards the nearest point");
}

interface UnitLimit {
  readonly row: Float64Array;
  readonly most: number;
}

/** Orthonormal directions that span the rows in use, and each row as a sum of them (an upper triangle, by columns). */
interface Basis {
  readonly directions: readonly Float64Array[];
  readonly columns: readonly (readonly number[])[];
}

const basisOf = (rows: readonly Float64Array[]): Basis =>
  rows.reduce(extended, { directions: [], columns: [] });

function extended(basis: Basis, row: Float64Array): Basis {
  const { along, outside } = project(basis, row);
  const length = Math.sqrt(dot(outside, outside));
  return {
    directions: [...basis.directions, outside.map((value) => value / length)],
    columns: [...basis.columns, [...along, length]],
  };
}

/** Gram and Schmidt, twice: what the first pass leaves by rounding goes in the second. */
function project({ directions }: Basis, row: Float64Array): { along: number[]; outside: Float64Array } {
  const along = directions.map(() => 0);
  let outside = row;
  for (let pass = 0; pass < 2; pass++) {
    const left = Float64Array.from(outside);
    directions.forEach((direction, k) => {
      const part = dot(direction, left);
      along[k] = along[k]! + part;
      for (let i = 0; i < left.length; i++) left[i] = left[i]! - part * direction[i]!;
    });
    outside = left;
  }
  return { along, outside };
}

/** A row as shares of the rows in use, and what lies outside them. */
function split(basis: Basis, row: Float64Array): { shares: number[]; outside: Float64Array } {
  const { along, outside } = project(basis, row);
  return { shares: solveUpper(basis.columns, along), outside };
}

function solveUpper(columns: readonly (readonly number[])[], right: readonly number[]): number[] {
  const left = [...right];
  const solved = right.map(() => 0);
  for (let k = columns.length - 1; k >= 0; k--) {
    const column = columns[k]!;
    const value = left[k]! / column[k]!;
    solved[k] = value;
    for (let i = 0; i < k; i++) left[i] = left[i]! - value * column[i]!;
  }
  return solved;
}

function firstToLeave(active: readonly { readonly multiplier: number }[], shares: readonly number[]) {
  let first = { step: Infinity, index: -1 };
  for (const [index, { multiplier }] of active.entries()) {
    const share = shares[index] ?? 0;
    const step = Math.max(0, multiplier) / share;
    if (share > negligible && step < first.step) first = { step, index };
  }
  return first;
}

function mostBroken(
  limits: readonly UnitLimit[],
  slack: readonly number[],
  point: Float64Array,
  active: readonly { readonly limit: number }[],
  times: number,
): number | null {
  let worst: { index: number; excess: number } | null = null;
  const reach = Math.sqrt(dot(point, point));
  for (const [index, { row, most }] of limits.entries()) {
    let [value, terms] = [0, reach + Math.abs(most)];
    for (let k = 0; k < point.length; k++) {
      const term = row[k]! * point[k]!;
      value += term;
      terms += Math.abs(term);
    }
    const excess = value - most;
    if (excess <= times * (roundingShare * terms + slack[index]!) || excess <= (worst?.excess ?? 0)) continue;
    if (!active.some(({ limit }) => limit === index)) worst = { index, excess };
  }
  return worst?.index ?? null;
}

/** The point and its multipliers anew from the limits that hold, verified. */
function settled(
  size: number,
  limits: readonly Limit[],
  unit: readonly UnitLimit[],
  slack: readonly number[],
  lengths: readonly number[],
  active: readonly { readonly limit: number }[],
  { directions, columns }: Basis,
): Nearest {
  const amounts: number[] = [];
  for (const [k, column] of columns.entries()) {
    const before = column.slice(0, k).reduce((sum, value, i) => sum + value * amounts[i]!, 0);
    amounts.push((unit[active[k]!.limit]!.most - before) / column[k]!);
  }
  const point = new Float64Array(size);
  directions.forEach((direction, k) => direction.forEach((value, i) => (point[i]! += amounts[k]! * value)));
  const weights = solveUpper(
    columns,
    amounts.map((amount) => 0 - amount),
  );
  const most = Math.max(0, ...weights);
  const broken = mostBroken(unit, slack, point, active, 1_000);
  if (broken !== null || weights.some((weight) => !(weight >= 0 - 1e-8 * most)))
    throw new ComputeError("not_converged", "The nearest point within the limits could not be proved.");
  const multipliers = limits.map(() => 0);
  active.forEach(({ limit }, k) => (multipliers[limit] = Math.max(0, weights[k]!) / lengths[limit]!));
  return { feasible: true, point: [...point], multipliers };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k++) sum += a[k]! * b[k]!;
  return sum;
}
