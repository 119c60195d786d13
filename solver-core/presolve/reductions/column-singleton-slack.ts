/**
 * Takes columns with one entry into their row, as the slack they are: Σ + a x between rowLower and rowUpper becomes
 * Σ between rowLower − greatest of a x and rowUpper − least of a x.
 *
 * In an equation the column may have a cost: x = (b − Σ) / a, and the others pay cost_k − a_k cost / a. In other rows
 * only columns without cost are taken. All such columns of a row make one record.
 *
 * Undo, last taken first. With y the dual value of the row after, the one before is y + cost / a and the column's
 * reduced cost −a y.
 *   - The row after stands at a bound: so does the row before, and the column at the bound that gave it.
 *   - It stands between, y = 0. Before, an equation holds and the column is basic. In another row the column rests at
 *     a bound if the row can bear it (the logical stays basic), or takes what brings the row to its bound and is basic.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.2;
 * Gondzio (1997), INFORMS J. on Computing 9, §2 (slack column singletons).
 */
import { tolerances } from '../../control/tolerances';
import { VariableStatus } from '../../linear-program/basis';
import { statusAt, statusWhenFixed, type PostsolveSolution, type Side } from '../postsolve-solution';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { RowReduction } from '../reduction';
import type { Span } from '../saved-entries';

/** One column, with its row's bounds as they were before it was taken in. */
interface TakenSlack {
  readonly column: number;
  readonly coefficient: number;
  readonly cost: number;
  readonly lower: number;
  readonly upper: number;
  readonly rowLower: number;
  readonly rowUpper: number;
}

interface ColumnSingletonSlack {
  readonly row: number;
  readonly slacks: readonly TakenSlack[];
  /** The row without the slacks. */
  readonly others: Span;
}

export const columnSingletonSlack: RowReduction<ColumnSingletonSlack> = {
  name: 'column-singleton-slack',

  applyToRow(workspace, row, stack) {
    if (workspace.singletonCount[row] === 0) return 'nothing';
    const slacks: TakenSlack[] = [];
    const smallestPivot = tolerances.presolvePivot * largestEntry(workspace, row);
    for (let e = workspace.firstInRow[row]; e !== listEnd;) {
      const next = workspace.nextInRow[e];
      const isPivot = Math.abs(workspace.entryValue[e]) >= smallestPivot;
      if (isPivot && isSlack(workspace, e, row)) slacks.push(takeIn(workspace, e, row));
      e = next;
    }
    if (slacks.length === 0) return 'nothing';
    stack.push(columnSingletonSlack, { row, slacks, others: stack.entries.saveRow(workspace, row) });
    return 'applied';
  },

  undo({ row, slacks, others }, solution) {
    let activity = solution.activity(others);
    for (let k = slacks.length - 1; k >= 0; k--) {
      restoreSlack(solution, row, slacks[k], activity);
      activity += slacks[k].coefficient * solution.x[slacks[k].column];
    }
  },
};

function largestEntry(workspace: PresolveWorkspace, row: number): number {
  let largest = 0;
  for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
    largest = Math.max(largest, Math.abs(workspace.entryValue[e]));
  }
  return largest;
}

function isSlack(workspace: PresolveWorkspace, entry: number, row: number): boolean {
  const column = workspace.entryColumn[entry];
  return (
    workspace.columnLength[column] === 1 &&
    workspace.columnLower[column] < workspace.columnUpper[column] &&
    (workspace.cost[column] === 0 || workspace.isEquation(row))
  );
}

function takeIn(workspace: PresolveWorkspace, entry: number, row: number): TakenSlack {
  const column = workspace.entryColumn[entry];
  const coefficient = workspace.entryValue[entry];
  const cost = workspace.cost[column];
  const lower = workspace.columnLower[column];
  const upper = workspace.columnUpper[column];
  const rowLower = workspace.rowLower[row];
  const rowUpper = workspace.rowUpper[row];
  const price = cost / coefficient;
  if (price !== 0) {
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
      const other = workspace.entryColumn[e];
      if (other !== column) workspace.moveCost(other, price * workspace.entryValue[e]);
    }
    workspace.addToConstant(price * rowLower);
  }
  const least = coefficient * (coefficient > 0 ? lower : upper);
  const greatest = coefficient * (coefficient > 0 ? upper : lower);
  workspace.removeColumn(column);
  workspace.setRowBounds(row, rowLower - greatest, rowUpper - least);
  return { column, coefficient, cost, lower, upper, rowLower, rowUpper };
}

/** @param activity of the row without this slack and those taken before it */
function restoreSlack(solution: PostsolveSolution, row: number, slack: TakenSlack, activity: number): void {
  const { column, coefficient, cost, rowLower, rowUpper } = slack;
  const dualAfter = solution.rowDuals[row];
  const dual = dualAfter + solution.cost(cost) / coefficient;
  const side = solution.sideOfRow(row, false);
  const isEquation = rowLower === rowUpper;
  if (side !== undefined) {
    const columnSide: Side = (side === 'lower') === coefficient > 0 ? 'upper' : 'lower';
    const value = solution.bound(columnSide === 'lower' ? slack.lower : slack.upper);
    solution.setColumn(column, value, -coefficient * dualAfter, statusAt(columnSide));
    solution.setRow(row, dual, isEquation ? statusWhenFixed(dual) : statusAt(side));
    return;
  }
  const { value, columnStatus, rowStatus } = isEquation
    ? {
        value: (solution.bound(rowLower) - activity) / coefficient,
        columnStatus: VariableStatus.basic,
        rowStatus: statusWhenFixed(dual),
      }
    : placeBetween(solution, slack, activity);
  solution.setColumn(column, value, 0, columnStatus);
  solution.setRow(row, dual, rowStatus);
}

interface Placement {
  readonly value: number;
  readonly columnStatus: number;
  readonly rowStatus: number;
}

/** Of the basic placements of a slack without cost, the first that violates no bound, or else the least violating. */
function placeBetween(solution: PostsolveSolution, slack: TakenSlack, activity: number): Placement {
  const { coefficient } = slack;
  const lower = solution.bound(slack.lower);
  const upper = solution.bound(slack.upper);
  const rowLower = solution.bound(slack.rowLower);
  const rowUpper = solution.bound(slack.rowUpper);
  const { atLower, atUpper, basic, free } = VariableStatus;
  const placements: Placement[] = [
    { value: lower, columnStatus: atLower, rowStatus: basic },
    { value: upper, columnStatus: atUpper, rowStatus: basic },
    { value: (rowLower - activity) / coefficient, columnStatus: basic, rowStatus: atLower },
    { value: (rowUpper - activity) / coefficient, columnStatus: basic, rowStatus: atUpper },
  ];
  const isFree = lower === -Infinity && upper === Infinity;
  if (isFree) placements.unshift({ value: 0, columnStatus: free, rowStatus: basic });
  let best = placements[0];
  let leastViolation = Infinity;
  for (const placement of placements) {
    if (!Number.isFinite(placement.value)) continue;
    const total = activity + coefficient * placement.value;
    const ofRow = placement.rowStatus === basic ? Math.max(rowLower - total, total - rowUpper, 0) : 0;
    const ofColumn = Math.max(lower - placement.value, placement.value - upper, 0);
    if (ofRow + ofColumn >= leastViolation) continue;
    best = placement;
    leastViolation = ofRow + ofColumn;
  }
  return best;
}
