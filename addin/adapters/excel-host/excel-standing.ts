/// <reference types="office-js" />
/**
 * Finds out how far a journal has been carried out, whatever became of the write: cell by cell and name by name, what
 * is still as it was, what is as it should be, and what somebody else has changed since, which is left alone.
 */
import { recordNamespace } from '../../domain/results-to-sheet/record-text';
import type { CellRange } from '../../domain/sheet/cell-range';
import { CellMap } from './cell-map';
import type { OpenBatch } from './excel-batch';
import { RangeQueue } from './excel-chunking';
import { contentProperties, contentsOf } from './excel-contents';
import {
  changesByCell,
  standingOf,
  type CellChange,
  type CellContent,
  type Direction,
  type Journal,
  type NameChange,
} from './excel-journal';
import { rectanglesOf } from './excel-rectangles';
import { recordOfXml } from './excel-record';
import { answerBytes, type OpenWork } from './excel-writing';

/** What is to be done to bring everything to one end. */
export async function workLeft(batch: OpenBatch, journal: Journal, direction: Direction): Promise<OpenWork> {
  const { context } = batch;
  const { workbook } = context;
  const addedSheets = journal.addedSheets.map((name) => ({
    name,
    worksheet: workbook.worksheets.getItemOrNullObject(name).load('name'),
    used: workbook.worksheets.getItemOrNullObject(name).getUsedRangeOrNullObject(true).load('cellCount'),
  }));
  const names = journal.names.map((change) => ({ change, item: requestName(workbook, change) }));
  const records = workbook.customXmlParts.getByNamespace(recordNamespace);
  const part = records.getOnlyItemOrNullObject().load('id');
  const record = { part, xml: part.getXml() };
  const widths = journal.widths.map((change) => {
    const { sheet, column } = change;
    const worksheet = workbook.worksheets.getItemOrNullObject(sheet).load('name');
    return {
      change,
      worksheet,
      format: worksheet.getRangeByIndexes(0, column, 1, 1).format.load('columnWidth'),
    };
  });
  const present = new PresentCells(context, journal.cells);
  do {
    present.request();
    await batch.sync();
    present.take();
  } while (!present.isDone);
  const { standings } = present;

  const wanted = direction === 'forward' ? 'back' : 'forward';
  const cells = journal.cells.filter((change) => {
    const standing = standings.get(change.cell);
    return standing === wanted || (standing === 'both' && changesLooks(change));
  });
  const isThere = (name: string): boolean =>
    addedSheets.some((added) => added.name === name && !added.worksheet.isNullObject);
  const missing = journal.addedSheets.filter((name) => !isThere(name));
  // A sheet of ours is deleted again only where nobody has put anything on it since.
  const ours = addedSheets.filter(({ name, worksheet, used }) => {
    const own = journal.cells.filter(({ cell }) => cell.sheet === name);
    const isUntouched = own.every(({ cell }) => standings.get(cell) !== 'other');
    return (
      !worksheet.isNullObject && isUntouched && (used.isNullObject || used.cellCount <= boundingCount(own))
    );
  });
  const removedSheets = direction === 'back' ? ours.map(({ name }) => name) : [];
  const isGone = (sheet: string): boolean =>
    removedSheets.includes(sheet) || (direction === 'back' && missing.includes(sheet));
  return {
    calculatesByHand: journal.calculatesByHand,
    cells: cells.filter(({ cell }) => !isGone(cell.sheet)),
    widths: widths
      .filter(({ change, worksheet, format }) => {
        const from = direction === 'forward' ? change.before : change.after;
        if (isGone(change.sheet)) return false;
        return worksheet.isNullObject || isSameWidth(format.columnWidth, from);
      })
      .map(({ change }) => change),
    names: names
      .filter(({ change, item }) => {
        if (change.scope !== null && isGone(change.scope)) return false;
        const present = item === undefined || item.isNullObject ? null : formulaOfName(item);
        return isSameName(present, direction === 'forward' ? change.before : change.after);
      })
      .map(({ change }) => change),
    record: recordToWrite(journal, record.part.isNullObject ? null : record.xml.value, direction),
    recordPartId: record.part.isNullObject ? undefined : record.part.id,
    addedSheets: direction === 'forward' ? missing : [],
    removedSheets,
  };
}

/** Everything of a journal that nobody has begun with. */
export function allWork(journal: Journal, recordPartId: string | undefined): OpenWork {
  return { ...journal, removedSheets: [], recordPartId };
}

