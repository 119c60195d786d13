/**
 * Solver on this very thread, in slices: between them timers and messages get their turn, so that a solve can be
 * stopped and reports its progress. For the command line and for tests.
 */
import type { LinearProgram, Progress, SolveOptions } from '#solver-core';
import type { RunningSolve, Solver } from '../../ports/solver';
import { solveInSlices, type Pacing } from '../../worker/time-slicing';

export type { Pacing };

export class InlineSolver implements Solver {
  constructor(private readonly pacing: Pacing) {}

  start(
    problem: LinearProgram,
    options: SolveOptions,
    onProgress?: (progress: Progress) => void,
  ): RunningSolve {
    let isStopping = false;
    return {
      result: solveInSlices(problem, options, this.pacing, () => isStopping, onProgress),
      stop: () => {
        isStopping = true;
      },
    };
  }
}
