/**
 * How a solve ended, in a sentence that tells the planner what that means.
 */
import type { SolveResult } from '#solver-core';

/** The ends that the JSON output names: those of the solver, and `invalid` for a plan with errors. */
export type PlanStatus = SolveResult['status'] | 'invalid';

/** @param hasPlan whether a plan was found before the solve stopped */
export function statusSentence(status: PlanStatus, hasPlan = false): string {
  switch (status) {
    case 'optimal':
      return 'Optimal: no other plan within these limits does better.';
    case 'infeasible':
      return 'Infeasible: no plan keeps every limit at once.';
    case 'unbounded':
      return 'Unbounded: the objective can be bettered without end. A limit is missing, or a sign is wrong.';
    case 'stopped':
      return hasPlan
        ? 'Stopped at a limit: this plan keeps every limit, but a better one may exist.'
        : 'Stopped at a limit before any plan was found.';
    case 'imprecise':
      return 'Imprecise: the plan could not be proved best to full accuracy. Check the figures before you rely on it.';
    case 'invalid':
      return 'Not solved: the plan has errors.';
  }
}
