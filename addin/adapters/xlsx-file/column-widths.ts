/**
 * Column widths in a worksheet's list of columns, where one entry may stand for many columns: an entry is split
 * around the columns that get a width of their own.
 */
import { asOpenTag, withAttributes } from './start-tag';
import type { TextSplices } from './text-splices';
import type { ColumnPlace, WorksheetOutline } from './worksheet-outline';

/** @param widths in characters, by column from 0 */
export function spliceColumnWidths(
  outline: WorksheetOutline,
  widths: ReadonlyMap<number, number>,
  splices: TextSplices,
): void {
  if (widths.size === 0) return;
  const { columnList, columns, prefix, sheetData } = outline;
  const wanted = [...widths].sort(([a], [b]) => a - b);
  for (const entry of columns) {
    const inside = wanted.filter(([column]) => column >= entry.first && column <= entry.last);
    if (inside.length > 0) {
      splices.replace(entry.start, entry.end, splitEntry(outline, entry, inside));
    }
  }
  const outside = wanted.filter(([column]) => !columns.some((e) => column >= e.first && column <= e.last));
  const entryOf = ([column, width]: readonly [number, number]): string =>
    `<${prefix}col min="${column + 1}" max="${column + 1}" width="${width}" customWidth="1"/>`;
  if (columnList === undefined) {
    // The list stands directly before the cells (ECMA-376 Part 1, §18.3.1.99).
    splices.insert(sheetData.start, `<${prefix}cols>${outside.map(entryOf).join('')}</${prefix}cols>`);
  } else if (columnList.isSelfClosing) {
    const tag = asOpenTag(outline.text.slice(columnList.start, columnList.end));
    splices.replace(
      columnList.start,
      columnList.end,
      `${tag}${outside.map(entryOf).join('')}</${prefix}cols>`,
    );
  } else {
    for (const item of outside) {
      const next = columns.find((entry) => entry.first > item[0]);
      splices.insert(next?.start ?? columnList.contentEnd, entryOf(item));
    }
  }
}

/** The entry in pieces: its own attributes throughout, the new width at the columns that get one. */
function splitEntry(
  { text }: WorksheetOutline,
  entry: ColumnPlace,
  inside: readonly (readonly [column: number, width: number])[],
): string {
  const element = text.slice(entry.start, entry.end);
  const tagLength = entry.contentStart - entry.start;
  const piece = (first: number, last: number, more: Record<string, string | undefined>): string =>
    withAttributes(element.slice(0, tagLength), { min: String(first + 1), max: String(last + 1), ...more }) +
    element.slice(tagLength);
  let pieces = '';
  let next = entry.first;
  for (const [column, width] of inside) {
    if (column > next) pieces += piece(next, column - 1, {});
    pieces += piece(column, column, { width: String(width), customWidth: '1', bestFit: undefined });
    next = column + 1;
  }
  return next <= entry.last ? pieces + piece(next, entry.last, {}) : pieces;
}
