/**
 * The open-source solver javascript-lp-solver as a cross-check. It knows columns ≥ 0 alone: others are shifted,
 * mirrored or split, boxes become rows.
 */
import type { Model } from 'javascript-lp-solver';
import solver from 'javascript-lp-solver';
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import type { ReferenceStatus } from './highs-reference';

/** The problem without whole-number demands. */
export function solveWithJavascriptLpSolver(problem: LinearProgram): {
  status: ReferenceStatus;
  objective: number;
} {
  const { columnStart, rowIndex, value } = problem.matrix;
  const rowLower = Array.from(problem.rowLower);
  const rowUpper = Array.from(problem.rowUpper);
  const variables: Record<string, Record<string, number>> = {};
  const boxes: [name: string, width: number][] = [];
  let constant = problem.objectiveConstant;

  const addPart = (name: string, column: number, sign: 1 | -1): void => {
    const coefficients: Record<string, number> = { objective: sign * problem.cost[column] };
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      coefficients[`r${rowIndex[entry]}`] = sign * value[entry];
    }
    variables[name] = coefficients;
  };
  const shift = (column: number, by: number): void => {
    constant += problem.cost[column] * by;
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      rowLower[rowIndex[entry]] -= value[entry] * by;
      rowUpper[rowIndex[entry]] -= value[entry] * by;
    }
  };
  for (let column = 0; column < problem.columnCount; column++) {
    const lower = problem.columnLower[column];
    const upper = problem.columnUpper[column];
    if (lower > -Infinity) {
      shift(column, lower);
      if (upper === lower) continue;
      addPart(`x${column}`, column, 1);
      if (upper < Infinity) boxes.push([`x${column}`, upper - lower]);
    } else if (upper < Infinity) {
      shift(column, upper);
      addPart(`x${column}`, column, -1);
    } else {
      addPart(`x${column}+`, column, 1);
      addPart(`x${column}-`, column, -1);
    }
  }

  const constraints: Record<string, { min?: number; max?: number; equal?: number }> = {};
  for (let row = 0; row < problem.rowCount; row++) {
    constraints[`r${row}`] =
      rowLower[row] === rowUpper[row]
        ? { equal: rowLower[row] }
        : {
            ...(rowLower[row] > -Infinity ? { min: rowLower[row] } : {}),
            ...(rowUpper[row] < Infinity ? { max: rowUpper[row] } : {}),
          };
  }
  for (const [name, width] of boxes) {
    variables[name][`box ${name}`] = 1;
    constraints[`box ${name}`] = { max: width };
  }
  const model: Model = {
    optimize: 'objective',
    opType: problem.sense === 'maximise' ? 'max' : 'min',
    constraints,
    variables,
  };
  const { feasible, bounded, result } = solver.Solve(model) as {
    feasible: boolean;
    bounded?: boolean;
    result: number;
  };
  return {
    status: !feasible ? 'infeasible' : bounded === false ? 'unbounded' : 'optimal',
    objective: result + constant,
  };
}
