/**
 * What a caller may ask of a solve; checked on entry.
 */
import { InvalidProblemError } from '../control/solver-errors';
import type { Basis } from './basis';

export interface SolveOptions {
  /** Reduce the problem first. Default true; never used together with startBasis. */
  readonly presolve?: boolean;
  /** Drop whole-number demands. Default false: a problem with integer columns is then refused. */
  readonly relax?: boolean;
  /** Work units after which the solve stops. Default: no limit. */
  readonly workLimit?: number;
  /** Simplex iterations after which the solve stops. Default: no limit. */
  readonly iterationLimit?: number;
  /** A basis of a similar problem to start from. */
  readonly startBasis?: Basis;
}

/** @throws InvalidProblemError with code `bad-option` */
export function checkSolveOptions(options: SolveOptions): void {
  for (const [name, limit] of [
    ['workLimit', options.workLimit],
    ['iterationLimit', options.iterationLimit],
  ] as const) {
    if (limit !== undefined && !(limit >= 0)) {
      throw new InvalidProblemError('bad-option', `${name} must be a number of at least 0, not ${limit}.`);
    }
  }
}
