/**
 * Every tolerance of the core: the question it answers, what it is relative to, its default and the reason.
 * One tolerance answers one question; layers never share one.
 */
export const tolerances = {
  /**
   * Simplex, scaled space, absolute: is this basic variable within its bounds, has this reduced cost the right sign?
   * Reason: what double precision can keep through thousands of pivots; the final check is on the stated problem.
   */
  primalFeasibility: 1e-7,
  /** The same when the answer of a first solve is cleaned up: two digits below what is accepted at the end. */
  cleanUpFeasibility: 1e-9,
  /** Dual ratio test, scaled space, absolute: how far may a reduced cost pass 0 for a larger pivot (Harris 1973)? */
  harrisDualSlack: 1e-7,
  /** Ratio tests, absolute on the pivot column or row: entries below are no candidates. Reason: noise of ftran. */
  ratioTestPivot: 1e-9,
  /**
   * Ratio tests, absolute, tried only when nothing above ratioTestPivot stands in the way: before a problem is called
   * infeasible or unbounded, entries of badly scaled problems that are small but no noise get their say.
   */
  ratioTestLastPivot: 1e-12,
  /** A chosen pivot below this asks for a fresh factorization before it is believed. */
  smallPivot: 1e-7,
  /**
   * Row- and column-wise computed pivots must agree to this, relative to the pivot.
   * Otherwise the factorization is renewed (Koberstein 2005, §6.2.2).
   */
  pivotAgreement: 1e-7,
  /** LU: a pivot must be at least this times the largest entry of its column (Suhl and Suhl 1990). */
  markowitzThreshold: 0.1,
  /** LU threshold after trouble. */
  markowitzThresholdTight: 0.5,
  /** LU: an entry or a pivot of magnitude below this counts as zero; scaled space, absolute. */
  factorDrop: 1e-14,
  /** LU: a column whose largest remaining entry is below this makes the basis singular; absolute. */
  singularPivot: 1e-11,
  /** Forrest–Tomlin: the new diagonal, computed two ways, must agree to this, relative. */
  updateAgreement: 1e-6,
  /** Results of triangular solves: entries below this are set to 0; absolute, scaled space. */
  solveDrop: 1e-14,
  /**
   * Dual loop: has the objective risen since the last look? Relative to 1 + |objective|. Reason: far below what a
   * single step of perturbed costs brings, above the rounding of the sum.
   */
  dualProgress: 1e-13,
  /** Dual steepest edge weights never fall below this. Reason: a weight is a squared norm, at least about 1 in theory. */
  leastEdgeWeight: 1e-4,
  /** Cost perturbation: base size, relative to a cost's magnitude (Koberstein 2005, §6.3.2). */
  costPerturbation: 5e-7,
  /**
   * Presolve, stated units: does this bound or row hold, are these two bounds one? Relative to 1 + the largest term
   * or bound in play. Reason: two digits below what is accepted at the end, so that reductions leave room for it;
   * what misses by more is left to the simplex, which brings evidence.
   */
  presolveFeasibility: 1e-9,
  /** Presolve: is this reduced cost nonzero for certain, in every optimum? Relative to 1 + the largest term. */
  presolveDominance: 1e-9,
  /**
   * Presolve: may this entry be the pivot by which a column is eliminated? Relative to the largest of its row and, for
   * what it is added to, of its column. Reason: three digits are lost at most.
   */
  presolvePivot: 1e-3,
  /** Presolve: is what an elimination leaves of an entry cancellation? Relative to the larger of its two terms. */
  presolveCancellation: 1e-12,
  /** Presolve: are two rows or columns parallel? Each entry relative to itself. Reason: roundings of one division. */
  presolveParallel: 1e-13,
  /**
   * Presolve: are two lines' weighted sums near enough for the lines to be compared? Relative to the sum of magnitudes.
   * Reason: far above the rounding of a sum of a hundred thousand terms; a wrong yes costs only the comparison.
   */
  presolveParallelKey: 1e-9,
  /** Final acceptance, stated space: violation relative to 1 + the largest term of its sum (design §7). */
  acceptedResidual: 1e-7,
  /** Final acceptance, stated space: duality gap relative to 1 + |objective| (design §7). */
  acceptedDualityGap: 1e-8,
  /**
   * Stated space: is an accepted optimum near enough to go without a second look? Residuals as in the acceptance.
   * Reason: two digits below acceptance; most problems end below 1e-12.
   */
  polishedResidual: 1e-9,
  /**
   * Unbounded rays v, stated space: may this component of A v, or cost · v, pass for 0? Relative to the largest term
   * of its sum. Reason: noise of cancellation, two digits below what is accepted of a violation.
   */
  rayNoise: 1e-9,
  /**
   * Farkas rays y, stated space: may this component of Aᵀ y pass for 0 on a bound that is not there? Relative to the
   * largest term of its sum. Reason: on the Netlib infeasible set what is left is at most 2e-16; five digits of room.
   */
  farkasNoise: 1e-11,
  /**
   * Rays before they are judged, stated space: which components are noise to be set to 0? Relative to the largest.
   * Reason: a few thousand roundings of a number of the size of the largest.
   */
  rayDrop: 1e-12,
  /**
   * Rays, simplex space: components below this share of the largest are tried as exact zeros, one level after the
   * other. Reason: a ray may be any vector; noise of solves in components that should be 0 is no part of the proof.
   */
  rayDrops: [0, 1e-14, 1e-11, 1e-9],
  /**
   * Farkas rays, stated space: are the two sides apart? Margin relative to the largest term of the two sums.
   * Reason: the sums are compensated, their terms are doubles; a few units in the last place leave no doubt.
   */
  rayMargin: 1e-13,
  /**
   * Farkas rays that rest on a component which is only nearly 0 on a bound that is not there: up to what amount of
   * that column must the proof hold? Absolute, in the column's unit. Reason: no quantity in a plan is that large; on
   * the Netlib infeasible set proofs reach to 2e14 and beyond.
   */
  rayReach: 1e10,
} as const;

export type Tolerances = typeof tolerances;
