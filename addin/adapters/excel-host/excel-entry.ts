/**
 * What must be handed to Excel so that a cell holds exactly a value.
 *
 * Excel takes a text that is written into a cell as if it were typed: `1-2` becomes a date, `007` a number, `=>` a
 * broken formula, and what it takes for a number or a truth value depends on the planner's language. A leading
 * apostrophe keeps it a text, and is no part of it. (Microsoft, Range.values; "Excel data types concepts".)
 */
import { CellError, type CellValue } from '../../domain/sheet/cell-value';

/** What a cell of this number format takes as it is, numbers too, which then are texts. */
export const textFormat = '@';

export type Entry = number | string | boolean;

/**
 * @param value null clears the cell
 * @param numberFormat that the cell has when the value arrives
 */
export function entryOf(value: CellValue, numberFormat: string): Entry {
  if (value === null) {
    return '';
  }
  if (value instanceof CellError) {
    return value.code;
  }
  if (typeof value !== 'string') {
    return Object.is(value, -0) ? 0 : value;
  }
  if (numberFormat === textFormat || isPlainText(value)) {
    return value;
  }
  return `'${value}`;
}

/**
 * Words that nothing but a text can be made of, in any language: they begin with a letter and hold no figure, so that
 * they are no number, date, time or formula; and are more than one word, so that they are no truth value.
 */
function isPlainText(text: string): boolean {
  return /^\p{L}[^\p{N}]*\s[^\p{N}]*$/u.test(text);
}
