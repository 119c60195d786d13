/**
 * Judges what a solve claims by the evidence that it gives, twice: by the core's own verification and by the shadow
 * check of the tests.
 */
import type { LinearProgram, SolveResult } from '#solver-core';
import { verifyFarkasRay, verifyUnboundedRay } from '../../solver-core/verification/verify-ray';
import { verifySolution } from '../../solver-core/verification/verify-solution';
import { findFarkasFaults, findOptimalityFaults, findUnboundedFaults } from './shadow-check';

/** What is wrong with the evidence; an end that claims nothing has none, which is a fault too. */
export function findEvidenceFaults(problem: LinearProgram, result: SolveResult): string[] {
  switch (result.status) {
    case 'optimal': {
      const verdict = verifySolution(problem, result);
      return [...(verdict.isOptimal ? [] : [verdict.reason]), ...findOptimalityFaults(problem, result)];
    }
    case 'infeasible': {
      const verdict = verifyFarkasRay(problem, result.ray);
      return [...(verdict.isProof ? [] : [verdict.reason]), ...findFarkasFaults(problem, result.ray)];
    }
    case 'unbounded': {
      const verdict = verifyUnboundedRay(problem, result.x, result.ray);
      const faults = findUnboundedFaults(problem, result.x, result.ray);
      return [...(verdict.isProof ? [] : [verdict.reason]), ...faults];
    }
    case 'stopped':
      return [`stopped: ${result.cause}`];
    case 'imprecise':
      return [`imprecise: ${result.reason}`];
  }
}
