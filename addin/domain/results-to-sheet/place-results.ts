/**
 * Decides for every result column which cells it takes: the cells that its name already refers to, free columns beside
 * its block, or a table on a sheet of its own.
 *
 * A column is refreshed where it stands as long as its name refers to a line of cells as long as the block and we can
 * tell our values there from the planner's. Otherwise it is placed anew, and what is ours at the old place is cleared.
 */
import { formatCellAddress } from '../sheet/cell-address';
import { rangesOverlap, type CellRange } from '../sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { resolveName } from '../formula/resolve-reference';
import type { SheetModel } from '../model-from-sheet/sheet-model';
import { searchFreeLanes, takeLanes, type FreeLanes, type SearchRequest } from './free-columns';
import { headingCellOf, lineCell, lineLengthOf, rangeOfCell, type LineContents } from './result-lines';
import type { ResultTexts } from './result-texts';
import type { ResultBlock, ResultColumn } from './solution-columns';
import { cellsStillOurs, stillHolds, type ColumnRecord, type PlanRecord } from './written-cells';

/** One result column and the cells it takes. */
export interface PlacedColumn {
  readonly block: ResultBlock;
  readonly column: ResultColumn;
  /** The cells that the column's name refers to: one line, heading apart. */
  readonly range: CellRange;
  readonly isLying: boolean;
  /** Place in `range` of each of the block's lines. */
  readonly offsets: readonly number[];
  /** Chosen now, as against refreshed where it stood. */
  readonly isNew: boolean;
  /** What was last written there; undefined for a new place or where nothing is recorded. */
  readonly record: ColumnRecord | undefined;
}

/** The two columns before the results in a table on a sheet of its own. */
export interface PlacedTable {
  readonly block: ResultBlock;
  readonly sheet: string;
  readonly headingRow: number;
  /** The reference to each cell stands in the column after it. */
  readonly labelColumn: number;
  readonly isNew: boolean;
}

/** Cells that a column took before and takes no longer. */
export interface AbandonedColumn {
  readonly name: string;
  readonly range: CellRange;
  readonly isLying: boolean;
  readonly record: ColumnRecord | undefined;
  /** It stood in a table of ours, whose labels and references stay behind: formulas are never overwritten. */
  readonly wasInTable: boolean;
}

export interface Placement {
  readonly columns: readonly PlacedColumn[];
  readonly tables: readonly PlacedTable[];
  readonly abandoned: readonly AbandonedColumn[];
  /** A sheet that must be added; null where none is needed. */
  readonly addedSheet: string | null;
}

/** First row of a table on a sheet of its own: its headings. */
const tableHeadingRow = 0;
/** Columns of such a table before the results. */
const tableLeadCount = 2;
/** Longest name of a sheet. */
const sheetNameLimit = 31;

