/// <reference types="office-js" />
/**
 * Carries a journal out, forward or back, and reads again what was written. In one round trip as a rule; more only
 * where the entries do not go into one message.
 */
import { cellCountOf, cellsOf, columnCountOf, type CellRange } from '../../domain/sheet/cell-range';
import type { CellMap } from './cell-map';
import type { OpenBatch } from './excel-batch';
import { messageTarget, RangeQueue } from './excel-chunking';
import { contentProperties, contentsOf } from './excel-contents';
import { entryOf, type Entry } from './excel-entry';
import {
  changesByCell,
  holds,
  type CellChange,
  type Direction,
  type Journal,
  type NameChange,
} from './excel-journal';
import { rangeOn } from './excel-ranges';
import { rectanglesOf } from './excel-rectangles';

/** Bytes of an entry beside its own text: quotes, commas, brackets, and its format. */
const entryOverhead = 14;
/** Bytes of what comes back about a cell with an entry of some length: value, formula and kind. */
export function answerBytes(entryLength: number): number {
  return 2 * entryLength + 2 * entryOverhead;
}

/** Bytes of what goes with each rectangle. */
const rectangleOverhead = 600;

/** What of a journal is still to be done. */
export type OpenWork = Omit<Journal, 'calculatesByHand'> & {
  readonly calculatesByHand: boolean;
  /** For sheets that were added: to be deleted again. */
  readonly removedSheets: readonly string[];
  /** The part in the workbook that holds the record; undefined where there is none. */
  readonly recordPartId: string | undefined;
};

/**
 * @returns the cells that do not hold what they were given
 * @throws what the host throws; some of the work may be done then
 */
export async function carryOut(
  batch: OpenBatch,
  work: OpenWork,
  direction: Direction,
): Promise<readonly CellChange[]> {
  const { context } = batch;
  const changes = changesByCell(work.cells);
  await batch.pause();
  const { application } = context.workbook;
  // Rather slow and whole than quick and piecemeal: nothing is drawn or calculated until all of it is there.
  application.suspendScreenUpdatingUntilNextSync();
  writeStructure(context, work, direction);
  const rectangles = rectanglesOf(work.cells.map(({ cell }) => cell));
  const queue = new RangeQueue(rectangles, bytesPerCell(work.cells, rectangles.length, direction));
  const failed: CellChange[] = [];
  do {
    application.suspendApiCalculationUntilNextSync();
    const written = queue
      .take()
      .map((range) => ({ range, loaded: writeRange(context, range, changes, direction) }));
    if (queue.isEmpty && work.calculatesByHand) {
      application.calculate(Excel.CalculationType.recalculate);
    }
    await batch.pause();
    await batch.sync();
    await batch.pause();
    for (const { range, loaded } of written) {
      for (const { cell, content } of contentsOf(range, loaded)) {
        const change = changes.get(cell)!;
        if (!holds(content, direction === 'forward' ? change.after : change.before)) failed.push(change);
      }
    }
  } while (!queue.isEmpty);
  return failed;
}

/** Sheets, names, the record, widths: what fails for reasons of its own comes before the cells. */
function writeStructure(context: Excel.RequestContext, work: OpenWork, direction: Direction): void {
  const { workbook } = context;
  const isForward = direction === 'forward';
  if (isForward) work.addedSheets.forEach((name) => workbook.worksheets.add(name));
  const { record } = work;
  if (record !== undefined) {
    const xml = isForward ? record.after : record.before;
    const part =
      work.recordPartId === undefined ? undefined : workbook.customXmlParts.getItem(work.recordPartId);
    if (xml === null) part?.delete();
    else if (part === undefined) workbook.customXmlParts.add(xml);
    else part.setXml(xml);
  }
  work.names.forEach((change) => writeName(workbook, change, direction));
  for (const { sheet, column, before, after } of work.widths) {
    rangeOn(context, { sheet, top: 0, left: column, bottom: 0, right: column }).format.columnWidth = isForward
      ? after
      : before;
  }
  work.removedSheets.forEach((name) => workbook.worksheets.getItem(name).delete());
}

function writeName(workbook: Excel.Workbook, change: NameChange, direction: Direction): void {
  const { name, scope, before, after, wasVisible } = change;
  const names = scope === null ? workbook.names : workbook.worksheets.getItem(scope).names;
  const [from, to] = direction === 'forward' ? [before, after] : [after, before];
  if (to === null) {
    names.getItem(name).delete();
  } else if (from === null) {
    const added = names.add(name, `=${to}`);
    if (!wasVisible) added.visible = false;
  } else {
    names.getItem(name).formula = `=${to}`;
  }
}

/**
 * Formats first: what a cell makes of an entry depends on its format, and a cell that holds its entry has everything
 * that goes with it, wherever a write broke off.
 */
function writeRange(
  context: Excel.RequestContext,
  range: CellRange,
  changes: CellMap<CellChange>,
  direction: Direction,
): Excel.Range {
  const target = rangeOn(context, range);
  const isForward = direction === 'forward';
  const ofRange = cellsOf(range).map((cell) => changes.get(cell)!);
  const inRows = <T>(value: (change: CellChange) => T): T[][] => {
    const columns = columnCountOf(range);
    return Array.from({ length: cellCountOf(range) / columns }, (_, row) =>
      ofRange.slice(row * columns, (row + 1) * columns).map(value),
    );
  };
  if (ofRange.some(({ formatBefore, formatAfter }) => formatBefore !== formatAfter)) {
    target.numberFormat = inRows(({ formatBefore, formatAfter }) => (isForward ? formatAfter : formatBefore));
  }
  for (const { cell, wrapsBefore, wrapsAfter } of ofRange) {
    if (wrapsBefore !== undefined && wrapsAfter !== undefined && wrapsBefore !== wrapsAfter) {
      const { sheet, row, column } = cell;
      const single = rangeOn(context, { sheet, top: row, left: column, bottom: row, right: column });
      single.format.wrapText = isForward ? wrapsAfter : wrapsBefore;
    }
  }
  target.formulas = inRows((change) => entryOfChange(change, direction));
  return target.load(contentProperties);
}

function entryOfChange(change: CellChange, direction: Direction): Entry {
  const [content, format] =
    direction === 'forward' ? [change.after, change.formatAfter] : [change.before, change.formatBefore];
  return content.formula === undefined ? entryOf(content.value, format) : `=${content.formula}`;
}

/** What a cell takes of the message there, or of the answer, which tells its value, its formula and its kind. */
function bytesPerCell(changes: readonly CellChange[], rectangles: number, direction: Direction): number {
  const bytes = changes.reduce((sum, change) => {
    const { formatBefore, formatAfter } = change;
    const entry = String(entryOfChange(change, direction)).length;
    const format = formatBefore === formatAfter ? 0 : formatAfter.length + 3;
    return sum + Math.max(entry + format + entryOverhead, answerBytes(entry));
  }, rectangles * rectangleOverhead);
  return Math.max(1, Math.min(messageTarget, bytes / Math.max(1, changes.length)));
}
