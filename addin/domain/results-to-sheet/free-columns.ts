/**
 * Where result columns may stand: to the right of the block, after one empty column, the first adjacent columns
 * within 30 whose cells from heading to last row hold no value, formula, spill, merge or note, lie in no table,
 * PivotTable or named block, are not hidden, and are referred to by no formula of the workbook. A block lying on its
 * side gets rows below by the same rule. Nothing is found where there is no room for the heading.
 *
 * *Lanes* are what is searched: columns beside an upright block, rows below a lying one. All windows are marked in
 * one pass over the workbook, so that 100,000 formulas are looked at once and not once a block.
 */
import { maximumColumnCount, maximumRowCount, type CellAddress } from '../sheet/cell-address';
import { containsCell, rangesOverlap, type CellRange } from '../sheet/cell-range';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { forEachMeaningfulRange } from './referenced-ranges';
import { rangeOfCell } from './result-lines';

/** How far from the block results may stand: further away nobody reads them together. */
export const searchedLaneCount = 30;

/** Where one block's results may be looked for, and what of the workbook does not count as being in the way. */
export interface SearchRequest {
  /** The block's own cells. */
  readonly range: CellRange;
  readonly isLying: boolean;
  /** Cells where our own results stood and may stand again: what refers to them or names them is not in the way. */
  readonly ownRanges: readonly CellRange[];
  /** Whether what a cell within `ownRanges` holds is ours, and not the planner's. */
  readonly isOurs: (cell: CellAddress) => boolean;
}

/** Adjacent lanes found for a block. */
export interface FreeLanes {
  readonly sheet: string;
  readonly isLying: boolean;
  /** First of the adjacent columns (rows where lying). */
  readonly firstLane: number;
  /** Row (column where lying) of the headings, before the block, and of the block's first and last line. */
  readonly headingAt: number;
  readonly from: number;
  readonly to: number;
}

/** Marks of the lanes beside one block. */
export class LaneWindow {
  readonly sheet: string;
  readonly isLying: boolean;
  /** Along the lanes: the heading and the last line. */
  readonly headingAt: number;
  readonly from: number;
  readonly to: number;
  /** All cells of all lanes, heading included. */
  readonly area: CellRange;
  /** The first lane after the block; it can only be the empty one between. */
  private readonly firstLane: number;
  private readonly laneCount: number;
  /** Length laneCount: 1 where results may not stand. */
  private readonly blocked: Uint8Array;
  /** Length laneCount: 1 where the lane holds something, so that it is no empty lane between. */
  private readonly filled: Uint8Array;

  constructor(private readonly request: SearchRequest) {
    const { range, isLying } = request;
    this.sheet = range.sheet;
    this.isLying = isLying;
    this.from = isLying ? range.left : range.top;
    this.to = isLying ? range.right : range.bottom;
    this.headingAt = this.from - 1;
    this.firstLane = (isLying ? range.bottom : range.right) + 1;
    const limit = isLying ? maximumRowCount : maximumColumnCount;
    this.laneCount = Math.max(0, Math.min(searchedLaneCount, limit - this.firstLane));
    this.blocked = new Uint8Array(this.laneCount);
    this.filled = new Uint8Array(this.laneCount);
    const along = [this.headingAt, this.to] as const;
    const across = [this.firstLane, this.firstLane + this.laneCount - 1] as const;
    const [[top, bottom], [left, right]] = isLying ? [across, along] : [along, across];
    this.area = { sheet: this.sheet, top, left, bottom, right };
  }

  /** Results may not stand in these cells, though the lane may serve as the empty one between. */
  block(range: CellRange): void {
    this.mark(this.blocked, range);
  }

  /** These cells hold something. */
  fill(range: CellRange): void {
    this.mark(this.blocked, range);
    this.mark(this.filled, range);
  }

  /** Whether a name or reference means no more than our own results. */
  isOwn(range: CellRange): boolean {
    return this.request.ownRanges.some(
      (own) =>
        own.sheet === range.sheet &&
        own.top <= range.top &&
        own.bottom >= range.bottom &&
        own.left <= range.left &&
        own.right >= range.right,
    );
  }

  isOurs(cell: CellAddress): boolean {
    return this.request.ownRanges.some((own) => containsCell(own, cell)) && this.request.isOurs(cell);
  }

