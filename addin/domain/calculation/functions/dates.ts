/**
 * Dates and times, as serial numbers. TODAY and NOW take the caller's clock.
 */
import { readNumber, toInteger, toNumber, toText } from '../coercions';
import { dateOfSerial, daysInMonth, serialOfDate, weekdayOfSerial, type CalendarDate } from '../calendar';
import { significantDigits } from '../decimal-rounding';
import { errorValue, type Scalar } from '../evaluated-value';
import { errorSignal } from '../evaluation-refusal';
import {
  generalFunction,
  scalarFunction,
  type FunctionContext,
  type FunctionTable,
} from '../worksheet-function';

/** The day of a date or date and time. Times just short of midnight by rounding belong to the next day. */
function dayOf(value: Scalar, context: FunctionContext): number {
  const serial =
    typeof value === 'string' && readNumber(value) === undefined
      ? serialOfText(value, context)
      : toNumber(value);
  return Math.floor(Number(serial.toPrecision(significantDigits)));
}

function dateOf(value: Scalar, context: FunctionContext): CalendarDate {
  const date = dateOfSerial(dayOf(value, context), context.usesDates1904);
  if (date === undefined) {
    throw errorSignal(errorValue.number);
  }
  return date;
}

/** A date written as 2026-11-30, 2026/11/30 or 11/30/2026. @throws ErrorValueSignal #VALUE! */
function serialOfText(text: string, context: FunctionContext): number {
  const iso = /^\s*(\d{4})[-/](\d{1,2})[-/](\d{1,2})\s*$/.exec(text);
  const american = /^\s*(\d{1,2})\/(\d{1,2})\/(\d{4})\s*$/.exec(text);
  const [year, month, day] =
    iso !== null
      ? [Number(iso[1]), Number(iso[2]), Number(iso[3])]
      : american !== null
        ? [Number(american[3]), Number(american[1]), Number(american[2])]
        : [0, 0, 0];
  const isDate = month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month) && year >= 1900;
  if (!isDate) {
    throw errorSignal(errorValue.value);
  }
  return serialOfDate(year, month, day, context.usesDates1904);
}

function partOfDate(part: (date: CalendarDate) => number) {
  return scalarFunction(1, 1, ([value], context) => part(dateOf(value, context)));
}

/** Seconds of the day, rounded as clocks show them. */
function partOfTime(part: (seconds: number) => number) {
  return scalarFunction(1, 1, ([value]) => {
    const serial = toNumber(value);
    if (serial < 0) {
      return errorValue.number;
    }
    return part(Math.round((serial - Math.floor(serial)) * 86_400) % 86_400);
  });
}

/** First day of the week by WEEKDAY's and WEEKNUM's number: 0 for Sunday to 6 for Saturday. */
function firstWeekday(type: number): number | undefined {
  if (type === 1 || type === 17) {
    return 0;
  }
  if (type === 2) {
    return 1;
  }
  return type >= 11 && type <= 16 ? type - 10 : undefined;
}

function weekday(value: Scalar, typeValue: Scalar | undefined, context: FunctionContext): Scalar {
  const type = typeValue === undefined ? 1 : toInteger(typeValue);
  dateOf(value, context);
  const day = weekdayOfSerial(dayOf(value, context), context.usesDates1904);
  if (type === 3) {
    return (day + 6) % 7;
  }
  const first = firstWeekday(type);
  return first === undefined ? errorValue.number : ((day - first + 7) % 7) + 1;
}

function addMonths(value: Scalar, months: Scalar, toEnd: boolean, context: FunctionContext): Scalar {
  const { year, month, day } = dateOf(value, context);
  const moved = year * 12 + (month - 1) + toInteger(months);
  const movedYear = Math.floor(moved / 12);
  const movedMonth = (moved % 12) + 1;
  const lastDay = daysInMonth(movedYear, movedMonth);
  const serial = serialOfDate(
    movedYear,
    movedMonth,
    toEnd ? lastDay : Math.min(day, lastDay),
    context.usesDates1904,
  );
  return serial < 0 ? errorValue.number : serial;
}

