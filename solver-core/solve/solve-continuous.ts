/**
 * The path of one continuous solve: scale → simplex → back to the stated problem → verify; where the evidence does
 * not hold, clean up and try again, a counted number of times. Advances by work units.
 */
import { tolerances } from '../control/tolerances';
import type { Progress } from '../control/progress-event';
import type { WorkMeter } from '../control/work-meter';
import type { Basis } from '../linear-program/basis';
import type { LinearProgram } from '../linear-program/linear-program';
import type { SolutionValues, SolveResult, StoppedResult } from '../linear-program/solve-result';
import { ScaledLinearProgram } from '../scaling/scaled-linear-program';
import { computationalForm } from '../simplex/computational-form';
import { SimplexSolver, type SimplexEnd } from '../simplex/simplex-solver';
import {
  verifyFarkasRay,
  verifyUnboundedRay,
  withoutBlockedComponents,
  withoutForbiddenComponents,
} from '../verification/verify-ray';
import { isFeasiblePoint, verifySolution } from '../verification/verify-solution';
import { lagrangianBound } from './lagrangian-bound';
import { solutionFrom, statedPoint, statedSolution } from './stated-solution';

/** How a solve is tried, one after the other until the evidence holds. */
interface Attempt {
  readonly isScaled: boolean;
  readonly tolerance: number;
  /** Start from the basis of the attempt before. */
  readonly isWarm: boolean;
  readonly perturbsCosts: boolean;
}

const attempts: readonly Attempt[] = [
  { isScaled: true, tolerance: tolerances.primalFeasibility, isWarm: false, perturbsCosts: true },
  { isScaled: false, tolerance: tolerances.cleanUpFeasibility, isWarm: true, perturbsCosts: false },
  { isScaled: true, tolerance: tolerances.cleanUpFeasibility, isWarm: true, perturbsCosts: false },
  { isScaled: true, tolerance: tolerances.cleanUpFeasibility, isWarm: false, perturbsCosts: false },
  { isScaled: false, tolerance: tolerances.cleanUpFeasibility, isWarm: false, perturbsCosts: true },
];

export class ContinuousSolve {
  private attempt = 0;
  private scaled: ScaledLinearProgram;
  private solver: SimplexSolver;
  private iterationsBefore = 0;
  private bestImprecise: Extract<SolveResult, { status: 'imprecise' }> | undefined;

  /** @param problem stated, validated, without integers (or with their demands dropped) */
  constructor(
    private readonly problem: LinearProgram,
    startBasis: Basis | undefined,
    private readonly iterationLimit: number,
  ) {
    this.scaled = ScaledLinearProgram.of(problem);
    this.solver = this.newSolver(attempts[0], startBasis);
  }

  get iterations(): number {
    return this.iterationsBefore + this.solver.iterate.iterations;
  }

  /** Spends the granted work. @returns undefined when it is spent before an end is known */
  advance(meter: WorkMeter): SolveResult | undefined {
    for (;;) {
      const end = this.solver.advance(meter);
      if (end === undefined) return undefined;
      const result = this.judge(end, meter);
      if (result !== undefined) return result;
      if (!this.nextAttempt()) return this.imprecise(meter);
    }
  }

  progress(meter: WorkMeter): Progress {
    const x = statedPoint(this.problem, this.scaled, this.solver.iterate.primal.value);
    return {
      stage: this.attempt > 0 ? 'clean-up' : this.solver.stage,
      iterations: this.iterations,
      workUnits: meter.total,
      objective: solutionFrom(this.problem, x, new Float64Array(this.problem.rowCount)).objective,
      primalInfeasibility: this.solver.primalInfeasibility(),
    };
  }

  /** The end for a caller who stops now. */
  stopped(cause: StoppedResult['cause'], meter: WorkMeter): StoppedResult {
    const { iterate } = this.solver;
    iterate.bounds.restore();
    iterate.costs.restore();
    if (this.solver.isFactorized) iterate.refactorize();
    const solution = this.solver.isFactorized ? this.currentSolution() : undefined;
    return {
      status: 'stopped',
      cause,
      best: solution !== undefined && isFeasiblePoint(this.problem, solution.x) ? solution : undefined,
      bound: solution === undefined ? undefined : lagrangianBound(this.problem, solution.rowDuals),
      basis: this.solver.isFactorized ? iterate.snapshot() : undefined,
      ...this.effort(meter),
    };
  }

