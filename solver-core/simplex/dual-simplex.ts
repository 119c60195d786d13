/**
 * The iteration loop of the dual simplex algorithm. It starts from a dual feasible iterate and keeps it so (up to the
 * tolerances and shifts of the ratio test) until it is primal feasible.
 *
 * Source: Koberstein (2005), "The dual simplex method, techniques for a fast and stable implementation", ch. 3 and 8.
 */
import { tolerances } from '../control/tolerances';
import type { WorkMeter } from '../control/work-meter';
import { VariableStatus } from '../linear-program/basis';
import { ScatteredVector } from '../sparse/scattered-vector';
import { chooseLeavingRow } from './dual-pricing';
import { DualRatioTest } from './dual-ratio-test';
import { DualSteepestEdge } from './dual-steepest-edge';
import type { LoopEnd } from './loop-end';
import { refinedRowSolve } from './refine-solution';
import type { SimplexIterate } from './simplex-iterate';
import { tableauRow } from './tableau-row';

/** Iterations between two looks at the objective, beyond one for each row. */
const iterationsBetweenLooks = 300;

export class DualSimplex {
  readonly weights: DualSteepestEdge;
  /** After 'infeasible': the position that cannot be made feasible, with the sign of the ratio test. */
  private infeasiblePosition = -1;
  private infeasibleSign = 0;
  private readonly ratioTest: DualRatioTest;
  private readonly rho: ScatteredVector;
  private readonly row: ScatteredVector;
  private readonly column: ScatteredVector;
  private readonly tau: ScatteredVector;
  /** Length m: positions passed over until the next pivot, since their pivots could not be trusted. */
  private readonly isBarred: Uint8Array;
  private barredCount = 0;
  private needsFactorization = false;
  /** Objective at the last look, and the iteration of the next one. */
  private objectiveSeen = -Infinity;
  private nextLook = 0;

  constructor(private readonly iterate: SimplexIterate) {
    const { rowCount, variableCount } = iterate.form;
    this.weights = new DualSteepestEdge(iterate.form, iterate.basis);
    this.ratioTest = new DualRatioTest(iterate);
    this.rho = new ScatteredVector(rowCount);
    this.row = new ScatteredVector(variableCount);
    this.column = new ScatteredVector(rowCount);
    this.tau = new ScatteredVector(rowCount);
    this.isBarred = new Uint8Array(rowCount);
  }

  /** To be called when the loop is entered anew: with other bounds, costs or another basis. */
  restart(): void {
    this.objectiveSeen = -Infinity;
    this.nextLook = this.iterate.iterations + iterationsBetweenLooks + this.iterate.form.rowCount;
  }

  /**
   * Bases may repeat in spite of perturbed costs, when steps within the tolerance of the ratio test undo one another.
   * The objective, which rises otherwise, then stands still from one look to the next.
   */
  private isStalled(): boolean {
    if (this.iterate.iterations < this.nextLook) return false;
    const objective = this.iterate.objective();
    const hasRisen = objective > this.objectiveSeen + tolerances.dualProgress * (1 + Math.abs(objective));
    this.objectiveSeen = objective;
    this.nextLook = this.iterate.iterations + iterationsBetweenLooks + this.iterate.form.rowCount;
    return !hasRisen;
  }

  /** Iterates until an end is known, the slice of work is spent or the iteration limit is reached. */
  run(meter: WorkMeter, iterationLimit: number): LoopEnd {
    const { iterate } = this;
    const { factorization } = iterate;
    for (;;) {
      meter.spend(factorization.takeWork());
      if (meter.isSliceSpent) return 'paused';
      if (iterate.iterations >= iterationLimit) return 'limit';
      if (this.isStalled()) return 'stalled';
      if (this.needsFactorization || factorization.shouldRefactorize) this.renew();
      const position = this.choosePosition(meter);
      if (position < 0) {
        if (factorization.updateCount > 0) {
          this.needsFactorization = true; // believed only with fresh values
          continue;
        }
        return this.barredCount > 0 ? 'trouble' : 'optimal';
      }
      const end = this.pivotOn(position, meter);
      if (end !== undefined) return end;
    }
  }

  /** After 'infeasible': ± B⁻ᵀ e_r, refined, length m: a Farkas ray as solve-result.ts defines it. */
  infeasibleRay(): Float64Array {
    const unit = new Float64Array(this.iterate.form.rowCount);
    unit[this.infeasiblePosition] = this.infeasibleSign;
    return refinedRowSolve(this.iterate, unit);
  }

