/**
 * A rectangle of cells on one sheet; both ends belong to it. Rows and columns count from 0.
 */
import { cellText, quotedSheetName, type CellAddress } from './cell-address';

export interface CellRange {
  readonly sheet: string;
  readonly top: number;
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
}

export function rowCountOf(range: CellRange): number {
  return range.bottom - range.top + 1;
}

export function columnCountOf(range: CellRange): number {
  return range.right - range.left + 1;
}

export function cellCountOf(range: CellRange): number {
  return rowCountOf(range) * columnCountOf(range);
}

/** The cells row by row. */
export function cellsOf(range: CellRange): CellAddress[] {
  const cells: CellAddress[] = [];
  for (let row = range.top; row <= range.bottom; row++) {
    for (let column = range.left; column <= range.right; column++) {
      cells.push({ sheet: range.sheet, row, column });
    }
  }
  return cells;
}

export function containsCell(range: CellRange, cell: CellAddress): boolean {
  return (
    range.sheet === cell.sheet &&
    cell.row >= range.top &&
    cell.row <= range.bottom &&
    cell.column >= range.left &&
    cell.column <= range.right
  );
}

export function rangesOverlap(a: CellRange, b: CellRange): boolean {
  return (
    a.sheet === b.sheet && a.top <= b.bottom && b.top <= a.bottom && a.left <= b.right && b.left <= a.right
  );
}

/** `Plan!B7:C9`, or `Plan!B7` for one cell; no `$`. */
export function formatCellRange(range: CellRange): string {
  const first = cellText(range.top, range.left);
  const last = cellText(range.bottom, range.right);
  return `${quotedSheetName(range.sheet)}!${first}${first === last ? '' : `:${last}`}`;
}

/** `Plan!$B$7:$C$9`: as a defined name refers to it. */
export function absoluteRangeText(range: CellRange): string {
  const absolute = (row: number, column: number): string =>
    cellText(row, column).replace(/^([A-Z]+)(\d+)$/, '$$$1$$$2');
  const first = absolute(range.top, range.left);
  const last = absolute(range.bottom, range.right);
  return `${quotedSheetName(range.sheet)}!${first}${first === last ? '' : `:${last}`}`;
}
