/**
 * Look-ups and references. Keys, and what they are held against, must be constants; what is found may depend on
 * decisions.
 */
import { CellError } from '../../sheet/cell-value';
import { maximumColumnCount, maximumRowCount } from '../../sheet/cell-address';
import { compareValues, toBoolean, toInteger, toText } from '../coercions';
import {
  errorValue,
  isDependent,
  Lambda,
  Matrix,
  Reference,
  type Area,
  type Scalar,
  type Value,
} from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';
import { hasWildcards, patternOf } from './text-pattern';

type MatchMode = 'exact' | 'wildcard' | 'next-smaller' | 'next-larger';

/** What a look-up compares: numbers with numbers, texts with texts. */
function kindOf(value: Scalar): 'number' | 'string' | 'boolean' | undefined {
  if (isDependent(value)) {
    throw dependentValueRefusal();
  }
  const kind = typeof value;
  return kind === 'number' || kind === 'string' || kind === 'boolean' ? kind : undefined;
}

/** @returns position of the value found, or −1 */
function findPosition(wanted: Scalar, among: readonly Scalar[], mode: MatchMode, fromEnd: boolean): number {
  const kind = kindOf(wanted);
  if (kind === undefined) {
    return -1;
  }
  if ((mode === 'exact' || mode === 'wildcard') && !fromEnd && kind === 'number') {
    return positionOfNumber(wanted as number, among);
  }
  const pattern =
    mode === 'wildcard' && typeof wanted === 'string' && hasWildcards(wanted) ? patternOf(wanted) : undefined;
  let nearest = -1;
  for (let step = 0; step < among.length; step++) {
    const at = fromEnd ? among.length - 1 - step : step;
    const value = among[at];
    if (kindOf(value) !== kind) {
      continue;
    }
    if (pattern !== undefined) {
      if (pattern.test(value as string)) {
        return at;
      }
      continue;
    }
    const order = compareValues(value, wanted);
    if (order === 0) {
      return at;
    }
    const isCandidate = (mode === 'next-smaller' && order < 0) || (mode === 'next-larger' && order > 0);
    if (isCandidate) {
      const closer = nearest < 0 ? 0 : compareValues(value, among[nearest]);
      if (nearest < 0 || (mode === 'next-smaller' ? closer > 0 : closer < 0)) {
        nearest = at;
      }
    }
  }
  return nearest;
}

/** The usual look-up, of a number in a long column, without a call a cell. */
function positionOfNumber(wanted: number, among: readonly Scalar[]): number {
  for (let at = 0; at < among.length; at++) {
    const value = among[at];
    if (typeof value === 'number') {
      if (value === wanted || (Math.abs(value - wanted) < 1e-9 && compareValues(value, wanted) === 0)) {
        return at;
      }
    } else if (isDependent(value)) {
      throw dependentValueRefusal();
    }
  }
  return -1;
}

/** In a sorted line: the last that is not beyond the value wanted. @returns −1 where even the first is beyond */
function findInSorted(wanted: Scalar, among: readonly Scalar[], isDescending: boolean): number {
  const kind = kindOf(wanted);
  let found = -1;
  for (let at = 0; at < among.length; at++) {
    const value = among[at];
    if (kindOf(value) !== kind) {
      continue;
    }
    const order = compareValues(value, wanted);
    if (isDescending ? order < 0 : order > 0) {
      break;
    }
    found = at;
    if (isDescending && order === 0) {
      break;
    }
  }
  return found;
}

function lineOf(value: Value, context: FunctionContext): readonly Scalar[] {
  const matrix = context.matrixOf(value);
  if (matrix.rowCount > 1 && matrix.columnCount > 1) {
    throw errorSignal(errorValue.notAvailable);
  }
  return matrix.values;
}

function keyOf(value: Scalar): Scalar {
  if (value instanceof CellError) {
    throw errorSignal(value);
  }
  return value ?? 0;
}

