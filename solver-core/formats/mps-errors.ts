/**
 * What can be wrong with an MPS text: errors that end the reading, and warnings that tell what was read how.
 */

export type MpsErrorCode =
  | 'unknown-section'
  | 'refused-section'
  | 'section-order'
  | 'missing-section'
  | 'missing-end'
  | 'wrong-fields'
  | 'not-a-number'
  | 'unknown-row'
  | 'unknown-column'
  | 'unknown-type'
  | 'refused-bound'
  | 'repeated-row'
  | 'repeated-column'
  | 'repeated-entry'
  | 'repeated-bound'
  | 'bad-marker'
  | 'bad-sense';

/** The text is not an MPS problem that can be solved. The message is one sentence that starts with the line. */
export class MpsSyntaxError extends Error {
  override readonly name = 'MpsSyntaxError';
  constructor(
    readonly code: MpsErrorCode,
    /** Counted from 1. */
    readonly line: number,
    sentence: string,
  ) {
    super(`Line ${line}: ${sentence}`);
  }
}

export type MpsWarningCode =
  | 'no-objective'
  | 'ignored-free-row'
  | 'ignored-set'
  | 'ignored-range'
  | 'negative-upper-bound'
  | 'integer-without-bounds';

/** Something was read in one of several possible ways, or left out. The message starts with the line. */
export interface MpsWarning {
  readonly code: MpsWarningCode;
  /** Counted from 1. */
  readonly line: number;
  readonly message: string;
}
