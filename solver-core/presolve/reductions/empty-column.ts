/**
 * Removes a column without entries: it stands where its cost is least, whatever the others do.
 *
 * Undo: that value, with the cost as reduced cost; nonbasic.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.1.
 */
import { VariableStatus } from '../../linear-program/basis';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { ColumnReduction } from '../reduction';
import { type ColumnAtValue, restoreColumnAtValue, takeOutAtValue } from './fixed-column';

export const emptyColumn: ColumnReduction<ColumnAtValue> = {
  name: 'empty-column',

  applyToColumn(workspace, column, stack) {
    if (workspace.columnLength[column] > 0) return 'nothing';
    const status = cheapestStatus(workspace, column);
    const value = restingPlace(workspace, column, status);
    if (!Number.isFinite(value)) return { kind: 'unbounded' };
    stack.push(emptyColumn, takeOutAtValue(workspace, column, value, status, stack));
    return 'applied';
  },

  undo: restoreColumnAtValue,
};

/** Where the cost is least; where it does not count, at the bound nearer to 0, or free. */
function cheapestStatus(workspace: PresolveWorkspace, column: number): number {
  const cost = workspace.cost[column];
  if (cost > 0) return VariableStatus.atLower;
  if (cost < 0) return VariableStatus.atUpper;
  const lower = Math.abs(workspace.columnLower[column]);
  const upper = Math.abs(workspace.columnUpper[column]);
  if (lower === Infinity && upper === Infinity) return VariableStatus.free;
  return upper < lower ? VariableStatus.atUpper : VariableStatus.atLower;
}

function restingPlace(workspace: PresolveWorkspace, column: number, status: number): number {
  switch (status) {
    case VariableStatus.atLower:
      return workspace.columnLower[column];
    case VariableStatus.atUpper:
      return workspace.columnUpper[column];
    default:
      return 0;
  }
}
