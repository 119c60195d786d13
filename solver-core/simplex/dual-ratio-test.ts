/**
 * Chooses the entering variable of the dual algorithm. Boxed variables whose reduced cost changes sign are flipped to
 * their other bounds and passed over while that still leaves the leaving row infeasible (the long step); among
 * breakpoints that lie within a small tolerance of each other the largest pivot is taken.
 *
 * Source: Maros (2003), "Computational Techniques of the Simplex Method", §7.6 (bound flipping); Harris (1973), "Pivot
 * selection methods of the Devex LP code", Math. Programming 5 (tolerance); Koberstein (2005), §3.3 and §6.2.
 */
import { VariableStatus } from '../linear-program/basis';
import { tolerances } from '../control/tolerances';
import type { ScatteredVector } from '../sparse/scattered-vector';
import { BreakpointHeap } from './breakpoint-heap';
import type { SimplexIterate } from './simplex-iterate';

export class DualRatioTest {
  /** Boxed variables to flip before the pivot; only the first flipCount are valid. */
  readonly flips: Int32Array;
  flipCount = 0;
  private readonly heap: BreakpointHeap;
  /** Popped breakpoints in ascending order of their steps. */
  private readonly passed: Int32Array;
  /** First popped breakpoint of each group, one more at the end. */
  private readonly groupStart: Int32Array;

  constructor(private readonly iterate: SimplexIterate) {
    const { variableCount } = iterate.form;
    this.flips = new Int32Array(variableCount);
    this.heap = new BreakpointHeap(variableCount);
    this.passed = new Int32Array(variableCount);
    this.groupStart = new Int32Array(variableCount + 1);
  }

  /**
   * @param row tableau row of the leaving position, nonbasic entries listed
   * @param sign +1 when the leaving variable is above its upper bound, −1 when below its lower one
   * @param infeasibility by how much (> 0)
   * @param primalTolerance what may be left of it
   * @returns entering variable, or −1: with every breakpoint passed the row stays infeasible
   */
  choose(row: ScatteredVector, sign: number, infeasibility: number, primalTolerance: number): number {
    this.collectBreakpoints(row, sign, tolerances.ratioTestPivot);
    const entering = this.passBreakpoints(row, infeasibility, primalTolerance);
    if (entering >= 0) return entering;
    this.collectBreakpoints(row, sign, tolerances.ratioTestLastPivot);
    return this.passBreakpoints(row, infeasibility, primalTolerance);
  }

  private passBreakpoints(row: ScatteredVector, infeasibility: number, primalTolerance: number): number {
    const { heap, passed, groupStart } = this;
    const slack = tolerances.harrisDualSlack;
    this.flipCount = 0;
    if (heap.count === 0) return -1;
    const { lower, upper } = this.iterate.bounds;
    const d = this.iterate.reduced.value;
    const alpha = row.value;
    let slope = infeasibility;
    let passedCount = 0;
    let groupCount = 0;
    let largestPivot = 0;
    let isBlocked = false;
    while (heap.count > 0 && !isBlocked) {
      groupStart[groupCount++] = passedCount;
      let reach = Infinity;
      while (heap.leastStep <= reach) {
        const variable = heap.pop();
        passed[passedCount++] = variable;
        const size = Math.abs(alpha[variable]);
        largestPivot = Math.max(largestPivot, size);
        reach = Math.min(reach, (Math.abs(d[variable]) + slack) / size);
        slope -= size * (upper[variable] - lower[variable]); // −Infinity where a bound is missing
      }
      isBlocked = slope < 0;
    }
    groupStart[groupCount] = passedCount;
    if (!isBlocked && slope > primalTolerance) return -1;
    return this.chooseAmongGroups(groupCount, alpha, largestPivot);
  }

  private collectBreakpoints(row: ScatteredVector, sign: number, pivotTolerance: number): void {
    const { heap } = this;
    const { status } = this.iterate.basis;
    const d = this.iterate.reduced.value;
    const { index, value, count } = row;
    heap.clear();
    for (let k = 0; k < count; k++) {
      const variable = index[k];
      const entry = sign * value[variable];
      const stands = status[variable];
      let step: number;
      if (stands === VariableStatus.atLower) {
        if (entry < pivotTolerance) continue;
        step = d[variable] / entry;
      } else if (stands === VariableStatus.atUpper) {
        if (entry > -pivotTolerance) continue;
        step = d[variable] / entry;
      } else {
        if (entry < pivotTolerance && entry > -pivotTolerance) continue;
        step = 0; // free: its reduced cost must stay 0
      }
      heap.push(variable, step > 0 ? step : 0);
    }
    heap.order();
  }

  /** The last group with a pivot that is large enough against all that were met; what lies before it is flipped. */
  private chooseAmongGroups(groupCount: number, alpha: Float64Array, largestPivot: number): number {
    const { passed, groupStart } = this;
    const { lower, upper } = this.iterate.bounds;
    const wanted = Math.min(0.1 * largestPivot, 1);
    let entering = -1;
    let chosenGroup = 0;
    for (let group = groupCount - 1; group >= 0; group--) {
      let best = -1;
      let bestSize = 0;
      for (let k = groupStart[group]; k < groupStart[group + 1]; k++) {
        const size = Math.abs(alpha[passed[k]]);
        if (size > bestSize || (size === bestSize && passed[k] < best)) {
          bestSize = size;
          best = passed[k];
        }
      }
      if (bestSize >= wanted) {
        entering = best;
        chosenGroup = group;
        break;
      }
    }
    for (let k = 0; k < groupStart[chosenGroup]; k++) {
      const variable = passed[k];
      if (lower[variable] < upper[variable]) this.flips[this.flipCount++] = variable;
    }
    return entering;
  }
}
