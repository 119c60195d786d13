/**
 * Chooses the row that leaves in the dual algorithm: greatest infeasibility² / weight.
 */
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import type { SimplexIterate } from './simplex-iterate';

/**
 * hot: once an iteration, over all m positions.
 * @param weight dual steepest edge weights by variable
 * @param isBarred length m: 1 where a position may not be chosen for now
 * @returns position, or −1 when every basic variable is within its bounds
 */
export function chooseLeavingRow(
  iterate: SimplexIterate,
  weight: ReadonlyFloat64Array,
  isBarred: Uint8Array,
  tolerance: number,
): number {
  const { basicVariable } = iterate.basis;
  const { lower, upper } = iterate.bounds;
  const z = iterate.primal.value;
  const m = iterate.form.rowCount;
  let best = -1;
  let bestMerit = 0;
  for (let position = 0; position < m; position++) {
    const variable = basicVariable[position];
    const at = z[variable];
    let infeasibility = lower[variable] - at;
    if (infeasibility < tolerance) {
      infeasibility = at - upper[variable];
      if (infeasibility < tolerance) continue;
    }
    const merit = infeasibility * infeasibility;
    if (merit > bestMerit * weight[variable] && isBarred[position] === 0) {
      bestMerit = merit / weight[variable];
      best = position;
    }
  }
  return best;
}
