/**
 * Puts back what the decision cells held before the last solve. Only cells that still hold what was written are
 * touched; what the planner has changed since stays, and is reported.
 */
import { recalculate } from '../calculation/recalculate';
import { cellsOfArea } from '../model-from-sheet/model-declaration';
import type { PlanListing } from '../model-from-sheet/naming-convention';
import { readDeclaration } from '../model-from-sheet/read-declaration';
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import { findSheet, storedValue, type SheetCell, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { WorkbookWrite, WritePlan } from './write-plan';
import {
  planRecordKey,
  readWorkbookRecord,
  renewWorkbookRecord,
  stillHolds,
  type DecisionRecord,
  type WrittenValue,
} from './written-cells';

export interface PutBack {
  readonly plan: WritePlan;
  /** Cells that receive what they held. */
  readonly restoredCount: number;
  /** Cells that no longer hold what was written, and stay as they are. */
  readonly left: readonly CellAddress[];
}

/**
 * @param now the caller's clock as a serial date of the workbook, for TODAY and NOW
 * @returns null where nothing was written that could be put back
 */
export function planPutBack(workbook: WorkbookSnapshot, plan: PlanListing, now: number): PutBack | null {
  const record = readWorkbookRecord(workbook.record);
  const planRecord = record.get(planRecordKey(plan.name));
  if (planRecord === undefined || planRecord.decisions.length === 0) {
    return null;
  }
  const { declaration } = readDeclaration(workbook, plan);
  const writes: WorkbookWrite[] = [];
  const changes = new Map<string, number>();
  const left: CellAddress[] = [];
  for (const block of planRecord.decisions) {
    const area = declaration.decisions.find(({ number }) => number === block.block);
    const cells = area === undefined ? [] : cellsOfArea(area);
    const entries = entriesOfCells(
      cells.map((cell) => cellAt(workbook, cell)),
      block,
    );
    cells.forEach((cell, position) => {
      const entry = entries[position];
      if (entry === undefined) {
        left.push(cell);
      } else if (entry.before !== entry.written) {
        writes.push({ kind: 'value', cell, value: entry.before });
        changes.set(formatCellAddress(cell), typeof entry.before === 'number' ? entry.before : 0);
      }
    });
  }
  const restoredCount = writes.length;
  const recalculation = recalculate(workbook, changes, now);
  for (const { cell, value } of recalculation.values) {
    if (storedValue(workbook, cell) !== value) {
      writes.push({ kind: 'storedValue', cell, value });
    }
  }
  for (const { cell } of recalculation.notRecalculated) {
    writes.push({ kind: 'storedValue', cell, value: undefined });
  }
  const json = renewWorkbookRecord(record, plan.name, { ...planRecord, decisions: [] });
  writes.push({ kind: 'record', json });
  // To some functions a cleared cell is not the 0 that it was recalculated with.
  writes.push({ kind: 'recalculateOnOpening' });
  return { plan: writes, restoredCount, left };
}

interface RecordedCell {
  readonly before: WrittenValue;
  readonly written: WrittenValue;
}

/**
 * What was recorded for each cell that still holds it; undefined for the others. Where rows have been inserted or
 * taken away, equal beginnings and ends are matched; what lies between counts as the planner's.
 */
function entriesOfCells(
  cells: readonly (SheetCell | undefined)[],
  { before, written }: DecisionRecord,
): (RecordedCell | undefined)[] {
  const entries: (RecordedCell | undefined)[] = cells.map(() => undefined);
  const match = (position: number, entry: number): boolean => {
    const cell = cells[position];
    if (cell?.formula !== undefined || !stillHolds(cell?.value ?? null, written[entry])) {
      return false;
    }
    entries[position] = { before: before[entry], written: written[entry] };
    return true;
  };
  if (cells.length === written.length) {
    cells.forEach((_cell, position) => match(position, position));
    return entries;
  }
  const shorter = Math.min(cells.length, written.length);
  let start = 0;
  while (start < shorter && match(start, start)) {
    start++;
  }
  for (let fromEnd = 1; fromEnd <= shorter - start; fromEnd++) {
    if (!match(cells.length - fromEnd, written.length - fromEnd)) {
      break;
    }
  }
  return entries;
}

function cellAt(workbook: WorkbookSnapshot, { sheet, row, column }: CellAddress): SheetCell | undefined {
  return findSheet(workbook, sheet)?.cell(row, column);
}
