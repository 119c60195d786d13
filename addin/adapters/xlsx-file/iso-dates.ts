/**
 * Dates written as text by the strict form of the standard (`t="d"`, ISO 8601), as the serial numbers that cells
 * count with.
 */

const millisecondsPerDay = 86_400_000;

/**
 * `2026-03-02`, `2026-03-02T06:30:00`, `06:30:00`: as a serial number; undefined where the text is none of them.
 * In the 1900 system, day 60 is a day that never was (29 February 1900); days before it count one less.
 */
export function serialOfIsoDate(text: string, usesDates1904: boolean): number | undefined {
  const match = /^(?:(\d{4})-(\d{2})-(\d{2}))?(?:T?(\d{2}):(\d{2})(?::(\d{2}(?:\.\d+)?))?)?Z?$/.exec(text);
  if (match === null || text === '' || text === 'Z') return undefined;
  const [, year, month, day, hours = '0', minutes = '0', seconds = '0'] = match;
  if (Number(hours) > 24 || Number(minutes) > 59 || Number(seconds) >= 61) return undefined;
  const time = (Number(hours) * 3600 + Number(minutes) * 60 + Number(seconds)) / 86_400;
  if (year === undefined) return time;
  const date = Date.UTC(Number(year), Number(month) - 1, Number(day));
  const parts = new Date(date);
  if (parts.getUTCMonth() !== Number(month) - 1 || parts.getUTCDate() !== Number(day)) return undefined;
  const epoch = usesDates1904 ? Date.UTC(1904, 0, 1) : Date.UTC(1899, 11, 30);
  const days = Math.round((date - epoch) / millisecondsPerDay);
  return (!usesDates1904 && days < 61 ? days - 1 : days) + time;
}
