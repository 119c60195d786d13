/**
 * Why a formula is not evaluated. A refusal is not an error value: an error value is a result that other formulas can
 * take up (IFERROR), a refusal means that there is no result to be had.
 */
import type { CellError } from '../sheet/cell-value';
import type { FormulaCell } from './calculation-grid';

/** What was tried with a number that depends on decisions. */
export type NonAffineOperation =
  'product' | 'division' | 'power' | 'comparison' | 'concatenation' | 'condition' | 'reference' | 'function';

export type RefusalReason =
  | {
      readonly code: 'not-affine';
      readonly operation: NonAffineOperation;
      /** The operator, or the function's name. */
      readonly by: string;
    }
  | { readonly code: 'unknown-function'; readonly functionName: string }
  | { readonly code: 'formula-syntax'; readonly position: number | null }
  | { readonly code: 'too-deep' }
  | { readonly code: 'array-too-large' }
  | { readonly code: 'external-reference'; readonly reference: string }
  | { readonly code: 'several-sheets'; readonly reference: string }
  | { readonly code: 'circular-reference'; readonly cells: readonly FormulaCell[] };

export class EvaluationRefusal extends Error {
  override readonly name = 'EvaluationRefusal';
  constructor(readonly reason: RefusalReason) {
    super(reason.code);
  }
}

/** A dependent number where only a plain value will do; the evaluator puts the function's name to it. */
export class DependentValueRefusal extends Error {
  override readonly name = 'DependentValueRefusal';
  constructor(readonly operation: NonAffineOperation | undefined) {
    super('dependent value');
  }
}

const dependentRefusals = new Map<NonAffineOperation | undefined, DependentValueRefusal>();

/** @returns one object per operation: refusing is frequent where a sheet is full of conditions */
export function dependentValueRefusal(operation?: NonAffineOperation): DependentValueRefusal {
  let refusal = dependentRefusals.get(operation);
  if (refusal === undefined) {
    refusal = new DependentValueRefusal(operation);
    dependentRefusals.set(operation, refusal);
  }
  return refusal;
}

/** An error value on its way out of a function. Caught by the evaluator, which makes it the function's result. */
export class ErrorValueSignal extends Error {
  override readonly name = 'ErrorValueSignal';
  constructor(readonly value: CellError) {
    super(value.code);
  }
}

const errorSignals = new Map<CellError, ErrorValueSignal>();

export function errorSignal(value: CellError): ErrorValueSignal {
  let signal = errorSignals.get(value);
  if (signal === undefined) {
    signal = new ErrorValueSignal(value);
    errorSignals.set(value, signal);
  }
  return signal;
}
