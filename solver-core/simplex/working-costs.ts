/**
 * Owner of the costs in use: the stated ones, perturbed or shifted ones of the dual algorithm, or those of primal
 * phase one. There is always a way back.
 */
import { SeededRandom } from '../numerics/seeded-random';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import { tolerances } from '../control/tolerances';
import type { ComputationalForm } from './computational-form';

export class WorkingCosts {
  private readonly inUse: Float64Array;
  private changed: 'stated' | 'perturbed' | 'phase one' = 'stated';

  constructor(private readonly form: ComputationalForm) {
    this.inUse = form.cost.slice();
  }

  /** Length n + m. */
  get cost(): ReadonlyFloat64Array {
    return this.inUse;
  }

  get kind(): 'stated' | 'perturbed' | 'phase one' {
    return this.changed;
  }

  restore(): void {
    for (let k = 0; k < this.form.variableCount; k++) this.inUse[k] = this.form.cost[k];
    this.changed = 'stated';
  }

  /**
   * Perturbs the costs in the direction that keeps reduced costs feasible, against ties in the dual ratio test.
   * Source: Koberstein (2005), §6.3.2.
   */
  perturb(seed: number): void {
    const { form, inUse } = this;
    const random = new SeededRandom(seed);
    let largest = 0;
    for (let k = 0; k < form.columnCount; k++) largest = Math.max(largest, Math.abs(form.cost[k]));
    // Very large costs are perturbed less than in proportion: what is added has to be taken away again.
    const size = tolerances.costPerturbation * (largest > 100 ? Math.sqrt(Math.sqrt(largest / 100)) : 1);
    for (let k = 0; k < form.variableCount; k++) {
      const hasLower = form.lower[k] > -Infinity;
      const hasUpper = form.upper[k] < Infinity;
      const spread = 1 + random.next();
      if (form.lower[k] === form.upper[k] || (!hasLower && !hasUpper)) continue;
      const amount =
        k < form.columnCount ? (1 + Math.abs(form.cost[k])) * size * spread : size * 1e-3 * spread;
      const isUpward = hasLower && hasUpper ? form.cost[k] >= 0 : hasLower;
      inUse[k] += isUpward ? amount : -amount;
    }
    this.changed = 'perturbed';
  }

  /** Adds to one cost, to keep a reduced cost feasible. */
  shift(variable: number, amount: number): void {
    this.inUse[variable] += amount;
    if (this.changed === 'stated') this.changed = 'perturbed';
  }

  /** Starts primal phase one: all costs 0, set one by one with `setPhaseOneCost`. */
  clearForPhaseOne(): void {
    this.inUse.fill(0);
    this.changed = 'phase one';
  }

  setPhaseOneCost(variable: number, cost: number): void {
    this.inUse[variable] = cost;
  }
}
