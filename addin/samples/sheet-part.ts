/**
 * One sheet of a sample workbook as the worksheet and table parts of a package.
 * Source: ECMA-376 Part 1, §18.3 (worksheets) and §18.5 (tables); elements stand in the order of its schema.
 */
import { columnLetters, columnOfLetters } from '../domain/sheet/cell-address';
import type { LookTable } from './look-table';
import type { SampleCell, SampleSheet, SampleTable } from './sample-workbook';
import { escapeXml } from './xml-text';

const mainNamespace = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const relationshipNamespace = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';

/** Row and column of A1 text, from 0. */
export function placeOfCell(cell: string): { row: number; column: number } {
  const [, letters, digits] = /^([A-Z]+)(\d+)$/.exec(cell) ?? [];
  if (letters === undefined || digits === undefined) {
    throw new RangeError(`${cell} is no cell of a sheet.`);
  }
  return { row: Number(digits) - 1, column: columnOfLetters(letters) };
}

/** The cells of one column or row, `A7:A18`, in their order. */
export function cellsOfRange(range: string): string[] {
  const [first, last] = range.split(':').map(placeOfCell);
  const cells: string[] = [];
  for (let row = first.row; row <= last.row; row++) {
    for (let column = first.column; column <= last.column; column++) {
      cells.push(columnLetters(column) + String(row + 1));
    }
  }
  return cells;
}

/** Relationship ids of what a sheet carries. */
export interface SheetRelations {
  readonly drawing?: string;
  readonly noteDrawing?: string;
  readonly tables: readonly string[];
}

export interface SheetContext {
  readonly looks: LookTable;
  /** Number of a text in the table of shared strings. */
  readonly numberOfText: (text: string) => number;
  readonly relations: SheetRelations;
  readonly isFirst: boolean;
  /** Position of the sheet's highlight among the workbook's. */
  readonly highlightNumber: number;
}

export function sheetXml(sheet: SampleSheet, context: SheetContext): string {
  const { relations } = context;
  return [
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
    `<worksheet xmlns="${mainNamespace}" xmlns:r="${relationshipNamespace}">`,
    '<sheetPr><pageSetUpPr fitToPage="1"/></sheetPr>',
    `<dimension ref="${usedRange(sheet)}"/>`,
    sheetViewXml(sheet, context.isFirst),
    '<sheetFormatPr defaultRowHeight="14"/>',
    columnsXml(sheet),
    `<sheetData>${rowsXml(sheet, context)}</sheetData>`,
    mergesXml(sheet),
    highlightXml(sheet, context.highlightNumber),
    pickListXml(sheet),
    '<printOptions horizontalCentered="1"/>',
    '<pageMargins left="0.5" right="0.5" top="0.6" bottom="0.6" header="0.3" footer="0.3"/>',
    `<pageSetup paperSize="9" orientation="${sheet.isPortrait === true ? 'portrait' : 'landscape'}" fitToHeight="0"/>`,
    sheet.pageFooter === undefined
      ? ''
      : `<headerFooter><oddFooter>${escapeXml(sheet.pageFooter)}</oddFooter></headerFooter>`,
    relations.drawing === undefined ? '' : `<drawing r:id="${relations.drawing}"/>`,
    relations.noteDrawing === undefined ? '' : `<legacyDrawing r:id="${relations.noteDrawing}"/>`,
    relations.tables.length === 0
      ? ''
      : `<tableParts count="${relations.tables.length}">${relations.tables.map((id) => `<tablePart r:id="${id}"/>`).join('')}</tableParts>`,
    '</worksheet>',
  ].join('');
}

function placesOf(sheet: SampleSheet): { row: number; column: number }[] {
  return [...sheet.cells.keys()].map(placeOfCell);
}

function usedRange(sheet: SampleSheet): string {
  const places = placesOf(sheet);
  const lastRow = Math.max(...places.map((place) => place.row));
  const lastColumn = Math.max(...places.map((place) => place.column));
  return `A1:${columnLetters(lastColumn)}${lastRow + 1}`;
}

function sheetViewXml(sheet: SampleSheet, isFirst: boolean): string {
  const start = `<sheetViews><sheetView showGridLines="0"${isFirst ? ' tabSelected="1"' : ''} workbookViewId="0">`;
  const end = '</sheetView></sheetViews>';
  if (sheet.frozenAt === undefined) {
    return start + end;
  }
  const { row, column } = placeOfCell(sheet.frozenAt);
  const splits = `${column > 0 ? ` xSplit="${column}"` : ''}${row > 0 ? ` ySplit="${row}"` : ''}`;
  const pane = column > 0 ? 'bottomRight' : 'bottomLeft';
  return (
    `${start}<pane${splits} topLeftCell="${sheet.frozenAt}" activePane="${pane}" state="frozen"/>` +
    `<selection pane="${pane}" activeCell="${sheet.frozenAt}" sqref="${sheet.frozenAt}"/>${end}`
  );
}

