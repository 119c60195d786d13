/**
 * Arrays made, cut and put together. Values that depend on decisions pass through; what chooses among them must be
 * constant.
 */
import { CellError } from '../../sheet/cell-value';
import { compareValues, toBoolean, toInteger, toNumber } from '../coercions';
import { errorValue, isDependent, Matrix, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import { refuseTooLarge } from '../array-size';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';

function rowsOf(matrix: Matrix): Scalar[][] {
  return Array.from({ length: matrix.rowCount }, (_row, at) =>
    matrix.values.slice(at * matrix.columnCount, (at + 1) * matrix.columnCount),
  );
}

/** @throws ErrorValueSignal #CALC! for an array of nothing */
function matrixOfRows(rows: readonly (readonly Scalar[])[]): Matrix {
  if (rows.length === 0 || rows[0].length === 0) {
    throw errorSignal(errorValue.calculation);
  }
  return new Matrix(rows.length, rows[0].length, rows.flat());
}

function turned(rows: readonly (readonly Scalar[])[]): Scalar[][] {
  return rows.length === 0 ? [] : rows[0].map((_value, column) => rows.map((row) => row[column]));
}

function optionalInteger(value: Value | undefined, otherwise: number, context: FunctionContext): number {
  return value === undefined || value === null ? otherwise : toInteger(context.scalarOf(value));
}

function filter([source, include, instead]: readonly Value[], context: FunctionContext): Value {
  const rows = rowsOf(context.matrixOf(source));
  const chosen = context.matrixOf(include);
  const byRow = chosen.columnCount === 1 && chosen.rowCount === rows.length;
  const byColumn = chosen.rowCount === 1 && chosen.columnCount === rows[0].length;
  if (!byRow && !byColumn) {
    return errorValue.value;
  }
  const lines = byRow ? rows : turned(rows);
  const kept = lines.filter((_line, at) => toBoolean(chosen.values[at]));
  if (kept.length === 0) {
    return instead ?? errorValue.calculation;
  }
  return matrixOfRows(byRow ? kept : turned(kept));
}

function sequence([rows, columns, start, step]: readonly Value[], context: FunctionContext): Value {
  const rowCount = optionalInteger(rows, 1, context);
  const columnCount = optionalInteger(columns, 1, context);
  const first = start === undefined || start === null ? 1 : toNumber(context.scalarOf(start));
  const by = step === undefined || step === null ? 1 : toNumber(context.scalarOf(step));
  if (rowCount < 1 || columnCount < 1) {
    return errorValue.calculation;
  }
  refuseTooLarge(rowCount * columnCount);
  const values = Array.from({ length: rowCount * columnCount }, (_value, at) => first + at * by);
  return new Matrix(rowCount, columnCount, values);
}

/** Lines compared value by value. @throws a refusal where one depends on decisions */
function lineKey(line: readonly Scalar[]): string {
  return line
    .map((value) => {
      if (isDependent(value)) {
        throw dependentValueRefusal();
      }
      return `${typeof value}:${value instanceof CellError ? value.code : String(value).toLowerCase()}`;
    })
    .join('\u0000');
}

function unique([source, byColumn, onlyOnce]: readonly Value[], context: FunctionContext): Value {
  const isByColumn = byColumn !== undefined && toBoolean(context.scalarOf(byColumn));
  const isOnlyOnce = onlyOnce !== undefined && toBoolean(context.scalarOf(onlyOnce));
  const rows = rowsOf(context.matrixOf(source));
  const lines = isByColumn ? turned(rows) : rows;
  const counts = new Map<string, number>();
  const keys = lines.map(lineKey);
  keys.forEach((key) => counts.set(key, (counts.get(key) ?? 0) + 1));
  const kept = lines.filter((_line, at) =>
    isOnlyOnce ? counts.get(keys[at]) === 1 : keys.indexOf(keys[at]) === at,
  );
  return matrixOfRows(isByColumn ? turned(kept) : kept);
}

function sort([source, by, order, byColumn]: readonly Value[], context: FunctionContext): Value {
  const isByColumn = byColumn !== undefined && toBoolean(context.scalarOf(byColumn));
  const rows = rowsOf(context.matrixOf(source));
  const lines = isByColumn ? turned(rows) : rows;
  const at = optionalInteger(by, 1, context) - 1;
  const direction = optionalInteger(order, 1, context);
  if (at < 0 || at >= lines[0].length || Math.abs(direction) !== 1) {
    return errorValue.value;
  }
  const sorted = [...lines].sort((a, b) => compareSorted(a[at], b[at], direction));
  return matrixOfRows(isByColumn ? turned(sorted) : sorted);
}

/** Blanks come last, whichever way. */
function compareSorted(a: Scalar, b: Scalar, direction: number): number {
  if (a === null || b === null) {
    return a === b ? 0 : a === null ? 1 : -1;
  }
  return direction * compareValues(a, b);
}

/** Side by side or one below another; the shorter ones are filled up with #N/A. */
function stack(values: readonly Value[], isDown: boolean, context: FunctionContext): Value {
  const blocks = values.map((value) => {
    const rows = rowsOf(context.matrixOf(value));
    return isDown ? rows : turned(rows);
  });
  const width = Math.max(...blocks.map((rows) => rows[0].length));
  const lines = blocks.flatMap((rows) =>
    rows.map((row) => [...row, ...new Array<Scalar>(width - row.length).fill(errorValue.notAvailable)]),
  );
  return matrixOfRows(isDown ? lines : turned(lines));
}

function takeOrDrop(isTaking: boolean) {
  return generalFunction(2, 3, ([source, rowCount, columnCount], context) => {
    const rows = rowsOf(context.matrixOf(source));
    const part = <T>(lines: readonly T[], count: Value | undefined): readonly T[] => {
      if (count === undefined || count === null) {
        return lines;
      }
      const number = toInteger(context.scalarOf(count));
      const size = Math.min(Math.abs(number), lines.length);
      const fromStart = number >= 0 === isTaking;
      const kept = isTaking ? size : lines.length - size;
      return fromStart ? lines.slice(0, kept) : lines.slice(lines.length - kept);
    };
    return matrixOfRows(part(rows, rowCount).map((row) => part(row, columnCount)));
  });
}

function chooseLines(isRow: boolean) {
  return generalFunction(2, 255, ([source, ...which], context) => {
    const rows = rowsOf(context.matrixOf(source));
    const lines = isRow ? rows : turned(rows);
    const chosen = which
      .flatMap((value) => context.matrixOf(value).values)
      .map((value) => {
        const number = toInteger(value);
        const at = number < 0 ? lines.length + number : number - 1;
        if (number === 0 || at < 0 || at >= lines.length) {
          throw errorSignal(errorValue.value);
        }
        return lines[at];
      });
    return matrixOfRows(isRow ? chosen : turned(chosen));
  });
}

/** `ignore`: 1 leaves out blanks, 2 errors, 3 both. */
function toLine(isRow: boolean) {
  return generalFunction(1, 3, ([source, ignore, byColumn], context) => {
    const leavesOut = optionalInteger(ignore, 0, context);
    const isByColumn = byColumn !== undefined && toBoolean(context.scalarOf(byColumn));
    const rows = rowsOf(context.matrixOf(source));
    const values = (isByColumn ? turned(rows) : rows)
      .flat()
      .filter(
        (value) =>
          !(leavesOut % 2 === 1 && value === null) && !(leavesOut >= 2 && value instanceof CellError),
      );
    return matrixOfRows(isRow ? [values] : values.map((value) => [value]));
  });
}

export const arrays: FunctionTable = {
  FILTER: generalFunction(2, 3, filter),
  SEQUENCE: generalFunction(1, 4, sequence),
  UNIQUE: generalFunction(1, 3, unique),
  SORT: generalFunction(1, 4, sort),
  HSTACK: generalFunction(1, 254, (values, context) => stack(values, false, context)),
  VSTACK: generalFunction(1, 254, (values, context) => stack(values, true, context)),
  TAKE: takeOrDrop(true),
  DROP: takeOrDrop(false),
  CHOOSEROWS: chooseLines(true),
  CHOOSECOLS: chooseLines(false),
  TOROW: toLine(true),
  TOCOL: toLine(false),
};
