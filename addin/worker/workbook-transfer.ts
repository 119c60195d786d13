/**
 * A workbook's snapshot in buffers, to be handed to another thread: numbers in typed arrays, texts joined into one, so
 * that handing it over copies a few large pieces and not one object a cell.
 */
import { searchedLaneCount } from '../domain/results-to-sheet/free-columns';
import { cellKey, type CellAddress } from '../domain/sheet/cell-address';
import type { CellRange } from '../domain/sheet/cell-range';
import { CellError, type CellValue } from '../domain/sheet/cell-value';
import type { DefinedName } from '../domain/sheet/defined-name';
import type {
  SheetCell,
  SheetSnapshot,
  SheetVisibility,
  TableSnapshot,
  WorkbookSnapshot,
} from '../domain/sheet/sheet-snapshot';

/** Texts behind one another; text i ends before `ends[i]`. */
interface PackedTexts {
  readonly joined: string;
  readonly ends: Uint32Array;
}

/** What a cell holds, in `kinds`. Texts and error codes follow one another in `texts`, in the order of the cells. */
const Kind = { blank: 0, number: 1, text: 2, yes: 3, no: 4, error: 5, notStored: 6 } as const;

interface PackedSheet {
  readonly name: string;
  readonly visibility: SheetVisibility;
  readonly isProtected: boolean;
  readonly rowCount: number;
  readonly columnCount: number;
  readonly mergedRanges: readonly CellRange[];
  readonly notedCells: readonly CellAddress[];
  readonly pivotRanges: readonly CellRange[];
  readonly hasActiveFilter: boolean;
  readonly hiddenRows: Uint32Array;
  readonly hiddenColumns: Uint32Array;
  /** One entry a cell, in no promised order, in each of the next five. */
  readonly rows: Uint32Array;
  readonly columns: Uint32Array;
  readonly kinds: Uint8Array;
  /** 0 where the cell holds no number. */
  readonly numbers: Float64Array;
  /** Twice the position in `formats`, plus 1 where the number is shown as a date. */
  readonly formatsAndDates: Uint32Array;
  readonly texts: PackedTexts;
  /** Which cells hold a formula, ascending, and the formulas in that order. */
  readonly formulaCells: Uint32Array;
  readonly formulas: PackedTexts;
  readonly formats: readonly string[];
  readonly arrays: readonly { readonly cell: number; readonly range: CellRange }[];
}

export interface PackedWorkbook {
  readonly sheets: readonly PackedSheet[];
  readonly names: readonly DefinedName[];
  readonly tables: readonly TableSnapshot[];
  readonly usesDates1904: boolean;
  readonly record: string | null;
}

/**
 * @param pause called before each sheet, so that nobody waits for a large workbook as a whole
 */
export async function packWorkbook(
  workbook: WorkbookSnapshot,
  pause: () => Promise<void>,
): Promise<PackedWorkbook> {
  const sheets: PackedSheet[] = [];
  for (const sheet of workbook.sheets) {
    await pause();
    sheets.push(packSheet(sheet));
  }
  const { names, tables, usesDates1904, record } = workbook;
  return { sheets, names, tables, usesDates1904, record };
}

/** The buffers of a packed workbook, which its sender may give away. */
export function buffersOf(packed: PackedWorkbook): ArrayBuffer[] {
  return packed.sheets.flatMap((sheet) =>
    [
      sheet.hiddenRows,
      sheet.hiddenColumns,
      sheet.rows,
      sheet.columns,
      sheet.kinds,
      sheet.numbers,
      sheet.formatsAndDates,
      sheet.texts.ends,
      sheet.formulaCells,
      sheet.formulas.ends,
    ].map(({ buffer }) => buffer as ArrayBuffer),
  );
}

function packSheet(sheet: SheetSnapshot): PackedSheet {
  // One pass only: some sheets make their cells anew each time they are asked for.
  const rows: number[] = [];
  const columns: number[] = [];
  const kinds: number[] = [];
  const numbers: number[] = [];
  const formatsAndDates: number[] = [];
  const texts: string[] = [];
  const formulaCells: number[] = [];
  const formulas: string[] = [];
  const formats = new Map<string, number>();
  const arrays: { cell: number; range: CellRange }[] = [];
  sheet.forEachCell((row, column, cell) => {
    const { value, formula, numberFormat } = cell;
    const at = rows.length;
    rows.push(row);
    columns.push(column);
    kinds.push(kindOf(value));
    numbers.push(typeof value === 'number' ? value : 0);
    if (typeof value === 'string') texts.push(value);
    else if (value instanceof CellError) texts.push(value.code);
    const format = formats.get(numberFormat) ?? formats.size;
    formats.set(numberFormat, format);
    formatsAndDates.push(2 * format + (cell.isDate ? 1 : 0));
    if (formula !== undefined) {
      formulaCells.push(at);
      formulas.push(formula);
    }
    if (cell.arrayRange !== undefined) arrays.push({ cell: at, range: cell.arrayRange });
  });
  const { name, visibility, isProtected, rowCount, columnCount, hasActiveFilter } = sheet;
  const { mergedRanges, notedCells, pivotRanges } = sheet;
  return {
    ...{ name, visibility, isProtected, rowCount, columnCount, hasActiveFilter },
    ...{ mergedRanges, notedCells, pivotRanges },
    // Results may be placed beyond what is used, and not where it is hidden.
    hiddenRows: linesThat(rowCount + 1 + searchedLaneCount, (row) => sheet.isRowHidden(row)),
    hiddenColumns: linesThat(columnCount + 1 + searchedLaneCount, (column) => sheet.isColumnHidden(column)),
    rows: Uint32Array.from(rows),
    columns: Uint32Array.from(columns),
    kinds: Uint8Array.from(kinds),
    numbers: Float64Array.from(numbers),
    formatsAndDates: Uint32Array.from(formatsAndDates),
    arrays,
    texts: packTexts(texts),
    formulaCells: Uint32Array.from(formulaCells),
    formulas: packTexts(formulas),
    formats: [...formats.keys()],
  };
}

