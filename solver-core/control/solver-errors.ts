/**
 * The few exceptions of the core. Expected ends of a solve are values (solve-result.ts), never exceptions.
 */

/** What is wrong with a problem or with the options of a solve, as a stable code. */
export type InvalidProblemCode =
  | 'not-a-number'
  | 'infinite-coefficient'
  | 'infinite-cost'
  | 'crossing-bounds'
  | 'impossible-bound'
  | 'wrong-length'
  | 'malformed-matrix'
  | 'duplicate-name'
  | 'integers-not-supported'
  | 'bad-option';

/** The caller stated a problem, or options, that cannot be solved as they are. */
export class InvalidProblemError extends Error {
  override readonly name = 'InvalidProblemError';
  constructor(
    readonly code: InvalidProblemCode,
    message: string,
  ) {
    super(message);
  }
}

/** A rule that the core keeps for itself does not hold: always a bug of ours. */
export class BrokenInvariantError extends Error {
  override readonly name = 'BrokenInvariantError';
}
