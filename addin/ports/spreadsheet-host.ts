/**
 * Everything that a face inside a spreadsheet program needs of that program.
 */
import type { Selection } from './selection';
import type { SheetFilters } from './sheet-filters';
import type { Workbook } from './workbook';
import type { WorkbookChanges } from './workbook-changes';
import type { WriteJournal } from './write-journal';

export interface SpreadsheetHost {
  readonly workbook: Workbook;
  readonly selection: Selection;
  readonly changes: WorkbookChanges;
  readonly filters: SheetFilters;
  readonly journal: WriteJournal;
  /** Whether the program shows itself dark; null where it does not say. */
  isDark(): boolean | null;
}
