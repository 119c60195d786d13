/**
 * Widths of the sheet columns in which results stand.
 */
import { containsCell } from '../sheet/cell-range';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { Placement } from './placement';
import { headingCellOf, rangeOfCell } from './result-lines';
import type { ResultTexts } from './result-texts';
import type { ColumnWidthWrite } from './write-plan';

/** Widths are set so that a number of some millions fits, and title and gloss of a heading one line each. */
const narrowestColumn = 12;
const widestColumn = 32;
const widestLabelColumn = 42;

/**
 * Widths for new upright columns, as long as nothing of the planner's stands in the same sheet column: its width is
 * theirs then. Lying results stand in the block's own columns, whose widths are never touched.
 */
export function widthWrites(
  workbook: WorkbookSnapshot,
  placement: Placement,
  texts: ResultTexts,
): ColumnWidthWrite[] {
  const widths = new Map<string, ColumnWidthWrite>();
  const widen = (sheet: string, column: number, width: number): void => {
    const key = `${column}!${sheet}`;
    widths.set(key, {
      kind: 'columnWidth',
      sheet,
      column,
      width: Math.max(width, widths.get(key)?.width ?? 0),
    });
  };
  const clamped = (length: number, widest: number): number =>
    Math.min(widest, Math.max(narrowestColumn, length + 2));
  for (const placed of placement.columns.filter(({ isNew, isLying }) => isNew && !isLying)) {
    const { title, gloss } = texts.headings[placed.column.role];
    widen(placed.range.sheet, placed.range.left, clamped(Math.max(title.length, gloss.length), widestColumn));
  }
  for (const table of placement.tables.filter(({ isNew }) => isNew)) {
    const longest = table.block.lines.reduce((length, { label }) => Math.max(length, label.length), 0);
    widen(table.sheet, table.labelColumn, clamped(longest, widestLabelColumn));
    widen(table.sheet, table.labelColumn + 1, clamped(0, widestColumn));
  }
  const ownRanges = [
    ...placement.columns.map(({ range, isLying }) => ({ range, isLying })),
    ...placement.abandoned,
  ].flatMap((line) => {
    const heading = headingCellOf(line.range, line.isLying);
    return heading === undefined ? [line.range] : [line.range, rangeOfCell(heading)];
  });
  for (const sheet of workbook.sheets) {
    sheet.forEachCell((row, column) => {
      const key = `${column}!${sheet.name}`;
      const address = { sheet: sheet.name, row, column };
      if (widths.has(key) && !ownRanges.some((range) => containsCell(range, address))) {
        widths.delete(key);
      }
    });
  }
  return [...widths.values()];
}
