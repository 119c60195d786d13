/**
 * Owner of the factors of the current basis matrix B and of their updates.
 *
 *   ftran: solves B x = a; the right side is given by rows, the solution by positions of the basis.
 *   btran: solves Bᵀ y = c; the right side is given by positions of the basis, the solution by rows.
 *
 * `factorize` reorders the basis so that a position is the row that its variable was pivoted on: rows and positions
 * then are the same numbers, and no permutation is needed anywhere.
 */
import { tolerances } from '../control/tolerances';
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import type { ScatteredVector } from '../sparse/scattered-vector';
import { nonzeroCount, type SparseMatrix } from '../sparse/sparse-matrix';
import { appendUpdate, type UpdateOutcome } from './forrest-tomlin-update';
import { LuFactorizer, type FactorizeOutcome } from './lu-factorize';
import { LuFactors } from './lu-factors';
import { RenewalPolicy } from './renewal-policy';
import { divideInOrder, eliminateInOrder, reachOf, type ReachScratch } from './triangular-solve';

/** A right side with more than this share of nonzeros is not worth a search for what it reaches. */
const hyperSparseInput = 0.05;
/** More than this share reached, or expected from the solves before: the plain loop is cheaper. */
const hyperSparseReach = 0.1;
/** Weight of the latest solve in what is expected of the next of its kind. */
const densityMemory = 0.05;

/** What is solved for: solutions of one kind have about the same density from one iteration to the next. */
export type SolveKind = 'entering column' | 'tableau row' | 'edge weights' | 'other';
/** Updates after which the factors are renewed whatever they cost: errors grow with each. */
const mostUpdates = 100;

export class BasisFactorization {
  private readonly factors: LuFactors;
  private readonly factorizer: LuFactorizer;
  private readonly scratch: ReachScratch;
  private readonly reached: Int32Array;
  /** Partial results that an update needs: the column after L and R, the row after Uᵀ. */
  private spikeIndex = new Int32Array(64);
  private spikeValue = new Float64Array(64);
  private spikeCount = 0;
  private rowEtaIndex = new Int32Array(64);
  private rowEtaValue = new Float64Array(64);
  private rowEtaCount = 0;
  /** Work units spent in here so far, those that the caller has taken, and those before the last update. */
  private work = 0;
  private takenWork = 0;
  private workAtUpdate = 0;
  /** Entries touched by the solve under way. */
  private readonly tally = new Float64Array(1);
  private readonly renewal = new RenewalPolicy();
  private threshold: number = tolerances.markowitzThreshold;
  /** Share of nonzeros in recent solutions, by kind. */
  private readonly expectedDensity: Record<SolveKind, number> = {
    'entering column': 0,
    'tableau row': 0,
    'edge weights': 0,
    other: 0,
  };

  constructor(private readonly matrix: SparseMatrix) {
    const m = matrix.rowCount;
    this.factors = new LuFactors(m);
    this.factorizer = new LuFactorizer(matrix, this.factors);
    this.scratch = { stack: new Int32Array(m), place: new Int32Array(m), isSeen: new Uint8Array(m) };
    this.reached = new Int32Array(m);
  }

  get updateCount(): number {
    return this.factors.etaCount;
  }

  /** Work done since the last call. */
  takeWork(): number {
    const work = this.work - this.takenWork;
    this.takenWork = this.work;
    return work;
  }

  /** Larger pivots from now on: after trouble. */
  tightenThreshold(): void {
    this.threshold = Math.min(tolerances.markowitzThresholdTight, this.threshold * 2);
  }

  /** @param basicVariable length m, reordered in place (and repaired where the basis is singular) */
  factorize(basicVariable: Int32Array): FactorizeOutcome {
    const outcome = this.factorizer.factorize(basicVariable, {
      threshold: this.threshold,
      drop: tolerances.factorDrop,
      singularPivot: tolerances.singularPivot,
    });
    this.work += outcome.work;
    this.workAtUpdate = this.work;
    // With new factors come new values and reduced costs: about two passes over the matrix.
    this.renewal.noteFactorization(outcome.work, 2 * nonzeroCount(this.matrix));
    return outcome;
  }

  /** Enough updates, or solves that have become dear enough, to be worth new factors. */
  get shouldRefactorize(): boolean {
    return this.factors.etaCount >= mostUpdates || this.renewal.isDue;
  }

  /**
   * x ← B⁻¹ x.
   * @param kind of an 'entering column' what `update` needs is kept
   */
  ftran(x: ScatteredVector, kind: SolveKind = 'other'): void {
    const mayBeSparse = this.expectedDensity[kind] <= hyperSparseReach;
    this.solveLower(x, mayBeSparse);
    this.applyEtas(x);
    if (kind === 'entering column') this.keepSpike(x);
    this.solveUpper(x, mayBeSparse);
    this.learnDensity(kind, x);
  }

