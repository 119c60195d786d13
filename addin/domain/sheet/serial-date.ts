/**
 * The caller's date in the workbook's own count of days.
 */
import type { WorkbookSnapshot } from './sheet-snapshot';

/** Days between the two ways to count: 1904 began 1,462 days after the day 0 of the count from 1900. */
const daysBetweenCounts = 1462;

/** @param today serial date and time counted from 1900 */
export function serialDateIn(workbook: WorkbookSnapshot, today: number): number {
  return workbook.usesDates1904 ? today - daysBetweenCounts : today;
}
