/**
 * A sample workbook as the parts of an .xlsx package, and those as the bytes of the file.
 *
 * The bytes depend on the description alone: dates are fixed, and the compression is zip.js's own, not the host's.
 * Source: ECMA-376 Part 1, §18.2 (workbook), §11.3 (part names and relationships); Part 2 (packages).
 */
import { configure, TextReader, Uint8ArrayWriter, ZipWriter } from '@zip.js/zip.js';
import { quotedSheetName } from '../domain/sheet/cell-address';
import { chartXml, drawingXml } from './chart-part';
import { LookTable } from './look-table';
import { noteDrawingXml, notesXml, type Note } from './note-parts';
import type { BarChart, SampleSheet, SampleWorkbook } from './sample-workbook';
import { cellsOfRange, placeOfCell, sheetXml, tableXml } from './sheet-part';
import { escapeXml } from './xml-text';

const declaration = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const mainNamespace = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const officeRelationships = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const packageRelationships = 'http://schemas.openxmlformats.org/package/2006/relationships';
const spreadsheetTypes = 'application/vnd.openxmlformats-officedocument.spreadsheetml';
const madeOn = '2026-11-27T09:00:00Z';

interface Relationship {
  readonly id: string;
  /** Last part of the relationship's type. */
  readonly type: string;
  readonly target: string;
}

/** Part names and contents, in the order in which they stand in the file. */
export function sampleWorkbookParts(workbook: SampleWorkbook): Map<string, string> {
  const looks = new LookTable();
  const texts: string[] = [];
  let textUses = 0;
  const numberOfText = (text: string): number => {
    textUses++;
    const known = texts.indexOf(text);
    return known >= 0 ? known : texts.push(text) - 1;
  };
  const highlighted = workbook.sheets.filter((sheet) => sheet.highlight !== undefined);
  const bodies = new Map<string, string>();
  const overrides: [part: string, contentType: string][] = [];
  const add = (part: string, contentType: string, content: string): void => {
    bodies.set(part, content);
    overrides.push([part, contentType]);
  };
  let tableCount = 0;

  workbook.sheets.forEach((sheet, position) => {
    const number = position + 1;
    const relations: Relationship[] = [];
    const relate = (type: string, target: string): string => {
      const id = `rId${relations.length + 1}`;
      relations.push({ id, type, target });
      return id;
    };
    const notes = notesOf(sheet);
    const drawing =
      sheet.chart === undefined ? undefined : relate('drawing', `../drawings/drawing${number}.xml`);
    const noteDrawing =
      notes.length === 0 ? undefined : relate('vmlDrawing', `../drawings/vmlDrawing${number}.vml`);
    const tables = (sheet.tables ?? []).map((table) => {
      tableCount++;
      add(
        `xl/tables/table${tableCount}.xml`,
        `${spreadsheetTypes}.table+xml`,
        tableXml(sheet, table, tableCount),
      );
      return relate('table', `../tables/table${tableCount}.xml`);
    });
    add(
      `xl/worksheets/sheet${number}.xml`,
      `${spreadsheetTypes}.worksheet+xml`,
      sheetXml(sheet, {
        looks,
        numberOfText,
        relations: {
          tables,
          ...(drawing === undefined ? {} : { drawing }),
          ...(noteDrawing === undefined ? {} : { noteDrawing }),
        },
        isFirst: position === 0,
        highlightNumber: highlighted.indexOf(sheet),
      }),
    );
    if (notes.length > 0) {
      relate('comments', `../comments${number}.xml`);
      add(`xl/comments${number}.xml`, `${spreadsheetTypes}.comments+xml`, notesXml(notes));
      bodies.set(`xl/drawings/vmlDrawing${number}.vml`, noteDrawingXml(notes));
    }
    if (sheet.chart !== undefined) {
      addChart(sheet, sheet.chart, number, add, bodies);
    }
    if (relations.length > 0) {
      bodies.set(`xl/worksheets/_rels/sheet${number}.xml.rels`, relationshipsXml(relations));
    }
  });

  add(
    'xl/styles.xml',
    `${spreadsheetTypes}.styles+xml`,
    looks.toXml(highlighted.map((sheet) => sheet.highlight?.textColor ?? '')),
  );
  add('xl/sharedStrings.xml', `${spreadsheetTypes}.sharedStrings+xml`, sharedStringsXml(texts, textUses));
  add(
    'docProps/core.xml',
    'application/vnd.openxmlformats-package.core-properties+xml',
    corePropertiesXml(workbook),
  );
  add(
    'docProps/app.xml',
    'application/vnd.openxmlformats-officedocument.extended-properties+xml',
    `${declaration}<Properties xmlns="http://schemas.openxmlformats.org/officeDocument/2006/extended-properties"/>`,
  );
  return new Map([
    [
      '[Content_Types].xml',
      contentTypesXml([['xl/workbook.xml', `${spreadsheetTypes}.sheet.main+xml`], ...overrides]),
    ],
    ['_rels/.rels', packageRelationshipsXml()],
    ['xl/workbook.xml', workbookXml(workbook)],
    ['xl/_rels/workbook.xml.rels', workbookRelationshipsXml(workbook)],
    ...bodies,
  ]);
}

