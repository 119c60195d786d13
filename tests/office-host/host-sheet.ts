/**
 * One sheet of the host's workbook: cells that can be changed, and what is known of its rows, columns and marks.
 */
import { cellKey, type CellAddress } from '../../addin/domain/sheet/cell-address';
import { containsCell, type CellRange } from '../../addin/domain/sheet/cell-range';
import type { CellValue } from '../../addin/domain/sheet/cell-value';
import { isDateFormat } from '../../addin/domain/sheet/date-format';
import type { SheetCell, SheetSnapshot, SheetVisibility } from '../../addin/domain/sheet/sheet-snapshot';
import { readEntry } from './cell-entry';

/** Points: the width of a column that nobody has changed, 64 pixels. */
export const standardColumnWidth = 48;

class HostCell implements SheetCell {
  value: CellValue | undefined = null;
  formula: string | undefined = undefined;
  arrayRange: CellRange | undefined = undefined;
  numberFormat = 'General';
  hasApostrophe = false;
  wrapsText = false;

  constructor(
    readonly row: number,
    readonly column: number,
  ) {}

  get isDate(): boolean {
    return typeof this.value === 'number' && isDateFormat(this.numberFormat);
  }

  get holdsSomething(): boolean {
    return this.formula !== undefined || this.value !== null;
  }
}

/** A filter that is set on a sheet's rows. */
export interface HostFilter {
  /** `sheet`: the sheet's own; otherwise the name of a table. */
  readonly of: string;
  readonly range: CellRange;
  readonly hiddenRows: ReadonlySet<number>;
}

export class HostSheet implements SheetSnapshot {
  /** Filters in force. */
  readonly filters: HostFilter[] = [];
  readonly mergedRanges: CellRange[] = [];
  notedCells: readonly CellAddress[] = [];
  pivotRanges: readonly CellRange[] = [];
  isProtected = false;
  readonly hiddenRows = new Set<number>();
  readonly hiddenColumns = new Set<number>();
  /** Points, by column. */
  readonly columnWidths = new Map<number, number>();

  private readonly cells = new Map<number, HostCell>();
  /** Array formulas by the key of their first cell. */
  private readonly arrayRanges = new Map<number, CellRange>();
  private used: CellRange | undefined | 'unknown' = 'unknown';

  private constructor(
    public name: string,
    readonly id: string,
    readonly visibility: SheetVisibility,
  ) {}

  static empty(name: string, id: string): HostSheet {
    return new HostSheet(name, id, 'visible');
  }

  static of(source: SheetSnapshot, id: string): HostSheet {
    const sheet = new HostSheet(source.name, id, source.visibility);
    source.forEachCell((row, column, cell) => {
      const copy = sheet.cellToChange(row, column);
      copy.value = cell.value;
      copy.formula = cell.formula;
      copy.numberFormat = cell.numberFormat;
      copy.hasApostrophe = typeof cell.value === 'string' && cell.formula === undefined;
      copy.arrayRange = cell.arrayRange;
      if (cell.arrayRange !== undefined) {
        sheet.arrayRanges.set(cellKey(row, column), cell.arrayRange);
      }
    });
    for (let row = 0; row < source.rowCount; row++) {
      if (source.isRowHidden(row)) sheet.hiddenRows.add(row);
    }
    for (let column = 0; column < source.columnCount; column++) {
      if (source.isColumnHidden(column)) sheet.hiddenColumns.add(column);
    }
    sheet.isProtected = source.isProtected;
    sheet.mergedRanges.push(...source.mergedRanges);
    sheet.notedCells = source.notedCells;
    sheet.pivotRanges = source.pivotRanges;
    if (source.hasActiveFilter) {
      const bottom = Math.max(0, source.rowCount - 1);
      const range = {
        sheet: source.name,
        top: 0,
        left: 0,
        bottom,
        right: Math.max(0, source.columnCount - 1),
      };
      sheet.filters.push({ of: 'sheet', range, hiddenRows: new Set(sheet.hiddenRows) });
      sheet.hiddenRows.clear();
    }
    return sheet;
  }

  get rowCount(): number {
    return (this.usedRange()?.bottom ?? -1) + 1;
  }

  get columnCount(): number {
    return (this.usedRange()?.right ?? -1) + 1;
  }

  /** The smallest rectangle around all cells that hold something; undefined where none does. */
  usedRange(): CellRange | undefined {
    if (this.used === 'unknown') this.used = this.findUsedRange();
    return this.used;
  }