/** @param record what was last written for this plan; undefined where nothing is recorded */
export function placeResults(
  workbook: WorkbookSnapshot,
  contents: LineContents,
  model: SheetModel,
  blocks: readonly ResultBlock[],
  record: PlanRecord | undefined,
  texts: ResultTexts,
): Placement {
  const existing = new ExistingResults(workbook, contents, model, blocks, record);
  const columns: PlacedColumn[] = [];
  const tables: PlacedTable[] = [];
  const abandoned: AbandonedColumn[] = [];
  const unplaced: { block: ResultBlock; wanted: readonly ResultColumn[] }[] = [];

  for (const block of blocks.filter(({ lines }) => lines.length > 0)) {
    const table = existing.takeTable(block);
    if (table !== undefined) {
      tables.push(table.table);
      columns.push(...table.columns);
      continue;
    }
    const wanted: ResultColumn[] = [];
    for (const column of block.columns) {
      const refreshed = existing.takeColumn(block, column);
      if (refreshed !== undefined) {
        columns.push(refreshed);
      } else {
        wanted.push(column);
        abandoned.push(...existing.abandonedBy(block, column));
      }
    }
    if (wanted.length > 0) {
      unplaced.push({ block, wanted });
    }
  }

  const [beside, homeless] = partition(unplaced, ({ block }) => block.orientation !== 'grid');
  const windows = searchFreeLanes(
    workbook,
    beside.map(({ block, wanted }) => searchRequest(contents, block, wanted, abandoned)),
  );
  beside.forEach(({ block, wanted }, position) => {
    const lanes = windows[position].find(wanted.length);
    if (lanes !== undefined) {
      takeLanes(windows, lanes, wanted.length);
      wanted.forEach((column, lane) => columns.push(newBeside(block, column, laneRange(lanes, lane))));
      return;
    }
    // A block's columns stay together: one that could have been refreshed goes into the table with the others.
    const [refreshed, others] = partition(columns, (placed) => placed.block === block);
    columns.splice(0, columns.length, ...others);
    abandoned.push(...refreshed.flatMap(({ column }) => existing.abandonedBy(block, column)));
    homeless.push({ block, wanted: block.columns });
  });

  let addedSheet: string | null = null;
  if (homeless.length > 0) {
    const ownSheet = tables[0]?.sheet ?? existing.sheetOfTables();
    const sheet = ownSheet ?? freeSheetName(workbook, texts.resultsSheetName(model.planName));
    addedSheet = ownSheet === undefined ? sheet : null;
    let nextColumn = ownSheet === undefined ? 0 : firstColumnAfterContent(workbook, ownSheet);
    for (const { block } of homeless) {
      tables.push({ block, sheet, headingRow: tableHeadingRow, labelColumn: nextColumn, isNew: true });
      block.columns.forEach((column, position) => {
        columns.push(newInTable(block, column, sheet, nextColumn + tableLeadCount + position));
      });
      nextColumn += tableLeadCount + block.columns.length + 1;
    }
  }
  return { columns, tables, abandoned, addedSheet };
}

/** Whether a heading is the one that we wrote. */
export function holdsOurHeading(
  contents: LineContents,
  line: { readonly range: CellRange; readonly isLying: boolean },
  record: ColumnRecord | undefined,
): boolean {
  const heading = headingCellOf(line.range, line.isLying);
  const recorded = record?.heading ?? null;
  return heading !== undefined && recorded !== null && stillHolds(contents.ofCell(heading), recorded);
}

/** A line of cells that a result name refers to at present. */
interface ExistingLine {
  readonly range: CellRange;
  readonly isLying: boolean;
}

/** Where the plan's result names point before anything is written. Each place is given out once. */
class ExistingResults {
  private readonly lines: ReadonlyMap<string, ExistingLine>;
  /** Cells that no result column may take: the plan's own blocks, and columns already refreshed. */
  private readonly taken: CellRange[];

  constructor(
    private readonly workbook: WorkbookSnapshot,
    private readonly contents: LineContents,
    private readonly model: SheetModel,
    private readonly blocks: readonly ResultBlock[],
    private readonly record: PlanRecord | undefined,
  ) {
    const lines = new Map<string, ExistingLine>();
    for (const { name } of blocks.flatMap((block) => block.columns)) {
      const line = this.lineNamed(name);
      if (line !== undefined) {
        lines.set(name, line);
      }
    }
    this.lines = lines;
    this.taken = blocks.map((block) => block.range);
  }

  /** The column where its name has it, if it can be refreshed there. */
  takeColumn(block: ResultBlock, column: ResultColumn): PlacedColumn | undefined {
    const line = this.lines.get(column.name);
    const isLying = block.orientation === 'lying';
    if (
      line === undefined ||
      block.orientation === 'grid' ||
      lineLengthOf(line.range) !== block.lineCount ||
      (block.lineCount > 1 && line.isLying !== isLying) ||
      this.isTaken(line.range) ||
      !this.canTellOurs(line, column)
    ) {
      return undefined;
    }
    this.taken.push(line.range);
    return {
      ...newBeside(block, column, line.range),
      isNew: false,
      record: this.recordOf(column),
    };
  }

