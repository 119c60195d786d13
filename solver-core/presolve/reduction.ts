/**
 * What a reduction is: it finds a place where the problem can be made smaller without losing its optimum, applies
 * itself there, pushes a record onto the stack, and can undo that record on a solution of the smaller problem.
 *
 * Undo must give, from a basic solution of the problem after, one of the problem before: feasible and optimal where
 * the former is, exactly as many basic variables as there are rows, and a nonsingular basis where the former's is.
 */
import type { PostsolveSolution } from './postsolve-solution';
import type { PostsolveStack } from './postsolve-stack';
import type { PresolveWorkspace } from './presolve-workspace';

export type ReductionName =
  | 'empty-row'
  | 'singleton-row'
  | 'redundant-row'
  | 'forcing-row'
  | 'doubleton-equation'
  | 'column-singleton-slack'
  | 'free-column-singleton'
  | 'fixed-column'
  | 'empty-column'
  | 'dual-fixing'
  | 'row-satisfying-column'
  | 'implied-free-substitution'
  | 'dominated-column'
  | 'duplicate-rows'
  | 'duplicate-columns';

/** A row with its multiplier in a proof of infeasibility. */
export interface RowMultiplier {
  readonly row: number;
  readonly multiplier: number;
}

/** The problem as it stands has no optimum. Nobody is to trust this: it says where to look for the evidence. */
export type PresolveEnd =
  | {
      readonly kind: 'infeasible';
      /** Farkas ray of the problem as it stands: the rows that contradict each other or the column bounds. */
      readonly multipliers: readonly RowMultiplier[];
    }
  /** Unbounded if there is a feasible point. */
  | { readonly kind: 'unbounded' };

/** What looking at one place came to: nothing to do, done, or an end. */
export type Finding = 'nothing' | 'applied' | PresolveEnd;

interface Reduction<Record> {
  readonly name: ReductionName;
  undo(record: Record, solution: PostsolveSolution, stack: PostsolveStack): void;
}

/** A reduction that is found by looking at one row. */
export interface RowReduction<Record> extends Reduction<Record> {
  applyToRow(workspace: PresolveWorkspace, row: number, stack: PostsolveStack): Finding;
}

/** A reduction that is found by looking at one column. */
export interface ColumnReduction<Record> extends Reduction<Record> {
  applyToColumn(workspace: PresolveWorkspace, column: number, stack: PostsolveStack): Finding;
}

/** A reduction that is found by comparing rows or columns all over the problem. */
export interface ProblemReduction<Record> extends Reduction<Record> {
  applyToProblem(workspace: PresolveWorkspace, stack: PostsolveStack): Finding;
}

export type { Reduction };
