import type { Fault } from "../../shared/error-codes.ts";
import { pointerOf } from "../../shared/pointer.ts";
import { ComputeError } from "../compute/compute-error.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

/** A computation's refusal as a fault at its place of the body. */
export function faultOf(error: ComputeError, base: readonly PropertyKey[]): Fault {
  const { at = [], reached, limit } = error.details;
  return {
    pointer: pointerOf([...base, ...at]),
    code: error.code,
    detail: error.message,
    ...(reached === undefined ? {} : { value: reached }),
    ...(limit === undefined ? {} : { allowed: { max: limit } }),
  };
}

/** What an attempt at every item gave: the results of those that could be computed, the faults of the others. */
export interface Attempt<Result> {
  readonly results: readonly Result[];
  readonly faults: readonly Fault[];
}

/**
 * Runs `compute` for each item and gathers what each refuses, so that one answer names every faulty item. An item
 * refuses with a ComputeError, or with a CalculationRefusal where it has several faults to name.
 */
export function attemptEach<Item, Result>(
  items: readonly Item[],
  base: readonly PropertyKey[],
  compute: (item: Item, index: number) => Result,
): Attempt<Result> {
  const attempts = items.map((item, index) => attempt([...base, index], () => compute(item, index)));
  return {
    results: attempts.flatMap(({ results }) => results),
    faults: attempts.flatMap(({ faults }) => faults),
  };
}

/** Runs `compute` for the part of the body at `at`: its one result, or the faults for which it refuses. */
export function attempt<Result>(at: readonly PropertyKey[], compute: () => Result): Attempt<Result> {
  try {
    return { results: [compute()], faults: [] };
  } catch (error) {
    if (error instanceof CalculationRefusal) return { results: [], faults: [...error.faults] };
    if (error instanceof ComputeError) return { results: [], faults: [faultOf(error, at)] };
    throw error;
  }
}

/**
 * `attemptEach` where all must succeed.
 * @throws CalculationRefusal when any item was refused
 */
export function computeEach<Item, Result>(
  items: readonly Item[],
  base: readonly PropertyKey[],
  compute: (item: Item, index: number) => Result,
): Result[] {
  const { results, faults } = attemptEach(items, base, compute);
  if (faults.length > 0) throw new CalculationRefusal(faults);
  return [...results];
}
