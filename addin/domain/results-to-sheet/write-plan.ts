/**
 * Ordered writes as data: what is to be changed in a workbook, worked out before anything is touched. An adapter
 * performs a plan whole or not at all. Nothing here overwrites a formula.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellValue } from '../sheet/cell-value';

/** A value put into a cell that holds no formula. */
export interface ValueWrite {
  readonly kind: 'value';
  readonly cell: CellAddress;
  readonly value: number | string | boolean | null;
  /** Take the number format (only that) of this cell; undefined: leave the cell's own format. */
  readonly numberFormatOf?: CellAddress | undefined;
  /** Headings: break the text at its line feeds. */
  readonly wrapsText?: boolean | undefined;
}

/** The stored value of a formula, renewed; the formula stays to the letter. undefined: the stored value is dropped. */
export interface StoredValueWrite {
  readonly kind: 'storedValue';
  readonly cell: CellAddress;
  readonly value: CellValue | undefined;
}

/** A new formula in a cell that is empty, with the value to store beside it. */
export interface FormulaWrite {
  readonly kind: 'formula';
  readonly cell: CellAddress;
  /** Without `=`. */
  readonly formula: string;
  readonly value: CellValue;
  readonly numberFormatOf?: CellAddress | undefined;
}

export interface ColumnWidthWrite {
  readonly kind: 'columnWidth';
  readonly sheet: string;
  readonly column: number;
  /** In characters of the default font, as spreadsheets count widths. */
  readonly width: number;
}

/** A new sheet behind all others. */
export interface SheetAddition {
  readonly kind: 'addSheet';
  readonly name: string;
}

/** A defined name created or pointed elsewhere. */
export interface NameWrite {
  readonly kind: 'name';
  readonly name: string;
  /** Sheet it is local to; null for the whole workbook. */
  readonly scope: string | null;
  /** Without `=`. */
  readonly formula: string;
}

/** A defined name taken away, if it is there. What it referred to stays as it is. */
export interface NameRemoval {
  readonly kind: 'removeName';
  readonly name: string;
  /** Sheet it is local to; null for the whole workbook. */
  readonly scope: string | null;
}

/** Our own part of the workbook, replaced whole. */
export interface RecordWrite {
  readonly kind: 'record';
  /** JSON text. */
  readonly json: string;
}

/** Ask the spreadsheet program to calculate everything when it opens the file. */
export interface RecalculationRequest {
  readonly kind: 'recalculateOnOpening';
}

export type WorkbookWrite =
  | ValueWrite
  | StoredValueWrite
  | FormulaWrite
  | ColumnWidthWrite
  | SheetAddition
  | NameWrite
  | NameRemoval
  | RecordWrite
  | RecalculationRequest;

export type WritePlan = readonly WorkbookWrite[];
