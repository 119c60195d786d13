/**
 * What a plan's names declare, before any cell is read: which ranges hold which part of the statement.
 */
import type { CellAddress } from '../sheet/cell-address';
import { cellCountOf, cellsOf, columnCountOf, rowCountOf, type CellRange } from '../sheet/cell-range';
import type { PlanListing } from './naming-convention';

/** The cells that one defined name refers to: one rectangle or more on one sheet, in the order written. */
export interface NamedArea {
  /** As written in the workbook: `Week.Lower2`. */
  readonly name: string;
  readonly number: number;
  readonly isNumbered: boolean;
  readonly ranges: readonly CellRange[];
}

/** A name that holds its value itself, such as ="maximise". */
export interface NamedConstant {
  readonly name: string;
  readonly number: number;
  readonly text: string;
}

/** Constraint rows in one block. */
export interface BlockDeclaration {
  readonly kind: 'block';
  readonly number: number;
  readonly block: NamedArea;
}

/** Constraint rows whose parts stand apart. */
export interface PartsDeclaration {
  readonly kind: 'parts';
  readonly number: number;
  readonly left: NamedArea;
  readonly relation: Declared;
  readonly right: NamedArea;
}

export type Declared = NamedArea | NamedConstant;

export function isConstant(declared: Declared): declared is NamedConstant {
  return 'text' in declared;
}

export interface ModelDeclaration {
  readonly plan: PlanListing;
  readonly decisions: readonly NamedArea[];
  /** By number; one area in formula form. */
  readonly objective: readonly NamedArea[];
  /** Whether every name of the objective that is there refers to cells. */
  readonly knowsObjective: boolean;
  readonly sense: Declared | null;
  /** By number, each number once. */
  readonly constraints: readonly (BlockDeclaration | PartsDeclaration)[];
  readonly lower: readonly NamedArea[];
  readonly upper: readonly NamedArea[];
  readonly lot: readonly NamedArea[];
  readonly leastRun: readonly NamedArea[];
  readonly decisionLabels: readonly NamedArea[];
  readonly constraintLabels: readonly NamedArea[];
}

/** The area's cells: rectangle by rectangle, each row by row. */
export function cellsOfArea(area: NamedArea): CellAddress[] {
  return area.ranges.flatMap(cellsOf);
}

export function cellCountOfArea(area: NamedArea): number {
  return area.ranges.reduce((count, range) => count + cellCountOf(range), 0);
}

export function firstCellOf(area: NamedArea): CellAddress {
  const [{ sheet, top, left }] = area.ranges;
  return { sheet, row: top, column: left };
}

/** `4 × 2`, rows before columns; of several rectangles `4 × 1 + 2 × 1`. */
export function shapeText(area: NamedArea): string {
  return area.ranges.map((range) => `${rowCountOf(range)} × ${columnCountOf(range)}`).join(' + ');
}

export function haveSameShape(a: NamedArea, b: NamedArea): boolean {
  return shapeText(a) === shapeText(b);
}

/** The smallest rectangle that holds all of the area. */
export function hullOf(area: NamedArea): CellRange {
  return {
    sheet: area.ranges[0].sheet,
    top: Math.min(...area.ranges.map((range) => range.top)),
    left: Math.min(...area.ranges.map((range) => range.left)),
    bottom: Math.max(...area.ranges.map((range) => range.bottom)),
    right: Math.max(...area.ranges.map((range) => range.right)),
  };
}

/** Whether two of the area's rectangles share a cell. */
export function repeatsCells(area: NamedArea): boolean {
  return area.ranges.some((a, i) =>
    area.ranges
      .slice(i + 1)
      .some((b) => a.top <= b.bottom && b.top <= a.bottom && a.left <= b.right && b.left <= a.right),
  );
}
