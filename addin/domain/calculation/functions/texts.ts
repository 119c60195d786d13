/**
 * Texts. Nothing here may be given a number that depends on decisions.
 */
import { CellError } from '../../sheet/cell-value';
import { numberOfText, toBoolean, toInteger, toNumber, toText } from '../coercions';
import { errorValue, isDependent, type Scalar, type Value } from '../evaluated-value';
import { dependentValueRefusal, errorSignal, EvaluationRefusal } from '../evaluation-refusal';
import { roundHalfAway } from '../decimal-rounding';
import {
  generalFunction,
  scalarFunction,
  type FunctionContext,
  type FunctionTable,
} from '../worksheet-function';
import { formatNumber } from './number-format';
import { patternOf } from './text-pattern';

/** Longest text that a cell can hold. */
const longestText = 32_767;

function limited(text: string): Scalar {
  return text.length > longestText ? errorValue.value : text;
}

function ofText(compute: (text: string) => Scalar) {
  return scalarFunction(1, 1, ([value]) => compute(toText(value)));
}

function count(value: Scalar | undefined, otherwise: number): number {
  const number = value === undefined ? otherwise : toInteger(value);
  if (number < 0) {
    throw errorSignal(errorValue.value);
  }
  return number;
}

/** @returns position from 0, or −1; the pattern may hold wildcards */
function search(pattern: string, text: string, from: number): number {
  if (!/[*?~]/.test(pattern)) {
    return text.toLowerCase().indexOf(pattern.toLowerCase(), from);
  }
  const begins = patternOf(`${pattern}*`);
  for (let at = from; at <= text.length; at++) {
    if (begins.test(text.slice(at))) {
      return at;
    }
  }
  return -1;
}

function place(find: (wanted: string, text: string, from: number) => number) {
  return scalarFunction(2, 3, ([wanted, text, start]) => {
    const within = toText(text);
    const from = start === undefined ? 1 : toInteger(start);
    if (from < 1 || from > within.length + 1) {
      return errorValue.value;
    }
    const at = find(toText(wanted), within, from - 1);
    return at < 0 ? errorValue.value : at + 1;
  });
}

function join(values: readonly Scalar[], separator: string): Scalar {
  return limited(values.map(toText).join(separator));
}

function allTexts(values: readonly Value[], context: FunctionContext, skipsBlanks: boolean): Scalar[] {
  const texts: Scalar[] = [];
  for (const value of values) {
    for (const element of context.matrixOf(value).values) {
      if (element instanceof CellError) {
        throw errorSignal(element);
      }
      if (isDependent(element)) {
        throw dependentValueRefusal();
      }
      if (!skipsBlanks || (element !== null && element !== '')) {
        texts.push(element);
      }
    }
  }
  return texts;
}

function substitute([value, old, replacement, which]: readonly Scalar[]): Scalar {
  const text = toText(value);
  const wanted = toText(old);
  const instead = toText(replacement);
  if (wanted === '') {
    return text;
  }
  if (which === undefined) {
    return limited(text.split(wanted).join(instead));
  }
  const occurrence = toInteger(which);
  if (occurrence < 1) {
    return errorValue.value;
  }
  let at = -1;
  for (let found = 0; found < occurrence; found++) {
    at = text.indexOf(wanted, at + 1);
    if (at < 0) {
      return text;
    }
  }
  return limited(text.slice(0, at) + instead + text.slice(at + wanted.length));
}

function formatText(value: Scalar, format: Scalar, context: FunctionContext): Scalar {
  const code = toText(format);
  if (typeof value === 'string' || typeof value === 'boolean') {
    return toText(value);
  }
  const formatted = formatNumber(toNumber(value), code, context.usesDates1904);
  if (formatted === undefined) {
    // Better no text than one that another program would write otherwise.
    throw new EvaluationRefusal({ code: 'unknown-function', functionName: `TEXT "${code}"` });
  }
  return formatted;
}

export const texts: FunctionTable = {
  LEN: ofText((text) => text.length),
  UPPER: ofText((text) => text.toUpperCase()),
  LOWER: ofText((text) => text.toLowerCase()),
  PROPER: ofText((text) =>
    text.toLowerCase().replace(/\p{L}+/gu, (word) => word[0].toUpperCase() + word.slice(1)),
  ),
  TRIM: ofText((text) => text.replace(/ +/g, ' ').replace(/^ | $/g, '')),
  CLEAN: ofText((text) => text.replace(/[\u0000-\u001f]/g, '')),
  VALUE: scalarFunction(1, 1, ([value]) =>
    typeof value === 'string' ? numberOfText(value) : toNumber(value),
  ),
  LEFT: scalarFunction(1, 2, ([text, length]) => toText(text).slice(0, count(length, 1))),
  RIGHT: scalarFunction(1, 2, ([value, length]) => {
    const text = toText(value);
    return text.slice(Math.max(0, text.length - count(length, 1)));
  }),
  MID: scalarFunction(3, 3, ([text, start, length]) => {
    const from = toInteger(start);
    return from < 1 ? errorValue.value : toText(text).slice(from - 1, from - 1 + count(length, 0));
  }),
  FIND: place((wanted, text, from) => text.indexOf(wanted, from)),
  SEARCH: place(search),
  SUBSTITUTE: scalarFunction(3, 4, substitute),
  REPLACE: scalarFunction(4, 4, ([value, start, length, replacement]) => {
    const text = toText(value);
    const from = toInteger(start);
    return from < 1
      ? errorValue.value
      : limited(text.slice(0, from - 1) + toText(replacement) + text.slice(from - 1 + count(length, 0)));
  }),
  REPT: scalarFunction(2, 2, ([value, times]) => {
    const text = toText(value);
    const repeats = count(times, 0);
    return text.length * repeats > longestText ? errorValue.value : text.repeat(repeats);
  }),
  EXACT: scalarFunction(2, 2, ([a, b]) => toText(a) === toText(b)),
  CHAR: scalarFunction(1, 1, ([value]) => {
    const code = toInteger(value);
    return code < 1 || code > 255 ? errorValue.value : String.fromCharCode(code);
  }),
  CODE: ofText((text) => (text === '' ? errorValue.value : text.charCodeAt(0))),
  CONCATENATE: scalarFunction(1, 255, (values) => join(values, '')),
  CONCAT: generalFunction(1, 254, (values, context) => join(allTexts(values, context, false), '')),
  TEXTJOIN: generalFunction(3, 254, ([separator, skipsBlanks, ...values], context) =>
    join(
      allTexts(values, context, toBoolean(context.scalarOf(skipsBlanks))),
      toText(context.scalarOf(separator)),
    ),
  ),
  TEXT: scalarFunction(2, 2, ([value, format], context) => formatText(value, format, context)),
  FIXED: scalarFunction(1, 3, ([value, places, noCommas]) => {
    const decimals = places === undefined ? 2 : toInteger(places);
    const rounded = roundHalfAway(toNumber(value), decimals);
    const [whole, fraction] = Math.abs(rounded)
      .toFixed(Math.max(0, Math.min(100, decimals)))
      .split('.');
    const isPlain = noCommas !== undefined && toBoolean(noCommas);
    const grouped = isPlain ? whole : whole.replace(/\B(?=(\d{3})+$)/g, ',');
    return (rounded < 0 ? '-' : '') + grouped + (fraction === undefined ? '' : `.${fraction}`);
  }),
};