/** The bytes of the .xlsx file: the same on every machine. */
export async function packSampleWorkbook(workbook: SampleWorkbook): Promise<Uint8Array> {
  // The host's own compressor gives other bytes from one version of Node to the next.
  configure({ useWebWorkers: false, useCompressionStream: false });
  const zip = new ZipWriter(new Uint8ArrayWriter(), {
    level: 6,
    // A zip's dates are local time without a zone: these figures, whatever the zone.
    lastModDate: new Date(2026, 10, 27, 9, 0, 0),
    extendedTimestamp: false,
    dataDescriptor: false,
  });
  for (const [name, content] of sampleWorkbookParts(workbook)) {
    await zip.add(name, new TextReader(content));
  }
  return zip.close();
}

function notesOf(sheet: SampleSheet): Note[] {
  return [...sheet.cells].flatMap(([cell, { note }]) =>
    note === undefined ? [] : [{ cell, text: note, ...placeOfCell(cell) }],
  );
}

function addChart(
  sheet: SampleSheet,
  chart: BarChart,
  number: number,
  add: (part: string, contentType: string, content: string) => void,
  bodies: Map<string, string>,
): void {
  const valueOf = (cell: string): string | number => sheet.cells.get(cell)?.value ?? '';
  const data = {
    categoriesReference: absoluteReference(sheet.name, chart.categories),
    valuesReference: absoluteReference(sheet.name, chart.values),
    seriesNameReference: absoluteReference(sheet.name, chart.seriesNameCell),
    seriesName: String(valueOf(chart.seriesNameCell)),
    categories: cellsOfRange(chart.categories).map((cell) => String(valueOf(cell))),
    values: cellsOfRange(chart.values).map((cell) => Number(valueOf(cell))),
    numberFormat: '#,##0',
  };
  add(
    `xl/drawings/drawing${number}.xml`,
    'application/vnd.openxmlformats-officedocument.drawing+xml',
    drawingXml(chart),
  );
  bodies.set(
    `xl/drawings/_rels/drawing${number}.xml.rels`,
    relationshipsXml([{ id: 'rId1', type: 'chart', target: `../charts/chart${number}.xml` }]),
  );
  add(
    `xl/charts/chart${number}.xml`,
    'application/vnd.openxmlformats-officedocument.drawingml.chart+xml',
    chartXml(chart, data),
  );
}

/** `'Week plan'!$A$7:$A$18` for `A7:A18`. */
function absoluteReference(sheet: string, range: string): string {
  return `${quotedSheetName(sheet)}!${range.replace(/([A-Z]+)(\d+)/g, '$$$1$$$2')}`;
}

function relationshipsXml(relations: readonly Relationship[]): string {
  const items = relations.map(
    ({ id, type, target }) =>
      `<Relationship Id="${id}" Type="${officeRelationships}/${type}" Target="${target}"/>`,
  );
  return `${declaration}<Relationships xmlns="${packageRelationships}">${items.join('')}</Relationships>`;
}

function packageRelationshipsXml(): string {
  return [
    `${declaration}<Relationships xmlns="${packageRelationships}">`,
    `<Relationship Id="rId1" Type="${officeRelationships}/officeDocument" Target="xl/workbook.xml"/>`,
    `<Relationship Id="rId2" Type="${packageRelationships}/metadata/core-properties" Target="docProps/core.xml"/>`,
    `<Relationship Id="rId3" Type="${officeRelationships}/extended-properties" Target="docProps/app.xml"/>`,
    '</Relationships>',
  ].join('');
}

