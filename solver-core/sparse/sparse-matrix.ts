/**
 * An immutable sparse matrix in compressed columns.
 */
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';

export interface SparseMatrix {
  readonly rowCount: number;
  readonly columnCount: number;
  /** Length columnCount + 1: column j's entries stand at columnStart[j] … columnStart[j + 1] − 1. */
  readonly columnStart: ReadonlyInt32Array;
  /** Row of each entry; within a column ascending, no row twice. */
  readonly rowIndex: ReadonlyInt32Array;
  /** Value of each entry; finite and never 0. */
  readonly value: ReadonlyFloat64Array;
}

/** Number of stored entries. */
export function nonzeroCount(matrix: SparseMatrix): number {
  return matrix.columnStart[matrix.columnCount];
}
