/**
 * Turns a row with one entry into bounds on its column: rowLower ≤ a x ≤ rowUpper.
 *
 * Undo: when the column stands at a bound that only the row gives, it is the row that binds. The dual value moves
 * there: y = d / a, d = 0, the column becomes basic and the row's logical nonbasic. Otherwise the logical is basic.
 * Which bound is the row's is recorded, so that no comparison of numbers decides.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.1 and §4.
 */
import { tolerances } from '../../control/tolerances';
import { VariableStatus } from '../../linear-program/basis';
import { statusAt } from '../postsolve-solution';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { PresolveEnd, RowReduction } from '../reduction';

interface SingletonRow {
  readonly row: number;
  readonly column: number;
  readonly coefficient: number;
  /** The bounds that the column then had, where only the row gives them. */
  readonly isLowerOfRow: boolean;
  readonly isUpperOfRow: boolean;
  readonly isFixed: boolean;
}

export const singletonRow: RowReduction<SingletonRow> = {
  name: 'singleton-row',

  applyToRow(workspace, row, stack) {
    if (workspace.rowLength[row] !== 1) return 'nothing';
    const entry = workspace.firstInRow[row];
    const column = workspace.entryColumn[entry];
    const coefficient = workspace.entryValue[entry];
    const isPositive = coefficient > 0;
    const impliedLower = (isPositive ? workspace.rowLower[row] : workspace.rowUpper[row]) / coefficient;
    const impliedUpper = (isPositive ? workspace.rowUpper[row] : workspace.rowLower[row]) / coefficient;
    const end = findContradiction(workspace, row, coefficient);
    if (end !== undefined) return end;

    const ownLower = workspace.columnLower[column];
    const ownUpper = workspace.columnUpper[column];
    // Implied bounds may pass the column's own other bound by rounding: then they are that bound.
    const lower = Math.min(Math.max(ownLower, impliedLower), ownUpper);
    const upper = Math.max(Math.min(ownUpper, impliedUpper), lower);
    const isLowerOfRow = lower > ownLower;
    const isUpperOfRow = upper < ownUpper;
    stack.push(singletonRow, {
      row,
      column,
      coefficient,
      isLowerOfRow,
      isUpperOfRow,
      isFixed: lower === upper,
    });
    workspace.removeRow(row);
    if (isLowerOfRow || isUpperOfRow) workspace.setColumnBounds(column, lower, upper);
    return 'applied';
  },

  undo({ row, column, coefficient, isLowerOfRow, isUpperOfRow, isFixed }, solution) {
    const side = solution.sideOfColumn(column, isFixed);
    const isHeldByRow = (side === 'lower' && isLowerOfRow) || (side === 'upper' && isUpperOfRow);
    const reducedCost = solution.reducedCosts[column];
    if (isHeldByRow) {
      const rowSide = (side === 'lower') === coefficient > 0 ? 'lower' : 'upper';
      solution.setRow(row, reducedCost / coefficient, statusAt(rowSide));
      solution.setColumn(column, solution.x[column], 0, VariableStatus.basic);
      return;
    }
    solution.setRow(row, 0, VariableStatus.basic);
    if (side !== undefined) solution.setColumn(column, solution.x[column], reducedCost, statusAt(side));
  },
};

function findContradiction(
  workspace: PresolveWorkspace,
  row: number,
  coefficient: number,
): PresolveEnd | undefined {
  const { activities } = workspace;
  // In the column's units a tolerance of the row counts divided by the coefficient; large coefficients must not hide it.
  const slack = Math.max(activities.slack(row), tolerances.presolveFeasibility * Math.abs(coefficient));
  if (activities.greatest(row) < workspace.rowLower[row] - slack) {
    return { kind: 'infeasible', multipliers: [{ row, multiplier: 1 }] };
  }
  if (activities.least(row) > workspace.rowUpper[row] + slack) {
    return { kind: 'infeasible', multipliers: [{ row, multiplier: -1 }] };
  }
  return undefined;
}