  private newSolver(attempt: Attempt, startBasis: Basis | undefined): SimplexSolver {
    const isCold = startBasis === undefined;
    return new SimplexSolver(computationalForm(this.scaled.problem), {
      startBasis,
      primalTolerance: attempt.tolerance,
      dualTolerance: attempt.tolerance,
      iterationLimit: this.iterationLimit - this.iterationsBefore,
      perturbsCosts: attempt.perturbsCosts && isCold,
    });
  }

  private nextAttempt(): boolean {
    if (++this.attempt >= attempts.length) return false;
    const attempt = attempts[this.attempt];
    const basis = this.solver.iterate.snapshot();
    this.iterationsBefore += this.solver.iterate.iterations;
    this.scaled = attempt.isScaled ? ScaledLinearProgram.of(this.problem) : ScaledLinearProgram.unscaled(this.problem);
    this.solver = this.newSolver(attempt, attempt.isWarm ? basis : undefined);
    return true;
  }

  private judge(end: SimplexEnd, meter: WorkMeter): SolveResult | undefined {
    switch (end.kind) {
      case 'optimal':
        return this.judgeOptimal(meter);
      case 'infeasible':
        return this.judgeInfeasible(end.ray, meter);
      case 'unbounded':
        return this.judgeUnbounded(end.direction, meter);
      case 'limit':
        return this.stopped('iteration-limit', meter);
      case 'trouble':
        this.keepImprecise(this.currentSolution(), end.reason, meter);
        return undefined;
    }
  }

  private judgeOptimal(meter: WorkMeter): SolveResult | undefined {
    const solution = this.currentSolution();
    const verdict = verifySolution(this.problem, solution);
    if (!verdict.isOptimal) {
      this.keepImprecise(solution, verdict.reason, meter);
      return undefined;
    }
    return {
      status: 'optimal',
      ...solution,
      basis: this.solver.iterate.snapshot(),
      residuals: verdict.residuals,
      ...this.effort(meter),
    };
  }

  private judgeInfeasible(scaledRay: Float64Array, meter: WorkMeter): SolveResult | undefined {
    const ray = scaledRay.map((entry, row) => this.scaled.statedRayEntry(row, entry));
    for (const candidate of [ray, withoutForbiddenComponents(this.problem, ray)]) {
      if (verifyFarkasRay(this.problem, candidate).isProof) {
        return { status: 'infeasible', ray: candidate, ...this.effort(meter) };
      }
    }
    this.keepImprecise(this.currentSolution(), 'a proof of infeasibility did not hold on the stated problem', meter);
    return undefined;
  }

  private judgeUnbounded(scaledDirection: Float64Array, meter: WorkMeter): SolveResult | undefined {
    const { x } = this.currentSolution();
    const ray = statedPoint(this.problem, this.scaled, scaledDirection);
    for (const candidate of [ray, withoutBlockedComponents(this.problem, ray)]) {
      if (verifyUnboundedRay(this.problem, x, candidate).isProof) {
        return { status: 'unbounded', x, ray: candidate, ...this.effort(meter) };
      }
    }
    this.keepImprecise(this.currentSolution(), 'an unbounded direction did not hold on the stated problem', meter);
    return undefined;
  }

  private currentSolution(): SolutionValues {
    return statedSolution(this.problem, this.scaled, this.solver.iterate);
  }

  private effort(meter: WorkMeter): { iterations: number; workUnits: number } {
    return { iterations: this.iterations, workUnits: meter.total };
  }

  /** Of all ends that could not be proved, the one with the smallest violations is given out. */
  private keepImprecise(solution: SolutionValues, reason: string, meter: WorkMeter): void {
    const { residuals } = verifySolution(this.problem, solution);
    const worst = (r: typeof residuals): number => Math.max(r.primal, r.dual, r.dualityGap);
    if (this.bestImprecise !== undefined && worst(this.bestImprecise.residuals) <= worst(residuals)) return;
    this.bestImprecise = {
      status: 'imprecise',
      ...solution,
      reason,
      residuals,
      basis: this.solver.iterate.snapshot(),
      ...this.effort(meter),
    };
  }

  private imprecise(meter: WorkMeter): SolveResult {
    return { ...this.bestImprecise!, ...this.effort(meter) };
  }
}
