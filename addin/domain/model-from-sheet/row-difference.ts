/**
 * A constraint row as one sum: left − right with the constants moved to the right.
 *
 *   Σ coefficient × variable   relation   constant
 */
import type { AffineForm } from '../linearization/affine-form';
import type { Relation } from './sheet-model';

export interface RowDifference {
  /** Ascending, no variable twice. */
  readonly variables: readonly number[];
  /** As long as `variables`; none is 0. */
  readonly coefficients: readonly number[];
  /** The right side's constant less the left side's. */
  readonly constant: number;
  /** The larger of the two constants it is the difference of, in size. */
  readonly constantScale: number;
}

/**
 * Is a difference of two numbers only rounding? Relative to the larger of them: 2⁻⁵⁰, four units in the last place of
 * a double, so that 0.1 + 0.2 on one side and 0.3 on the other leave nothing.
 */
const cancellation = 2 ** -50;

/** Does a row without decisions hold? Relative to 1 + the larger constant; the same as for a solved row. */
const fixedRowTolerance = 1e-7;

export function rowDifference(left: AffineForm, right: AffineForm): RowDifference {
  const variables: number[] = [];
  const coefficients: number[] = [];
  let i = 0;
  let j = 0;
  while (i < left.variables.length || j < right.variables.length) {
    const nextLeft = i < left.variables.length ? left.variables[i] : Infinity;
    const nextRight = j < right.variables.length ? right.variables[j] : Infinity;
    const variable = Math.min(nextLeft, nextRight);
    const onLeft = nextLeft === variable ? left.coefficients[i++] : 0;
    const onRight = nextRight === variable ? right.coefficients[j++] : 0;
    const coefficient = difference(onLeft, onRight);
    if (coefficient !== 0) {
      variables.push(variable);
      coefficients.push(coefficient);
    }
  }
  return {
    variables,
    coefficients,
    constant: difference(right.constant, left.constant),
    constantScale: Math.max(Math.abs(left.constant), Math.abs(right.constant)),
  };
}

function difference(a: number, b: number): number {
  const result = a - b;
  return Math.abs(result) <= cancellation * Math.max(Math.abs(a), Math.abs(b)) ? 0 : result;
}

/** Whether `0 relation constant` is true, within what rounding can have done to the two constants. */
export function holdsWithoutDecisions(row: RowDifference, relation: Relation): boolean {
  const allowance = fixedRowTolerance * (1 + row.constantScale);
  switch (relation) {
    case '<=':
      return row.constant >= -allowance;
    case '>=':
      return row.constant <= allowance;
    case '=':
      return Math.abs(row.constant) <= allowance;
  }
}
