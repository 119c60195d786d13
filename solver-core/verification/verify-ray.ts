/**
 * Judges the two kinds of ray against the stated problem: the Farkas ray that shows there is no plan, and the ray
 * along which the objective improves without end. Scaling a ray by a positive factor changes no verdict.
 *
 * Farkas ray y (length m), g = Aᵀ y. For any x within the column bounds with A x = r within the row bounds,
 * g · x = y · r. So no such x exists when
 *
 *     greatest of g · x over the column bounds   <   least of y · r over the row bounds.
 *
 * Rounding, honestly. The sums are compensated, so that y is judged as the exact numbers it holds. Any y at all may
 * be tried, so the giver can and must set to exactly 0 every y_i that calls for a row bound which is not there
 * (`withoutForbiddenComponents`); a y_i left over that does is refused, however small. The components of g cannot be
 * set: they follow from y, and where they are 0 in theory, cancellation leaves noise. On a finite column bound the
 * noise simply counts: it is multiplied by the bound and works against the proof. On a bound that is not there it
 * would undo the proof altogether, though what it shows is only that x would have to be immense. There, and only
 * there, g_j counts as 0, if both
 *   - it is noise: |g_j| ≤ farkasNoise × the largest |a_ij y_i| it is the sum of; and
 *   - the proof reaches far enough: no x whose dropped components stay below rayReach in magnitude satisfies the
 *     problem, that is, rayReach × Σ dropped |g_j| is still less than the margin between the two sides.
 * The margin itself must exceed rayMargin × the largest term of the two sums, since the terms are rounded doubles.
 *
 * Unbounded ray v (length n) from a feasible point x. x + t·v stays feasible for every t ≥ 0 when no component of v
 * and of A v moves toward a bound that is there. Again v's own components must obey exactly, and those of A v, which
 * follow from v, to rayNoise × their largest term |a_ij v_j|. The objective must improve along v by more than rayNoise × the
 * largest |cost_j v_j|.
 *
 * Source: Farkas (1902); in the form with bounds on both sides as in Andersen (2001), "Certificates of primal or
 * dual infeasibility in linear programming".
 */
import { tolerances } from '../control/tolerances';
import type { LinearProgram } from '../linear-program/linear-program';
import { CompensatedSum } from '../numerics/compensated-sum';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import { recomputeReducedCosts, recomputeRowActivities } from './recomputed-sums';
import { isFeasiblePoint } from './verify-solution';

export type RayVerdict =
  | { readonly isProof: true }
  | {
      readonly isProof: false;
      /** Why it proves nothing: one sentence. */
      readonly reason: string;
    };

/**
 * Does y prove that the problem has no feasible point?
 * @param y length m
 */
export function verifyFarkasRay(problem: LinearProgram, y: ReadonlyFloat64Array): RayVerdict {
  const { rowLower, rowUpper, rowNames, columnLower, columnUpper, columnNames } = problem;
  // margin = least of y · r − greatest of g · x
  const margin = new CompensatedSum();
  let largestTerm = 0;
  const take = (multiplier: number, bound: number): void => {
    margin.addProduct(multiplier, bound);
    largestTerm = Math.max(largestTerm, Math.abs(multiplier * bound));
  };

  for (let row = 0; row < problem.rowCount; row++) {
    if (y[row] === 0) {
      continue;
    }
    const bound = y[row] > 0 ? rowLower[row] : rowUpper[row];
    if (!Number.isFinite(bound)) {
      return refusal(`Row "${rowNames[row]}" has not the bound that its component calls for.`);
    }
    take(y[row], bound);
  }

  const { values: minusG, largestTerms } = recomputeReducedCosts(problem.matrix, y);
  let dropped = 0;
  for (let column = 0; column < problem.columnCount; column++) {
    const component = -minusG[column];
    if (component === 0) {
      continue;
    }
    const bound = component > 0 ? columnUpper[column] : columnLower[column];
    if (Number.isFinite(bound)) {
      take(-component, bound);
    } else if (Math.abs(component) <= tolerances.farkasNoise * largestTerms[column]) {
      dropped += Math.abs(component);
    } else {
      return refusal(`Column "${columnNames[column]}" has not the bound that its component calls for.`);
    }
  }

  if (!(margin.value > tolerances.rayMargin * largestTerm && margin.value > 0)) {
    return refusal('The two sides that should be apart are not, to the precision of their terms.');
  }
  if (!(tolerances.rayReach * dropped < margin.value)) {
    return refusal('The proof does not reach far enough: it rests on components that are only nearly 0.');
  }
  return { isProof: true };
}

