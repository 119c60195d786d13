/**
 * A description of an .xlsx file, as one of a workbook in memory: so that both can be made from the same words.
 */
import type { CellContent, WorkbookDescription } from '../../addin/adapters/memory/memory-workbook';
import { CellError } from '../../addin/domain/sheet/cell-value';
import type { CellDescription, XlsxDescription } from '../support/xlsx-builder';

/** Shared formulas, tables and parts are left out: the contract does without them. */
export function inMemory(description: XlsxDescription): WorkbookDescription {
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
