/**
 * The problem as the simplex loops see it: minimise cost · z subject to [A | −I] z = 0, lower ≤ z ≤ upper.
 *
 * Variables 0 … n − 1 are the columns of A; variable n + i is the logical of row i, whose column is −e_i: it equals
 * the row's activity, has the row's bounds, and its reduced cost is the row's dual value. Immutable.
 */
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { LinearProgram } from '../linear-program/linear-program';
import type { SparseMatrix } from '../sparse/sparse-matrix';
import { transpose } from '../sparse/transpose';

export interface ComputationalForm {
  /** m */
  readonly rowCount: number;
  /** n */
  readonly columnCount: number;
  /** n + m */
  readonly variableCount: number;
  readonly matrix: SparseMatrix;
  /** Aᵀ in compressed columns: A by rows. */
  readonly rowMatrix: SparseMatrix;
  /** Length n + m. */
  readonly lower: ReadonlyFloat64Array;
  readonly upper: ReadonlyFloat64Array;
  /** Length n + m, to be minimised; 0 for logicals. */
  readonly cost: ReadonlyFloat64Array;
}

export function computationalForm(problem: LinearProgram): ComputationalForm {
  const { rowCount: m, columnCount: n } = problem;
  const lower = new Float64Array(n + m);
  const upper = new Float64Array(n + m);
  const cost = new Float64Array(n + m);
  const sign = problem.sense === 'maximise' ? -1 : 1;
  for (let column = 0; column < n; column++) {
    lower[column] = problem.columnLower[column];
    upper[column] = problem.columnUpper[column];
    cost[column] = sign * problem.cost[column];
  }
  for (let row = 0; row < m; row++) {
    lower[n + row] = problem.rowLower[row];
    upper[n + row] = problem.rowUpper[row];
  }
  return {
    rowCount: m,
    columnCount: n,
    variableCount: n + m,
    matrix: problem.matrix,
    rowMatrix: transpose(problem.matrix),
    lower,
    upper,
    cost,
  };
}
