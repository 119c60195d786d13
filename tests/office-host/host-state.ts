/**
 * Everything of the host's workbook that an add-in can change, as plain data: two states are equal when nobody could
 * tell the workbooks apart.
 */
import { cellText } from '../../addin/domain/sheet/cell-address';
import { CellError } from '../../addin/domain/sheet/cell-value';
import type { HostSheet } from './host-sheet';
import { standardColumnWidth } from './host-sheet';
import type { HostWorkbook } from './host-workbook';

export interface HostState {
  readonly sheets: readonly (readonly [
    name: string,
    cells: Readonly<Record<string, unknown>>,
    widths: unknown,
  ])[];
  readonly names: readonly string[];
  readonly parts: readonly string[];
}

export function stateOf(workbook: HostWorkbook): HostState {
  workbook.refresh();
  return {
    sheets: workbook.sheets.map((sheet) => [sheet.name, cellsOf(sheet), widthsOf(sheet)] as const),
    names: workbook.names
      .map(({ name, scope, formula, isVisible }) => `${scope?.name ?? ''} ${name} ${formula} ${isVisible}`)
      .sort(),
    parts: workbook.xmlParts.map(({ xml }) => xml).sort(),
  };
}

/** Cells with a format alone count too, unless it is the one that every cell has. */
function cellsOf(sheet: HostSheet): Record<string, unknown> {
  const cells: Record<string, unknown> = {};
  for (const [row, column] of sheet.touchedCells()) {
    const cell = sheet.cell(row, column);
    const value = cell?.value instanceof CellError ? cell.value.code : (cell?.value ?? null);
    const numberFormat = sheet.numberFormatAt(row, column);
    const wraps = sheet.wrapsTextAt(row, column);
    if (value !== null || cell?.formula !== undefined || numberFormat !== 'General' || wraps) {
      cells[cellText(row, column)] = [value, cell?.formula ?? null, numberFormat, wraps];
    }
  }
  return cells;
}

function widthsOf(sheet: HostSheet): unknown {
  return [...sheet.columnWidths]
    .filter(([, width]) => width !== standardColumnWidth)
    .sort(([a], [b]) => a - b);
}