/**
 * Do the point and the ray prove that the objective improves without end?
 * @param x the point, length n
 * @param ray v, length n
 */
export function verifyUnboundedRay(
  problem: LinearProgram,
  x: ReadonlyFloat64Array,
  ray: ReadonlyFloat64Array,
): RayVerdict {
  const { rowLower, rowUpper, rowNames, columnLower, columnUpper, columnNames } = problem;
  if (!isFeasiblePoint(problem, x)) {
    return refusal('The point is not feasible.');
  }
  for (let column = 0; column < problem.columnCount; column++) {
    if (overstep(ray[column], columnLower[column], columnUpper[column]) !== 0) {
      return refusal(`Column "${columnNames[column]}" moves toward its bound.`);
    }
  }
  const { values: rates, largestTerms } = recomputeRowActivities(problem.matrix, ray);
  for (let row = 0; row < problem.rowCount; row++) {
    const allowed = tolerances.rayNoise * largestTerms[row];
    if (!(overstep(rates[row], rowLower[row], rowUpper[row]) <= allowed)) {
      return refusal(`Row "${rowNames[row]}" moves toward its bound.`);
    }
  }
  const improvement = new CompensatedSum();
  let largestTerm = 0;
  const sign = problem.sense === 'minimise' ? -1 : 1;
  for (let column = 0; column < problem.columnCount; column++) {
    improvement.addProduct(sign * problem.cost[column], ray[column]);
    largestTerm = Math.max(largestTerm, Math.abs(problem.cost[column] * ray[column]));
  }
  if (!(improvement.value > tolerances.rayNoise * largestTerm)) {
    return refusal('The objective does not improve along the ray.');
  }
  return { isProof: true };
}

/**
 * A copy of a Farkas ray made fit to be given out: components that call for a missing row bound, and those that are
 * noise beside the largest, are exactly 0. Any y may be tried as a proof, so nothing is hidden by it: the ray is to
 * be judged afterwards, as it is given out.
 * @param y length m
 */
export function withoutForbiddenComponents(problem: LinearProgram, y: ReadonlyFloat64Array): Float64Array {
  const noise = tolerances.rayDrop * largestMagnitude(y);
  return Float64Array.from(y, (multiplier, row) => {
    const bound = multiplier > 0 ? problem.rowLower[row] : problem.rowUpper[row];
    return Math.abs(multiplier) <= noise || !Number.isFinite(bound) ? 0 : multiplier;
  });
}

/**
 * A copy of an unbounded ray made fit likewise: components that move toward a bound which is there, and those that
 * are noise, are exactly 0.
 * @param ray length n
 */
export function withoutBlockedComponents(problem: LinearProgram, ray: ReadonlyFloat64Array): Float64Array {
  const noise = tolerances.rayDrop * largestMagnitude(ray);
  return Float64Array.from(ray, (rate, column) => {
    const isBlocked = overstep(rate, problem.columnLower[column], problem.columnUpper[column]) !== 0;
    return Math.abs(rate) <= noise || isBlocked ? 0 : rate;
  });
}

function largestMagnitude(vector: ReadonlyFloat64Array): number {
  let largest = 0;
  for (const component of vector) {
    largest = Math.max(largest, Math.abs(component));
  }
  return largest;
}

/** How fast a value that moves at this rate nears a bound that is there; 0 where none is in the way; NaN for NaN. */
function overstep(rate: number, lower: number, upper: number): number {
  if (Number.isNaN(rate)) {
    return NaN;
  }
  return (rate < 0 && lower > -Infinity) || (rate > 0 && upper < Infinity) ? Math.abs(rate) : 0;
}

function refusal(reason: string): RayVerdict {
  return { isProof: false, reason };
}