function isoWeek(whole: number, context: FunctionContext): number {
  // The week belongs to the year of its Thursday.
  const thursday = whole - ((weekdayOfSerial(whole, context.usesDates1904) + 6) % 7) + 3;
  const year = dateOfSerial(thursday, context.usesDates1904)!.year;
  return Math.floor((thursday - serialOfDate(year, 1, 1, context.usesDates1904)) / 7) + 1;
}

function workdaysBetween(
  first: number,
  last: number,
  holidays: ReadonlySet<number>,
  context: FunctionContext,
): number {
  const step = first <= last ? 1 : -1;
  let count = 0;
  for (let day = first; step > 0 ? day <= last : day >= last; day += step) {
    const weekdayNumber = weekdayOfSerial(day, context.usesDates1904);
    if (weekdayNumber !== 0 && weekdayNumber !== 6 && !holidays.has(day)) {
      count += step;
    }
  }
  return count;
}

export const dates: FunctionTable = {
  TODAY: scalarFunction(0, 0, (_values, context) => Math.floor(context.now)),
  NOW: scalarFunction(0, 0, (_values, context) => context.now),
  DATE: scalarFunction(3, 3, ([year, month, day], context) => {
    const given = toInteger(year);
    // Years below 1900 count from 1900.
    const fullYear = given >= 0 && given < 1900 ? given + 1900 : given;
    const serial = serialOfDate(fullYear, toInteger(month), toInteger(day), context.usesDates1904);
    return fullYear > 9999 || serial < 0 ? errorValue.number : serial;
  }),
  DATEVALUE: scalarFunction(1, 1, ([text], context) => serialOfText(toText(text), context)),
  YEAR: partOfDate((date) => date.year),
  MONTH: partOfDate((date) => date.month),
  DAY: partOfDate((date) => date.day),
  HOUR: partOfTime((seconds) => Math.floor(seconds / 3600)),
  MINUTE: partOfTime((seconds) => Math.floor(seconds / 60) % 60),
  SECOND: partOfTime((seconds) => seconds % 60),
  TIME: scalarFunction(3, 3, ([hour, minute, second]) => {
    const seconds = toInteger(hour) * 3600 + toInteger(minute) * 60 + toInteger(second);
    return seconds < 0 ? errorValue.number : (seconds % 86_400) / 86_400;
  }),
  WEEKDAY: scalarFunction(1, 2, ([value, type], context) => weekday(value, type, context)),
  WEEKNUM: scalarFunction(1, 2, ([value, typeValue], context) => {
    const type = typeValue === undefined ? 1 : toInteger(typeValue);
    const serial = dayOf(value, context);
    const { year } = dateOf(value, context);
    if (type === 21) {
      return isoWeek(serial, context);
    }
    const first = firstWeekday(type);
    if (first === undefined) {
      return errorValue.number;
    }
    const newYear = serialOfDate(year, 1, 1, context.usesDates1904);
    const lead = (weekdayOfSerial(newYear, context.usesDates1904) - first + 7) % 7;
    return Math.floor((serial - newYear + lead) / 7) + 1;
  }),
  ISOWEEKNUM: scalarFunction(1, 1, ([value], context) => {
    dateOf(value, context);
    return isoWeek(dayOf(value, context), context);
  }),
  EDATE: scalarFunction(2, 2, ([value, months], context) => addMonths(value, months, false, context)),
  EOMONTH: scalarFunction(2, 2, ([value, months], context) => addMonths(value, months, true, context)),
  DAYS: scalarFunction(2, 2, ([last, first], context) => dayOf(last, context) - dayOf(first, context)),
  NETWORKDAYS: generalFunction(2, 3, ([first, last, holidayDates], context) => {
    const holidays = new Set<number>();
    if (holidayDates !== undefined) {
      context.forEachFilled(holidayDates, (value) => holidays.add(dayOf(value, context)));
    }
    const [from, to] = [first, last].map((value) => dayOf(context.scalarOf(value), context));
    dateOf(from, context);
    dateOf(to, context);
    return workdaysBetween(from, to, holidays, context);
  }),
};
