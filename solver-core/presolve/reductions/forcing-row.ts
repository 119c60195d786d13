/**
 * A row whose least activity is just its upper bound (or its greatest the lower) leaves its columns no choice: each
 * stands at the bound that gives this activity. Row and columns go.
 *
 * Undo: with y = 0 the columns may have reduced costs of the wrong sign, each of which the row's dual value can mend.
 * Held at its upper bound the row has y ≤ 0; y = min(0, least of d_j / a_j) mends all. The column for which that is
 * the least becomes basic in place of the logical, unless it is 0.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.2 and §4.
 */
import { VariableStatus } from '../../linear-program/basis';
import { statusAt, type Side } from '../postsolve-solution';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { RowReduction } from '../reduction';
import type { Span } from '../saved-entries';
import { fixedColumn, takeOutAtValue } from './fixed-column';

interface ForcingRow {
  readonly row: number;
  /** The row's bound that its activity is held at. */
  readonly side: Side;
  readonly entries: Span;
  /** Columns that had but one value before: their reduced costs may have any sign. */
  readonly fixedBefore: ReadonlySet<number>;
}

export const forcingRow: RowReduction<ForcingRow> = {
  name: 'forcing-row',

  applyToRow(workspace, row, stack) {
    const side = forcingSide(workspace, row);
    if (side === undefined) return 'nothing';
    const entries = stack.entries.saveRow(workspace, row);
    const choices: { column: number; side: Side }[] = [];
    const fixedBefore = new Set<number>();
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
      const column = workspace.entryColumn[e];
      choices.push({ column, side: workspace.entryValue[e] > 0 === (side === 'upper') ? 'lower' : 'upper' });
      if (workspace.columnLower[column] === workspace.columnUpper[column]) fixedBefore.add(column);
    }
    stack.push(forcingRow, { row, side, entries, fixedBefore });
    workspace.removeRow(row);
    for (const choice of choices) {
      const { column } = choice;
      const value = (choice.side === 'lower' ? workspace.columnLower : workspace.columnUpper)[column];
      const status = fixedBefore.has(column) ? undefined : statusAt(choice.side);
      stack.push(fixedColumn, takeOutAtValue(workspace, column, value, status, stack));
    }
    return 'applied';
  },

  undo({ row, side, entries, fixedBefore }, solution, stack) {
    let dual = 0;
    let bindingColumn: number | undefined;
    for (let k = entries.start; k < entries.end; k++) {
      const column = stack.entries.index(k);
      const ratio = solution.reducedCosts[column] / stack.entries.value(k);
      const isBeyond = side === 'upper' ? ratio < dual : ratio > dual;
      if (!isBeyond || fixedBefore.has(column)) continue;
      dual = ratio;
      bindingColumn = column;
    }
    solution.setRow(row, dual, bindingColumn === undefined ? VariableStatus.basic : statusAt(side));
    if (bindingColumn === undefined) return;
    for (let k = entries.start; k < entries.end; k++) {
      const column = stack.entries.index(k);
      const isBinding = column === bindingColumn;
      const reducedCost = isBinding ? 0 : solution.reducedCosts[column] - stack.entries.value(k) * dual;
      const status = isBinding ? VariableStatus.basic : solution.columnStatus[column];
      solution.setColumn(column, solution.x[column], reducedCost, status);
    }
  },
};

/** The bound at which the row's activity is held by its columns' bounds alone; undefined where there is room. */
function forcingSide(workspace: PresolveWorkspace, row: number): Side | undefined {
  const { activities } = workspace;
  const slack = activities.slack(row);
  const upper = workspace.rowUpper[row];
  const lower = workspace.rowLower[row];
  if (Number.isFinite(upper) && Math.abs(activities.least(row) - upper) <= slack) return 'upper';
  if (Number.isFinite(lower) && Math.abs(activities.greatest(row) - lower) <= slack) return 'lower';
  return undefined;
}
