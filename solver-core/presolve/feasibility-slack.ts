/**
 * By how much presolve lets a number pass a bound and still counts it as met.
 */
import { tolerances } from '../control/tolerances';

/** @param magnitude of the largest term or bound in play */
export function feasibilitySlack(magnitude: number): number {
  return tolerances.presolveFeasibility * (1 + magnitude);
}
