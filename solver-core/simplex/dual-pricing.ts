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
): number {
  const { basicVariable } = iterate.basis;
  const { squaredInfeasibility } = iterate.primal;
  const m = iterate.form.rowCount;
  let best = -1;
  let bestMerit = 0;
  for (let position = 0; position < m; position++) {
    const merit = squaredInfeasibility[position];
    if (merit === 0) continue;
    const edgeWeight = weight[basicVariable[position]];
    if (merit > bestMerit * edgeWeight && isBarred[position] === 0) {
      bestMerit = merit / edgeWeight;
      best = position;
    }
  }
  return best;
}
