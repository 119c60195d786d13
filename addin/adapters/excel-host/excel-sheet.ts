/**
 * A sheet as it was read from Excel: its used rectangle in plain arrays, and what is known of its rows and columns.
 */
import type { CellAddress } from '../../domain/sheet/cell-address';
import { columnCountOf, rowCountOf, type CellRange } from '../../domain/sheet/cell-range';
import { CellError, type CellValue } from '../../domain/sheet/cell-value';
import { isDateFormat } from '../../domain/sheet/date-format';
import type { SheetCell, SheetSnapshot, SheetVisibility } from '../../domain/sheet/sheet-snapshot';

/** Matrices as Excel gives them, all of one size. */
export interface ReadCells {
  readonly values: readonly (readonly unknown[])[];
  /** Formulas with `=`; for a constant its value. */
  readonly formulas: readonly (readonly unknown[])[];
  readonly valueTypes: readonly (readonly string[])[];
  readonly numberFormats: readonly (readonly unknown[])[];
}

const generalFormat = 'General';
/** Characters of a number with all its figures. */
const longestNumber = 18;

export class ExcelSheet implements SheetSnapshot {
  readonly rowCount: number;
  readonly columnCount: number;
  mergedRanges: readonly CellRange[] = [];
  notedCells: readonly CellAddress[] = [];
  pivotRanges: readonly CellRange[] = [];

  /** Row by row over the used rectangle; undefined in `formulas` for constants. */
  private readonly values: (CellValue | undefined)[] = [];
  private readonly formulas: (string | undefined)[] = [];
  private readonly formats: string[] = [];
  /** Characters of all entries, numbers counted at their longest: what the sheet comes to as a message. */
  entryLength = 0;

  /** By position in the used rectangle, of the first cell that an array formula fills. */
  private readonly arrayRanges = new Map<number, CellRange>();
  private readonly hiddenRows = new Set<number>();
  private readonly hiddenColumns = new Set<number>();

  constructor(
    readonly name: string,
    readonly visibility: SheetVisibility,
    readonly isProtected: boolean,
    readonly hasActiveFilter: boolean,
    /** The smallest rectangle around everything on the sheet; undefined where nothing is, or nothing was read. */
    readonly used: CellRange | undefined,
  ) {
    this.rowCount = used === undefined ? 0 : used.bottom + 1;
    this.columnCount = used === undefined ? 0 : used.right + 1;
  }

  /** Takes in what was read of a part of the used rectangle. */
  fill(part: CellRange, read: ReadCells): void {
    for (let down = 0; down < rowCountOf(part); down++) {
      for (let across = 0; across < columnCountOf(part); across++) {
        const at = this.position(part.top + down, part.left + across);
        const raw = read.values[down][across];
        const formula = formulaOf(read.formulas[down][across], raw);
        this.formulas[at] = formula;
        this.values[at] = valueOf(raw, read.valueTypes[down][across], formula !== undefined);
        this.entryLength += formula?.length ?? (typeof raw === 'string' ? raw.length : longestNumber);
        const format = read.numberFormats[down][across];
        this.formats[at] = typeof format === 'string' && format !== '' ? format : generalFormat;
      }
    }
  }

  /** These cells are filled by the formula in the first of them. */
  markArray(range: CellRange): void {
    for (let row = range.top; row <= range.bottom; row++) {
      for (let column = range.left; column <= range.right; column++) {
        const isFirst = row === range.top && column === range.left;
        if (!isFirst && this.isWithin(row, column)) this.formulas[this.position(row, column)] = undefined;
      }
    }
    this.arrayRanges.set(this.position(range.top, range.left), range);
  }

  /** What array formulas fill. */
  get arrays(): readonly CellRange[] {
    return [...this.arrayRanges.values()];
  }

  hideRow(row: number): void {
    this.hiddenRows.add(row);
  }

  hideColumn(column: number): void {
    this.hiddenColumns.add(column);
  }

  cell(row: number, column: number): SheetCell | undefined {
    return this.isWithin(row, column) ? this.cellAt(this.position(row, column)) : undefined;
  }

  forEachCell(visit: (row: number, column: number, cell: SheetCell) => void): void {
    if (this.used === undefined) return;
    const { top, left, bottom, right } = this.used;
    let at = 0;
    for (let row = top; row <= bottom; row++) {
      for (let column = left; column <= right; column++, at++) {
        const cell = this.cellAt(at);
        if (cell !== undefined) visit(row, column, cell);
      }
    }
  }

  isRowHidden(row: number): boolean {
    return this.hiddenRows.has(row);
  }

  isColumnHidden(column: number): boolean {
    return this.hiddenColumns.has(column);
  }

  private cellAt(at: number): SheetCell | undefined {
    const value = this.values[at];
    const formula = this.formulas[at];
    if (formula === undefined && (value === null || value === undefined)) {
      return undefined;
    }
    const numberFormat = this.formats[at];
    return {
      value,
      formula,
      arrayRange: this.arrayRanges.get(at),
      isDate: typeof value === 'number' && isDateFormat(numberFormat),
      numberFormat,
    };
  }

  private isWithin(row: number, column: number): boolean {
    const { used } = this;
    return (
      used !== undefined &&
      row >= used.top &&
      row <= used.bottom &&
      column >= used.left &&
      column <= used.right
    );
  }

  private position(row: number, column: number): number {
    const used = this.used!;
    return (row - used.top) * columnCountOf(used) + (column - used.left);
  }
}

/** What array formulas fill on a sheet, however it was read. */
export function arrayRangesOf(sheet: SheetSnapshot): readonly CellRange[] {
  if (sheet instanceof ExcelSheet) return sheet.arrays;
  const found: CellRange[] = [];
  sheet.forEachCell((_row, _column, { arrayRange }) => {
    if (arrayRange !== undefined) found.push(arrayRange);
  });
  return found;
}

/** A text that begins with `=` is no formula: its value is the same text. */
export function formulaOf(formula: unknown, value: unknown): string | undefined {
  return typeof formula === 'string' && formula.startsWith('=') && formula !== value
    ? formula.slice(1)
    : undefined;
}

export function valueOf(raw: unknown, type: string, isFormula: boolean): CellValue {
  if (raw === '' || raw === null || raw === undefined) {
    return isFormula ? '' : null;
  }
  if (typeof raw === 'number' || typeof raw === 'boolean') {
    return raw;
  }
  const text = typeof raw === 'string' ? raw : JSON.stringify(raw);
  return type === 'Error' ? CellError.of(text) : text;
}
