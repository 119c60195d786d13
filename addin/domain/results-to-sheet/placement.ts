/**
 * Where result columns stand: the outcome of place-results.ts.
 */
import type { CellRange } from '../sheet/cell-range';
import { headingCellOf, type LineContents } from './result-lines';
import type { ResultBlock, ResultColumn } from './solution-columns';
import { stillHolds, type ColumnRecord } from './written-cells';

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
  readonly block: ResultBlock;
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
export const tableHeadingRow = 0;
/** Columns of such a table before the results. */
export const tableLeadCount = 2;

/** A column beside its block, in cells chosen now. */
export function newBeside(block: ResultBlock, column: ResultColumn, range: CellRange): PlacedColumn {
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

/** A column of a table on a sheet of its own. */
export function newInTable(
  block: ResultBlock,
  column: ResultColumn,
  sheet: string,
  atColumn: number,
): PlacedColumn {
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
