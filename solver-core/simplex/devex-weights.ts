/**
 * Owner of the Devex reference weights of the primal algorithm: an estimate of ‖B⁻¹ a_j‖² over the reference framework,
 * which is the set of nonbasic variables at the last reset.
 *
 * Source: Harris (1973), "Pivot selection methods of the Devex LP code", Math. Programming 5; Forrest and Goldfarb
 * (1992), §4.
 */
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { ScatteredVector } from '../sparse/scattered-vector';
import type { ComputationalForm } from './computational-form';

/** A weight that grew beyond this says nothing any more: a new framework starts. */
const largestWeight = 1e9;

export class DevexWeights {
  private readonly weights: Float64Array;

  constructor(form: ComputationalForm) {
    this.weights = new Float64Array(form.variableCount).fill(1);
  }

  /** Length n + m; valid for nonbasic variables. */
  get weight(): ReadonlyFloat64Array {
    return this.weights;
  }

  reset(): void {
    this.weights.fill(1);
  }

  /**
   * Weights after the pivot, called before it is applied.
   * @param row tableau row of the leaving position, nonbasic entries listed
   */
  update(entering: number, leaving: number, alpha: number, row: ScatteredVector): void {
    const { weights } = this;
    const enteringWeight = weights[entering];
    const { index, value, count } = row;
    for (let k = 0; k < count; k++) {
      const variable = index[k];
      const ratio = value[variable] / alpha;
      const candidate = ratio * ratio * enteringWeight;
      if (candidate > weights[variable]) weights[variable] = candidate;
    }
    const leavingWeight = Math.max(1, enteringWeight / (alpha * alpha));
    if (leavingWeight > largestWeight) this.reset();
    else weights[leaving] = leavingWeight;
  }
}
