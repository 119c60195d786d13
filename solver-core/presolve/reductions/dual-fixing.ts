/**
 * Fixes a column at a bound when no row stands in the way there and the cost does not object: its reduced cost then
 * has one sign for every dual feasible y.
 *
 * A column may go down freely when each entry a > 0 stands in a row without lower bound and each a < 0 in one without
 * upper bound: then y_i a_ij ≤ 0 throughout, and d_j ≥ cost_j. With cost 0 the column is only weakly dominated: other
 * optima may exist, none is better. Where the bound is not there, the objective is unbounded (cost not 0) or the
 * column satisfies its rows by itself (row-satisfying-column.ts).
 *
 * Undo: the column is nonbasic at that bound, its reduced cost computed as it stood.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.3
 * (dominated and weakly dominated columns, by the signs of the dual values alone).
 */
import { tolerances } from '../../control/tolerances';
import { VariableStatus } from '../../linear-program/basis';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { ColumnReduction } from '../reduction';
import { type ColumnAtValue, restoreColumnAtValue, takeOutAtValue } from './fixed-column';

export const dualFixing: ColumnReduction<ColumnAtValue> = {
  name: 'dual-fixing',

  applyToColumn(workspace, column, stack) {
    const cost = workspace.cost[column];
    const { mayFall, mayRise } = freeDirections(workspace, column);
    const falls = mayFall && cost >= 0;
    const rises = mayRise && cost <= 0;
    if (falls && workspace.columnLower[column] > -Infinity) {
      const value = workspace.columnLower[column];
      const record = takeOutAtValue(workspace, column, value, VariableStatus.atLower, stack);
      stack.push(dualFixing, record);
      return 'applied';
    }
    if (rises && workspace.columnUpper[column] < Infinity) {
      const value = workspace.columnUpper[column];
      const record = takeOutAtValue(workspace, column, value, VariableStatus.atUpper, stack);
      stack.push(dualFixing, record);
      return 'applied';
    }
    const isCostCertain = Math.abs(cost) > tolerances.presolveDominance;
    return isCostCertain && (falls || rises) ? { kind: 'unbounded' } : 'nothing';
  },

  undo: restoreColumnAtValue,
};

/** Does any row stand in the way of less, or of more, of this column? */
export function freeDirections(
  workspace: PresolveWorkspace,
  column: number,
): { readonly mayFall: boolean; readonly mayRise: boolean } {
  const { nextInColumn, entryRow, entryValue, rowLower, rowUpper } = workspace;
  let mayFall = true;
  let mayRise = true;
  for (let e = workspace.firstInColumn[column]; e !== listEnd; e = nextInColumn[e]) {
    const row = entryRow[e];
    const isPositive = entryValue[e] > 0;
    const hasLower = rowLower[row] > -Infinity;
    const hasUpper = rowUpper[row] < Infinity;
    if (isPositive ? hasLower : hasUpper) mayFall = false;
    if (isPositive ? hasUpper : hasLower) mayRise = false;
    workspace.work++;
    if (!mayFall && !mayRise) break;
  }
  return { mayFall, mayRise };
}
