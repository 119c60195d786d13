/**
 * The iteration loop of the primal simplex algorithm, both phases. Phase one minimises the sum of infeasibilities
 * with costs −1, 0, +1 that follow the basic variables across their bounds.
 *
 * Source: Maros (2003), "Computational Techniques of the Simplex Method", ch. 9.
 */
import { tolerances } from '../control/tolerances';
import type { WorkMeter } from '../control/work-meter';
import { ScatteredVector } from '../sparse/scattered-vector';
import { DevexWeights } from './devex-weights';
import type { LoopEnd } from './loop-end';
import { chooseEnteringVariable, chooseFirstEnteringVariable } from './primal-pricing';
import { PrimalRatioTest } from './primal-ratio-test';
import { refinedColumnSolve, refinedMultipliers } from './refine-solution';
import type { SimplexIterate } from './simplex-iterate';
import { tableauRow } from './tableau-row';

/** Steps without progress, beyond a share of the rows, after which the loop gives up. */
const stallSteps = 200;

export class PrimalSimplex {
  private readonly column: ScatteredVector;
  /** After 'unbounded': the entering variable and the way it moves. */
  private entering = -1;
  private direction = 1;
  /** Least-number rule in both choices: slow, but it cannot cycle. */
  usesLeastNumberRule = false;
  /** Whether stalls are reported; off when nothing more can be done about them. */
  reportsStalls = true;
  private readonly weights: DevexWeights;
  private readonly ratioTest: PrimalRatioTest;
  private readonly rho: ScatteredVector;
  private readonly row: ScatteredVector;
  private readonly costRow: ScatteredVector;
  private readonly scratchVariable = new Int32Array(1);
  private readonly isBarred: Uint8Array;
  private barredCount = 0;
  private needsFactorization = false;
  private isPhaseKnown = false;
  private isPhaseOne = false;
  private stepsWithoutProgress = 0;

  constructor(private readonly iterate: SimplexIterate) {
    const { rowCount, variableCount } = iterate.form;
    this.column = new ScatteredVector(rowCount);
    this.rho = new ScatteredVector(rowCount);
    this.costRow = new ScatteredVector(rowCount);
    this.row = new ScatteredVector(variableCount);
    this.weights = new DevexWeights(iterate.form);
    this.ratioTest = new PrimalRatioTest(iterate);
    this.isBarred = new Uint8Array(variableCount);
  }

  /** To be called when bounds or basis were changed from outside. */
  restart(): void {
    this.isPhaseKnown = false;
    this.stepsWithoutProgress = 0;
    this.weights.reset();
    this.clearBars();
  }

  get isInPhaseOne(): boolean {
    return this.isPhaseOne;
  }

  run(
    meter: WorkMeter,
    feasibilityTolerance: number,
    dualTolerance: number,
    iterationLimit: number,
  ): LoopEnd {
    const { iterate } = this;
    const { factorization } = iterate;
    for (;;) {
      meter.spend(factorization.takeWork());
      if (meter.isSliceSpent) return 'paused';
      if (iterate.iterations >= iterationLimit) return 'limit';
      if (this.needsFactorization || factorization.shouldRefactorize) {
        iterate.refactorize();
        this.needsFactorization = false;
        this.isPhaseKnown = false;
        this.clearBars();
      }
      if (!this.isPhaseKnown) this.enterPhase(feasibilityTolerance);
      const entering = this.usesLeastNumberRule
        ? chooseFirstEnteringVariable(iterate, this.isBarred, dualTolerance)
        : chooseEnteringVariable(iterate, this.weights.weight, this.isBarred, dualTolerance);
      meter.spend(iterate.form.variableCount);
      if (entering < 0) {
        if (factorization.updateCount > 0) {
          this.needsFactorization = true;
          continue;
        }
        if (this.barredCount > 0) return 'trouble';
        return this.isPhaseOne ? 'infeasible' : 'optimal';
      }
      const end = this.enter(entering, meter, feasibilityTolerance, dualTolerance);
      if (end !== undefined) return end;
    }
  }

