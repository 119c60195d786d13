/// <reference types="office-js" />
/**
 * Hints that somebody changes the workbook. Our own writes are told apart by what is under way, and by the source that
 * Excel names since 1.14.
 */
import type { Stop } from '../../ports/selection';
import type { WorkbookChanges } from '../../ports/workbook-changes';
import type { ExcelBatches } from './excel-batch';
import type { ExcelWorkbook } from './excel-workbook';

export class ExcelChanges implements WorkbookChanges {
  constructor(
    private readonly batches: ExcelBatches,
    private readonly workbook: ExcelWorkbook,
  ) {}

  watch(onChange: () => void): Promise<Stop> {
    const tell = (triggerSource?: string): Promise<void> => {
      const isOurs = this.workbook.isWriting || triggerSource === 'ThisLocalAddin';
      if (!isOurs) onChange();
      return Promise.resolve();
    };
    return this.batches.watch(({ workbook: { worksheets } }) => [
      worksheets.onChanged.add((event) => tell(event.triggerSource)),
      worksheets.onAdded.add(() => tell()),
      worksheets.onDeleted.add(() => tell()),
    ]);
  }
}
