/**
 * A sheet as it was read: its cells by place, and what is known of its rows, columns and marks. Built by
 * worksheet-xml; nothing changes afterwards.
 */
import { cellKey, maximumColumnCount, type CellAddress } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import type { CellValue } from '../../domain/sheet/cell-value';
import type { SheetCell, SheetSnapshot, SheetVisibility } from '../../domain/sheet/sheet-snapshot';
import type { SharedFormula } from './shared-formula';
import type { CellFormat } from './styles-xml';

/** A cell whose formula may be shared; it is moved here when first asked for. */
export class StoredCell implements SheetCell {
  constructor(
    readonly value: CellValue | undefined,
    private readonly format: CellFormat,
    private ownFormula: string | undefined = undefined,
    readonly arrayRange: CellRange | undefined = undefined,
    private readonly shared: SharedFormula | undefined = undefined,
    /** Of cells with a shared formula only: where this one stands. */
    private readonly row = 0,
    private readonly column = 0,
  ) {}

  get formula(): string | undefined {
    if (this.shared !== undefined) this.ownFormula ??= this.shared.at(this.row, this.column);
    return this.ownFormula;
  }

  get isDate(): boolean {
    return this.format.isDate && (typeof this.value === 'number' || this.value === undefined);
  }

  get numberFormat(): string {
    return this.format.code;
  }
}

/** Columns [first, last] that are hidden, from 0. */
export type ColumnSpan = readonly [first: number, last: number];

/** Everything in a sheet's own part. */
export interface SheetContent {
  /** By cellKey. */
  readonly cells: ReadonlyMap<number, StoredCell>;
  readonly rowCount: number;
  readonly columnCount: number;
  readonly hiddenRows: ReadonlySet<number>;
  /** Rows that the sheet lists, where all others are hidden by default; undefined where they are not. */
  readonly listedRows: ReadonlySet<number> | undefined;
  readonly hiddenColumns: readonly ColumnSpan[];
  readonly mergedRanges: readonly CellRange[];
  readonly isProtected: boolean;
  readonly hasActiveFilter: boolean;
}

/** What other parts say about a sheet. */
export interface SheetMarks {
  readonly notedCells: readonly CellAddress[];
  readonly pivotRanges: readonly CellRange[];
  /** A table's own filter is set. */
  readonly hasActiveTableFilter: boolean;
}

export class ReadSheet implements SheetSnapshot {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly isProtected: boolean;
  readonly mergedRanges: readonly CellRange[];
  readonly notedCells: readonly CellAddress[];
  readonly pivotRanges: readonly CellRange[];
  readonly hasActiveFilter: boolean;

  constructor(
    readonly name: string,
    readonly visibility: SheetVisibility,
    private readonly content: SheetContent,
    marks: SheetMarks,
  ) {
    this.rowCount = content.rowCount;
    this.columnCount = content.columnCount;
    this.isProtected = content.isProtected;
    this.mergedRanges = content.mergedRanges;
    this.notedCells = marks.notedCells;
    this.pivotRanges = marks.pivotRanges;
    this.hasActiveFilter = content.hasActiveFilter || marks.hasActiveTableFilter;
  }

  cell(row: number, column: number): StoredCell | undefined {
    return this.content.cells.get(cellKey(row, column));
  }

  forEachCell(visit: (row: number, column: number, cell: StoredCell) => void): void {
    for (const [key, cell] of this.content.cells) {
      visit(Math.floor(key / maximumColumnCount), key % maximumColumnCount, cell);
    }
  }

  isRowHidden(row: number): boolean {
    const { hiddenRows, listedRows } = this.content;
    return hiddenRows.has(row) || (listedRows !== undefined && !listedRows.has(row));
  }

  isColumnHidden(column: number): boolean {
    return this.content.hiddenColumns.some(([first, last]) => column >= first && column <= last);
  }
}

/** A sheet without cells: what a chart sheet is to us. */
export const emptySheetContent: SheetContent = {
  cells: new Map(),
  rowCount: 0,
  columnCount: 0,
  hiddenRows: new Set(),
  listedRows: undefined,
  hiddenColumns: [],
  mergedRanges: [],
  isProtected: false,
  hasActiveFilter: false,
};