  private enterPhase(tolerance: number): void {
    const { iterate } = this;
    const wasPhaseOne = this.isPhaseOne;
    this.isPhaseOne = iterate.primal.infeasibilities(tolerance).count > 0;
    this.isPhaseKnown = true;
    if (this.isPhaseOne) {
      iterate.costs.clearForPhaseOne();
      for (let position = 0; position < iterate.form.rowCount; position++) {
        const variable = iterate.basis.basicVariable[position];
        const cost = this.phaseOneCost(variable, tolerance);
        if (cost !== 0) iterate.costs.setPhaseOneCost(variable, cost);
      }
    } else if (iterate.costs.kind !== 'stated') iterate.costs.restore();
    if (wasPhaseOne !== this.isPhaseOne) {
      this.weights.reset();
      this.stepsWithoutProgress = 0;
    }
    iterate.reduced.recompute(iterate.factorization);
  }

  private phaseOneCost(variable: number, tolerance: number): number {
    const { primal, bounds } = this.iterate;
    const at = primal.value[variable];
    if (at < bounds.lower[variable] - tolerance) return -1;
    return at > bounds.upper[variable] + tolerance ? 1 : 0;
  }

  private enter(
    entering: number,
    meter: WorkMeter,
    feasibilityTolerance: number,
    dualTolerance: number,
  ): LoopEnd | undefined {
    const { iterate, column, ratioTest } = this;
    const { factorization, reduced } = iterate;
    iterate.loadColumn(entering, column);
    factorization.ftran(column, 'entering column');
    const exact = this.reducedCostFromColumn(entering);
    const stored = reduced.value[entering];
    reduced.set(entering, exact);
    if (reduced.infeasibility(entering) <= dualTolerance || exact * stored < 0) {
      // The stored value was wrong: believe the new one, and look for better ones when it was far off.
      if (factorization.updateCount > 0 && Math.abs(exact - stored) > 1e3 * dualTolerance)
        this.needsFactorization = true;
      return undefined;
    }
    const direction = exact > 0 ? -1 : 1;
    const outcome = this.isPhaseOne
      ? ratioTest.choosePhaseOne(entering, column, direction, Math.abs(exact), feasibilityTolerance)
      : ratioTest.choosePhaseTwo(entering, column, direction, feasibilityTolerance, this.usesLeastNumberRule);
    meter.spend(4 * column.count);
    if (outcome === 'unbounded') return this.endUnbounded(entering, direction);
    if (outcome === 'flip') {
      this.scratchVariable[0] = entering;
      iterate.flipBounds(this.scratchVariable, 1);
      iterate.iterations++;
      this.followPhaseOneCosts(feasibilityTolerance, -1);
      this.stepsWithoutProgress = 0;
      return undefined;
    }
    return this.pivot(entering, exact, feasibilityTolerance, meter);
  }

  /** d_q = c_q − c_Bᵀ B⁻¹ a_q: exact up to the errors of this one column. */
  private reducedCostFromColumn(entering: number): number {
    const { costs, basis } = this.iterate;
    let value = costs.cost[entering];
    for (let k = 0; k < this.column.count; k++) {
      const position = this.column.index[k];
      value -= costs.cost[basis.basicVariable[position]] * this.column.value[position];
    }
    return value;
  }

  private endUnbounded(entering: number, direction: number): LoopEnd | undefined {
    if (this.iterate.factorization.updateCount > 0) {
      this.needsFactorization = true;
      return undefined;
    }
    if (this.isPhaseOne) {
      // A sum of infeasibilities is bounded by 0: only pivots below the tolerance can be the cause.
      this.bar(entering);
      return undefined;
    }
    this.entering = entering;
    this.direction = direction;
    return 'unbounded';
  }

