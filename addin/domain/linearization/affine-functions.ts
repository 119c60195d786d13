/**
 * The worksheet functions that keep affine forms affine, each with its condition. Every function that is not listed
 * is refused as soon as an argument, or a cell of a range given to it, depends on a decision.
 *
 * The conditions are held in two ways: an argument that may not depend is refused before the function is called; and
 * inside the function a number that depends on decisions cannot be taken for a plain one.
 */

export interface AffineFunction {
  /** Positions of the arguments (from 0) that may depend on decisions. */
  readonly mayDepend: 'all' | ((argument: number) => boolean);
  /** As SPEC.md quotes it. */
  readonly condition: string;
}

const first = (argument: number): boolean => argument === 0;
const allButFirst = (argument: number): boolean => argument > 0;

export const affineFunctions: Readonly<Record<string, AffineFunction>> = {
  SUM: { mayDepend: 'all', condition: 'always' },
  PRODUCT: { mayDepend: 'all', condition: 'at most one factor depends on decisions' },
  SUMPRODUCT: { mayDepend: 'all', condition: 'in each term at most one factor depends on decisions' },
  AVERAGE: { mayDepend: 'all', condition: 'always; how many there are is a constant' },
  SUMIF: {
    mayDepend: (argument) => argument === 2,
    condition: 'the range compared and the criterion are constant',
  },
  SUMIFS: { mayDepend: first, condition: 'the ranges compared and the criteria are constant' },
  AVERAGEIF: {
    mayDepend: (argument) => argument === 2,
    condition: 'the range compared and the criterion are constant',
  },
  AVERAGEIFS: { mayDepend: first, condition: 'the ranges compared and the criteria are constant' },
  SUBTOTAL: { mayDepend: allButFirst, condition: 'sums and averages only (1, 9, 101, 109)' },
  AGGREGATE: { mayDepend: (argument) => argument > 1, condition: 'sums and averages only (1, 9)' },
  NPV: { mayDepend: allButFirst, condition: 'the rate is constant' },
  MMULT: { mayDepend: 'all', condition: 'in each term at most one factor depends on decisions' },
  TRANSPOSE: { mayDepend: 'all', condition: 'always' },
  N: { mayDepend: 'all', condition: 'always' },
  INDEX: { mayDepend: first, condition: 'row and column are constant' },
  XLOOKUP: {
    mayDepend: (argument) => argument === 2 || argument === 3,
    condition: 'the key and what it is looked up in are constant',
  },
  VLOOKUP: {
    mayDepend: (argument) => argument === 1,
    condition: 'the key and the first column are constant',
  },
  HLOOKUP: { mayDepend: (argument) => argument === 1, condition: 'the key and the first row are constant' },
  LOOKUP: {
    mayDepend: allButFirst,
    condition: 'the key and what it is looked up in are constant',
  },
  OFFSET: { mayDepend: first, condition: 'the distances and sizes are constant' },
  ROW: { mayDepend: 'all', condition: 'always; no value is looked at' },
  ROWS: { mayDepend: 'all', condition: 'always; no value is looked at' },
  COLUMN: { mayDepend: 'all', condition: 'always; no value is looked at' },
  COLUMNS: { mayDepend: 'all', condition: 'always; no value is looked at' },
  FILTER: { mayDepend: (argument) => argument !== 1, condition: 'what is kept is decided by constants' },
  HSTACK: { mayDepend: 'all', condition: 'always' },
  VSTACK: { mayDepend: 'all', condition: 'always' },
  TAKE: { mayDepend: first, condition: 'how many is constant' },
  DROP: { mayDepend: first, condition: 'how many is constant' },
  CHOOSEROWS: { mayDepend: first, condition: 'which ones is constant' },
  CHOOSECOLS: { mayDepend: first, condition: 'which ones is constant' },
  TOROW: { mayDepend: first, condition: 'blanks are not left out' },
  TOCOL: { mayDepend: first, condition: 'blanks are not left out' },
  BYROW: { mayDepend: 'all', condition: 'what the lambda does keeps forms affine' },
  BYCOL: { mayDepend: 'all', condition: 'what the lambda does keeps forms affine' },
  MAP: { mayDepend: 'all', condition: 'what the lambda does keeps forms affine' },
  REDUCE: { mayDepend: 'all', condition: 'what the lambda does keeps forms affine' },
  SCAN: { mayDepend: 'all', condition: 'what the lambda does keeps forms affine' },
};

/** Functions that decide for themselves what is worked out; their conditions are those of their code. */
export const affineConditions: Readonly<Record<string, string>> = {
  IF: 'the condition is constant',
  IFS: 'the conditions are constant',
  CHOOSE: 'the number is constant',
  SWITCH: 'what is compared is constant',
  IFERROR: 'always; an affine form is no error',
  IFNA: 'always; an affine form is no error',
  LET: 'what is done with the names keeps forms affine',
};

export function acceptsDependent(functionName: string, argument: number): boolean {
  // The table has no prototype's names in it: `constructor` is no function.
  const entry = Object.hasOwn(affineFunctions, functionName) ? affineFunctions[functionName] : undefined;
  return entry !== undefined && (entry.mayDepend === 'all' || entry.mayDepend(argument));
}
