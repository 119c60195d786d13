/**
 * Removes a column whose bounds are one number: its value goes into the right sides and the constant.
 *
 * Undo: the value is restored, the reduced cost computed from the column as it stood; nonbasic.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.1.
 */
import type { PostsolveSolution } from '../postsolve-solution';
import { statusWhenFixed } from '../postsolve-solution';
import type { PostsolveStack } from '../postsolve-stack';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { ColumnReduction } from '../reduction';
import type { Span } from '../saved-entries';

/** A column that was taken out at a value; other reductions that end so share it. */
export interface ColumnAtValue {
  readonly column: number;
  readonly value: number;
  readonly cost: number;
  readonly entries: Span;
  /** Its status there; undefined where both bounds hold it and the sign of the reduced cost tells. */
  readonly status: number | undefined;
}

export const fixedColumn: ColumnReduction<ColumnAtValue> = {
  name: 'fixed-column',

  applyToColumn(workspace, column, stack) {
    const value = workspace.columnLower[column];
    if (value !== workspace.columnUpper[column]) return 'nothing';
    stack.push(fixedColumn, takeOutAtValue(workspace, column, value, undefined, stack));
    return 'applied';
  },

  undo: restoreColumnAtValue,
};

/** Takes a column out of the problem at a value. @returns the record to push */
export function takeOutAtValue(
  workspace: PresolveWorkspace,
  column: number,
  value: number,
  status: number | undefined,
  stack: PostsolveStack,
): ColumnAtValue {
  const entries = stack.entries.saveColumn(workspace, column);
  const record = { column, value, cost: workspace.cost[column], entries, status };
  workspace.substituteValue(column, value);
  return record;
}

export function restoreColumnAtValue(record: ColumnAtValue, solution: PostsolveSolution): void {
  const { column, value, cost, entries, status } = record;
  const reducedCost = solution.reducedCost(cost, entries);
  solution.setColumn(column, solution.bound(value), reducedCost, status ?? statusWhenFixed(reducedCost));
}
