/**
 * Milliseconds into work units: how much a solve may do before whatever else is waiting, a stop message above all,
 * gets its turn.
 */
import {
  SolveSession,
  type LinearProgram,
  type Progress,
  type SolveOptions,
  type SolveResult,
} from '#solver-core';

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

/** The size of the next slice, given what the last one took. */
export function nextSlice(slice: number, elapsedMilliseconds: number): number {
  const wanted = (slice * sliceMilliseconds) / Math.max(elapsedMilliseconds, 1);
  return Math.round(Math.max(smallestSlice, Math.min(wanted, slice * greatestGrowth)));
}

/**
 * Solves in slices, until the end or until it is to stop.
 * @param isStopping asked between slices
 * @throws InvalidProblemError where the problem or an option cannot be solved as stated
 */
export async function solveInSlices(
  problem: LinearProgram,
  options: SolveOptions,
  pacing: Pacing,
  isStopping: () => boolean,
  onProgress?: (progress: Progress) => void,
): Promise<SolveResult> {
  const session = new SolveSession(problem, options);
  let slice = firstSlice;
  // A caller that stops at once, in the same turn, is heard before any work is done.
  await Promise.resolve();
  while (!isStopping()) {
    const startedAt = pacing.now();
    const step = session.advance(slice);
    if (step.state === 'done') {
      return step.result;
    }
    slice = nextSlice(slice, pacing.now() - startedAt);
    onProgress?.(step.progress);
    await pacing.pause();
  }
  return session.stop();
}
