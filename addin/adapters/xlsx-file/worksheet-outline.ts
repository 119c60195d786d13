/**
 * Where things stand in a worksheet's text: the cells and rows that a plan touches, the places where missing ones
 * belong, and what must not be written into. One pass; the text itself is not changed here.
 */
import { cellKey, cellText } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import { parseCell, parseRange } from './cell-reference';
import { damagedFile, excerpt } from './file-faults';
import { attributeOf, mainNamespaces, readXml, type XmlSource, type XmlTag } from './xml-events';

/** An element in the text: its start tag is [start, contentStart), its end tag [contentEnd, end). */
export interface ElementPlace {
  readonly start: number;
  readonly contentStart: number;
  readonly contentEnd: number;
  readonly end: number;
  readonly isSelfClosing: boolean;
}

export interface RowPlace extends ElementPlace {
  readonly spans: string | undefined;
  /** Its cells' format where they have none of their own. */
  readonly style: number | undefined;
  readonly hasAutomaticHeight: boolean;
}

export interface CellPlaceInText extends ElementPlace {
  readonly style: number;
  readonly formula: ElementPlace | undefined;
  /** `<v>` and `<is>`. */
  readonly values: readonly ElementPlace[];
  /** A value or a formula is there, and not only a format. */
  readonly isFilled: boolean;
}

export interface ColumnPlace extends ElementPlace {
  /** Columns from 0, both ends included. */
  readonly first: number;
  readonly last: number;
  readonly style: number | undefined;
}

export interface WorksheetOutline {
  readonly text: string;
  /** Prefix of the sheet's elements with its colon, or an empty text. */
  readonly prefix: string;
  readonly sheetData: ElementPlace;
  /** Wanted rows that exist, and the place for each that does not. */
  readonly rows: ReadonlyMap<number, RowPlace>;
  readonly missingRows: ReadonlyMap<number, number>;
  /** Wanted cells that exist, and the place for each that does not though its row does; by cellKey. */
  readonly cells: ReadonlyMap<number, CellPlaceInText>;
  readonly missingCells: ReadonlyMap<number, number>;
  readonly columnList: ElementPlace | undefined;
  readonly columns: readonly ColumnPlace[];
  readonly dimension: (ElementPlace & { readonly range: CellRange | undefined }) | undefined;
  readonly arrayRanges: readonly CellRange[];
  readonly mergedRanges: readonly CellRange[];
}

/**
 * @param wanted columns by row
 * @throws WorkbookError damaged where the part is not well-formed or its rows and cells are out of order
 */
export function outlineWorksheet(
  source: XmlSource,
  sheetName: string,
  wanted: ReadonlyMap<number, ReadonlySet<number>>,
): WorksheetOutline {
  const outliner = new Outliner(source, sheetName, wanted);
  readXml(source, outliner);
  return outliner.outline();
}

type Growing<T> = { -readonly [Key in keyof T]: T[Key] };

class Outliner {
  private readonly rows = new Map<number, RowPlace>();
  private readonly missingRows = new Map<number, number>();
  private readonly cells = new Map<number, CellPlaceInText>();
  private readonly missingCells = new Map<number, number>();
  private readonly columns: ColumnPlace[] = [];
  private readonly arrayRanges: CellRange[] = [];
  private readonly mergedRanges: CellRange[] = [];
  private prefix = '';
  private sheetData: Growing<ElementPlace> | undefined;
  private columnList: Growing<ElementPlace> | undefined;
  private dimension: (ElementPlace & { range: CellRange | undefined }) | undefined;

  private readonly path: string[] = [];
  private readonly wantedRows: readonly number[];
  /** How many of the wanted rows, and of the wanted columns of the row at hand, have been placed. */
  private placedRows = 0;
  private placedColumns = 0;
  private wantedColumns: readonly number[] = [];
  private row = -1;
  private column = -1;
  private rowPlace: Growing<RowPlace> | undefined;
  private cellPlace: (Growing<CellPlaceInText> & { values: ElementPlace[] }) | undefined;
  private childPlace: Growing<ElementPlace> | undefined;

