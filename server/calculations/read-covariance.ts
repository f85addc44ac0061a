import type { Converter } from "../../shared/units.ts";
import type { PlaneCovariance } from "../compute/plane.ts";

/** Two numbers of a matrix that were meant equal differ by no more than their decimals were rounded. */
const symmetrySlack = 1e-9;

/** A 2 × 2 covariance as sent, in square millimetres; its two equal places are averaged. */
export function readCovariance(matrix: readonly (readonly number[])[], offset: Converter): PlaneCovariance {
  return {
    hhMm2: offset.squareToMm2(matrix[0]![0]!),
    hvMm2: offset.squareToMm2((matrix[0]![1]! + matrix[1]![0]!) / 2),
    vvMm2: offset.squareToMm2(matrix[1]![1]!),
  };
}

/** Whether the two places that a covariance repeats do agree. */
export function isSymmetric(matrix: readonly (readonly number[])[]): boolean {
  const upper = matrix[0]![1]!;
  const lower = matrix[1]![0]!;
  return Math.abs(upper - lower) <= symmetrySlack * Math.max(Math.abs(upper), Math.abs(lower));
}
