/**
 * A solve that its caller drives: `advance` spends work units and comes back, so that time stays the caller's.
 * The same problem, options and grants give the same path and the same answer on every machine.
 */
import { InvalidProblemError } from '../control/solver-errors';
import type { Progress } from '../control/progress-event';
import { WorkMeter } from '../control/work-meter';
import type { LinearProgram } from '../linear-program/linear-program';
import { checkSolveOptions, type SolveOptions } from '../linear-program/solve-options';
import type { SolveResult } from '../linear-program/solve-result';
import { validateLinearProgram } from '../linear-program/validate-linear-program';
import { ContinuousSolve } from './solve-continuous';

export type SessionState =
  | { readonly state: 'running'; readonly progress: Progress }
  | { readonly state: 'done'; readonly result: SolveResult };

export class SolveSession {
  private readonly meter: WorkMeter;
  private readonly solve: ContinuousSolve;
  private result: SolveResult | undefined;

  /** @throws InvalidProblemError when the problem or the options cannot be used as they are */
  constructor(problem: LinearProgram, options: SolveOptions = {}) {
    checkSolveOptions(options);
    validateLinearProgram(problem);
    if (options.relax !== true) refuseIntegers(problem);
    this.meter = new WorkMeter(options.workLimit ?? Infinity);
    const settings = {
      presolve: options.presolve ?? true,
      startBasis: options.startBasis,
      iterationLimit: options.iterationLimit ?? Infinity,
    };
    this.solve = new ContinuousSolve(problem, settings, this.meter);
  }

  /** Goes on for about this many work units, or to the end. A session that is done stays done. */
  advance(workUnits: number): SessionState {
    if (this.result === undefined) {
      this.meter.grant(Math.min(workUnits, this.meter.limit - this.meter.total));
      this.result = this.solve.advance(this.meter);
      if (this.result === undefined && this.meter.isLimitReached)
        this.result = this.solve.stopped('work-limit', this.meter);
    }
    if (this.result !== undefined) return { state: 'done', result: this.result };
    return { state: 'running', progress: this.solve.progress(this.meter) };
  }

  /** Ends the solve now, with the best that is known. */
  stop(): SolveResult {
    this.result ??= this.solve.stopped('caller', this.meter);
    return this.result;
  }
}

/** Solves to the end in one call. @throws InvalidProblemError */
export function solve(problem: LinearProgram, options: SolveOptions = {}): SolveResult {
  const session = new SolveSession(problem, options);
  for (;;) {
    const state = session.advance(Infinity);
    if (state.state === 'done') return state.result;
  }
}

function refuseIntegers(problem: LinearProgram): void {
  for (let column = 0; column < problem.columnCount; column++) {
    if (problem.isInteger[column] === 0) continue;
    throw new InvalidProblemError(
      'integers-not-supported',
      `Column "${problem.columnNames[column]}" must be a whole number, which is not supported yet; relax the demand to solve without it.`,
    );
  }
}
