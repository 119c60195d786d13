/**
 * Uses an equation of two columns, a_j x_j + a_k x_k = b, to eliminate x_j from the problem; the bounds of x_j become
 * bounds of x_k. Never makes entries: the row's two and those of x_j go, at most as many come.
 *
 * Undo. With d'_k the reduced cost of x_k after, and d_j, d_k those before without the equation's part:
 *   - x_k stands at a bound that came from x_j: it is x_j that stands at its bound. x_k becomes basic,
 *     y = d_k / a_k = d'_k / a_k + d_j / a_j, and the reduced cost of x_j is −(a_j / a_k) d'_k.
 *   - otherwise x_j is basic, y = d_j / a_j, and x_k keeps what it has.
 * Source: Bradley, Brown and Graves (1983), "Structural redundancy in large-scale optimization models"; Andersen and
 * Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, §3.2 (doubleton equations).
 */
import { tolerances } from '../../control/tolerances';
import { VariableStatus } from '../../linear-program/basis';
import { statusAt, statusWhenFixed, type Side } from '../postsolve-solution';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { RowReduction } from '../reduction';
import type { Span } from '../saved-entries';

interface DoubletonEquation {
  readonly row: number;
  readonly rightSide: number;
  /** x_j */
  readonly eliminated: Term;
  readonly lower: number;
  readonly upper: number;
  readonly cost: number;
  /** The eliminated column without this row. */
  readonly entries: Span;
  /** x_k, and which of the bounds it then had came from x_j. */
  readonly kept: Term;
  readonly isLowerOfOther: boolean;
  readonly isUpperOfOther: boolean;
  readonly isFixed: boolean;
}

interface Term {
  readonly column: number;
  readonly coefficient: number;
}

export const doubletonEquation: RowReduction<DoubletonEquation> = {
  name: 'doubleton-equation',

  applyToRow(workspace, row, stack) {
    if (workspace.rowLength[row] !== 2 || !workspace.isEquation(row)) return 'nothing';
    const terms = chooseTerms(workspace, row);
    if (terms === undefined) return 'nothing';
    const { eliminated, kept } = terms;
    const rightSide = workspace.rowLower[row];
    const lower = workspace.columnLower[eliminated.column];
    const upper = workspace.columnUpper[eliminated.column];
    const atLower = (rightSide - eliminated.coefficient * lower) / kept.coefficient;
    const atUpper = (rightSide - eliminated.coefficient * upper) / kept.coefficient;
    const ownLower = workspace.columnLower[kept.column];
    const ownUpper = workspace.columnUpper[kept.column];
    // Implied bounds may pass the column's own other bound by rounding: then they are that bound.
    const keptLower = Math.min(Math.max(ownLower, Math.min(atLower, atUpper)), ownUpper);
    const keptUpper = Math.max(Math.min(ownUpper, Math.max(atLower, atUpper)), keptLower);
    stack.push(doubletonEquation, {
      row,
      rightSide,
      eliminated,
      lower,
      upper,
      cost: workspace.cost[eliminated.column],
      entries: stack.entries.saveColumn(workspace, eliminated.column, row),
      kept,
      isLowerOfOther: keptLower > ownLower,
      isUpperOfOther: keptUpper < ownUpper,
      isFixed: keptLower === keptUpper,
    });
    if (keptLower !== ownLower || keptUpper !== ownUpper) {
      workspace.setColumnBounds(kept.column, keptLower, keptUpper);
    }
    workspace.eliminate(row, eliminated.column, eliminated.coefficient);
    return 'applied';
  },

  undo(record, solution) {
    const { row, rightSide, eliminated, kept, isLowerOfOther, isUpperOfOther } = record;
    const side = solution.sideOfColumn(kept.column, record.isFixed);
    const isHeldByOther = (side === 'lower' && isLowerOfOther) || (side === 'upper' && isUpperOfOther);
    const keptReducedCost = solution.reducedCosts[kept.column];
    const withoutRow = solution.reducedCost(record.cost, record.entries);
    const right = solution.bound(rightSide);
    if (!isHeldByOther) {
      const dual = withoutRow / eliminated.coefficient;
      const keptValue = solution.x[kept.column];
      const value = (right - kept.coefficient * keptValue) / eliminated.coefficient;
      if (side !== undefined) solution.setColumn(kept.column, keptValue, keptReducedCost, statusAt(side));
      solution.setColumn(eliminated.column, value, 0, VariableStatus.basic);
      solution.setRow(row, dual, statusWhenFixed(dual));
      return;
    }
    const ratio = eliminated.coefficient / kept.coefficient;
    const otherSide: Side = (side === 'lower') === ratio > 0 ? 'upper' : 'lower';
    const value = solution.bound(otherSide === 'lower' ? record.lower : record.upper);
    const keptValue = (right - eliminated.coefficient * value) / kept.coefficient;
    const dual = keptReducedCost / kept.coefficient + withoutRow / eliminated.coefficient;
    solution.setColumn(eliminated.column, value, -ratio * keptReducedCost, statusAt(otherSide));
    solution.setColumn(kept.column, keptValue, 0, VariableStatus.basic);
    solution.setRow(row, dual, statusWhenFixed(dual));
  },
};

/** The shorter column is eliminated, if its coefficient may be a pivot; undefined where neither may. */
function chooseTerms(
  workspace: PresolveWorkspace,
  row: number,
): { readonly eliminated: Term; readonly kept: Term } | undefined {
  const first = termAt(workspace, workspace.firstInRow[row]);
  const second = termAt(workspace, workspace.nextInRow[workspace.firstInRow[row]]);
  if (isFixed(workspace, first) || isFixed(workspace, second)) return undefined; // goes as such, and the row with it
  const isFirstShorter = workspace.columnLength[first.column] <= workspace.columnLength[second.column];
  const [shorter, longer] = isFirstShorter ? [first, second] : [second, first];
  if (isPivot(shorter, longer)) return { eliminated: shorter, kept: longer };
  if (isPivot(longer, shorter)) return { eliminated: longer, kept: shorter };
  return undefined;
}

function termAt(workspace: PresolveWorkspace, entry: number): Term {
  return { column: workspace.entryColumn[entry], coefficient: workspace.entryValue[entry] };
}

function isFixed(workspace: PresolveWorkspace, { column }: Term): boolean {
  return workspace.columnLower[column] === workspace.columnUpper[column];
}

function isPivot(term: Term, other: Term): boolean {
  return Math.abs(term.coefficient) >= tolerances.presolvePivot * Math.abs(other.coefficient);
}