  /**
   * y ← B⁻ᵀ y.
   * @param kind of a 'tableau row' (y the unit vector of the leaving position) what `update` needs is kept
   */
  btran(y: ScatteredVector, kind: SolveKind = 'other'): void {
    const mayBeSparse = this.expectedDensity[kind] <= hyperSparseReach;
    this.solveUpperTransposed(y, mayBeSparse);
    if (kind === 'tableau row') this.keepRow(y);
    this.applyEtasTransposed(y);
    this.solveLowerTransposed(y, mayBeSparse);
    this.learnDensity(kind, y);
  }

  private learnDensity(kind: SolveKind, x: ScatteredVector): void {
    this.work += this.tally[0];
    this.tally[0] = 0;
    const density = x.count / this.factors.rowCount;
    this.expectedDensity[kind] += densityMemory * (density - this.expectedDensity[kind]);
  }

  /**
   * The basis after its variable at `position` was replaced by the one whose column went last through
   * `ftran` as the 'entering column'; the row went through `btran` as the 'tableau row'.
   * @param pivot the entering column's entry at the position, as computed by ftran
   */
  update(position: number, pivot: number): UpdateOutcome {
    const outcome = appendUpdate(
      this.factors,
      position,
      pivot,
      { index: this.spikeIndex, value: this.spikeValue, count: this.spikeCount },
      { index: this.rowEtaIndex, value: this.rowEtaValue, count: this.rowEtaCount },
    );
    this.work += this.spikeCount + 2 * this.rowEtaCount;
    this.renewal.noteUpdate(this.work - this.workAtUpdate);
    this.workAtUpdate = this.work;
    return outcome;
  }

  private solveLower(x: ScatteredVector, mayBeSparse: boolean): void {
    const f = this.factors;
    const m = f.rowCount;
    if (f.lowerCount === 0) return;
    if (mayBeSparse && x.count >= 0 && x.count <= hyperSparseInput * m) {
      const found = this.reach(x, f.lowerStart, f.lowerEnd, f.lowerIndex);
      if (found >= 0) {
        this.work += eliminateInOrder(
          this.reached,
          found - 1,
          -1,
          found,
          f.lowerStart,
          f.lowerEnd,
          f.lowerIndex,
          f.lowerValue,
          x.value,
        );
        this.takeReached(x, found);
        this.dropSmall(x);
        return;
      }
    }
    this.work +=
      f.lowerCount +
      eliminateInOrder(
        f.lowerOrder,
        0,
        1,
        f.lowerCount,
        f.lowerStart,
        f.lowerEnd,
        f.lowerIndex,
        f.lowerValue,
        x.value,
      );
    x.count = -1;
  }

  private solveLowerTransposed(y: ScatteredVector, mayBeSparse: boolean): void {
    const f = this.factors;
    const m = f.rowCount;
    if (f.lowerCount > 0) {
      if (mayBeSparse && y.count >= 0 && y.count <= hyperSparseInput * m) {
        const found = this.reach(y, f.lowerRowStart, f.lowerRowEnd, f.lowerRowIndex);
        if (found >= 0) {
          this.work += eliminateInOrder(
            this.reached,
            found - 1,
            -1,
            found,
            f.lowerRowStart,
            f.lowerRowEnd,
            f.lowerRowIndex,
            f.lowerRowValue,
            y.value,
          );
          this.takeReached(y, found);
          this.dropSmall(y);
          return;
        }
      }
      this.work += m + this.eliminateLowerTransposed(y.value);
      y.count = -1;
    }
    if (y.count < 0) y.relist(tolerances.solveDrop);
    else this.dropSmall(y);
  }

  private eliminateLowerTransposed(y: Float64Array): number {
    // From the last pivot to the first: a column's dot product needs only rows that were pivoted later.
    const { lowerOrder, lowerCount, lowerStart, lowerEnd, lowerIndex, lowerValue } = this.factors;
    let touched = 0;
    for (let k = lowerCount - 1; k >= 0; k--) {
      const row = lowerOrder[k];
      const last = lowerEnd[row];
      let sum = 0;
      for (let at = lowerStart[row]; at < last; at++) sum += lowerValue[at] * y[lowerIndex[at]];
      y[row] -= sum;
      touched += last - lowerStart[row];
    }
    return touched;
  }

  private solveUpper(x: ScatteredVector, mayBeSparse: boolean): void {
    const f = this.factors;
    const m = f.rowCount;
    if (mayBeSparse && x.count >= 0 && x.count <= hyperSparseInput * m) {
      const found = this.reach(x, f.upperStart, f.upperEnd, f.upperIndex);
      if (found >= 0) {
        this.divideReached(x, found, f.upperStart, f.upperEnd, f.upperIndex, f.upperValue);
        return;
      }
    }
    x.count = divideInOrder(
      f.upperOrder,
      f.upperCount - 1,
      -1,
      f.upperCount,
      f.upperStart,
      f.upperEnd,
      f.upperIndex,
      f.upperValue,
      f.diagonal,
      tolerances.solveDrop,
      x.value,
      x.index,
      this.tally,
    );
    this.work += f.upperCount + x.count;
  }

