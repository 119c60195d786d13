/**
 * Decides for every result column which cells it takes: the cells that its name already refers to, free columns beside
 * its block, or a table on a sheet of its own.
 *
 * A column is refreshed where it stands as long as its name refers to a line of cells as long as the block and we can
 * tell our values there from the planner's. Otherwise it is placed anew, and what is ours at the old place is cleared.
 */
import { formatCellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { SheetModel } from '../model-from-sheet/sheet-model';
import { ExistingResults } from './existing-results';
import { searchFreeLanes, takeLanes, type FreeLanes, type SearchRequest } from './free-columns';
import {
  holdsOurHeading,
  newBeside,
  newInTable,
  tableHeadingRow,
  tableLeadCount,
  type AbandonedColumn,
  type PlacedColumn,
  type PlacedTable,
  type Placement,
} from './placement';
import { headingCellOf, lineCell, rangeOfCell, type LineContents } from './result-lines';
import type { ResultTexts } from './result-texts';
import type { ResultBlock, ResultColumn } from './solution-columns';
import { cellsStillOurs, type PlanRecord } from './written-cells';

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
