/**
 * How a solve ends: a union by status, each member with the evidence for what it claims.
 *
 * Signs are those of design §4, on the stated problem: a dual value is d(objective as stated) / d(right side),
 * a reduced cost d(objective as stated) / d(column). So when minimising, a binding ≥ row has a dual value ≥ 0 and
 * a binding ≤ row one ≤ 0; when maximising the reverse. With y the row duals: reducedCosts = cost − Aᵀ y.
 */
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { Basis } from './basis';

/** A point of the stated problem with its multipliers. */
export interface SolutionValues {
  /** Objective as stated, with its constant. */
  readonly objective: number;
  /** Length n: a value a column. */
  readonly x: ReadonlyFloat64Array;
  /** Length m: A x. */
  readonly rowActivities: ReadonlyFloat64Array;
  /** Length m. */
  readonly rowDuals: ReadonlyFloat64Array;
  /** Length n. */
  readonly reducedCosts: ReadonlyFloat64Array;
}

/**
 * Largest violations of the optimality conditions, computed with compensated sums on the stated problem.
 * Each is relative to 1 + the largest term of the sum it stands for.
 */
export interface Residuals {
  /** Rows and bounds. */
  readonly primal: number;
  /** Signs of reduced costs and dual values against the bounds that are (not) there or active. */
  readonly dual: number;
  /** |multiplier × distance to the bound it belongs to| / (1 + |objective|), the largest. */
  readonly complementarity: number;
  /** |primal objective − dual objective| / (1 + |primal objective|). */
  readonly dualityGap: number;
}

interface Effort {
  readonly iterations: number;
  readonly workUnits: number;
}

export interface OptimalResult extends SolutionValues, Effort {
  readonly status: 'optimal';
  readonly basis: Basis;
  readonly residuals: Residuals;
}

export interface InfeasibleResult extends Effort {
  readonly status: 'infeasible';
  /**
   * Farkas ray y, length m: with r any row activities within the row bounds and x any point within the column
   * bounds, the greatest value of (Aᵀ y) · x is less than the least value of y · r, though A x = r would make them
   * equal. Checked by verification/verify-ray before it is given out.
   */
  readonly ray: ReadonlyFloat64Array;
}

export interface UnboundedResult extends Effort {
  readonly status: 'unbounded';
  /** A feasible point, length n. */
  readonly x: ReadonlyFloat64Array;
  /** Length n: x + t · ray stays feasible for every t ≥ 0 and the objective improves without end. */
  readonly ray: ReadonlyFloat64Array;
}

export interface StoppedResult extends Effort {
  readonly status: 'stopped';
  readonly cause: 'work-limit' | 'iteration-limit' | 'caller';
  /** The best feasible point so far with the multipliers at hand; undefined where none was found yet. */
  readonly best: SolutionValues | undefined;
  /** A proved bound on the objective as stated, or undefined. */
  readonly bound: number | undefined;
  readonly basis: Basis | undefined;
}

export interface ImpreciseResult extends SolutionValues, Effort {
  readonly status: 'imprecise';
  /** What could not be shown. */
  readonly reason: string;
  readonly residuals: Residuals;
  readonly basis: Basis;
}

export type SolveResult =
  OptimalResult | InfeasibleResult | UnboundedResult | StoppedResult | ImpreciseResult;
