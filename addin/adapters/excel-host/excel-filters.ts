/// <reference types="office-js" />
/**
 * Shows the rows again that filters hide: the sheet's own filter, and those of its tables.
 */
import type { SheetFilters } from '../../ports/sheet-filters';
import type { ExcelBatches } from './excel-batch';

export class ExcelFilters implements SheetFilters {
  constructor(private readonly batches: ExcelBatches) {}

  clear(sheets: readonly string[]): Promise<void> {
    return this.batches.run(async ({ context, sync }) => {
      const asked = sheets.map((name) => {
        const worksheet = context.workbook.worksheets.getItemOrNullObject(name).load('name');
        return {
          worksheet,
          own: worksheet.autoFilter.load('isDataFiltered'),
          tables: worksheet.tables.load('items/name,items/autoFilter/isDataFiltered'),
        };
      });
      await sync();
      for (const { worksheet, own, tables } of asked) {
        if (worksheet.isNullObject) continue;
        if (own.isDataFiltered) own.clearCriteria();
        tables.items
          .filter((table) => table.autoFilter.isDataFiltered)
          .forEach((table) => table.clearFilters());
      }
      await sync();
    });
  }
}
