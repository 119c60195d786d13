/**
 * What is left after presolve, as a problem of its own, and the way back from it to the stated problem.
 *
 * The reduced problem has the stated sense. Inside presolve everything is minimised: multipliers change their sign on
 * the way in and out when maximising; those of a Farkas ray do not, since costs play no part in it.
 */
import { VariableStatus, type Basis } from '../linear-program/basis';
import type { LinearProgram } from '../linear-program/linear-program';
import type { SolutionValues } from '../linear-program/solve-result';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import { PostsolveSolution } from './postsolve-solution';
import type { PostsolveStack } from './postsolve-stack';
import { listEnd } from './linked-entries';
import type { PresolveWorkspace } from './presolve-workspace';
import type { ReductionName } from './reduction';

/** A solution carried back: what follows from it on the stated problem (activities …) is for the caller to compute. */
export interface RestoredSolution {
  readonly x: Float64Array;
  /** Signs of solve-result.ts. */
  readonly rowDuals: Float64Array;
  /** Signs of solve-result.ts; exactly 0 for basic columns. */
  readonly reducedCosts: Float64Array;
  readonly basis: Basis;
}

export class ReducedProblem {
  readonly problem: LinearProgram;
  /** Stated numbers of the rows and columns that are left, ascending. */
  private readonly statedRow: Int32Array;
  private readonly statedColumn: Int32Array;

  constructor(
    private readonly stated: LinearProgram,
    workspace: PresolveWorkspace,
    private readonly stack: PostsolveStack,
  ) {
    this.statedRow = activeNumbers(workspace.rowCount, (row) => workspace.isRowActive(row));
    this.statedColumn = activeNumbers(workspace.columnCount, (column) => workspace.isColumnActive(column));
    this.problem = reducedLinearProgram(stated, workspace, this.statedRow, this.statedColumn);
  }

  /** How often each reduction was applied. */
  get counts(): ReadonlyMap<ReductionName, number> {
    return this.stack.counts;
  }

  /** A basic solution of the reduced problem as one of the stated problem. */
  restoreSolution(
    values: Pick<SolutionValues, 'x' | 'rowDuals' | 'reducedCosts'>,
    basis: Basis,
  ): RestoredSolution {
    const sign = this.stated.sense === 'maximise' ? -1 : 1;
    const solution = this.emptySolution('solution');
    this.statedColumn.forEach((column, k) => {
      solution.setColumn(column, values.x[k], sign * values.reducedCosts[k], basis.columnStatus[k]);
    });
    this.statedRow.forEach((row, k) => solution.setRow(row, sign * values.rowDuals[k], basis.rowStatus[k]));
    this.stack.undoAll(solution);
    const stated = (multiplier: number): number => sign * multiplier + 0; // + 0: no negative zero
    return {
      x: solution.x.slice(),
      rowDuals: solution.rowDuals.slice().map(stated),
      reducedCosts: solution.reducedCosts.slice().map(stated),
      basis: { columnStatus: solution.columnStatus.slice(), rowStatus: solution.rowStatus.slice() },
    };
  }

  /**
   * A Farkas ray of the reduced problem as one of the stated problem. To be verified: a column that was fixed by its
   * cost alone may carry what the ray rests on.
   * @param ray length of the reduced problem's rows
   */
  restoreFarkasRay(ray: ReadonlyFloat64Array): Float64Array {
    const { columnStart, rowIndex, value } = this.problem.matrix;
    const solution = this.emptySolution('farkas ray');
    this.statedColumn.forEach((column, k) => {
      let reducedCost = 0;
      for (let e = columnStart[k]; e < columnStart[k + 1]; e++) reducedCost -= value[e] * ray[rowIndex[e]];
      solution.setColumn(column, 0, reducedCost, statusBySign(reducedCost));
    });
    this.statedRow.forEach((row, k) => solution.setRow(row, ray[k], statusBySign(ray[k])));
    this.stack.undoAll(solution);
    return solution.rowDuals.slice();
  }

  /**
   * A direction of the reduced problem as one of the stated problem. To be verified.
   * @param direction length of the reduced problem's columns
   */
  restoreUnboundedRay(direction: ReadonlyFloat64Array): Float64Array {
    const solution = this.emptySolution('unbounded ray');
    const { basic } = VariableStatus;
    this.statedColumn.forEach((column, k) => solution.setColumn(column, direction[k], 0, basic));
    this.statedRow.forEach((row) => solution.setRow(row, 0, basic));
    this.stack.undoAll(solution);
    return solution.x.slice();
  }

  private emptySolution(kind: PostsolveSolution['kind']): PostsolveSolution {
    const { rowCount, columnCount } = this.stated;
    return new PostsolveSolution(rowCount, columnCount, kind, this.stack.entries);
  }
}

/** In a Farkas ray, which bound a multiplier uses. */
export function statusBySign(multiplier: number): number {
  if (multiplier > 0) return VariableStatus.atLower;
  return multiplier < 0 ? VariableStatus.atUpper : VariableStatus.basic;
}

function activeNumbers(count: number, isActive: (number: number) => boolean): Int32Array {
  const numbers = new Int32Array(count);
  let found = 0;
  for (let number = 0; number < count; number++) if (isActive(number)) numbers[found++] = number;
  return numbers.slice(0, found);
}

function reducedLinearProgram(
  stated: LinearProgram,
  workspace: PresolveWorkspace,
  statedRow: Int32Array,
  statedColumn: Int32Array,
): LinearProgram {
  const sign = stated.sense === 'maximise' ? -1 : 1;
  const gatheredAt = (numbers: Int32Array, array: ReadonlyFloat64Array, factor = 1): Float64Array =>
    Float64Array.from(numbers, (number) => factor * array[number]);
  return {
    ...stated,
    rowCount: statedRow.length,
    columnCount: statedColumn.length,
    matrix: reducedMatrix(workspace, statedRow, statedColumn),
    cost: gatheredAt(statedColumn, workspace.cost, sign),
    objectiveConstant: sign * workspace.constant,
    rowLower: gatheredAt(statedRow, workspace.rowLower),
    rowUpper: gatheredAt(statedRow, workspace.rowUpper),
    columnLower: gatheredAt(statedColumn, workspace.columnLower),
    columnUpper: gatheredAt(statedColumn, workspace.columnUpper),
    isInteger: new Uint8Array(statedColumn.length),
    rowNames: Array.from(statedRow, (row) => stated.rowNames[row]),
    columnNames: Array.from(statedColumn, (column) => stated.columnNames[column]),
  };
}

/** The active entries in compressed columns; going by ascending rows leaves every column sorted. */
function reducedMatrix(
  workspace: PresolveWorkspace,
  statedRow: Int32Array,
  statedColumn: Int32Array,
): LinearProgram['matrix'] {
  const { columnLength, firstInRow, nextInRow, entryColumn, entryValue } = workspace;
  const columnCount = statedColumn.length;
  const columnStart = new Int32Array(columnCount + 1);
  const place = new Int32Array(workspace.columnCount);
  statedColumn.forEach((column, k) => {
    place[column] = columnStart[k];
    columnStart[k + 1] = columnStart[k] + columnLength[column];
  });
  const rowIndex = new Int32Array(columnStart[columnCount]);
  const value = new Float64Array(columnStart[columnCount]);
  statedRow.forEach((row, k) => {
    for (let e = firstInRow[row]; e !== listEnd; e = nextInRow[e]) {
      const at = place[entryColumn[e]]++;
      rowIndex[at] = k;
      value[at] = entryValue[e];
    }
  });
  return { rowCount: statedRow.length, columnCount, columnStart, rowIndex, value };
}
