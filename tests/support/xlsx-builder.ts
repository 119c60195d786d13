/**
 * Small .xlsx files for tests, from a plain description. Written here from the published standard (ECMA-376 Part 1),
 * with nothing of the code under test.
 *
 *     buildXlsx({
 *       sheets: [{ name: 'Plan', cells: { A1: 5, B1: { formula: 'A1*2', value: 10 }, C1: '=B1+1', D1: 'text' } }],
 *       names: { 'Week.Decision': 'Plan!$A$1' },
 *     })
 *
 * A text that begins with `=` is a formula with no value stored beside it.
 */
import { buildZip } from './zip-builder';

export interface CellParts {
  readonly value?: number | string | boolean | null | undefined;
  /** An error value such as `#N/A`, instead of value. */
  readonly error?: string | undefined;
  /** Without `=`. */
  readonly formula?: string | undefined;
  /** For the first cell of an array formula: the cells that it fills, `B1:B3`. */
  readonly arrayRange?: string | undefined;
  /** The array formula is a spilling one. */
  readonly isDynamicArray?: boolean | undefined;
  /** This formula is shared with the cells of this range, which say `sharedFrom`. */
  readonly sharedRange?: string | undefined;
  /** The cell whose shared formula stands here too. */
  readonly sharedFrom?: string | undefined;
  readonly numberFormat?: string | undefined;
  /** Shown as a date, by the format yyyy-mm-dd. */
  readonly isDate?: boolean | undefined;
}

export type CellDescription = number | string | boolean | null | CellParts;

export interface SheetDescription {
  readonly name: string;
  readonly cells?: Readonly<Record<string, CellDescription>> | undefined;
  /** Names local to this sheet. */
  readonly names?: Readonly<Record<string, string>> | undefined;
  readonly merges?: readonly string[] | undefined;
  /** As numbered on the sheet, from 1. */
  readonly hiddenRows?: readonly number[] | undefined;
  /** By letter. */
  readonly hiddenColumns?: readonly string[] | undefined;
  readonly visibility?: 'visible' | 'hidden' | 'veryHidden' | undefined;
  readonly isProtected?: boolean | undefined;
  /** Notes by cell. */
  readonly notes?: Readonly<Record<string, string>> | undefined;
  /** A range with filter buttons; with `isFiltered`, one of them is set. */
  readonly filterRange?: string | undefined;
  readonly isFiltered?: boolean | undefined;
  /** Where PivotTables stand. */
  readonly pivotRanges?: readonly string[] | undefined;
  /** XML put behind the sheet's cells as it stands (data validations, conditional formats, …). */
  readonly xmlAfterCells?: string | undefined;
  /** XML put before the sheet's cells (views, column widths, …). */
  readonly xmlBeforeCells?: string | undefined;
  /** Further relationships of the sheet: id, last segment of the type, target. */
  readonly relationships?: readonly (readonly [id: string, kind: string, target: string])[] | undefined;
}

export interface TableDescription {
  readonly name: string;
  readonly sheet: string;
  /** Headings, data and totals. */
  readonly ref: string;
  /** Otherwise taken from the texts in the heading row. */
  readonly columns?: readonly string[] | undefined;
  readonly hasHeaderRow?: boolean | undefined;
  readonly hasTotalsRow?: boolean | undefined;
}

export interface XlsxDescription {
  readonly sheets: readonly SheetDescription[];
  /** Names of the whole workbook: what they refer to, without `=`. */
  readonly names?: Readonly<Record<string, string>> | undefined;
  readonly hiddenNames?: Readonly<Record<string, string>> | undefined;
  readonly tables?: readonly TableDescription[] | undefined;
  readonly date1904?: boolean | undefined;
  /** Texts stand in their cells and not in a table of shared strings. */
  readonly hasInlineStrings?: boolean | undefined;
  /** Further parts, or parts to stand in place of the ones made here, by their name in the package. */
  readonly parts?: Readonly<Record<string, string | Uint8Array>> | undefined;
  /** Content types of such parts. */
  readonly contentTypes?: Readonly<Record<string, string>> | undefined;
  /** Further relationships of the workbook: last segment of the type, target. */
  readonly workbookRelationships?: readonly (readonly [kind: string, target: string])[] | undefined;
}

