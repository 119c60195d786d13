/**
 * A spreadsheet program in plain memory: a workbook in maps with a selection, filters and hints of change. For the
 * pane's tests and for pages without a spreadsheet program behind them.
 */
import { formatCellRange, type CellRange } from '../../domain/sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import type { WritePlan } from '../../domain/results-to-sheet/write-plan';
import type { Selection } from '../../ports/selection';
import type { SheetFilters } from '../../ports/sheet-filters';
import type { SpreadsheetHost } from '../../ports/spreadsheet-host';
import { WorkbookError, type Workbook } from '../../ports/workbook';
import type { WorkbookChanges } from '../../ports/workbook-changes';
import type { WriteJournal } from '../../ports/write-journal';
import type { MemoryWorkbook } from './memory-workbook';

export class MemoryHost implements SpreadsheetHost {
  readonly workbook: Workbook;
  readonly selection: Selection;
  readonly changes: WorkbookChanges;
  readonly filters: SheetFilters;
  readonly journal: WriteJournal = {
    unfinished: () => [],
    finish: () => Promise.resolve(),
    putBack: () => Promise.resolve(),
  };

  private selectedRanges: readonly CellRange[] = [];
  private sheetInFront: string;
  private readonly selectionWatchers = new Set<() => void>();
  private readonly changeWatchers = new Set<() => void>();
  private readonly unfilteredSheets = new Set<string>();

  constructor(private readonly memory: MemoryWorkbook) {
    this.sheetInFront = memory.snapshot().sheets[0]?.name ?? '';
    this.workbook = {
      read: () => this.memory.read(),
      apply: (plan, basis) => this.apply(plan, basis),
    };
    this.selection = {
      selected: () => Promise.resolve(this.selectedRanges),
      activeSheet: () => Promise.resolve(this.sheetInFront),
      select: (ranges) => this.select(ranges),
      watch: (onChange) => Promise.resolve(watching(this.selectionWatchers, onChange)),
    };
    this.changes = { watch: (onChange) => Promise.resolve(watching(this.changeWatchers, onChange)) };
    this.filters = {
      clear: (sheets) => {
        sheets.forEach((sheet) => this.unfilteredSheets.add(sheet.toLowerCase()));
        return Promise.resolve();
      },
    };
  }

  isDark(): boolean | null {
    return null;
  }

  /** Somebody selects cells, as by mouse or keyboard. */
  select(ranges: readonly CellRange[]): Promise<void> {
    const sheet = ranges.length === 0 ? undefined : findSheet(this.memory.snapshot(), ranges[0].sheet);
    if (ranges.length > 0 && (sheet === undefined || sheet.visibility !== 'visible')) {
      const message = `${formatCellRange(ranges[0])} cannot be shown: its sheet is hidden or gone.`;
      return Promise.reject(new WorkbookError('not-permitted', message));
    }
    this.selectedRanges = ranges;
    this.sheetInFront = sheet?.name ?? this.sheetInFront;
    this.selectionWatchers.forEach((onChange) => onChange());
    return Promise.resolve();
  }

  /** Somebody else changes the workbook. */
  async changeByOthers(plan: WritePlan): Promise<void> {
    await this.memory.apply(plan);
    this.changeWatchers.forEach((onChange) => onChange());
  }

  private async apply(plan: WritePlan, basis?: WorkbookSnapshot): Promise<void> {
    const snapshot = this.memory.snapshot();
    if (basis !== undefined && basis !== snapshot) {
      throw new WorkbookError(
        'changed-meanwhile',
        'The workbook was changed while its plan was worked out, so nothing was written. Solve it again.',
        { canRetry: true },
      );
    }
    this.refuseMarkedSheets(plan, snapshot);
    await this.memory.apply(plan);
  }

  /** As a spreadsheet program does it: nothing is written on protected sheets, nor into rows that a filter hides. */
  private refuseMarkedSheets(plan: WritePlan, snapshot: WorkbookSnapshot): void {
    const written = new Set(
      plan.flatMap((write) => (write.kind === 'value' || write.kind === 'formula' ? [write.cell.sheet] : [])),
    );
    const sheets = [...written].flatMap((name) => findSheet(snapshot, name) ?? []);
    const isProtected = sheets.filter((sheet) => sheet.isProtected).map(({ name }) => name);
    if (isProtected.length > 0) {
      throw new WorkbookError(
        'protected-sheet',
        `The sheet ${isProtected[0]} is protected, so nothing was written. Take the protection away and solve again.`,
        { sheets: isProtected },
      );
    }
    const filtered = sheets
      .filter((sheet) => sheet.hasActiveFilter && !this.unfilteredSheets.has(sheet.name.toLowerCase()))
      .map(({ name }) => name);
    if (filtered.length > 0) {
      throw new WorkbookError(
        'filtered',
        `A filter hides rows of the sheet ${filtered[0]}, so nothing was written there.`,
        { sheets: filtered },
      );
    }
  }
}

function watching(watchers: Set<() => void>, onChange: () => void): () => void {
  watchers.add(onChange);
  return () => {
    watchers.delete(onChange);
  };
}
