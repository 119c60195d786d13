/**
 * A workbook's cells, names and tables as they were at one moment. Immutable; whoever reads it changes nothing.
 */
import type { CellAddress } from './cell-address';
import type { CellRange } from './cell-range';
import type { CellValue } from './cell-value';
import type { DefinedName } from './defined-name';

/** A cell that holds something (a value, a formula, or both). Cells with only a format are not listed. */
export interface SheetCell {
  /** The value typed, or stored beside the formula. undefined: a formula with no value stored. */
  readonly value: CellValue | undefined;
  /** The formula as it stands in this cell (shared ones already moved here), without `=`; undefined for a constant. */
  readonly formula: string | undefined;
  /** For the first cell of an array formula or a spill: the cells that it fills. */
  readonly arrayRange: CellRange | undefined;
  /** The number is shown as a date or time. */
  readonly isDate: boolean;
  /** The number format code, `General` where none is set. */
  readonly numberFormat: string;
}

export type SheetVisibility = 'visible' | 'hidden' | 'veryHidden';

export interface SheetSnapshot {
  readonly name: string;
  readonly visibility: SheetVisibility;
  readonly isProtected: boolean;
  /** One past the last row and column that hold anything. */
  readonly rowCount: number;
  readonly columnCount: number;
  cell(row: number, column: number): SheetCell | undefined;
  /** Every cell that holds something, in no promised order. */
  forEachCell(visit: (row: number, column: number, cell: SheetCell) => void): void;
  isRowHidden(row: number): boolean;
  isColumnHidden(column: number): boolean;
  readonly mergedRanges: readonly CellRange[];
  /** Cells with a note or a comment. */
  readonly notedCells: readonly CellAddress[];
  /** Where PivotTables stand. */
  readonly pivotRanges: readonly CellRange[];
  /** Rows hidden by an active filter, as against by hand. */
  readonly hasActiveFilter: boolean;
}

export interface TableSnapshot {
  readonly name: string;
  /** Headings, data and totals. */
  readonly range: CellRange;
  readonly headerRowCount: number;
  readonly totalsRowCount: number;
  readonly columnNames: readonly string[];
}

export interface WorkbookSnapshot {
  /** In the order of their tabs. */
  readonly sheets: readonly SheetSnapshot[];
  readonly names: readonly DefinedName[];
  readonly tables: readonly TableSnapshot[];
  /** Dates count from 1904 and not from 1900. */
  readonly usesDates1904: boolean;
  /** What Planrow recorded in this workbook before (a part of our own), as JSON text; null where nothing is. */
  readonly record: string | null;
}

/** The sheet of that name (case does not count), or undefined. */
export function findSheet(workbook: WorkbookSnapshot, name: string): SheetSnapshot | undefined {
  const wanted = name.toLowerCase();
  return workbook.sheets.find((sheet) => sheet.name.toLowerCase() === wanted);
}

/** The value stored in a cell: null for a blank one, undefined for a formula with no value stored. */
export function storedValue(workbook: WorkbookSnapshot, address: CellAddress): CellValue | undefined {
  const cell = findSheet(workbook, address.sheet)?.cell(address.row, address.column);
  return cell === undefined ? null : cell.value;
}
