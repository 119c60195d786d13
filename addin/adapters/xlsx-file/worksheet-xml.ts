/**
 * A worksheet's part, read in one pass (ECMA-376 Part 1, §18.3): cells with values and formulas, hidden rows and
 * columns, merged cells, protection, filters.
 *
 * Places are checked here: rows and cells stand in ascending order, as the standard demands and as the package
 * patch relies on when it puts new cells between them.
 */
import { cellKey, cellText, maximumColumnCount, maximumRowCount } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import { CellError, type CellValue } from '../../domain/sheet/cell-value';
import { parseCell, parseRange } from './cell-reference';
import { serialOfIsoDate } from './iso-dates';
import { damagedFile, excerpt } from './file-faults';
import { SharedFormula } from './shared-formula';
import { StoredCell, type ColumnSpan, type SheetContent } from './sheet-cells';
import { plainFormat, type CellFormat } from './styles-xml';
import { attributeOf, isOn, mainNamespaces, readXml, type XmlSource, type XmlTag } from './xml-events';
import { unescapeCellText } from './xml-escapes';

/** What a sheet's cells refer to by number. */
export interface WorksheetContext {
  readonly sheetName: string;
  readonly sharedStrings: readonly string[];
  readonly formats: readonly CellFormat[];
  readonly usesDates1904: boolean;
}

/** @throws WorkbookError damaged, naming the cell, where the part breaks its own rules */
export function readWorksheet(source: XmlSource, context: WorksheetContext): SheetContent {
  const reader = new WorksheetReader(source, context);
  readXml(source, reader);
  return reader.content();
}

/** Formulas in the making: `<f>` with its attributes. */
interface FormulaTag {
  readonly kind: string | undefined;
  readonly group: string | undefined;
  readonly range: string | undefined;
  readonly tag: XmlTag;
}

class WorksheetReader {
  private readonly cells = new Map<number, StoredCell>();
  private readonly sharedFormulas = new Map<string, SharedFormula>();
  private readonly hiddenRows = new Set<number>();
  private readonly listedRows = new Set<number>();
  private readonly hiddenColumns: ColumnSpan[] = [];
  private readonly mergedRanges: CellRange[] = [];
  private hidesUnlistedRows = false;
  private isProtected = false;
  private hasActiveFilter = false;
  private rowCount = 0;
  private columnCount = 0;

  /** Names of the open elements, `''` for ones from other namespaces. */
  private readonly path: string[] = [];
  private row = -1;
  private column = -1;
  // The cell at hand.
  private type: string | undefined;
  private style: string | undefined;
  private formulaTag: FormulaTag | undefined;
  private formulaText = '';
  private valueText: string | undefined;
  private inlineText: string | undefined;
  private piece = '';

  constructor(
    private readonly source: XmlSource,
    private readonly context: WorksheetContext,
  ) {}

  open(tag: XmlTag): void {
    const local = mainNamespaces.has(tag.uri) ? tag.local : '';
    const path = this.path;
    path.push(local);
    const depth = path.length;
    if (depth >= 3 && path[1] === 'sheetData') {
      if (depth === 4 && local === 'c') this.openCell(tag);
      else if (depth === 3 && local === 'row') this.openRow(tag);
      else if (depth >= 5) {
        this.piece = '';
        if (depth === 5 && local === 'f') {
          this.formulaTag = {
            kind: attributeOf(tag, 't'),
            group: attributeOf(tag, 'si'),
            range: attributeOf(tag, 'ref'),
            tag,
          };
        }
      }
      return;
    }
    if (depth === 1 && local !== 'worksheet') {
      throw damagedFile(
        this.source.fileName,
        `the part of its sheet ${excerpt(this.context.sheetName)} is no sheet`,
      );
    }
    if (depth > 1) this.openOther(tag, local, path[depth - 2]);
  }

  text(text: string): void {
    this.piece += text;
  }

  close(): void {
    const path = this.path;
    const depth = path.length;
    const local = path.pop();
    if (depth < 4 || path[1] !== 'sheetData') return;
    if (depth === 4) {
      if (local === 'c') this.closeCell();
    } else if (depth === 5) {
      if (local === 'v') this.valueText = this.piece;
      else if (local === 'f') this.formulaText = this.piece;
    } else if (local === 't' && path[4] === 'is' && !path.includes('rPh')) {
      this.inlineText = (this.inlineText ?? '') + this.piece;
    }
  }

