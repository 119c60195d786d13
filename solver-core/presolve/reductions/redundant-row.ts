/**
 * Removes a row that holds for all values within the column bounds, and the side of a row that does; finds a row
 * that holds for none.
 *
 * A side alone leaves no record: nothing that was there can stand at it, so its multiplier is 0 before and after.
 * Undo of a row: its logical is basic with dual value 0.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.2;
 * Brearley, Mitra and Williams (1975), "Analysis of mathematical programming problems prior to applying the simplex
 * algorithm", Mathematical Programming 8.
 */
import { VariableStatus } from '../../linear-program/basis';
import type { RowReduction } from '../reduction';

interface RedundantRow {
  readonly row: number;
}

export const redundantRow: RowReduction<RedundantRow> = {
  name: 'redundant-row',

  applyToRow(workspace, row, stack) {
    const lower = workspace.rowLower[row];
    const upper = workspace.rowUpper[row];
    const { activities } = workspace;
    const least = activities.least(row);
    const greatest = activities.greatest(row);
    const slack = activities.slack(row);
    if (greatest < lower - slack) return { kind: 'infeasible', multipliers: [{ row, multiplier: 1 }] };
    if (least > upper + slack) return { kind: 'infeasible', multipliers: [{ row, multiplier: -1 }] };
    const isLowerRedundant = least >= lower - slack;
    const isUpperRedundant = greatest <= upper + slack;
    if (isLowerRedundant && isUpperRedundant) {
      stack.push(redundantRow, { row });
      workspace.removeRow(row);
      return 'applied';
    }
    if (isLowerRedundant && lower !== -Infinity) workspace.setRowBounds(row, -Infinity, upper);
    if (isUpperRedundant && upper !== Infinity) workspace.setRowBounds(row, lower, Infinity);
    return 'nothing';
  },

  undo({ row }, solution) {
    solution.setRow(row, 0, VariableStatus.basic);
  },
};
