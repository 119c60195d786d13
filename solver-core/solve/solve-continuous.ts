/**
 * The path of one continuous solve: presolve → scale → simplex → back to the stated problem → verify; where the
 * evidence does not hold, clean up and try again, a counted number of times. Advances by work units.
 *
 * An optimum that is accepted, but not near the last digits, is looked at once more with tighter tolerances: where
 * sizes differ wildly, a reduced cost of 1e-8 can hide a difference in the objective that shows.
 *
 * Nothing that presolve says is taken for an answer. Its contradictions and the rays of the reduced problem are
 * carried back and verified like everything else; where that does not hold, the stated problem is solved itself.
 */
import { tolerances } from '../control/tolerances';
import type { Progress } from '../control/progress-event';
import type { WorkMeter } from '../control/work-meter';
import type { Basis } from '../linear-program/basis';
import type { LinearProgram } from '../linear-program/linear-program';
import type { OptimalResult, Residuals, SolveResult, StoppedResult } from '../linear-program/solve-result';
import { presolve } from '../presolve/presolve';
import type { ReducedProblem } from '../presolve/reduced-problem';
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
import { SimplexSpace } from './simplex-space';

/** How a solve is tried, one after the other until the evidence holds. */
interface Attempt {
  /** On what presolve left. */
  readonly isReduced: boolean;
  readonly isScaled: boolean;
  readonly tolerance: number;
  /** Start from the basis of the attempt before. */
  readonly isWarm: boolean;
  readonly perturbsCosts: boolean;
}

const { primalFeasibility, cleanUpFeasibility } = tolerances;

const statedAttempts: readonly Attempt[] = [
  { isReduced: false, isScaled: true, tolerance: primalFeasibility, isWarm: false, perturbsCosts: true },
  { isReduced: false, isScaled: false, tolerance: cleanUpFeasibility, isWarm: true, perturbsCosts: false },
  { isReduced: false, isScaled: true, tolerance: cleanUpFeasibility, isWarm: true, perturbsCosts: false },
  { isReduced: false, isScaled: true, tolerance: cleanUpFeasibility, isWarm: false, perturbsCosts: false },
  { isReduced: false, isScaled: false, tolerance: cleanUpFeasibility, isWarm: false, perturbsCosts: true },
];

/** After presolve: the reduced problem, then the stated one from the basis carried back, then as without presolve. */
const presolvedAttempts: readonly Attempt[] = [
  { isReduced: true, isScaled: true, tolerance: primalFeasibility, isWarm: false, perturbsCosts: true },
  { isReduced: false, isScaled: true, tolerance: cleanUpFeasibility, isWarm: true, perturbsCosts: false },
  ...statedAttempts,
];

export interface ContinuousSolveSettings {
  readonly presolve: boolean;
  readonly startBasis: Basis | undefined;
  readonly iterationLimit: number;
}

export class ContinuousSolve {
  private readonly reduced: ReducedProblem | undefined;
  private readonly attempts: readonly Attempt[];
  private attempt = 0;
  private space: SimplexSpace;
  private solver: SimplexSolver;
  private iterationsBefore = 0;
  private presolveResult: SolveResult | undefined;
  /** An optimum that is good enough, while one more attempt is made at a better one. */
  private accepted: OptimalResult | undefined;
  private bestImprecise: Extract<SolveResult, { status: 'imprecise' }> | undefined;

  /**
   * @param problem stated, validated, without integers (or with their demands dropped)
   * @param meter presolve is done here, and spent there
   */
  constructor(
    private readonly problem: LinearProgram,
    private readonly settings: ContinuousSolveSettings,
    meter: WorkMeter,
  ) {
    const { startBasis } = settings;
    this.reduced = settings.presolve && startBasis === undefined ? this.reduce(meter) : undefined;
    this.attempts = this.reduced === undefined ? statedAttempts : presolvedAttempts;
    this.space = this.newSpace(this.attempts[0]);
    this.solver = this.newSolver(this.attempts[0], startBasis);
  }

