/**
 * Numbers as text by a format code, as TEXT writes them.
 */
import { format, isDateFormat, isValidFormat } from 'numfmt';

/** Days from the first day of the 1900 system to that of the 1904 one. */
const daysBefore1904 = 1462;
/** Serial date of 9999-12-31 in the 1900 system: the last day there is. */
const lastDay = 2958465;

/** @returns undefined where the code is no format code, or the number is no date where the code asks for one */
export function formatNumber(number: number, code: string, usesDates1904: boolean): string | undefined {
  if (!isValidFormat(code)) return undefined;
  if (!isDateFormat(code)) return format(code, number);
  const serial = usesDates1904 ? number + daysBefore1904 : number;
  return number >= 0 && serial < lastDay + 1 ? format(code, serial) : undefined;
}
