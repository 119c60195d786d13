/**
 * Numbers as text by a format code, for the codes that planners use in TEXT: digits with thousands, decimals and
 * percent, sections for negative numbers, zero and text, literal characters, dates and times.
 *
 * A code with anything else in it (fractions, exponents, conditions, colours' names) is not guessed at.
 */
import { dateOfSerial, weekdayOfSerial, type CalendarDate } from '../calendar';
import { roundHalfAway } from '../decimal-rounding';

const monthNames = [
  ...['January', 'February', 'March', 'April', 'May', 'June'],
  ...['July', 'August', 'September', 'October', 'November', 'December'],
];
const dayNames = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'];

/** @returns undefined where the code is beyond what is known here, or the number is no date */
export function formatNumber(number: number, code: string, usesDates1904: boolean): string | undefined {
  const sections = splitSections(code);
  if (sections.length > 3) {
    return undefined;
  }
  const which = number < 0 && sections.length > 1 ? 1 : number === 0 && sections.length > 2 ? 2 : 0;
  const section = sections[which];
  const isNegativeShown = number < 0 && which === 0;
  const formatted = isDateCode(section)
    ? formatDate(number, section, usesDates1904)
    : formatDigits(Math.abs(number), section);
  return formatted === undefined || !isNegativeShown || isDateCode(section)
    ? formatted
    : withMinus(formatted);
}

/** What rounds to nothing has no sign. */
function withMinus(text: string): string {
  return /[1-9]/.test(text) ? `-${text}` : text;
}

function splitSections(code: string): string[] {
  const sections = [''];
  for (const { text, isLiteral } of charactersOf(code)) {
    if (!isLiteral && text === ';') {
      sections.push('');
    } else {
      sections[sections.length - 1] += isLiteral ? `"${text}"` : text;
    }
  }
  return sections;
}

/** The code's characters; those quoted or behind a backslash are literal. */
function charactersOf(code: string): { readonly text: string; readonly isLiteral: boolean }[] {
  const characters: { text: string; isLiteral: boolean }[] = [];
  for (let at = 0; at < code.length; at++) {
    if (code[at] === '"') {
      const end = code.indexOf('"', at + 1);
      const last = end < 0 ? code.length : end;
      characters.push(...[...code.slice(at + 1, last)].map((text) => ({ text, isLiteral: true })));
      at = last;
    } else if (code[at] === '\\') {
      at++;
      characters.push({ text: code[at] ?? '', isLiteral: true });
    } else {
      characters.push({ text: code[at], isLiteral: false });
    }
  }
  return characters;
}

