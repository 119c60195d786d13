/**
 * Chooses the entering variable of the primal algorithm.
 */
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { SimplexIterate } from './simplex-iterate';

/**
 * Greatest d² / weight among variables whose reduced cost has the wrong sign.
 * hot: once an iteration, over all variables.
 * @param isBarred length n + m: 1 where a variable may not be chosen for now
 * @returns variable, or −1 when every reduced cost is right
 */
export function chooseEnteringVariable(
  iterate: SimplexIterate,
  weight: ReadonlyFloat64Array,
  isBarred: Uint8Array,
  tolerance: number,
): number {
  const { status } = iterate.basis;
  const { lower, upper } = iterate.bounds;
  const d = iterate.reduced.value;
  const { variableCount } = iterate.form;
  let best = -1;
  let bestMerit = 0;
  for (let variable = 0; variable < variableCount; variable++) {
    const reducedCost = d[variable];
    if (reducedCost <= tolerance && reducedCost >= -tolerance) continue;
    const stands = status[variable];
    if (stands === VariableStatus.basic) continue;
    if (stands === VariableStatus.atLower && reducedCost > 0) continue;
    if (stands === VariableStatus.atUpper && reducedCost < 0) continue;
    const merit = reducedCost * reducedCost;
    if (
      merit > bestMerit * weight[variable] &&
      isBarred[variable] === 0 &&
      lower[variable] !== upper[variable]
    ) {
      bestMerit = merit / weight[variable];
      best = variable;
    }
  }
  return best;
}

/**
 * The first variable, by number, whose reduced cost has the wrong sign: with the least-number rule for leaving it
 * cannot cycle. Source: Bland (1977), "New finite pivoting rules for the simplex method", Math. of O.R. 2.
 */
export function chooseFirstEnteringVariable(
  iterate: SimplexIterate,
  isBarred: Uint8Array,
  tolerance: number,
): number {
  for (let variable = 0; variable < iterate.form.variableCount; variable++) {
    if (isBarred[variable] === 0 && iterate.reduced.infeasibility(variable) > tolerance) return variable;
  }
  return -1;
}
