/// <reference types="office-js" />
/**
 * The workbook that is open in Excel. It is read in few round trips and written in two: one that looks whether
 * everything is still as it was read, and one that writes and reads again.
 *
 * A write is a journal. One that breaks off is taken back at once; where that fails too, the journal is kept, and the
 * planner chooses between finishing and putting back when Excel answers again. Nothing else is written meanwhile.
 */
import type { CellRange } from '../../domain/sheet/cell-range';
import type { WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import type { WritePlan } from '../../domain/results-to-sheet/write-plan';
import { planEdits } from '../../ports/planned-edits';
import { WorkbookError, type Workbook } from '../../ports/workbook';
import type { WriteJournal } from '../../ports/write-journal';
import type { ExcelBatches, OpenBatch } from './excel-batch';
import { workbookErrorOf } from './excel-errors';
import { examine } from './excel-examination';
import { rangesOfJournal, type Direction, type Journal } from './excel-journal';
import { listRanges } from './excel-ranges';
import { rectanglesOf } from './excel-rectangles';
import { readExcelWorkbook } from './excel-reading';
import { excelAbilities } from './excel-requirements';
import { allWork, workLeft } from './excel-standing';
import { carryOut } from './excel-writing';

/** A journal that could not be brought to either end, with the cells that may be between. */
interface OpenJournal {
  readonly journal: Journal;
  readonly ranges: readonly CellRange[];
}

export class ExcelWorkbook implements Workbook, WriteJournal {
  private open: OpenJournal | undefined;
  private isWritingNow = false;
  /** Ends when everything begun so far has. */
  private lastWork: Promise<unknown> = Promise.resolve();

  constructor(private readonly batches: ExcelBatches) {}

  /** Some of what Excel reports as changed may be by us. */
  get isWriting(): boolean {
    return this.isWritingNow;
  }

  read(): Promise<WorkbookSnapshot> {
    return this.inTurn(() => this.batches.run((batch) => readExcelWorkbook(batch, excelAbilities())));
  }

  apply(plan: WritePlan, basis?: WorkbookSnapshot): Promise<void> {
    return this.inTurn(async () => {
      if (this.open !== undefined) throw halfWritten(this.open.ranges, undefined);
      const edits = planEdits(plan, sheetNamesFor(plan, basis), 'the workbook');
      let begun: Journal | undefined;
      this.isWritingNow = true;
      try {
        const failed = await this.batches.run(async (batch) => {
          const { journal, recordPartId } = await examine(batch, edits, excelAbilities(), basis);
          begun = journal;
          return carryOut(batch, allWork(journal, recordPartId), 'forward');
        });
        if (failed.length > 0) throw notVerified(rectanglesOf(failed.map(({ cell }) => cell)));
      } catch (error) {
        if (begun === undefined) throw error;
        await this.takeBack(begun, error);
      } finally {
        this.isWritingNow = false;
      }
    });
  }

  unfinished(): readonly CellRange[] {
    return this.open?.ranges ?? [];
  }

  finish(): Promise<void> {
    return this.bringTo('forward');
  }

  putBack(): Promise<void> {
    return this.bringTo('back');
  }

  /** After a write that broke off. @throws WorkbookError always: what happened, and what it means */
  private async takeBack(journal: Journal, cause: unknown): Promise<never> {
    try {
      await this.batches.run((batch) => bring(batch, journal, 'back'));
    } catch {
      // The first fault is the one to be told; that taking back failed too shows in what is left open.
      this.open = { journal, ranges: rangesOfJournal(journal) };
      throw halfWritten(this.open.ranges, cause);
    }
    throw withNothingChanged(cause);
  }

  private bringTo(direction: Direction): Promise<void> {
    return this.inTurn(async () => {
      const open = this.open;
      if (open === undefined) return;
      this.isWritingNow = true;
      try {
        await this.batches.run((batch) => bring(batch, open.journal, direction));
        this.open = undefined;
      } finally {
        this.isWritingNow = false;
      }
    });
  }

  /** One thing after another: nobody reads what is half written. */
  private inTurn<T>(work: () => Promise<T>): Promise<T> {
    const result = this.lastWork.then(work);
    this.lastWork = result.catch(() => undefined);
    return result;
  }
}

/** Brings a journal to one end, as far as nobody else has changed anything since. */
async function bring(batch: OpenBatch, journal: Journal, direction: Direction): Promise<void> {
  const failed = await carryOut(batch, await workLeft(batch, journal, direction), direction);
  if (failed.length > 0) throw notVerified(rectanglesOf(failed.map(({ cell }) => cell)));
}

/** Every sheet that the plan mentions is taken to be there, until Excel says otherwise. */
function sheetNamesFor(plan: WritePlan, basis: WorkbookSnapshot | undefined): string[] {
  const names = new Map((basis?.sheets ?? []).map(({ name }) => [name.toLowerCase(), name]));
  const added = new Set(
    plan.flatMap((write) => (write.kind === 'addSheet' ? [write.name.toLowerCase()] : [])),
  );
  const mention = (name: string | null | undefined): void => {
    if (name === null || name === undefined) return;
    const key = name.toLowerCase();
    if (!added.has(key) && !names.has(key)) names.set(key, name);
  };
  for (const write of plan) {
    if ('cell' in write) mention(write.cell.sheet);
    if ('numberFormatOf' in write) mention(write.numberFormatOf?.sheet);
    if ('sheet' in write) mention(write.sheet);
    if ('scope' in write) mention(write.scope);
  }
  return [...names.values()];
}

function notVerified(ranges: readonly CellRange[]): WorkbookError {
  return new WorkbookError(
    'not-verified',
    `Excel did not keep what was written into ${listRanges(ranges)}. Look whether cells are merged or locked there, then try again.`,
    { ranges, canRetry: true },
  );
}

function withNothingChanged(cause: unknown): unknown {
  const error = workbookErrorOf(cause);
  if (!(error instanceof WorkbookError)) return error;
  const { code, canRetry, sheets, ranges } = error;
  return new WorkbookError(code, `${error.message} The workbook is as it was.`, {
    cause,
    canRetry,
    sheets,
    ranges,
  });
}

function halfWritten(ranges: readonly CellRange[], cause: unknown): WorkbookError {
  const why = cause instanceof Error ? ` ${cause.message}` : '';
  return new WorkbookError(
    'half-written',
    `Writing broke off and could not be taken back: ${listRanges(ranges)} may hold old or new values.${why} When Excel answers again, finish writing or put everything back.`,
    { ranges, cause },
  );
}