function match([wanted, among, type]: readonly Value[], context: FunctionContext): Value {
  const line = lineOf(among, context);
  const matchType = type === undefined ? 1 : Math.sign(toInteger(context.scalarOf(type)));
  return context.lift([wanted], ([scalar]) => {
    const key = keyOf(scalar);
    const at =
      matchType === 0 ? findPosition(key, line, 'wildcard', false) : findInSorted(key, line, matchType < 0);
    return at < 0 ? errorValue.notAvailable : at + 1;
  });
}

function matchModeOf(value: Value | undefined, context: FunctionContext): MatchMode {
  switch (value === undefined ? 0 : toInteger(context.scalarOf(value))) {
    case 0:
      return 'exact';
    case -1:
      return 'next-smaller';
    case 1:
      return 'next-larger';
    case 2:
      return 'wildcard';
    default:
      throw errorSignal(errorValue.value);
  }
}

/** Search modes: 1 and 2 from the first, −1 and −2 from the last. */
function searchesFromEnd(value: Value | undefined, context: FunctionContext): boolean {
  const mode = value === undefined || value === null ? 1 : toInteger(context.scalarOf(value));
  if (mode === 0 || Math.abs(mode) > 2) {
    throw errorSignal(errorValue.value);
  }
  return mode < 0;
}

function xmatch([wanted, among, mode, search]: readonly Value[], context: FunctionContext): Value {
  const line = lineOf(among, context);
  const matchMode = matchModeOf(mode, context);
  const fromEnd = searchesFromEnd(search, context);
  return context.lift([wanted], ([scalar]) => {
    const at = findPosition(keyOf(scalar), line, matchMode, fromEnd);
    return at < 0 ? errorValue.notAvailable : at + 1;
  });
}

function xlookup(values: readonly Value[], context: FunctionContext): Value {
  const [wanted, among, results, instead, mode, search] = values;
  const keys = context.matrixOf(among);
  if (keys.rowCount > 1 && keys.columnCount > 1) {
    return errorValue.value;
  }
  const isUpright = keys.columnCount === 1;
  const matchMode = matchModeOf(mode, context);
  const fromEnd = searchesFromEnd(search, context);
  const find = (scalar: Scalar): number => findPosition(keyOf(scalar), keys.values, matchMode, fromEnd);
  const notFound = instead === undefined ? errorValue.notAvailable : instead;
  const wantedMatrix = context.matrixOf(wanted);
  if (wantedMatrix.values.length === 1) {
    const at = find(wantedMatrix.values[0]);
    return at < 0
      ? notFound
      : isUpright
        ? lineAt(results, at, undefined, context)
        : lineAt(results, undefined, at, context);
  }
  const source = context.matrixOf(results);
  return context.lift([wantedMatrix], ([scalar]) => {
    const at = find(scalar);
    return at < 0 ? context.scalarOf(notFound) : isUpright ? source.at(at, 0) : source.at(0, at);
  });
}

/** A row, a column or a cell of a range or array, positions from 0; undefined takes all. */
function lineAt(
  source: Value,
  row: number | undefined,
  column: number | undefined,
  context: FunctionContext,
): Value {
  if (source instanceof Reference) {
    const [area] = source.areas;
    const top = row === undefined ? area.top : area.top + row;
    const left = column === undefined ? area.left : area.left + column;
    const bottom = row === undefined ? area.bottom : top;
    const right = column === undefined ? area.right : left;
    return top > area.bottom || left > area.right || top < area.top || left < area.left
      ? errorValue.reference
      : new Reference([{ grid: area.grid, top, left, bottom, right }]);
  }
  const matrix = context.matrixOf(source);
  const rows = row === undefined ? range(matrix.rowCount) : [row];
  const columns = column === undefined ? range(matrix.columnCount) : [column];
  if (rows[0] >= matrix.rowCount || columns[0] >= matrix.columnCount || rows[0] < 0 || columns[0] < 0) {
    return errorValue.reference;
  }
  const chosen = rows.flatMap((r) => columns.map((c) => matrix.values[r * matrix.columnCount + c]));
  return chosen.length === 1 ? chosen[0] : new Matrix(rows.length, columns.length, chosen);
}