  constructor(
    private readonly source: XmlSource,
    private readonly sheetName: string,
    private readonly wanted: ReadonlyMap<number, ReadonlySet<number>>,
  ) {
    this.wantedRows = [...wanted.keys()].sort((a, b) => a - b);
  }

  open(tag: XmlTag, end: number): void {
    const local = mainNamespaces.has(tag.uri) ? tag.local : '';
    const path = this.path;
    path.push(local);
    const depth = path.length;
    if (depth === 1) {
      if (local !== 'worksheet') {
        throw damagedFile(
          this.source.fileName,
          `the part of its sheet ${excerpt(this.sheetName)} is no sheet`,
        );
      }
      this.prefix = tag.prefix === '' ? '' : `${tag.prefix}:`;
    } else if (depth === 2) {
      if (local === 'sheetData') this.sheetData = this.placeOf(tag, end);
      else if (local === 'cols') this.columnList = this.placeOf(tag, end);
      else if (local === 'dimension') {
        this.dimension = {
          ...this.placeOf(tag, end),
          range: parseRange(this.sheetName, attributeOf(tag, 'ref') ?? ''),
        };
      }
    } else if (path[1] === 'sheetData') {
      if (depth === 3 && local === 'row') this.openRow(tag, end);
      else if (depth === 4 && local === 'c') this.openCell(tag, end);
      else if (depth === 5) this.openCellChild(tag, local, end);
    } else if (depth === 3) {
      if (path[1] === 'cols' && local === 'col') {
        this.columns.push({
          ...this.placeOf(tag, end),
          first: Number(attributeOf(tag, 'min')) - 1,
          last: Number(attributeOf(tag, 'max')) - 1,
          style: numberOf(attributeOf(tag, 'style')),
        });
      } else if (path[1] === 'mergeCells' && local === 'mergeCell') {
        const range = parseRange(this.sheetName, attributeOf(tag, 'ref') ?? '');
        if (range !== undefined) this.mergedRanges.push(range);
      }
    }
  }

  text(): void {
    // Places are all that is wanted.
  }

  close(tag: XmlTag, end: number): void {
    const path = this.path;
    const depth = path.length;
    const local = path.pop();
    if (depth === 2) {
      if (local === 'sheetData' && this.sheetData !== undefined) {
        this.finish(this.sheetData, tag, end);
        this.placeRowsBefore(Infinity, this.sheetData.contentEnd);
      } else if (local === 'cols' && this.columnList !== undefined) this.finish(this.columnList, tag, end);
    } else if (path[1] !== 'sheetData') {
      return;
    } else if (depth === 3 && this.rowPlace !== undefined) {
      this.finish(this.rowPlace, tag, end);
      this.placeColumnsBefore(Infinity, this.rowPlace.contentEnd);
      this.rowPlace = undefined;
    } else if (depth === 4 && this.cellPlace !== undefined) {
      this.finish(this.cellPlace, tag, end);
      this.cellPlace = undefined;
    } else if (depth === 5 && this.childPlace !== undefined) {
      this.finish(this.childPlace, tag, end);
      this.childPlace = undefined;
    }
  }

  outline(): WorksheetOutline {
    if (this.sheetData === undefined) {
      throw damagedFile(this.source.fileName, `its sheet ${excerpt(this.sheetName)} has no place for cells`);
    }
    return {
      text: this.source.text,
      prefix: this.prefix,
      sheetData: this.sheetData,
      rows: this.rows,
      missingRows: this.missingRows,
      cells: this.cells,
      missingCells: this.missingCells,
      columnList: this.columnList,
      columns: this.columns,
      dimension: this.dimension,
      arrayRanges: this.arrayRanges,
      mergedRanges: this.mergedRanges,
    };
  }

