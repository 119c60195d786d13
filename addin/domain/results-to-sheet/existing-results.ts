/**
 * Where the plan's result names point before anything is written, and what of it can be refreshed in its place.
 */
import { formatCellAddress } from '../sheet/cell-address';
import { rangesOverlap, type CellRange } from '../sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { resolveName } from '../formula/resolve-reference';
import type { SheetModel } from '../model-from-sheet/sheet-model';
import {
  newBeside,
  newInTable,
  tableLeadCount,
  type AbandonedColumn,
  type PlacedColumn,
  type PlacedTable,
} from './placement';
import { lineLengthOf, type LineContents } from './result-lines';
import type { ResultBlock, ResultColumn } from './solution-columns';
import type { ColumnRecord, PlanRecord } from './written-cells';

/** A line of cells that a result name refers to at present. */
interface ExistingLine {
  readonly range: CellRange;
  readonly isLying: boolean;
}

/** Each place is given out once. */
export class ExistingResults {
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
        block,
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