  get iterations(): number {
    return this.iterationsBefore + this.solver.iterate.iterations;
  }

  /** Spends the granted work. @returns undefined when it is spent before an end is known */
  advance(meter: WorkMeter): SolveResult | undefined {
    if (this.presolveResult !== undefined) return this.presolveResult;
    for (;;) {
      const end = this.solver.advance(meter);
      if (end === undefined) return undefined;
      const isPolishing = this.accepted !== undefined;
      const result = this.judge(end, meter);
      if (result !== undefined) return result;
      if (isPolishing) return this.acceptedNow(meter);
      if (!this.nextAttempt()) return this.acceptedNow(meter) ?? this.imprecise(meter);
    }
  }

  progress(meter: WorkMeter): Progress {
    return {
      stage: this.attempt > 0 ? 'clean-up' : this.solver.stage,
      iterations: this.iterations,
      workUnits: meter.total,
      objective: this.space.objective(this.solver.iterate),
      primalInfeasibility: this.solver.primalInfeasibility(),
    };
  }

  /** The end for a caller who stops now. */
  stopped(cause: StoppedResult['cause'], meter: WorkMeter): StoppedResult | OptimalResult {
    const accepted = this.acceptedNow(meter);
    if (accepted !== undefined) return accepted;
    const effort = this.effort(meter);
    const { iterate, isFactorized } = this.solver;
    if (!isFactorized) {
      return { status: 'stopped', cause, best: undefined, bound: undefined, basis: undefined, ...effort };
    }
    iterate.restoreBounds();
    iterate.costs.restore();
    iterate.refactorize();
    const { solution, basis } = this.space.statedIterate(iterate);
    return {
      status: 'stopped',
      cause,
      best: isFeasiblePoint(this.problem, solution.x) ? solution : undefined,
      bound: lagrangianBound(this.problem, solution.rowDuals),
      basis,
      ...effort,
    };
  }

  /** What presolve leaves; undefined where that is the whole problem, or where it ends by itself. */
  private reduce(meter: WorkMeter): ReducedProblem | undefined {
    const outcome = presolve(this.problem, meter);
    switch (outcome.kind) {
      case 'reduced':
        return outcome.reduced;
      case 'unchanged':
        return undefined;
      case 'infeasible': {
        const ray = this.provenFarkasRay(outcome.ray);
        if (ray !== undefined) {
          this.presolveResult = { status: 'infeasible', ray, iterations: 0, workUnits: meter.total };
        }
        return undefined;
      }
      case 'unbounded':
        return undefined; // a point and a ray are wanted: the simplex finds them, or a proof that there is no point
    }
  }

  private newSpace(attempt: Attempt): SimplexSpace {
    return new SimplexSpace(this.problem, attempt.isReduced ? this.reduced : undefined, attempt.isScaled);
  }

  private newSolver(attempt: Attempt, startBasis: Basis | undefined): SimplexSolver {
    const isCold = startBasis === undefined;
    const left = this.settings.iterationLimit - this.iterationsBefore;
    return new SimplexSolver(computationalForm(this.space.problem), {
      startBasis,
      primalTolerance: attempt.tolerance,
      dualTolerance: attempt.tolerance,
      iterationLimit: Math.min(left, this.accepted === undefined ? Infinity : this.polishingLimit()),
      perturbsCosts: attempt.perturbsCosts && isCold,
    });
  }

  /** A few per cent of what it took so far: where that does not do, tighter tolerances lead to a long walk. */
  private polishingLimit(): number {
    return 100 + Math.floor(this.iterationsBefore / 20);
  }

