/**
 * The solution that a simplex iterate stands for: values and multipliers, unscaled, with the signs of solve-result.ts.
 * The problem here is the one that was scaled: the stated problem, or what presolve left of it.
 */
import type { LinearProgram } from '../linear-program/linear-program';
import type { SolutionValues } from '../linear-program/solve-result';
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyFloat64Array, ReadonlyUint8Array } from '../numerics/typed-array-views';
import type { ScaledLinearProgram } from '../scaling/scaled-linear-program';
import { refinedMultipliers, refinePrimalValues } from '../simplex/refine-solution';
import type { SimplexIterate } from '../simplex/simplex-iterate';
import {
  recomputeObjective,
  recomputeReducedCosts,
  recomputeRowActivities,
} from '../verification/recomputed-sums';

/** Activities, reduced costs and objective are computed afresh from x and the row duals, on the stated problem. */
export function solutionFrom(
  problem: LinearProgram,
  x: Float64Array,
  rowDuals: Float64Array,
): SolutionValues {
  return {
    objective: recomputeObjective(problem, x),
    x,
    rowActivities: recomputeRowActivities(problem.matrix, x).values,
    rowDuals,
    reducedCosts: recomputeReducedCosts(problem.matrix, rowDuals, problem.cost).values,
  };
}

/** The iterate's point and multipliers after one refinement, unscaled. */
export function basicSolution(
  problem: LinearProgram,
  scaled: ScaledLinearProgram,
  iterate: SimplexIterate,
): SolutionValues {
  refinePrimalValues(iterate);
  const y = refinedMultipliers(iterate);
  const sign = problem.sense === 'maximise' ? -1 : 1;
  const x = unscaledPoint(problem, scaled, iterate.primal.value);
  const rowDuals = new Float64Array(problem.rowCount);
  for (let row = 0; row < problem.rowCount; row++) rowDuals[row] = sign * scaled.statedDual(row, y[row]) + 0;
  const solution = solutionFrom(problem, x, rowDuals);
  return { ...solution, reducedCosts: withBasicZeros(solution.reducedCosts, iterate.basis.status) };
}

/** Column values, unscaled; z is in the space of the scaled form, length n + m. */
export function unscaledPoint(
  problem: LinearProgram,
  scaled: ScaledLinearProgram,
  z: ReadonlyFloat64Array,
): Float64Array {
  const x = new Float64Array(problem.columnCount);
  for (let column = 0; column < problem.columnCount; column++)
    x[column] = scaled.statedValue(column, z[column]) + 0;
  return x;
}

/**
 * The reduced cost of a basic column is 0 by definition; what rounding left of it is no worth of anything.
 * @param status of the columns first; further ones are not looked at
 */
export function withBasicZeros(reducedCosts: ReadonlyFloat64Array, status: ReadonlyUint8Array): Float64Array {
  return reducedCosts.slice().map((d, column) => (status[column] === VariableStatus.basic ? 0 : d));
}
