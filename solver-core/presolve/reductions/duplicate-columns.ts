/**
 * Compares columns that are multiples of one another, A_k = t A_j.
 *
 * With δ = cost_k − t cost_j, the reduced costs obey d_k = t d_j + δ.
 *   - δ = 0: the two act as one, x_j + t x_k, with the sum of their bounds.
 *   - δ ≠ 0: one of them does the same work for less. If x_j can make up for every amount of x_k without meeting a
 *     bound, x_k is dominated and stands at its lower bound (δ > 0) or upper bound (δ < 0); and the other way round.
 *
 * Undo of a merger: at a bound of the sum, both stand at the bound that gave it. Between, one rests at a bound and the
 * other is basic with the remainder: the first such split in which both keep their bounds. d_k = t d_j.
 * Source: Andersen and Andersen (1995), Mathematical Programming 71, §3.4 (duplicate columns), found after Tomlin and
 * Welch (1986), Operations Research Letters 5.
 */
import { tolerances } from '../../control/tolerances';
import { VariableStatus } from '../../linear-program/basis';
import { parallelColumns } from '../parallel-lines';
import { statusAt, type PostsolveSolution, type Side } from '../postsolve-solution';
import type { PostsolveStack } from '../postsolve-stack';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { Finding, ProblemReduction } from '../reduction';
import { type ColumnAtValue, restoreColumnAtValue, takeOutAtValue } from './fixed-column';

interface Bounds {
  readonly lower: number;
  readonly upper: number;
}

interface MergedColumns {
  readonly kind: 'merged';
  /** x_j, which stands for the sum afterwards, and x_k. */
  readonly kept: number;
  readonly removed: number;
  /** t */
  readonly ratio: number;
  readonly keptBounds: Bounds;
  readonly removedBounds: Bounds;
}

type DuplicateColumns = MergedColumns | (ColumnAtValue & { readonly kind: 'dominated' });

/** Columns of a group that each further one is compared with: among many of different cost, few pairs matter. */
const mostCompared = 4;

export const duplicateColumns: ProblemReduction<DuplicateColumns> = {
  name: 'duplicate-columns',

  applyToProblem(workspace, stack) {
    let finding: Finding = 'nothing';
    for (const { leader, others } of parallelColumns(workspace)) {
      const remaining = [{ line: leader, ratio: 1 }];
      for (const other of others) {
        const found = compareWithAll(workspace, remaining, other, stack);
        if (found === 'applied') finding = found;
        else if (found !== 'nothing') return found;
        if (workspace.isColumnActive(other.line) && remaining.length < mostCompared) remaining.push(other);
      }
    }
    return finding;
  },

  undo(record, solution) {
    if (record.kind === 'dominated') restoreColumnAtValue(record, solution);
    else splitMerged(record, solution);
  },
};

interface Parallel {
  readonly line: number;
  /** Relative to the group's leader. */
  readonly ratio: number;
}

function compareWithAll(
  workspace: PresolveWorkspace,
  remaining: Parallel[],
  other: Parallel,
  stack: PostsolveStack,
): Finding {
  let finding: Finding = 'nothing';
  for (let k = 0; k < remaining.length; k++) {
    const found = compare(workspace, remaining[k].line, other.line, other.ratio / remaining[k].ratio, stack);
    if (found === 'nothing') continue;
    if (found !== 'applied') return found;
    finding = found;
    if (!workspace.isColumnActive(other.line)) break;
    remaining.splice(k--, 1);
  }
  return finding;
}

function compare(
  workspace: PresolveWorkspace,
  kept: number,
  removed: number,
  ratio: number,
  stack: PostsolveStack,
): Finding {
  const { cost } = workspace;
  const difference = cost[removed] - ratio * cost[kept];
  const size = Math.max(Math.abs(cost[removed]), Math.abs(ratio * cost[kept]));
  if (Math.abs(difference) <= tolerances.presolveParallel * size) {
    return merge(workspace, kept, removed, ratio, stack);
  }
  if (Math.abs(difference) <= tolerances.presolveDominance * (1 + size)) return 'nothing';
  const found = fixDominated(workspace, removed, kept, ratio, difference > 0 ? 'lower' : 'upper', stack);
  if (found !== 'nothing') return found;
  // A_j = A_k / t, and cost_j − cost_k / t = −δ / t.
  return fixDominated(workspace, kept, removed, 1 / ratio, difference / ratio > 0 ? 'upper' : 'lower', stack);
}

