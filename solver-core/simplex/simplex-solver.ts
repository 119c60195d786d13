/**
 * Solves a computational form with the dual and the primal algorithm: dual phase one where it is needed, dual phase
 * two with perturbed costs, then the primal algorithm for what the perturbation hid. Advances by work units.
 *
 * What each stage does when it ends is in one place, `follow`; every change of stage is counted.
 */
import { tolerances } from '../control/tolerances';
import type { WorkMeter } from '../control/work-meter';
import type { Basis } from '../linear-program/basis';
import type { ComputationalForm } from './computational-form';
import { DualSimplex } from './dual-simplex';
import { loadLogicalBasis, loadSnapshot } from './initial-basis';
import type { LoopEnd } from './loop-end';
import { PrimalSimplex } from './primal-simplex';
import { SimplexIterate } from './simplex-iterate';

export interface SimplexSettings {
  readonly startBasis?: Basis | undefined;
  /** Absolute, in the space of the form. */
  readonly primalTolerance: number;
  readonly dualTolerance: number;
  readonly iterationLimit: number;
  /** Perturb the costs at the start: for a cold start. */
  readonly perturbsCosts: boolean;
}

export type SimplexStage = 'dual phase one' | 'dual' | 'primal';

/** How the simplex ends on this form. Rays are in the space of the form, unchecked. */
export type SimplexEnd =
  | { readonly kind: 'optimal' }
  | { readonly kind: 'infeasible'; readonly ray: Float64Array }
  | { readonly kind: 'unbounded'; readonly direction: Float64Array }
  | { readonly kind: 'limit' }
  | { readonly kind: 'trouble'; readonly reason: string };

/** Changes of stage after which the solver gives up: each is a new attempt at what the last one left. */
const mostStageChanges = 40;
/** Size of the relaxation of bounds against stalls, relative. */
const relaxation = 1e-6;
/** What dual phase one leaves of infeasibilities up to this, absolute, is shifted away: tolerances of its ratio tests. */
const smallCostShift = 1e-4;

export class SimplexSolver {
  readonly iterate: SimplexIterate;
  private readonly dual: DualSimplex;
  private readonly primal: PrimalSimplex;
  private currentStage: SimplexStage = 'dual';
  private isStarted = false;
  private stageChanges = 0;
  private timesRelaxed = 0;

  constructor(
    private readonly form: ComputationalForm,
    private readonly settings: SimplexSettings,
  ) {
    this.iterate = new SimplexIterate(form, settings.primalTolerance);
    this.dual = new DualSimplex(this.iterate);
    this.primal = new PrimalSimplex(this.iterate);
  }

  /** Values and multipliers can be had: the first factorization is done. */
  get isFactorized(): boolean {
    return this.isStarted;
  }

  get stage(): SimplexStage {
    return this.currentStage;
  }

  /** Spends the granted work. @returns undefined when it is spent before an end is known */
  advance(meter: WorkMeter): SimplexEnd | undefined {
    if (!this.isStarted) this.start();
    for (;;) {
      const end = this.runStage(meter);
      if (end === 'paused') return undefined;
      const outcome = this.follow(end);
      if (outcome !== undefined) return outcome;
      if (++this.stageChanges > mostStageChanges) {
        return { kind: 'trouble', reason: `no end after ${mostStageChanges} changes of algorithm` };
      }
    }
  }

  private start(): void {
    const { iterate, settings, form } = this;
    this.isStarted = true;
    if (settings.startBasis === undefined) loadLogicalBasis(form, iterate.basis);
    else loadSnapshot(form, settings.startBasis, iterate.basis);
    if (settings.perturbsCosts) iterate.costs.perturb(1);
    iterate.refactorize();
    if (settings.startBasis !== undefined) {
      this.enterFromSnapshot();
      return;
    }
    iterate.restAtRightBounds();
    if (iterate.reduced.infeasibilities(settings.dualTolerance).count > 0) this.enterDualPhaseOne();
    else this.enterDual();
  }

  /**
   * From a basis of a similar problem: the primal algorithm where it is primal feasible, otherwise the dual one, costs
   * shifted where reduced costs are wrong; the primal algorithm then takes the shifts away again.
   */
  private enterFromSnapshot(): void {
    const { iterate, settings } = this;
    if (iterate.primal.infeasibilities(settings.primalTolerance).count === 0) {
      this.enterPrimal();
      return;
    }
    iterate.restAtRightBounds();
    iterate.shiftCostsToFeasibility(settings.dualTolerance, Infinity);
    this.enterDual();
  }

