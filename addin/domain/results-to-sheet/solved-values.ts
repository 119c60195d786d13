/**
 * What a solver found, carried from rows and columns of the linear program to the parts of the model.
 */
import type { SolutionValues, SolveResult } from '#solver-core';
import type { BuiltProgram } from '../model-from-sheet/build-linear-program';
import type { SolvedValues } from './plan-solution';

/** The plan that a result carries, or undefined. */
export function planValuesOf(result: SolveResult): SolutionValues | undefined {
  switch (result.status) {
    case 'optimal':
    case 'imprecise':
      return result;
    case 'stopped':
      return result.best;
    case 'infeasible':
    case 'unbounded':
      return undefined;
  }
}

export function solvedValuesOf(built: BuiltProgram, values: SolutionValues): SolvedValues {
  return {
    values: built.decisionColumns.map((column) => values.x[column]),
    reducedCosts: built.decisionColumns.map((column) => values.reducedCosts[column]),
    dualValues: built.constraintRows.flat().map((row) => values.rowDuals[row]),
  };
}
