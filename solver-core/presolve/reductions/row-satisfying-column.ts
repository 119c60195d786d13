/**
 * A column without cost and without a bound in a direction that only helps its rows can satisfy them all by itself,
 * whatever the others do: its rows go, and the column with them.
 *
 * Undo: the column takes the least amount (in that direction) that satisfies every row. If its own bound asks for it,
 * the column is nonbasic there and all logicals are basic; otherwise it is basic, and the row that asks for it binds.
 * All multipliers are 0.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.3
 * (weakly dominated columns whose bound is infinite).
 */
import { VariableStatus } from '../../linear-program/basis';
import { statusAt, type Side } from '../postsolve-solution';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { ColumnReduction } from '../reduction';
import type { Span } from '../saved-entries';
import { freeDirections } from './dual-fixing';

interface SatisfiedRow {
  readonly row: number;
  readonly coefficient: number;
  /** The one bound the row may have. */
  readonly side: Side;
  readonly bound: number;
  readonly others: Span;
}

interface RowSatisfyingColumn {
  readonly column: number;
  /** Direction that helps the rows. */
  readonly isRising: boolean;
  /** The bound that the column starts from in that direction, maybe infinite. */
  readonly startingBound: number;
  readonly rows: readonly SatisfiedRow[];
}

export const rowSatisfyingColumn: ColumnReduction<RowSatisfyingColumn> = {
  name: 'row-satisfying-column',

  applyToColumn(workspace, column, stack) {
    if (workspace.cost[column] !== 0 || workspace.columnLength[column] === 0) return 'nothing';
    const { mayFall, mayRise } = freeDirections(workspace, column);
    const rises = mayRise && workspace.columnUpper[column] === Infinity;
    const falls = mayFall && workspace.columnLower[column] === -Infinity;
    if (!rises && !falls) return 'nothing';
    const rows: SatisfiedRow[] = [];
    for (let e = workspace.firstInColumn[column]; e !== listEnd; e = workspace.nextInColumn[e]) {
      rows.push(
        satisfiedRow(workspace, e, rises, stack.entries.saveRow(workspace, workspace.entryRow[e], column)),
      );
    }
    const startingBound = (rises ? workspace.columnLower : workspace.columnUpper)[column];
    stack.push(rowSatisfyingColumn, { column, isRising: rises, startingBound, rows });
    for (const { row } of rows) workspace.removeRow(row);
    workspace.removeColumn(column);
    return 'applied';
  },

  undo({ column, isRising, startingBound, rows }, solution) {
    let value = solution.bound(startingBound);
    let bindingRow: SatisfiedRow | undefined;
    for (const row of rows) {
      solution.setRow(row.row, 0, VariableStatus.basic);
      const wanted = solution.solvedFor(row.coefficient, row.bound, row.others);
      if (isRising ? wanted > value : wanted < value) {
        value = wanted;
        bindingRow = row;
      }
    }
    if (bindingRow === undefined) {
      const hasBound = Number.isFinite(value);
      const status = hasBound ? statusAt(isRising ? 'lower' : 'upper') : VariableStatus.free;
      solution.setColumn(column, hasBound ? value : 0, 0, status);
      return;
    }
    solution.setRow(bindingRow.row, 0, statusAt(bindingRow.side));
    solution.setColumn(column, value, 0, VariableStatus.basic);
  },
};

/** The bound that the column helps to reach; the row has no other, since nothing stands in the column's way. */
function satisfiedRow(
  workspace: PresolveWorkspace,
  entry: number,
  isRising: boolean,
  others: Span,
): SatisfiedRow {
  const row = workspace.entryRow[entry];
  const coefficient = workspace.entryValue[entry];
  const side: Side = isRising === coefficient > 0 ? 'lower' : 'upper';
  const bound = (side === 'lower' ? workspace.rowLower : workspace.rowUpper)[row];
  return { row, coefficient, side, bound, others };
}
