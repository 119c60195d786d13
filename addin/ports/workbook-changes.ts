/**
 * Hints that somebody else changes the workbook while a plan of it is shown.
 */
import type { Stop } from './selection';

export interface WorkbookChanges {
  /**
   * Calls back after a change of cells, names or sheets that was not made through this add-in's own `apply`, as far as
   * the host can tell the two apart. A hint only: it may come late, twice or not at all; what a plan is written onto is
   * compared once more by `Workbook.apply`.
   */
  watch(onChange: () => void): Promise<Stop>;
}
