/**
 * Owner of z, the value of every variable, length n + m: nonbasic ones stand at a bound (free ones at 0), basic ones
 * solve B z_B = −N z_N.
 */
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';
import { ScatteredVector } from '../sparse/scattered-vector';
import type { BasisFactorization } from '../factorization/basis-factorization';
import type { ComputationalForm } from './computational-form';
import { nonbasicFixed, type WorkingBasis } from './working-basis';
import type { WorkingBounds } from './working-bounds';

export class PrimalValues {
  private readonly z: Float64Array;
  /** Length m: squared infeasibility of each position's variable, 0 within the tolerance. */
  private readonly squares: Float64Array;
  private readonly scratchColumn: ScatteredVector;

  constructor(
    private readonly form: ComputationalForm,
    private readonly basis: WorkingBasis,
    private readonly bounds: WorkingBounds,
    /** Infeasibilities up to this count as none; absolute, space of the form. */
    readonly tolerance: number,
  ) {
    this.squares = new Float64Array(form.rowCount);
    this.z = new Float64Array(form.variableCount);
    this.scratchColumn = new ScatteredVector(form.rowCount);
  }

  get value(): ReadonlyFloat64Array {
    return this.z;
  }

  /** Length m, by position: infeasibility² of the basic variable, 0 where it is within the tolerance. */
  get squaredInfeasibility(): ReadonlyFloat64Array {
    return this.squares;
  }

  /** All values afresh from statuses and bounds. */
  recompute(factorization: BasisFactorization): void {
    const { form, basis, z, scratchColumn } = this;
    const { columnStart, rowIndex, value } = form.matrix;
    const right = scratchColumn.value;
    right.fill(0);
    for (let variable = 0; variable < form.variableCount; variable++) {
      if (basis.status[variable] === VariableStatus.basic) continue;
      const at = this.restingValue(variable);
      z[variable] = at;
      if (at === 0) continue;
      if (variable >= form.columnCount) right[variable - form.columnCount] += at;
      else {
        for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
          right[rowIndex[entry]] -= value[entry] * at;
        }
      }
    }
    scratchColumn.count = -1;
    factorization.ftran(scratchColumn);
    for (let position = 0; position < form.rowCount; position++) {
      z[basis.basicVariable[position]] = right[position];
      this.watch(position);
    }
    right.fill(0);
    scratchColumn.count = 0;
  }

  /** Moves the basic variables along a column: z_B −= step × direction, which is listed. */
  stepBasics(step: number, direction: ScatteredVector): void {
    stepListed(
      this.z,
      this.squares,
      this.basis.basicVariable,
      this.bounds.lower,
      this.bounds.upper,
      this.tolerance,
      step,
      direction.index,
      direction.value,
      direction.count,
    );
  }

  /** Takes down the infeasibility of a position after its value, its variable or its bounds changed. */
  watch(position: number): void {
    const amount = this.infeasibility(this.basis.basicVariable[position]);
    this.squares[position] = amount > this.tolerance ? amount * amount : 0;
  }

  set(variable: number, value: number): void {
    this.z[variable] = value;
  }

  add(variable: number, step: number): void {
    this.z[variable] += step;
  }

  /** Where a nonbasic variable stands. */
  restingValue(variable: number): number {
    switch (this.basis.status[variable]) {
      case VariableStatus.atLower:
      case nonbasicFixed:
        return this.bounds.lower[variable];
      case VariableStatus.atUpper:
        return this.bounds.upper[variable];
      default:
        return 0;
    }
  }

  /** By how much a variable lies outside its bounds; 0 inside. */
  infeasibility(variable: number): number {
    const at = this.z[variable];
    const below = this.bounds.lower[variable] - at;
    if (below > 0) return below;
    const above = at - this.bounds.upper[variable];
    return above > 0 ? above : 0;
  }

  /** Sum and greatest of the basic variables' infeasibilities above a tolerance. */
  infeasibilities(tolerance: number): { sum: number; count: number; largest: number } {
    let sum = 0;
    let count = 0;
    let largest = 0;
    for (let position = 0; position < this.form.rowCount; position++) {
      const amount = this.infeasibility(this.basis.basicVariable[position]);
      if (amount <= tolerance) continue;
      sum += amount;
      count++;
      largest = Math.max(largest, amount);
    }
    return { sum, count, largest };
  }
}

/**
 * z_B −= step × direction at the listed positions, and their squared infeasibilities afresh.
 * hot: once or twice an iteration.
 */
function stepListed(
  z: Float64Array,
  squares: Float64Array,
  basicVariable: ReadonlyInt32Array,
  lower: ReadonlyFloat64Array,
  upper: ReadonlyFloat64Array,
  tolerance: number,
  step: number,
  index: Int32Array,
  direction: Float64Array,
  count: number,
): void {
  for (let k = 0; k < count; k++) {
    const position = index[k];
    const variable = basicVariable[position];
    const at = z[variable] - step * direction[position];
    z[variable] = at;
    let amount = lower[variable] - at;
    if (amount < tolerance) amount = at - upper[variable];
    squares[position] = amount > tolerance ? amount * amount : 0;
  }
}
