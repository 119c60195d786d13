/**
 * The amounts that count in sums and averages.
 *
 * In ranges and arrays only numbers count: blanks, texts and truth values are passed over. Written as arguments of
 * their own, texts that read as numbers and truth values count.
 */
import { CellError } from '../../sheet/cell-value';
import { toAmount, toNumber } from '../coercions';
import { errorValue, type Scalar, type Value } from '../evaluated-value';
import { errorSignal } from '../evaluation-refusal';
import type { Amount, AmountSum } from '../number-domain';
import { finite } from '../operators';
import type { FunctionContext } from '../worksheet-function';

/** Visits every amount that counts in a sum. @throws ErrorValueSignal for the first error value */
export function forEachAmount(
  values: readonly Value[],
  context: FunctionContext,
  visit: (amount: Amount) => void,
): void {
  for (const value of values) {
    context.forEachFilled(value, (element, isCell) => {
      const amount = countedAmount(element, isCell);
      if (amount !== undefined) {
        visit(amount);
      }
    });
  }
}

function countedAmount(value: Scalar, isCell: boolean): Amount | undefined {
  if (typeof value === 'number') {
    return value;
  }
  if (value instanceof CellError) {
    throw errorSignal(value);
  }
  if (isCell && (typeof value === 'string' || typeof value === 'boolean')) {
    return undefined;
  }
  return toAmount(value);
}

/** The numbers that count. @throws a refusal where one depends on decisions */
export function numbersOf(values: readonly Value[], context: FunctionContext): number[] {
  const numbers: number[] = [];
  forEachAmount(values, context, (amount) => numbers.push(toNumber(amount)));
  return numbers;
}

export function averageOf(sum: AmountSum, count: number, context: FunctionContext): Scalar {
  if (count === 0) {
    return errorValue.division;
  }
  const total = sum.total();
  return typeof total === 'number' ? finite(total / count) : context.domain.divide(total, count);
}

export function finiteAmount(amount: Amount): Scalar {
  return typeof amount === 'number' ? finite(amount) : amount;
}
