/**
 * What a formula, or a part of one, can be worth: a single value, an array of values, a reference to cells, or a
 * function made by LAMBDA.
 */
import { CellError, type CellValue } from '../sheet/cell-value';
import type { FormulaNode } from '../formula/formula-syntax';
import type { SheetGrid } from './calculation-grid';
import type { DependentNumber } from './number-domain';

/** A single value; null is a blank cell. */
export type Scalar = CellValue | DependentNumber;

/** Values in rows and columns. Immutable. */
export class Matrix {
  constructor(
    readonly rowCount: number,
    readonly columnCount: number,
    /** Row by row; length rowCount × columnCount. */
    readonly values: readonly Scalar[],
  ) {}

  /** One row serves for all rows, one column for all columns; beyond the edges there is #N/A. */
  at(row: number, column: number): Scalar {
    const r = this.rowCount === 1 ? 0 : row;
    const c = this.columnCount === 1 ? 0 : column;
    return r < this.rowCount && c < this.columnCount
      ? this.values[r * this.columnCount + c]
      : errorValue.notAvailable;
  }
}

/** A rectangle on a sheet. */
export interface Area {
  readonly grid: SheetGrid;
  readonly top: number;
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
}

/** A reference to cells: one rectangle, or a union of several. */
export class Reference {
  constructor(readonly areas: readonly Area[]) {}

  get isSingleCell(): boolean {
    return this.areas.length === 1 && isSingleCell(this.areas[0]);
  }
}

/** Values bound by LET and LAMBDA, innermost first. */
export interface Scope {
  readonly name: string;
  readonly value: Value;
  readonly outer: Scope | undefined;
}

export class Lambda {
  constructor(
    readonly parameters: readonly string[],
    readonly body: FormulaNode,
    readonly scope: Scope | undefined,
  ) {}
}

export type Value = Scalar | Matrix | Reference | Lambda;

export const errorValue = {
  notAvailable: CellError.of('#N/A'),
  value: CellError.of('#VALUE!'),
  reference: CellError.of('#REF!'),
  division: CellError.of('#DIV/0!'),
  number: CellError.of('#NUM!'),
  name: CellError.of('#NAME?'),
  noIntersection: CellError.of('#NULL!'),
  calculation: CellError.of('#CALC!'),
} as const;

export function isSingleCell(area: Area): boolean {
  return area.top === area.bottom && area.left === area.right;
}

export function isScalar(value: Value): value is Scalar {
  return !(value instanceof Matrix || value instanceof Reference || value instanceof Lambda);
}

export function isDependent(value: Value): value is DependentNumber {
  return (
    typeof value === 'object' &&
    value !== null &&
    !(value instanceof CellError) &&
    (value as Partial<DependentNumber>).dependsOnDecisions === true
  );
}
