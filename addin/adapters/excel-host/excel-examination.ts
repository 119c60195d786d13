/// <reference types="office-js" />
/**
 * One round trip before a write: what the cells, names and widths hold that are to be changed, whether Excel will let
 * us, and whether the workbook is still what the plan was made from. Nothing is touched; what comes out is the journal
 * of the write.
 */
import { cellKey, formatCellAddress, type CellAddress } from '../../domain/sheet/cell-address';
import {
  cellCountOf,
  cellsOf,
  containsCell,
  rangesOverlap,
  type CellRange,
} from '../../domain/sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import { recordNamespace } from '../../domain/results-to-sheet/record-text';
import { nothingWritten, type CellEdit, type PlannedEdits } from '../../ports/planned-edits';
import { WorkbookError } from '../../ports/workbook';
import { CellMap } from './cell-map';
import type { OpenBatch } from './excel-batch';
import { firstGuess, messageTarget, RangeQueue } from './excel-chunking';
import { isAnswerTooLarge } from './excel-errors';
import { changedMeanwhile, Fingerprint } from './excel-fingerprint';
import { contentsOf } from './excel-contents';
import { textFormat } from './excel-entry';
import {
  holds,
  type CellChange,
  type CellContent,
  type Journal,
  type NameChange,
  type WidthChange,
} from './excel-journal';
import { listRanges, rangesOfAddress } from './excel-ranges';
import { rectanglesOf } from './excel-rectangles';
import { xmlOfRecord } from './excel-record';
import { arrayRangesOf } from './excel-sheet';
import type { ExcelAbilities } from './excel-requirements';
import { pointsOfCharacters } from './excel-widths';

/** How the workbook is called in sentences. */
const theWorkbook = 'the workbook';

export interface Examined {
  readonly journal: Journal;
  /** The part that holds the record; undefined where there is none. */
  readonly recordPartId: string | undefined;
}

/** How much more room cells are given after an answer that was too large, and how often. */
const moreRoom = 8;
const largestGuess = 100_000;

/** @throws WorkbookError where the plan cannot be carried out; nothing has been touched then */
export async function examine(
  batch: OpenBatch,
  edits: PlannedEdits,
  abilities: ExcelAbilities,
  basis: WorkbookSnapshot | undefined,
): Promise<Examined> {
  for (let bytesPerCell = firstGuess; ; bytesPerCell *= moreRoom) {
    try {
      const examination = new Examination(batch.context, edits, abilities, basis, bytesPerCell);
      await batch.pause();
      const fingerprint = basis === undefined ? undefined : new Fingerprint(batch.context, basis);
      let isDone: boolean;
      do {
        const room = messageTarget - examination.requestTargets();
        fingerprint?.request(room);
        await batch.sync();
        await batch.pause();
        examination.refuseImpossible();
        await batch.pause();
        fingerprint?.compare();
        await batch.pause();
        isDone = examination.isDone && fingerprint?.isDone !== false;
      } while (!isDone);
      return { journal: examination.journal(), recordPartId: examination.recordPartId };
    } catch (error) {
      if (!isAnswerTooLarge(error) || bytesPerCell > largestGuess) throw error;
    }
  }
}

interface TargetSheet {
  readonly name: string;
  readonly worksheet: Excel.Worksheet;
  readonly tables: Excel.TableCollection;
}

interface LoadedTarget {
  readonly range: CellRange;
  readonly loaded: Excel.Range;
}

interface Target extends LoadedTarget {
  readonly merged: Excel.RangeAreas | undefined;
}

interface TargetName {
  readonly name: string;
  readonly scope: string | null;
  /** undefined on a sheet that is still to be added. */
  readonly item: Excel.NamedItem | undefined;
}

class Examination {
  private readonly application: Excel.Application;
  private readonly protection: Excel.WorkbookProtection;
  private readonly sheets: readonly TargetSheet[];
  private readonly addedSheets: readonly Excel.Worksheet[];
  /** Cells that get a value or a formula, on sheets that are there: those asked for so far. */
  private readonly targets: Target[] = [];
  /** Of these, the ones that the last round trip was about. */
  private newTargets: readonly Target[] = [];
  private readonly waiting: RangeQueue;
  /** Cells that must hold a formula, because their stored value is to be renewed. */
  private readonly formulaCells: readonly LoadedTarget[];
  private readonly formatSources: readonly LoadedTarget[];
  private readonly wrapped: readonly { readonly range: CellRange; readonly format: Excel.RangeFormat }[];
  private readonly widths: readonly {
    readonly sheet: string;
    readonly column: number;
    readonly format: Excel.RangeFormat;
  }[];
  private readonly names: readonly TargetName[];
  private readonly arrays = new Map<string, readonly CellRange[]>();
  private readonly recordXml: OfficeExtension.ClientResult<string> | undefined;
  private readonly recordPart: Excel.CustomXmlPart | undefined;

