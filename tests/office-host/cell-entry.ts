/**
 * What Excel makes of something put into a cell through `values` or `formulas`: the same as if a person typed it.
 *
 * A text beginning with `=`, `+`, `-` or `@` becomes a formula, one that looks like a number, a date, a time, a
 * truth value or an error becomes that, and a leading apostrophe keeps it a text and is not part of it. A cell of
 * the number format Text takes everything as it is. (Microsoft, Range.values and "Number formats and dates"; en-US.)
 */
import { CellError, type CellValue } from '../../addin/domain/sheet/cell-value';

export interface CellEntry {
  readonly value: CellValue;
  /** Without `=`. */
  readonly formula: string | undefined;
  /** The text was kept a text by an apostrophe. */
  readonly hasApostrophe: boolean;
  /** The number format that goes with what was typed, where the cell's own is General. */
  readonly numberFormat: string | undefined;
}

const errorCodes = ['#NULL!', '#DIV/0!', '#VALUE!', '#REF!', '#NAME?', '#NUM!', '#N/A', '#SPILL!', '#CALC!'];
const textFormat = '@';

/**
 * @param input a string, number or boolean, as JSON carries it
 * @param numberFormat the cell's own
 */
export function readEntry(input: unknown, numberFormat: string): CellEntry {
  if (numberFormat === textFormat && input !== '') {
    return constant(String(input));
  }
  if (typeof input === 'number' || typeof input === 'boolean') {
    return constant(input);
  }
  const text = String(input);
  if (text === '') {
    return constant(null);
  }
  if (text.startsWith("'")) {
    return { ...constant(text.slice(1)), hasApostrophe: true };
  }
  if (/^=./s.test(text)) {
    return { value: null, formula: text.slice(1), hasApostrophe: false, numberFormat: undefined };
  }
  const read = readPlainly(text.trim());
  if (read !== undefined) {
    return read;
  }
  if (/^[+\-@]./s.test(text)) {
    const formula = text.startsWith('@') || text.startsWith('+') ? text.slice(1) : text;
    return { value: null, formula, hasApostrophe: false, numberFormat: undefined };
  }
  return constant(text);
}

/** A number, date, time, truth value or error; undefined where it is none. */
function readPlainly(text: string): CellEntry | undefined {
  const upper = text.toUpperCase();
  if (upper === 'TRUE' || upper === 'FALSE') {
    return constant(upper === 'TRUE');
  }
  if (errorCodes.includes(upper)) {
    return constant(CellError.of(upper));
  }
  const percent = /^([+-]?[\d,]*\.?\d+)\s*%$/.exec(text);
  if (percent !== null) {
    return formatted(Number(percent[1].replaceAll(',', '')) / 100, percent[1].includes('.') ? '0.00%' : '0%');
  }
  const money = /^([+-]?)\$([\d,]+(\.\d+)?)$/.exec(text);
  if (money !== null) {
    return formatted(Number(money[1] + money[2].replaceAll(',', '')), '$#,##0');
  }
  const inBrackets = /^\(([\d,]+(?:\.\d+)?)\)$/.exec(text);
  if (inBrackets !== null) {
    return constant(-Number(inBrackets[1].replaceAll(',', '')));
  }
  if (/^[+-]?(\d+|\d{1,3}(,\d{3})+)(\.\d*)?(E[+-]?\d+)?$|^[+-]?\.\d+(E[+-]?\d+)?$/i.test(text)) {
    return constant(Number(text.replaceAll(',', '')));
  }
  const fraction = /^(\d+)\s+(\d+)\/(\d+)$/.exec(text);
  if (fraction !== null) {
    return formatted(Number(fraction[1]) + Number(fraction[2]) / Number(fraction[3]), '# ?/?');
  }
  return readDate(text) ?? readTime(text);
}

const months = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
/** The year of a date typed without one: any will do, as long as it is always the same. */
const yearOfShortDates = 2026;

/** `1-2`, `3/4/2026`, `2026-03-04`, `5 May`, `May 5`. */
function readDate(text: string): CellEntry | undefined {
  const numeric = /^(\d{1,4})[-/](\d{1,2})(?:[-/](\d{1,4}))?$/.exec(text);
  if (numeric !== null) {
    const [first, second, third] = numeric
      .slice(1)
      .map((part) => (part === undefined ? undefined : Number(part)));
    if (numeric[1].length === 4) {
      return third === undefined ? undefined : date(first!, second!, third, 'yyyy-mm-dd');
    }
    return third === undefined
      ? date(yearOfShortDates, first!, second!, 'd-mmm')
      : date(third < 100 ? 2000 + third : third, first!, second!, 'm/d/yyyy');
  }
  const named = /^(\d{1,2})[ -]([a-z]{3})[a-z]*$|^([a-z]{3})[a-z]*[ -](\d{1,2})$/i.exec(text);
  if (named === null) {
    return undefined;
  }
  const month = months.indexOf((named[2] ?? named[3]).toLowerCase()) + 1;
  return month === 0 ? undefined : date(yearOfShortDates, month, Number(named[1] ?? named[4]), 'd-mmm');
}

function readTime(text: string): CellEntry | undefined {
  const time = /^(\d{1,2}):(\d{2})(?::(\d{2}))?( [ap]m)?$/i.exec(text);
  if (time === null) {
    return undefined;
  }
  const seconds = Number(time[1]) * 3600 + Number(time[2]) * 60 + Number(time[3] ?? 0);
  return formatted(seconds / 86_400, time[3] === undefined ? 'h:mm' : 'h:mm:ss');
}

/** Serial date counted from 1900; undefined where there is no such day. */
function date(year: number, month: number, day: number, format: string): CellEntry | undefined {
  const instant = Date.UTC(year, month - 1, day);
  const isReal = new Date(instant).getUTCMonth() === month - 1 && day >= 1;
  return isReal ? formatted(instant / 86_400_000 + 25_569, format) : undefined;
}

function constant(value: CellValue): CellEntry {
  return { value, formula: undefined, hasApostrophe: false, numberFormat: undefined };
}

function formatted(value: number, numberFormat: string): CellEntry {
  return { ...constant(value), numberFormat };
}
