/**
 * The workbook's own arithmetic against the model: at the plan, the objective cell and the cells of both sides of
 * every constraint row, recalculated by their formulas, must hold what the model says. Coefficients were worked out
 * from these formulas, so a difference means that one of the two readings is wrong, and the plan is not proved.
 */
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import type { CellValue } from '../sheet/cell-value';
import { storedValue, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { SheetModel } from '../model-from-sheet/sheet-model';
import { constraintRowsOf, type PlanSolution } from './plan-solution';
import { resultNotice, type ResultNotice } from './result-notice';
import { isWithin, resultTolerances } from './result-tolerances';

/** The workbook with the plan in its decision cells. */
export interface WorkbookAtPlan {
  /** What the changed cells hold, by formatCellAddress. */
  readonly changes: ReadonlyMap<string, CellValue>;
  /** Formulas that depend on them. */
  readonly values: readonly { readonly cell: CellAddress; readonly value: CellValue }[];
  readonly notRecalculated: readonly { readonly cell: CellAddress }[];
}

export interface WorkbookAgreement {
  /** null without an objective cell, or where it cannot be recalculated. */
  readonly objective: number | null;
  /** One a cell that disagrees. */
  readonly notices: readonly ResultNotice[];
}

export function compareWithWorkbook(
  workbook: WorkbookSnapshot,
  model: SheetModel,
  solution: PlanSolution,
  atPlan: WorkbookAtPlan,
): WorkbookAgreement {
  const known = new Map<string, CellValue | undefined>(atPlan.changes);
  atPlan.values.forEach(({ cell, value }) => known.set(formatCellAddress(cell), value));
  atPlan.notRecalculated.forEach(({ cell }) => known.set(formatCellAddress(cell), undefined));
  /** undefined: not known, so that there is nothing to compare. */
  const valueAt = (cell: CellAddress): CellValue | undefined => {
    const key = formatCellAddress(cell);
    return known.has(key) ? known.get(key) : storedValue(workbook, cell);
  };

  const notices: ResultNotice[] = [];
  const compare = (cell: CellAddress, what: string, model: number, scale: number): number | null => {
    const value = valueAt(cell);
    if (value === undefined) {
      return null;
    }
    // A blank cell counts as 0, as it does in a formula.
    const amount = value === null ? 0 : value;
    if (typeof amount === 'number' && isWithin(amount, model, resultTolerances.workbookAgreement, scale)) {
      return amount;
    }
    const workbookValue = typeof amount === 'number' ? amount : String(amount);
    notices.push(resultNotice('workbook-disagrees', cell, { what, workbook: workbookValue, model }));
    return typeof amount === 'number' ? amount : null;
  };

  const { objectiveCell } = model;
  const objective =
    objectiveCell === null
      ? null
      : compare(objectiveCell, 'objective', solution.objective, solution.objectiveScale);
  constraintRowsOf(model).forEach((row, position) => {
    const { leftSide, rightSide, scale } = solution.constraints[position];
    if (row.leftCell !== null) {
      compare(row.leftCell, row.label, leftSide, scale);
    }
    compare(row.rightCell, row.label, rightSide, scale);
  });
  return { objective, notices };
}
