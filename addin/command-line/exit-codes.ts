/**
 * What the command line ends with. Scripts depend on these numbers: they never change their meaning.
 */
export const exitCodes = {
  optimal: 0,
  /** A bug of ours. */
  bug: 1,
  /** Usage, an unreadable file, no such plan, or a file that could not be written. */
  usage: 2,
  /** The plan has errors. */
  invalid: 3,
  infeasible: 4,
  unbounded: 5,
  /** Stopped at a limit, with or without a plan. */
  stopped: 6,
  imprecise: 7,
} as const;

export type ExitCode = (typeof exitCodes)[keyof typeof exitCodes];
