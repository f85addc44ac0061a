import type { Fault } from "../../shared/error-codes.ts";
import { ComputeError } from "../compute/compute-error.ts";
import { CalculationRefusal } from "./calculation-kind.ts";

/** RFC 6901 pointer from property names and indices. */
export function pointerOf(path: readonly PropertyKey[]): string {
  return path.map((step) => `/${String(step).replaceAll("~", "~0").replaceAll("/", "~1")}`).join("");
}

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

/**
 * Runs `compute` for each item and gathers what each refuses, so that one answer names every faulty item.
 * The only place beside `runCalculation` and the error exit that catches.
 * @throws CalculationRefusal when any item was refused
 */
export function computeEach<Item, Result>(
  items: readonly Item[],
  base: readonly PropertyKey[],
  compute: (item: Item, index: number) => Result,
): Result[] {
  const faults: Fault[] = [];
  const results = items.flatMap((item, index) => {
    try {
      return [compute(item, index)];
    } catch (error) {
      if (!(error instanceof ComputeError)) throw error;
      faults.push(faultOf(error, [...base, index]));
      return [];
    }
  });
  if (faults.length > 0) throw new CalculationRefusal(faults);
  return results;
}
