/**
 * Cells that many others build on, kept as free variables with a defining row.
 *
 * Stock this week = stock last week + made − sold: written out in decisions, week 5,000 has 10,000 terms, and all
 * weeks together 50 million. So a cell whose form grows long is not written out again in the next cell; it is named
 * by a variable of its own, and `variable = form` becomes a row. Such a variable is nobody's decision and its row
 * nobody's constraint row; neither is ever shown.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { AffineForm } from './affine-form';

/** A cell turned into a free variable with a defining row: variable = form. */
export interface DefiningRow {
  readonly variable: number;
  readonly cell: CellAddress;
  readonly form: AffineForm;
}