type Standing = ReturnType<typeof standingOf>;

/** Reads the cells of a journal again, in as many round trips as they need. */
class PresentCells {
  readonly standings = new CellMap<Standing>();
  private readonly byCell: CellMap<CellChange>;
  private readonly queue: RangeQueue;
  private asked: readonly {
    readonly range: CellRange;
    readonly worksheet: Excel.Worksheet;
    readonly loaded: Excel.Range;
  }[] = [];

  constructor(
    private readonly context: Excel.RequestContext,
    private readonly changes: readonly CellChange[],
  ) {
    this.byCell = changesByCell(changes);
    this.queue = new RangeQueue(rectanglesOf(changes.map(({ cell }) => cell)), bytesPerCell(changes));
  }

  get isDone(): boolean {
    return this.queue.isEmpty;
  }

  request(): void {
    this.asked = this.queue.take().map((range) => {
      const worksheet = this.context.workbook.worksheets.getItemOrNullObject(range.sheet).load('name');
      const { top, left, bottom, right } = range;
      const loaded = worksheet
        .getRangeByIndexes(top, left, bottom - top + 1, right - left + 1)
        .load(contentProperties);
      return { range, worksheet, loaded };
    });
  }

  take(): void {
    for (const { range, worksheet, loaded } of this.asked) {
      if (worksheet.isNullObject) {
        // Of a sheet that is not there yet, nothing is done; of one that is gone, nothing can be.
        for (const { cell } of changesIn(this.changes, range)) {
          this.standings.set(cell, 'back');
        }
        continue;
      }
      for (const { cell, content } of contentsOf(range, loaded)) {
        this.standings.set(cell, standingOf(this.byCell.get(cell)!, content));
      }
    }
  }
}

/** Of a cell that holds the same at both ends, only its looks tell them apart; they are simply set again. */
function changesLooks({ formatBefore, formatAfter, wrapsBefore, wrapsAfter }: CellChange): boolean {
  return formatBefore !== formatAfter || wrapsBefore !== wrapsAfter;
}

/** Either end of a change may be what stands there. */
function bytesPerCell(changes: readonly CellChange[]): number {
  const length = ({ value, formula }: CellContent): number => (formula ?? String(value)).length;
  const bytes = changes.reduce(
    (sum, { before, after }) => sum + answerBytes(Math.max(length(before), length(after))),
    0,
  );
  return bytes / Math.max(1, changes.length);
}

function changesIn(changes: readonly CellChange[], range: CellRange): CellChange[] {
  return changes.filter(
    ({ cell: { sheet, row, column } }) =>
      sheet === range.sheet &&
      row >= range.top &&
      row <= range.bottom &&
      column >= range.left &&
      column <= range.right,
  );
}

function boundingCount(changes: readonly CellChange[]): number {
  const rows = changes.map(({ cell }) => cell.row);
  const columns = changes.map(({ cell }) => cell.column);
  if (changes.length === 0) return 0;
  const spread = (values: readonly number[]): number =>
    values.reduce((most, value) => Math.max(most, value)) -
    values.reduce((least, value) => Math.min(least, value)) +
    1;
  return spread(rows) * spread(columns);
}

function requestName(workbook: Excel.Workbook, { name, scope }: NameChange): Excel.NamedItem {
  const names = scope === null ? workbook.names : workbook.worksheets.getItemOrNullObject(scope).names;
  return names.getItemOrNullObject(name).load('name,formula');
}

function formulaOfName(item: Excel.NamedItem): string {
  const formula: unknown = item.formula;
  return String(formula).replace(/^=/, '');
}

/** Excel may spell a formula in its own way. */
function isSameName(present: string | null, wanted: string | null): boolean {
  const plain = (formula: string | null): string | null =>
    formula?.replace(/\s|\$/g, '').toLowerCase() ?? null;
  return plain(present) === plain(wanted);
}

/** Excel sets a width to whole pixels. */
function isSameWidth(present: number, wanted: number): boolean {
  return Math.abs(present - wanted) < 1;
}

function recordToWrite({ record }: Journal, present: string | null, direction: Direction): Journal['record'] {
  if (record === undefined) return undefined;
  const from = direction === 'forward' ? record.before : record.after;
  const isFrom =
    (present === null ? null : recordOfXml(present)) === (from === null ? null : recordOfXml(from));
  return isFrom ? record : undefined;
}
