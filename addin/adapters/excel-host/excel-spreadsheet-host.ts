/// <reference types="office-js" />
/**
 * Excel as the pane needs it: everything that names Office stands behind this.
 */
import type { SpreadsheetHost } from '../../ports/spreadsheet-host';
import { ExcelBatches, usualTiming, type ExcelTiming } from './excel-batch';
import { ExcelChanges } from './excel-changes';
import { ExcelFilters } from './excel-filters';
import { ExcelSelection } from './excel-selection';
import { ExcelWorkbook } from './excel-workbook';

/** Once Office is ready (see whenExcelIsReady). */
export function connectExcel(timing: ExcelTiming = usualTiming): SpreadsheetHost {
  const batches = new ExcelBatches(timing);
  const workbook = new ExcelWorkbook(batches);
  return {
    workbook,
    journal: workbook,
    selection: new ExcelSelection(batches),
    changes: new ExcelChanges(batches, workbook),
    filters: new ExcelFilters(batches),
    isDark,
  };
}

/** Resolves when the library has found its host; false where that is not Excel. */
export async function whenExcelIsReady(): Promise<boolean> {
  const { host } = await Office.onReady();
  return host === Office.HostType.Excel;
}

/** Excel's theme is told on some platforms only, and some tell it late. */
function isDark(): boolean | null {
  const theme = Office.context.officeTheme as Partial<Office.OfficeTheme> | null | undefined;
  if (theme?.isDarkTheme !== undefined) {
    return theme.isDarkTheme;
  }
  const channels = /^#?([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})/i.exec(theme?.bodyBackgroundColor ?? '');
  if (channels === null) {
    return null;
  }
  const [red, green, blue] = channels.slice(1).map((channel) => parseInt(channel, 16));
  return red * 0.299 + green * 0.587 + blue * 0.114 < 128;
}
