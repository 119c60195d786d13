/**
 * The spaces between the stated problem and what the simplex works on, and the way back through all of them:
 * stated → reduced by presolve (or not) → scaled (or not).
 */
import type { Basis } from '../linear-program/basis';
import type { LinearProgram } from '../linear-program/linear-program';
import type { SolutionValues } from '../linear-program/solve-result';
import type { ReducedProblem } from '../presolve/reduced-problem';
import { ScaledLinearProgram } from '../scaling/scaled-linear-program';
import type { SimplexIterate } from '../simplex/simplex-iterate';
import { recomputeObjective } from '../verification/recomputed-sums';
import { basicSolution, solutionFrom, unscaledPoint, withBasicZeros } from './stated-solution';

/** An iterate as the caller may have it: on the stated problem. */
export interface StatedIterate {
  readonly solution: SolutionValues;
  readonly basis: Basis;
}

export class SimplexSpace {
  /** What is scaled: the reduced problem, or the stated one itself. */
  private readonly unscaled: LinearProgram;
  private readonly scaled: ScaledLinearProgram;

  constructor(
    private readonly stated: LinearProgram,
    private readonly reduced: ReducedProblem | undefined,
    isScaled: boolean,
  ) {
    this.unscaled = reduced?.problem ?? stated;
    this.scaled = isScaled
      ? ScaledLinearProgram.of(this.unscaled)
      : ScaledLinearProgram.unscaled(this.unscaled);
  }

  /** The problem for the simplex. */
  get problem(): LinearProgram {
    return this.scaled.problem;
  }

  statedIterate(iterate: SimplexIterate): StatedIterate {
    const solution = basicSolution(this.unscaled, this.scaled, iterate);
    const basis = iterate.snapshot();
    if (this.reduced === undefined) return { solution, basis };
    const restored = this.reduced.restoreSolution(solution, basis);
    const stated = solutionFrom(this.stated, restored.x, restored.rowDuals);
    return {
      solution: {
        ...stated,
        reducedCosts: withBasicZeros(stated.reducedCosts, restored.basis.columnStatus),
      },
      basis: restored.basis,
    };
  }

  /** Objective as stated; presolve keeps it. */
  objective(iterate: SimplexIterate): number {
    return recomputeObjective(this.unscaled, unscaledPoint(this.unscaled, this.scaled, iterate.primal.value));
  }

  /** @param ray of the simplex's problem, a component a row */
  statedFarkasRay(ray: Float64Array): Float64Array {
    const unscaled = ray.map((entry, row) => this.scaled.statedRayEntry(row, entry));
    return this.reduced === undefined ? unscaled : this.reduced.restoreFarkasRay(unscaled);
  }

  /** @param direction of the simplex's problem, a component a variable */
  statedUnboundedRay(direction: Float64Array): Float64Array {
    const unscaled = unscaledPoint(this.unscaled, this.scaled, direction);
    return this.reduced === undefined ? unscaled : this.reduced.restoreUnboundedRay(unscaled);
  }
}
