/**
 * Workbooks opened in the far end of Excel, and what tests look at in them.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { ExcelBatches, type ExcelTiming } from '../../../../addin/adapters/excel-host/excel-batch';
import { ExcelWorkbook } from '../../../../addin/adapters/excel-host/excel-workbook';
import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { XlsxWorkbook } from '../../../../addin/adapters/xlsx-file/xlsx-workbook';
import { cellText, type CellAddress } from '../../../../addin/domain/sheet/cell-address';
import { CellError } from '../../../../addin/domain/sheet/cell-value';
import type { WorkbookSnapshot } from '../../../../addin/domain/sheet/sheet-snapshot';
import { WorkbookError } from '../../../../addin/ports/workbook';
import { startOfficeHost } from '../../../office-host/node-host';
import type { OfficeHost, OfficeHostOptions } from '../../../office-host/office-host';
import { checkoutFolder } from '../../../support/needs';

export interface OpenInExcel {
  readonly host: OfficeHost;
  readonly workbook: ExcelWorkbook;
}

/** No answer is waited for longer than it takes the far end to fall silent. */
export const impatient: ExcelTiming = {
  secondsToWait: 60,
  pause: () => Promise.resolve(),
  startTimer: (_seconds, callback) => {
    // The far end answers in a microtask, so whatever has not come after a turn of the loop never comes.
    const timer = setImmediate(() => setImmediate(callback));
    return () => clearImmediate(timer);
  },
};

export function openInExcel(snapshot: WorkbookSnapshot, options: OfficeHostOptions = {}): OpenInExcel {
  const host = startOfficeHost(snapshot, options);
  return { host, workbook: new ExcelWorkbook(new ExcelBatches()) };
}

export function openDescribed(description: WorkbookDescription, options?: OfficeHostOptions): OpenInExcel {
  return openInExcel(MemoryWorkbook.of(description).snapshot(), options);
}

export function openSampleFile(): Promise<XlsxWorkbook> {
  const bytes = readFileSync(path.join(checkoutFolder, 'addin', 'samples', 'week-plan.xlsx'));
  return XlsxWorkbook.open(bytes, 'week-plan.xlsx');
}

/** `B7` of a sheet. */
export function at(sheet: string, text: string): CellAddress {
  const match = /^([A-Z])([0-9]+)$/.exec(text)!;
  return { sheet, row: Number(match[2]) - 1, column: match[1].charCodeAt(0) - 65 };
}

/** Every cell by sheet and address, as `formula → value, format`, so that two workbooks can be held side by side. */
export function cellFacts(workbook: WorkbookSnapshot): Record<string, Record<string, unknown>> {
  return Object.fromEntries(
    workbook.sheets.map((sheet) => {
      const cells: Record<string, unknown> = {};
      sheet.forEachCell((row, column, { value, formula, numberFormat, isDate, arrayRange }) => {
        if (formula === undefined && (value ?? null) === null) return;
        cells[cellText(row, column)] = {
          value: value instanceof CellError ? value.code : value,
          ...(formula === undefined ? {} : { formula }),
          ...(arrayRange === undefined ? {} : { fills: arrayRange }),
          numberFormat,
          isDate,
        };
      });
      return [sheet.name, cells];
    }),
  );
}

/** What a promise is refused with. */
export async function refusalOf(work: Promise<unknown>): Promise<WorkbookError> {
  const error: unknown = await work.then(
    () => undefined,
    (refusal: unknown) => refusal,
  );
  if (error instanceof WorkbookError) return error;
  throw error instanceof Error ? error : new Error('Nothing was refused.');
}