  content(): SheetContent {
    return {
      cells: this.cells,
      rowCount: this.rowCount,
      columnCount: this.columnCount,
      hiddenRows: this.hiddenRows,
      listedRows: this.hidesUnlistedRows ? this.listedRows : undefined,
      hiddenColumns: this.hiddenColumns,
      mergedRanges: this.mergedRanges,
      isProtected: this.isProtected,
      hasActiveFilter: this.hasActiveFilter,
    };
  }

  private openOther(tag: XmlTag, local: string, parent: string): void {
    switch (local) {
      case 'col': {
        const isHidden = isOn(attributeOf(tag, 'hidden')) || Number(attributeOf(tag, 'width') ?? 1) === 0;
        if (isHidden && parent === 'cols') {
          this.hiddenColumns.push([Number(attributeOf(tag, 'min')) - 1, Number(attributeOf(tag, 'max')) - 1]);
        }
        return;
      }
      case 'sheetFormatPr':
        this.hidesUnlistedRows = isOn(attributeOf(tag, 'zeroHeight'));
        return;
      case 'sheetPr':
        if (isOn(attributeOf(tag, 'filterMode'))) this.hasActiveFilter = true;
        return;
      case 'filterColumn':
        if (parent === 'autoFilter') this.hasActiveFilter = true;
        return;
      case 'sheetProtection':
        this.isProtected = isOn(attributeOf(tag, 'sheet'));
        return;
      case 'mergeCell': {
        const text = attributeOf(tag, 'ref') ?? '';
        const range = parseRange(this.context.sheetName, text);
        if (range === undefined) throw this.damaged(`a merged cell has no place (${excerpt(text)})`);
        this.mergedRanges.push(range);
        return;
      }
    }
  }

  private openRow(tag: XmlTag): void {
    const text = attributeOf(tag, 'r');
    const row = text === undefined ? this.row + 1 : /^[0-9]+$/.test(text) ? Number(text) - 1 : -1;
    if (row < 0 || row >= maximumRowCount) throw this.damaged(`it has a row numbered ${excerpt(text ?? '')}`);
    if (row <= this.row) throw this.damaged(`its row ${row + 1} stands twice or behind a later one`);
    this.row = row;
    this.column = -1;
    this.listedRows.add(row);
    const isFlat = Number(attributeOf(tag, 'ht') ?? 1) === 0;
    if (isOn(attributeOf(tag, 'hidden')) || isFlat) this.hiddenRows.add(row);
  }

  private openCell(tag: XmlTag): void {
    const text = attributeOf(tag, 'r');
    if (text === undefined) {
      if (++this.column >= maximumColumnCount)
        throw this.damaged(`its row ${this.row + 1} has too many cells`);
    } else {
      const place = parseCell(text);
      if (place === undefined) throw this.damaged(`it has a cell called ${excerpt(text)}`);
      if (place.row !== this.row || place.column <= this.column) {
        throw this.damaged(`its cell ${excerpt(text)} stands out of order`);
      }
      this.column = place.column;
    }
    this.type = attributeOf(tag, 't');
    this.style = attributeOf(tag, 's');
    this.formulaTag = undefined;
    this.formulaText = '';
    this.valueText = undefined;
    this.inlineText = undefined;
  }

