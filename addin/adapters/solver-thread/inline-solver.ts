/**
 * Solver on this very thread, in slices: between them timers and messages get their turn, so that a solve can be
 * stopped and reports its progress. For the command line, for tests, and where no worker can be had.
 */
import {
  SolveSession,
  type LinearProgram,
  type Progress,
  type SolveOptions,
  type SolveResult,
} from '#solver-core';
import type { RunningSolve, Solver } from '../../ports/solver';

/** The time of this host; handed in, so that tests need no clock. */
export interface Pacing {
  /** Milliseconds since any fixed moment. */
  now(): number;
  /** Ends once everything else that is waiting has had its turn. */
  pause(): Promise<void>;
}

/** Milliseconds that a slice should take: short enough for a stop to be felt at once, long against a pause. */
const sliceMilliseconds = 40;
/** Work units of the first slice: some milliseconds on a slow machine. */
const firstSlice = 10_000;
/** No slice is smaller: below this, pauses would cost more than the work. */
const smallestSlice = 1_000;
/** A slice is at most this many times the one before, since a single short one says little. */
const greatestGrowth = 4;

export class InlineSolver implements Solver {
  constructor(private readonly pacing: Pacing) {}

  start(
    problem: LinearProgram,
    options: SolveOptions,
    onProgress?: (progress: Progress) => void,
  ): RunningSolve {
    let isStopping = false;
    const run = async (): Promise<SolveResult> => {
      const session = new SolveSession(problem, options);
      let slice = firstSlice;
      // A caller that stops at once, in the same turn, is heard before any work is done.
      await Promise.resolve();
      while (!isStopping) {
        const startedAt = this.pacing.now();
        const step = session.advance(slice);
        if (step.state === 'done') {
          return step.result;
        }
        const elapsed = this.pacing.now() - startedAt;
        const wanted = (slice * sliceMilliseconds) / Math.max(elapsed, 1);
        slice = Math.round(Math.max(smallestSlice, Math.min(wanted, slice * greatestGrowth)));
        onProgress?.(step.progress);
        await this.pacing.pause();
      }
      return session.stop();
    };
    return {
      result: run(),
      stop: () => {
        isStopping = true;
      },
    };
  }
}
