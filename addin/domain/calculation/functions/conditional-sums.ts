/**
 * SUMIFS and its kin: sums, averages, counts and extremes of the cells that meet criteria. What is compared must be a
 * constant; what is summed or averaged may depend on decisions.
 */
import { CellError } from '../../sheet/cell-value';
import { compareValues, readNumber } from '../coercions';
import { errorValue, isDependent, type Matrix, Reference, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';
import { averageOf, finiteAmount } from './counted-amounts';
import { patternOf } from './text-pattern';

/** Whether a value meets a criterion such as `">=5"`, `"press*"`, `"<>"`, or a plain value. */
export function criterionOf(criterion: Scalar): (value: Scalar) => boolean {
  if (isDependent(criterion)) {
    throw dependentValueRefusal();
  }
  if (typeof criterion !== 'string') {
    // A blank criterion is taken as 0.
    return matchesEqual(criterion ?? 0);
  }
  const [, sign, operand] = /^(<=|>=|<>|<|>|=)?([\s\S]*)$/.exec(criterion)!;
  const wanted = plainValueOf(operand);
  switch (sign as string | undefined) {
    case undefined:
      return operand === '' ? (value) => value === null || value === '' : matchesEqual(wanted);
    case '=':
      return operand === '' ? (value) => value === null : matchesEqual(wanted);
    case '<>': {
      const isEqual = operand === '' ? (value: Scalar): boolean => value === null : matchesEqual(wanted);
      return (value) => !isEqual(value);
    }
    default:
      return (value) => isSameKind(value, wanted) && meets(sign, compareValues(value, wanted));
  }
}

function meets(sign: string, order: number): boolean {
  switch (sign) {
    case '<':
      return order < 0;
    case '>':
      return order > 0;
    case '<=':
      return order <= 0;
    default:
      return order >= 0;
  }
}

function matchesEqual(wanted: Scalar): (value: Scalar) => boolean {
  if (typeof wanted === 'number') {
    return (value) =>
      typeof value === 'string'
        ? readNumber(value) === wanted
        : typeof value === 'number' && compareValues(value, wanted) === 0;
  }
  if (typeof wanted === 'string') {
    const pattern = patternOf(wanted);
    return (value) => typeof value === 'string' && pattern.test(value);
  }
  return (value) => value === wanted;
}

function isSameKind(a: Scalar, b: Scalar): boolean {
  return a !== null && typeof a === typeof b && !(a instanceof CellError);
}

/** What a criterion's text stands for: a number, a truth value, an error, or itself. */
function plainValueOf(text: string): Scalar {
  const upper = text.toUpperCase();
  if (upper === 'TRUE' || upper === 'FALSE') {
    return upper === 'TRUE';
  }
  if (/^#[A-Z0-9/]+[!?]?$/.test(upper)) {
    return CellError.of(upper);
  }
  return readNumber(text) ?? text;
}

/** Pairs of range and criterion → positions that meet all of them. @throws #VALUE! where shapes differ */
function positionsMeeting(ranges: readonly Matrix[], criteria: readonly Scalar[]): number[] {
  const [first] = ranges;
  if (ranges.some((r) => r.rowCount !== first.rowCount || r.columnCount !== first.columnCount)) {
    throw errorSignal(errorValue.value);
  }
  const tests = criteria.map(criterionOf);
  const positions: number[] = [];
  for (let at = 0; at < first.values.length; at++) {
    let meetsAll = true;
    for (let which = 0; meetsAll && which < tests.length; which++) {
      const value = ranges[which].values[at];
      if (isDependent(value)) {
        throw dependentValueRefusal();
      }
      meetsAll = tests[which](value);
    }
    if (meetsAll) {
      positions.push(at);
    }
  }
  return positions;
}

type Finish = (chosen: readonly Scalar[], context: FunctionContext) => Scalar;

const sumChosen: Finish = (chosen, context) => {
  const sum = context.newSum();
  numericOnly(chosen, (value) => sum.add(value));
  return finiteAmount(sum.total());
};

const averageChosen: Finish = (chosen, context) => {
  const sum = context.newSum();
  let count = 0;
  numericOnly(chosen, (value) => {
    sum.add(value);
    count++;
  });
  return averageOf(sum, count, context);
};

const extremeChosen =
  (pick: (a: number, b: number) => number): Finish =>
  (chosen) => {
    let extreme: number | undefined;
    numericOnly(chosen, (value) => {
      if (typeof value !== 'number') {
        throw dependentValueRefusal();
      }
      extreme = extreme === undefined ? value : pick(extreme, value);
    });
    return extreme ?? 0;
  };

function numericOnly(
  values: readonly Scalar[],
  visit: (value: Extract<Scalar, number | { dependsOnDecisions: true }>) => void,
): void {
  for (const value of values) {
    if (value instanceof CellError) {
      throw errorSignal(value);
    }
    if (typeof value === 'number' || isDependent(value)) {
      visit(value);
    }
  }
}

/** Criteria given as arrays give an array of results. */
function overCriteria(
  sumRange: Matrix | undefined,
  pairs: readonly Value[],
  finish: Finish,
  context: FunctionContext,
): Value {
  if (pairs.length % 2 === 1) {
    return errorValue.value;
  }
  const ranges = pairs.filter((_pair, at) => at % 2 === 0).map((range) => context.matrixOf(range));
  const criteria = pairs.filter((_pair, at) => at % 2 === 1);
  const source = sumRange ?? ranges[0];
  if (source.rowCount !== ranges[0].rowCount || source.columnCount !== ranges[0].columnCount) {
    return errorValue.value;
  }
  return context.lift(criteria, (scalars) =>
    finish(
      positionsMeeting(ranges, scalars).map((at) => source.values[at]),
      context,
    ),
  );
}

/** SUMIF's third argument gives only the first cell; its shape is that of the range compared. */
function shapedLike(range: Value, source: Value | undefined, context: FunctionContext): Matrix | undefined {
  if (source === undefined || source === null) {
    return undefined;
  }
  if (!(source instanceof Reference) || source.areas.length > 1) {
    throw errorSignal(errorValue.value);
  }
  const { rowCount, columnCount } = context.matrixOf(range);
  const [area] = source.areas;
  return context.matrixOf(
    new Reference([{ ...area, bottom: area.top + rowCount - 1, right: area.left + columnCount - 1 }]),
  );
}

function withOneCriterion(finish: Finish) {
  return generalFunction(2, 3, ([range, criterion, source], context) =>
    overCriteria(shapedLike(range, source, context), [range, criterion], finish, context),
  );
}

function withManyCriteria(finish: Finish) {
  return generalFunction(3, 255, ([source, ...pairs], context) =>
    overCriteria(context.matrixOf(source), pairs, finish, context),
  );
}

const countChosen: Finish = (chosen) => chosen.length;

export const conditionalSums: FunctionTable = {
  SUMIF: withOneCriterion(sumChosen),
  AVERAGEIF: withOneCriterion(averageChosen),
  COUNTIF: generalFunction(2, 2, (pairs, context) => overCriteria(undefined, pairs, countChosen, context)),
  COUNTIFS: generalFunction(2, 254, (pairs, context) => overCriteria(undefined, pairs, countChosen, context)),
  SUMIFS: withManyCriteria(sumChosen),
  AVERAGEIFS: withManyCriteria(averageChosen),
  MAXIFS: withManyCriteria(extremeChosen(Math.max)),
  MINIFS: withManyCriteria(extremeChosen(Math.min)),
};
