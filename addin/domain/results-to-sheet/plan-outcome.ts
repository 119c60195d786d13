/**
 * How a solve of a plan ended, as plain data without the model behind it: small enough to pass from thread to thread,
 * and all that a face shows.
 */
import type { SolveResult } from '#solver-core';
import type { ModelIssue } from '../model-from-sheet/model-issue';
import type { ModelSize } from '../model-from-sheet/read-plan';
import type { PlanSense, Relation, SheetModel } from '../model-from-sheet/sheet-model';
import type { CellAddress } from '../sheet/cell-address';
import { constraintRowsOf, evaluateForm, variableValuesAt, type PlanSolution } from './plan-solution';
import type { ResultWrites } from './plan-result-writes';

export interface DecisionOutcome {
  readonly label: string;
  readonly cell: CellAddress;
  /** What the cell held; null when blank. */
  readonly before: number | null;
  /** −Infinity and Infinity where there is none. */
  readonly lower: number;
  readonly upper: number;
  /** null without a plan, as is the reduced cost. */
  readonly optimum: number | null;
  readonly reducedCost: number | null;
}

export interface ConstraintOutcome {
  readonly label: string;
  readonly cell: CellAddress;
  readonly relation: Relation;
  /** null without a plan, as are the others. */
  readonly leftSide: number | null;
  readonly rightSide: number | null;
  readonly slack: number | null;
  readonly dualValue: number | null;
  readonly isBinding: boolean;
}

/** The plan has errors: nothing was solved. */
export interface InvalidOutcome {
  readonly kind: 'invalid';
  readonly planName: string;
  readonly issues: readonly ModelIssue[];
}

export interface SolvedOutcome {
  readonly kind: 'solved';
  readonly planName: string;
  readonly sense: PlanSense;
  readonly size: ModelSize;
  /** Warnings only. */
  readonly issues: readonly ModelIssue[];
  /** `imprecise` in place of `optimal` where the workbook's own arithmetic disagrees with the model. */
  readonly status: SolveResult['status'];
  /** What could not be shown, of an imprecise plan; null otherwise. */
  readonly reason: string | null;
  readonly iterations: number;
  readonly objective: number | null;
  /** The objective at what the decision cells held; null where they held nothing. */
  readonly objectiveBefore: number | null;
  /** null where the objective is given by coefficients. */
  readonly objectiveCell: CellAddress | null;
  readonly decisions: readonly DecisionOutcome[];
  readonly constraints: readonly ConstraintOutcome[];
  /** What is to be written; null without a plan. */
  readonly writes: ResultWrites | null;
}

export type PlanOutcome = InvalidOutcome | SolvedOutcome;

export interface SolvedParts {
  readonly model: SheetModel;
  readonly size: ModelSize;
  readonly issues: readonly ModelIssue[];
  readonly result: SolveResult;
  readonly solution: PlanSolution | null;
  readonly writes: ResultWrites | null;
}

export function outcomeOf(parts: SolvedParts): SolvedOutcome {
  const { model, size, issues, result, solution, writes } = parts;
  const disagrees = writes?.workbookAgrees === false;
  return {
    kind: 'solved',
    planName: model.planName,
    sense: model.sense,
    size,
    issues,
    status: result.status === 'optimal' && disagrees ? 'imprecise' : result.status,
    reason: result.status === 'imprecise' ? result.reason : null,
    iterations: result.iterations,
    objective: solution?.objective ?? null,
    objectiveBefore: objectiveBefore(model),
    objectiveCell: model.objectiveCell,
    decisions: model.decisions.map(({ label, cell, before, lower, upper }, position) => ({
      label,
      cell,
      before,
      lower,
      upper,
      optimum: solution?.decisions[position].value ?? null,
      reducedCost: solution?.decisions[position].reducedCost ?? null,
    })),
    constraints: constraintRowsOf(model).map(({ label, cell, relation }, position) => {
      const solved = solution?.constraints[position];
      return {
        label,
        cell,
        relation,
        leftSide: solved?.leftSide ?? null,
        rightSide: solved?.rightSide ?? null,
        slack: solved?.slack ?? null,
        dualValue: solved?.dualValue ?? null,
        isBinding: solved?.isBinding ?? false,
      };
    }),
    writes,
  };
}

function objectiveBefore(model: SheetModel): number | null {
  if (model.decisions.every(({ before }) => before === null)) {
    return null;
  }
  const held = model.decisions.map(({ before }) => before ?? 0);
  return evaluateForm(model.objective, variableValuesAt(model, held)).value;
}
