/// <reference types="office-js" />
/**
 * What is selected in Excel, and moving the selection there. Selecting cells through the library leaves the keyboard
 * in the pane.
 */
import { columnCountOf, formatCellRange, rowCountOf, type CellRange } from '../../domain/sheet/cell-range';
import type { Selection, Stop } from '../../ports/selection';
import { WorkbookError } from '../../ports/workbook';
import type { ExcelBatches } from './excel-batch';
import { cellRangeOf } from './excel-ranges';
import { excelAbilities } from './excel-requirements';

export class ExcelSelection implements Selection {
  constructor(private readonly batches: ExcelBatches) {}

  async selected(): Promise<readonly CellRange[]> {
    try {
      return await this.batches.run(async ({ context, sync }) => {
        const selected = context.workbook.getSelectedRanges();
        const asked = {
          worksheet: selected.worksheet.load('name'),
          areas: selected.areas.load('items/rowIndex,items/columnIndex,items/rowCount,items/columnCount'),
        };
        await sync();
        return asked.areas.items.map((area) => cellRangeOf(asked.worksheet.name, area));
      });
    } catch (error) {
      // A picture or a chart is selected, and no cells.
      if (error instanceof WorkbookError && isInvalidSelection(error.cause)) return [];
      throw error;
    }
  }

  activeSheet(): Promise<string> {
    return this.batches.run(async ({ context, sync }) => {
      const worksheet = context.workbook.worksheets.getActiveWorksheet().load('name');
      await sync();
      return worksheet.name;
    });
  }

  async select(ranges: readonly CellRange[]): Promise<void> {
    if (ranges.length === 0) return;
    await this.batches.run(async ({ context, sync }) => {
      const [{ sheet }] = ranges;
      const worksheet = context.workbook.worksheets.getItemOrNullObject(sheet).load('name,visibility');
      await sync();
      if (worksheet.isNullObject) {
        throw new WorkbookError('not-found', `The workbook has no sheet named ${sheet} any more.`);
      }
      if (worksheet.visibility !== Excel.SheetVisibility.visible) {
        const where = formatCellRange(ranges[0]);
        throw new WorkbookError('not-found', `${where} is on a hidden sheet. Show the sheet to see it.`, {
          ranges,
        });
      }
      worksheet.activate();
      if (ranges.length > 1 && excelAbilities().selectsAreas) {
        worksheet.getRanges(addressOfRanges(ranges)).select();
      } else {
        const [{ top, left }] = ranges;
        worksheet.getRangeByIndexes(top, left, rowCountOf(ranges[0]), columnCountOf(ranges[0])).select();
      }
      await sync();
    });
  }

  watch(onChange: () => void): Promise<Stop> {
    return this.batches.watch((context) => [
      context.workbook.worksheets.onSelectionChanged.add(() => told(onChange)),
      context.workbook.worksheets.onActivated.add(() => told(onChange)),
    ]);
  }
}

/** Excel cuts off addresses that are longer than this, and then selects something else. */
const addressLimit = 8000;

/** As many of the ranges as can be told to Excel in one address; their sheet is known. */
function addressOfRanges(ranges: readonly CellRange[]): string {
  let address = '';
  for (const range of ranges) {
    const next = formatCellRange(range).replace(/^.*!/s, '');
    if (address.length + next.length > addressLimit) break;
    address += address === '' ? next : `,${next}`;
  }
  return address;
}

function isInvalidSelection(cause: unknown): boolean {
  return cause instanceof Error && 'code' in cause && cause.code === 'InvalidSelection';
}

function told(onChange: () => void): Promise<void> {
  onChange();
  return Promise.resolve();
}
