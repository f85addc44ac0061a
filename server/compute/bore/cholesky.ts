/**
 * Factor of a symmetric positive definite matrix, lower triangle, row by row, in place of nothing: `factor` is
 * overwritten. Unaffected by the scale of rows and columns, since each pivot is judged against its own diagonal.
 * Returns whether every pivot stays over `pivotMin` × its diagonal; `factor` is of no use otherwise.
 */
export function factorCholesky(
  matrix: Float64Array,
  size: number,
  factor: Float64Array,
  pivotMin: number,
): boolean {
  for (let row = 0; row < size; row++) {
    for (let column = 0; column <= row; column++) {
      let sum = matrix[row * size + column]!;
      for (let k = 0; k < column; k++) sum -= factor[row * size + k]! * factor[column * size + k]!;
      if (column < row) {
        factor[row * size + column] = sum / factor[column * size + column]!;
      } else {
        const diagonal = matrix[row * size + row]!;
        if (!(diagonal > 0 && sum > pivotMin * diagonal)) return false;
        factor[row * size + row] = Math.sqrt(sum);
      }
    }
  }
  return true;
}

/** Solves (L·Lᵀ)·solution = right side for a factor of `factorCholesky`. */
export function solveCholesky(
  factor: Float64Array,
  size: number,
  rightSide: Float64Array,
  solution: Float64Array,
): void {
  for (let row = 0; row < size; row++) {
    let sum = rightSide[row]!;
    for (let k = 0; k < row; k++) sum -= factor[row * size + k]! * solution[k]!;
    solution[row] = sum / factor[row * size + row]!;
  }
  for (let row = size - 1; row >= 0; row--) {
    let sum = solution[row]!;
    for (let k = row + 1; k < size; k++) sum -= factor[k * size + row]! * solution[k]!;
    solution[row] = sum / factor[row * size + row]!;
  }
}

/** (L·Lᵀ)⁻¹ as a full, exactly symmetric matrix. */
export function invertCholesky(factor: Float64Array, size: number): Float64Array {
  const inverse = new Float64Array(size * size);
  const unit = new Float64Array(size);
  const column = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    unit.fill(0);
    unit[j] = 1;
    solveCholesky(factor, size, unit, column);
    for (let i = j; i < size; i++) {
      inverse[i * size + j] = column[i]!;
      inverse[j * size + i] = column[i]!;
    }
  }
  return inverse;
}
