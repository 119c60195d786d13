/**
 * A defined name of the workbook.
 */
export interface DefinedName {
  readonly name: string;
  /** Name of the sheet it is local to; null for the whole workbook. */
  readonly scope: string | null;
  /** What it refers to, as a formula without the leading `=`. */
  readonly formula: string;
  readonly isHidden: boolean;
}
