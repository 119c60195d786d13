/**
 * Judges a claimed optimum against the stated problem, by the acceptance thresholds of control/tolerances.ts alone.
 *
 * Primal, dual and gap decide: together they are sufficient. Complementarity is reported but does not decide, since
 * the gap is the sum of its products and the dual residual already asks that one factor of each product vanishes.
 */
import { tolerances } from '../control/tolerances';
import type { LinearProgram } from '../linear-program/linear-program';
import type { Residuals } from '../linear-program/solve-result';
import type { ClaimedSolution, Place } from './kkt-residuals';
import { kktResiduals } from './kkt-residuals';

export type SolutionVerdict =
  | { readonly isOptimal: true; readonly residuals: Residuals }
  | {
      readonly isOptimal: false;
      readonly residuals: Residuals;
      /** What could not be shown, by how much and where: one sentence. */
      readonly reason: string;
    };

/** Is this solution optimal to the accepted precision? */
export function verifySolution(problem: LinearProgram, claim: ClaimedSolution): SolutionVerdict {
  const { primal, primalPlace, dual, dualPlace, complementarity, dualityGap } = kktResiduals(problem, claim);
  const residuals: Residuals = { primal, dual, complementarity, dualityGap };
  const { acceptedResidual, acceptedDualityGap } = tolerances;
  if (!(primal <= acceptedResidual)) {
    const reason = `${describe(problem, primalPlace)} misses its bounds by ${primal.toExponential(2)} relative, more than ${acceptedResidual}.`;
    return { isOptimal: false, residuals, reason };
  }
  if (!(dual <= acceptedResidual)) {
    const reason = `The multiplier of ${describe(problem, dualPlace)} has the wrong sign by ${dual.toExponential(2)} relative, more than ${acceptedResidual}.`;
    return { isOptimal: false, residuals, reason };
  }
  if (!(dualityGap <= acceptedDualityGap)) {
    const reason = `Primal and dual objective differ by ${dualityGap.toExponential(2)} relative, more than ${acceptedDualityGap}.`;
    return { isOptimal: false, residuals, reason };
  }
  return { isOptimal: true, residuals };
}

/** Is this point within all bounds to the accepted precision? */
export function isFeasiblePoint(problem: LinearProgram, x: ClaimedSolution['x']): boolean {
  const withoutDuals = { x, rowDuals: new Float64Array(problem.rowCount) };
  return kktResiduals(problem, withoutDuals).primal <= tolerances.acceptedResidual;
}

function describe(problem: LinearProgram, place: Place | undefined): string {
  if (place === undefined) {
    return 'A row or column';
  }
  return place.kind === 'row'
    ? `Row "${problem.rowNames[place.index]}"`
    : `Column "${problem.columnNames[place.index]}"`;
}
