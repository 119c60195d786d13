/**
 * What use-cases need of a solver: a solve is started, reports its progress, can be stopped, and ends with a result.
 * Where it runs (this thread in slices, a worker) is the adapter's business.
 */
import type { LinearProgram, Progress, SolveOptions, SolveResult } from '#solver-core';

export interface RunningSolve {
  /**
   * How the solve ended. A stopped solve ends as well, with the best plan so far.
   * Rejects with InvalidProblemError where the problem or an option cannot be solved as stated, and with
   * SolverThreadError where the thread itself failed.
   */
  readonly result: Promise<SolveResult>;
  /** Asks it to end at the next occasion; does nothing once it has ended. */
  stop(): void;
}

export interface Solver {
  /** @param onProgress called between slices of work, never after `result` is settled */
  start(
    problem: LinearProgram,
    options: SolveOptions,
    onProgress?: (progress: Progress) => void,
  ): RunningSolve;
}
