/**
 * A worksheet's text with a plan's edits in it. Cells and rows that are not touched stay to the character; what
 * must not be written into is refused here: formulas, arrays and spills, covered parts of merged cells, table
 * headings and totals, PivotTables.
 */
import {
  cellKey,
  cellText,
  formatCellAddress,
  maximumColumnCount,
  maximumRowCount,
  type CellAddress,
} from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import { CellError, type CellValue } from '../../domain/sheet/cell-value';
import type { TableSnapshot } from '../../domain/sheet/sheet-snapshot';
import { WorkbookError } from '../../ports/workbook';
import { nothingWritten, type CellEdit, type SheetEdits } from '../../ports/planned-edits';
import { asOpenTag, withAttribute, withAttributes } from './start-tag';
import { TextSplices } from './text-splices';
import type { CellPlaceInText, WorksheetOutline } from './worksheet-outline';
import { spliceColumnWidths } from './column-widths';
import { escapeCellText, escapeXmlText } from './xml-escapes';

/** What else the patch must know of a sheet and its workbook. */
export interface PatchContext {
  readonly fileName: string;
  readonly tables: readonly TableSnapshot[];
  readonly pivotRanges: readonly CellRange[];
  /** The number of the format for a cell that has had the format `base`. */
  formatFor(edit: CellEdit, base: number): number;
}

/** @throws WorkbookError would-overwrite or write-failed; nothing has been changed then */
export function patchWorksheet(outline: WorksheetOutline, edits: SheetEdits, context: PatchContext): string {
  const patch = new WorksheetPatch(outline, context);
  const cells = [...edits.cells.values()].sort(
    (a, b) => a.cell.row - b.cell.row || a.cell.column - b.cell.column,
  );
  cells.forEach((edit) => patch.refuse(edit));
  patch.spliceCells(cells);
  spliceColumnWidths(outline, edits.widths, patch.splices);
  return patch.splices.apply();
}

class WorksheetPatch {
  readonly splices: TextSplices;

  constructor(
    private readonly outline: WorksheetOutline,
    private readonly context: PatchContext,
  ) {
    this.splices = new TextSplices(outline.text);
  }

  /** @throws WorkbookError where the edit would destroy something, or has nothing to renew */
  refuse({ cell, content }: CellEdit): void {
    const place = this.outline.cells.get(cellKey(cell.row, cell.column));
    const isInSheet =
      cell.row >= 0 && cell.row < maximumRowCount && cell.column >= 0 && cell.column < maximumColumnCount;
    if (!isInSheet) throw this.fault('write-failed', cell, 'lies outside the sheet');
    const covers = ({ top, left, bottom, right }: CellRange): boolean =>
      cell.row >= top && cell.row <= bottom && cell.column >= left && cell.column <= right;
    const isInArray = this.outline.arrayRanges.some(covers);
    if (content.kind === 'storedValue') {
      if (place?.formula === undefined && !isInArray) {
        throw this.fault('write-failed', cell, 'holds no formula whose value could be renewed');
      }
      return;
    }
    if (place?.formula !== undefined) throw this.fault('would-overwrite', cell, 'holds a formula');
    if (isInArray) throw this.fault('would-overwrite', cell, 'is filled by an array formula');
    const merged = this.outline.mergedRanges.find(covers);
    if (merged !== undefined && (merged.top !== cell.row || merged.left !== cell.column)) {
      throw this.fault('would-overwrite', cell, 'is covered by a merged cell');
    }
    for (const { range, name, headerRowCount, totalsRowCount } of this.context.tables) {
      if (!covers(range)) continue;
      if (cell.row < range.top + headerRowCount || cell.row > range.bottom - totalsRowCount) {
        throw this.fault('would-overwrite', cell, `is a heading or a total of the table ${name}`);
      }
    }
    if (this.context.pivotRanges.some(covers)) {
      throw this.fault('would-overwrite', cell, 'belongs to a PivotTable');
    }
    if (content.kind === 'formula' && place?.isFilled === true && !content.replacesValue) {
      throw this.fault('would-overwrite', cell, 'already holds a value');
    }
  }

