/**
 * What is selected in the workbook, and moving the selection there.
 */
import type { CellRange } from '../domain/sheet/cell-range';

/** Ends what was begun, such as a watch. May be called more than once. */
export type Stop = () => void;

export interface Selection {
  /**
   * The selected rectangles in the order chosen, all on the sheet in front; none where no cells are selected (a
   * picture, a chart). Whole columns and rows come as the rectangles that they are. @throws WorkbookError
   */
  selected(): Promise<readonly CellRange[]>;
  /** Name of the sheet in front. @throws WorkbookError */
  activeSheet(): Promise<string>;
  /**
   * Brings the sheet of these rectangles to the front and selects them; the keyboard stays where it is as far as the
   * host allows. @throws WorkbookError where they cannot be shown, such as on a hidden sheet
   */
  select(ranges: readonly CellRange[]): Promise<void>;
  /** Calls back whenever something else is selected. A hint: it may come late or not at all. */
  watch(onChange: () => void): Promise<Stop>;
}