  private nextAttempt(): boolean {
    if (++this.attempt >= this.attempts.length) return false;
    const attempt = this.attempts[this.attempt];
    const { iterate } = this.solver;
    const basis = attempt.isWarm ? this.space.statedIterate(iterate).basis : undefined;
    this.iterationsBefore += iterate.iterations;
    this.space = this.newSpace(attempt);
    this.solver = this.newSolver(attempt, basis);
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
        this.keepImprecise(end.reason, meter);
        return undefined;
    }
  }

  private judgeOptimal(meter: WorkMeter): SolveResult | undefined {
    const { solution, basis } = this.space.statedIterate(this.solver.iterate);
    const verdict = verifySolution(this.problem, solution);
    if (!verdict.isOptimal) {
      this.keepImprecise(verdict.reason, meter);
      return undefined;
    }
    const { residuals } = verdict;
    const result: OptimalResult = { status: 'optimal', ...solution, basis, residuals, ...this.effort(meter) };
    const isBetter =
      this.accepted === undefined || worstResidual(residuals) < worstResidual(this.accepted.residuals);
    const isPolished = this.accepted !== undefined || worstResidual(residuals) <= tolerances.polishedResidual;
    if (isBetter && isPolished) return result;
    this.accepted ??= result;
    return undefined;
  }

  private judgeInfeasible(simplexRay: Float64Array, meter: WorkMeter): SolveResult | undefined {
    for (const share of tolerances.rayDrops) {
      const ray = this.provenFarkasRay(this.space.statedFarkasRay(withoutSmall(simplexRay, share)));
      if (ray !== undefined) return { status: 'infeasible', ray, ...this.effort(meter) };
    }
    this.keepImprecise('a proof of infeasibility did not hold on the stated problem', meter);
    return undefined;
  }

  private judgeUnbounded(direction: Float64Array, meter: WorkMeter): SolveResult | undefined {
    const { x } = this.space.statedIterate(this.solver.iterate).solution;
    for (const share of tolerances.rayDrops) {
      const ray = this.space.statedUnboundedRay(withoutSmall(direction, share));
      for (const candidate of [ray, withoutBlockedComponents(this.problem, ray)]) {
        if (verifyUnboundedRay(this.problem, x, candidate).isProof) {
          return { status: 'unbounded', x, ray: candidate, ...this.effort(meter) };
        }
      }
    }
    this.keepImprecise('an unbounded direction did not hold on the stated problem', meter);
    return undefined;
  }

  /** The ray, as it is or without noise, where it proves the stated problem infeasible. */
  private provenFarkasRay(ray: Float64Array): Float64Array | undefined {
    const candidates = [ray, withoutForbiddenComponents(this.problem, ray)];
    return candidates.find((candidate) => verifyFarkasRay(this.problem, candidate).isProof);
  }

  private effort(meter: WorkMeter): { iterations: number; workUnits: number } {
    return { iterations: this.iterations, workUnits: meter.total };
  }

  /** Of all ends that could not be proved, the one with the smallest violations is given out. */
  private keepImprecise(reason: string, meter: WorkMeter): void {
    const { solution, basis } = this.space.statedIterate(this.solver.iterate);
    const { residuals } = verifySolution(this.problem, solution);
    const best = this.bestImprecise;
    if (best !== undefined && worstResidual(best.residuals) <= worstResidual(residuals)) return;
    this.bestImprecise = {
      status: 'imprecise',
      ...solution,
      reason,
      residuals,
      basis,
      ...this.effort(meter),
    };
  }

  private imprecise(meter: WorkMeter): SolveResult {
    return { ...this.bestImprecise!, ...this.effort(meter) };
  }

  private acceptedNow(meter: WorkMeter): OptimalResult | undefined {
    return this.accepted === undefined ? undefined : { ...this.accepted, ...this.effort(meter) };
  }
}

/** Of those that decide whether an optimum is accepted. */
function worstResidual({ primal, dual, dualityGap }: Residuals): number {
  return Math.max(primal, dual, dualityGap);
}

/** A copy with 0 in place of components below a share of the largest magnitude. */
function withoutSmall(ray: Float64Array, share: number): Float64Array {
  const least = share * ray.reduce((largest, entry) => Math.max(largest, Math.abs(entry)), 0);
  return ray.map((entry) => (Math.abs(entry) < least ? 0 : entry));
}
