/**
 * Functions that call a LAMBDA for parts of arrays. What the lambda does decides whether a form stays affine.
 */
import { toInteger } from '../coercions';
import { errorValue, Lambda, Matrix, type Scalar, type Value } from '../evaluated-value';
import { errorSignal } from '../evaluation-refusal';
import { refuseTooLarge } from '../array-size';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';

function lambdaOf(value: Value): Lambda {
  if (!(value instanceof Lambda)) {
    throw errorSignal(errorValue.value);
  }
  return value;
}

/** One value of a call; an array has no place within an array. */
function callForScalar(lambda: Lambda, values: readonly Value[], context: FunctionContext): Scalar {
  const result = context.callLambda(lambda, values);
  const matrix = context.matrixOf(result);
  return matrix.values.length === 1 ? matrix.values[0] : errorValue.calculation;
}

function byLines(isRow: boolean) {
  return generalFunction(2, 2, ([source, called], context) => {
    const lambda = lambdaOf(called);
    const matrix = context.matrixOf(source);
    const count = isRow ? matrix.rowCount : matrix.columnCount;
    const results = Array.from({ length: count }, (_line, at) => {
      const line = isRow
        ? matrix.values.slice(at * matrix.columnCount, (at + 1) * matrix.columnCount)
        : Array.from(
            { length: matrix.rowCount },
            (_row, row) => matrix.values[row * matrix.columnCount + at],
          );
      const part = isRow ? new Matrix(1, line.length, line) : new Matrix(line.length, 1, line);
      return callForScalar(lambda, [part], context);
    });
    return isRow ? new Matrix(count, 1, results) : new Matrix(1, count, results);
  });
}

/** The values one after another, each with what came of those before. */
function accumulate(
  [start, source, called]: readonly Value[],
  context: FunctionContext,
  visit: (value: Value) => void,
): Value {
  const lambda = lambdaOf(called);
  let accumulated: Value = start;
  for (const element of context.matrixOf(source).values) {
    accumulated = context.callLambda(lambda, [accumulated, element]);
    visit(accumulated);
  }
  return accumulated;
}

export const lambdas: FunctionTable = {
  BYROW: byLines(true),
  BYCOL: byLines(false),
  MAP: generalFunction(2, 254, (values, context) => {
    const lambda = lambdaOf(values[values.length - 1]);
    return context.lift(values.slice(0, -1), (scalars) => callForScalar(lambda, scalars, context));
  }),
  REDUCE: generalFunction(3, 3, (values, context) => accumulate(values, context, () => undefined)),
  SCAN: generalFunction(3, 3, (values, context) => {
    const { rowCount, columnCount } = context.matrixOf(values[1]);
    const results: Scalar[] = [];
    accumulate(values, context, (value) => results.push(context.scalarOf(value)));
    return new Matrix(rowCount, columnCount, results);
  }),
  MAKEARRAY: generalFunction(3, 3, ([rows, columns, called], context) => {
    const lambda = lambdaOf(called);
    const rowCount = toInteger(context.scalarOf(rows));
    const columnCount = toInteger(context.scalarOf(columns));
    if (rowCount < 1 || columnCount < 1) {
      return errorValue.value;
    }
    refuseTooLarge(rowCount * columnCount);
    const results = Array.from({ length: rowCount * columnCount }, (_value, at) =>
      callForScalar(lambda, [Math.floor(at / columnCount) + 1, (at % columnCount) + 1], context),
    );
    return new Matrix(rowCount, columnCount, results);
  }),
};
