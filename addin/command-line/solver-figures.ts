/**
 * The part of a solve's report that is the same for a workbook and for an MPS file: bound, gap, effort, residuals.
 */
import type { SolveResult } from '#solver-core';
import type { SolveReport } from './solve-report';

export type SolverFigures = Pick<
  SolveReport,
  'bound' | 'gap' | 'iterations' | 'nodes' | 'checks' | 'dualsOf'
>;

/** @param objective of the plan; null where there is none */
export function solverFigures(
  result: SolveResult,
  objective: number | null,
  workbookObjective: number | null,
): SolverFigures {
  const bound = boundOf(result, objective);
  const residuals = result.status === 'optimal' || result.status === 'imprecise' ? result.residuals : null;
  return {
    bound,
    gap:
      objective === null || bound === null ? null : Math.abs(objective - bound) / (1 + Math.abs(objective)),
    iterations: result.iterations,
    nodes: null,
    dualsOf: objective === null ? null : 'plan',
    checks: {
      primal: residuals?.primal ?? null,
      dual: residuals?.dual ?? null,
      complementarity: residuals?.complementarity ?? null,
      workbookObjective,
    },
  };
}

/** No plan can be better than this. The bound of an optimal plan is the plan itself: the solver has proved it. */
function boundOf(result: SolveResult, objective: number | null): number | null {
  switch (result.status) {
    case 'optimal':
      return objective;
    case 'stopped':
      return result.bound ?? null;
    case 'infeasible':
    case 'unbounded':
    case 'imprecise':
      return null;
  }
}
