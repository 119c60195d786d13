/**
 * Products of a sparse matrix with dense vectors.
 */
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { SparseMatrix } from './sparse-matrix';

/** result += factor × A x; result has m, x has n entries. */
export function addProduct(
  matrix: SparseMatrix,
  x: ReadonlyFloat64Array,
  factor: number,
  result: Float64Array,
): void {
  const { columnCount, columnStart, rowIndex, value } = matrix;
  for (let column = 0; column < columnCount; column++) {
    const scale = factor * x[column];
    if (scale === 0) continue;
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      result[rowIndex[entry]] += scale * value[entry];
    }
  }
}

/** Column j of A times y (length m). */
export function columnDot(matrix: SparseMatrix, column: number, y: ReadonlyFloat64Array): number {
  const { columnStart, rowIndex, value } = matrix;
  let sum = 0;
  for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
    sum += value[entry] * y[rowIndex[entry]];
  }
  return sum;
}