  private openRow(tag: XmlTag, end: number): void {
    const row = Number(attributeOf(tag, 'r') ?? this.row + 2) - 1;
    if (!(row > this.row)) throw this.outOfOrder(`row ${row + 1}`);
    this.row = row;
    this.column = -1;
    if (this.wantedRows[this.placedRows] < row) this.placeRowsBefore(row, this.startOf(end));
    const columns = this.wanted.get(row);
    if (columns === undefined) return;
    this.placedRows++;
    this.placedColumns = 0;
    this.wantedColumns = [...columns].sort((a, b) => a - b);
    const hasFormat = attributeOf(tag, 'customFormat');
    this.rowPlace = {
      ...this.placeOf(tag, end),
      spans: attributeOf(tag, 'spans'),
      style: hasFormat === '1' || hasFormat === 'true' ? numberOf(attributeOf(tag, 's')) : undefined,
      hasAutomaticHeight: !['1', 'true'].includes(attributeOf(tag, 'customHeight') ?? ''),
    };
    this.rows.set(row, this.rowPlace);
  }

  private openCell(tag: XmlTag, end: number): void {
    const reference = attributeOf(tag, 'r');
    const place = reference === undefined ? { row: this.row, column: this.column + 1 } : parseCell(reference);
    if (place === undefined || place.row !== this.row || place.column <= this.column) {
      throw this.outOfOrder(`cell ${excerpt(reference ?? '')}`);
    }
    this.column = place.column;
    if (this.rowPlace === undefined) return;
    if (this.wantedColumns[this.placedColumns] < this.column) {
      this.placeColumnsBefore(this.column, this.startOf(end));
    }
    if (this.wantedColumns[this.placedColumns] !== this.column) return;
    this.placedColumns++;
    this.cellPlace = {
      ...this.placeOf(tag, end),
      style: numberOf(attributeOf(tag, 's')) ?? 0,
      formula: undefined,
      values: [],
      isFilled: false,
    };
    this.cells.set(cellKey(this.row, this.column), this.cellPlace);
  }

  private openCellChild(tag: XmlTag, local: string, end: number): void {
    if (local === 'f') {
      // What-if tables fill a range too.
      const kind = attributeOf(tag, 't');
      if (kind === 'array' || kind === 'dataTable') {
        const range = parseRange(this.sheetName, attributeOf(tag, 'ref') ?? cellText(this.row, this.column));
        if (range !== undefined) this.arrayRanges.push(range);
      }
    }
    if (this.cellPlace === undefined || !(local === 'f' || local === 'v' || local === 'is')) return;
    this.childPlace = this.placeOf(tag, end);
    this.cellPlace.isFilled = true;
    if (local === 'f') this.cellPlace.formula = this.childPlace;
    else this.cellPlace.values.push(this.childPlace);
  }

  /** Wanted rows before this one do not exist; they belong at this place of the text. */
  private placeRowsBefore(row: number, at: number): void {
    while (this.wantedRows[this.placedRows] < row) {
      this.missingRows.set(this.wantedRows[this.placedRows++], at);
    }
  }

  private placeColumnsBefore(column: number, at: number): void {
    while (this.wantedColumns[this.placedColumns] < column) {
      this.missingCells.set(cellKey(this.row, this.wantedColumns[this.placedColumns++]), at);
    }
  }

  private placeOf(tag: XmlTag, end: number): Growing<ElementPlace> {
    return {
      start: this.startOf(end),
      contentStart: end,
      contentEnd: end,
      end,
      isSelfClosing: tag.isSelfClosing,
    };
  }

  /** A "<" cannot stand inside a tag, so the last one before its end begins it. */
  private startOf(end: number): number {
    return this.source.text.lastIndexOf('<', end - 1);
  }

  private finish(place: Growing<ElementPlace>, tag: XmlTag, end: number): void {
    place.end = end;
    if (!tag.isSelfClosing) place.contentEnd = this.startOf(end);
  }

  private outOfOrder(what: string): Error {
    return damagedFile(
      this.source.fileName,
      `in its sheet ${excerpt(this.sheetName)}, its ${what} stands out of order`,
    );
  }
}

function numberOf(text: string | undefined): number | undefined {
  const number = Number(text);
  return text === undefined || !Number.isInteger(number) ? undefined : number;
}
