/// <reference types="office-js" />
/**
 * Our rectangles and Excel's ranges, one as the other.
 */
import { maximumColumnCount, maximumRowCount } from '../../domain/sheet/cell-address';
import { columnCountOf, formatCellRange, rowCountOf, type CellRange } from '../../domain/sheet/cell-range';
import { columnOfLetters } from '../../domain/sheet/cell-address';

/** A range whose place has been asked for. */
export type LoadedRange = Excel.Range;

export const placeOfRange = 'rowIndex,columnIndex,rowCount,columnCount';

/** The range of these cells, found by the sheet's name. */
export function rangeOn(context: Excel.RequestContext, range: CellRange): Excel.Range {
  return context.workbook.worksheets
    .getItem(range.sheet)
    .getRangeByIndexes(range.top, range.left, rowCountOf(range), columnCountOf(range));
}

export function cellRangeOf(sheet: string, range: LoadedRange): CellRange {
  const { rowIndex, columnIndex, rowCount, columnCount } = range;
  return {
    sheet,
    top: rowIndex,
    left: columnIndex,
    bottom: rowIndex + rowCount - 1,
    right: columnIndex + columnCount - 1,
  };
}

/**
 * The rectangles of an address such as `Plan!A1:B2,Plan!D5` or `'Cost data'!C:C`; the sheets' names are left aside.
 * A piece that is no rectangle (Excel cuts long addresses off) is left out.
 */
export function rangesOfAddress(sheet: string, address: string): CellRange[] {
  return address
    .replace(/'(?:[^']|'')*'!|[^,'!]+!/g, '')
    .replaceAll('$', '')
    .split(',')
    .flatMap((text) => {
      const match = /^([A-Z]{1,3})?([0-9]{1,7})?(?::([A-Z]{1,3})?([0-9]{1,7})?)?$/i.exec(text.trim());
      if (match === null || text.trim() === '') return [];
      const [, firstLetters, firstRow, lastLetters = firstLetters, lastRow = firstRow] = match;
      return [
        {
          sheet,
          top: firstRow === undefined ? 0 : Number(firstRow) - 1,
          left: firstLetters === undefined ? 0 : columnOfLetters(firstLetters),
          bottom: lastRow === undefined ? maximumRowCount - 1 : Number(lastRow) - 1,
          right: lastLetters === undefined ? maximumColumnCount - 1 : columnOfLetters(lastLetters),
        },
      ];
    });
}

/** For sentences: a few of the ranges, and how many more there are. */
export function listRanges(ranges: readonly CellRange[]): string {
  const shown = ranges.slice(0, 3).map(formatCellRange).join(', ');
  return ranges.length > 3 ? `${shown} and ${ranges.length - 3} more` : shown;
}