  /** Everything is asked for here, and read after the round trip. */
  constructor(
    private readonly context: Excel.RequestContext,
    private readonly edits: PlannedEdits,
    private readonly abilities: ExcelAbilities,
    private readonly basis: WorkbookSnapshot | undefined,
    private readonly bytesPerCell: number,
  ) {
    const { workbook } = context;
    this.application = workbook.application.load('calculationMode');
    this.protection = workbook.protection.load('protected');
    const isAdded = (name: string): boolean => edits.addedSheets.includes(name);
    const present = [...edits.sheets].filter(([name]) => !isAdded(name));
    this.sheets = present.map(([name]) => {
      const worksheet = workbook.worksheets.getItemOrNullObject(name).load('name');
      worksheet.protection.load('protected');
      worksheet.autoFilter.load('isDataFiltered');
      return {
        name,
        worksheet,
        tables: worksheet.tables.load('items/name,items/autoFilter/isDataFiltered'),
      };
    });
    this.addedSheets = edits.addedSheets.map((name) =>
      workbook.worksheets.getItemOrNullObject(name).load('name'),
    );
    const cells = present.flatMap(([sheet, { cells: ofSheet }]) =>
      [...ofSheet.values()].map((edit) => ({ ...edit, cell: { ...edit.cell, sheet } })),
    );
    const isStored = ({ content }: CellEdit): boolean => content.kind === 'storedValue';
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
        const range = {
          sheet: cell.sheet,
          top: cell.row,
          left: cell.column,
          bottom: cell.row,
          right: cell.column,
        };
        return { range, format: this.rangeOf(range).format.load('wrapText') };
      });
    this.widths = present.flatMap(([sheet, { widths }]) =>
      [...widths.keys()].map((column) => {
        const range = { sheet, top: 0, left: column, bottom: 0, right: column };
        return { sheet, column, format: this.rangeOf(range).format.load('columnWidth') };
      }),
    );
    const seen = new Set<string>();
    this.names = edits.names.flatMap(({ name, scope }): TargetName[] => {
      const key = `${name.toLowerCase()}\n${(scope ?? '').toLowerCase()}`;
      if (seen.has(key)) return [];
      seen.add(key);
      if (scope !== null && edits.addedSheets.some((added) => added.toLowerCase() === scope.toLowerCase())) {
        return [{ name, scope, item: undefined }];
      }
      const collection =
        scope === null ? workbook.names : workbook.worksheets.getItemOrNullObject(scope).names;
      return [{ name, scope, item: collection.getItemOrNullObject(name).load('name,formula,visible') }];
    });
    if (edits.record !== undefined) {
      this.recordPart = workbook.customXmlParts
        .getByNamespace(recordNamespace)
        .getOnlyItemOrNullObject()
        .load('id');
      this.recordXml = this.recordPart.getXml();
    }
  }

  get isDone(): boolean {
    return this.waiting.isEmpty;
  }

  /** Asks for the cells that are to be written, as many as one message has room for. @returns their bytes, about */
  requestTargets(): number {
    const properties = `values,formulas,valueTypes,numberFormat,rowHidden${this.arrayProperties}`;
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

  /** @throws WorkbookError for what Excel would not do, or what must not be done */
  refuseImpossible(): void {
    for (const { name, worksheet } of this.sheets) {
      if (worksheet.isNullObject) throw refusal('write-failed', `it has no sheet named ${name}`);
    }
    for (const added of this.addedSheets) {
      if (!added.isNullObject) {
        throw refusal('would-overwrite', `it already has a sheet named ${added.name}`);
      }
    }
    const isLocked = this.sheets.filter(({ worksheet }) => worksheet.protection.protected);
    if (isLocked.length > 0) {
      const sheets = isLocked.map(({ name }) => name);
      throw new WorkbookError(
        'protected-sheet',
        `The sheet ${sheets.join(', ')} is protected, so nothing was written. Lift the protection and write again.`,
        { sheets, canRetry: true },
      );
    }
    if (this.addedSheets.length > 0 && this.protection.protected) {
      throw new WorkbookError(
        'protected-structure',
        `The workbook's structure is protected, so the sheet ${this.edits.addedSheets[0]} cannot be added and nothing was written. Lift the protection and write again.`,
        { sheets: this.edits.addedSheets, canRetry: true },
      );
    }
    this.refuseFiltered();
    this.refuseChanged();
    this.newTargets.forEach((target) => this.refuseOverwriting(target));
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

  journal(): Journal {
    const formatOfSource = new CellMap<string>();
    for (const { range, loaded } of this.formatSources) {
      const { numberFormat } = loaded;
      for (const cell of cellsOf(range)) {
        const format: unknown = numberFormat[cell.row - range.top][cell.column - range.left];
        formatOfSource.set(cell, String(format));
      }
    }
    const wrapsBefore = new CellMap<boolean>();
    for (const { range, format } of this.wrapped) {
      wrapsBefore.set(firstCell(range), format.wrapText);
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
    return {
      cells,
      widths: this.widthChanges(),
      names: this.nameChanges(),
      record: this.edits.record === undefined ? undefined : this.recordChange(this.edits.record),
      addedSheets: this.edits.addedSheets,
      calculatesByHand: this.application.calculationMode === 'Manual',
    };
  }

  get recordPartId(): string | undefined {
    return this.recordPart?.isNullObject === false ? this.recordPart.id : undefined;
  }

  private widthChanges(): WidthChange[] {
    const changes = this.widths.map(({ sheet, column, format }): WidthChange => ({
      sheet,
      column,
      before: format.columnWidth,
      after: pointsOfCharacters(this.edits.sheets.get(sheet)!.widths.get(column)!),
    }));
    for (const sheet of this.edits.addedSheets) {
      for (const [column, width] of this.edits.sheets.get(sheet)!.widths) {
        changes.push({ sheet, column, before: pointsOfCharacters(8.43), after: pointsOfCharacters(width) });
      }
    }
    return changes;
  }

  private nameChanges(): NameChange[] {
    return this.names.flatMap(({ name, scope, item }): NameChange[] => {
      const isThis = (write: { name: string; scope: string | null }): boolean =>
        write.name.toLowerCase() === name.toLowerCase() &&
        (write.scope ?? '').toLowerCase() === (scope ?? '').toLowerCase();
      const last = this.edits.names.filter(isThis).pop()!;
      const isThere = item !== undefined && !item.isNullObject;
      const after = last.kind === 'name' ? last.formula : null;
      if (!isThere && after === null) return [];
      const formula: unknown = isThere ? item.formula : undefined;
      return [
        {
          name: isThere ? item.name : name,
          scope,
          before: isThere ? String(formula).replace(/^=/, '') : null,
          after,
          wasVisible: isThere ? item.visible : true,
        },
      ];
    });
  }

  private recordChange(json: string): { before: string | null; after: string } {
    const isThere = this.recordPart?.isNullObject === false;
    return { before: isThere ? this.recordXml!.value : null, after: xmlOfRecord(json) };
  }

  /** Values written under a filter land in other rows than they are meant for. */
  private refuseFiltered(): void {
    const sheets = this.sheets
      .filter(
        ({ worksheet, tables }) =>
          worksheet.autoFilter.isDataFiltered ||
          tables.items.some((table) => table.autoFilter.isDataFiltered),
      )
      .map(({ name }) => name);
    const hidden = this.targets.filter(
      ({ range, loaded }) => sheets.includes(range.sheet) && loaded.rowHidden !== false,
    );
    if (hidden.length > 0) {
      const filtered = sheets.filter((name) => hidden.some(({ range }) => range.sheet === name));
      throw new WorkbookError(
        'filtered',
        `A filter on the sheet ${filtered.join(', ')} hides rows in which results stand, so nothing was written. Clear the filter and write again.`,
        { sheets: filtered, ranges: hidden.map(({ range }) => range), canRetry: true },
      );
    }
  }

  /** Somebody has put something else there since the workbook was read. */
  private refuseChanged(): void {
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

  private refuseOverwriting(target: Target): void {
    const { range, loaded, merged } = target;
    const covered =
      merged === undefined || merged.isNullObject ? [] : rangesOfAddress(range.sheet, merged.address);
    const isFilled = this.filledIn(target);
    for (const { cell, content } of contentsOf(range, loaded)) {
      const refuse = (what: string): never => {
        throw refusal('would-overwrite', `${formatCellAddress(cell)} ${what}`);
      };
      if (content.formula !== undefined) refuse('holds a formula');
      if (isFilled(cell)) refuse('is filled by an array formula');
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

function firstCell({ sheet, top, left }: CellRange): CellAddress {
  return { sheet, row: top, column: left };
}

function refusal(code: 'would-overwrite' | 'write-failed', why: string): WorkbookError {
  return new WorkbookError(code, nothingWritten(theWorkbook, why));
}
