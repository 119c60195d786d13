/**
 * What a name should refer to when cells are selected for it: the cells themselves, or a table's column where the
 * selection is one, so that the name grows with the table.
 */
import { absoluteRangeText, columnCountOf, rowCountOf, type CellRange } from '../sheet/cell-range';
import { maximumColumnCount, maximumRowCount } from '../sheet/cell-address';
import { findSheet, type TableSnapshot, type WorkbookSnapshot } from '../sheet/sheet-snapshot';

/** Without `=`; undefined where nothing is selected, or areas of several sheets. */
export function referenceOfSelection(
  workbook: WorkbookSnapshot,
  selected: readonly CellRange[],
): string | undefined {
  if (selected.length === 0 || selected.some(({ sheet }) => sheet !== selected[0].sheet)) {
    return undefined;
  }
  return selected
    .map((range) => {
      const trimmed = withinUsedCells(workbook, range);
      return tableColumnsText(workbook, trimmed) ?? absoluteRangeText(trimmed);
    })
    .join(',');
}

/** Whole columns and rows end where the sheet's contents end: nobody means a million cells. */
export function withinUsedCells(workbook: WorkbookSnapshot, range: CellRange): CellRange {
  const sheet = findSheet(workbook, range.sheet);
  const isWholeColumns = rowCountOf(range) === maximumRowCount;
  const isWholeRows = columnCountOf(range) === maximumColumnCount;
  return {
    ...range,
    bottom: isWholeColumns ? Math.max(range.top, (sheet?.rowCount ?? 1) - 1) : range.bottom,
    right: isWholeRows ? Math.max(range.left, (sheet?.columnCount ?? 1) - 1) : range.right,
  };
}

/** `Costs[Clay]`, `Costs[[Clay]:[Glaze]]`: columns of a table from its first row to its last. */
function tableColumnsText(workbook: WorkbookSnapshot, range: CellRange): string | undefined {
  const table = workbook.tables.find((candidate) => isColumnsOf(candidate, range));
  if (table === undefined) {
    return undefined;
  }
  const first = escapeColumn(table.columnNames[range.left - table.range.left]);
  const last = escapeColumn(table.columnNames[range.right - table.range.left]);
  return first === last ? `${table.name}[${first}]` : `${table.name}[[${first}]:[${last}]]`;
}

function isColumnsOf(table: TableSnapshot, range: CellRange): boolean {
  return (
    table.range.sheet === range.sheet &&
    range.top === table.range.top + table.headerRowCount &&
    range.bottom === table.range.bottom - table.totalsRowCount &&
    range.left >= table.range.left &&
    range.right <= table.range.right &&
    range.top <= range.bottom
  );
}

/** The characters that mean something between the brackets take an apostrophe (ECMA-376 Part 1, §18.17.6.1). */
function escapeColumn(name: string): string {
  return name.replace(/['[\]#@]/g, "'$&");
}
