/**
 * Counts, averages, extremes and spreads. Only averages keep affine forms affine: how many there are is a constant.
 */
import { CellError } from '../../sheet/cell-value';
import { toInteger, toNumber } from '../coercions';
import { errorValue, isDependent, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal } from '../evaluation-refusal';
import { finite } from '../operators';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';
import { averageOf, forEachAmount, numbersOf } from './counted-amounts';

/** SUBTOTAL's and AGGREGATE's functions over plain numbers, by their number. */
export function aggregateNumbers(functionNumber: number, numbers: readonly number[]): Scalar {
  switch (functionNumber) {
    case 4:
      return greatest(numbers);
    case 5:
      return least(numbers);
    case 7:
      return variance(numbers, 1, Math.sqrt);
    case 8:
      return variance(numbers, 0, Math.sqrt);
    case 10:
      return variance(numbers, 1, (value) => value);
    case 11:
      return variance(numbers, 0, (value) => value);
    case 12:
      return median(numbers);
    case 13:
      return mostFrequent(numbers);
    default:
      return errorValue.value;
  }
}

function greatest(numbers: readonly number[]): number {
  return numbers.length === 0 ? 0 : numbers.reduce((a, b) => Math.max(a, b));
}

function least(numbers: readonly number[]): number {
  return numbers.length === 0 ? 0 : numbers.reduce((a, b) => Math.min(a, b));
}

/** Two passes: the mean first, so that large numbers with small differences keep their digits. */
function variance(numbers: readonly number[], lost: 0 | 1, finish: (value: number) => number): Scalar {
  if (numbers.length <= lost) {
    return errorValue.division;
  }
  const mean = numbers.reduce((a, b) => a + b, 0) / numbers.length;
  const squares = numbers.reduce((sum, number) => sum + (number - mean) ** 2, 0);
  return finite(finish(squares / (numbers.length - lost)));
}

