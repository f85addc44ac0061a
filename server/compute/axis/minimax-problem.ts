/**
 * Points to come near to: point j lies at (offsets[0][j], …), one number a plane, and x puts it at
 * Σ x[d·k + i]·design[i][j] in plane d, k the number of design columns. The largest weight·distance is to be least.
 */
export interface MinimaxProblem {
  readonly design: readonly Float64Array[];
  readonly offsets: readonly Float64Array[];
  readonly weights: Float64Array;
}

/** Number of unknowns. */
export function unknownsOf({ design, offsets }: MinimaxProblem): number {
  return design.length * offsets.length;
}

/** What x leaves of the offsets, one array for each plane. */
export function remaindersOf({ design, offsets }: MinimaxProblem, x: readonly number[]): Float64Array[] {
  return offsets.map((offset, plane) => {
    const left = Float64Array.from(offset);
    for (const [i, column] of design.entries()) {
      const coefficient = x[plane * design.length + i]!;
      for (let j = 0; j < left.length; j += 1) left[j]! -= coefficient * column[j]!;
    }
    return left;
  });
}

/** (weight × distance)² of each point. */
export function squaresOf({ weights }: MinimaxProblem, remainders: readonly Float64Array[]): Float64Array {
  return weights.map((weight, j) => {
    let square = 0;
    for (const plane of remainders) square += plane[j]! * plane[j]!;
    return weight * weight * square;
  });
}

/** The points at `places` only. */
export function problemAt(
  { design, offsets, weights }: MinimaxProblem,
  places: readonly number[],
): MinimaxProblem {
  const pick = (values: Float64Array) => Float64Array.from(places, (j) => values[j]!);
  return { design: design.map(pick), offsets: offsets.map(pick), weights: pick(weights) };
}
