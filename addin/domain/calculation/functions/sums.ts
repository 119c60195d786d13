/**
 * SUM and its kin. Sums, and products with one depending factor, keep affine forms affine.
 */
import { CellError } from '../../sheet/cell-value';
import { toInteger, toNumber } from '../coercions';
import { errorValue, isDependent, Reference, type Area, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal } from '../evaluation-refusal';
import type { Amount } from '../number-domain';
import { finite, multiplyAmounts } from '../operators';
import { generalFunction, type FunctionContext, type FunctionTable } from '../worksheet-function';
import { averageOf, finiteAmount, forEachAmount } from './counted-amounts';
import { aggregateNumbers } from './statistics';

function sumOf(values: readonly Value[], context: FunctionContext): Scalar {
  const sum = context.newSum();
  for (const value of values) {
    if (value instanceof Reference) {
      value.areas.forEach((area) =>
        sum.add(context.runningTotal(area, (part, from) => sumOfArea(part, from, context))),
      );
    } else {
      forEachAmount([value], context, (amount) => sum.add(amount));
    }
  }
  return finiteAmount(sum.total());
}

function sumOfArea(area: Area, from: Amount | undefined, context: FunctionContext): Amount {
  const sum = context.newSum();
  if (from !== undefined) {
    sum.add(from);
  }
  forEachAmount([new Reference([area])], context, (amount) => sum.add(amount));
  return sum.total();
}

function productOf(values: readonly Value[], context: FunctionContext): Scalar {
  let product: Amount = 1;
  let isEmpty = true;
  forEachAmount(values, context, (amount) => {
    product = multiplyAmounts(product, amount, context.domain, 'PRODUCT');
    isEmpty = false;
  });
  return isEmpty ? 0 : finiteAmount(product);
}

/** One factor of each term may depend on decisions; a term with a factor 0 is 0 whatever the others are. */
function sumProduct(values: readonly Value[], context: FunctionContext): Scalar {
  const matrices = values.map((value) => context.matrixOf(value));
  const [first] = matrices;
  if (matrices.some((m) => m.rowCount !== first.rowCount || m.columnCount !== first.columnCount)) {
    return errorValue.value;
  }
  const sum = context.newSum();
  for (let at = 0; at < first.values.length; at++) {
    let factor = 1;
    let dependent: Amount | undefined;
    let others: Amount[] | undefined;
    for (const matrix of matrices) {
      const value = matrix.values[at];
      if (typeof value === 'number') {
        factor *= value;
      } else if (value instanceof CellError) {
        return value;
      } else if (!isDependent(value)) {
        factor = 0;
      } else if (dependent === undefined) {
        dependent = value;
      } else {
        (others ??= []).push(value);
      }
    }
    if (dependent === undefined) {
      sum.add(factor);
    } else {
      if (others !== undefined && factor !== 0) {
        for (const other of others) {
          dependent = multiplyAmounts(dependent, other, context.domain, 'SUMPRODUCT');
        }
      }
      sum.addMultiple(dependent, factor);
    }
  }
  return finiteAmount(sum.total());
}

/** Sum over pairs of numbers; pairs in which either is no number are passed over. */
function sumOverPairs(term: (x: number, y: number) => number) {
  return generalFunction(2, 2, ([left, right], context) => {
    const a = context.matrixOf(left);
    const b = context.matrixOf(right);
    if (a.rowCount * a.columnCount !== b.rowCount * b.columnCount) {
      return errorValue.notAvailable;
    }
    let sum = 0;
    for (let at = 0; at < a.values.length; at++) {
      const x = a.values[at];
      const y = b.values[at];
      for (const value of [x, y]) {
        if (value instanceof CellError) {
          return value;
        }
        if (isDependent(value)) {
          throw dependentValueRefusal();
        }
      }
      if (typeof x === 'number' && typeof y === 'number') {
        sum += term(x, y);
      }
    }
    return finite(sum);
  });
}