  /** The table that this block's results stand in, as long as it lists the block's cells line by line. */
  takeTable(block: ResultBlock): { table: PlacedTable; columns: PlacedColumn[] } | undefined {
    const [first, ...rest] = block.columns.map((column) => this.lines.get(column.name)?.range);
    const bottom = (first?.top ?? 0) + block.lines.length - 1;
    if (first === undefined || first.top < 1 || !this.isReferenceColumnBefore(first, block)) {
      return undefined;
    }
    const ranges: CellRange[] = [first];
    for (const range of rest) {
      if (range?.sheet !== first.sheet || range.top !== first.top) {
        return undefined;
      }
      ranges.push(range);
    }
    const areColumns = ranges.every((range) => range.left === range.right && range.bottom === bottom);
    const areRecorded = block.columns.every((column) => this.recordOf(column) !== undefined);
    if (!areColumns || !areRecorded || ranges.some((range) => this.isTaken(range))) {
      return undefined;
    }
    this.taken.push(...ranges);
    return {
      table: {
        block,
        sheet: first.sheet,
        headingRow: first.top - 1,
        labelColumn: first.left - tableLeadCount,
        isNew: false,
      },
      columns: block.columns.map((column, position) => ({
        ...newInTable(block, column, first.sheet, first.left),
        range: ranges[position],
        isNew: false,
        record: this.recordOf(column),
      })),
    };
  }

  /** The cells a column leaves when it is placed anew; none where its name never led to cells of ours. */
  abandonedBy(block: ResultBlock, column: ResultColumn): AbandonedColumn[] {
    const line = this.lines.get(column.name);
    if (line === undefined || this.blocks.some((other) => rangesOverlap(other.range, line.range))) {
      return [];
    }
    const first = this.lines.get(block.columns[0].name);
    return [
      {
        name: column.name,
        ...line,
        record: this.recordOf(column),
        wasInTable: first !== undefined && this.isReferenceColumnBefore(first.range, undefined),
      },
    ];
  }

  /** The sheet on which a table of this plan's results stands, if there is one. */
  sheetOfTables(): string | undefined {
    for (const block of this.blocks) {
      const first = this.lines.get(block.columns[0].name);
      if (first !== undefined && this.isReferenceColumnBefore(first.range, undefined)) {
        return findSheet(this.workbook, first.range.sheet)?.name;
      }
    }
    return undefined;
  }

  /**
   * Whether the column before a line refers, cell by cell, to one cell each: what only our tables have.
   * @param block the references must lead to this block's cells, one by one; undefined: to any
   */
  private isReferenceColumnBefore(range: CellRange, block: ResultBlock | undefined): boolean {
    const sheet = findSheet(this.workbook, range.sheet);
    const count = range.bottom - range.top + 1;
    if (range.left < tableLeadCount || (block !== undefined && count !== block.lines.length)) {
      return false;
    }
    return Array.from({ length: count }, (_, offset) => offset).every((offset) => {
      const formula = sheet?.cell(range.top + offset, range.left - 1)?.formula;
      return block === undefined
        ? formula !== undefined && /^('(?:[^']|'')+'|[^'!]+)![A-Z]+\d+$/.test(formula)
        : formula === formatCellAddress(block.lines[offset].about);
    });
  }

  /** Our values can be told from the planner's: something is recorded, or there is nothing to tell apart. */
  private canTellOurs(line: ExistingLine, column: ResultColumn): boolean {
    return (
      this.recordOf(column) !== undefined || this.contents.ofLine(line.range).every((value) => value === null)
    );
  }

  private isTaken(range: CellRange): boolean {
    return this.taken.some((taken) => rangesOverlap(taken, range));
  }

  private recordOf(column: ResultColumn): ColumnRecord | undefined {
    return this.record?.columns.find((entry) => entry.name === column.name.toLowerCase());
  }

  /** The single line of cells that a result name refers to, or undefined. */
  private lineNamed(name: string): ExistingLine | undefined {
    const isSame = (a: string | null, b: string | null): boolean =>
      (a ?? '').toLowerCase() === (b ?? '').toLowerCase();
    const definedName = this.workbook.names.find(
      (candidate) => isSame(candidate.name, name) && isSame(candidate.scope, this.model.scope),
    );
    const resolution = definedName === undefined ? undefined : resolveName(this.workbook, definedName);
    if (resolution?.kind !== 'ranges' || resolution.ranges.length !== 1) {
      return undefined;
    }
    const [range] = resolution.ranges;
    const isLying = range.left !== range.right;
    return isLying && range.top !== range.bottom ? undefined : { range, isLying };
  }
}

