/**
 * The rectangles that a plain reference stands for, seen from a cell: no value is looked at.
 */
import { maximumColumnCount, maximumRowCount, type CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { CellNode, RangeNode, TableNode } from './formula-syntax';
import type { WorkbookIndex } from './workbook-index';

/** Why a plain reference stands for no rectangle. */
export type ReferenceFault =
  /** A sheet, table or column of that name is not there. */
  | { readonly kind: 'unknown'; readonly what: string }
  /** `[@Made]` outside the rows of its table, or a section that the table does not have. */
  | { readonly kind: 'not-here' };

export function isReferenceFault(range: CellRange | ReferenceFault): range is ReferenceFault {
  return 'kind' in range;
}

/** Whole columns and rows reach to the last row or column that holds anything, at least over one cell. */
export function rangeOfNode(
  node: CellNode | RangeNode,
  index: WorkbookIndex,
  home: CellAddress,
): CellRange | ReferenceFault {
  const name = node.sheet ?? home.sheet;
  const sheet = index.sheet(name);
  if (sheet === undefined) {
    return { kind: 'unknown', what: name };
  }
  if (node.kind === 'cell') {
    const row = coordinate(node.corner.row ?? 0, node.corner.rowIsAbsolute, home.row, maximumRowCount);
    const column = coordinate(
      node.corner.column ?? 0,
      node.corner.columnIsAbsolute,
      home.column,
      maximumColumnCount,
    );
    return { sheet: sheet.name, top: row, left: column, bottom: row, right: column };
  }
  const { first, last } = node;
  const rows =
    first.row === null || last.row === null
      ? [0, Math.max(0, sheet.rowCount - 1)]
      : [
          coordinate(first.row, first.rowIsAbsolute, home.row, maximumRowCount),
          coordinate(last.row, last.rowIsAbsolute, home.row, maximumRowCount),
        ];
  const columns =
    first.column === null || last.column === null
      ? [0, Math.max(0, sheet.columnCount - 1)]
      : [
          coordinate(first.column, first.columnIsAbsolute, home.column, maximumColumnCount),
          coordinate(last.column, last.columnIsAbsolute, home.column, maximumColumnCount),
        ];
  const range = {
    sheet: sheet.name,
    top: Math.min(rows[0], rows[1]),
    left: Math.min(columns[0], columns[1]),
    bottom: Math.max(rows[0], rows[1]),
    right: Math.max(columns[0], columns[1]),
  };
  return node.trim === 'none' ? range : trimmed(range, node.trim, index);
}

export function rangeOfTable(
  node: TableNode,
  index: WorkbookIndex,
  home: CellAddress,
): CellRange | ReferenceFault {
  const table =
    node.table === '' ? index.tableAround(home.sheet, home.row, home.column) : index.table(node.table);
  if (table === undefined) {
    return { kind: 'unknown', what: node.table === '' ? 'table' : node.table };
  }
  const { range, headerRowCount, totalsRowCount } = table;
  let { left, right } = range;
  if (node.columns.length > 0) {
    const at = node.columns.map((column) =>
      table.columnNames.findIndex((name) => isSameHeading(name, column)),
    );
    const missing = at.indexOf(-1);
    if (missing >= 0) {
      return { kind: 'unknown', what: `${table.name}[${node.columns[missing]}]` };
    }
    left = range.left + Math.min(...at);
    right = range.left + Math.max(...at);
  }
  const firstData = range.top + headerRowCount;
  const lastData = range.bottom - totalsRowCount;
  const sections = node.sections.length === 0 ? (['data'] as const) : node.sections;
  let top = Infinity;
  let bottom = -Infinity;
  for (const section of sections) {
    switch (section) {
      case 'all':
        top = range.top;
        bottom = range.bottom;
        break;
      case 'data':
        top = Math.min(top, firstData);
        bottom = Math.max(bottom, lastData);
        break;
      case 'headers':
        top = Math.min(top, headerRowCount > 0 ? range.top : Infinity);
        bottom = Math.max(bottom, firstData - 1);
        break;
      case 'totals':
        top = Math.min(top, lastData + 1);
        bottom = Math.max(bottom, totalsRowCount > 0 ? range.bottom : -Infinity);
        break;
      case 'this row':
        if (home.row < firstData || home.row > lastData) {
          return { kind: 'not-here' };
        }
        top = bottom = home.row;
        break;
    }
  }
  return top > bottom || !Number.isFinite(bottom - top)
    ? { kind: 'not-here' }
    : { sheet: range.sheet, top, left, bottom, right };
}

/** Distances in names count around the edge of the sheet, as names in files are written seen from A1. */
function coordinate(value: number, isAbsolute: boolean, home: number, count: number): number {
  return isAbsolute ? value : (((value + home) % count) + count) % count;
}

/** Headings are compared without regard to case; a line feed in a heading is a blank in a formula's file text. */
function isSameHeading(heading: string, written: string): boolean {
  const plain = (text: string): string => text.replace(/\r?\n/g, ' ').toLowerCase();
  return plain(heading) === plain(written);
}

function trimmed(range: CellRange, trim: RangeNode['trim'], index: WorkbookIndex): CellRange {
  const sheet = index.sheet(range.sheet)!;
  let { top, left, bottom, right } = range;
  const isBlank = (row: number, column: number): boolean => (sheet.cell(row, column)?.value ?? null) === null;
  const rowIsBlank = (row: number): boolean => {
    for (let column = left; column <= Math.min(right, sheet.columnCount); column++) {
      if (!isBlank(row, column)) {
        return false;
      }
    }
    return true;
  };
  const columnIsBlank = (column: number): boolean => {
    for (let row = top; row <= Math.min(bottom, sheet.rowCount); row++) {
      if (!isBlank(row, column)) {
        return false;
      }
    }
    return true;
  };
  if (trim !== 'head') {
    bottom = Math.max(top, Math.min(bottom, sheet.rowCount - 1));
    right = Math.max(left, Math.min(right, sheet.columnCount - 1));
    while (bottom > top && rowIsBlank(bottom)) {
      bottom--;
    }
    while (right > left && columnIsBlank(right)) {
      right--;
    }
  }
  if (trim !== 'tail') {
    while (top < bottom && rowIsBlank(top)) {
      top++;
    }
    while (left < right && columnIsBlank(left)) {
      left++;
    }
  }
  return { sheet: range.sheet, top, left, bottom, right };
}
