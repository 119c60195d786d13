/**
 * From a solved plan to the writes that bring it onto the sheet: decision cells, result columns with their names,
 * stored values of the formulas that depend on them, and the record of what was written.
 *
 * Nothing of the planner's is overwritten: formulas stay to the letter, and a result cell that no longer holds what
 * was last written there is theirs and is kept, and reported.
 */
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import { absoluteRangeText, formatCellRange, type CellRange } from '../sheet/cell-range';
import type { DefinedName } from '../sheet/defined-name';
import { findSheet, storedValue, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { recalculate } from '../calculation/recalculate';
import type { SheetModel } from '../model-from-sheet/sheet-model';
import { placeResults } from './place-results';
import {
  holdsOurHeading,
  type AbandonedColumn,
  type PlacedColumn,
  type PlacedTable,
  type Placement,
} from './placement';
import type { PlanSolution } from './plan-solution';
import { headingCellOf, lineCell, LineContents, lineLengthOf } from './result-lines';
import { resultNotice, type ResultNotice } from './result-notice';
import { headingText, type ResultTexts } from './result-texts';
import { widthWrites } from './result-widths';
import { resultBlocksOf, type ResultBlock } from './solution-columns';
import { compareWithWorkbook } from './workbook-agreement';
import type { NameWrite, ValueWrite, WorkbookWrite, WritePlan } from './write-plan';
import {
  cellsStillOurs,
  planRecordKey,
  readWorkbookRecord,
  renewWorkbookRecord,
  type ColumnRecord,
  type DecisionRecord,
  type PlanRecord,
  type WrittenValue,
} from './written-cells';

export interface ResultWriteRequest {
  readonly workbook: WorkbookSnapshot;
  readonly model: SheetModel;
  readonly solution: PlanSolution;
  /** Leave the decision cells as they are. */
  readonly keepDecisions: boolean;
  readonly texts: ResultTexts;
  /** The caller's clock as a serial date, for TODAY and NOW. */
  readonly now: number;
}

/** A result column as written. */
export interface WrittenColumn {
  readonly name: string;
  /** Its values, heading apart. */
  readonly range: CellRange;
}

export interface ResultWrites {
  readonly plan: WritePlan;
  readonly columns: readonly WrittenColumn[];
  /** Decision cells that received their optimum; 0 where they were left alone. */
  readonly decisionCount: number;
  /** Formulas whose stored value was renewed. */
  readonly recalculatedCount: number;
  /** The workbook's own objective at the plan; null without an objective cell, or where it cannot be recalculated. */
  readonly workbookObjective: number | null;
  /** Objective and both sides of every row, as the workbook's formulas give them, equal the model's. */
  readonly workbookAgrees: boolean;
  readonly notices: readonly ResultNotice[];
}

export function planResultWrites(request: ResultWriteRequest): ResultWrites {
  const { workbook, model, solution, texts } = request;
  const record = readWorkbookRecord(workbook.record);
  const ownRecord = record.get(planRecordKey(model.planName));
  // A copied sheet brings result values along; the record of the plan it was copied from tells whose they are.
  const planRecord = ownRecord ?? record.get(planRecordKey(model.prefix));
  const contents = new LineContents(workbook);
  const blocks = resultBlocksOf(model, solution);
  const placement = placeResults(workbook, contents, model, blocks, planRecord, texts);

  const notices: ResultNotice[] = [];
  const decisionWrites = request.keepDecisions ? [] : writesOfDecisions(model, solution);
  const columns = placement.columns.map((placed) => writesOfColumn(contents, placed, texts));
  const valueWrites = [...decisionWrites, ...columns.flatMap((column) => column.writes)];
  const clearings = clearingWrites(contents, placement, valueWrites);
  const names = columns.flatMap((column) => column.nameWrites(model.scope));
  const tables = placement.tables.flatMap((table) => writesOfTable(workbook, table, texts));
  notices.push(...columns.flatMap((column) => column.notices), ...movingNotices(placement, clearings.left));

  const changes = changesOf([...valueWrites, ...clearings.writes]);
  const recalculation = recalculate(withNames(workbook, names), changes, request.now);
  const storedValues = recalculation.values.flatMap(({ cell, value }): WorkbookWrite[] =>
    storedValue(workbook, cell) === value ? [] : [{ kind: 'storedValue', cell, value }],
  );
  const dropped = recalculation.notRecalculated.map(({ cell, reason }) => {
    notices.push(resultNotice('not-recalculated', cell, { reason }));
    return { kind: 'storedValue', cell, value: undefined } as const;
  });

  // The workbook is compared at the plan, also where the decision cells keep what they hold.
  const changesAtPlan = request.keepDecisions ? changesOf(writesOfDecisions(model, solution)) : changes;
  const agreement = compareWithWorkbook(workbook, model, solution, {
    changes: changesAtPlan,
    ...(request.keepDecisions ? recalculate(workbook, changesAtPlan, request.now) : recalculation),
  });
  notices.push(...agreement.notices);

  const renewedRecord: PlanRecord = {
    columns: columns.map((column) => column.record),
    decisions: request.keepDecisions ? (ownRecord?.decisions ?? []) : decisionRecords(model, solution),
  };
  const plan: WorkbookWrite[] = [
    ...(placement.addedSheet === null ? [] : [{ kind: 'addSheet', name: placement.addedSheet } as const]),
    ...clearings.writes,
    ...valueWrites,
    ...tables,
    ...widthWrites(workbook, placement, texts),
    ...names,
    ...storedValues,
    ...dropped,
    { kind: 'record', json: renewWorkbookRecord(record, model.planName, renewedRecord) },
    // To some functions, such as COUNT, a cleared cell is not the 0 that it was recalculated with.
    ...(dropped.length > 0 || clearings.writes.length > 0 ? [{ kind: 'recalculateOnOpening' } as const] : []),
  ];
  return {
    plan,
    columns: inOrderOfBlocks(placement).map(({ column, range }) => ({ name: column.name, range })),
    decisionCount: decisionWrites.length,
    recalculatedCount: recalculation.values.length,
    workbookObjective: agreement.objective,
    workbookAgrees: agreement.notices.length === 0,
    notices,
  };
}

function writesOfDecisions(model: SheetModel, solution: PlanSolution): ValueWrite[] {
  return model.decisions.map(({ cell }, position) => ({
    kind: 'value',
    cell,
    value: solution.decisions[position].value,
  }));
}

function decisionRecords(model: SheetModel, solution: PlanSolution): DecisionRecord[] {
  return model.decisionBlocks.map((block) => ({
    block: block.number,
    before: model.decisions.slice(block.first, block.end).map((decision) => decision.before),
    written: solution.decisions.slice(block.first, block.end).map((decision) => decision.value),
  }));
}

interface ColumnWrites {
  readonly writes: readonly ValueWrite[];
  readonly notices: readonly ResultNotice[];
  readonly record: ColumnRecord;
  readonly nameWrites: (scope: string | null) => NameWrite[];
}

/** Heading and values of one column, as far as its cells are ours. */
function writesOfColumn(contents: LineContents, placed: PlacedColumn, texts: ResultTexts): ColumnWrites {
  const { column, range, isNew } = placed;
  const writes: ValueWrite[] = [];
  const notices: ResultNotice[] = [];
  const length = lineLengthOf(range);
  const held = contents.ofLine(range);
  const recorded = placed.record?.values ?? [];
  const ours = isNew ? held.map(() => true) : cellsStillOurs(held, recorded);
  const written: WrittenValue[] = new Array<WrittenValue>(length).fill(null);

  const positionAt = new Map(placed.offsets.map((offset, position) => [offset, position]));
  for (let offset = 0; offset < length; offset++) {
    const position = positionAt.get(offset);
    const value = position === undefined ? null : column.values[position];
    const cell = lineCell(range, offset);
    if (!ours[offset]) {
      if (value !== null) {
        notices.push(resultNotice('kept-cell', cell, { name: column.name, value }));
      }
      continue;
    }
    written[offset] = value;
    if (value !== null) {
      // A refreshed cell keeps the format that the planner may have given it.
      const takesFormat = isNew || held[offset] === null;
      const numberFormatOf = position === undefined || !takesFormat ? undefined : column.formatOf[position];
      writes.push({ kind: 'value', cell, value, ...(numberFormatOf && { numberFormatOf }) });
    } else if (!isNew && held[offset] !== null) {
      writes.push({ kind: 'value', cell, value: null });
    }
  }
  const heading = writeOfHeading(contents, placed, texts);
  return {
    writes: [...heading.writes, ...writes],
    notices,
    record: { name: column.name.toLowerCase(), heading: heading.recorded, values: written },
    nameWrites: (scope) =>
      isNew ? [{ kind: 'name', name: column.name, scope, formula: absoluteRangeText(range) }] : [],
  };
}

/** A heading that the planner wrote or changed stays; a blank cell or our own heading receives ours. */
function writeOfHeading(
  contents: LineContents,
  placed: PlacedColumn,
  texts: ResultTexts,
): { writes: ValueWrite[]; recorded: string | null } {
  const cell = headingCellOf(placed.range, placed.isLying);
  if (cell === undefined) {
    return { writes: [], recorded: null };
  }
  const isBlank = contents.ofCell(cell) === null;
  const text = headingText(texts, placed.column.role);
  if (!placed.isNew && !isBlank && !holdsOurHeading(contents, placed, placed.record)) {
    return { writes: [], recorded: null };
  }
  return { writes: [{ kind: 'value', cell, value: text, wrapsText: true }], recorded: text };
}

/** Labels and references before the results in a table of our own. */
function writesOfTable(workbook: WorkbookSnapshot, table: PlacedTable, texts: ResultTexts): WorkbookWrite[] {
  const { block, sheet: sheetName, headingRow, labelColumn } = table;
  const sheet = findSheet(workbook, sheetName);
  const at = (row: number, column: number): CellAddress => ({ sheet: sheetName, row, column });
  const writes: WorkbookWrite[] = [];
  const isConstraints = block.kind === 'constraints';
  const headings = isConstraints
    ? [texts.table.constraintRow, texts.table.rightSide]
    : [texts.table.decision, texts.table.decisionCell];
  if (table.isNew) {
    headings.forEach((heading, position) => {
      writes.push({
        kind: 'value',
        cell: at(headingRow, labelColumn + position),
        value: heading,
        wrapsText: true,
      });
    });
  }
  block.lines.forEach((line, position) => {
    const row = headingRow + 1 + position;
    if (sheet?.cell(row, labelColumn)?.formula === undefined) {
      writes.push({ kind: 'value', cell: at(row, labelColumn), value: line.label });
    }
    if (table.isNew) {
      writes.push({
        kind: 'formula',
        cell: at(row, labelColumn + 1),
        formula: formatCellAddress(line.about),
        value: line.aboutValue,
        numberFormatOf: line.about,
      });
    }
  });
  return writes;
}

/** Empties what is ours at places given up, wherever nothing new was written; what is not ours stays. */
function clearingWrites(
  contents: LineContents,
  placement: Placement,
  valueWrites: readonly ValueWrite[],
): { writes: ValueWrite[]; left: AbandonedColumn[] } {
  const writes: ValueWrite[] = [];
  const left: AbandonedColumn[] = [];
  const rewritten = new Set(valueWrites.map(({ cell }) => formatCellAddress(cell)));
  for (const column of placement.abandoned) {
    const held = contents.ofLine(column.range);
    const ours = cellsStillOurs(held, column.record?.values ?? []);
    const cells = held.flatMap((value, offset) =>
      ours[offset] && value !== null ? [lineCell(column.range, offset)] : [],
    );
    const heading = headingCellOf(column.range, column.isLying);
    if (heading !== undefined && holdsOurHeading(contents, column, column.record)) {
      cells.push(heading);
    }
    for (const cell of cells.filter((candidate) => !rewritten.has(formatCellAddress(candidate)))) {
      writes.push({ kind: 'value', cell, value: null });
    }
    if (column.wasInTable || ours.some((isOurs) => !isOurs)) {
      left.push(column);
    }
  }
  return { writes, left };
}

/** One notice a block, since its columns move together. */
function movingNotices(placement: Placement, left: readonly AbandonedColumn[]): ResultNotice[] {
  const notices: ResultNotice[] = [];
  const isOf = (block: ResultBlock) => (column: { readonly block: ResultBlock }) => column.block === block;
  for (const block of new Set(placement.abandoned.map((column) => column.block))) {
    const names = placement.abandoned.filter(isOf(block)).map(({ name }) => name);
    const placed = placement.columns.filter(({ column }) => names.includes(column.name));
    const leftOfBlock = left.filter(isOf(block));
    const cell = lineCell((leftOfBlock[0] ?? placed[0]).range, 0);
    if (leftOfBlock.length > 0) {
      const ranges = leftOfBlock.map(({ range }) => formatCellRange(range));
      notices.push(
        resultNotice('results-left', cell, { names: leftOfBlock.map(({ name }) => name), ranges }),
      );
    } else {
      notices.push(
        resultNotice('results-moved', cell, {
          names,
          ranges: placed.map(({ range }) => formatCellRange(range)),
        }),
      );
    }
  }
  for (const { block, sheet } of placement.tables.filter(({ isNew }) => isNew)) {
    const names = block.columns.map(({ name }) => name);
    notices.push(resultNotice('results-on-own-sheet', null, { names, sheet }));
  }
  return notices;
}

/**
 * The workbook as its names will be, so that formulas that use a result name follow it. Where none does, it is the
 * workbook itself, whose formulas are parsed already.
 */
function withNames(workbook: WorkbookSnapshot, writes: readonly NameWrite[]): WorkbookSnapshot {
  if (!mentionsNames(workbook, writes)) {
    return workbook;
  }
  const isFor = (name: DefinedName, write: NameWrite): boolean =>
    name.name.toLowerCase() === write.name.toLowerCase() &&
    (name.scope ?? '').toLowerCase() === (write.scope ?? '').toLowerCase();
  const names = [
    ...workbook.names.filter((name) => !writes.some((write) => isFor(name, write))),
    ...writes.map(({ name, scope, formula }) => ({ name, scope, formula, isHidden: false })),
  ];
  const { sheets, tables, usesDates1904, record } = workbook;
  return { sheets, names, tables, usesDates1904, record };
}

function mentionsNames(workbook: WorkbookSnapshot, writes: readonly NameWrite[]): boolean {
  const wanted = writes.map(({ name }) => name.toLowerCase());
  const isMention = (formula: string): boolean => {
    const text = formula.toLowerCase();
    return wanted.some((name) => text.includes(name));
  };
  let isMentioned = workbook.names.some(({ formula }) => isMention(formula));
  for (const sheet of isMentioned || wanted.length === 0 ? [] : workbook.sheets) {
    sheet.forEachCell((_row, _column, { formula }) => {
      isMentioned ||= formula !== undefined && isMention(formula);
    });
  }
  return isMentioned;
}

/**
 * What the written cells will hold, as a formula counts it: a cleared cell as 0. Headings are texts in cells that no
 * formula refers to.
 */
function changesOf(writes: readonly ValueWrite[]): Map<string, number> {
  const changes = new Map<string, number>();
  for (const { cell, value } of writes) {
    if (typeof value === 'number' || value === null) {
      changes.set(formatCellAddress(cell), value ?? 0);
    }
  }
  return changes;
}

function inOrderOfBlocks(placement: Placement): PlacedColumn[] {
  const order = (placed: PlacedColumn): number =>
    (placed.block.kind === 'decisions' ? 0 : 1e6) +
    placed.block.number * placed.block.columns.length +
    placed.block.columns.indexOf(placed.column);
  return [...placement.columns].sort((a, b) => order(a) - order(b));
}
