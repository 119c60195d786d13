/**
 * What a worksheet function is to the evaluator, and what it may ask of it.
 */
import type { FormulaNode } from '../formula/formula-syntax';
import type { Area, Lambda, Matrix, Reference, Scalar, Value } from './evaluated-value';
import type { Amount, AmountSum, NumberDomain } from './number-domain';

/** The evaluator, as functions see it while one cell is worked out. */
export interface FunctionContext {
  readonly domain: NumberDomain;
  /** Date and time of TODAY and NOW, as a serial date of the workbook. */
  readonly now: number;
  readonly usesDates1904: boolean;
  /** The cell whose formula is worked out. */
  readonly row: number;
  readonly column: number;
  /** A part of the formula over arrays: ranges stay ranges. */
  evaluate(node: FormulaNode): Value;
  /** The same in a place of the formula that takes one value, where this call stands in such a place. */
  evaluateBranch(node: FormulaNode): Value;
  /** One value: that of a single cell, of the formula's own row or column in a line of cells, or the first. */
  scalarOf(value: Value): Scalar;
  /** All values in rows and columns. @throws #VALUE! for a union of several ranges */
  matrixOf(value: Value): Matrix;
  /** Each filled cell or value, blanks left out, row by row in ranges and arrays; `isCell` tells a range's from others. */
  forEachFilled(value: Value, visit: (value: Scalar, isCell: boolean) => void): void;
  /** Combines arrays element by element; one value where all are. */
  lift(values: readonly Value[], combine: (scalars: readonly Scalar[]) => Scalar): Value;
  callLambda(lambda: Lambda, values: readonly Value[]): Value;
  /** A text as a reference, as INDIRECT takes it. @throws #REF! */
  referenceOfText(text: string): Reference;
  isRowHidden(area: Area, row: number, byFilterOnly: boolean): boolean;
  /** Whether the cell's own formula is a SUBTOTAL or AGGREGATE, which others of the kind leave out. */
  isSubtotal(area: Area, row: number, column: number): boolean;
  scalarAt(area: Area, row: number, column: number): Scalar;
  newSum(): AmountSum;
  /** The sum of a range; on from that of a shorter range with the same first cell, where one is known. */
  runningTotal(area: Area, sum: (area: Area, from: Amount | undefined) => Amount): Amount;
}

/** Takes single values; given arrays, it is worked out element by element. */
export interface ScalarFunction {
  readonly kind: 'scalar';
  readonly minimum: number;
  readonly maximum: number;
  /** Arguments left out at the end are missing, those left out between are null. */
  apply(values: readonly Scalar[], context: FunctionContext): Scalar;
}

/** Takes ranges and arrays whole. */
export interface GeneralFunction {
  readonly kind: 'general';
  readonly minimum: number;
  readonly maximum: number;
  apply(values: readonly Value[], context: FunctionContext): Value;
}

/** Decides itself which of its arguments are worked out. */
export interface LazyFunction {
  readonly kind: 'lazy';
  readonly minimum: number;
  readonly maximum: number;
  apply(nodes: readonly FormulaNode[], context: FunctionContext): Value;
}

export type WorksheetFunction = ScalarFunction | GeneralFunction | LazyFunction;
export type FunctionTable = Readonly<Record<string, WorksheetFunction>>;

export function scalarFunction(
  minimum: number,
  maximum: number,
  apply: ScalarFunction['apply'],
): ScalarFunction {
  return { kind: 'scalar', minimum, maximum, apply };
}

export function generalFunction(
  minimum: number,
  maximum: number,
  apply: GeneralFunction['apply'],
): GeneralFunction {
  return { kind: 'general', minimum, maximum, apply };
}

export function lazyFunction(minimum: number, maximum: number, apply: LazyFunction['apply']): LazyFunction {
  return { kind: 'lazy', minimum, maximum, apply };
}
