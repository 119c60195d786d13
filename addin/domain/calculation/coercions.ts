/**
 * How a worksheet turns one kind of value into another, and compares values. A number that depends on decisions is
 * never turned into anything here: whoever asks for a plain value of it is refused.
 */
import { CellError } from '../sheet/cell-value';
import { significantDigits } from './decimal-rounding';
import { isDependent, errorValue, type Scalar } from './evaluated-value';
import { dependentValueRefusal, errorSignal } from './evaluation-refusal';
import type { Amount } from './number-domain';

/**
 * A number, or one that depends on decisions. Blank is 0, TRUE is 1, a text that reads as a number is that number.
 * @throws ErrorValueSignal for error values and other texts
 */
export function toAmount(value: Scalar): Amount {
  if (typeof value === 'number') {
    return value;
  }
  if (value === null) {
    return 0;
  }
  if (typeof value === 'boolean') {
    return value ? 1 : 0;
  }
  if (value instanceof CellError) {
    throw errorSignal(value);
  }
  return typeof value === 'string' ? numberOfText(value) : value;
}

/** Like toAmount, and refuses what depends on decisions. */
export function toNumber(value: Scalar): number {
  const amount = toAmount(value);
  if (typeof amount !== 'number') {
    throw dependentValueRefusal();
  }
  return amount;
}

/** A number without its fraction, toward zero, as functions take positions and counts: 7.999999999999999 is 8. */
export function toInteger(value: Scalar): number {
  const number = toNumber(value);
  return Number.isInteger(number) ? number : Math.trunc(Number(number.toPrecision(significantDigits)));
}

/**
 * A text that reads as a number: digits with a sign, a point, thousands by commas, an exponent, a percent sign, a
 * dollar sign, or in brackets for a negative one. Texts that read as dates are left to DATEVALUE, which knows the
 * workbook's calendar.
 * @throws ErrorValueSignal #VALUE!
 */
export function numberOfText(text: string): number {
  const number = readNumber(text);
  if (number === undefined) {
    throw errorSignal(errorValue.value);
  }
  return number;
}

/** @returns undefined where the text reads as no number */
export function readNumber(text: string): number | undefined {
  const bracketed = /^\((.*)\)$/.exec(text.trim());
  const match = /^([+-]?)\s*\$?\s*(\d{1,3}(?:,\d{3})+(?:\.\d*)?|\d+\.?\d*|\.\d+)(e[+-]?\d+)?\s*(%?)$/i.exec(
    bracketed === null ? text.trim() : bracketed[1],
  );
  if (match === null) {
    return undefined;
  }
  const [, sign, digits, exponent = '', percent] = match;
  const size = Number(digits.replaceAll(',', '') + exponent) / (percent === '%' ? 100 : 1);
  if (!Number.isFinite(size) || (bracketed !== null && sign !== '')) {
    return undefined;
  }
  return sign === '-' || bracketed !== null ? -size : size;
}

/** A truth value. Numbers are true unless 0; a text is one only if it says so. */
export function toBoolean(value: Scalar): boolean {
  if (typeof value === 'boolean') {
    return value;
  }
  if (value === null) {
    return false;
  }
  if (typeof value === 'string') {
    const upper = value.trim().toUpperCase();
    if (upper === 'TRUE' || upper === 'FALSE') {
      return upper === 'TRUE';
    }
    throw errorSignal(errorValue.value);
  }
  if (isDependent(value)) {
    throw dependentValueRefusal('condition');
  }
  return toNumber(value) !== 0;
}

export function toText(value: Scalar): string {
  if (typeof value === 'string') {
    return value;
  }
  if (value === null) {
    return '';
  }
  if (typeof value === 'boolean') {
    return value ? 'TRUE' : 'FALSE';
  }
  if (isDependent(value)) {
    throw dependentValueRefusal('concatenation');
  }
  return textOfNumber(toNumber(value));
}

/** As `=""&number` shows it: at most 15 digits, an exponent where a plain number would be too long. */
export function textOfNumber(value: number): string {
  const rounded = Number(value.toPrecision(significantDigits));
  const size = Math.abs(rounded);
  if (rounded === 0) {
    return '0';
  }
  if (size >= 1e21 || size < 1e-9) {
    const [mantissa, exponent] = rounded.toExponential().split('e');
    const digits = String(Math.abs(Number(exponent))).padStart(2, '0');
    return `${mantissa}E${Number(exponent) < 0 ? '-' : '+'}${digits}`;
  }
  if (Number.isInteger(rounded)) {
    return size < 1e21 ? BigInt(rounded).toString() : String(rounded);
  }
  const text = String(rounded);
  return text.includes('e') ? rounded.toFixed(20).replace(/0+$/, '') : text;
}

/**
 * Order of two values: negative, 0 or positive. Numbers come before texts, texts before truth values; case does not
 * count; a blank is the 0, the empty text or the FALSE that it is held against.
 * @throws ErrorValueSignal for error values; a refusal for numbers that depend on decisions
 */
export function compareValues(a: Scalar, b: Scalar): number {
  if (typeof a === 'number' && typeof b === 'number') {
    return compareNumbers(a, b);
  }
  refuseUnordered(a);
  refuseUnordered(b);
  const left = a ?? blankBeside(b);
  const right = b ?? blankBeside(a);
  const byKind = kindRank(left) - kindRank(right);
  if (byKind !== 0) {
    return byKind;
  }
  if (typeof left === 'string') {
    return compareTexts(left, right as string);
  }
  return compareNumbers(Number(left), Number(right));
}

export function compareNumbers(a: number, b: number): number {
  if (a === b) {
    return 0;
  }
  const gap = Math.abs(a - b);
  // Only numbers this close can agree in 15 digits; rounding every pair would be slow.
  if (gap < 1e-14 * Math.max(Math.abs(a), Math.abs(b))) {
    return Number(a.toPrecision(significantDigits)) - Number(b.toPrecision(significantDigits));
  }
  return a - b;
}

export function compareTexts(a: string, b: string): number {
  const left = a.toLowerCase();
  const right = b.toLowerCase();
  return left < right ? -1 : left > right ? 1 : 0;
}

function refuseUnordered(value: Scalar): void {
  if (value instanceof CellError) {
    throw errorSignal(value);
  }
  if (isDependent(value)) {
    throw dependentValueRefusal('comparison');
  }
}

function blankBeside(other: Scalar): number | string | boolean {
  return typeof other === 'string' ? '' : typeof other === 'boolean' ? false : 0;
}

function kindRank(value: Scalar): number {
  return typeof value === 'boolean' ? 2 : typeof value === 'string' ? 1 : 0;
}