  /** Edits in the order of their rows and columns. */
  spliceCells(edits: readonly CellEdit[]): void {
    const { outline, splices } = this;
    const { prefix, sheetData } = outline;
    const written: CellEdit[] = [];
    const rowsOfEmptySheet: string[] = [];
    for (let first = 0; first < edits.length;) {
      const row = edits[first].cell.row;
      let last = first + 1;
      while (last < edits.length && edits[last].cell.row === row) last++;
      const ofRow = edits.slice(first, last);
      first = last;
      if (outline.rows.has(row)) {
        written.push(...this.spliceRow(row, ofRow));
        continue;
      }
      const cells = ofRow.map((edit) => ({
        edit,
        xml: this.newCell(edit, this.columnStyle(edit.cell.column)),
      }));
      const filled = cells.filter(({ xml }) => xml !== '');
      if (filled.length === 0) continue;
      written.push(...filled.map(({ edit }) => edit));
      const xml = `<${prefix}row r="${row + 1}">${filled.map((cell) => cell.xml).join('')}</${prefix}row>`;
      if (sheetData.isSelfClosing) rowsOfEmptySheet.push(xml);
      else splices.insert(outline.missingRows.get(row) ?? sheetData.contentEnd, xml);
    }
    if (rowsOfEmptySheet.length > 0) {
      const tag = asOpenTag(outline.text.slice(sheetData.start, sheetData.end));
      splices.replace(
        sheetData.start,
        sheetData.end,
        `${tag}${rowsOfEmptySheet.join('')}</${prefix}sheetData>`,
      );
    }
    this.growDimension(written);
  }

  /** Edits of one row that exists. Returns those that left a cell behind. */
  private spliceRow(row: number, edits: readonly CellEdit[]): CellEdit[] {
    const { outline, splices } = this;
    const place = outline.rows.get(row)!;
    const written: CellEdit[] = [];
    let cellsOfEmptyRow = '';
    for (const edit of edits) {
      const key = cellKey(row, edit.cell.column);
      const cellPlace = outline.cells.get(key);
      if (cellPlace !== undefined) {
        splices.replace(cellPlace.start, cellPlace.end, this.changedCell(cellPlace, edit));
        written.push(edit);
        continue;
      }
      const xml = this.newCell(edit, place.style ?? this.columnStyle(edit.cell.column));
      if (xml === '') continue;
      written.push(edit);
      if (place.isSelfClosing) cellsOfEmptyRow += xml;
      else splices.insert(outline.missingCells.get(key) ?? place.contentEnd, xml);
    }
    const originalTag = outline.text.slice(place.start, place.contentStart);
    let tag = withGrownSpans(originalTag, place.spans, written);
    if (place.hasAutomaticHeight && edits.some((edit) => edit.wrapsText)) {
      // The height stored is from before the text had several lines; without it the row is fitted on opening.
      tag = withAttribute(tag, 'ht', undefined);
    }
    if (cellsOfEmptyRow !== '') tag = `${asOpenTag(tag)}${cellsOfEmptyRow}</${outline.prefix}row>`;
    if (tag !== originalTag) splices.replace(place.start, place.contentStart, tag);
    return written;
  }

  /** A cell that is not there yet, or an empty text where the edit leaves nothing in it. */
  private newCell(edit: CellEdit, base: number): string {
    const { prefix } = this.outline;
    const { type, formula, value } = cellParts(edit, prefix);
    const style = this.context.formatFor(edit, base);
    // A blank that only keeps its surroundings' format needs no cell.
    if (formula === '' && value === '' && style === base) return '';
    const tag = withAttributes(`<${prefix}c r="${cellText(edit.cell.row, edit.cell.column)}">`, {
      s: style === 0 ? undefined : String(style),
      t: type,
    });
    return `${tag}${formula}${value}</${prefix}c>`;
  }

  private changedCell(place: CellPlaceInText, edit: CellEdit): string {
    const { text, prefix } = this.outline;
    const { type, formula, value } = cellParts(edit, prefix);
    const isRenewal = edit.content.kind === 'storedValue';
    const style = this.context.formatFor(edit, place.style);
    let tag = text.slice(place.start, place.contentStart);
    if (style !== place.style) tag = withAttribute(tag, 's', String(style));
    // vm points to what the old value was in full; cm says how the formula spills and goes only with it.
    tag = withAttributes(tag, { t: type, vm: undefined });
    if (!isRenewal) tag = withAttribute(tag, 'cm', undefined);

    // What stands in the cell besides formula and value (extensions) is kept behind them, where the schema has it.
    const kept: string[] = [];
    let done = place.contentStart;
    for (const child of [...(place.formula === undefined ? [] : [place.formula]), ...place.values]) {
      kept.push(text.slice(done, child.start));
      done = child.end;
    }
    kept.push(text.slice(done, place.contentEnd));
    const ownFormula =
      place.formula === undefined ? formula : text.slice(place.formula.start, place.formula.end);
    const content = `${ownFormula}${value}${kept.join('').trim()}`;
    if (place.isSelfClosing) return content === '' ? tag : `${asOpenTag(tag)}${content}</${prefix}c>`;
    return `${tag}${content}${text.slice(place.contentEnd, place.end)}`;
  }

