/**
 * The result columns of a plan and their defined names: one name a column, numbered like the block it stands for,
 * with the separator and scope of the plan's own names.
 */

/** What a result column holds, as it stands in the column's name: `Week.ReducedCost`. */
export type ResultRole = 'Before' | 'Optimum' | 'ReducedCost' | 'LeftSide' | 'Slack' | 'DualValue';

/** For each decision block, in the order in which the columns stand. */
export const decisionResultRoles = ['Before', 'Optimum', 'ReducedCost'] as const;

/** For each set of constraint rows. */
export const constraintResultRoles = ['LeftSide', 'Slack', 'DualValue'] as const;

/** How the names of a plan are written (a part of SheetModel). */
export interface PlanNaming {
  readonly prefix: string;
  readonly separator: '.' | '_';
}

/** `Week.Optimum` for the first block, `Week.Optimum2` for the second. */
export function resultNameOf(plan: PlanNaming, role: ResultRole, blockNumber: number): string {
  return `${plan.prefix}${plan.separator}${role}${blockNumber === 1 ? '' : String(blockNumber)}`;
}
