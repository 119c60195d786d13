/**
 * Chooses the leaving variable of the primal algorithm, or a flip of the entering one to its other bound.
 *
 * Phase two: the first bound met, with Harris's tolerance for the sake of a larger pivot. Phase one: infeasible basic
 * variables may pass their bounds as long as the sum of infeasibilities keeps falling.
 *
 * Source: Harris (1973), Math. Programming 5; Maros (2003), "Computational Techniques of the Simplex Method", §9.5–9.6.
 */
import { VariableStatus } from '../linear-program/basis';
import { tolerances } from '../control/tolerances';
import type { ScatteredVector } from '../sparse/scattered-vector';
import { BreakpointHeap } from './breakpoint-heap';
import type { SimplexIterate } from './simplex-iterate';

export type PrimalRatioOutcome = 'pivot' | 'flip' | 'unbounded';

export class PrimalRatioTest {
  /** After 'pivot': the position that leaves, where it goes, and the signed change of the entering variable. */
  position = -1;
  leavingStatus: number = VariableStatus.atLower;
  step = 0;
  private readonly heap: BreakpointHeap;
  private readonly passed: Int32Array;

  constructor(private readonly iterate: SimplexIterate) {
    // In phase one a position may meet two bounds: items position (lower) and m + position (upper).
    this.heap = new BreakpointHeap(2 * iterate.form.rowCount);
    this.passed = new Int32Array(2 * iterate.form.rowCount);
  }

  /**
   * @param column B⁻¹ a_entering, listed
   * @param direction +1 when the entering variable grows, −1 when it falls
   * @param usesFirstBound ties go to the least variable number, no tolerance (with the least-number entering rule)
   */
  choosePhaseTwo(
    entering: number,
    column: ScatteredVector,
    direction: number,
    feasibilityTolerance: number,
    usesFirstBound: boolean,
  ): PrimalRatioOutcome {
    const slack = usesFirstBound ? 0 : feasibilityTolerance;
    const outcome = this.firstBound(
      entering,
      column,
      direction,
      slack,
      usesFirstBound,
      tolerances.ratioTestPivot,
    );
    if (outcome !== 'unbounded') return outcome;
    return this.firstBound(entering, column, direction, slack, usesFirstBound, tolerances.ratioTestLastPivot);
  }

  private firstBound(
    entering: number,
    column: ScatteredVector,
    direction: number,
    slack: number,
    usesFirstBound: boolean,
    pivotTolerance: number,
  ): PrimalRatioOutcome {
    const { basis, bounds, primal } = this.iterate;
    const { basicVariable } = basis;
    const { lower, upper } = bounds;
    const z = primal.value;
    const { index, value, count } = column;
    let reach = Infinity;
    for (let k = 0; k < count; k++) {
      const rate = -direction * value[index[k]];
      if (rate < pivotTolerance && rate > -pivotTolerance) continue;
      const variable = basicVariable[index[k]];
      const room = rate > 0 ? upper[variable] - z[variable] : lower[variable] - z[variable];
      const step = (rate > 0 ? Math.max(room, 0) + slack : Math.min(room, 0) - slack) / rate;
      if (step < reach) reach = step;
    }
    const ownRange = upper[entering] - lower[entering];
    if (ownRange <= reach) {
      if (ownRange === Infinity) return 'unbounded';
      this.step = direction * ownRange;
      return 'flip';
    }
    if (reach === Infinity) return 'unbounded';
    let bestSize = 0;
    this.position = -1;
    for (let k = 0; k < count; k++) {
      const position = index[k];
      const rate = -direction * value[position];
      const size = Math.abs(rate);
      if (size < pivotTolerance) continue;
      const variable = basicVariable[position];
      const room = rate > 0 ? upper[variable] - z[variable] : lower[variable] - z[variable];
      if (Math.max(0, room / rate) > reach) continue;
      const isBetter = usesFirstBound
        ? this.position < 0 || variable < basicVariable[this.position]
        : size > bestSize || (size === bestSize && variable < basicVariable[this.position]);
      if (!isBetter) continue;
      bestSize = size;
      this.position = position;
    }
    this.takePosition(column, direction);
    return 'pivot';
  }

  /** @param slope |d_entering|: the rate at which the sum of infeasibilities falls at first */
  choosePhaseOne(
    entering: number,
    column: ScatteredVector,
    direction: number,
    slope: number,
    feasibilityTolerance: number,
  ): PrimalRatioOutcome {
    const { heap, passed } = this;
    const m = this.iterate.form.rowCount;
    const { bounds } = this.iterate;
    this.collectPhaseOne(column, direction, feasibilityTolerance);
    const ownRange = bounds.upper[entering] - bounds.lower[entering];
    let rest = slope;
    let passedCount = 0;
    let largest = 0;
    while (heap.count > 0 && rest > 0 && heap.leastStep <= ownRange) {
      const item = heap.pop();
      const position = item >= m ? item - m : item;
      const size = Math.abs(column.value[position]);
      passed[passedCount++] = item;
      largest = Math.max(largest, size);
      rest -= size;
    }
    if (rest > 0) {
      if (ownRange < Infinity) {
        this.step = direction * ownRange;
        return 'flip';
      }
      if (passedCount === 0) return 'unbounded';
    }
    // The last breakpoint whose pivot is large enough; an earlier one only shortens the step.
    for (let k = passedCount - 1; k >= 0; k--) {
      const item = passed[k];
      this.position = item >= m ? item - m : item;
      if (Math.abs(column.value[this.position]) < 0.1 * largest) continue;
      const variable = this.iterate.basis.basicVariable[this.position];
      const isUpper = item >= m;
      const bound = isUpper ? bounds.upper[variable] : bounds.lower[variable];
      this.leavingStatus = isUpper ? VariableStatus.atUpper : VariableStatus.atLower;
      this.step = (this.iterate.primal.value[variable] - bound) / column.value[this.position];
      break;
    }
    return 'pivot';
  }

  private collectPhaseOne(column: ScatteredVector, direction: number, tolerance: number): void {
    const { heap } = this;
    const { basis, bounds, primal } = this.iterate;
    const m = this.iterate.form.rowCount;
    const z = primal.value;
    heap.clear();
    for (let k = 0; k < column.count; k++) {
      const position = column.index[k];
      const rate = -direction * column.value[position];
      if (Math.abs(rate) < tolerances.ratioTestPivot) continue;
      const variable = basis.basicVariable[position];
      const at = z[variable];
      const lower = bounds.lower[variable];
      const upper = bounds.upper[variable];
      if (rate > 0) {
        if (at < lower - tolerance) heap.push(position, (lower - at) / rate);
        if (at <= upper + tolerance && upper < Infinity)
          heap.push(m + position, Math.max(0, upper - at) / rate);
      } else {
        if (at > upper + tolerance) heap.push(m + position, (upper - at) / rate);
        if (at >= lower - tolerance && lower > -Infinity) heap.push(position, Math.min(0, lower - at) / rate);
      }
    }
    heap.order();
  }

  private takePosition(column: ScatteredVector, direction: number): void {
    const { basis, bounds, primal } = this.iterate;
    const rate = -direction * column.value[this.position];
    const variable = basis.basicVariable[this.position];
    const bound = rate > 0 ? bounds.upper[variable] : bounds.lower[variable];
    this.leavingStatus = rate > 0 ? VariableStatus.atUpper : VariableStatus.atLower;
    this.step = (primal.value[variable] - bound) / column.value[this.position];
  }
}