function median(numbers: readonly number[]): Scalar {
  if (numbers.length === 0) {
    return errorValue.number;
  }
  const sorted = ascending(numbers);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

function mostFrequent(numbers: readonly number[]): Scalar {
  const counts = new Map<number, number>();
  numbers.forEach((number) => counts.set(number, (counts.get(number) ?? 0) + 1));
  let best: number | undefined;
  let most = 1;
  for (const [number, count] of counts) {
    if (count > most) {
      best = number;
      most = count;
    }
  }
  return best ?? errorValue.notAvailable;
}

function ascending(numbers: readonly number[]): number[] {
  return [...numbers].sort((a, b) => a - b);
}

function numberAtRank(values: readonly Value[], context: FunctionContext, fromTop: boolean): Scalar {
  const sorted = ascending(numbersOf([values[0]], context));
  const rank = Math.ceil(toNumber(context.scalarOf(values[1])));
  if (rank < 1 || rank > sorted.length) {
    return errorValue.number;
  }
  return fromTop ? sorted[sorted.length - rank] : sorted[rank - 1];
}

function percentile(numbers: readonly number[], share: number): Scalar {
  if (numbers.length === 0 || share < 0 || share > 1) {
    return errorValue.number;
  }
  const sorted = ascending(numbers);
  const place = share * (sorted.length - 1);
  const below = Math.floor(place);
  return below + 1 < sorted.length
    ? sorted[below] + (place - below) * (sorted[below + 1] - sorted[below])
    : sorted[below];
}

function rankOf([value, among, order]: readonly Value[], context: FunctionContext): Scalar {
  const number = toNumber(context.scalarOf(value));
  const numbers = numbersOf([among], context);
  const isAscending = order !== undefined && toNumber(context.scalarOf(order)) !== 0;
  return numbers.includes(number)
    ? 1 + numbers.filter((other) => (isAscending ? other < number : other > number)).length
    : errorValue.notAvailable;
}

function countNumbers(values: readonly Value[], context: FunctionContext): number {
  let count = 0;
  for (const value of values) {
    context.forEachFilled(value, (element, isCell) => {
      if (isDependent(element)) {
        throw dependentValueRefusal();
      }
      const counts = isCell ? typeof element === 'number' : readsAsNumber(element);
      count += counts ? 1 : 0;
    });
  }
  return count;
}

function readsAsNumber(value: Scalar): boolean {
  return (
    typeof value === 'number' ||
    typeof value === 'boolean' ||
    (typeof value === 'string' && value.trim() !== '' && Number.isFinite(Number(value)))
  );
}

/** Extremes and averages of the A kind: texts count 0, TRUE counts 1. */
function numbersWithTexts(values: readonly Value[], context: FunctionContext): number[] {
  const numbers: number[] = [];
  for (const value of values) {
    context.forEachFilled(value, (element, isCell) => {
      if (element instanceof CellError) {
        throw errorSignal(element);
      }
      numbers.push(isCell && typeof element === 'string' ? 0 : toNumber(element));
    });
  }
  return numbers;
}

function ofNumbers(compute: (numbers: readonly number[]) => Scalar) {
  return generalFunction(1, 255, (values, context) => compute(numbersOf(values, context)));
}

const identity = (value: number): number => value;

export const statistics: FunctionTable = {
  AVERAGE: generalFunction(1, 255, (values, context) => {
    const sum = context.newSum();
    let count = 0;
    forEachAmount(values, context, (amount) => {
      sum.add(amount);
      count++;
    });
    return averageOf(sum, count, context);
  }),
  AVERAGEA: generalFunction(1, 255, (values, context) => {
    const numbers = numbersWithTexts(values, context);
    return numbers.length === 0
      ? errorValue.division
      : finite(numbers.reduce((a, b) => a + b, 0) / numbers.length);
  }),
  COUNT: generalFunction(1, 255, countNumbers),
  COUNTA: generalFunction(1, 255, (values, context) => {
    let count = 0;
    values.forEach((value) => context.forEachFilled(value, () => count++));
    return count;
  }),
  COUNTBLANK: generalFunction(1, 1, ([value], context) => {
    const { values } = context.matrixOf(value);
    return values.filter((element) => element === null || element === '').length;
  }),
  MAX: ofNumbers(greatest),
  MIN: ofNumbers(least),
  MAXA: generalFunction(1, 255, (values, context) => greatest(numbersWithTexts(values, context))),
  MINA: generalFunction(1, 255, (values, context) => least(numbersWithTexts(values, context))),
  MEDIAN: ofNumbers(median),
  MODE: ofNumbers(mostFrequent),
  'MODE.SNGL': ofNumbers(mostFrequent),
  LARGE: generalFunction(2, 2, (values, context) => numberAtRank(values, context, true)),
  SMALL: generalFunction(2, 2, (values, context) => numberAtRank(values, context, false)),
  PERCENTILE: generalFunction(2, 2, ([values, share], context) =>
    percentile(numbersOf([values], context), toNumber(context.scalarOf(share))),
  ),
  'PERCENTILE.INC': generalFunction(2, 2, ([values, share], context) =>
    percentile(numbersOf([values], context), toNumber(context.scalarOf(share))),
  ),
  QUARTILE: generalFunction(2, 2, ([values, quarter], context) =>
    percentile(numbersOf([values], context), toInteger(context.scalarOf(quarter)) / 4),
  ),
  RANK: generalFunction(2, 3, rankOf),
  'RANK.EQ': generalFunction(2, 3, rankOf),
  STDEV: ofNumbers((numbers) => variance(numbers, 1, Math.sqrt)),
  'STDEV.S': ofNumbers((numbers) => variance(numbers, 1, Math.sqrt)),
  STDEVP: ofNumbers((numbers) => variance(numbers, 0, Math.sqrt)),
  'STDEV.P': ofNumbers((numbers) => variance(numbers, 0, Math.sqrt)),
  VAR: ofNumbers((numbers) => variance(numbers, 1, identity)),
  'VAR.S': ofNumbers((numbers) => variance(numbers, 1, identity)),
  VARP: ofNumbers((numbers) => variance(numbers, 0, identity)),
  'VAR.P': ofNumbers((numbers) => variance(numbers, 0, identity)),
};
