/**
 * The command cannot be carried out as it was given: a wrong flag, a file that cannot be read or written, no such
 * plan. Ends with exit code 2; the message is a sentence that says what to do.
 */
export class UsageError extends Error {
  override readonly name = 'UsageError';
  constructor(
    /** Stable, kebab-case: the code of the issue that reports it. */
    readonly code: string,
    message: string,
    options?: { cause?: unknown },
  ) {
    super(message, options);
  }
}