  private columnStyle(column: number): number {
    return this.outline.columns.find(({ first, last }) => column >= first && column <= last)?.style ?? 0;
  }

  private growDimension(written: readonly CellEdit[]): void {
    const { dimension, text } = this.outline;
    if (dimension?.range === undefined || written.length === 0) return;
    const { top, left, bottom, right } = dimension.range;
    const grown = { top, left, bottom, right };
    for (const { cell } of written) {
      grown.top = Math.min(grown.top, cell.row);
      grown.left = Math.min(grown.left, cell.column);
      grown.bottom = Math.max(grown.bottom, cell.row);
      grown.right = Math.max(grown.right, cell.column);
    }
    const isSame =
      grown.top === top && grown.left === left && grown.bottom === bottom && grown.right === right;
    if (isSame) return;
    const first = cellText(grown.top, grown.left);
    const last = cellText(grown.bottom, grown.right);
    this.splices.replace(
      dimension.start,
      dimension.contentStart,
      withAttribute(
        text.slice(dimension.start, dimension.contentStart),
        'ref',
        first === last ? first : `${first}:${last}`,
      ),
    );
  }

  private fault(code: 'would-overwrite' | 'write-failed', cell: CellAddress, why: string): WorkbookError {
    return new WorkbookError(
      code,
      nothingWritten(this.context.fileName, `${formatCellAddress(cell)} ${why}`),
    );
  }
}

/** spans is a hint for readers: the first and last column of the row. A wrong one is worse than a wide one. */
function withGrownSpans(tag: string, spans: string | undefined, written: readonly CellEdit[]): string {
  const numbers = (spans ?? '').split(/[\s:]+/).map(Number);
  if (spans === undefined || numbers.some((number) => !(number >= 1)) || written.length === 0) return tag;
  const columns = written.map(({ cell }) => cell.column + 1);
  const first = Math.min(...numbers);
  const last = Math.max(...numbers);
  const grownFirst = columns.reduce((least, column) => Math.min(least, column), first);
  const grownLast = columns.reduce((most, column) => Math.max(most, column), last);
  return grownFirst === first && grownLast === last
    ? tag
    : withAttribute(tag, 'spans', `${grownFirst}:${grownLast}`);
}

/** The inside of a cell for an edit: its type attribute, `<f>` of a new formula, and its value element. */
function cellParts(
  { content }: CellEdit,
  prefix: string,
): { type: string | undefined; formula: string; value: string } {
  switch (content.kind) {
    case 'value':
      return typeof content.value === 'string'
        ? { type: 'inlineStr', formula: '', value: inlineText(content.value, prefix) }
        : { ...storedParts(content.value, prefix), formula: '' };
    case 'storedValue':
      return { ...storedParts(content.value, prefix), formula: '' };
    case 'formula':
      return {
        ...storedParts(content.value, prefix),
        formula: `<${prefix}f>${escapeXmlText(content.formula)}</${prefix}f>`,
      };
  }
}

function storedParts(
  value: CellValue | undefined,
  prefix: string,
): { type: string | undefined; value: string } {
  const element = (text: string): string =>
    `<${prefix}v${spaceAttribute(text)}>${escapeXmlText(text)}</${prefix}v>`;
  if (value === undefined || value === null) return { type: undefined, value: '' };
  // Shortest text that reads back as the same number; a negative zero is a zero.
  if (typeof value === 'number') return { type: undefined, value: element(String(value === 0 ? 0 : value)) };
  if (typeof value === 'boolean') return { type: 'b', value: element(value ? '1' : '0') };
  if (value instanceof CellError) return { type: 'e', value: element(value.code) };
  return { type: 'str', value: element(escapeCellText(value)) };
}

/** A text in the cell itself: the table of shared strings stays as it is. */
function inlineText(text: string, prefix: string): string {
  const escaped = escapeCellText(text);
  return `<${prefix}is><${prefix}t${spaceAttribute(escaped)}>${escapeXmlText(escaped)}</${prefix}t></${prefix}is>`;
}

/** Blanks at an end, and line feeds, are dropped by some readers unless they are told. */
function spaceAttribute(text: string): string {
  return /^\s|\s$|\n/.test(text) ? ' xml:space="preserve"' : '';
}
