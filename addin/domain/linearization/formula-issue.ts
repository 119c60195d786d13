/**
 * What can be wrong with the formulas that a plan rests on, as data. The sentences are made elsewhere.
 */
import type { CellAddress } from '../sheet/cell-address';

export type FormulaIssueCode =
  /** What is done to a decision does not stay a constant plus a multiple of each decision. */
  | 'not-affine'
  /** Formulas that wait for one another. */
  | 'circular-reference'
  /** A function that is not known here, on the way from a decision or with no value stored. */
  | 'unknown-function'
  /** Text that is no formula. */
  | 'formula-syntax'
  /** Brackets within brackets, or names within names, without end. */
  | 'too-deep'
  /** An array of more cells than can be worked out. */
  | 'array-too-large'
  /** Refers to another workbook. */
  | 'external-reference'
  /** Refers to the same cells on several sheets at once. */
  | 'several-sheets'
  /** An error value in a formula of the decisions. */
  | 'error-value'
  /** Warning: the value stored beside a formula is not what the formula gives. */
  | 'stored-value-differs'
  /** Our own arithmetic is in doubt: the model and the formulas differ at a random point. */
  | 'model-disagrees';

/**
 * Facts by code (texts of cells as `Plan!B7`):
 * - not-affine: `operation` (product, division, power, comparison, concatenation, condition, reference, function),
 *   `by` (the operator or function, such as `*` or `ROUND`), `remedy` (lot, yes-no, ratio, row-each, none),
 *   `chain` (cells from a decision to this one, this one last), `formula`
 * - circular-reference: `cells` (once around), `formula`
 * - unknown-function: `function`, `chain`, `formula`
 * - formula-syntax: `position` (from 0, −1 where not known), `formula`
 * - too-deep, array-too-large: `formula`
 * - external-reference, several-sheets: `reference`, `formula`
 * - error-value: `error`, `chain`, `formula`
 * - stored-value-differs: `stored`, `evaluated`, `formula`
 * - model-disagrees: `model`, `evaluated`
 */
export interface FormulaIssue {
  readonly code: FormulaIssueCode;
  readonly cell: CellAddress;
  readonly facts: Readonly<Record<string, string | number | readonly string[]>>;
}

/** What a planner of the trade does instead. */
export type Remedy =
  /** Rounding: plan in whole lots. */
  | 'lot'
  /** A condition on a decision: a yes/no cell. */
  | 'yes-no'
  /** A quotient of two decisions held against a number: multiply out. */
  | 'ratio'
  /** The greatest or least of several: one constraint row for each. */
  | 'row-each'
  | 'none';
