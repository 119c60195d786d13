/**
 * Triangular solves on the storage of lu-factors.ts, as functions of arrays.
 *
 * Two ways through a triangular system: in the order of pivots, over all of them (cheap per pivot, but as long as the
 * matrix), or only over the pivots that the right side reaches, found first by a search in the graph of the factor
 * (hyper-sparse). Source: Gilbert and Peierls (1988), "Sparse partial pivoting in time proportional to arithmetic
 * operations", SIAM J. Sci. Stat. Comput. 9; their use in simplex codes: Hall and McKinnon (2005),
 * "Hyper-sparsity in the revised simplex method and how to exploit it", Comput. Optim. Appl. 32.
 */

/**
 * x ← the solution of a unit triangular system given by columns, `count` pivots taken from
 * `order[first]` on, forwards (step 1) or backwards (step −1).
 * hot: every ftran and btran.
 * @returns entries touched
 */
export function eliminateInOrder(
  order: Int32Array,
  first: number,
  step: number,
  count: number,
  start: Int32Array,
  end: Int32Array,
  index: Int32Array,
  value: Float64Array,
  x: Float64Array,
): number {
  let touched = 0;
  const stop = first + step * count;
  for (let k = first; k !== stop; k += step) {
    const row = order[k];
    const pivotValue = x[row];
    if (pivotValue === 0) continue;
    const last = end[row];
    for (let at = start[row]; at < last; at++) x[index[at]] -= pivotValue * value[at];
    touched += last - start[row];
  }
  return touched;
}

/**
 * The same with a diagonal, for U: x[row] is divided before it is passed on. Entries of magnitude below `drop`
 * become 0. `order` may hold −1 for pivots moved elsewhere. The places that end nonzero are listed in `list`.
 * hot: every ftran and btran.
 * @param tally its first entry is raised by the number of entries touched
 * @returns number of places listed
 */
export function divideInOrder(
  order: Int32Array,
  first: number,
  step: number,
  count: number,
  start: Int32Array,
  end: Int32Array,
  index: Int32Array,
  value: Float64Array,
  diagonal: Float64Array,
  drop: number,
  x: Float64Array,
  list: Int32Array,
  tally: Float64Array,
): number {
  let touched = 0;
  let listed = 0;
  const stop = first + step * count;
  for (let k = first; k !== stop; k += step) {
    const row = order[k];
    if (row < 0) continue;
    let pivotValue = x[row];
    if (pivotValue === 0) continue;
    if (pivotValue < drop && pivotValue > -drop) {
      x[row] = 0;
      continue;
    }
    pivotValue /= diagonal[row];
    x[row] = pivotValue;
    list[listed++] = row;
    const last = end[row];
    for (let at = start[row]; at < last; at++) x[index[at]] -= pivotValue * value[at];
    touched += last - start[row];
  }
  tally[0] += touched;
  return listed;
}

/** Scratch of the search below: owned by the factorization, lengths m. */
export interface ReachScratch {
  readonly stack: Int32Array;
  readonly place: Int32Array;
  /** All 0 between calls. */
  readonly isSeen: Uint8Array;
}

/**
 * The pivots that a right side reaches, in an order in which they can be eliminated from last to first.
 * hot: hyper-sparse solves.
 * @param list holds `count` starting places; not changed
 * @param reached receives the places; iterate it backwards
 * @param limit gives up (returns −1) when more than this many are reached
 */
export function reachOf(
  list: Int32Array,
  count: number,
  start: Int32Array,
  end: Int32Array,
  index: Int32Array,
  scratch: ReachScratch,
  reached: Int32Array,
  limit: number,
): number {
  const { stack, place, isSeen } = scratch;
  let found = 0;
  for (let k = 0; k < count; k++) {
    const root = list[k];
    if (isSeen[root] === 1) continue;
    let depth = 0;
    stack[0] = root;
    place[0] = start[root];
    isSeen[root] = 1;
    while (depth >= 0) {
      const node = stack[depth];
      let at = place[depth];
      const last = end[node];
      let descended = false;
      while (at < last) {
        const next = index[at++];
        if (isSeen[next] === 0) {
          place[depth] = at;
          isSeen[next] = 1;
          depth++;
          stack[depth] = next;
          place[depth] = start[next];
          descended = true;
          break;
        }
      }
      if (descended) continue;
      reached[found++] = node;
      depth--;
      if (found > limit) {
        // give up: clear every mark that was set
        for (let i = 0; i < found; i++) isSeen[reached[i]] = 0;
        for (let i = 0; i <= depth; i++) isSeen[stack[i]] = 0;
        return -1;
      }
    }
  }
  for (let i = 0; i < found; i++) isSeen[reached[i]] = 0;
  return found;
}
