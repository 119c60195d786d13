/**
 * Owner of the dual steepest edge weights: ‖B⁻ᵀ e_r‖² of each basic variable's position r, kept by variable so that a
 * refactorization, which reorders positions, leaves them alone.
 *
 * Source: Forrest and Goldfarb (1992), "Steepest-edge simplex algorithms for linear programming", Math. Programming 57.
 */
import { tolerances } from '../control/tolerances';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { ScatteredVector } from '../sparse/scattered-vector';
import type { ComputationalForm } from './computational-form';
import type { WorkingBasis } from './working-basis';

export class DualSteepestEdge {
  private readonly weights: Float64Array;

  constructor(
    form: ComputationalForm,
    private readonly basis: WorkingBasis,
  ) {
    this.weights = new Float64Array(form.variableCount).fill(1);
  }

  /** Length n + m; valid for basic variables. */
  get weight(): ReadonlyFloat64Array {
    return this.weights;
  }

  /** Exact for a logical basis, a fresh reference elsewhere. */
  reset(): void {
    this.weights.fill(1);
  }

  /** The weight of a position, now known exactly. */
  correct(variable: number, exact: number): void {
    this.weights[variable] = exact;
  }

  /**
   * Weights after the pivot, called before it is applied.
   * @param column α_q = B⁻¹ a_q
   * @param tau B⁻¹ ρ with ρ = B⁻ᵀ e_position
   */
  update(
    position: number,
    entering: number,
    alpha: number,
    column: ScatteredVector,
    tau: ScatteredVector,
  ): void {
    const { weights } = this;
    const { basicVariable } = this.basis;
    const leavingWeight = weights[basicVariable[position]];
    const newWeight = leavingWeight / (alpha * alpha);
    const factor = -2 / alpha;
    const columnValue = column.value;
    const tauValue = tau.value;
    const count = column.count;
    for (let k = 0; k < count; k++) {
      const at = column.index[k];
      if (at === position) continue;
      const ratio = columnValue[at];
      const variable = basicVariable[at];
      const updated = weights[variable] + ratio * (newWeight * ratio + factor * tauValue[at]);
      weights[variable] = updated > tolerances.leastEdgeWeight ? updated : tolerances.leastEdgeWeight;
    }
    weights[entering] = Math.max(newWeight, tolerances.leastEdgeWeight);
  }
}