function kindOf(value: CellValue | undefined): number {
  if (value === undefined) return Kind.notStored;
  if (value === null) return Kind.blank;
  if (typeof value === 'number') return Kind.number;
  if (typeof value === 'string') return Kind.text;
  if (typeof value === 'boolean') return value ? Kind.yes : Kind.no;
  return Kind.error;
}

function linesThat(count: number, isHidden: (line: number) => boolean): Uint32Array {
  const lines: number[] = [];
  for (let line = 0; line < count; line++) {
    if (isHidden(line)) lines.push(line);
  }
  return Uint32Array.from(lines);
}

function packTexts(texts: readonly string[]): PackedTexts {
  const ends = new Uint32Array(texts.length);
  let end = 0;
  texts.forEach((text, i) => {
    end += text.length;
    ends[i] = end;
  });
  return { joined: texts.join(''), ends };
}

function textAt({ joined, ends }: PackedTexts, i: number): string {
  return joined.slice(i === 0 ? 0 : ends[i - 1], ends[i]);
}

export function unpackWorkbook(packed: PackedWorkbook): WorkbookSnapshot {
  const { names, tables, usesDates1904, record } = packed;
  return {
    sheets: packed.sheets.map((sheet) => new UnpackedSheet(sheet)),
    names,
    tables,
    usesDates1904,
    record,
  };
}

class UnpackedSheet implements SheetSnapshot {
  readonly name: string;
  readonly visibility: SheetVisibility;
  readonly isProtected: boolean;
  readonly rowCount: number;
  readonly columnCount: number;
  readonly mergedRanges: readonly CellRange[];
  readonly notedCells: readonly CellAddress[];
  readonly pivotRanges: readonly CellRange[];
  readonly hasActiveFilter: boolean;
  private readonly hiddenRows: ReadonlySet<number>;
  private readonly hiddenColumns: ReadonlySet<number>;
  private readonly cells = new Map<number, SheetCell>();

  constructor(private readonly packed: PackedSheet) {
    this.name = packed.name;
    this.visibility = packed.visibility;
    this.isProtected = packed.isProtected;
    this.rowCount = packed.rowCount;
    this.columnCount = packed.columnCount;
    this.mergedRanges = packed.mergedRanges;
    this.notedCells = packed.notedCells;
    this.pivotRanges = packed.pivotRanges;
    this.hasActiveFilter = packed.hasActiveFilter;
    this.hiddenRows = new Set(packed.hiddenRows);
    this.hiddenColumns = new Set(packed.hiddenColumns);
    this.fillCells();
  }

  cell(row: number, column: number): SheetCell | undefined {
    return this.cells.get(cellKey(row, column));
  }

  forEachCell(visit: (row: number, column: number, cell: SheetCell) => void): void {
    const { rows, columns } = this.packed;
    let at = 0;
    // The map gives its cells in the order in which they were packed.
    for (const cell of this.cells.values()) {
      visit(rows[at], columns[at], cell);
      at++;
    }
  }

  isRowHidden(row: number): boolean {
    return this.hiddenRows.has(row);
  }

  isColumnHidden(column: number): boolean {
    return this.hiddenColumns.has(column);
  }

  private fillCells(): void {
    const { rows, columns, kinds, numbers, formatsAndDates, formats, formulaCells, formulas } = this.packed;
    const arrays = new Map(this.packed.arrays.map(({ cell, range }) => [cell, range]));
    let nextText = 0;
    let nextFormula = 0;
    const valueOf = (at: number): CellValue | undefined => {
      switch (kinds[at]) {
        case Kind.notStored:
          return undefined;
        case Kind.number:
          return numbers[at];
        case Kind.text:
          return textAt(this.packed.texts, nextText++);
        case Kind.yes:
          return true;
        case Kind.no:
          return false;
        case Kind.error:
          return CellError.of(textAt(this.packed.texts, nextText++));
        default:
          return null;
      }
    };
    for (let at = 0; at < rows.length; at++) {
      const hasFormula = formulaCells[nextFormula] === at;
      this.cells.set(cellKey(rows[at], columns[at]), {
        value: valueOf(at),
        formula: hasFormula ? textAt(formulas, nextFormula++) : undefined,
        arrayRange: arrays.get(at),
        isDate: formatsAndDates[at] % 2 === 1,
        numberFormat: formats[formatsAndDates[at] >> 1],
      });
    }
  }
}