  private closeCell(): void {
    const formulaTag = this.formulaTag;
    const value = this.storedValue();
    if (formulaTag === undefined) {
      if (value === undefined || value === null) return;
      this.keep(new StoredCell(value, this.format()));
      return;
    }
    const { kind, group, range } = formulaTag;
    // Spaces around a formula are no part of it; inside they can be an operator.
    const formula = this.formulaText.trim().replace(/^=/, '');
    if (kind === 'shared' && group !== undefined) {
      let shared = this.sharedFormulas.get(group);
      if (formula !== '') {
        if (shared === undefined || range !== undefined) {
          shared = new SharedFormula(formula, this.row, this.column);
          this.sharedFormulas.set(group, shared);
        }
        this.keep(new StoredCell(value, this.format(), formula));
        return;
      }
      if (shared === undefined) throw this.damaged(`the formula of its cell ${this.place()} is missing`);
      this.keep(new StoredCell(value, this.format(), undefined, undefined, shared, this.row, this.column));
      return;
    }
    if (kind === 'dataTable') {
      this.keep(new StoredCell(value, this.format(), dataTableFormula(formulaTag.tag), this.rangeOf(range)));
      return;
    }
    if (formula === '') {
      // An empty element is no formula; some writers leave one behind.
      if (value !== undefined && value !== null) this.keep(new StoredCell(value, this.format()));
      return;
    }
    const arrayRange = kind === 'array' ? this.rangeOf(range ?? this.place()) : undefined;
    this.keep(new StoredCell(value, this.format(), formula, arrayRange));
  }

  private keep(cell: StoredCell): void {
    this.cells.set(cellKey(this.row, this.column), cell);
    this.rowCount = this.row + 1;
    if (this.column >= this.columnCount) this.columnCount = this.column + 1;
  }

  /** The value of the cell at hand; undefined where none is stored. */
  private storedValue(): CellValue | undefined {
    const text = this.valueText;
    switch (this.type) {
      case 's': {
        if (text === undefined || text.trim() === '') return undefined;
        const string = /^\s*[0-9]+\s*$/.test(text) ? this.context.sharedStrings[Number(text)] : undefined;
        if (string === undefined) {
          throw this.damaged(
            `its cell ${this.place()} shows a text that is not in the file (${excerpt(text)})`,
          );
        }
        return string;
      }
      case 'inlineStr':
        return this.inlineText === undefined ? undefined : unescapeCellText(this.inlineText);
      case 'str':
        return text === undefined ? undefined : unescapeCellText(text);
      case 'b':
        if (text === undefined || text.trim() === '') return undefined;
        return isOn(text.trim().toLowerCase());
      case 'e':
        return text === undefined || text.trim() === '' ? undefined : CellError.of(text.trim());
      case 'd': {
        if (text === undefined || text.trim() === '') return undefined;
        const serial = serialOfIsoDate(text.trim(), this.context.usesDates1904);
        if (serial === undefined)
          throw this.damaged(`its cell ${this.place()} holds no date (${excerpt(text)})`);
        return serial;
      }
      case undefined:
      case 'n': {
        if (text === undefined || text.trim() === '') return undefined;
        const number = Number(text);
        if (!Number.isFinite(number) || /[xob]/i.test(text)) {
          throw this.damaged(`its cell ${this.place()} holds no number (${excerpt(text)})`);
        }
        return number;
      }
      default:
        throw this.damaged(`its cell ${this.place()} is of an unknown type (${excerpt(this.type)})`);
    }
  }

  private format(): CellFormat {
    const format =
      this.style === undefined ? this.context.formats[0] : this.context.formats[Number(this.style)];
    if (this.type === 'd') return format?.isDate ? format : { code: format?.code ?? 'General', isDate: true };
    return format ?? plainFormat;
  }

  private rangeOf(text: string | undefined): CellRange {
    const range = parseRange(this.context.sheetName, text ?? '');
    if (range === undefined || range.top !== this.row || range.left !== this.column) {
      throw this.damaged(
        `the array formula in its cell ${this.place()} fills no range (${excerpt(text ?? '')})`,
      );
    }
    return range;
  }

  private place(): string {
    return cellText(this.row, this.column);
  }

  private damaged(what: string): Error {
    return damagedFile(this.source.fileName, `in its sheet ${excerpt(this.context.sheetName)}, ${what}`);
  }
}

/** A what-if table's cells are worked out by the spreadsheet program; the formula bar shows them like this. */
function dataTableFormula(tag: XmlTag): string {
  const first = attributeOf(tag, 'r1') ?? '';
  const second = attributeOf(tag, 'r2') ?? '';
  if (isOn(attributeOf(tag, 'dt2D'))) return `TABLE(${first},${second})`;
  return isOn(attributeOf(tag, 'dtr')) ? `TABLE(${first},)` : `TABLE(,${first})`;
}
