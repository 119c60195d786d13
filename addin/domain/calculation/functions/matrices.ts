/**
 * Matrix algebra. Products with one depending factor, and transposing, keep affine forms affine.
 */
import { CellError } from '../../sheet/cell-value';
import { toInteger } from '../coercions';
import { errorValue, isDependent, Matrix, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import type { Amount } from '../number-domain';
import { finite, multiplyAmounts } from '../operators';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';
import { finiteAmount } from './counted-amounts';

/** A matrix of amounts: MMULT and its kin take no blanks or texts. @throws #VALUE! */
function amountsOf(matrix: Matrix): readonly Amount[] {
  return matrix.values.map((value) => {
    if (value instanceof CellError) {
      throw errorSignal(value);
    }
    if (typeof value !== 'number' && !isDependent(value)) {
      throw errorSignal(errorValue.value);
    }
    return value;
  });
}

function multiplyMatrices([left, right]: readonly Value[], context: FunctionContext): Value {
  const a = context.matrixOf(left);
  const b = context.matrixOf(right);
  if (a.columnCount !== b.rowCount) {
    return errorValue.value;
  }
  const x = amountsOf(a);
  const y = amountsOf(b);
  const product: Scalar[] = [];
  for (let row = 0; row < a.rowCount; row++) {
    for (let column = 0; column < b.columnCount; column++) {
      const sum = context.newSum();
      for (let k = 0; k < a.columnCount; k++) {
        const p = x[row * a.columnCount + k];
        const q = y[k * b.columnCount + column];
        if (typeof p === 'number') {
          sum.addMultiple(q, p);
        } else if (typeof q === 'number') {
          sum.addMultiple(p, q);
        } else {
          sum.add(multiplyAmounts(p, q, context.domain, 'MMULT'));
        }
      }
      product.push(finiteAmount(sum.total()));
    }
  }
  return new Matrix(a.rowCount, b.columnCount, product);
}

function transpose([value]: readonly Value[], context: FunctionContext): Value {
  const matrix = context.matrixOf(value);
  const turned: Scalar[] = [];
  for (let column = 0; column < matrix.columnCount; column++) {
    for (let row = 0; row < matrix.rowCount; row++) {
      turned.push(matrix.values[row * matrix.columnCount + column] ?? 0);
    }
  }
  return new Matrix(matrix.columnCount, matrix.rowCount, turned);
}

function squareRows(value: Value, context: FunctionContext): number[][] {
  const matrix = context.matrixOf(value);
  if (matrix.rowCount !== matrix.columnCount) {
    throw errorSignal(errorValue.value);
  }
  const amounts = amountsOf(matrix);
  if (amounts.some((amount) => typeof amount !== 'number')) {
    throw dependentValueRefusal();
  }
  const n = matrix.rowCount;
  return Array.from({ length: n }, (_row, i) => amounts.slice(i * n, (i + 1) * n) as number[]);
}

/**
 * Gauss-Jordan elimination with partial pivoting, on copies of the rows.
 * @returns determinant; the right-hand rows become inverse × what they were
 * Source: Golub and Van Loan (2013), "Matrix Computations", 4th ed., §3.4
 */
function eliminate(rows: number[][], rightHand: number[][]): number {
  const n = rows.length;
  let determinant = 1;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) {
      if (Math.abs(rows[i][k]) > Math.abs(rows[pivot][k])) {
        pivot = i;
      }
    }
    if (rows[pivot][k] === 0) {
      return 0;
    }
    if (pivot !== k) {
      [rows[k], rows[pivot]] = [rows[pivot], rows[k]];
      [rightHand[k], rightHand[pivot]] = [rightHand[pivot], rightHand[k]];
      determinant = -determinant;
    }
    const scale = rows[k][k];
    determinant *= scale;
    rows[k] = rows[k].map((value) => value / scale);
    rightHand[k] = rightHand[k].map((value) => value / scale);
    for (let i = 0; i < n; i++) {
      const factor = rows[i][k];
      if (i !== k && factor !== 0) {
        rows[i] = rows[i].map((value, j) => value - factor * rows[k][j]);
        rightHand[i] = rightHand[i].map((value, j) => value - factor * rightHand[k][j]);
      }
    }
  }
  return determinant;
}

function identityRows(n: number): number[][] {
  return Array.from({ length: n }, (_row, i) => Array.from({ length: n }, (_column, j) => (i === j ? 1 : 0)));
}

export const matrices: FunctionTable = {
  MMULT: generalFunction(2, 2, multiplyMatrices),
  TRANSPOSE: generalFunction(1, 1, transpose),
  MINVERSE: generalFunction(1, 1, ([value], context) => {
    const rows = squareRows(value, context);
    const inverse = identityRows(rows.length);
    return eliminate(rows, inverse) === 0
      ? errorValue.number
      : new Matrix(rows.length, rows.length, inverse.flat().map(finite));
  }),
  MDETERM: generalFunction(1, 1, ([value], context) => {
    const rows = squareRows(value, context);
    return finite(
      eliminate(
        rows,
        rows.map(() => []),
      ),
    );
  }),
  MUNIT: generalFunction(1, 1, ([value], context) => {
    const n = toInteger(context.scalarOf(value));
    return n < 1 || n > 1000 ? errorValue.value : new Matrix(n, n, identityRows(n).flat());
  }),
};