  private runStage(meter: WorkMeter): LoopEnd {
    const { primalTolerance, dualTolerance, iterationLimit } = this.settings;
    if (this.currentStage === 'primal') {
      return this.primal.run(meter, primalTolerance, dualTolerance, iterationLimit);
    }
    return this.dual.run(meter, iterationLimit);
  }

  /** What comes after a stage: another stage (undefined) or the end. */
  private follow(end: LoopEnd): SimplexEnd | undefined {
    if (end === 'limit') return { kind: 'limit' };
    switch (this.currentStage) {
      case 'dual phase one':
        return end === 'stalled' ? this.leaveDual() : this.afterDualPhaseOne();
      case 'dual':
        return this.afterDual(end);
      case 'primal':
        return this.afterPrimal(end);
    }
  }

  private afterDualPhaseOne(): undefined {
    const { iterate, settings } = this;
    iterate.restoreBounds();
    iterate.reduced.recompute(iterate.factorization);
    iterate.restAtRightBounds();
    if (iterate.shiftCostsToFeasibility(settings.dualTolerance, smallCostShift)) {
      this.enterDual();
      return;
    }
    if (iterate.costs.kind !== 'stated') {
      iterate.costs.restore();
      iterate.reduced.recompute(iterate.factorization);
      iterate.restAtRightBounds();
      if (iterate.shiftCostsToFeasibility(settings.dualTolerance, smallCostShift)) {
        this.enterDual();
        return;
      }
      iterate.costs.restore();
      iterate.reduced.recompute(iterate.factorization);
    }
    this.enterPrimal(); // no dual feasible basis: the objective is unbounded if there is a feasible point
  }

  private afterDual(end: LoopEnd): SimplexEnd | undefined {
    const { iterate, settings } = this;
    if (end === 'infeasible') return { kind: 'infeasible', ray: this.dual.infeasibleRay() };
    if (end === 'stalled') return this.leaveDual();
    if (iterate.costs.kind !== 'stated') {
      iterate.costs.restore();
      iterate.reduced.recompute(iterate.factorization);
    }
    if (end === 'optimal' && iterate.reduced.infeasibilities(settings.dualTolerance).count === 0)
      return { kind: 'optimal' };
    if (end !== 'optimal') iterate.factorization.tightenThreshold();
    this.enterPrimal();
    return undefined;
  }

  private afterPrimal(end: LoopEnd): SimplexEnd | undefined {
    const { iterate, primal } = this;
    if (end === 'stalled') return this.afterStall();
    if (iterate.bounds.kind === 'relaxed') {
      // Whatever was found, it was found for slightly wider bounds: back to the stated ones.
      iterate.restoreBounds();
      iterate.costs.restore();
      iterate.refactorize();
      if (end === 'optimal') {
        const { primalTolerance } = this.settings;
        if (iterate.primal.infeasibilities(primalTolerance).count === 0) return { kind: 'optimal' };
        this.dual.weights.reset();
        this.enterDual();
        return undefined;
      }
      this.enterPrimal();
      return undefined;
    }
    switch (end) {
      case 'optimal':
        return { kind: 'optimal' };
      case 'unbounded':
        return { kind: 'unbounded', direction: primal.unboundedDirection() };
      case 'infeasible':
        return { kind: 'infeasible', ray: primal.infeasibleRay() };
      default:
        return { kind: 'trouble', reason: 'no pivot could be trusted' };
    }
  }

  /** First slightly wider bounds, then the least-number rule, which ends for certain. */
  private afterStall(): undefined {
    const { iterate, primal } = this;
    if (this.timesRelaxed < 3) iterate.relaxBounds(++this.timesRelaxed, relaxation);
    else {
      iterate.restoreBounds();
      primal.usesLeastNumberRule = true;
      primal.reportsStalls = false;
    }
    iterate.recompute();
    primal.restart();
  }

  private enterDual(): void {
    this.currentStage = 'dual';
    this.dual.restart();
  }

  /** The dual algorithm goes round in circles: the primal one, which has rules that end for certain, goes on from here. */
  private leaveDual(): undefined {
    const { iterate } = this;
    iterate.restoreBounds();
    iterate.costs.restore();
    iterate.refactorize();
    this.enterPrimal();
  }

  private enterDualPhaseOne(): void {
    this.currentStage = 'dual phase one';
    this.dual.restart();
    this.iterate.boxBounds();
  }

  private enterPrimal(): void {
    this.currentStage = 'primal';
    this.primal.restart();
  }

  /** Sum of primal infeasibilities, for progress reports. */
  primalInfeasibility(): number {
    return this.iterate.primal.infeasibilities(tolerances.primalFeasibility).sum;
  }
}
