/**
 * The sums of the stated problem at a point, computed afresh with compensation: A x, cost − Aᵀ y and the objective.
 * Nothing of the solver's own bookkeeping enters here.
 */
import { CompensatedSum, CompensatedSums } from '../numerics/compensated-sum';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { LinearProgram } from '../linear-program/linear-program';
import type { SparseMatrix } from '../sparse/sparse-matrix';

/** Sums side by side with what they are made of. */
export interface RecomputedSums {
  readonly values: Float64Array;
  /** Magnitude of the largest term of each sum, 0 for a sum without terms. */
  readonly largestTerms: Float64Array;
}

/**
 * A v, length m, for any vector v of length n.
 * @param point length n
 */
export function recomputeRowActivities(matrix: SparseMatrix, point: ReadonlyFloat64Array): RecomputedSums {
  const { columnStart, rowIndex, value, rowCount, columnCount } = matrix;
  const sums = new CompensatedSums(rowCount);
  const largestTerms = new Float64Array(rowCount);
  for (let column = 0; column < columnCount; column++) {
    const amount = point[column];
    // Skipping exact zeros only: NaN is not equal to 0 and must show in the sums.
    if (amount === 0) {
      continue;
    }
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      const row = rowIndex[entry];
      sums.addProduct(row, value[entry], amount);
      largestTerms[row] = Math.max(largestTerms[row], Math.abs(value[entry] * amount));
    }
  }
  return { values: sums.values(), largestTerms };
}

/**
 * cost − Aᵀ y, length n; with `cost` left out, −Aᵀ y.
 * @param rowDuals y, length m
 */
export function recomputeReducedCosts(
  matrix: SparseMatrix,
  rowDuals: ReadonlyFloat64Array,
  cost?: ReadonlyFloat64Array,
): RecomputedSums {
  const { columnStart, rowIndex, value, columnCount } = matrix;
  const values = new Float64Array(columnCount);
  const largestTerms = new Float64Array(columnCount);
  const sum = new CompensatedSum();
  for (let column = 0; column < columnCount; column++) {
    const start = cost === undefined ? 0 : cost[column];
    sum.reset();
    sum.add(start);
    let largest = Math.abs(start);
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      const multiplier = rowDuals[rowIndex[entry]];
      sum.addProduct(-value[entry], multiplier);
      largest = Math.max(largest, Math.abs(value[entry] * multiplier));
    }
    values[column] = sum.value;
    largestTerms[column] = largest;
  }
  return { values, largestTerms };
}

/** cost · x + objectiveConstant, as stated. */
export function recomputeObjective(problem: LinearProgram, x: ReadonlyFloat64Array): number {
  const sum = new CompensatedSum();
  sum.add(problem.objectiveConstant);
  for (let column = 0; column < problem.columnCount; column++) {
    sum.addProduct(problem.cost[column], x[column]);
  }
  return sum.value;
}
