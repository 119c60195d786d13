/**
 * A workbook's cells laid out for calculation: column by column, so that a range is read without a look-up a cell.
 *
 * Each place holds nothing, a constant, or a node: a formula, a cell filled by an array formula, or an input, that is
 * a cell whose value the caller gives (a decision cell; a changed cell).
 */
import type { CellAddress } from '../sheet/cell-address';
import { cellCountOf } from '../sheet/cell-range';
import { CellError, type CellValue } from '../sheet/cell-value';
import type { SheetCell, SheetSnapshot, WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { formulaCacheOf, type FormulaCache } from '../formula/formula-cache';
import type { FormulaSyntaxIssue, ParsedFormula } from '../formula/formula-syntax';
import { workbookIndexOf, type WorkbookIndex } from '../formula/workbook-index';
import { maximumArrayCells } from './array-size';

/** A cell that holds a formula; for an array formula its first cell, which stands for all that it fills. */
export class FormulaCell {
  /** Evaluated over arrays, and more than one cell takes its values. */
  readonly isArrayFormula: boolean;
  private parsed: ParsedFormula | FormulaSyntaxIssue | undefined;

  constructor(
    /** Position among the grid's formula cells, from 0. */
    readonly id: number,
    readonly grid: SheetGrid,
    readonly row: number,
    readonly column: number,
    readonly cell: SheetCell,
  ) {
    this.isArrayFormula = cell.arrayRange !== undefined;
  }

  get formula(): ParsedFormula | FormulaSyntaxIssue {
    return (this.parsed ??= this.grid.owner.formulas.parse(this.cell.formula ?? '', this));
  }

  get address(): CellAddress {
    return { sheet: this.grid.name, row: this.row, column: this.column };
  }
}

/** A cell that an array formula fills, its first cell apart. */
export class ArrayPart {
  constructor(
    readonly anchor: FormulaCell,
    readonly row: number,
    readonly column: number,
    readonly stored: CellValue | undefined,
  ) {}
}

/** A cell whose value the caller gives. */
export class InputCell {
  constructor(
    /** Position among the inputs, from 0. */
    readonly index: number,
    readonly grid: SheetGrid,
    readonly row: number,
    readonly column: number,
  ) {}

  get address(): CellAddress {
    return { sheet: this.grid.name, row: this.row, column: this.column };
  }
}

export type GridNode = FormulaCell | ArrayPart | InputCell;
export type GridEntry = Exclude<CellValue, null> | GridNode;

export interface GridColumn {
  /** By row; holes are blank cells. */
  readonly entries: readonly (GridEntry | undefined)[];
  /** The nodes among them, rows ascending. */
  readonly nodes: readonly GridNode[];
}

class BuiltColumn implements GridColumn {
  readonly entries: (GridEntry | undefined)[] = [];
  readonly nodes: GridNode[] = [];
}

export class SheetGrid {
  /** By column; holes hold nothing. */
  readonly columns: readonly (GridColumn | undefined)[];
  private readonly built: (BuiltColumn | undefined)[] = [];

  constructor(
    readonly owner: CalculationGrid,
    readonly sheet: SheetSnapshot,
    inputs: readonly { readonly index: number; readonly row: number; readonly column: number }[],
  ) {
    this.columns = this.built;
    const arrayFormulas: FormulaCell[] = [];
    sheet.forEachCell((row, column, cell) => {
      const entries = this.columnToFill(column).entries;
      if (cell.formula === undefined) {
        if (cell.value !== null && cell.value !== undefined) {
          entries[row] = cell.value;
        }
        return;
      }
      const formulaCell = owner.addFormulaCell(this, row, column, cell);
      entries[row] = formulaCell;
      if (cell.arrayRange !== undefined) {
        arrayFormulas.push(formulaCell);
      }
    });
    arrayFormulas.forEach((anchor) => this.placeArrayParts(anchor));
    for (const { index, row, column } of inputs) {
      this.columnToFill(column).entries[row] = new InputCell(index, this, row, column);
    }
    for (const column of this.built) {
      column?.entries.forEach((entry) => {
        if (typeof entry === 'object' && !(entry instanceof CellError)) {
          column.nodes.push(entry);
        }
      });
    }
  }

  get name(): string {
    return this.sheet.name;
  }

  at(row: number, column: number): GridEntry | undefined {
    return this.columns[column]?.entries[row];
  }

  private columnToFill(column: number): BuiltColumn {
    return (this.built[column] ??= new BuiltColumn());
  }

  /** An array formula fills no cell that holds something of its own; a huge one none beyond what the sheet uses. */
  private placeArrayParts(anchor: FormulaCell): void {
    const range = anchor.cell.arrayRange!;
    const isHuge = cellCountOf(range) > maximumArrayCells;
    const bottom = isHuge ? Math.min(range.bottom, this.sheet.rowCount - 1) : range.bottom;
    const right = isHuge ? Math.min(range.right, this.sheet.columnCount - 1) : range.right;
    for (let column = range.left; column <= right; column++) {
      const { entries } = this.columnToFill(column);
      for (let row = range.top; row <= bottom; row++) {
        const entry = entries[row];
        const isNode = typeof entry === 'object' && !(entry instanceof CellError);
        if (!isNode) {
          entries[row] = new ArrayPart(anchor, row, column, this.sheet.cell(row, column)?.value);
        }
      }
    }
  }
}

export class CalculationGrid {
  readonly formulas: FormulaCache;
  readonly index: WorkbookIndex;
  /** Inputs in the order given; a cell on a sheet that is not there is left out. */
  readonly inputCells: readonly (InputCell | undefined)[];

  private readonly cells: FormulaCell[] = [];
  private readonly grids = new Map<SheetSnapshot, SheetGrid>();
  private readonly inputsBySheet = new Map<
    SheetSnapshot,
    { readonly index: number; readonly row: number; readonly column: number }[]
  >();

  constructor(
    readonly workbook: WorkbookSnapshot,
    inputs: readonly CellAddress[],
  ) {
    this.formulas = formulaCacheOf(workbook);
    this.index = workbookIndexOf(workbook);
    inputs.forEach(({ sheet: name, row, column }, index) => {
      const sheet = this.index.sheet(name);
      if (sheet !== undefined) {
        const ofSheet = this.inputsBySheet.get(sheet) ?? [];
        ofSheet.push({ index, row, column });
        this.inputsBySheet.set(sheet, ofSheet);
      }
    });
    this.inputCells = inputs.map(({ sheet, row, column }) => {
      const entry = this.sheetGrid(sheet)?.at(row, column);
      return entry instanceof InputCell ? entry : undefined;
    });
  }

  /** Formula cells known so far: those of the sheets that were looked at. */
  get formulaCells(): readonly FormulaCell[] {
    return this.cells;
  }

  /** The sheet's grid, laid out when it is first asked for; undefined where there is no such sheet. */
  sheetGrid(name: string): SheetGrid | undefined {
    const sheet = this.index.sheet(name);
    if (sheet === undefined) {
      return undefined;
    }
    let grid = this.grids.get(sheet);
    if (grid === undefined) {
      grid = new SheetGrid(this, sheet, this.inputsBySheet.get(sheet) ?? []);
      this.grids.set(sheet, grid);
    }
    return grid;
  }

  /** Lays out every sheet. */
  readAllSheets(): void {
    this.workbook.sheets.forEach((sheet) => this.sheetGrid(sheet.name));
  }

  /** For the sheets' grids only. */
  addFormulaCell(grid: SheetGrid, row: number, column: number, cell: SheetCell): FormulaCell {
    const formulaCell = new FormulaCell(this.cells.length, grid, row, column, cell);
    this.cells.push(formulaCell);
    return formulaCell;
  }
}
