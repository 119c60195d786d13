/**
 * A proved bound on the objective from any row multipliers: what the Lagrangian relaxation is worth at them.
 *
 * Minimising, for every y: cost · x ≥ Σ_j least of d_j x_j over the column's bounds + Σ_i least of y_i r_i over the
 * row's bounds, with d = cost − Aᵀ y; maximising the reverse.
 */
import { CompensatedSum } from '../numerics/compensated-sum';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { LinearProgram } from '../linear-program/linear-program';
import { recomputeReducedCosts } from '../verification/recomputed-sums';

/** undefined where a multiplier stands against a bound that is not there: nothing is proved then. */
export function lagrangianBound(problem: LinearProgram, rowDuals: ReadonlyFloat64Array): number | undefined {
  const sign = problem.sense === 'minimise' ? 1 : -1;
  const reducedCosts = recomputeReducedCosts(problem.matrix, rowDuals, problem.cost).values;
  const sum = new CompensatedSum();
  sum.add(problem.objectiveConstant);
  const take = (multiplier: number, lower: number, upper: number): boolean => {
    if (multiplier === 0) return true;
    const bound = sign * multiplier > 0 ? lower : upper;
    if (!Number.isFinite(bound)) return false;
    sum.addProduct(multiplier, bound);
    return true;
  };
  for (let column = 0; column < problem.columnCount; column++) {
    if (!take(reducedCosts[column], problem.columnLower[column], problem.columnUpper[column]))
      return undefined;
  }
  for (let row = 0; row < problem.rowCount; row++) {
    if (!take(rowDuals[row], problem.rowLower[row], problem.rowUpper[row])) return undefined;
  }
  return sum.value;
}