const declaration = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const main = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const relationshipsOf = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const packageRelationships = 'http://schemas.openxmlformats.org/package/2006/relationships';
const contentTypes = 'http://schemas.openxmlformats.org/package/2006/content-types';
const spreadsheetType = 'application/vnd.openxmlformats-officedocument.spreadsheetml';

export function escapeXml(text: string): string {
  return text.replace(/[&<>"]/g, (character) => `&#${character.charCodeAt(0)};`);
}

/** The parts of the package by name, in their order: for tests that must bend one of them. */
export function xlsxParts(description: XlsxDescription): Map<string, string | Uint8Array> {
  const strings = new Map<string, number>();
  const formats = new Map<string, number>([['General', 0]]);
  const overrides: string[] = [];
  const parts = new Map<string, string | Uint8Array>();
  const sheetParts = new Map<string, string>();
  let tableCount = 0;
  let pivotCount = 0;

  description.sheets.forEach((sheet, sheetIndex) => {
    const number = sheetIndex + 1;
    const relationships: string[] = [];
    const relate = (kind: string, target: string): string => {
      const id = `rId${relationships.length + 1}`;
      relationships.push(`<Relationship Id="${id}" Type="${relationshipsOf}/${kind}" Target="${target}"/>`);
      return id;
    };
    for (const [id, kind, target] of sheet.relationships ?? []) {
      relationships.push(`<Relationship Id="${id}" Type="${relationshipsOf}/${kind}" Target="${target}"/>`);
    }
    let after = '';
    if (sheet.isProtected) after += '<sheetProtection sheet="1" objects="1" scenarios="1"/>';
    if (sheet.filterRange !== undefined) {
      const column = '<filterColumn colId="0"><filters><filter val="x"/></filters></filterColumn>';
      after += `<autoFilter ref="${sheet.filterRange}">${sheet.isFiltered ? column : ''}</autoFilter>`;
    }
    if (sheet.merges?.length) {
      const merges = sheet.merges.map((range) => `<mergeCell ref="${range}"/>`).join('');
      after += `<mergeCells count="${sheet.merges.length}">${merges}</mergeCells>`;
    }
    after += sheet.xmlAfterCells ?? '';
    if (sheet.notes !== undefined) {
      const notes = Object.entries(sheet.notes).map(
        ([cell, text]) =>
          `<comment ref="${cell}" authorId="0"><text><t>${escapeXml(text)}</t></text></comment>`,
      );
      parts.set(
        `xl/comments${number}.xml`,
        `${declaration}<comments xmlns="${main}"><authors><author>Planner</author></authors>` +
          `<commentList>${notes.join('')}</commentList></comments>`,
      );
      overrides.push(override(`xl/comments${number}.xml`, `${spreadsheetType}.comments+xml`));
      relate('comments', `../comments${number}.xml`);
    }
    for (const range of sheet.pivotRanges ?? []) {
      pivotCount++;
      const part = `xl/pivotTables/pivotTable${pivotCount}.xml`;
      parts.set(
        part,
        `${declaration}<pivotTableDefinition xmlns="${main}" name="Pivot${pivotCount}" cacheId="1" ` +
          `dataCaption="Values"><location ref="${range}" firstHeaderRow="1" firstDataRow="1" firstDataCol="1"/>` +
          '</pivotTableDefinition>',
      );
      overrides.push(override(part, `${spreadsheetType}.pivotTable+xml`));
      relate('pivotTable', `../pivotTables/pivotTable${pivotCount}.xml`);
    }
    const tableParts: string[] = [];
    for (const table of description.tables ?? []) {
      if (table.sheet !== sheet.name) continue;
      tableCount++;
      const part = `xl/tables/table${tableCount}.xml`;
      parts.set(part, tableXml(table, tableCount, sheet));
      overrides.push(override(part, `${spreadsheetType}.table+xml`));
      tableParts.push(`<tablePart r:id="${relate('table', `../tables/table${tableCount}.xml`)}"/>`);
    }
    if (tableParts.length > 0) {
      after += `<tableParts count="${tableParts.length}">${tableParts.join('')}</tableParts>`;
    }
    sheetParts.set(
      `xl/worksheets/sheet${number}.xml`,
      `${declaration}<worksheet xmlns="${main}" xmlns:r="${relationshipsOf}">` +
        `${sheet.xmlBeforeCells ?? ''}${hiddenColumnsXml(sheet)}` +
        `<sheetData>${rowsXml(sheet, strings, formats, description.hasInlineStrings ?? false)}</sheetData>` +
        `${after}</worksheet>`,
    );
    overrides.push(override(`xl/worksheets/sheet${number}.xml`, `${spreadsheetType}.worksheet+xml`));
    if (relationships.length > 0) {
      parts.set(
        `xl/worksheets/_rels/sheet${number}.xml.rels`,
        `${declaration}<Relationships xmlns="${packageRelationships}">${relationships.join('')}</Relationships>`,
      );
    }
  });

  const workbookRelationships = description.sheets.map(
    (_, index) =>
      `<Relationship Id="rId${index + 1}" Type="${relationshipsOf}/worksheet" Target="worksheets/sheet${index + 1}.xml"/>`,
  );
  const relateWorkbook = (kind: string, target: string): void => {
    const id = workbookRelationships.length + 1;
    workbookRelationships.push(
      `<Relationship Id="rId${id}" Type="${relationshipsOf}/${kind}" Target="${target}"/>`,
    );
  };
  relateWorkbook('styles', 'styles.xml');
  overrides.push(override('xl/styles.xml', `${spreadsheetType}.styles+xml`));
  if (strings.size > 0) {
    relateWorkbook('sharedStrings', 'sharedStrings.xml');
    overrides.push(override('xl/sharedStrings.xml', `${spreadsheetType}.sharedStrings+xml`));
  }
  for (const [kind, target] of description.workbookRelationships ?? []) relateWorkbook(kind, target);
  for (const [part, type] of Object.entries(description.contentTypes ?? {}))
    overrides.push(override(part, type));
  overrides.push(override('xl/workbook.xml', `${spreadsheetType}.sheet.main+xml`));

  const whole = new Map<string, string | Uint8Array>([
    [
      '[Content_Types].xml',
      `${declaration}<Types xmlns="${contentTypes}">` +
        '<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/>' +
        `<Default Extension="xml" ContentType="application/xml"/>${overrides.join('')}</Types>`,
    ],
    [
      '_rels/.rels',
      `${declaration}<Relationships xmlns="${packageRelationships}"><Relationship Id="rId1" ` +
        `Type="${relationshipsOf}/officeDocument" Target="xl/workbook.xml"/></Relationships>`,
    ],
    ['xl/workbook.xml', workbookXml(description)],
    [
      'xl/_rels/workbook.xml.rels',
      `${declaration}<Relationships xmlns="${packageRelationships}">${workbookRelationships.join('')}</Relationships>`,
    ],
    ['xl/styles.xml', stylesXml(formats)],
    ...sheetParts,
    ...parts,
  ]);
  if (strings.size > 0) whole.set('xl/sharedStrings.xml', sharedStringsXml(strings));
  for (const [name, content] of Object.entries(description.parts ?? {})) whole.set(name, content);
  return whole;
}

/** The file's bytes. */
export function buildXlsx(description: XlsxDescription): Uint8Array {
  return buildZip([...xlsxParts(description)].map(([name, content]) => ({ name, content })));
}

function override(part: string, type: string): string {
  return `<Override PartName="/${part}" ContentType="${type}"/>`;
}

function workbookXml(description: XlsxDescription): string {
  const sheets = description.sheets.map((sheet, index) => {
    const state =
      sheet.visibility === undefined || sheet.visibility === 'visible' ? '' : ` state="${sheet.visibility}"`;
    return `<sheet name="${escapeXml(sheet.name)}" sheetId="${index + 1}"${state} r:id="rId${index + 1}"/>`;
  });
  const names: string[] = [];
  const add = (entries: Readonly<Record<string, string>> | undefined, attributes: string): void => {
    for (const [name, formula] of Object.entries(entries ?? {})) {
      names.push(`<definedName name="${escapeXml(name)}"${attributes}>${escapeXml(formula)}</definedName>`);
    }
  };
  add(description.names, '');
  add(description.hiddenNames, ' hidden="1"');
  description.sheets.forEach((sheet, index) => add(sheet.names, ` localSheetId="${index}"`));
  return (
    `${declaration}<workbook xmlns="${main}" xmlns:r="${relationshipsOf}">` +
    (description.date1904 ? '<workbookPr date1904="1"/>' : '') +
    `<sheets>${sheets.join('')}</sheets>` +
    (names.length > 0 ? `<definedNames>${names.join('')}</definedNames>` : '') +
    '</workbook>'
  );
}

function stylesXml(formats: ReadonlyMap<string, number>): string {
  const codes = [...formats.keys()].slice(1);
  const numFmts = codes.map(
    (code, index) => `<numFmt numFmtId="${164 + index}" formatCode="${escapeXml(code)}"/>`,
  );
  const xfs = codes.map(
    (_, index) =>
      `<xf numFmtId="${164 + index}" fontId="0" fillId="0" borderId="0" xfId="0" applyNumberFormat="1"/>`,
  );
  return (
    `${declaration}<styleSheet xmlns="${main}">` +
    (codes.length > 0 ? `<numFmts count="${codes.length}">${numFmts.join('')}</numFmts>` : '') +
    '<fonts count="1"><font><sz val="11"/><name val="Calibri"/></font></fonts>' +
    '<fills count="2"><fill><patternFill patternType="none"/></fill><fill><patternFill patternType="gray125"/></fill></fills>' +
    '<borders count="1"><border><left/><right/><top/><bottom/><diagonal/></border></borders>' +
    '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>' +
    `<cellXfs count="${codes.length + 1}"><xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/>${xfs.join('')}</cellXfs>` +
    '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles></styleSheet>'
  );
}

function sharedStringsXml(strings: ReadonlyMap<string, number>): string {
  const items = [...strings.keys()].map((text) => `<si><t xml:space="preserve">${escapeXml(text)}</t></si>`);
  return `${declaration}<sst xmlns="${main}" count="${items.length}" uniqueCount="${items.length}">${items.join('')}</sst>`;
}

function tableXml(table: TableDescription, id: number, sheet: SheetDescription): string {
  const [first, last = first] = table.ref.split(':') as [string, string?];
  const top = splitReference(first);
  const bottom = splitReference(last);
  const columns: string[] = [];
  for (let column = columnNumber(top.letters); column <= columnNumber(bottom.letters); column++) {
    const heading = sheet.cells?.[`${lettersOf(column)}${top.row}`];
    const given = table.columns?.[columns.length];
    columns.push(given ?? (typeof heading === 'string' ? heading : `Column${columns.length + 1}`));
  }
  const tableColumns = columns.map(
    (name, index) => `<tableColumn id="${index + 1}" name="${escapeXml(name)}"/>`,
  );
  return (
    `${declaration}<table xmlns="${main}" id="${id}" name="${table.name}" displayName="${table.name}" ref="${table.ref}"` +
    `${table.hasHeaderRow === false ? ' headerRowCount="0"' : ''}` +
    `${table.hasTotalsRow ? ' totalsRowCount="1"' : ' totalsRowShown="0"'}>` +
    `<tableColumns count="${columns.length}">${tableColumns.join('')}</tableColumns></table>`
  );
}

function hiddenColumnsXml(sheet: SheetDescription): string {
  if (!sheet.hiddenColumns?.length) return '';
  const numbers = sheet.hiddenColumns.map(columnNumber).sort((a, b) => a - b);
  const columns = numbers.map((number) => `<col min="${number}" max="${number}" width="9" hidden="1"/>`);
  return `<cols>${columns.join('')}</cols>`;
}

function rowsXml(
  sheet: SheetDescription,
  strings: Map<string, number>,
  formats: Map<string, number>,
  isInline: boolean,
): string {
  const rows = new Map<number, [column: number, xml: string][]>();
  for (const row of sheet.hiddenRows ?? []) rows.set(row, []);
  const groups = new Map<string, number>();
  const groupOf = (master: string): number => {
    if (!groups.has(master)) groups.set(master, groups.size);
    return groups.get(master)!;
  };
  for (const [reference, description] of Object.entries(sheet.cells ?? {})) {
    const { letters, row } = splitReference(reference);
    const parts: CellParts =
      typeof description === 'object' && description !== null
        ? description
        : typeof description === 'string' && description.startsWith('=')
          ? { formula: description.slice(1) }
          : { value: description };
    if (!rows.has(row)) rows.set(row, []);
    rows
      .get(row)!
      .push([columnNumber(letters), cellXml(reference, parts, strings, formats, isInline, groupOf)]);
  }
  return [...rows]
    .sort(([a], [b]) => a - b)
    .map(([row, cells]) => {
      const hidden = sheet.hiddenRows?.includes(row) ? ' hidden="1"' : '';
      const ordered = cells.sort(([a], [b]) => a - b).map(([, xml]) => xml);
      return `<row r="${row}"${hidden}>${ordered.join('')}</row>`;
    })
    .join('');
}

function cellXml(
  reference: string,
  cell: CellParts,
  strings: Map<string, number>,
  formats: Map<string, number>,
  isInline: boolean,
  groupOf: (master: string) => number,
): string {
  const format = cell.numberFormat ?? (cell.isDate ? 'yyyy\\-mm\\-dd' : 'General');
  if (!formats.has(format)) formats.set(format, formats.size);
  const style = format === 'General' ? '' : ` s="${formats.get(format)!}"`;
  let formula = '';
  if (cell.sharedFrom !== undefined) formula = `<f t="shared" si="${groupOf(cell.sharedFrom)}"/>`;
  else if (cell.formula !== undefined) {
    const kind =
      cell.arrayRange !== undefined
        ? ` t="array" ref="${cell.arrayRange}"`
        : cell.sharedRange !== undefined
          ? ` t="shared" ref="${cell.sharedRange}" si="${groupOf(reference)}"`
          : '';
    formula = `<f${kind}>${escapeXml(cell.formula)}</f>`;
  }
  const dynamic = cell.isDynamicArray ? ' cm="1"' : '';
  const open = (type: string): string => `<c r="${reference}"${style}${type}${dynamic}>${formula}`;
  if (cell.error !== undefined) return `${open(' t="e"')}<v>${cell.error}</v></c>`;
  const value = cell.value;
  if (value === undefined || value === null) return `${open('')}</c>`;
  if (typeof value === 'number') return `${open('')}<v>${value}</v></c>`;
  if (typeof value === 'boolean') return `${open(' t="b"')}<v>${value ? 1 : 0}</v></c>`;
  if (formula !== '') return `${open(' t="str"')}<v>${escapeXml(value)}</v></c>`;
  if (isInline)
    return `${open(' t="inlineStr"')}<is><t xml:space="preserve">${escapeXml(value)}</t></is></c>`;
  if (!strings.has(value)) strings.set(value, strings.size);
  return `${open(' t="s"')}<v>${strings.get(value)!}</v></c>`;
}

function splitReference(reference: string): { letters: string; row: number } {
  const match = /^([A-Z]+)([0-9]+)$/.exec(reference);
  if (match === null) throw new RangeError(`"${reference}" is no cell: write it like B7`);
  return { letters: match[1], row: Number(match[2]) };
}

function columnNumber(letters: string): number {
  return [...letters].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0);
}

function lettersOf(column: number): string {
  const last = String.fromCharCode(65 + ((column - 1) % 26));
  return column > 26 ? lettersOf(Math.floor((column - 1) / 26)) + last : last;
}