function range(count: number): number[] {
  return Array.from({ length: count }, (_value, at) => at);
}

function shapeOf(value: Value, context: FunctionContext): { rowCount: number; columnCount: number } {
  if (value instanceof Reference) {
    const [area] = value.areas;
    return { rowCount: area.bottom - area.top + 1, columnCount: area.right - area.left + 1 };
  }
  return context.matrixOf(value);
}

function index([source, row, column, areaNumber]: readonly Value[], context: FunctionContext): Value {
  let from = source;
  if (source instanceof Reference && (source.areas.length > 1 || areaNumber !== undefined)) {
    const which = areaNumber === undefined ? 1 : toInteger(context.scalarOf(areaNumber));
    if (which < 1 || which > source.areas.length) {
      return errorValue.reference;
    }
    from = new Reference([source.areas[which - 1]]);
  }
  if (from instanceof CellError) {
    return from;
  }
  const { rowCount } = shapeOf(from, context);
  const first = row === undefined || row === null ? 0 : toInteger(context.scalarOf(row));
  // One number for a single row counts along it.
  const isAlongRow = rowCount === 1 && column === undefined;
  const rowNumber = isAlongRow ? 0 : first;
  const columnNumber = isAlongRow
    ? first
    : column === undefined || column === null
      ? 0
      : toInteger(context.scalarOf(column));
  if (rowNumber < 0 || columnNumber < 0) {
    return errorValue.value;
  }
  const { columnCount } = shapeOf(from, context);
  const takesWholeColumn = rowNumber === 0 && rowCount > 1;
  const takesWholeRow = columnNumber === 0 && columnCount > 1;
  return lineAt(
    from,
    takesWholeColumn ? undefined : Math.max(0, rowNumber - 1),
    takesWholeRow ? undefined : Math.max(0, columnNumber - 1),
    context,
  );
}

/** VLOOKUP and HLOOKUP: keys in the first column or row of a table. */
function lookupInTable(isUpright: boolean) {
  return generalFunction(3, 4, ([wanted, table, which, approximate], context) => {
    const { rowCount, columnCount } = shapeOf(table, context);
    const keyLine = isUpright ? lineAt(table, undefined, 0, context) : lineAt(table, 0, undefined, context);
    const keys = context.matrixOf(keyLine).values;
    const isSorted = approximate === undefined || toBoolean(context.scalarOf(approximate));
    const find = (scalar: Scalar): number => {
      const key = keyOf(scalar);
      return isSorted ? findInSorted(key, keys, false) : findPosition(key, keys, 'wildcard', false);
    };
    const offset = toInteger(context.scalarOf(which));
    if (offset < 1) {
      return errorValue.value;
    }
    if (offset > (isUpright ? columnCount : rowCount)) {
      return errorValue.reference;
    }
    const found = (at: number): Value =>
      isUpright ? lineAt(table, at, offset - 1, context) : lineAt(table, offset - 1, at, context);
    return context.lift([wanted], ([scalar]) => {
      const at = find(scalar);
      return at < 0 ? errorValue.notAvailable : context.scalarOf(found(at));
    });
  });
}