function searchRequest(
  contents: LineContents,
  block: ResultBlock,
  wanted: readonly ResultColumn[],
  abandoned: readonly AbandonedColumn[],
): SearchRequest {
  const ours = new Set<string>();
  const ownRanges: CellRange[] = [];
  for (const line of abandoned.filter(({ name }) => wanted.some((column) => column.name === name))) {
    ownRanges.push(line.range);
    cellsStillOurs(contents.ofLine(line.range), line.record?.values ?? []).forEach((isOurs, offset) => {
      if (isOurs) {
        ours.add(formatCellAddress(lineCell(line.range, offset)));
      }
    });
    const heading = headingCellOf(line.range, line.isLying);
    if (heading !== undefined && holdsOurHeading(contents, line, line.record)) {
      ownRanges.push(rangeOfCell(heading));
      ours.add(formatCellAddress(heading));
    }
  }
  return {
    range: block.range,
    isLying: block.orientation === 'lying',
    ownRanges,
    isOurs: (cell) => ours.has(formatCellAddress(cell)),
  };
}

function newBeside(block: ResultBlock, column: ResultColumn, range: CellRange): PlacedColumn {
  return {
    block,
    column,
    range,
    isLying: block.orientation === 'lying',
    offsets: block.lines.map(({ line }) => line),
    isNew: true,
    record: undefined,
  };
}

function newInTable(block: ResultBlock, column: ResultColumn, sheet: string, atColumn: number): PlacedColumn {
  const top = tableHeadingRow + 1;
  return {
    block,
    column,
    range: { sheet, top, left: atColumn, bottom: top + block.lines.length - 1, right: atColumn },
    isLying: false,
    offsets: block.lines.map((_, position) => position),
    isNew: true,
    record: undefined,
  };
}

function laneRange(lanes: FreeLanes, lane: number): CellRange {
  const across = lanes.firstLane + lane;
  return lanes.isLying
    ? { sheet: lanes.sheet, top: across, bottom: across, left: lanes.from, right: lanes.to }
    : { sheet: lanes.sheet, top: lanes.from, bottom: lanes.to, left: across, right: across };
}

function firstColumnAfterContent(workbook: WorkbookSnapshot, sheetName: string): number {
  const columnCount = findSheet(workbook, sheetName)?.columnCount ?? 0;
  return columnCount === 0 ? 0 : columnCount + 1;
}

/** A name of at most 31 characters, none of them forbidden in a sheet's name, that no sheet has yet. */
function freeSheetName(workbook: WorkbookSnapshot, wanted: string): string {
  const cleaned = wanted.replace(/[\\/?*[\]:]/g, ' ').trim();
  for (let copy = 1; ; copy++) {
    const ending = copy === 1 ? '' : ` ${copy}`;
    const name = cleaned.slice(0, sheetNameLimit - ending.length).replace(/^'+|[\s']+$/g, '') + ending;
    if (name.trim() !== '' && findSheet(workbook, name) === undefined) {
      return name;
    }
  }
}

function partition<T>(items: readonly T[], isFirst: (item: T) => boolean): [T[], T[]] {
  return [items.filter(isFirst), items.filter((item) => !isFirst(item))];
}