function workbookRelationshipsXml(workbook: SampleWorkbook): string {
  const sheets = workbook.sheets.map((_sheet, position) => ({
    id: `rId${position + 1}`,
    type: 'worksheet',
    target: `worksheets/sheet${position + 1}.xml`,
  }));
  const next = sheets.length + 1;
  return relationshipsXml([
    ...sheets,
    { id: `rId${next}`, type: 'styles', target: 'styles.xml' },
    { id: `rId${next + 1}`, type: 'sharedStrings', target: 'sharedStrings.xml' },
  ]);
}

function workbookXml(workbook: SampleWorkbook): string {
  const sheets = workbook.sheets.map(
    (sheet, position) =>
      `<sheet name="${escapeXml(sheet.name)}" sheetId="${position + 1}" r:id="rId${position + 1}"/>`,
  );
  return [
    `${declaration}<workbook xmlns="${mainNamespace}" xmlns:r="${officeRelationships}">`,
    '<bookViews><workbookView xWindow="0" yWindow="0" windowWidth="24000" windowHeight="13000" activeTab="0"/></bookViews>',
    `<sheets>${sheets.join('')}</sheets>`,
    `<definedNames>${definedNames(workbook).join('')}</definedNames>`,
    '<calcPr calcId="191029"/></workbook>',
  ].join('');
}

/** In the order of their names, as spreadsheet programs store them. */
function definedNames(workbook: SampleWorkbook): string[] {
  const names = Object.entries(workbook.names).map(([name, formula]) => ({
    name,
    formula,
    sheet: undefined as number | undefined,
  }));
  workbook.sheets.forEach((sheet, position) => {
    if (sheet.printArea !== undefined) {
      names.push({
        name: '_xlnm.Print_Area',
        formula: absoluteReference(sheet.name, sheet.printArea),
        sheet: position,
      });
    }
    if (sheet.printTitleRows !== undefined) {
      names.push({
        name: '_xlnm.Print_Titles',
        formula: `${quotedSheetName(sheet.name)}!${sheet.printTitleRows}`,
        sheet: position,
      });
    }
  });
  return names
    .sort((a, b) => (a.name.toLowerCase() < b.name.toLowerCase() ? -1 : 1))
    .map(({ name, formula, sheet }) => {
      const scope = sheet === undefined ? '' : ` localSheetId="${sheet}"`;
      return `<definedName name="${escapeXml(name)}"${scope}>${escapeXml(formula)}</definedName>`;
    });
}

function sharedStringsXml(texts: readonly string[], uses: number): string {
  const items = texts.map((text) => `<si><t xml:space="preserve">${escapeXml(text)}</t></si>`);
  return `${declaration}<sst xmlns="${mainNamespace}" count="${uses}" uniqueCount="${texts.length}">${items.join('')}</sst>`;
}

function corePropertiesXml(workbook: SampleWorkbook): string {
  return [
    `${declaration}<cp:coreProperties xmlns:cp="http://schemas.openxmlformats.org/package/2006/metadata/core-properties"`,
    ' xmlns:dc="http://purl.org/dc/elements/1.1/" xmlns:dcterms="http://purl.org/dc/terms/"',
    ' xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">',
    `<dc:title>${escapeXml(workbook.title)}</dc:title><dc:creator>Planning</dc:creator>`,
    `<dcterms:created xsi:type="dcterms:W3CDTF">${madeOn}</dcterms:created>`,
    `<dcterms:modified xsi:type="dcterms:W3CDTF">${madeOn}</dcterms:modified></cp:coreProperties>`,
  ].join('');
}

function contentTypesXml(overrides: readonly (readonly [part: string, contentType: string])[]): string {
  return [
    `${declaration}<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types">`,
    '<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/>',
    '<Default Extension="xml" ContentType="application/xml"/>',
    '<Default Extension="vml" ContentType="application/vnd.openxmlformats-officedocument.vmlDrawing"/>',
    ...overrides.map(([part, contentType]) => `<Override PartName="/${part}" ContentType="${contentType}"/>`),
    '</Types>',
  ].join('');
}
