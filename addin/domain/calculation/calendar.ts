/**
 * Serial dates: days since the workbook's first day, times as fractions of a day.
 *
 * The calendar of 1900 has a 29 February 1900 that never was (serial 60), kept by spreadsheets for old files' sake;
 * that of 1904 counts from 1 January 1904 as 0.
 * Source of the day count: Hatcher (1984), "Simple formulae for Julian day numbers and calendar dates", QJRAS 25;
 * here with years that begin in March, so that the leap day comes last.
 */
export interface CalendarDate {
  readonly year: number;
  /** From 1. */
  readonly month: number;
  readonly day: number;
}

const daysPer400Years = 146_097;
/** Days from 1 March of year 0 to 30 December 1899, which is serial 0 from March 1900 on. */
const epoch1900 = dayCount(1899, 12, 30);
const epoch1904 = dayCount(1904, 1, 1);
/** The first serial after the day that never was. */
const firstOfMarch1900 = 61;
/** 31 December 9999. */
const lastSerial1900 = 2_958_465;

/** Days since 1 March of year 0, in the Gregorian calendar carried on backwards. */
function dayCount(year: number, month: number, day: number): number {
  const marchYear = month <= 2 ? year - 1 : year;
  const era = Math.floor(marchYear / 400);
  const yearOfEra = marchYear - era * 400;
  const dayOfYear = Math.floor((153 * ((month + 9) % 12) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * daysPer400Years + dayOfEra;
}

/** Months and days beyond their usual bounds count on, as month 13 is January of the next year. */
export function serialOfDate(year: number, month: number, day: number, usesDates1904: boolean): number {
  const months = Math.trunc(month) - 1;
  const wholeYear = Math.trunc(year) + Math.floor(months / 12);
  const monthOfYear = months - 12 * Math.floor(months / 12) + 1;
  const firstOfMonth = dayCount(wholeYear, monthOfYear, 1);
  const daysOn = Math.trunc(day) - 1;
  if (usesDates1904) {
    return firstOfMonth - epoch1904 + daysOn;
  }
  // Days are counted on in serials, so that 29 February 1900 is the day that never was.
  const serial = firstOfMonth - epoch1900;
  return (serial < firstOfMarch1900 ? serial - 1 : serial) + daysOn;
}

/** @returns undefined for serials outside the calendar */
export function dateOfSerial(serial: number, usesDates1904: boolean): CalendarDate | undefined {
  const whole = Math.floor(serial);
  const last = usesDates1904 ? lastSerial1900 - 1462 : lastSerial1900;
  if (whole < 0 || whole > last) {
    return undefined;
  }
  if (!usesDates1904 && whole === 60) {
    return { year: 1900, month: 2, day: 29 };
  }
  if (!usesDates1904 && whole === 0) {
    return { year: 1900, month: 1, day: 0 };
  }
  const days = usesDates1904 ? whole + epoch1904 : whole + epoch1900 + (whole < firstOfMarch1900 ? 1 : 0);
  const era = Math.floor(days / daysPer400Years);
  const dayOfEra = days - era * daysPer400Years;
  const yearOfEra = Math.floor(
    (dayOfEra -
      Math.floor(dayOfEra / 1460) +
      Math.floor(dayOfEra / 36_524) -
      Math.floor(dayOfEra / 146_096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const marchMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const month = marchMonth < 10 ? marchMonth + 3 : marchMonth - 9;
  return {
    year: yearOfEra + era * 400 + (month <= 2 ? 1 : 0),
    month,
    day: dayOfYear - Math.floor((153 * marchMonth + 2) / 5) + 1,
  };
}

/** 0 for Sunday to 6 for Saturday, as worksheets count: the day that never was shifts those before it. */
export function weekdayOfSerial(serial: number, usesDates1904: boolean): number {
  const whole = Math.floor(serial) + (usesDates1904 ? 1462 : 0);
  return (((whole - 1) % 7) + 7) % 7;
}

export function daysInMonth(year: number, month: number): number {
  const next = month === 12 ? dayCount(year + 1, 1, 1) : dayCount(year, month + 1, 1);
  return next - dayCount(year, month, 1);
}
