/**
 * Makes a problem smaller before it is solved: applies the reductions until none finds anything more, or until the
 * work granted for it is spent. What is left has the same optimum; every reduction can be undone on a solution of it.
 *
 * Rows go before columns: what is cheapest and removes most comes first. Comparing rows and columns with each other
 * costs a pass over all of them, so that waits until nothing else is to be had. A found contradiction is returned as
 * a candidate for a proof on the stated problem, nothing more.
 *
 * Source: Andersen and Andersen (1995), "Presolving in linear programming", Mathematical Programming 71, for the
 * whole; Gondzio (1997), INFORMS J. on Computing 9, for the order.
 */
import type { WorkMeter } from '../control/work-meter';
import type { LinearProgram } from '../linear-program/linear-program';
import { PostsolveSolution } from './postsolve-solution';
import { PostsolveStack } from './postsolve-stack';
import { listEnd } from './linked-entries';
import { PresolveWorkspace } from './presolve-workspace';
import { ReducedProblem, statusBySign } from './reduced-problem';
import type { Finding, PresolveEnd, RowMultiplier } from './reduction';
import { allReductions, type ReductionSet } from './reductions/all-reductions';

export type PresolveOutcome =
  /** Nothing was found to do: the stated problem is what there is to solve. */
  | { readonly kind: 'unchanged' }
  | { readonly kind: 'reduced'; readonly reduced: ReducedProblem }
  /** A candidate for a Farkas ray of the stated problem, length m: to be verified. */
  | { readonly kind: 'infeasible'; readonly ray: Float64Array }
  /** Unbounded, if there is a feasible point: to be shown by solving the stated problem. */
  | { readonly kind: 'unbounded' };

/** Passes over everything, in nonzeros plus rows and columns, that presolve may cost; a guard, seldom reached. */
const mostPasses = 60;
/** Times that all rows and all columns are compared with each other. */
const mostComparisons = 4;
/** They are compared again only when at least this share of the entries has changed since. */
const shareChanged = 0.05;

/**
 * @param problem stated; whole-number demands are ignored
 * @param meter what is done is spent there; presolve does not pause
 * @param reductions to be used; all of them unless a test wants fewer
 */
export function presolve(
  problem: LinearProgram,
  meter: WorkMeter,
  reductions: ReductionSet = allReductions,
): PresolveOutcome {
  const workspace = new PresolveWorkspace(problem);
  const stack = new PostsolveStack();
  const end = reduceToFixedPoint(workspace, stack, reductions);
  meter.spend(workspace.work);
  switch (end?.kind) {
    case undefined:
      if (stack.length === 0) return { kind: 'unchanged' };
      return { kind: 'reduced', reduced: new ReducedProblem(problem, workspace, stack) };
    case 'infeasible':
      return { kind: 'infeasible', ray: statedRay(workspace, stack, end.multipliers) };
    case 'unbounded':
      return { kind: 'unbounded' };
  }
}

function reduceToFixedPoint(
  workspace: PresolveWorkspace,
  stack: PostsolveStack,
  reductions: ReductionSet,
): PresolveEnd | undefined {
  const size = workspace.work + workspace.rowCount + workspace.columnCount;
  const mostWork = mostPasses * size;
  for (let comparison = 0; comparison < mostComparisons; comparison++) {
    const end = followChanges(workspace, stack, reductions, mostWork);
    if (end !== undefined || workspace.work > mostWork) return end;
    const changesBefore = workspace.entryChanges;
    for (const reduction of reductions.ofProblem) {
      const finding = reduction.applyToProblem(workspace, stack);
      if (isEnd(finding)) return finding;
    }
    if (workspace.entryChanges - changesBefore < shareChanged * size) break;
  }
  return followChanges(workspace, stack, reductions, mostWork);
}

/** Looks at every row and column that waits, rows first, until none does. */
function followChanges(
  workspace: PresolveWorkspace,
  stack: PostsolveStack,
  reductions: ReductionSet,
  mostWork: number,
): PresolveEnd | undefined {
  while (workspace.work <= mostWork) {
    const row = workspace.changedRows.take();
    const column = row === undefined ? workspace.changedColumns.take() : undefined;
    if (row === undefined && column === undefined) return undefined;
    const finding =
      row === undefined
        ? lookAtColumn(workspace, column!, stack, reductions)
        : lookAtRow(workspace, row, stack, reductions);
    if (isEnd(finding)) return finding;
  }
  return undefined;
}

function lookAtRow(
  workspace: PresolveWorkspace,
  row: number,
  stack: PostsolveStack,
  reductions: ReductionSet,
): Finding {
  workspace.work++;
  for (const reduction of reductions.ofRows) {
    if (!workspace.isRowActive(row)) return 'applied';
    const finding = reduction.applyToRow(workspace, row, stack);
    if (isEnd(finding)) return finding;
  }
  return 'nothing';
}

function lookAtColumn(
  workspace: PresolveWorkspace,
  column: number,
  stack: PostsolveStack,
  reductions: ReductionSet,
): Finding {
  workspace.work++;
  for (const reduction of reductions.ofColumns) {
    if (!workspace.isColumnActive(column)) return 'applied';
    const finding = reduction.applyToColumn(workspace, column, stack);
    if (isEnd(finding)) return finding;
  }
  return 'nothing';
}

function isEnd(finding: Finding): finding is PresolveEnd {
  return typeof finding === 'object';
}

/** The contradiction found in the problem as it then stood, carried back to the stated problem. */
function statedRay(
  workspace: PresolveWorkspace,
  stack: PostsolveStack,
  multipliers: readonly RowMultiplier[],
): Float64Array {
  const { rowCount, columnCount } = workspace;
  const solution = new PostsolveSolution(rowCount, columnCount, 'farkas ray', stack.entries);
  for (let row = 0; row < rowCount; row++) solution.setRow(row, 0, statusBySign(0));
  for (let column = 0; column < columnCount; column++) solution.setColumn(column, 0, 0, statusBySign(0));
  for (const { row, multiplier } of multipliers) {
    solution.setRow(row, multiplier, statusBySign(multiplier));
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
      const column = workspace.entryColumn[e];
      const reducedCost = solution.reducedCosts[column] - workspace.entryValue[e] * multiplier;
      solution.setColumn(column, 0, reducedCost, statusBySign(reducedCost));
    }
  }
  stack.undoAll(solution);
  return solution.rowDuals.slice();
}
