/**
 * Removes a column with one entry, with its row, when the row alone keeps the column within its bounds: the row's
 * dual value is then known, y = cost / a, and the row is met as an equation at the bound that the sign of y calls for.
 *
 * The other columns of the row pay what the column would have paid: cost_k − a_k y. Undo: the column takes the value
 * that meets the row and is basic; the row's logical is nonbasic with dual value y.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.2 (free
 * and implied free column singletons).
 */
import { VariableStatus } from '../../linear-program/basis';
import { isImpliedFreeAt } from '../implied-bounds';
import { statusAt, statusWhenFixed, type Side } from '../postsolve-solution';
import type { PostsolveStack } from '../postsolve-stack';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { RowReduction } from '../reduction';
import type { Span } from '../saved-entries';

interface FreeColumnSingleton {
  readonly row: number;
  readonly column: number;
  readonly pivot: number;
  readonly cost: number;
  /** The bound at which the row is met. */
  readonly rightSide: number;
  /** undefined where the row is an equation. */
  readonly side: Side | undefined;
  readonly others: Span;
}

export const freeColumnSingleton: RowReduction<FreeColumnSingleton> = {
  name: 'free-column-singleton',

  applyToRow(workspace, row, stack) {
    if (workspace.singletonCount[row] === 0) return 'nothing';
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
      const column = workspace.entryColumn[e];
      if (workspace.columnLength[column] !== 1) continue;
      const pivot = workspace.entryValue[e];
      const side = sideToMeet(workspace, row, column, pivot);
      if (side === undefined || !workspace.activities.isPivot(row, pivot)) continue;
      const rightSide = (side === 'lower' ? workspace.rowLower : workspace.rowUpper)[row];
      if (!Number.isFinite(rightSide)) continue;
      if (!isImpliedFreeAt(workspace, row, column, pivot, rightSide)) continue;
      removeWithRow(workspace, { row, column, pivot, rightSide, side }, stack);
      return 'applied';
    }
    return 'nothing';
  },

  undo({ row, column, pivot, cost, rightSide, side, others }, solution) {
    const dual = solution.cost(cost) / pivot;
    solution.setRow(row, dual, side === undefined ? statusWhenFixed(dual) : statusAt(side));
    solution.setColumn(column, solution.solvedFor(pivot, rightSide, others), 0, VariableStatus.basic);
  },
};

/** The bound of the row that the column's cost calls for; undefined where the cost does not tell. */
function sideToMeet(
  workspace: PresolveWorkspace,
  row: number,
  column: number,
  pivot: number,
): Side | undefined {
  const price = workspace.cost[column] / pivot;
  if (price > 0) return 'lower';
  if (price < 0) return 'upper';
  return workspace.isEquation(row) ? 'lower' : undefined; // without cost, column-singleton-slack.ts has it
}

function removeWithRow(
  workspace: PresolveWorkspace,
  found: Omit<FreeColumnSingleton, 'cost' | 'others' | 'side'> & { readonly side: Side },
  stack: PostsolveStack,
): void {
  const { row, column, pivot, rightSide } = found;
  const cost = workspace.cost[column];
  const price = cost / pivot;
  stack.push(freeColumnSingleton, {
    ...found,
    side: workspace.isEquation(row) ? undefined : found.side,
    cost,
    others: stack.entries.saveRow(workspace, row, column),
  });
  for (let e = workspace.firstInRow[row]; e !== listEnd && price !== 0; e = workspace.nextInRow[e]) {
    const other = workspace.entryColumn[e];
    if (other !== column) workspace.moveCost(other, price * workspace.entryValue[e]);
  }
  workspace.addToConstant(price * rightSide);
  workspace.removeRow(row);
  workspace.removeColumn(column);
}
