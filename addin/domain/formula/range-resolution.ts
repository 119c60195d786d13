/**
 * What a defined name, or any reference text, points at.
 */
import type { CellRange } from '../sheet/cell-range';

export type RangeResolution =
  /** One rectangle or more on one sheet, in the order written. */
  | { readonly kind: 'ranges'; readonly ranges: readonly CellRange[] }
  /** A constant written in the name itself. */
  | { readonly kind: 'constant'; readonly value: number | string | boolean }
  /** Refers to cells that are gone (#REF!). */
  | { readonly kind: 'dead' }
  /** Refers to another workbook. */
  | { readonly kind: 'external' }
  /** Refers to a sheet, table, column or name that does not exist. */
  | { readonly kind: 'unknown'; readonly what: string }
  /** OFFSET, INDEX, INDIRECT and the like: a range worked out by a formula. */
  | { readonly kind: 'computed'; readonly functionName: string }
  /** Areas on several sheets, or a formula that gives no range. */
  | { readonly kind: 'not-a-range' };
