/**
 * A line of cells, upright or lying, that holds one result column; and what its cells hold.
 */
import type { CellAddress } from '../sheet/cell-address';
import { containsCell, rangesOverlap, type CellRange } from '../sheet/cell-range';
import type { CellValue } from '../sheet/cell-value';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';

/** Number of cells of a line. */
export function lineLengthOf(range: CellRange): number {
  return Math.max(range.bottom - range.top, range.right - range.left) + 1;
}

/** The cell at a place in a line, from 0. */
export function lineCell(range: CellRange, offset: number): CellAddress {
  return range.left === range.right
    ? { sheet: range.sheet, row: range.top + offset, column: range.left }
    : { sheet: range.sheet, row: range.top, column: range.left + offset };
}

/** The cell before a line, where its heading stands; undefined at the sheet's edge. */
export function headingCellOf(range: CellRange, isLying: boolean): CellAddress | undefined {
  const row = isLying ? range.top : range.top - 1;
  const column = isLying ? range.left - 1 : range.left;
  return row < 0 || column < 0 ? undefined : { sheet: range.sheet, row, column };
}

export function rangeOfCell(cell: CellAddress): CellRange {
  return { sheet: cell.sheet, top: cell.row, left: cell.column, bottom: cell.row, right: cell.column };
}

/**
 * What the cells of lines hold, for comparing with what was written: null for a blank cell. A cell that can never be
 * ours stands as TRUE, which we never write: one that holds a formula, is filled by an array formula, or is covered
 * by a merged cell.
 */
export class LineContents {
  /** What array formulas fill, by sheet; found at the first question about a sheet. */
  private readonly arrayRanges = new Map<string, readonly CellRange[]>();

  constructor(private readonly workbook: WorkbookSnapshot) {}

  ofLine(range: CellRange): CellValue[] {
    const sheet = findSheet(this.workbook, range.sheet);
    const covers = [...(sheet?.mergedRanges ?? []), ...this.arrayRangesOf(range.sheet)].filter((cover) =>
      rangesOverlap(cover, range),
    );
    return Array.from({ length: lineLengthOf(range) }, (_, offset) => {
      const address = lineCell(range, offset);
      const cell = sheet?.cell(address.row, address.column);
      const isNeverOurs = cell?.formula !== undefined || covers.some((cover) => containsCell(cover, address));
      return isNeverOurs ? true : (cell?.value ?? null);
    });
  }

  ofCell(cell: CellAddress): CellValue {
    return this.ofLine(rangeOfCell(cell))[0];
  }

  private arrayRangesOf(sheetName: string): readonly CellRange[] {
    let ranges = this.arrayRanges.get(sheetName);
    if (ranges === undefined) {
      const found: CellRange[] = [];
      findSheet(this.workbook, sheetName)?.forEachCell((_row, _column, cell) => {
        if (cell.arrayRange !== undefined) {
          found.push(cell.arrayRange);
        }
      });
      ranges = found;
      this.arrayRanges.set(sheetName, ranges);
    }
    return ranges;
  }
}
