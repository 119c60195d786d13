/**
 * Refuses a problem that says something no solve can make sense of: the gate before every solve, so that no stage
 * behind it has to look again.
 *
 * A lower bound above its upper bound is refused here rather than reported as infeasible: it is a slip in the
 * statement, visible without solving, and a Farkas ray over the rows could not show it (solver-core/SPEC.md, SC-12).
 */
import { InvalidProblemError } from '../control/solver-errors';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { LinearProgram } from './linear-program';

/**
 * Checks lengths, matrix, numbers and bounds, and stops at the first fault.
 * @throws InvalidProblemError with a code and one sentence that names the row or column
 */
export function validateLinearProgram(problem: LinearProgram): void {
  checkLengths(problem);
  checkMatrix(problem);
  checkCosts(problem);
  checkBounds('Row', problem.rowNames, problem.rowLower, problem.rowUpper);
  checkBounds('Column', problem.columnNames, problem.columnLower, problem.columnUpper);
}

function checkLengths(problem: LinearProgram): void {
  const { rowCount, columnCount, matrix } = problem;
  const expected: readonly (readonly [string, number, number])[] = [
    ['matrix.columnStart', matrix.columnStart.length, columnCount + 1],
    ['matrix.rowCount', matrix.rowCount, rowCount],
    ['matrix.columnCount', matrix.columnCount, columnCount],
    ['rowLower', problem.rowLower.length, rowCount],
    ['rowUpper', problem.rowUpper.length, rowCount],
    ['rowNames', problem.rowNames.length, rowCount],
    ['cost', problem.cost.length, columnCount],
    ['columnLower', problem.columnLower.length, columnCount],
    ['columnUpper', problem.columnUpper.length, columnCount],
    ['isInteger', problem.isInteger.length, columnCount],
    ['columnNames', problem.columnNames.length, columnCount],
  ];
  for (const [what, actual, wanted] of expected) {
    if (actual !== wanted) {
      throw new InvalidProblemError('wrong-length', `${what} is ${actual} where ${wanted} was expected.`);
    }
  }
}

function checkMatrix(problem: LinearProgram): void {
  const { columnStart, rowIndex, value } = problem.matrix;
  const { rowCount, columnCount, columnNames, rowNames } = problem;
  const entryCount = columnStart[columnCount];
  if (columnStart[0] !== 0 || rowIndex.length !== entryCount || value.length !== entryCount) {
    throw new InvalidProblemError(
      'malformed-matrix',
      'The matrix does not hold the entries its starts speak of.',
    );
  }
  for (let column = 0; column < columnCount; column++) {
    if (columnStart[column + 1] < columnStart[column]) {
      throw new InvalidProblemError(
        'malformed-matrix',
        `Column "${columnNames[column]}" ends before it starts.`,
      );
    }
    let previous = -1;
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      const row = rowIndex[entry];
      if (row <= previous || row >= rowCount) {
        throw new InvalidProblemError(
          'malformed-matrix',
          `The rows of column "${columnNames[column]}" are out of order or outside the matrix.`,
        );
      }
      previous = row;
      checkCoefficient(value[entry], rowNames[row], columnNames[column]);
    }
  }
}

function checkCoefficient(value: number, row: string, column: string): void {
  if (Number.isFinite(value) && value !== 0) {
    return;
  }
  const where = `The coefficient of column "${column}" in row "${row}"`;
  if (value === 0) {
    throw new InvalidProblemError('malformed-matrix', `${where} is stored though it is 0.`);
  }
  throw Number.isNaN(value)
    ? new InvalidProblemError('not-a-number', `${where} is not a number.`)
    : new InvalidProblemError('infinite-coefficient', `${where} is infinite.`);
}

function checkCosts(problem: LinearProgram): void {
  problem.columnNames.forEach((name, column) => {
    const cost = problem.cost[column];
    if (Number.isNaN(cost)) {
      throw new InvalidProblemError('not-a-number', `The cost of column "${name}" is not a number.`);
    }
    if (!Number.isFinite(cost)) {
      throw new InvalidProblemError('infinite-cost', `The cost of column "${name}" is infinite.`);
    }
  });
  if (!Number.isFinite(problem.objectiveConstant)) {
    throw new InvalidProblemError('not-a-number', 'The constant of the objective is not a finite number.');
  }
}

function checkBounds(
  kind: 'Row' | 'Column',
  names: readonly string[],
  lower: ReadonlyFloat64Array,
  upper: ReadonlyFloat64Array,
): void {
  names.forEach((name, index) => {
    const low = lower[index];
    const high = upper[index];
    if (Number.isNaN(low) || Number.isNaN(high)) {
      throw new InvalidProblemError(
        'not-a-number',
        `A bound of ${kind.toLowerCase()} "${name}" is not a number.`,
      );
    }
    if (low === Infinity || high === -Infinity) {
      throw new InvalidProblemError(
        'impossible-bound',
        `${kind} "${name}" must be ${low === Infinity ? 'at least Infinity' : 'at most −Infinity'}, which no number is.`,
      );
    }
    if (low > high) {
      throw new InvalidProblemError(
        'crossing-bounds',
        `${kind} "${name}" has the lower bound ${low} above its upper bound ${high}.`,
      );
    }
  });
}
