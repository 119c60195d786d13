/**
 * Cell references as the parts of a workbook write them: `B7`, `B7:C9`, sometimes with `$`.
 */
import { columnOfLetters, maximumColumnCount, maximumRowCount } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';

export interface CellPlace {
  readonly row: number;
  readonly column: number;
}

/** The place from 0, or undefined where the text is no cell of a sheet. */
export function parseCell(text: string): CellPlace | undefined {
  const match = /^\$?([A-Za-z]{1,3})\$?([1-9][0-9]{0,6})$/.exec(text);
  if (match === null) return undefined;
  const column = columnOfLetters(match[1]);
  const row = Number(match[2]) - 1;
  return row < maximumRowCount && column < maximumColumnCount ? { row, column } : undefined;
}

/** The range, or undefined where the text is no range of a sheet. */
export function parseRange(sheet: string, text: string): CellRange | undefined {
  const [firstText, lastText = firstText, ...more] = text.split(':');
  const first = parseCell(firstText);
  const last = parseCell(lastText);
  if (first === undefined || last === undefined || more.length > 0) return undefined;
  return {
    sheet,
    top: Math.min(first.row, last.row),
    left: Math.min(first.column, last.column),
    bottom: Math.max(first.row, last.row),
    right: Math.max(first.column, last.column),
  };
}
