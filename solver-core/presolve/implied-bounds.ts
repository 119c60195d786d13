/**
 * Bounds of a column that its rows imply under the bounds of the other columns. They are only ever compared with the
 * column's own, never put in their place: a bound that no row or column of the stated problem has could hold a
 * nonbasic variable, and the basis would not be one of the stated problem.
 *
 * Source: Brearley, Mitra and Williams (1975), "Analysis of mathematical programming problems prior to applying the
 * simplex algorithm", Mathematical Programming 8; Gondzio (1997), "Presolve analysis of linear programs prior to
 * applying an interior point method", INFORMS J. on Computing 9, for their use with free columns.
 */
import { feasibilitySlack } from './feasibility-slack';
import { listEnd } from './linked-entries';
import type { PresolveWorkspace } from './presolve-workspace';

/**
 * Does x_j stay within its bounds for all values of the other columns, when the row is to be met as an equation with
 * this right side?
 */
export function isImpliedFreeAt(
  workspace: PresolveWorkspace,
  row: number,
  column: number,
  coefficient: number,
  rightSide: number,
): boolean {
  const { lower, upper } = impliedInterval(workspace, row, column, coefficient, rightSide, rightSide);
  return coversLower(workspace, column, lower) && coversUpper(workspace, column, upper);
}

/** Do the rows of a column keep it within its bounds, so that these may be forgotten? */
export function isImpliedFree(workspace: PresolveWorkspace, column: number): boolean {
  let isLowerImplied = workspace.columnLower[column] === -Infinity;
  let isUpperImplied = workspace.columnUpper[column] === Infinity;
  for (let e = workspace.firstInColumn[column]; e !== listEnd; e = workspace.nextInColumn[e]) {
    if (isLowerImplied && isUpperImplied) return true;
    const row = workspace.entryRow[e];
    const { rowLower, rowUpper } = workspace;
    const { lower, upper } = impliedInterval(
      workspace,
      row,
      column,
      workspace.entryValue[e],
      rowLower[row],
      rowUpper[row],
    );
    isLowerImplied ||= coversLower(workspace, column, lower);
    isUpperImplied ||= coversUpper(workspace, column, upper);
  }
  return isLowerImplied && isUpperImplied;
}

function impliedInterval(
  workspace: PresolveWorkspace,
  row: number,
  column: number,
  coefficient: number,
  rowLower: number,
  rowUpper: number,
): { readonly lower: number; readonly upper: number } {
  const { activities } = workspace;
  const columnLower = workspace.columnLower[column];
  const columnUpper = workspace.columnUpper[column];
  if (coefficient > 0) {
    return {
      lower: (rowLower - activities.greatestWithout(row, coefficient * columnUpper)) / coefficient,
      upper: (rowUpper - activities.leastWithout(row, coefficient * columnLower)) / coefficient,
    };
  }
  return {
    lower: (rowUpper - activities.leastWithout(row, coefficient * columnUpper)) / coefficient,
    upper: (rowLower - activities.greatestWithout(row, coefficient * columnLower)) / coefficient,
  };
}

function coversLower(workspace: PresolveWorkspace, column: number, implied: number): boolean {
  const own = workspace.columnLower[column];
  return own === -Infinity || implied >= own - feasibilitySlack(Math.abs(own));
}

function coversUpper(workspace: PresolveWorkspace, column: number, implied: number): boolean {
  const own = workspace.columnUpper[column];
  return own === Infinity || implied <= own + feasibilitySlack(Math.abs(own));
}
