/**
 * Owner of the bounds in use: the stated ones, or the artificial box of dual phase one, or slightly relaxed ones that
 * break ties in the primal algorithm. There is always a way back.
 */
import { SeededRandom } from '../numerics/seeded-random';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { ComputationalForm } from './computational-form';

/** Width of the box for free variables in dual phase one: they must be driven out first (Koberstein 2005, §4.2). */
const freeBox = 1000;

export class WorkingBounds {
  private readonly lowerInUse: Float64Array;
  private readonly upperInUse: Float64Array;
  private changed: 'stated' | 'box' | 'relaxed' = 'stated';

  constructor(private readonly form: ComputationalForm) {
    this.lowerInUse = form.lower.slice();
    this.upperInUse = form.upper.slice();
  }

  /** Length n + m. */
  get lower(): ReadonlyFloat64Array {
    return this.lowerInUse;
  }

  get upper(): ReadonlyFloat64Array {
    return this.upperInUse;
  }

  get kind(): 'stated' | 'box' | 'relaxed' {
    return this.changed;
  }

  restore(): void {
    for (let k = 0; k < this.form.variableCount; k++) {
      this.lowerInUse[k] = this.form.lower[k];
      this.upperInUse[k] = this.form.upper[k];
    }
    this.changed = 'stated';
  }

  /**
   * The box of dual phase one: its optimum is 0 exactly when the problem has a dual feasible basis.
   * Source: Koberstein (2005), "The dual simplex method, techniques for a fast and stable implementation", §4.2.
   */
  boxForPhaseOne(): void {
    const { lower, upper } = this.form;
    for (let k = 0; k < this.form.variableCount; k++) {
      const hasLower = lower[k] > -Infinity;
      const hasUpper = upper[k] < Infinity;
      this.lowerInUse[k] = hasLower ? 0 : hasUpper ? -1 : -freeBox;
      this.upperInUse[k] = hasUpper ? 0 : hasLower ? 1 : freeBox;
    }
    this.changed = 'box';
  }

  /** Moves every bound outwards by a small seeded amount, so that few basic variables meet one at the same step. */
  relax(seed: number, size: number): void {
    const random = new SeededRandom(seed);
    for (let k = 0; k < this.form.variableCount; k++) {
      const lower = this.form.lower[k];
      const upper = this.form.upper[k];
      this.lowerInUse[k] = lower - size * (1 + Math.abs(lower)) * (1 + random.next());
      this.upperInUse[k] = upper + size * (1 + Math.abs(upper)) * (1 + random.next());
      if (lower === -Infinity) this.lowerInUse[k] = lower;
      if (upper === Infinity) this.upperInUse[k] = upper;
    }
    this.changed = 'relaxed';
  }
}
