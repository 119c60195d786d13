/**
 * Merges rows that are multiples of one another: s = t · r asks of r what it asks of itself, divided by t. The tighter
 * bounds stay with r.
 *
 * Undo: when r stands at a bound that s gave, s binds in its place, with y_s = y_r / t, and r's logical is basic.
 * Otherwise that of s is basic.
 * Source: Tomlin and Welch (1986), "Finding duplicate rows in a linear programming model", Operations Research
 * Letters 5; Andersen and Andersen (1995), Mathematical Programming 71, §3.4.
 */
import { VariableStatus } from '../../linear-program/basis';
import { parallelRows } from '../parallel-lines';
import { statusAt } from '../postsolve-solution';
import type { PostsolveStack } from '../postsolve-stack';
import type { PresolveWorkspace } from '../presolve-workspace';
import type { Finding, ProblemReduction } from '../reduction';
import { feasibilitySlack } from '../feasibility-slack';

interface DuplicateRows {
  readonly kept: number;
  readonly removed: number;
  /** removed = ratio × kept */
  readonly ratio: number;
  readonly isLowerOfRemoved: boolean;
  readonly isUpperOfRemoved: boolean;
  readonly isEquation: boolean;
}

export const duplicateRows: ProblemReduction<DuplicateRows> = {
  name: 'duplicate-rows',

  applyToProblem(workspace, stack) {
    let finding: Finding = 'nothing';
    for (const { leader, others } of parallelRows(workspace)) {
      for (const { line, ratio } of others) {
        finding = merge(workspace, leader, line, ratio, stack);
        if (finding !== 'applied') return finding;
      }
    }
    return finding;
  },

  undo({ kept, removed, ratio, isLowerOfRemoved, isUpperOfRemoved, isEquation }, solution) {
    const side = solution.sideOfRow(kept, isEquation);
    const isHeldByRemoved = (side === 'lower' && isLowerOfRemoved) || (side === 'upper' && isUpperOfRemoved);
    const dual = solution.rowDuals[kept];
    if (isHeldByRemoved) {
      const removedSide = (side === 'lower') === ratio > 0 ? 'lower' : 'upper';
      solution.setRow(removed, dual / ratio, statusAt(removedSide));
      solution.setRow(kept, 0, VariableStatus.basic);
      return;
    }
    solution.setRow(removed, 0, VariableStatus.basic);
    if (side !== undefined) solution.setRow(kept, dual, statusAt(side));
  },
};

function merge(
  workspace: PresolveWorkspace,
  kept: number,
  removed: number,
  ratio: number,
  stack: PostsolveStack,
): Finding {
  const { rowLower, rowUpper, rowScale } = workspace;
  const ownLower = rowLower[kept];
  const ownUpper = rowUpper[kept];
  const otherLower = (ratio > 0 ? rowLower : rowUpper)[removed] / ratio;
  const otherUpper = (ratio > 0 ? rowUpper : rowLower)[removed] / ratio;
  const slack = feasibilitySlack(Math.max(rowScale[kept], rowScale[removed] / Math.abs(ratio)));
  if (otherLower > ownUpper + slack) return contradiction(removed, 1 / ratio, kept, -1);
  if (otherUpper < ownLower - slack) return contradiction(removed, -1 / ratio, kept, 1);
  const lower = Math.min(Math.max(ownLower, otherLower), ownUpper);
  const upper = Math.max(Math.min(ownUpper, otherUpper), lower);
  stack.push(duplicateRows, {
    kept,
    removed,
    ratio,
    isLowerOfRemoved: lower > ownLower,
    isUpperOfRemoved: upper < ownUpper,
    isEquation: lower === upper,
  });
  workspace.removeRow(removed);
  if (lower !== ownLower || upper !== ownUpper) workspace.setRowBounds(kept, lower, upper);
  return 'applied';
}

function contradiction(row: number, multiplier: number, other: number, otherMultiplier: number): Finding {
  return {
    kind: 'infeasible',
    multipliers: [
      { row, multiplier },
      { row: other, multiplier: otherMultiplier },
    ],
  };
}
