/**
 * Fixes columns whose reduced cost has one sign for every dual feasible y, by bounds on the dual values.
 *
 * A row without upper bound has y ≥ 0, one without lower bound y ≤ 0. A column with one entry and without upper bound
 * has cost − a y ≥ 0, one without lower bound cost − a y ≤ 0: bounds on y as well. From those of its rows every column
 * has bounds on d_j = cost_j − Σ a_ij y_i: where d_j > 0 for certain, it stands at its lower bound in every optimum,
 * where d_j < 0 at its upper. Only strict signs count here: at d_j = 0 nothing is known, since the bounds on y are
 * those of different optima.
 *
 * Undo: the column is nonbasic at that bound, its reduced cost computed as it stood.
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.3;
 * Brearley, Mitra and Williams (1975), Mathematical Programming 8.
 */
import { tolerances } from '../../control/tolerances';
import { statusAt, type Side } from '../postsolve-solution';
import { listEnd } from '../linked-entries';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { Finding, ProblemReduction } from '../reduction';
import { type ColumnAtValue, restoreColumnAtValue, takeOutAtValue } from './fixed-column';

export const dominatedColumn: ProblemReduction<ColumnAtValue> = {
  name: 'dominated-column',

  applyToProblem(workspace, stack) {
    const dualBounds = boundDuals(workspace);
    if (dualBounds === undefined) return 'nothing';
    let finding: Finding = 'nothing';
    for (let column = 0; column < workspace.columnCount; column++) {
      if (!workspace.isColumnActive(column) || workspace.columnLength[column] < 2) continue;
      const side = certainSide(workspace, column, dualBounds);
      if (side === undefined) continue;
      const value = (side === 'lower' ? workspace.columnLower : workspace.columnUpper)[column];
      if (!Number.isFinite(value)) return { kind: 'unbounded' };
      stack.push(dominatedColumn, takeOutAtValue(workspace, column, value, statusAt(side), stack));
      finding = 'applied';
    }
    return finding;
  },

  undo: restoreColumnAtValue,
};

/** Length m each: every dual feasible y lies between them. */
interface DualBounds {
  readonly lower: Float64Array;
  readonly upper: Float64Array;
}

/** undefined where columns with one entry tell nothing: the signs alone are dual-fixing.ts's. */
function boundDuals(workspace: PresolveWorkspace): DualBounds | undefined {
  const { rowCount, columnCount, rowLower, rowUpper, columnLength } = workspace;
  const lower = new Float64Array(rowCount);
  const upper = new Float64Array(rowCount);
  for (let row = 0; row < rowCount; row++) {
    lower[row] = rowUpper[row] < Infinity ? -Infinity : 0;
    upper[row] = rowLower[row] > -Infinity ? Infinity : 0;
  }
  let tellsSomething = false;
  for (let column = 0; column < columnCount; column++) {
    if (columnLength[column] !== 1 || !workspace.isColumnActive(column)) continue;
    const entry = workspace.firstInColumn[column];
    const row = workspace.entryRow[entry];
    const value = workspace.entryValue[entry];
    const ratio = workspace.cost[column] / value;
    if (workspace.columnUpper[column] === Infinity) {
      if (value > 0) upper[row] = Math.min(upper[row], ratio);
      else lower[row] = Math.max(lower[row], ratio);
      tellsSomething = true;
    }
    if (workspace.columnLower[column] === -Infinity) {
      if (value > 0) lower[row] = Math.max(lower[row], ratio);
      else upper[row] = Math.min(upper[row], ratio);
      tellsSomething = true;
    }
  }
  return tellsSomething ? { lower, upper } : undefined;
}

/** The bound at which the column stands in every optimum; undefined where that is not certain. */
function certainSide(workspace: PresolveWorkspace, column: number, dualBounds: DualBounds): Side | undefined {
  const { nextInColumn, entryRow, entryValue } = workspace;
  const { lower, upper } = dualBounds;
  let least = workspace.cost[column];
  let greatest = least;
  let largestTerm = Math.abs(least);
  for (let e = workspace.firstInColumn[column]; e !== listEnd; e = nextInColumn[e]) {
    const value = entryValue[e];
    const row = entryRow[e];
    const low = value * (value > 0 ? lower[row] : upper[row]);
    const high = value * (value > 0 ? upper[row] : lower[row]);
    least -= high;
    greatest -= low;
    workspace.work++;
    if (least === -Infinity && greatest === Infinity) return undefined;
    if (Number.isFinite(low)) largestTerm = Math.max(largestTerm, Math.abs(low));
    if (Number.isFinite(high)) largestTerm = Math.max(largestTerm, Math.abs(high));
  }
  const slack = tolerances.presolveDominance * (1 + largestTerm);
  if (least > slack) return 'lower';
  if (greatest < -slack) return 'upper';
  return undefined;
}
