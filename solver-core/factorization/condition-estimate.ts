/**
 * How much of a right side's error a solve with the basis matrix may magnify: κ₁(B) = ‖B‖₁ · ‖B⁻¹‖₁.
 *
 * ‖B‖₁ is summed up; ‖B⁻¹‖₁ is estimated from below, as the greatest value of the convex function ‖B⁻¹ x‖₁ over the
 * unit ball ‖x‖₁ ≤ 1 that an ascent from corner to corner finds. A step takes one ftran and one btran: with
 * w = B⁻¹ x and s the signs of w, z = B⁻ᵀ s is a subgradient at x, and the corner where |z| is largest is the next
 * point. Where that corner promises nothing more, x is a local maximum. A vector of alternating signs and growing sizes
 * is tried beside it: it finds what the ascent misses where B⁻¹ was made of cancelling parts.
 *
 * Source: Hager (1984), "Condition estimates", SIAM J. Sci. Stat. Comput. 5, §2; Higham (1988), "FORTRAN codes for
 * estimating the one-norm of a real or complex matrix", ACM TOMS 14, algorithm 4.1 for the ends and the alternating
 * vector.
 */
import { ScatteredVector } from '../sparse/scattered-vector';
import type { SparseMatrix } from '../sparse/sparse-matrix';
import type { BasisFactorization } from './basis-factorization';

export interface ConditionEstimate {
  /** ‖B‖₁, the largest sum of magnitudes of a column: exact but for rounding. */
  readonly norm: number;
  /** ‖B⁻¹‖₁ from below: never above the true value but for the errors of the solves, seldom below a third of it. */
  readonly inverseNorm: number;
  /** norm × inverseNorm; at least 1 but for rounding, Infinity where a solve overflows, 1 for a basis of no rows. */
  readonly condition: number;
}

/** Ascent steps; Higham reports that more than this are hardly ever taken, and the count must have an end. */
const mostSteps = 5;

/**
 * The condition of the basis as it is factorized, updates included. Costs up to seven ftrans and five btrans; their
 * work is noted by the factorization as that of any solve, and what it keeps for an update stays.
 *
 * @param matrix A, m rows, n columns: the one the factorization was made with
 * @param basicVariable length m: the variable at each position, n + i the logical of row i with the column −e_i
 */
export function estimateCondition(
  factorization: BasisFactorization,
  matrix: SparseMatrix,
  basicVariable: ArrayLike<number>,
): ConditionEstimate {
  if (matrix.rowCount === 0) return { norm: 0, inverseNorm: 0, condition: 1 };
  const norm = basisNorm(matrix, basicVariable);
  const inverseNorm = estimateInverseNorm(factorization, matrix.rowCount);
  return { norm, inverseNorm, condition: norm * inverseNorm };
}

function basisNorm(matrix: SparseMatrix, basicVariable: ArrayLike<number>): number {
  const { columnCount, columnStart, value } = matrix;
  let norm = 0;
  for (let position = 0; position < basicVariable.length; position++) {
    const variable = basicVariable[position];
    let sum = 1;
    if (variable < columnCount) {
      sum = 0;
      const end = columnStart[variable + 1];
      for (let entry = columnStart[variable]; entry < end; entry++) sum += Math.abs(value[entry]);
    }
    norm = Math.max(norm, sum);
  }
  return norm;
}

/** @param m rows of the basis, at least 1 */
function estimateInverseNorm(factorization: BasisFactorization, m: number): number {
  const vector = new ScatteredVector(m);
  const signs = new Float64Array(m);
  fillDense(vector, () => 1 / m);
  factorization.ftran(vector);
  let estimate = sumOfMagnitudes(vector.value);
  let corner = -1;
  for (let step = 0; step < mostSteps && Number.isFinite(estimate) && m > 1; step++) {
    // The same signs give the same subgradient: nothing new can come of them.
    if (!takeSigns(vector.value, signs) && step > 0) break;
    fillDense(vector, (position) => signs[position]);
    factorization.btran(vector);
    const steepest = placeOfLargest(vector.value);
    if (corner >= 0 && Math.abs(vector.value[corner]) >= Math.abs(vector.value[steepest])) break;
    corner = steepest;
    vector.clear();
    vector.value[corner] = 1;
    vector.index[0] = corner;
    vector.count = 1;
    factorization.ftran(vector);
    const found = sumOfMagnitudes(vector.value);
    if (found <= estimate) break;
    estimate = found;
  }
  if (m === 1 || !Number.isFinite(estimate)) return Number.isNaN(estimate) ? Infinity : estimate;
  // Signs that alternate, sizes from 1 to 2: ‖x‖₁ = 3m/2.
  fillDense(vector, (row) => (row % 2 === 0 ? 1 : -1) * (1 + row / (m - 1)));
  factorization.ftran(vector);
  const alternating = (2 * sumOfMagnitudes(vector.value)) / (3 * m);
  return Math.max(estimate, Number.isNaN(alternating) ? Infinity : alternating);
}

function fillDense(vector: ScatteredVector, valueAt: (place: number) => number): void {
  for (let place = 0; place < vector.length; place++) vector.value[place] = valueAt(place);
  vector.count = -1;
}

function sumOfMagnitudes(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += Math.abs(value);
  return sum;
}

/** signs ← those of the values, that of 0 being 1. @returns whether any sign is not what it was */
function takeSigns(values: Float64Array, signs: Float64Array): boolean {
  let isNew = false;
  for (let place = 0; place < values.length; place++) {
    const sign = values[place] < 0 ? -1 : 1;
    isNew ||= sign !== signs[place];
    signs[place] = sign;
  }
  return isNew;
}

function placeOfLargest(values: Float64Array): number {
  let largest = 0;
  for (let place = 1; place < values.length; place++) {
    if (Math.abs(values[place]) > Math.abs(values[largest])) largest = place;
  }
  return largest;
}