  /** The first `count` adjacent free lanes with an empty lane before them, or undefined. */
  find(count: number): FreeLanes | undefined {
    if (this.headingAt < 0) {
      return undefined;
    }
    for (let lane = 1; lane + count <= this.laneCount; lane++) {
      if (
        this.filled[lane - 1] === 0 &&
        this.blocked.subarray(lane, lane + count).every((mark) => mark === 0)
      ) {
        const { sheet, isLying, headingAt, from, to } = this;
        return { sheet, isLying, firstLane: this.firstLane + lane, headingAt, from, to };
      }
    }
    return undefined;
  }

  private mark(marks: Uint8Array, range: CellRange): void {
    if (this.laneCount === 0 || !rangesOverlap(this.area, range)) {
      return;
    }
    const [first, last] = this.isLying ? [range.top, range.bottom] : [range.left, range.right];
    const start = Math.max(0, first - this.firstLane);
    marks.fill(1, start, Math.min(this.laneCount, last - this.firstLane + 1));
  }
}

/** The windows beside the given blocks, with everything that is in the way marked. */
export function searchFreeLanes(
  workbook: WorkbookSnapshot,
  requests: readonly SearchRequest[],
): readonly LaneWindow[] {
  const windows = requests.map((request) => new LaneWindow(request));
  if (windows.length === 0) {
    return windows;
  }
  markContent(workbook, windows);
  for (const table of workbook.tables) {
    fillAll(windows, table.range);
  }
  for (const request of requests) {
    fillAll(windows, request.range);
  }
  forEachMeaningfulRange(workbook, new Set(windows.map(({ sheet }) => sheet)), (range) => {
    for (const window of windows) {
      if (window.sheet === range.sheet && !window.isOwn(range)) {
        window.block(range);
      }
    }
  });
  return windows;
}

/** Marks lanes that have just been given to a block, so that no other block gets them. */
export function takeLanes(windows: readonly LaneWindow[], lanes: FreeLanes, count: number): void {
  const along = [lanes.headingAt, lanes.to] as const;
  const across = [lanes.firstLane, lanes.firstLane + count - 1] as const;
  const [[top, bottom], [left, right]] = lanes.isLying ? [across, along] : [along, across];
  fillAll(windows, { sheet: lanes.sheet, top, left, bottom, right });
}

/** Values, formulas, spills, merges, notes, PivotTables and hidden lanes. */
function markContent(workbook: WorkbookSnapshot, windows: readonly LaneWindow[]): void {
  for (const sheet of workbook.sheets) {
    const here = windows.filter((window) => window.sheet === sheet.name);
    if (here.length === 0) {
      continue;
    }
    sheet.forEachCell((row, column, cell) => {
      if (cell.arrayRange !== undefined) {
        fillAll(here, cell.arrayRange);
      }
      if (cell.formula === undefined && (cell.value === null || cell.value === undefined)) {
        return;
      }
      const address = { sheet: sheet.name, row, column };
      for (const window of here) {
        const isInArea = containsCell(window.area, address);
        if (isInArea && !window.isOurs(address)) {
          window.fill(rangeOfCell(address));
        }
      }
    });
    sheet.mergedRanges.forEach((range) => fillAll(here, range));
    sheet.pivotRanges.forEach((range) => fillAll(here, range));
    sheet.notedCells.forEach((cell) => fillAll(here, rangeOfCell(cell)));
    for (const window of here) {
      markHiddenLanes(window, (lane) =>
        window.isLying ? sheet.isRowHidden(lane) : sheet.isColumnHidden(lane),
      );
    }
  }
}

function markHiddenLanes(window: LaneWindow, isHidden: (lane: number) => boolean): void {
  const { sheet, top, left, bottom, right } = window.area;
  const [first, last] = window.isLying ? [top, bottom] : [left, right];
  for (let lane = first; lane <= last; lane++) {
    if (isHidden(lane)) {
      window.block(
        window.isLying
          ? { sheet, top: lane, bottom: lane, left, right }
          : { sheet, top, bottom, left: lane, right: lane },
      );
    }
  }
}

function fillAll(windows: readonly LaneWindow[], range: CellRange): void {
  for (const window of windows) {
    window.fill(range);
  }
}