  private pivot(
    entering: number,
    reducedCost: number,
    feasibilityTolerance: number,
    meter: WorkMeter,
  ): LoopEnd | undefined {
    const { iterate, column, ratioTest, rho, row } = this;
    const { factorization, basis } = iterate;
    const { position, step, leavingStatus } = ratioTest;
    const alpha = column.value[position];
    if (Math.abs(alpha) < tolerances.smallPivot && factorization.updateCount > 0) {
      this.needsFactorization = true;
      return undefined;
    }
    rho.clear();
    rho.value[position] = 1;
    rho.index[0] = position;
    rho.count = 1;
    factorization.btran(rho, 'tableau row');
    meter.spend(tableauRow(iterate.form, rho, basis.status, row));
    const rowAlpha = row.value[entering];
    const disagreement = Math.abs(alpha - rowAlpha);
    if (
      disagreement > tolerances.pivotAgreement * (1 + Math.abs(alpha)) ||
      disagreement > 0.01 * Math.abs(alpha)
    ) {
      if (factorization.updateCount > 0) this.needsFactorization = true;
      else this.bar(entering);
      return undefined;
    }
    const leaving = basis.basicVariable[position];
    const leavingCost = this.isPhaseOne ? iterate.costs.cost[leaving] : 0;
    this.weights.update(entering, leaving, alpha, row);
    const outcome = iterate.applyPivot(
      { position, entering, dualStep: reducedCost / alpha, primalStep: step, leavingStatus, alpha },
      row,
      column,
    );
    meter.spend(2 * row.count + 2 * column.count);
    if (this.barredCount > 0) this.clearBars();
    if (outcome === 'unstable') this.needsFactorization = true;
    else if (this.isPhaseOne) {
      if (leavingCost !== 0) {
        iterate.costs.setPhaseOneCost(leaving, 0);
        iterate.reduced.set(leaving, iterate.reduced.value[leaving] - leavingCost);
      }
      this.followPhaseOneCosts(feasibilityTolerance, position);
    }
    return this.watchProgress(step * reducedCost);
  }

  /** Costs of phase one after a step along `column`: variables that crossed a bound change theirs, and so do all d. */
  private followPhaseOneCosts(tolerance: number, pivotPosition: number): void {
    if (!this.isPhaseOne) return;
    const { iterate, column, costRow, row } = this;
    costRow.clear();
    let count = 0;
    const follow = (position: number): void => {
      const variable = iterate.basis.basicVariable[position];
      const cost = this.phaseOneCost(variable, tolerance);
      const change = cost - iterate.costs.cost[variable];
      if (change === 0) return;
      iterate.costs.setPhaseOneCost(variable, cost);
      costRow.value[position] = change;
      costRow.index[count++] = position;
    };
    let hasPivot = false;
    for (let k = 0; k < column.count; k++) {
      follow(column.index[k]);
      if (column.index[k] === pivotPosition) hasPivot = true;
    }
    if (pivotPosition >= 0 && !hasPivot) follow(pivotPosition);
    if (count === 0) return;
    costRow.count = count;
    iterate.factorization.btran(costRow);
    tableauRow(iterate.form, costRow, iterate.basis.status, row);
    iterate.reduced.stepAlongRow(1, row);
    costRow.clear();
  }

  private watchProgress(gain: number): LoopEnd | undefined {
    if (Math.abs(gain) > tolerances.primalFeasibility) {
      this.stepsWithoutProgress = 0;
      return undefined;
    }
    const limit = stallSteps + 0.2 * this.iterate.form.rowCount;
    if (++this.stepsWithoutProgress < limit || !this.reportsStalls) return undefined;
    this.stepsWithoutProgress = 0;
    return 'stalled';
  }

  private bar(variable: number): void {
    if (this.isBarred[variable] === 1) return;
    this.isBarred[variable] = 1;
    this.barredCount++;
  }

  private clearBars(): void {
    if (this.barredCount === 0) return;
    this.isBarred.fill(0);
    this.barredCount = 0;
  }

  /** After 'unbounded': where each variable goes per unit of the entering one, refined, length n + m. */
  unboundedDirection(): Float64Array {
    const { iterate, entering, direction } = this;
    const ray = new Float64Array(iterate.form.variableCount);
    ray[entering] = direction;
    refinedColumnSolve(iterate, entering).forEach((rate, position) => {
      ray[iterate.basis.basicVariable[position]] = -direction * rate;
    });
    return ray;
  }

  /** After 'infeasible': B⁻ᵀ c_B of phase one, refined, length m: a Farkas ray as solve-result.ts defines it. */
  infeasibleRay(): Float64Array {
    return refinedMultipliers(this.iterate);
  }
}