/**
 * Fixes a column on the side its price calls for, if the parallel one can make up for it.
 * @param ratio entries of `dominated` divided by those of `other`
 */
function fixDominated(
  workspace: PresolveWorkspace,
  dominated: number,
  other: number,
  ratio: number,
  side: Side,
  stack: PostsolveStack,
): Finding {
  // x_dominated moves towards `side`; the other moves the opposite way, times the ratio.
  const otherRises = (side === 'lower') === ratio > 0;
  const hasRoom = otherRises
    ? workspace.columnUpper[other] === Infinity
    : workspace.columnLower[other] === -Infinity;
  if (!hasRoom) return 'nothing';
  const value = (side === 'lower' ? workspace.columnLower : workspace.columnUpper)[dominated];
  if (!Number.isFinite(value)) return { kind: 'unbounded' };
  const record = takeOutAtValue(workspace, dominated, value, statusAt(side), stack);
  stack.push(duplicateColumns, { kind: 'dominated', ...record });
  return 'applied';
}

function merge(
  workspace: PresolveWorkspace,
  kept: number,
  removed: number,
  ratio: number,
  stack: PostsolveStack,
): Finding {
  const keptBounds = { lower: workspace.columnLower[kept], upper: workspace.columnUpper[kept] };
  const removedBounds = { lower: workspace.columnLower[removed], upper: workspace.columnUpper[removed] };
  const lower = keptBounds.lower + ratio * (ratio > 0 ? removedBounds.lower : removedBounds.upper);
  const upper = keptBounds.upper + ratio * (ratio > 0 ? removedBounds.upper : removedBounds.lower);
  // A sum without bounds may rest at 0 without a bound that holds it; its parts could not both rest there.
  if (lower === -Infinity && upper === Infinity) return 'nothing';
  stack.push(duplicateColumns, { kind: 'merged', kept, removed, ratio, keptBounds, removedBounds });
  workspace.removeColumn(removed);
  workspace.setColumnBounds(kept, lower, upper);
  return 'applied';
}

function splitMerged(record: MergedColumns, solution: PostsolveSolution): void {
  const { kept, removed, ratio, keptBounds, removedBounds } = record;
  const side = solution.sideOfColumn(kept, false);
  const reducedCost = solution.reducedCosts[kept];
  const boundOf = (bounds: Bounds, at: Side): number => solution.bound(bounds[at]);
  if (side !== undefined) {
    const removedSide: Side = (side === 'lower') === ratio > 0 ? 'lower' : 'upper';
    solution.setColumn(kept, boundOf(keptBounds, side), reducedCost, statusAt(side));
    solution.setColumn(
      removed,
      boundOf(removedBounds, removedSide),
      ratio * reducedCost,
      statusAt(removedSide),
    );
    return;
  }
  const sum = solution.x[kept];
  let best: { keptValue: number; removedValue: number; restingSide: Side; restsRemoved: boolean } | undefined;
  let leastViolation = Infinity;
  const consider = (restsRemoved: boolean, restingSide: Side): void => {
    const rest = boundOf(restsRemoved ? removedBounds : keptBounds, restingSide);
    if (!Number.isFinite(rest)) return;
    const keptValue = restsRemoved ? sum - ratio * rest : rest;
    const removedValue = restsRemoved ? rest : (sum - rest) / ratio;
    const violation =
      outside(keptValue, boundOf(keptBounds, 'lower'), boundOf(keptBounds, 'upper')) +
      outside(removedValue, boundOf(removedBounds, 'lower'), boundOf(removedBounds, 'upper'));
    if (violation >= leastViolation) return;
    leastViolation = violation;
    best = { keptValue, removedValue, restingSide, restsRemoved };
  };
  consider(true, 'lower');
  consider(true, 'upper');
  consider(false, 'lower');
  consider(false, 'upper');
  // One of the four bounds is there, since the sum has one.
  const { keptValue, removedValue, restingSide, restsRemoved } = best!;
  const { basic } = VariableStatus;
  solution.setColumn(kept, keptValue, 0, restsRemoved ? basic : statusAt(restingSide));
  solution.setColumn(removed, removedValue, 0, restsRemoved ? statusAt(restingSide) : basic);
}

function outside(value: number, lower: number, upper: number): number {
  return Math.max(lower - value, value - upper, 0);
}
