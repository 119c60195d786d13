/** How a run of a simplex loop ends. What the words mean is said at each loop. */
export type LoopEnd =
  /** The slice of work is spent; run again to go on. */
  | 'paused'
  /** No infeasibility of the loop's own kind is left (dual: primal feasible; primal: dual feasible). */
  | 'optimal'
  /** Dual loop: a row that cannot be made feasible. Primal loop: phase one ended with infeasibilities. */
  | 'infeasible'
  /** Primal loop: an unbounded direction. */
  | 'unbounded'
  /** Many steps without progress: bounds, costs, rules or the algorithm must change. */
  | 'stalled'
  /** Pivots could not be trusted even with fresh factors. */
  | 'trouble'
  /** The iteration limit is reached. */
  | 'limit';
