/**
 * The problem as its caller states it; nobody changes it, and the answer is checked against it.
 *
 *   minimise (or maximise)   cost · x + objectiveConstant
 *   subject to               rowLower ≤ A x ≤ rowUpper,   columnLower ≤ x ≤ columnUpper
 *
 * with m rows and n columns. A missing bound is −Infinity or Infinity. rowLower = rowUpper makes an equation,
 * two finite different bounds a ranged row, two infinite bounds a free row (its dual value is 0).
 */
import type { ReadonlyFloat64Array, ReadonlyUint8Array } from '../numerics/typed-array-views';
import type { SparseMatrix } from '../sparse/sparse-matrix';

export type Sense = 'minimise' | 'maximise';

export interface LinearProgram {
  readonly name: string;
  readonly sense: Sense;
  readonly rowCount: number;
  readonly columnCount: number;
  /** A: m rows, n columns. */
  readonly matrix: SparseMatrix;
  /** Length n, as stated (not negated when maximising). */
  readonly cost: ReadonlyFloat64Array;
  readonly objectiveConstant: number;
  /** Lengths m, m, n, n. */
  readonly rowLower: ReadonlyFloat64Array;
  readonly rowUpper: ReadonlyFloat64Array;
  readonly columnLower: ReadonlyFloat64Array;
  readonly columnUpper: ReadonlyFloat64Array;
  /** Length n: 1 where the column must take a whole number, otherwise 0. */
  readonly isInteger: ReadonlyUint8Array;
  /** Lengths m and n; unique within each list. */
  readonly rowNames: readonly string[];
  readonly columnNames: readonly string[];
  /** Name of the objective, for MPS files and messages. */
  readonly objectiveName: string;
}