/** What is left of ranges once hidden rows, and cells that are subtotals themselves, are out. */
function shownValues(
  values: readonly Value[],
  leavesOut: {
    readonly hidden: 'no' | 'filtered' | 'all';
    readonly subtotals: boolean;
    readonly errors: boolean;
  },
  context: FunctionContext,
): Scalar[] {
  const shown: Scalar[] = [];
  for (const value of values) {
    if (!(value instanceof Reference)) {
      context.forEachFilled(value, (element) => shown.push(element));
      continue;
    }
    for (const area of value.areas) {
      for (let row = area.top; row <= Math.min(area.bottom, area.grid.sheet.rowCount - 1); row++) {
        const isHidden =
          leavesOut.hidden !== 'no' && context.isRowHidden(area, row, leavesOut.hidden === 'filtered');
        if (isHidden) {
          continue;
        }
        for (let column = area.left; column <= Math.min(area.right, area.grid.columns.length - 1); column++) {
          if (leavesOut.subtotals && context.isSubtotal(area, row, column)) {
            continue;
          }
          const element = context.scalarAt(area, row, column);
          if (element !== null && !(leavesOut.errors && element instanceof CellError)) {
            shown.push(element);
          }
        }
      }
    }
  }
  return shown;
}

/** Functions by the numbers that SUBTOTAL and AGGREGATE know them by. Sum and average keep affine forms affine. */
function aggregateShown(functionNumber: number, shown: readonly Scalar[], context: FunctionContext): Scalar {
  if (functionNumber !== 1 && functionNumber !== 9 && shown.some(isDependent)) {
    throw dependentValueRefusal();
  }
  const sum = context.newSum();
  const numbers: number[] = [];
  let count = 0;
  let filled = 0;
  for (const value of shown) {
    filled++;
    if (value instanceof CellError) {
      if (functionNumber === 2 || functionNumber === 3) {
        continue;
      }
      return value;
    }
    if (typeof value === 'number' || isDependent(value)) {
      sum.add(value);
      count++;
      if (typeof value === 'number') {
        numbers.push(value);
      }
    }
  }
  switch (functionNumber) {
    case 1:
      return averageOf(sum, count, context);
    case 2:
      return count;
    case 3:
      return filled;
    case 6:
      return numbers.length === 0 ? 0 : finite(numbers.reduce((product, number) => product * number, 1));
    case 9:
      return finiteAmount(sum.total());
    default:
      return aggregateNumbers(functionNumber, numbers);
  }
}

export const sums: FunctionTable = {
  SUM: generalFunction(1, 255, sumOf),
  PRODUCT: generalFunction(1, 255, productOf),
  SUMPRODUCT: generalFunction(1, 255, sumProduct),
  SUMSQ: generalFunction(1, 255, (values, context) => {
    let sum = 0;
    forEachAmount(values, context, (amount) => (sum += toNumber(amount) ** 2));
    return finite(sum);
  }),
  SUMX2MY2: sumOverPairs((x, y) => x * x - y * y),
  SUMX2PY2: sumOverPairs((x, y) => x * x + y * y),
  SUMXMY2: sumOverPairs((x, y) => (x - y) ** 2),
  SUBTOTAL: generalFunction(2, 255, ([which, ...values], context) => {
    const functionNumber = toInteger(context.scalarOf(which));
    const kind = functionNumber > 100 ? functionNumber - 100 : functionNumber;
    if (kind < 1 || kind > 11) {
      return errorValue.value;
    }
    const hidden = functionNumber > 100 ? 'all' : 'filtered';
    return aggregateShown(
      kind,
      shownValues(values, { hidden, subtotals: true, errors: false }, context),
      context,
    );
  }),
  AGGREGATE: generalFunction(3, 255, ([which, option, ...values], context) => {
    const functionNumber = toInteger(context.scalarOf(which));
    const options = toInteger(context.scalarOf(option));
    // 14 and up take a second number, such as the rank.
    if (functionNumber < 1 || functionNumber > 13 || options < 0 || options > 7) {
      return errorValue.value;
    }
    const leavesOut = {
      hidden: options % 4 === 1 || options % 4 === 3 ? ('all' as const) : ('no' as const),
      subtotals: options < 4,
      errors: options % 4 >= 2,
    };
    return aggregateShown(functionNumber, shownValues(values, leavesOut, context), context);
  }),
  /** Present worth: the rate must be a constant, the amounts may depend on decisions. */
  NPV: generalFunction(2, 255, ([rate, ...values], context) => {
    const growth = 1 + toNumber(context.scalarOf(rate));
    if (growth === 0) {
      return errorValue.division;
    }
    const sum = context.newSum();
    let period = 0;
    forEachAmount(values, context, (amount) => sum.addMultiple(amount, growth ** -++period));
    return finiteAmount(sum.total());
  }),
};
