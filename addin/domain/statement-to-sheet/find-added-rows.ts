/**
 * Rows that were added under a block and look like it: a product typed below the last one, a limit below the last
 * limit. Their names do not grow by themselves, so the planner is told, and may extend all names of a block together.
 */
import { resolveName } from '../formula/resolve-reference';
import type { StatementRole } from '../model-from-sheet/naming-convention';
import { readRelation } from '../model-from-sheet/statement-words';
import type { WritePlan } from '../results-to-sheet/write-plan';
import {
  absoluteRangeText,
  columnCountOf,
  containsCell,
  rowCountOf,
  type CellRange,
} from '../sheet/cell-range';
import { findSheet, type SheetSnapshot, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { resultNamesOfPlan, type StatedPart, type StatedPlan } from './describe-plans';

export interface AddedRows {
  /** `decisions`: under a block of decision cells; `constraints`: under a set of constraint rows. */
  readonly kind: 'decisions' | 'constraints';
  /** The name of the block that they were added under. */
  readonly name: string;
  /** The added rows, as wide as the block. */
  readonly range: CellRange;
  /** The names that would be extended, the block's first. */
  readonly names: readonly string[];
  /** Extends them. */
  readonly writes: WritePlan;
}

/** More rows than these were not typed below a block: it is something else. */
const mostRows = 500;

const rolesOfDecisions: readonly StatementRole[] = [
  'Decision',
  'Objective',
  'Lower',
  'Upper',
  'Lot',
  'LeastRun',
  'DecisionLabel',
];
const rolesOfConstraints: readonly StatementRole[] = [
  'Constraint',
  'Left',
  'Relation',
  'Right',
  'ConstraintLabel',
];

export function findAddedRows(workbook: WorkbookSnapshot, plan: StatedPlan): AddedRows[] {
  const results = resultNamesOfPlan(workbook, plan.listing).flatMap((name) => {
    const resolution = resolveName(workbook, name);
    return resolution.kind === 'ranges' ? resolution.ranges : [];
  });
  const taken = plan.parts.flatMap(({ reading }) => (reading.kind === 'cells' ? reading.ranges : []));
  return plan.parts.flatMap((part): AddedRows[] => {
    const range = growingRange(part);
    const sheet = range && findSheet(workbook, range.sheet);
    if (range === undefined || sheet === undefined) {
      return [];
    }
    const isDecisions = part.role === 'Decision';
    const looksAlike = isDecisions
      ? (row: number) => isLikeDecisionRow(sheet, range, row, results)
      : (row: number) => isConstraintRow(sheet, range, row);
    let count = 0;
    while (count < mostRows && looksAlike(range.bottom + 1 + count)) {
      const row = range.bottom + 1 + count;
      if (taken.some((other) => containsCell(other, { sheet: range.sheet, row, column: range.left }))) {
        break;
      }
      count++;
    }
    return count === 0 || count === mostRows ? [] : [addedRows(plan, part, range, count)];
  });
}

/** The rectangle of a part that stands upright as written cells; a table's column grows by itself. */
function growingRange({ role, formula, reading }: StatedPart): CellRange | undefined {
  if (reading.kind !== 'cells' || reading.ranges.length !== 1) {
    return undefined;
  }
  const [range] = reading.ranges;
  const isBlock = role === 'Decision' ? columnCountOf(range) === 1 : columnCountOf(range) === 3;
  const isWritten = formula.trim().toLowerCase() === absoluteRangeText(range).toLowerCase();
  return (role === 'Decision' || role === 'Constraint') && isBlock && isWritten && rowCountOf(range) > 1
    ? range
    : undefined;
}

function addedRows(plan: StatedPlan, part: StatedPart, range: CellRange, count: number): AddedRows {
  const isDecisions = part.role === 'Decision';
  const roles = isDecisions ? rolesOfDecisions : rolesOfConstraints;
  const beside = plan.parts.filter((other) => {
    const [own] = other.reading.kind === 'cells' ? other.reading.ranges : [];
    return (
      roles.includes(other.role) &&
      other.reading.kind === 'cells' &&
      other.reading.ranges.length === 1 &&
      own.sheet === range.sheet &&
      own.top === range.top &&
      own.bottom === range.bottom &&
      other.formula.trim().toLowerCase() === absoluteRangeText(own).toLowerCase()
    );
  });
  const together = [part, ...beside.filter((other) => other !== part)];
  return {
    kind: isDecisions ? 'decisions' : 'constraints',
    name: part.name,
    range: { ...range, top: range.bottom + 1, bottom: range.bottom + count },
    names: together.map(({ name }) => name),
    writes: together.map(({ name, reading }) => {
      const own = reading.kind === 'cells' ? reading.ranges[0] : range;
      const formula = absoluteRangeText({ ...own, bottom: own.bottom + count });
      return { kind: 'name', name, scope: plan.listing.scope, formula };
    }),
  };
}

type Kind = 'blank' | 'number' | 'text' | 'formula';

function kindAt(sheet: SheetSnapshot, row: number, column: number): Kind {
  const cell = sheet.cell(row, column);
  if (cell?.formula !== undefined) {
    return 'formula';
  }
  const value = cell?.value ?? null;
  return typeof value === 'number' ? 'number' : value === null || value === '' ? 'blank' : 'text';
}

/**
 * Whether a row continues the last one of a block of decisions: a label where that has one, formulas where that has
 * them, numbers or blanks elsewhere. A row of totals has a formula where the decision would stand; a heading has no
 * numbers.
 */
function isLikeDecisionRow(
  sheet: SheetSnapshot,
  block: CellRange,
  row: number,
  results: readonly CellRange[],
): boolean {
  const isResult = (column: number): boolean =>
    results.some((range) => containsCell(range, { sheet: block.sheet, row: block.bottom, column }));
  let labels = 0;
  let amounts = 0;
  for (let column = 0; column < sheet.columnCount; column++) {
    const is = kindAt(sheet, row, column);
    if (column >= block.left && column <= block.right) {
      if (is !== 'number' && is !== 'blank') return false;
      continue;
    }
    if (isResult(column)) continue;
    const was = kindAt(sheet, block.bottom, column);
    const isAlike =
      was === is || (was === 'number' && is === 'blank') || (was === 'blank' && is === 'number');
    if (!isAlike) return false;
    if (is === 'text') labels++;
    if (is === 'number' || is === 'formula') amounts++;
  }
  return labels > 0 && amounts > 0;
}

/** Whether a row has what a constraint row in formula form has: a left side, a relation, a right side. */
function isConstraintRow(sheet: SheetSnapshot, block: CellRange, row: number): boolean {
  const relation = sheet.cell(row, block.left + 1)?.value;
  const known = typeof relation === 'string' ? readRelation(relation) : undefined;
  return (
    known !== undefined &&
    ['number', 'formula'].includes(kindAt(sheet, row, block.left)) &&
    ['number', 'formula'].includes(kindAt(sheet, row, block.right))
  );
}