  private solveUpperTransposed(y: ScatteredVector, mayBeSparse: boolean): void {
    const f = this.factors;
    const m = f.rowCount;
    if (mayBeSparse && y.count >= 0 && y.count <= hyperSparseInput * m) {
      const found = this.reach(y, f.upperRowStart, f.upperRowEnd, f.upperRowIndex);
      if (found >= 0) {
        this.divideReached(y, found, f.upperRowStart, f.upperRowEnd, f.upperRowIndex, f.upperRowValue);
        return;
      }
    }
    y.count = divideInOrder(
      f.upperOrder,
      0,
      1,
      f.upperCount,
      f.upperRowStart,
      f.upperRowEnd,
      f.upperRowIndex,
      f.upperRowValue,
      f.diagonal,
      tolerances.solveDrop,
      y.value,
      y.index,
      this.tally,
    );
    this.work += f.upperCount + y.count;
  }

  private divideReached(
    x: ScatteredVector,
    found: number,
    start: Int32Array,
    end: Int32Array,
    index: Int32Array,
    value: Float64Array,
  ): void {
    x.count = divideInOrder(
      this.reached,
      found - 1,
      -1,
      found,
      start,
      end,
      index,
      value,
      this.factors.diagonal,
      tolerances.solveDrop,
      x.value,
      x.index,
      this.tally,
    );
    this.work += 2 * found;
  }

  private reach(x: ScatteredVector, start: Int32Array, end: Int32Array, index: Int32Array): number {
    const found = reachOf(
      x.index,
      x.count,
      start,
      end,
      index,
      this.scratch,
      this.reached,
      hyperSparseReach * this.factors.rowCount,
    );
    this.work += found >= 0 ? 2 * found : Math.ceil(hyperSparseReach * this.factors.rowCount);
    return found;
  }

  private takeReached(x: ScatteredVector, found: number): void {
    const { index } = x;
    for (let k = 0; k < found; k++) index[k] = this.reached[k];
    x.count = found;
  }

  private dropSmall(x: ScatteredVector): void {
    const { value, index } = x;
    let kept = 0;
    for (let k = 0; k < x.count; k++) {
      const place = index[k];
      const entry = value[place];
      if (entry < tolerances.solveDrop && entry > -tolerances.solveDrop) value[place] = 0;
      else index[kept++] = place;
    }
    x.count = kept;
  }

  /** x[row of each update] takes part of the other rows, in the order of the updates. */
  private applyEtas(x: ScatteredVector): void {
    const { etaCount, etaRow, etaStart, etaIndex, etaValue } = this.factors;
    const { value } = x;
    for (let update = 0; update < etaCount; update++) {
      let sum = 0;
      const last = etaStart[update + 1];
      for (let at = etaStart[update]; at < last; at++) sum += etaValue[at] * value[etaIndex[at]];
      if (sum === 0) continue;
      const row = etaRow[update];
      if (value[row] === 0 && x.count >= 0) x.index[x.count++] = row;
      const updated = value[row] + sum;
      value[row] = updated === 0 ? 1e-300 : updated; // stays listed once
    }
    this.work += etaStart[etaCount];
  }

  private applyEtasTransposed(y: ScatteredVector): void {
    const { etaCount, etaRow, etaStart, etaIndex, etaValue } = this.factors;
    const { value } = y;
    for (let update = etaCount - 1; update >= 0; update--) {
      const pivotValue = value[etaRow[update]];
      if (pivotValue === 0) continue;
      const last = etaStart[update + 1];
      for (let at = etaStart[update]; at < last; at++) {
        const row = etaIndex[at];
        if (value[row] === 0 && y.count >= 0) y.index[y.count++] = row;
        const updated = value[row] + pivotValue * etaValue[at];
        value[row] = updated === 0 ? 1e-300 : updated;
      }
      this.work += last - etaStart[update];
    }
  }

  private keepSpike(x: ScatteredVector): void {
    if (x.count < 0) x.relist(tolerances.solveDrop);
    this.spikeIndex = grownInt32(this.spikeIndex, x.count);
    this.spikeValue = grownFloat64(this.spikeValue, x.count);
    this.spikeCount = keepNonzeros(x, this.spikeIndex, this.spikeValue);
  }

  private keepRow(y: ScatteredVector): void {
    if (y.count < 0) y.relist(tolerances.solveDrop);
    this.rowEtaIndex = grownInt32(this.rowEtaIndex, y.count);
    this.rowEtaValue = grownFloat64(this.rowEtaValue, y.count);
    this.rowEtaCount = keepNonzeros(y, this.rowEtaIndex, this.rowEtaValue);
  }
}

function keepNonzeros(x: ScatteredVector, index: Int32Array, value: Float64Array): number {
  let kept = 0;
  for (let k = 0; k < x.count; k++) {
    const entry = x.value[x.index[k]];
    if (entry < tolerances.solveDrop && entry > -tolerances.solveDrop) continue;
    index[kept] = x.index[k];
    value[kept++] = entry;
  }
  return kept;
}
