/**
 * Removes a row without entries: its activity is 0, so it either always holds or never.
 *
 * Undo: the row's logical is basic with dual value 0.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.1.
 */
import { VariableStatus } from '../../linear-program/basis';
import { feasibilitySlack } from '../feasibility-slack';
import type { RowReduction } from '../reduction';

interface EmptyRow {
  readonly row: number;
}

export const emptyRow: RowReduction<EmptyRow> = {
  name: 'empty-row',

  applyToRow(workspace, row, stack) {
    if (workspace.rowLength[row] > 0) return 'nothing';
    const slack = feasibilitySlack(workspace.rowScale[row]);
    if (workspace.rowLower[row] > slack) return { kind: 'infeasible', multipliers: [{ row, multiplier: 1 }] };
    if (workspace.rowUpper[row] < -slack)
      return { kind: 'infeasible', multipliers: [{ row, multiplier: -1 }] };
    stack.push(emptyRow, { row });
    workspace.removeRow(row);
    return 'applied';
  },

  undo({ row }, solution) {
    solution.setRow(row, 0, VariableStatus.basic);
  },
};
