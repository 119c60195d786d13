/**
 * Owner of d, the reduced cost of every variable, length n + m: d = c − [A | −I]ᵀ y with Bᵀ y = c_B, so 0 for basic
 * variables, and cost + y_i for the logical of row i. Minimisation: d ≥ 0 is right at a lower bound, d ≤ 0 at an
 * upper one, d = 0 for a free variable.
 */
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import { ScatteredVector } from '../sparse/scattered-vector';
import type { BasisFactorization } from '../factorization/basis-factorization';
import type { ComputationalForm } from './computational-form';
import type { WorkingBasis } from './working-basis';
import type { WorkingCosts } from './working-costs';

export class ReducedCosts {
  private readonly d: Float64Array;
  private readonly scratchRow: ScatteredVector;

  constructor(
    private readonly form: ComputationalForm,
    private readonly basis: WorkingBasis,
    private readonly costs: WorkingCosts,
  ) {
    this.d = new Float64Array(form.variableCount);
    this.scratchRow = new ScatteredVector(form.rowCount);
  }

  get value(): ReadonlyFloat64Array {
    return this.d;
  }

  /** All reduced costs afresh from the costs in use. */
  recompute(factorization: BasisFactorization): void {
    const { form, basis, d, scratchRow } = this;
    const { cost } = this.costs;
    const y = scratchRow.value;
    for (let position = 0; position < form.rowCount; position++)
      y[position] = cost[basis.basicVariable[position]];
    scratchRow.count = -1;
    factorization.btran(scratchRow);
    for (let variable = 0; variable < form.columnCount; variable++) d[variable] = cost[variable];
    const { columnStart, rowIndex, value } = form.rowMatrix;
    for (let row = 0; row < form.rowCount; row++) {
      const price = y[row];
      d[form.columnCount + row] = cost[form.columnCount + row] + price;
      if (price === 0) continue;
      for (let entry = columnStart[row]; entry < columnStart[row + 1]; entry++)
        d[rowIndex[entry]] -= price * value[entry];
    }
    for (let position = 0; position < form.rowCount; position++) d[basis.basicVariable[position]] = 0;
    y.fill(0);
    scratchRow.count = 0;
  }

  /** d −= step × row of the tableau (nonbasic entries listed). */
  stepAlongRow(step: number, row: ScatteredVector): void {
    const { d } = this;
    if (step === 0) return;
    const { index, value, count } = row;
    for (let k = 0; k < count; k++) {
      const variable = index[k];
      d[variable] -= step * value[variable];
    }
  }

  set(variable: number, value: number): void {
    this.d[variable] = value;
  }

  /** By how much a nonbasic variable's reduced cost has the wrong sign; 0 where it is right. Fixed ones are always right. */
  infeasibility(variable: number): number {
    const reducedCost = this.d[variable];
    switch (this.basis.status[variable]) {
      case VariableStatus.free:
        return Math.abs(reducedCost);
      case VariableStatus.atLower:
        return Math.max(0, -reducedCost);
      case VariableStatus.atUpper:
        return Math.max(0, reducedCost);
      default:
        return 0; // basic or fixed
    }
  }

  infeasibilities(tolerance: number): { sum: number; count: number; largest: number } {
    let sum = 0;
    let count = 0;
    let largest = 0;
    for (let variable = 0; variable < this.form.variableCount; variable++) {
      const amount = this.infeasibility(variable);
      if (amount <= tolerance) continue;
      sum += amount;
      count++;
      largest = Math.max(largest, amount);
    }
    return { sum, count, largest };
  }
}
