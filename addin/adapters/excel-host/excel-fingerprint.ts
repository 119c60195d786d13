/// <reference types="office-js" />
/**
 * Whether a workbook is still what a plan was made from: names, tables, and every cell that the plan's statement
 * depends on, are compared with the snapshot that it was read into. Others may edit cells that the plan does not use.
 *
 * What is compared is what was entered, formulas and constants, not results: two workbooks with the same entries have
 * the same results.
 */
import { cellKey } from '../../domain/sheet/cell-address';
import { cellCountOf, cellsOf, rangesOverlap, type CellRange } from '../../domain/sheet/cell-range';
import { CellError } from '../../domain/sheet/cell-value';
import type { DefinedName } from '../../domain/sheet/defined-name';
import { findSheet, type SheetSnapshot, type WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import { referencesOfFormula } from '../../domain/formula/formula-references';
import { resolveName } from '../../domain/formula/resolve-reference';
import { readRoleName } from '../../domain/model-from-sheet/naming-convention';
import { WorkbookError } from '../../ports/workbook';
import { RangeQueue } from './excel-chunking';
import { cellRangeOf, listRanges, placeOfRange } from './excel-ranges';
import { definedNameOf, workbookNamesOf } from './excel-reading';
import { arrayRangesOf, ExcelSheet } from './excel-sheet';

/** Bytes of an entry beside its own text: quotes, comma, the sign of a formula. */
const entryOverhead = 4;

/** A comparison under way: `request` before a round trip, `compare` after it, until `isDone`. */
export class Fingerprint {
  private readonly queue: RangeQueue;
  private readonly differing: CellRange[] = [];
  private takeAnswers: (() => void)[] = [];
  private isStarted = false;
  private relevant: readonly CellRange[] | undefined;

  constructor(
    private readonly context: Excel.RequestContext,
    private readonly basis: WorkbookSnapshot,
  ) {
    const ranges = basis.sheets.flatMap((sheet) => extentOf(sheet) ?? []);
    this.queue = new RangeQueue(ranges, bytesPerEntry(basis));
  }

  get isDone(): boolean {
    return this.isStarted && this.queue.isEmpty;
  }

  /** Asks for the next part, as a rule for everything. @param bytes what the message still has room for */
  request(bytes: number): void {
    if (!this.isStarted) this.requestStructure();
    this.isStarted = true;
    for (const part of this.queue.take(bytes)) {
      const sheet = findSheet(this.basis, part.sheet)!;
      const worksheet = this.context.workbook.worksheets.getItemOrNullObject(part.sheet).load('name');
      const range = worksheet
        .getRangeByIndexes(part.top, part.left, part.bottom - part.top + 1, part.right - part.left + 1)
        .load('formulas');
      this.takeAnswers.push(() => {
        if (worksheet.isNullObject) this.differing.push(part);
        else this.compareCells(sheet, part, range.formulas as unknown[][]);
      });
    }
  }

  /** @throws WorkbookError changed-meanwhile */
  compare(): void {
    this.takeAnswers.forEach((take) => take());
    this.takeAnswers = [];
    const changed = this.differing.filter((range) => this.isRelevant(range));
    if (changed.length > 0) throw changedMeanwhile(listRanges(changed), changed);
  }

  private requestStructure(): void {
    const { workbook } = this.context;
    const names = workbook.names.load('items/name,items/formula,items/visible,items/scope');
    const sheets = this.basis.sheets.map((sheet) => {
      const worksheet = workbook.worksheets.getItemOrNullObject(sheet.name).load('name');
      const used = worksheet.getUsedRangeOrNullObject(true).load(placeOfRange);
      return {
        sheet,
        worksheet,
        used,
        names: worksheet.names.load('items/name,items/formula,items/visible'),
      };
    });
    const tables = this.basis.tables.map((snapshot) => {
      const table = workbook.tables.getItemOrNullObject(snapshot.name).load('name');
      return { snapshot, table, range: table.getRange().load(placeOfRange) };
    });
    this.takeAnswers.push(() => {
      const present = workbookNamesOf(names);
      for (const { sheet, worksheet, used, names: local } of sheets) {
        if (worksheet.isNullObject) {
          if (this.isNeeded(sheet)) throw changedMeanwhile(`the sheet ${sheet.name}`, []);
          continue;
        }
        present.push(...local.items.map((item) => definedNameOf(item, sheet.name)));
        if (!used.isNullObject) this.compareExtent(sheet, cellRangeOf(sheet.name, used));
      }
      compareNames(this.basis.names, present);
      for (const { snapshot, table, range } of tables) {
        const { sheet, top, left, bottom, right } = snapshot.range;
        const isSame =
          !table.isNullObject &&
          range.rowIndex === top &&
          range.columnIndex === left &&
          range.rowCount === bottom - top + 1 &&
          range.columnCount === right - left + 1;
        if (!isSame && findSheet(this.basis, sheet) !== undefined) {
          throw changedMeanwhile(`the table ${snapshot.name}`, [snapshot.range]);
        }
      }
    });
  }

  /**
   * A reference to whole columns or rows ends where the sheet does, so that entries beyond that end belong to it too:
   * it is told by reaching from the first row or column to the last.
   */
  private compareExtent({ name, rowCount, columnCount }: SheetSnapshot, used: CellRange): void {
    const [lastRow, lastColumn] = [rowCount - 1, columnCount - 1];
    const whole = this.isStretched(used, lastRow, lastColumn)
      ? this.relevantRanges().find(
          (range) =>
            range.sheet === name &&
            ((used.bottom > lastRow && range.top === 0 && range.bottom === lastRow) ||
              (used.right > lastColumn && range.left === 0 && range.right === lastColumn)),
        )
      : undefined;
    if (whole !== undefined) this.differing.push(whole);
  }

  private isStretched(used: CellRange, lastRow: number, lastColumn: number): boolean {
    return lastRow >= 0 && (used.bottom > lastRow || used.right > lastColumn);
  }

  private compareCells(
    sheet: SheetSnapshot,
    part: CellRange,
    formulas: readonly (readonly unknown[])[],
  ): void {
    const filled = filledCellsOf(sheet);
    for (let row = part.top; row <= part.bottom; row++) {
      for (let column = part.left; column <= part.right; column++) {
        const present = formulas[row - part.top][column - part.left];
        if (!isSameEntry(present, entryIn(sheet, row, column)) && !filled.has(cellKey(row, column))) {
          this.differing.push({ sheet: sheet.name, top: row, left: column, bottom: row, right: column });
        }
      }
    }
  }

  private isNeeded(sheet: SheetSnapshot): boolean {
    return this.relevantRanges().some((range) => range.sheet === sheet.name);
  }

  private isRelevant(range: CellRange): boolean {
    return this.relevantRanges().some((needed) => rangesOverlap(needed, range));
  }

  /** Worked out only where something differs. */
  private relevantRanges(): readonly CellRange[] {
    return (this.relevant ??= relevantRangesOf(this.basis));
  }
}

/** Everything that some plan's statement refers to, directly or through formulas. */
function relevantRangesOf(workbook: WorkbookSnapshot): CellRange[] {
  const found: CellRange[] = [];
  const seen = new Set<string>();
  const pending: CellRange[] = [];
  const add = (range: CellRange): void => {
    const sheet = findSheet(workbook, range.sheet);
    const key = `${range.top},${range.left},${range.bottom},${range.right},${range.sheet.toLowerCase()}`;
    if (sheet !== undefined && !seen.has(key)) {
      seen.add(key);
      found.push({ ...range, sheet: sheet.name });
      pending.push({ ...range, sheet: sheet.name });
    }
  };
  for (const name of workbook.names) {
    if (readRoleName(name) === undefined) continue;
    const resolution = resolveName(workbook, name);
    if (resolution.kind === 'ranges') resolution.ranges.forEach(add);
  }
  const visited = new Set<string>();
  while (pending.length > 0) {
    const range = pending.pop()!;
    const sheet = findSheet(workbook, range.sheet)!;
    const within = {
      ...range,
      bottom: Math.min(range.bottom, sheet.rowCount - 1),
      right: Math.min(range.right, sheet.columnCount - 1),
    };
    for (const cell of cellsOf(within)) {
      const formula = sheet.cell(cell.row, cell.column)?.formula;
      const key = `${cell.row},${cell.column},${sheet.name}`;
      if (formula === undefined || visited.has(key)) continue;
      visited.add(key);
      const { ranges, hasComputedRanges } = referencesOfFormula(workbook, formula, cell);
      ranges.forEach(add);
      // Where a formula finds its cells only when it is calculated, they may be anywhere.
      if (hasComputedRanges) workbook.sheets.flatMap((other) => extentOf(other) ?? []).forEach(add);
    }
  }
  return found;
}

function compareNames(basis: readonly DefinedName[], present: readonly DefinedName[]): void {
  const keyOf = ({ name, scope }: DefinedName): string =>
    `${name.toLowerCase()}\n${(scope ?? '').toLowerCase()}`;
  const formulas = new Map(present.map((name) => [keyOf(name), name.formula]));
  for (const name of basis) {
    if (formulas.get(keyOf(name)) !== name.formula && !name.name.startsWith('_xlnm.')) {
      throw changedMeanwhile(`the name ${name.name}`, []);
    }
    formulas.delete(keyOf(name));
  }
  const added = present.find((name) => formulas.has(keyOf(name)) && readRoleName(name) !== undefined);
  if (added !== undefined) throw changedMeanwhile(`the name ${added.name}`, []);
}

/** @param what in words, after which the ranges are told to whoever shows them */
export function changedMeanwhile(what: string, ranges: readonly CellRange[]): WorkbookError {
  return new WorkbookError(
    'changed-meanwhile',
    `The workbook was changed after it was read (${what}), so these results may no longer be right. Nothing was written; solve again.`,
    { canRetry: true, ranges },
  );
}

/** The rectangle around everything that was read of a sheet. */
function extentOf(sheet: SheetSnapshot): CellRange | undefined {
  if (sheet instanceof ExcelSheet) return sheet.used;
  let extent: CellRange | undefined;
  sheet.forEachCell((row, column) => {
    extent = {
      sheet: sheet.name,
      top: Math.min(extent?.top ?? row, row),
      left: Math.min(extent?.left ?? column, column),
      bottom: Math.max(extent?.bottom ?? row, row),
      right: Math.max(extent?.right ?? column, column),
    };
  });
  return extent;
}

/** What stands in a cell as Excel shows its entry. */
function entryIn(sheet: SheetSnapshot, row: number, column: number): unknown {
  const cell = sheet.cell(row, column);
  if (cell?.formula !== undefined) return `=${cell.formula}`;
  const value = cell?.value ?? '';
  return value instanceof CellError ? value.code : value;
}

/** A text may be handed out with the apostrophe that keeps it one, and a truth value as a word. */
function isSameEntry(present: unknown, read: unknown): boolean {
  if (typeof present !== 'string' || present === read) return present === read;
  return typeof read === 'boolean'
    ? present.toUpperCase() === String(read).toUpperCase()
    : present.startsWith("'") && present.slice(1) === read;
}

/** Cells that an array formula fills, its first one apart: they follow from that one. */
function filledCellsOf(sheet: SheetSnapshot): Set<number> {
  const filled = new Set<number>();
  for (const range of arrayRangesOf(sheet)) {
    for (const { row, column } of cellsOf(range).slice(1)) filled.add(cellKey(row, column));
  }
  return filled;
}

/** The mean length of an entry as JSON, blanks of the extents included. */
function bytesPerEntry(workbook: WorkbookSnapshot): number {
  let bytes = 0;
  let places = 0;
  for (const sheet of workbook.sheets) {
    const extent = extentOf(sheet);
    if (extent === undefined) continue;
    places += cellCountOf(extent);
    bytes += sheet instanceof ExcelSheet ? sheet.entryLength : entryLengthOf(sheet);
  }
  return entryOverhead + bytes / Math.max(1, places);
}

function entryLengthOf(sheet: SheetSnapshot): number {
  let length = 0;
  sheet.forEachCell((_row, _column, { formula, value }) => {
    length += (formula ?? String(value)).length;
  });
  return length;
}