function columnsXml(sheet: SampleSheet): string {
  const columns = Object.entries(sheet.columnWidths)
    .map(([letters, width]) => ({ number: columnOfLetters(letters) + 1, width }))
    .sort((a, b) => a.number - b.number)
    .map(({ number, width }) => `<col min="${number}" max="${number}" width="${width}" customWidth="1"/>`);
  return `<cols>${columns.join('')}</cols>`;
}

function rowsXml(sheet: SampleSheet, context: SheetContext): string {
  const byRow = new Map<number, { column: number; name: string; cell: SampleCell }[]>();
  for (const [name, cell] of sheet.cells) {
    const { row, column } = placeOfCell(name);
    byRow.set(row, [...(byRow.get(row) ?? []), { column, name, cell }]);
  }
  return [...byRow.entries()]
    .sort(([a], [b]) => a - b)
    .map(([row, cells]) => {
      const height = sheet.rowHeights?.[row + 1];
      const heightText = height === undefined ? '' : ` ht="${height}" customHeight="1"`;
      const content = cells
        .sort((a, b) => a.column - b.column)
        .map(({ name, cell }) => cellXml(name, cell, context))
        .join('');
      return `<row r="${row + 1}"${heightText}>${content}</row>`;
    })
    .join('');
}

function cellXml(name: string, cell: SampleCell, context: SheetContext): string {
  const look = cell.look === undefined ? 0 : context.looks.numberOf(cell.look);
  const start = `<c r="${name}"${look === 0 ? '' : ` s="${look}"`}`;
  const { value } = cell;
  if (cell.formula !== undefined) {
    const type = typeof value === 'string' ? ' t="str"' : '';
    return `${start}${type}><f>${escapeXml(cell.formula)}</f><v>${escapeXml(String(value))}</v></c>`;
  }
  if (value === null) {
    return `${start}/>`;
  }
  return typeof value === 'string'
    ? `${start} t="s"><v>${context.numberOfText(value)}</v></c>`
    : `${start}><v>${value}</v></c>`;
}

function mergesXml(sheet: SampleSheet): string {
  const merges = sheet.merges ?? [];
  return merges.length === 0
    ? ''
    : `<mergeCells count="${merges.length}">${merges.map((range) => `<mergeCell ref="${range}"/>`).join('')}</mergeCells>`;
}

function highlightXml(sheet: SampleSheet, number: number): string {
  return sheet.highlight === undefined
    ? ''
    : `<conditionalFormatting sqref="${sheet.highlight.range}"><cfRule type="cellIs" dxfId="${number}" priority="1" operator="greaterThanOrEqual"><formula>${sheet.highlight.atLeast}</formula></cfRule></conditionalFormatting>`;
}

function pickListXml(sheet: SampleSheet): string {
  if (sheet.pickList === undefined) {
    return '';
  }
  const { range, choices, hint } = sheet.pickList;
  return (
    '<dataValidations count="1"><dataValidation type="list" allowBlank="1" showInputMessage="1"' +
    ` prompt="${escapeXml(hint)}" sqref="${range}"><formula1>${escapeXml(`"${choices.join(',')}"`)}</formula1>` +
    '</dataValidation></dataValidations>'
  );
}

/** @param id unique in the workbook, from 1 */
export function tableXml(sheet: SampleSheet, table: SampleTable, id: number): string {
  const [first, last] = table.range.split(':').map(placeOfCell);
  const headings: string[] = [];
  for (let column = first.column; column <= last.column; column++) {
    headings.push(String(sheet.cells.get(columnLetters(column) + String(first.row + 1))?.value));
  }
  const columns = headings.map((heading, position) => {
    const formula = table.columnFormulas?.[heading];
    const start = `<tableColumn id="${position + 1}" name="${escapeXml(heading)}"`;
    return formula === undefined
      ? `${start}/>`
      : `${start}><calculatedColumnFormula>${escapeXml(formula)}</calculatedColumnFormula></tableColumn>`;
  });
  return [
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
    `<table xmlns="${mainNamespace}" id="${id}" name="${table.name}" displayName="${table.name}"`,
    ` ref="${table.range}" totalsRowShown="0"><autoFilter ref="${table.range}"/>`,
    `<tableColumns count="${columns.length}">${columns.join('')}</tableColumns>`,
    '<tableStyleInfo name="TableStyleLight1" showFirstColumn="0" showLastColumn="0" showRowStripes="1"',
    ' showColumnStripes="0"/></table>',
  ].join('');
}
