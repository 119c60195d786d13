/**
 * Rounding, and arithmetic on single numbers. Nothing here may be given a number that depends on decisions.
 */
import { toInteger, toNumber } from '../coercions';
import { roundSize, significantDigits } from '../decimal-rounding';
import { errorValue, type Scalar } from '../evaluated-value';
import { finite, power } from '../operators';
import { generalFunction, scalarFunction, type FunctionTable } from '../worksheet-function';
import { numbersOf } from './counted-amounts';

function byPlaces(round: (size: number) => number, minimum: number) {
  return scalarFunction(minimum, 2, ([value, places]) =>
    finite(roundSize(toNumber(value), places === undefined ? 0 : toInteger(places), round)),
  );
}

/** A quotient without the noise of its last bits: 0.3 / 0.1 is 3. */
function cleanQuotient(a: number, b: number): number {
  return Number((a / b).toPrecision(significantDigits));
}

function toMultiple(
  round: (quotient: number, isNegative: boolean) => number,
  zeroStep: Scalar,
): (values: readonly Scalar[]) => Scalar {
  return ([value, step]) => {
    const number = toNumber(value);
    const size = step === undefined ? 1 : toNumber(step);
    if (number === 0) {
      return 0;
    }
    if (size === 0) {
      return zeroStep;
    }
    return finite(cleanProduct(round(cleanQuotient(number, size), number < 0), size));
  };
}

function cleanProduct(a: number, b: number): number {
  return Number((a * b).toPrecision(significantDigits));
}

function classicMultiple(round: (quotient: number) => number, zeroStep: Scalar) {
  const apply = toMultiple(round, zeroStep);
  return scalarFunction(2, 2, (values) => {
    const [number, step] = [toNumber(values[0]), toNumber(values[1])];
    return number > 0 && step < 0 ? errorValue.number : apply(values);
  });
}

/** CEILING.MATH and FLOOR.MATH: the step's sign does not matter; a mode turns negative numbers the other way. */
function mathMultiple(up: boolean) {
  return scalarFunction(1, 3, ([value, step, mode]) => {
    const number = toNumber(value);
    const size = Math.abs(step === undefined || step === null ? 1 : toNumber(step));
    const awayFromZero = mode !== undefined && toNumber(mode) !== 0 && number < 0;
    if (size === 0 || number === 0) {
      return 0;
    }
    const quotient = cleanQuotient(number, size);
    const goesUp = awayFromZero ? !up : up;
    return finite(cleanProduct(goesUp ? Math.ceil(quotient) : Math.floor(quotient), size));
  });
}

function ofNumber(compute: (number: number) => Scalar) {
  return scalarFunction(1, 1, ([value]) => compute(toNumber(value)));
}

function greatestCommonDivisor(a: number, b: number): number {
  while (b !== 0) {
    [a, b] = [b, a % b];
  }
  return a;
}

export const rounding: FunctionTable = {
  ROUND: byPlaces((size) => Math.floor(size + 0.5), 2),
  ROUNDUP: byPlaces(Math.ceil, 2),
  ROUNDDOWN: byPlaces(Math.floor, 2),
  TRUNC: byPlaces(Math.floor, 1),
  INT: ofNumber((number) => Math.floor(Number(number.toPrecision(significantDigits)))),
  EVEN: ofNumber((number) => Math.sign(number) * 2 * Math.ceil(Math.abs(number) / 2)),
  ODD: ofNumber((number) =>
    number === 0 ? 1 : Math.sign(number) * (2 * Math.ceil((Math.abs(number) - 1) / 2) + 1),
  ),
  CEILING: classicMultiple(Math.ceil, 0),
  FLOOR: classicMultiple(Math.floor, errorValue.division),
  'CEILING.MATH': mathMultiple(true),
  'FLOOR.MATH': mathMultiple(false),
  MROUND: scalarFunction(2, 2, (values) => {
    const [number, step] = [toNumber(values[0]), toNumber(values[1])];
    if (number * step < 0) {
      return errorValue.number;
    }
    return toMultiple((quotient) => Math.floor(quotient + 0.5), 0)(values);
  }),
  ABS: ofNumber(Math.abs),
  SIGN: ofNumber(Math.sign),
  SQRT: ofNumber((number) => (number < 0 ? errorValue.number : Math.sqrt(number))),
  POWER: scalarFunction(2, 2, ([base, exponent]) => power(toNumber(base), toNumber(exponent))),
  EXP: ofNumber((number) => finite(Math.exp(number))),
  LN: ofNumber((number) => (number <= 0 ? errorValue.number : Math.log(number))),
  LOG10: ofNumber((number) => (number <= 0 ? errorValue.number : Math.log10(number))),
  LOG: scalarFunction(1, 2, ([value, base]) => {
    const number = toNumber(value);
    const radix = base === undefined ? 10 : toNumber(base);
    if (number <= 0 || radix <= 0) {
      return errorValue.number;
    }
    if (radix === 1) {
      return errorValue.division;
    }
    return radix === 10
      ? Math.log10(number)
      : radix === 2
        ? Math.log2(number)
        : Math.log(number) / Math.log(radix);
  }),
  PI: scalarFunction(0, 0, () => Math.PI),
  MOD: scalarFunction(2, 2, ([value, divisor]) => {
    const [number, by] = [toNumber(value), toNumber(divisor)];
    return by === 0 ? errorValue.division : finite(number - by * Math.floor(number / by));
  }),
  QUOTIENT: scalarFunction(2, 2, ([value, divisor]) => {
    const [number, by] = [toNumber(value), toNumber(divisor)];
    return by === 0 ? errorValue.division : Math.trunc(number / by);
  }),
  GCD: generalFunction(1, 255, (values, context) => {
    const numbers = numbersOf(values, context).map(Math.trunc);
    return numbers.some((number) => number < 0)
      ? errorValue.number
      : numbers.reduce(greatestCommonDivisor, 0);
  }),
  LCM: generalFunction(1, 255, (values, context) => {
    const numbers = numbersOf(values, context).map(Math.trunc);
    if (numbers.some((number) => number < 0)) {
      return errorValue.number;
    }
    return numbers.reduce((a, b) => (a === 0 || b === 0 ? 0 : (a / greatestCommonDivisor(a, b)) * b), 1);
  }),
};
