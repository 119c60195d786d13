/// <reference types="office-js" />
/**
 * The cells that a write is to change: what they hold at present, what must not be written over, and what becomes of
 * them.
 */
import {
  cellKey,
  formatCellAddress,
  maximumColumnCount,
  maximumRowCount,
  type CellAddress,
} from '../../domain/sheet/cell-address';
import {
  cellCountOf,
  cellsOf,
  containsCell,
  rangesOverlap,
  type CellRange,
} from '../../domain/sheet/cell-range';
import { findSheet, type TableSnapshot, type WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import { nothingWritten, type CellEdit, type PlannedEdits } from '../../ports/planned-edits';
import { WorkbookError } from '../../ports/workbook';
import { CellMap } from './cell-map';
import { RangeQueue } from './excel-chunking';
import { contentProperties, contentsOf } from './excel-contents';
import { textFormat } from './excel-entry';
import { changedMeanwhile } from './excel-fingerprint';
import { holds, type CellChange, type CellContent } from './excel-journal';
import { listRanges, rangesOfAddress } from './excel-ranges';
import { rectanglesOf } from './excel-rectangles';
import type { ExcelAbilities } from './excel-requirements';
import { arrayRangesOf } from './excel-sheet';

interface LoadedTarget {
  readonly range: CellRange;
  readonly loaded: Excel.Range;
}

interface Target extends LoadedTarget {
  readonly merged: Excel.RangeAreas | undefined;
}

export class WriteTargets {
  /** Cells that get a value or a formula, on sheets that are there: those asked for so far. */
  private readonly targets: Target[] = [];
  /** Of these, the ones that the last round trip was about. */
  private newTargets: readonly Target[] = [];
  private readonly waiting: RangeQueue;
  /** Cells that must hold a formula, because their stored value is to be renewed. */
  private readonly formulaCells: readonly LoadedTarget[];
  private readonly formatSources: readonly LoadedTarget[];
  private readonly wrapped: readonly { readonly cell: CellAddress; readonly format: Excel.RangeFormat }[];
  /** What array formulas filled when the workbook was read, by sheet. */
  private readonly arrays = new Map<string, readonly CellRange[]>();

  /**
   * Asks for everything but the cells themselves, for which see `request`.
   * @throws WorkbookError write-failed for a cell that no sheet has
   */
  constructor(
    private readonly context: Excel.RequestContext,
    private readonly edits: PlannedEdits,
    private readonly abilities: ExcelAbilities,
    private readonly basis: WorkbookSnapshot | undefined,
    private readonly bytesPerCell: number,
  ) {
    const isAdded = (name: string): boolean => edits.addedSheets.includes(name);
    const cells = [...edits.sheets].flatMap(([sheet, { cells: ofSheet }]) =>
      isAdded(sheet) ? [] : [...ofSheet.values()].map((edit) => ({ ...edit, cell: { ...edit.cell, sheet } })),
    );
    const isStored = ({ content }: CellEdit): boolean => content.kind === 'storedValue';
    const outside = cells.find(({ cell: { row, column } }) => !isInSheet(row, column));
    if (outside !== undefined) {
      throw refusal(
        'write-failed',
        `row ${outside.cell.row + 1} or column ${outside.cell.column + 1} lies outside the sheet`,
      );
    }
    const written = cells.filter((edit) => !isStored(edit));
    this.waiting = new RangeQueue(rectanglesOf(written.map(({ cell }) => cell)), bytesPerCell);
    this.formulaCells = this.requestRanges(
      cells.filter(isStored).map(({ cell }) => cell),
      `formulas${this.arrayProperties}`,
    );
    const sources: CellAddress[] = [];
    const known = new CellMap<true>();
    for (const { cells: ofSheet } of edits.sheets.values()) {
      for (const { numberFormatOf: source } of ofSheet.values()) {
        if (source === undefined || isAdded(source.sheet) || known.get(source) === true) continue;
        known.set(source, true);
        sources.push(source);
      }
    }
    this.formatSources = this.requestRanges(sources, 'numberFormat');
    this.wrapped = written
      .filter(({ wrapsText }) => wrapsText)
      .map(({ cell }) => {
        const { sheet, row, column } = cell;
        const range = { sheet, top: row, left: column, bottom: row, right: column };
        return { cell, format: this.rangeOf(range).format.load('wrapText') };
      });
  }

  get isDone(): boolean {
    return this.waiting.isEmpty;
  }

  /** Asks for the cells that are to be written, as many as one message has room for. @returns their bytes, about */
  request(): number {
    const properties = `${contentProperties},numberFormat,rowHidden${this.arrayProperties}`;
    const parts = this.waiting.take();
    this.newTargets = parts.map((range) => {
      const loaded = this.rangeOf(range).load(properties);
      const merged = this.abilities.findsMergedCells
        ? loaded.getMergedAreasOrNullObject().load('address')
        : undefined;
      return { range, loaded, merged };
    });
    this.targets.push(...this.newTargets);
    return parts.reduce((sum, range) => sum + cellCountOf(range) * this.bytesPerCell, 0);
  }

  private get arrayProperties(): string {
    return this.abilities.findsArrays ? ',hasSpill,savedAsArray' : '';
  }

  /** Where rows of these sheets are hidden. */
  hiddenOn(sheets: readonly string[]): CellRange[] {
    return this.targets
      .filter(({ range, loaded }) => sheets.includes(range.sheet) && loaded.rowHidden !== false)
      .map(({ range }) => range);
  }

  /** Somebody has put something else there since the workbook was read. */
  refuseChanged(): void {
    if (this.basis === undefined) return;
    const changed = this.newTargets.flatMap(({ range, loaded }) => {
      const sheet = findSheet(this.basis!, range.sheet);
      if (sheet === undefined) return [];
      const isFilled = this.filledIn({ range, loaded });
      return contentsOf(range, loaded).filter(({ cell, content }) => {
        const { value = null, formula } = sheet.cell(cell.row, cell.column) ?? {};
        return !isFilled(cell) && !holds(content, { value, formula });
      });
    });
    if (changed.length > 0) {
      const ranges = rectanglesOf(changed.map(({ cell }) => cell));
      throw changedMeanwhile(listRanges(ranges), ranges);
    }
  }

  /** @throws WorkbookError would-overwrite */
  refuseOverwriting(): void {
    this.newTargets.forEach((target) => this.refuseOverwritingIn(target));
  }

  /** @throws WorkbookError write-failed where a stored value is to be renewed and there is no formula */
  refuseWithoutFormula(): void {
    for (const { range, loaded } of this.formulaCells) {
      const isFilled = this.filledIn({ range, loaded });
      loaded.formulas.forEach((row, down) =>
        row.forEach((formula: unknown, across) => {
          const cell = { sheet: range.sheet, row: range.top + down, column: range.left + across };
          if (!(typeof formula === 'string' && formula.startsWith('=')) && !isFilled(cell)) {
            const why = `${formatCellAddress(cell)} holds no formula whose value could be renewed`;
            throw refusal('write-failed', why);
          }
        }),
      );
    }
  }

  /** From what the cells hold to what they are to hold. */
  changes(): CellChange[] {
    const formatOfSource = new CellMap<string>();
    for (const { range, loaded } of this.formatSources) {
      const { numberFormat } = loaded;
      for (const cell of cellsOf(range)) {
        const format: unknown = numberFormat[cell.row - range.top][cell.column - range.left];
        formatOfSource.set(cell, String(format));
      }
    }
    const wrapsBefore = new CellMap<boolean>();
    for (const { cell, format } of this.wrapped) {
      wrapsBefore.set(cell, format.wrapText);
    }
    const changeOf = (cell: CellAddress, edit: CellEdit, before: CellContent, format: string): CellChange => {
      const after = contentAfter(edit);
      const source = edit.numberFormatOf;
      const wanted = (source && formatOfSource.get(source)) ?? format;
      return {
        cell,
        before,
        after,
        formatBefore: format,
        // A number that is written into a cell for texts would become a text.
        formatAfter: wanted === textFormat && typeof after.value !== 'string' ? 'General' : wanted,
        wrapsBefore: edit.wrapsText ? (wrapsBefore.get(cell) ?? false) : undefined,
        wrapsAfter: edit.wrapsText ? true : undefined,
      };
    };
    const cells: CellChange[] = [];
    for (const { range, loaded } of this.targets) {
      const ofSheet = this.edits.sheets.get(range.sheet)!.cells;
      const { numberFormat } = loaded;
      for (const { cell, content } of contentsOf(range, loaded)) {
        const format: unknown = numberFormat[cell.row - range.top][cell.column - range.left];
        cells.push(changeOf(cell, ofSheet.get(cellKey(cell.row, cell.column))!, content, String(format)));
      }
    }
    for (const name of this.edits.addedSheets) {
      for (const edit of this.edits.sheets.get(name)!.cells.values()) {
        if (edit.content.kind === 'storedValue') {
          throw refusal(
            'write-failed',
            `${formatCellAddress(edit.cell)} holds no formula whose value could be renewed`,
          );
        }
        cells.push(changeOf({ ...edit.cell, sheet: name }, edit, nothing, 'General'));
      }
    }
    return cells;
  }

  private refuseOverwritingIn(target: Target): void {
    const { range, loaded, merged } = target;
    const covered =
      merged === undefined || merged.isNullObject ? [] : rangesOfAddress(range.sheet, merged.address);
    const isFilled = this.filledIn(target);
    const tables = (this.basis?.tables ?? []).filter((table) => rangesOverlap(table.range, range));
    const pivots = this.basis === undefined ? [] : (findSheet(this.basis, range.sheet)?.pivotRanges ?? []);
    for (const { cell, content } of contentsOf(range, loaded)) {
      const refuse = (what: string): never => {
        throw refusal('would-overwrite', `${formatCellAddress(cell)} ${what}`);
      };
      if (content.formula !== undefined) refuse('holds a formula');
      if (isFilled(cell)) refuse('is filled by an array formula');
      const table = tables.find(({ range: ofTable }) => containsCell(ofTable, cell));
      if (table !== undefined && isHeadingOrTotal(table, cell)) {
        refuse(`is a heading or a total of the table ${table.name}`);
      }
      if (pivots.some((pivot) => containsCell(pivot, cell))) refuse('belongs to a PivotTable');
      const cover = covered.find((area) => containsCell(area, cell));
      if (cover !== undefined && (cover.top !== cell.row || cover.left !== cell.column)) {
        refuse('is covered by a merged cell');
      }
      const edit = this.edits.sheets.get(cell.sheet)!.cells.get(cellKey(cell.row, cell.column))!;
      const isEmptied = edit.content.kind === 'formula' && edit.content.replacesValue;
      if (edit.content.kind === 'formula' && !isEmptied && content.value !== null) {
        refuse('already holds a value');
      }
    }
  }

  /**
   * Which cells of a range an array formula fills: cell by cell as the workbook was read; where no array was known,
   * Excel says it of the whole range.
   */
  private filledIn({ range, loaded }: LoadedTarget): (cell: CellAddress) => boolean {
    const known = this.arraysOf(range.sheet).filter((array) => rangesOverlap(array, range));
    if (known.length > 0) return (cell) => known.some((array) => containsCell(array, cell));
    const isFilled =
      this.abilities.findsArrays && (loaded.hasSpill !== false || loaded.savedAsArray !== false);
    return () => isFilled;
  }

  /** What array formulas filled when the workbook was read. */
  private arraysOf(sheetName: string): readonly CellRange[] {
    let arrays = this.arrays.get(sheetName);
    if (arrays === undefined) {
      const sheet = this.basis?.sheets.find(({ name }) => name === sheetName);
      arrays = sheet === undefined ? [] : arrayRangesOf(sheet);
      this.arrays.set(sheetName, arrays);
    }
    return arrays;
  }

  private requestRanges(cells: readonly CellAddress[], properties: string): LoadedTarget[] {
    return rectanglesOf(cells).map((range) => ({ range, loaded: this.rangeOf(range).load(properties) }));
  }

  /** On a sheet that may not be there. */
  private rangeOf({ sheet, top, left, bottom, right }: CellRange): Excel.Range {
    return this.context.workbook.worksheets
      .getItemOrNullObject(sheet)
      .getRangeByIndexes(top, left, bottom - top + 1, right - left + 1);
  }
}

const nothing: CellContent = { value: null, formula: undefined };

function contentAfter({ content }: CellEdit): CellContent {
  return content.kind === 'formula'
    ? { value: content.value ?? null, formula: content.formula }
    : { value: content.value ?? null, formula: undefined };
}

function isInSheet(row: number, column: number): boolean {
  return row >= 0 && row < maximumRowCount && column >= 0 && column < maximumColumnCount;
}

function isHeadingOrTotal(
  { range, headerRowCount, totalsRowCount }: TableSnapshot,
  { row }: CellAddress,
): boolean {
  return row < range.top + headerRowCount || row > range.bottom - totalsRowCount;
}

/** Of a plan that cannot be carried out in the workbook. */
export function refusal(code: 'would-overwrite' | 'write-failed', why: string): WorkbookError {
  return new WorkbookError(code, nothingWritten('the workbook', why));
}
