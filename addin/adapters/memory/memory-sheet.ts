/**
 * One sheet of a workbook in plain maps.
 */
import { cellKey, type CellAddress } from '../../domain/sheet/cell-address';
import { containsCell, type CellRange } from '../../domain/sheet/cell-range';
import type { SheetCell, SheetSnapshot, SheetVisibility } from '../../domain/sheet/sheet-snapshot';

/** One sheet's cells and marks. Immutable once it has been given out: changes go to a copy. */
export class MemorySheet implements SheetSnapshot {
  rowCount = 0;
  columnCount = 0;
  /** In characters, by column, where a write set one. */
  readonly columnWidths = new Map<number, number>();
  private readonly cells = new Map<number, SheetCell & { readonly row: number; readonly column: number }>();
  /** What array formulas fill, by the key of their first cell. */
  private readonly arrayRanges = new Map<number, CellRange>();

  constructor(
    readonly name: string,
    readonly visibility: SheetVisibility,
    readonly isProtected: boolean,
    readonly mergedRanges: readonly CellRange[],
    readonly notedCells: readonly CellAddress[],
    readonly pivotRanges: readonly CellRange[],
    readonly hasActiveFilter: boolean,
    private readonly hiddenRows: ReadonlySet<number>,
    private readonly hiddenColumns: ReadonlySet<number>,
  ) {}

  cell(row: number, column: number): SheetCell | undefined {
    return this.cells.get(cellKey(row, column));
  }

  forEachCell(visit: (row: number, column: number, cell: SheetCell) => void): void {
    for (const cell of this.cells.values()) {
      visit(cell.row, cell.column, cell);
    }
  }

  isRowHidden(row: number): boolean {
    return this.hiddenRows.has(row);
  }

  isColumnHidden(column: number): boolean {
    return this.hiddenColumns.has(column);
  }

  setCell(row: number, column: number, cell: SheetCell): void {
    this.cells.set(cellKey(row, column), { ...cell, row, column });
    if (cell.arrayRange !== undefined) {
      this.arrayRanges.set(cellKey(row, column), cell.arrayRange);
    }
    this.rowCount = Math.max(this.rowCount, row + 1);
    this.columnCount = Math.max(this.columnCount, column + 1);
  }

  removeCell(row: number, column: number): void {
    if (!this.cells.delete(cellKey(row, column))) {
      return;
    }
    this.rowCount = 0;
    this.columnCount = 0;
    for (const cell of this.cells.values()) {
      this.rowCount = Math.max(this.rowCount, cell.row + 1);
      this.columnCount = Math.max(this.columnCount, cell.column + 1);
    }
  }

  /** The array formula's range that fills this cell, or undefined. */
  arrayOver(at: CellAddress): CellRange | undefined {
    for (const range of this.arrayRanges.values()) {
      if (containsCell(range, { ...at, sheet: range.sheet })) {
        return range;
      }
    }
    return undefined;
  }

  copy(): MemorySheet {
    const copy = new MemorySheet(
      this.name,
      this.visibility,
      this.isProtected,
      this.mergedRanges,
      this.notedCells,
      this.pivotRanges,
      this.hasActiveFilter,
      this.hiddenRows,
      this.hiddenColumns,
    );
    for (const [key, cell] of this.cells) {
      copy.cells.set(key, cell);
    }
    for (const [key, range] of this.arrayRanges) {
      copy.arrayRanges.set(key, range);
    }
    for (const [column, width] of this.columnWidths) {
      copy.columnWidths.set(column, width);
    }
    copy.rowCount = this.rowCount;
    copy.columnCount = this.columnCount;
    return copy;
  }
}