function isDateCode(section: string): boolean {
  const plain = section.replace(/"[^"]*"/g, '');
  return /[ymdhs]/i.test(plain) && !/[#?]/.test(plain) && !/^general$/i.test(plain.trim());
}

function formatDigits(size: number, section: string): string | undefined {
  const plain = section.replace(/"[^"]*"/g, '');
  if (/^general$/i.test(plain.trim())) {
    return String(Number(size.toPrecision(11)));
  }
  if (/[^0#?.,% $€£+\-()/:]/.test(plain) || /[/]/.test(plain)) {
    return undefined;
  }
  // From the first to the last digit place; what stands around it is shown as it is.
  const shape = /^((?:"[^"]*"|[^0#?."])*)([0#?,]*)(\.[0#?]*,*)?((?:"[^"]*"|[^0#?."])*)$/.exec(section);
  if (shape === null) {
    return undefined;
  }
  const [, before, wholePlaces, decimalsAndScale = '', after] = shape;
  const decimalPlaces = decimalsAndScale.replace(/,+$/, '');
  const percents = (plain.match(/%/g) ?? []).length;
  // Commas behind the last place divide by a thousand each.
  const thousandsScaled = /,*$/.exec(wholePlaces + decimalsAndScale)![0].length;
  const scaled = (size * 100 ** percents) / 1000 ** thousandsScaled;
  const decimals = Math.max(0, decimalPlaces.length - 1);
  if (wholePlaces === '' && decimalPlaces === '') {
    return literalText(before + after);
  }
  const [whole, fraction = ''] = plainDecimal(roundHalfAway(scaled, decimals), decimals).split('.');
  const required = (decimalPlaces.match(/0/g) ?? []).length;
  const shownFraction = trimOptionalZeros(fraction, required);
  const leastDigits = (wholePlaces.match(/0/g) ?? []).length;
  const digits = (whole === '0' ? '' : whole).padStart(leastDigits, '0');
  const grouped = /[0#?],+[0#?]/.test(wholePlaces) ? digits.replace(/\B(?=(\d{3})+$)/g, ',') : digits;
  const point = decimalPlaces === '' ? '' : '.';
  return literalText(before) + grouped + point + shownFraction + literalText(after);
}

/** Rounded already: all its digits, without an exponent. */
function plainDecimal(number: number, decimals: number): string {
  return number < 1e21 ? number.toFixed(Math.min(decimals, 100)) : BigInt(number).toString();
}

function trimOptionalZeros(fraction: string, required: number): string {
  let end = fraction.length;
  while (end > required && fraction[end - 1] === '0') {
    end--;
  }
  return fraction.slice(0, end);
}

function literalText(text: string): string {
  return text.replace(/"([^"]*)"/g, '$1');
}

function formatDate(serial: number, section: string, usesDates1904: boolean): string | undefined {
  const isTwelveHours = /am\/pm|a\/p/i.test(section);
  const parts = section.match(/"[^"]*"|am\/pm|a\/p|y+|m+|d+|h+|s+|[^ymdhs"]/gi);
  const seconds = Math.round((serial - Math.floor(serial)) * 86_400);
  // A time that rounds up to midnight belongs to the next day.
  const day = Math.floor(serial) + (seconds === 86_400 ? 1 : 0);
  const date = dateOfSerial(day, usesDates1904);
  if (date === undefined || parts === null || /[[\]]/.test(section)) {
    return undefined;
  }
  let text = '';
  for (let at = 0; at < parts.length; at++) {
    const part = parts[at];
    const isMinutes =
      /^m+$/i.test(part) &&
      (/^h/i.test(neighbour(parts, at, -1) ?? '') || /^s/i.test(neighbour(parts, at, 1) ?? ''));
    text += isMinutes
      ? padded(Math.floor((seconds % 86_400) / 60) % 60, part.length)
      : datePart(part, date, day, seconds % 86_400, isTwelveHours, usesDates1904);
  }
  return text;
}

/** The next part that stands for something. */
function neighbour(parts: readonly string[], at: number, step: 1 | -1): string | undefined {
  for (let next = at + step; next >= 0 && next < parts.length; next += step) {
    if (/^[ymdhs]/i.test(parts[next])) {
      return parts[next];
    }
  }
  return undefined;
}

function datePart(
  part: string,
  date: CalendarDate,
  serial: number,
  seconds: number,
  isTwelveHours: boolean,
  usesDates1904: boolean,
): string {
  const hour = Math.floor(seconds / 3600);
  switch (part.toLowerCase()) {
    case 'am/pm':
      return hour < 12 ? 'AM' : 'PM';
    case 'a/p':
      return hour < 12 ? 'A' : 'P';
    case 'y':
    case 'yy':
      return padded(date.year % 100, 2);
    case 'yyy':
    case 'yyyy':
      return padded(date.year, 4);
    case 'm':
    case 'mm':
      return padded(date.month, part.length);
    case 'mmm':
      return monthNames[date.month - 1].slice(0, 3);
    case 'mmmm':
      return monthNames[date.month - 1];
    case 'mmmmm':
      return monthNames[date.month - 1][0];
    case 'd':
    case 'dd':
      return padded(date.day, part.length);
    case 'ddd':
      return dayNames[weekdayOfSerial(serial, usesDates1904)].slice(0, 3);
    case 'dddd':
      return dayNames[weekdayOfSerial(serial, usesDates1904)];
    case 'h':
    case 'hh':
      return padded(isTwelveHours ? ((hour + 11) % 12) + 1 : hour, part.length);
    case 's':
    case 'ss':
      return padded(seconds % 60, part.length);
    default:
      return literalText(part);
  }
}

function padded(number: number, length: number): string {
  return String(number).padStart(length, '0');
}