  private renew(): void {
    this.iterate.refactorize();
    this.needsFactorization = false;
    this.clearBars();
  }

  /** The leaving position, its weight compared with the exact one that btran gives (ρ is left in place). */
  private choosePosition(meter: WorkMeter): number {
    const { iterate, rho, weights } = this;
    const m = iterate.form.rowCount;
    for (;;) {
      const position = chooseLeavingRow(iterate, weights.weight, this.isBarred);
      meter.spend(m);
      if (position < 0) return position;
      rho.clear();
      rho.value[position] = 1;
      rho.index[0] = position;
      rho.count = 1;
      iterate.factorization.btran(rho, 'tableau row');
      const variable = iterate.basis.basicVariable[position];
      const stored = weights.weight[variable];
      let exact = 0;
      for (let k = 0; k < rho.count; k++) {
        const entry = rho.value[rho.index[k]];
        exact += entry * entry;
      }
      weights.correct(variable, Math.max(exact, tolerances.leastEdgeWeight));
      // A weight stored far too small has drawn the choice here: choose again with what is now known.
      if (stored >= 0.25 * exact) return position;
    }
  }

  private pivotOn(position: number, meter: WorkMeter): LoopEnd | undefined {
    const { iterate, rho, row, column, tau, ratioTest, weights } = this;
    const { factorization, basis, bounds, primal, reduced } = iterate;
    meter.spend(tableauRow(iterate.form, rho, basis.status, row));
    const leaving = basis.basicVariable[position];
    const isAbove = primal.value[leaving] > bounds.upper[leaving];
    const sign = isAbove ? 1 : -1;
    const entering = ratioTest.choose(row, sign, primal.infeasibility(leaving), primal.tolerance);
    meter.spend(2 * row.count);
    if (entering < 0) {
      if (factorization.updateCount > 0) {
        this.needsFactorization = true;
        return undefined;
      }
      this.infeasiblePosition = position;
      this.infeasibleSign = sign;
      return 'infeasible';
    }
    iterate.loadColumn(entering, column);
    factorization.ftran(column, 'entering column');
    const alpha = column.value[position];
    const rowAlpha = row.value[entering];
    if (!this.isTrusted(alpha, rowAlpha)) {
      if (factorization.updateCount > 0) this.needsFactorization = true;
      else {
        this.isBarred[position] = 1;
        this.barredCount++;
      }
      return undefined;
    }
    this.keepReducedCostFeasible(entering);
    iterate.flipBounds(ratioTest.flips, ratioTest.flipCount);
    tau.copyFrom(rho);
    factorization.ftran(tau, 'edge weights');
    weights.update(position, entering, alpha, column, tau);
    const bound = isAbove ? bounds.upper[leaving] : bounds.lower[leaving];
    const outcome = iterate.applyPivot(
      {
        position,
        entering,
        dualStep: reduced.value[entering] / alpha,
        primalStep: (primal.value[leaving] - bound) / alpha,
        leavingStatus: isAbove ? VariableStatus.atUpper : VariableStatus.atLower,
        alpha,
      },
      row,
      column,
    );
    meter.spend(row.count + 2 * column.count);
    if (outcome === 'unstable') this.needsFactorization = true;
    if (this.barredCount > 0) this.clearBars();
    return undefined;
  }

  /** Row- and column-wise pivots agree, and the pivot is not tiny unless the factors are fresh. */
  private isTrusted(alpha: number, rowAlpha: number): boolean {
    const size = Math.abs(alpha);
    const disagreement = Math.abs(alpha - rowAlpha);
    if (disagreement > tolerances.pivotAgreement * (1 + size)) return false;
    if (disagreement > 0.01 * size) return false;
    return size >= tolerances.smallPivot || this.iterate.factorization.updateCount === 0;
  }

  /** A reduced cost of slightly wrong sign would make a step backwards: its cost is shifted so that it becomes 0. */
  private keepReducedCostFeasible(entering: number): void {
    const { basis, reduced, costs } = this.iterate;
    const d = reduced.value[entering];
    const stands = basis.status[entering];
    const isWrong =
      (stands === VariableStatus.atLower && d < 0) ||
      (stands === VariableStatus.atUpper && d > 0) ||
      (stands === VariableStatus.free && d !== 0);
    if (!isWrong) return;
    costs.shift(entering, -d);
    reduced.set(entering, 0);
  }

  private clearBars(): void {
    if (this.barredCount === 0) return;
    this.isBarred.fill(0);
    this.barredCount = 0;
  }
}