/** The old look-up: keys sorted; without results, the longer side's first line has the keys, its last the results. */
function lookup([wanted, keysOrTable, results]: readonly Value[], context: FunctionContext): Value {
  let keyLine = keysOrTable;
  let resultLine = results;
  if (resultLine === undefined) {
    const { rowCount, columnCount } = shapeOf(keysOrTable, context);
    const isWide = columnCount > rowCount;
    keyLine = isWide
      ? lineAt(keysOrTable, 0, undefined, context)
      : lineAt(keysOrTable, undefined, 0, context);
    resultLine = isWide
      ? lineAt(keysOrTable, rowCount - 1, undefined, context)
      : lineAt(keysOrTable, undefined, columnCount - 1, context);
  }
  const keys = lineOf(keyLine, context);
  const found = lineOf(resultLine, context);
  return context.lift([wanted], ([scalar]) => {
    const at = findInSorted(keyOf(scalar), keys, false);
    return at < 0 || at >= found.length ? errorValue.notAvailable : found[at];
  });
}

function offset([base, rows, columns, height, width]: readonly Value[], context: FunctionContext): Value {
  if (!(base instanceof Reference) || base.areas.length > 1) {
    return base instanceof CellError ? base : errorValue.value;
  }
  const [area] = base.areas;
  const number = (value: Value | undefined, otherwise: number): number =>
    value === undefined || value === null ? otherwise : toInteger(context.scalarOf(value));
  const rowCount = number(height, area.bottom - area.top + 1);
  const columnCount = number(width, area.right - area.left + 1);
  const firstRow = area.top + number(rows, 0);
  const firstColumn = area.left + number(columns, 0);
  if (rowCount === 0 || columnCount === 0) {
    return errorValue.reference;
  }
  // A negative height or width reaches up or to the left.
  const top = rowCount > 0 ? firstRow : firstRow + rowCount + 1;
  const left = columnCount > 0 ? firstColumn : firstColumn + columnCount + 1;
  const moved: Area = {
    grid: area.grid,
    top,
    left,
    bottom: top + Math.abs(rowCount) - 1,
    right: left + Math.abs(columnCount) - 1,
  };
  return top < 0 || left < 0 || moved.bottom >= maximumRowCount || moved.right >= maximumColumnCount
    ? errorValue.reference
    : new Reference([moved]);
}

/** Row or column numbers of a reference, from 1; the formula's own without one. */
function placeNumbers(isRow: boolean) {
  return generalFunction(0, 1, ([value], context) => {
    if (value === undefined) {
      return (isRow ? context.row : context.column) + 1;
    }
    if (!(value instanceof Reference)) {
      return value instanceof CellError ? value : errorValue.value;
    }
    const [area] = value.areas;
    const first = isRow ? area.top : area.left;
    const count = isRow ? area.bottom - area.top + 1 : area.right - area.left + 1;
    const numbers = range(count).map((at) => first + at + 1);
    return count === 1 ? numbers[0] : isRow ? new Matrix(count, 1, numbers) : new Matrix(1, count, numbers);
  });
}

function lineCount(isRow: boolean) {
  return generalFunction(1, 1, ([value], context) => {
    if (value instanceof CellError) {
      return value;
    }
    if (value instanceof Lambda) {
      return errorValue.value;
    }
    const { rowCount, columnCount } = shapeOf(value, context);
    return isRow ? rowCount : columnCount;
  });
}

export const lookups: FunctionTable = {
  INDEX: generalFunction(1, 4, index),
  MATCH: generalFunction(2, 3, match),
  XMATCH: generalFunction(2, 4, xmatch),
  XLOOKUP: generalFunction(3, 6, xlookup),
  VLOOKUP: lookupInTable(true),
  HLOOKUP: lookupInTable(false),
  LOOKUP: generalFunction(2, 3, lookup),
  OFFSET: generalFunction(3, 5, offset),
  INDIRECT: generalFunction(1, 2, ([text, isA1], context) =>
    isA1 !== undefined && !toBoolean(context.scalarOf(isA1))
      ? errorValue.reference
      : context.referenceOfText(toText(context.scalarOf(text))),
  ),
  ROW: placeNumbers(true),
  COLUMN: placeNumbers(false),
  ROWS: lineCount(true),
  COLUMNS: lineCount(false),
};