  private findUsedRange(): CellRange | undefined {
    let used: CellRange | undefined;
    for (const { row, column, holdsSomething } of this.cells.values()) {
      if (holdsSomething) {
        used = {
          sheet: this.name,
          top: Math.min(used?.top ?? row, row),
          left: Math.min(used?.left ?? column, column),
          bottom: Math.max(used?.bottom ?? row, row),
          right: Math.max(used?.right ?? column, column),
        };
      }
    }
    return used;
  }

  cell(row: number, column: number): SheetCell | undefined {
    const cell = this.cells.get(cellKey(row, column));
    return cell?.holdsSomething === true ? cell : undefined;
  }

  forEachCell(visit: (row: number, column: number, cell: SheetCell) => void): void {
    for (const cell of this.cells.values()) {
      if (cell.holdsSomething) visit(cell.row, cell.column, cell);
    }
  }

  /** Cells that hold something, or have a format of their own, in no promised order. */
  touchedCells(): [row: number, column: number][] {
    return [...this.cells.values()].map(({ row, column }) => [row, column]);
  }

  isRowHidden(row: number): boolean {
    return this.hiddenRows.has(row) || this.filters.some(({ hiddenRows }) => hiddenRows.has(row));
  }

  isColumnHidden(column: number): boolean {
    return this.hiddenColumns.has(column);
  }

  get hasActiveFilter(): boolean {
    return this.filters.length > 0;
  }

  /** What a cell holds, as somebody enters it: a formula with `=`, otherwise the value. */
  contentAt(row: number, column: number): CellValue | undefined {
    const cell = this.cells.get(cellKey(row, column));
    return cell?.formula === undefined ? (cell?.value ?? null) : `=${cell.formula}`;
  }

  numberFormatAt(row: number, column: number): string {
    return this.cells.get(cellKey(row, column))?.numberFormat ?? 'General';
  }

  setNumberFormat(row: number, column: number, format: string): void {
    this.cellToChange(row, column).numberFormat = format === '' ? 'General' : format;
  }

  wrapsTextAt(row: number, column: number): boolean {
    return this.cells.get(cellKey(row, column))?.wrapsText ?? false;
  }

  setWrapsText(row: number, column: number, wraps: boolean): void {
    this.cellToChange(row, column).wrapsText = wraps;
  }

  hasApostropheAt(row: number, column: number): boolean {
    return this.cells.get(cellKey(row, column))?.hasApostrophe ?? false;
  }

  /** As if it were typed: what becomes of it is for readEntry to say. A covered part of a merged cell takes nothing. */
  enter(row: number, column: number, input: unknown): void {
    const merged = this.mergedRanges.find((range) =>
      containsCell(range, { sheet: range.sheet, row, column }),
    );
    if (merged !== undefined && (merged.top !== row || merged.left !== column)) {
      return;
    }
    this.used = 'unknown';
    const cell = this.cellToChange(row, column);
    const entry = readEntry(input, cell.numberFormat);
    cell.value = entry.value;
    cell.formula = entry.formula;
    cell.hasApostrophe = entry.hasApostrophe;
    cell.arrayRange = undefined;
    this.arrayRanges.delete(cellKey(row, column));
    if (entry.numberFormat !== undefined && cell.numberFormat === 'General') {
      cell.numberFormat = entry.numberFormat;
    }
  }

  /** The value that a formula comes out at. */
  setResult(row: number, column: number, value: CellValue): void {
    this.cellToChange(row, column).value = value;
  }

  /** The value of a cell that an array formula fills. */
  setFilled(row: number, column: number, value: CellValue): void {
    this.cellToChange(row, column).value = value;
  }

  /** What array formulas fill. */
  get arrays(): readonly CellRange[] {
    return [...this.arrayRanges.values()];
  }

  /** The array formula's range that fills this cell, or undefined. */
  arrayOver(row: number, column: number): CellRange | undefined {
    for (const range of this.arrayRanges.values()) {
      if (containsCell(range, { sheet: range.sheet, row, column })) return range;
    }
    return undefined;
  }

  private cellToChange(row: number, column: number): HostCell {
    const key = cellKey(row, column);
    let cell = this.cells.get(key);
    if (cell === undefined) {
      cell = new HostCell(row, column);
      this.cells.set(key, cell);
    }
    return cell;
  }
}
