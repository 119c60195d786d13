import { MemoryWorkbook, type CellContent } from '../../addin/adapters/memory/memory-workbook';
import { XlsxWorkbook } from '../../addin/adapters/xlsx-file/xlsx-workbook';
import { CellError } from '../../addin/domain/sheet/cell-value';
import { buildXlsx, type CellDescription, type XlsxDescription } from '../support/xlsx-builder';
import { describeWorkbookContract } from './workbook-contract';

describeWorkbookContract('in an .xlsx file', (description) =>
  XlsxWorkbook.open(buildXlsx(description), 'week.xlsx'),
);

describeWorkbookContract('in an .xlsx file with its texts in the cells', (description) =>
  XlsxWorkbook.open(buildXlsx({ ...description, hasInlineStrings: true }), 'week.xlsx'),
);

describeWorkbookContract('in memory', (description) => MemoryWorkbook.of(inMemory(description)));

function inMemory(description: XlsxDescription): Parameters<typeof MemoryWorkbook.of>[0] {
  const bySheet = <T>(take: (sheet: XlsxDescription['sheets'][number]) => T | undefined): Record<string, T> =>
    Object.fromEntries(
      description.sheets.flatMap((sheet) => {
        const taken = take(sheet);
        return taken === undefined ? [] : [[sheet.name, taken]];
      }),
    );
  return {
    sheets: bySheet(({ cells = {} }) =>
      Object.fromEntries(Object.entries(cells).map(([text, cell]) => [text, cellInMemory(cell)])),
    ),
    names: { ...description.names, ...description.hiddenNames },
    hiddenNames: Object.keys(description.hiddenNames ?? {}),
    localNames: bySheet(({ names }) => names),
    merged: bySheet(({ merges }) => merges),
    hiddenRows: bySheet(({ hiddenRows }) => hiddenRows),
    hiddenColumns: bySheet(({ hiddenColumns }) => hiddenColumns),
  };
}

function cellInMemory(cell: CellDescription): CellContent {
  if (typeof cell !== 'object' || cell === null) return cell;
  const value = cell.error === undefined ? cell.value : CellError.of(cell.error);
  return {
    ...(value === undefined ? {} : { value }),
    ...(cell.formula === undefined ? {} : { formula: cell.formula }),
    ...(cell.arrayRange === undefined ? {} : { fills: cell.arrayRange }),
    ...(cell.isDate === undefined ? {} : { isDate: cell.isDate }),
    ...(cell.numberFormat === undefined ? {} : { numberFormat: cell.numberFormat }),
  };
}
