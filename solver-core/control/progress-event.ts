/** What a running solve reports between two slices of work. */
export interface Progress {
  readonly stage: 'dual phase one' | 'dual' | 'primal' | 'clean-up';
  readonly iterations: number;
  readonly workUnits: number;
  /** Objective as stated at the current basis; a bound on the optimum while the dual algorithm runs. */
  readonly objective: number;
  /** Sum of primal infeasibilities, scaled space. */
  readonly primalInfeasibility: number;
}
