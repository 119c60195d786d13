/**
 * What a write does to the package: which bytes change and how, and that all others stay. Parts are looked at with
 * the zip reader of the tests, not with the adapter's.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { TextReader, Uint8ArrayReader, Uint8ArrayWriter, ZipReader, ZipWriter } from '@zip.js/zip.js';
import { XlsxWorkbook } from '../../../../addin/adapters/xlsx-file/xlsx-workbook';
import { verifyPatched } from '../../../../addin/adapters/xlsx-file/verify-patched';
import { columnOfLetters, type CellAddress } from '../../../../addin/domain/sheet/cell-address';
import { CellError } from '../../../../addin/domain/sheet/cell-value';
import type { WorkbookWrite, WritePlan } from '../../../../addin/domain/results-to-sheet/write-plan';
import { WorkbookError } from '../../../../addin/ports/workbook';
import { makeTileWeek } from '../../../golden/make-tile-week';
import { checkoutFolder, itNeeds, pathOfNeed } from '../../../support/needs';
import { buildXlsx, xlsxParts, type XlsxDescription } from '../../../support/xlsx-builder';
import { buildZip } from '../../../support/zip-builder';
import { inspectZip, textInZip } from '../../../support/zip-inspector';

// Slow only on a busy machine, and never judged by time.
jest.setTimeout(60_000);

const sheetPart = 'xl/worksheets/sheet1.xml';

function at(text: string, sheet = 'Plan'): CellAddress {
  const match = /^([A-Z]+)([0-9]+)$/.exec(text)!;
  return { sheet, row: Number(match[2]) - 1, column: columnOfLetters(match[1]) };
}

function value(text: string, written: number | string | boolean | null, more: object = {}): WorkbookWrite {
  return { kind: 'value', cell: at(text), value: written, ...more };
}

/** The written bytes, verified. */
async function written(before: Uint8Array, plan: WritePlan): Promise<Uint8Array> {
  const workbook = await XlsxWorkbook.open(before, 'week.xlsx');
  await workbook.apply(plan);
  await verifyPatched(before, workbook.bytes(), plan, 'week.xlsx');
  return workbook.bytes();
}

async function writtenPart(description: XlsxDescription, plan: WritePlan, part = sheetPart): Promise<string> {
  return textInZip(await written(buildXlsx(description), plan), part);
}

/** A file whose only sheet's part is this XML between `<worksheet …>` and its end. */
function sheetXml(inside: string, more: Partial<XlsxDescription> = {}): XlsxDescription {
  return {
    sheets: [{ name: 'Plan' }],
    ...more,
    parts: {
      ...more.parts,
      [sheetPart]: `<worksheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">${inside}</worksheet>`,
    },
  };
}

/** The inside of the sheet's part after the plan. */
async function patched(
  inside: string,
  plan: WritePlan,
  more: Partial<XlsxDescription> = {},
): Promise<string> {
  const text = await writtenPart(sheetXml(inside, more), plan);
  return text.replace(/^<worksheet [^>]*>|<\/worksheet>$/g, '');
}

async function refusal(description: XlsxDescription, plan: WritePlan): Promise<WorkbookError> {
  const workbook = await XlsxWorkbook.open(buildXlsx(description), 'week.xlsx');
  const before = workbook.bytes();
  const error: unknown = await workbook.apply(plan).catch((reason: unknown) => reason);
  expect(error).toBeInstanceOf(WorkbookError);
  // A plan that is refused leaves the workbook as it was.
  expect(workbook.bytes()).toBe(before);
  return error as WorkbookError;
}

describe('cells', () => {
  it('only the cells written change; every other character of the sheet stays', async () => {
    const before =
      '<sheetData>\r\n  <row r="1" spans="1:3" x:y="1" xmlns:x="urn:x"><!-- <c r="B1"/> --><c r="A1"   s="0" ><v>1</v></c>\r\n' +
      '<c r=\'C1\' t="str"><v><![CDATA[<c r="B1"/>]]>😀</v></c></row></sheetData><!-- 😀 <row r=\'9\'/> -->';
    expect(await patched(before, [value('A1', 2.5)])).toBe(before.replace('<v>1</v>', '<v>2.5</v>'));
    expect(await patched(before, [value('B1', 7)])).toBe(
      before.replace("<c r='C1'", '<c r="B1"><v>7</v></c><c r=\'C1\''),
    );
    expect(await patched(before, [value('A9', true)])).toBe(
      before.replace('</sheetData>', '<row r="9"><c r="A9" t="b"><v>1</v></c></row></sheetData>'),
    );
  });

  it('new cells and rows stand in their order, wherever they belong', async () => {
    const before =
      '<sheetData><row r="2"><c r="B2"><v>1</v></c><c r="D2"><v>2</v></c></row><row r="5"/><row r="7"></row></sheetData>';
    const plan = ['E9', 'A2', 'C2', 'E2', 'A1', 'B4', 'C5', 'A5', 'A7'].map((text) => value(text, 0));
    expect(await patched(before, plan)).toBe(
      '<sheetData><row r="1"><c r="A1"><v>0</v></c></row>' +
        '<row r="2"><c r="A2"><v>0</v></c><c r="B2"><v>1</v></c><c r="C2"><v>0</v></c><c r="D2"><v>2</v></c><c r="E2"><v>0</v></c></row>' +
        '<row r="4"><c r="B4"><v>0</v></c></row>' +
        '<row r="5"><c r="A5"><v>0</v></c><c r="C5"><v>0</v></c></row>' +
        '<row r="7"><c r="A7"><v>0</v></c></row>' +
        '<row r="9"><c r="E9"><v>0</v></c></row></sheetData>',
    );
  });

  it('an empty sheet, self-closed, is opened', async () => {
    expect(await patched('<sheetData/>', [value('B2', 1)])).toBe(
      '<sheetData><row r="2"><c r="B2"><v>1</v></c></row></sheetData>',
    );
    expect(await patched('<sheetData/>', [value('B2', null)])).toBe('<sheetData/>');
  });

  it('rows and cells without a place of their own are counted', async () => {
    const before = '<sheetData><row><c><v>1</v></c><c><v>2</v></c></row><row><c/></row></sheetData>';
    expect(await patched(before, [value('B1', 9), value('C1', 8), value('A2', 7)])).toBe(
      '<sheetData><row><c><v>1</v></c><c><v>9</v></c><c r="C1"><v>8</v></c></row><row><c><v>7</v></c></row></sheetData>',
    );
  });

  it('a written cell keeps its format and unknown attributes, and loses what belonged to its old value', async () => {
    const before =
      '<sheetData><row r="1"><c r="A1" s="0" t="s" vm="1" cm="1" ph="1"><v>0</v><extLst><ext uri="{u}"/></extLst></c></row></sheetData>';
    const more = { sheets: [{ name: 'Plan', cells: { A1: 'Wall tile' } }] };
    expect(await patched(before, [value('A1', 3)], more)).toBe(
      '<sheetData><row r="1"><c r="A1" s="0" ph="1"><v>3</v><extLst><ext uri="{u}"/></extLst></c></row></sheetData>',
    );
    expect(await patched(before, [value('A1', null)], more)).toBe(
      '<sheetData><row r="1"><c r="A1" s="0" ph="1"><extLst><ext uri="{u}"/></extLst></c></row></sheetData>',
    );
  });

  it('texts go into their cells, and the table of shared texts stays to the byte', async () => {
    const before = buildXlsx({ sheets: [{ name: 'Plan', cells: { A1: 'Wall tile' } }] });
    const after = await written(before, [
      value('A1', ' Floor <&> "tile"\n\u0001\u{1F600}_x0041_\r\uD800'),
      value('A2', ''),
    ]);
    expect(textInZip(after, sheetPart)).toContain(
      '<c r="A1" t="inlineStr"><is><t xml:space="preserve"> Floor &lt;&amp;&gt; "tile"\n_x0001_\u{1F600}_x005F_x0041__x000D__xD800_</t></is></c>',
    );
    expect(textInZip(after, 'xl/sharedStrings.xml')).toBe(textInZip(before, 'xl/sharedStrings.xml'));
  });

  it('numbers are written so that the same number is read', async () => {
    const numbers = [0.1 + 0.2, 1 / 3, 5e-324, Number.MAX_VALUE, -1e21, 123456789012345680000, 1e-7, -0];
    const cells = numbers.map((number, index) => value(`A${index + 1}`, number));
    const text = await patched('<sheetData/>', cells);
    const read = [...text.matchAll(/<v>([^<]*)<\/v>/g)].map((match) => Number(match[1]));
    expect(read).toEqual(numbers.map((number) => (number === 0 ? 0 : number)));
    expect(text).not.toContain('-0<');
  });

  it('a text of 32,767 characters is the longest', async () => {
    const description = sheetXml('<sheetData/>');
    await expect(written(buildXlsx(description), [value('A1', 'x'.repeat(32_767))])).resolves.toBeDefined();
    const error = await refusal(description, [value('A1', 'x'.repeat(32_768))]);
    expect(error.message).toBe(
      'Nothing was written to week.xlsx, because the text for Plan!A1 is longer than a cell can hold.',
    );
  });

  it('the used area and the spans of rows grow with what is written, and not otherwise', async () => {
    const before =
      '<dimension ref="B2:C3"/><sheetData><row r="2" spans="2:3"><c r="B2"><v>1</v></c></row><row r="3" spans="2:3"/></sheetData>';
    expect(await patched(before, [value('C2', 1)])).toContain(
      '<dimension ref="B2:C3"/><sheetData><row r="2" spans="2:3">',
    );
    const grown = await patched(before, [value('A2', 1), value('F3', 1), value('B9', 1)]);
    expect(grown).toContain('<dimension ref="A2:F9"/>');
    expect(grown).toContain('<row r="2" spans="1:3">');
    expect(grown).toContain('<row r="3" spans="2:6">');
  });

  it('a cell that is new in a formatted row or column has its format, as if it had been typed', async () => {
    const before =
      '<cols><col min="2" max="3" width="9" style="1"/></cols><sheetData><row r="2" s="2" customFormat="1"/></sheetData>';
    const more = {
      sheets: [
        {
          name: 'Plan',
          cells: { A1: { numberFormat: '0.0', value: 1 }, A2: { numberFormat: '0.00', value: 1 } },
        },
      ],
    };
    const text = await patched(before, [value('B1', 1), value('B2', 2), value('D1', 3)], more);
    expect(text).toContain('<c r="B1" s="1">');
    expect(text).toContain('<c r="B2" s="2">');
    expect(text).toContain('<c r="D1">');
  });

  it('keeps prefixes, the strict form and UTF-16, with the byte order mark', async () => {
    const parts = [
      ...xlsxParts({
        sheets: [{ name: 'Plan', cells: { A1: 'Wall tile', B1: 1, B2: { formula: 'B1*2', value: 2 } } }],
      }),
    ];
    const plan: WritePlan = [
      value('B1', 5, { numberFormatOf: at('A1'), wrapsText: true }),
      value('C3', 'ü'),
      { kind: 'storedValue', cell: at('B2'), value: 10 },
      { kind: 'columnWidth', sheet: 'Plan', column: 2, width: 12 },
      { kind: 'addSheet', name: 'Week results' },
      { kind: 'value', cell: at('A1', 'Week results'), value: 1 },
      { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$C$3' },
      { kind: 'recalculateOnOpening' },
      { kind: 'record', json: '{}' },
    ];
    const variants: ((text: string) => string | Buffer)[] = [
      (text) =>
        /spreadsheetml\/2006\/main"/.test(text)
          ? text.replace(/<(\/?)([a-zA-Z])/g, '<$1x:$2').replaceAll('xmlns="', 'xmlns:x="')
          : text,
      (text) =>
        text
          .replaceAll(
            'http://schemas.openxmlformats.org/spreadsheetml/2006/main',
            'http://purl.oclc.org/ooxml/spreadsheetml/main',
          )
          .replaceAll(
            'http://schemas.openxmlformats.org/officeDocument/2006/relationships',
            'http://purl.oclc.org/ooxml/officeDocument/relationships',
          ),
      (text) => Buffer.from(`\uFEFF${text.replace('UTF-8', 'UTF-16')}`, 'utf16le'),
      (text) => Buffer.from(`\uFEFF${text.replace('UTF-8', 'UTF-16')}`, 'utf16le').swap16(),
      (text) => `\uFEFF${text}`,
    ];
    const results = [];
    for (const variant of variants) {
      const before = buildZip(
        parts.map(([name, content]) => ({ name, content: variant(content as string) })),
      );
      results.push(await written(before, plan));
    }
    const [prefixed, strict, little, , marked] = results;
    expect(textInZip(prefixed, sheetPart)).toContain(
      '<x:c r="C3" t="inlineStr"><x:is><x:t>ü</x:t></x:is></x:c>',
    );
    expect(textInZip(prefixed, 'xl/workbook.xml')).toContain('<x:calcPr fullCalcOnLoad="1"/>');
    expect(textInZip(strict, 'xl/worksheets/sheet2.xml')).toContain(
      'xmlns="http://purl.oclc.org/ooxml/spreadsheetml/main"',
    );
    expect(textInZip(strict, 'xl/_rels/workbook.xml.rels')).not.toContain(
      'schemas.openxmlformats.org/officeDocument',
    );
    const utf16 = inspectZip(little)
      .find(({ name }) => name === sheetPart)!
      .content.toString('utf16le');
    expect(utf16.startsWith('\uFEFF<?xml')).toBe(true);
    expect(utf16).toContain('<t>ü</t>');
    expect(textInZip(marked, sheetPart).startsWith('\uFEFF<?xml')).toBe(true);
  });
});

describe('formulas', () => {
  it('a stored value is renewed between the same tags, whatever kind of formula it belongs to', async () => {
    const before =
      '<sheetData><row r="1"><c r="A1" t="e" vm="2"><f ca="1">B1/0</f><v>#DIV/0!</v></c>' +
      '<c r="C1" cm="1"><f t="array" ref="C1:C2">_xlfn.SEQUENCE(2)</f><v>1</v></c><c r="D1"><f t="shared" ref="D1:D2" si="0">A1</f></c></row>' +
      '<row r="2"><c r="D2"><f t="shared" si="0"/><v>3</v></c></row></sheetData>';
    const plan: WritePlan = [
      { kind: 'storedValue', cell: at('A1'), value: 4 },
      { kind: 'storedValue', cell: at('C1'), value: 'x<' },
      { kind: 'storedValue', cell: at('C2'), value: true },
      { kind: 'storedValue', cell: at('D1'), value: CellError.of('#N/A') },
      { kind: 'storedValue', cell: at('D2'), value: undefined },
    ];
    expect(await patched(before, plan)).toBe(
      '<sheetData><row r="1"><c r="A1"><f ca="1">B1/0</f><v>4</v></c>' +
        '<c r="C1" cm="1" t="str"><f t="array" ref="C1:C2">_xlfn.SEQUENCE(2)</f><v>x&lt;</v></c>' +
        '<c r="D1" t="e"><f t="shared" ref="D1:D2" si="0">A1</f><v>#N/A</v></c></row>' +
        '<row r="2"><c r="C2" t="b"><v>1</v></c><c r="D2"><f t="shared" si="0"/></c></row></sheetData>',
    );
  });

  it('a formula that is added drops the order of calculation; a value that is added leaves it', async () => {
    const description: XlsxDescription = {
      sheets: [{ name: 'Plan', cells: { A1: { formula: 'B1', value: 0 } } }],
      parts: {
        'xl/calcChain.xml':
          '<calcChain xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"><c r="A1" i="1"/></calcChain>',
      },
      contentTypes: {
        'xl/calcChain.xml': 'application/vnd.openxmlformats-officedocument.spreadsheetml.calcChain+xml',
      },
      workbookRelationships: [['calcChain', 'calcChain.xml']],
    };
    const names = (bytes: Uint8Array): string[] => inspectZip(bytes).map(({ name }) => name);
    const before = buildXlsx(description);
    const withValue = await written(before, [value('C1', 1)]);
    expect(names(withValue)).toEqual(names(before));
    const withFormula = await written(before, [
      { kind: 'formula', cell: at('C1'), formula: 'A1&"<"', value: '0<' },
    ]);
    expect(names(withFormula)).toEqual(names(before).filter((name) => name !== 'xl/calcChain.xml'));
    expect(textInZip(withFormula, '[Content_Types].xml')).not.toContain('calcChain');
    expect(textInZip(withFormula, 'xl/_rels/workbook.xml.rels')).not.toContain('calcChain');
    expect(textInZip(withFormula, sheetPart)).toContain(
      '<c r="C1" t="str"><f>A1&amp;"&lt;"</f><v>0&lt;</v></c>',
    );
  });
});

describe('what must not be written into', () => {
  const description: XlsxDescription = {
    sheets: [
      {
        name: 'Plan',
        cells: {
          A1: 'Product',
          B1: 'Cost',
          A2: 'Wall tile',
          B2: 4,
          D1: { formula: 'A2', sharedRange: 'D1:D2', value: 'x' },
          D2: { sharedFrom: 'D1', value: 'x' },
          F1: { formula: '_xlfn.SEQUENCE(3)', arrayRange: 'F1:F3', isDynamicArray: true, value: 1 },
        },
        merges: ['H1:I2'],
        pivotRanges: ['K1:L9'],
      },
    ],
    tables: [{ name: 'Costs', sheet: 'Plan', ref: 'A1:B3', hasTotalsRow: true }],
  };
  it.each([
    ['D1', 'holds a formula'],
    ['D2', 'holds a formula'],
    ['F1', 'holds a formula'],
    ['F2', 'is filled by an array formula'],
    ['I1', 'is covered by a merged cell'],
    ['H2', 'is covered by a merged cell'],
    ['A1', 'is a heading or a total of the table Costs'],
    ['B3', 'is a heading or a total of the table Costs'],
    ['L9', 'belongs to a PivotTable'],
  ])('%s: it %s', async (cell, why) => {
    const error = await refusal(description, [value('B2', 5), value(cell, 1)]);
    expect(error.code).toBe('would-overwrite');
    expect(error.message).toBe(`Nothing was written to week.xlsx, because Plan!${cell} ${why}.`);
  });

  it('a table is written into between its heading and its total, and a merged cell at its first', async () => {
    await expect(
      written(buildXlsx(description), [value('B2', 5), value('H1', 'x'), value('M1', 1)]),
    ).resolves.toBeDefined();
  });

  it.each<[string, WorkbookWrite[], string]>([
    [
      'a place outside the sheet',
      [{ kind: 'value', cell: { sheet: 'Plan', row: 1_048_576, column: 0 }, value: 1 }],
      'Plan!A1048577 lies outside the sheet',
    ],
    [
      'a formula that is too long',
      [{ kind: 'formula', cell: at('M1'), formula: 'A'.repeat(8193), value: 1 }],
      'the formula for Plan!M1 cannot stand in a cell',
    ],
    [
      'a formula with a control character',
      [{ kind: 'formula', cell: at('M1'), formula: '"\u0001"', value: 1 }],
      'the formula for Plan!M1 cannot stand in a cell',
    ],
    [
      'a column without width',
      [{ kind: 'columnWidth', sheet: 'Plan', column: 0, width: 0 }],
      'a column cannot be 0 characters wide',
    ],
    ['a sheet without a name', [{ kind: 'addSheet', name: '' }], 'a sheet cannot be named '],
    [
      'a sheet with brackets in its name',
      [{ kind: 'addSheet', name: 'Plan [2]' }],
      'a sheet cannot be named Plan [2]',
    ],
    [
      'a sheet with a name of 32 characters',
      [{ kind: 'addSheet', name: 'x'.repeat(32) }],
      `a sheet cannot be named ${'x'.repeat(32)}`,
    ],
    [
      'a name that looks like a cell',
      [{ kind: 'name', name: 'AB12', scope: null, formula: '1' }],
      'AB12 cannot be a name in a workbook',
    ],
    [
      'a name with a blank',
      [{ kind: 'name', name: 'Week Optimum', scope: null, formula: '1' }],
      'Week Optimum cannot be a name in a workbook',
    ],
    [
      'a name that refers to nothing',
      [{ kind: 'name', name: 'Week.Optimum', scope: null, formula: '=' }],
      'the name Week.Optimum cannot refer to what was asked',
    ],
    [
      'a name on a sheet that is not there',
      [{ kind: 'name', name: 'Week.Optimum', scope: 'Next', formula: '1' }],
      'it has no sheet named Next',
    ],
    [
      'a renewed value where a value was just written',
      [value('M1', 1), { kind: 'storedValue', cell: at('M1'), value: 2 }],
      'Plan!M1 holds no formula whose value could be renewed',
    ],
  ])('%s is refused', async (_what, plan, why) => {
    const error = await refusal(description, plan);
    expect(error.code).toBe('write-failed');
    expect(error.message).toBe(`Nothing was written to week.xlsx, because ${why}.`);
  });
});

describe('formats', () => {
  const description: XlsxDescription = {
    sheets: [
      {
        name: 'Plan',
        cells: { A1: { value: 1, numberFormat: '0.00' }, B1: { value: 2, numberFormat: '#,##0' }, C1: 3 },
      },
      { name: 'Cost data', cells: { A1: { value: 45000, isDate: true } } },
    ],
  };

  it('a copy of the cell’s own format with the other’s number format goes behind all formats, once', async () => {
    const before = buildXlsx(description);
    const styles = textInZip(before, 'xl/styles.xml');
    const fancy = styles.replace(
      /(<cellXfs count=")4(">.*?)<xf numFmtId="164"([^>]*)\/>/,
      '$14$2<xf numFmtId="164"$3><alignment horizontal="center"/><protection locked="0"/></xf>',
    );
    const after = await written(buildXlsx({ ...description, parts: { 'xl/styles.xml': fancy } }), [
      value('A1', 1, { numberFormatOf: at('B1') }),
      value('D1', 'Optimum\n(best)', { numberFormatOf: at('C1'), wrapsText: true }),
      value('D2', 1, { numberFormatOf: at('A1', 'Cost data') }),
      value('D3', 1, { numberFormatOf: at('A1', 'Cost data') }),
      value('A2', 1, { numberFormatOf: at('B1') }),
      value('B1', 1, { numberFormatOf: at('B1') }),
    ]);
    const changed = textInZip(after, 'xl/styles.xml');
    expect(changed).toBe(
      fancy.replace('<cellXfs count="4">', '<cellXfs count="6">').replace(
        '</cellXfs>',
        // A1 keeps its alignment and protection; D1 is the plain format with lines that break. The others exist.
        '<xf numFmtId="165" fontId="0" fillId="0" borderId="0" xfId="0" applyNumberFormat="1"><alignment horizontal="center"/><protection locked="0"/></xf>' +
          '<xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0" applyAlignment="1"><alignment wrapText="1"/></xf></cellXfs>',
      ),
    );
    const sheet = textInZip(after, sheetPart);
    expect(/<c r="A1" s="(\d+)"/.exec(sheet)?.[1]).toBe('4');
    expect(/<c r="D1" s="(\d+)"/.exec(sheet)?.[1]).toBe('5');
    expect(/<c r="D2" s="(\d+)"/.exec(sheet)?.[1]).toBe('3');
    expect(/<c r="D3" s="(\d+)"/.exec(sheet)?.[1]).toBe('3');
    expect(/<c r="A2" s="(\d+)"/.exec(sheet)?.[1]).toBe('2');
    const read = await (await XlsxWorkbook.open(after, 'week.xlsx')).read();
    expect(read.sheets[0].cell(0, 0)?.numberFormat).toBe('#,##0');
    expect(read.sheets[0].cell(1, 3)?.isDate).toBe(true);
  });

  it('a second write of the same formats adds none', async () => {
    const plan = [value('C1', 'a\nb', { numberFormatOf: at('B1'), wrapsText: true })];
    const first = await written(buildXlsx(description), plan);
    const second = await written(first, plan);
    expect(textInZip(second, 'xl/styles.xml')).toBe(textInZip(first, 'xl/styles.xml'));
  });

  it('an alignment that is there gets its text to break and keeps the rest', async () => {
    const styles = textInZip(buildXlsx(description), 'xl/styles.xml').replace(
      /<cellXfs count="4"><xf ([^>]*)\/>/,
      '<cellXfs count="4"><xf $1><alignment vertical="top" wrapText="0"></alignment></xf>',
    );
    const text = await writtenPart(
      { ...description, parts: { 'xl/styles.xml': styles } },
      [value('C1', 'a\nb', { wrapsText: true })],
      'xl/styles.xml',
    );
    expect(text).toContain(
      'applyAlignment="1"><alignment vertical="top" wrapText="1"></alignment></xf></cellXfs>',
    );
  });

  it('a row that is fitted to its text forgets its height when a heading of two lines comes into it', async () => {
    const rows =
      '<sheetData><row r="1" ht="15" x="1"><c r="A1"/></row><row r="2" ht="15" customHeight="1"/></sheetData>';
    const plan = [value('B1', 'a\nb', { wrapsText: true }), value('B2', 'a\nb', { wrapsText: true })];
    const text = await patched(rows, plan);
    expect(text).toContain('<row r="1" x="1">');
    expect(text).toContain('<row r="2" ht="15" customHeight="1">');
  });

  it('a workbook without a styles part gets one when a format is needed', async () => {
    const parts = xlsxParts({ sheets: [{ name: 'Plan', cells: { A1: 1 } }] });
    parts.delete('xl/styles.xml');
    parts.set(
      'xl/_rels/workbook.xml.rels',
      (parts.get('xl/_rels/workbook.xml.rels') as string).replace(/<Relationship Id="rId2"[^>]*>/, ''),
    );
    parts.set(
      '[Content_Types].xml',
      (parts.get('[Content_Types].xml') as string).replace(/<Override PartName="\/xl\/styles.xml"[^>]*>/, ''),
    );
    const before = buildZip([...parts].map(([name, content]) => ({ name, content })));
    const plain = await written(before, [value('B1', 1, { numberFormatOf: at('A1') })]);
    expect(inspectZip(plain)).toHaveLength(parts.size);
    const after = await written(before, [value('B1', 'a\nb', { wrapsText: true })]);
    expect(textInZip(after, 'xl/styles.xml')).toContain('<alignment wrapText="1"/>');
    expect(textInZip(after, '[Content_Types].xml')).toContain('PartName="/xl/styles.xml"');
  });
});

describe('column widths', () => {
  const width = (column: string, characters: number): WorkbookWrite => ({
    kind: 'columnWidth',
    sheet: 'Plan',
    column: columnOfLetters(column),
    width: characters,
  });

  it('a list is made directly before the cells where there is none', async () => {
    const before = '<sheetFormatPr defaultRowHeight="15"/><sheetData/>';
    expect(await patched(before, [width('C', 12.5), width('A', 9)])).toBe(
      '<sheetFormatPr defaultRowHeight="15"/><cols><col min="1" max="1" width="9" customWidth="1"/>' +
        '<col min="3" max="3" width="12.5" customWidth="1"/></cols><sheetData/>',
    );
  });

  it('an entry for many columns is split around the one that changes, and keeps its other attributes', async () => {
    const before =
      '<cols><col min="2" max="5" width="8" style="0" bestFit="1" outlineLevel="1"/> <col min="8" max="16384" width="20"/></cols><sheetData/>';
    expect(await patched(before, [width('C', 12), width('A', 5), width('F', 6), width('H', 7)])).toBe(
      '<cols><col min="1" max="1" width="5" customWidth="1"/>' +
        '<col min="2" max="2" width="8" style="0" bestFit="1" outlineLevel="1"/><col min="3" max="3" width="12" style="0" outlineLevel="1" customWidth="1"/>' +
        '<col min="4" max="5" width="8" style="0" bestFit="1" outlineLevel="1"/> <col min="6" max="6" width="6" customWidth="1"/>' +
        '<col min="8" max="8" width="7" customWidth="1"/><col min="9" max="16384" width="20"/></cols><sheetData/>',
    );
  });
});

describe('the workbook part', () => {
  const description: XlsxDescription = { sheets: [{ name: 'Plan', cells: { A1: 1 } }, { name: 'Next' }] };
  const name = (text: string, formula: string, scope: string | null = null): WorkbookWrite => ({
    kind: 'name',
    name: text,
    scope,
    formula,
  });
  const workbookXml = (inside: string): XlsxDescription => ({
    ...description,
    parts: {
      'xl/workbook.xml': textInZip(buildXlsx(description), 'xl/workbook.xml').replace(
        '</workbook>',
        `${inside}</workbook>`,
      ),
    },
  });

  it('a list of names is made where the schema has it, and the request to calculate behind it', async () => {
    const text = await writtenPart(
      workbookXml('<externalReferences/><pivotCaches/><extLst/>'),
      [name('Week.Optimum', 'Plan!$B$1'), { kind: 'recalculateOnOpening' }],
      'xl/workbook.xml',
    );
    expect(text).toContain(
      '</sheets><externalReferences/><definedNames><definedName name="Week.Optimum">Plan!$B$1</definedName></definedNames>' +
        '<calcPr fullCalcOnLoad="1"/><pivotCaches/><extLst/></workbook>',
    );
  });

  it('names stand in the order of the alphabet; one that exists keeps its attributes and its place', async () => {
    const text = await writtenPart(
      workbookXml(
        '<definedNames><definedName name="Alpha" hidden="1" comment="mine">Plan!$A$1</definedName> <definedName name="Week.Sense">"maximise"</definedName></definedNames><calcPr calcId="1" fullCalcOnLoad="0"/>',
      ),
      [
        name('Week.Optimum', '\'Cost data\'!$A$1&"<"'),
        name('alpha', 'Plan!$B$2'),
        name('Zone', '1', 'Next'),
        name('Week.Optimum', 'Plan!$A$9', 'Plan'),
        { kind: 'recalculateOnOpening' },
      ],
      'xl/workbook.xml',
    );
    expect(text).toContain(
      '<definedNames><definedName name="Alpha" hidden="1" comment="mine">Plan!$B$2</definedName> ' +
        '<definedName name="Week.Optimum" localSheetId="0">Plan!$A$9</definedName>' +
        '<definedName name="Week.Optimum">\'Cost data\'!$A$1&amp;"&lt;"</definedName>' +
        '<definedName name="Week.Sense">"maximise"</definedName><definedName name="Zone" localSheetId="1">1</definedName></definedNames>' +
        '<calcPr calcId="1" fullCalcOnLoad="1"/>',
    );
  });

  it('a sheet that is added gets ids and a part that nothing else has', async () => {
    const before = buildXlsx({
      ...description,
      parts: {
        'xl/workbook.xml': textInZip(buildXlsx(description), 'xl/workbook.xml').replace(
          'sheetId="2"',
          'sheetId="77"',
        ),
        'xl/worksheets/SHEET3.xml':
          '<worksheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"/>',
      },
    });
    const after = await written(before, [
      { kind: 'addSheet', name: "Week's <results>" },
      { kind: 'value', cell: at('B2', "Week's <results>"), value: 'x' },
    ]);
    expect(textInZip(after, 'xl/workbook.xml')).toContain(
      '<sheet name="Week\'s &lt;results&gt;" sheetId="78" r:id="rId4"/></sheets>',
    );
    expect(textInZip(after, 'xl/_rels/workbook.xml.rels')).toContain(
      'Target="/xl/worksheets/sheet4.xml"/></Relationships>',
    );
    expect(textInZip(after, '[Content_Types].xml')).toContain(
      '<Override PartName="/xl/worksheets/sheet4.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/></Types>',
    );
    expect(inspectZip(after).at(-1)?.name).toBe('xl/worksheets/sheet4.xml');
  });

  it('the record is found again by its namespace, and the next one takes its place', async () => {
    const before = buildXlsx({ ...description, parts: { 'customXml/item1.xml': '<a/>' } });
    const first = await written(before, [{ kind: 'record', json: '{"a":"]]>\uFFFF\\n","b":"\uD800"}' }]);
    expect(
      inspectZip(first)
        .map((entry) => entry.name)
        .slice(-3),
    ).toEqual(['customXml/item2.xml', 'customXml/itemProps1.xml', 'customXml/_rels/item2.xml.rels']);
    const read = (await (await XlsxWorkbook.open(first, 'week.xlsx')).read()).record;
    expect(JSON.parse(read!)).toEqual({ a: ']]>\uFFFF\n', b: '\uD800' });
    const second = await written(first, [{ kind: 'record', json: '[1]' }]);
    expect(inspectZip(second)).toHaveLength(inspectZip(first).length);
    expect(textInZip(second, 'customXml/item2.xml')).toContain(
      '<record xmlns="urn:planrow:record:1">[1]</record>',
    );
  });

  it('a signed workbook says so', async () => {
    const open = (parts: Record<string, string>): Promise<XlsxWorkbook> =>
      XlsxWorkbook.open(buildXlsx({ ...description, parts }), 'week.xlsx');
    expect((await open({})).isSigned).toBe(false);
    expect((await open({ '_xmlsignatures/sig1.xml': '<Signature/>' })).isSigned).toBe(true);
  });

  it('an empty plan changes no byte of any part, and no entry of the zip', async () => {
    const before = buildXlsx(description);
    const after = await written(before, []);
    expect(inspectZip(after)).toEqual(inspectZip(before));
  });
});

describe('everything else stays to the byte', () => {
  /** Names of the parts whose packed bytes differ, and of those that came and went. */
  function differences(
    before: Uint8Array,
    after: Uint8Array,
  ): { changed: string[]; added: string[]; removed: string[] } {
    const [first, second] = [inspectZip(before), inspectZip(after)];
    const packedAfter = new Map(second.map(({ name, packed }) => [name, packed]));
    const namesBefore = new Set(first.map(({ name }) => name));
    const common = first.filter(({ name }) => packedAfter.has(name));
    // The order of the entries stays; new ones come last.
    expect(second.map(({ name }) => name).slice(0, common.length)).toEqual(common.map(({ name }) => name));
    return {
      changed: common
        .filter(({ name, packed }) => !packed.equals(packedAfter.get(name)!))
        .map(({ name }) => name),
      added: second.map(({ name }) => name).filter((name) => !namesBefore.has(name)),
      removed: first.map(({ name }) => name).filter((name) => !packedAfter.has(name)),
    };
  }

  const golden = (): Uint8Array =>
    new Uint8Array(readFileSync(path.join(checkoutFolder, 'tests', 'golden', 'tile-week.xlsx')));

  it('in the tile works’ week, with chart, notes, validations, formats and all: values alone change the sheet alone', async () => {
    const before = golden();
    const after = await written(before, [
      value('B4', 100),
      value('B5', 0),
      { kind: 'storedValue', cell: at('F4'), value: 420 },
      { kind: 'storedValue', cell: at('F5'), value: 0 },
      { kind: 'storedValue', cell: at('B9'), value: 1485 },
      { kind: 'storedValue', cell: at('E2', 'Cost data'), value: 168 },
    ]);
    expect(differences(before, after)).toEqual({
      // The stored value on the second sheet is the one that was there: that part stays too.
      changed: ['xl/worksheets/sheet1.xml'],
      added: [],
      removed: [],
    });
  });

  it('in the tile works’ week: result columns, names, a sheet and the record change what they must', async () => {
    const before = golden();
    const after = await written(before, [
      value('H3', 'Optimum\n(best amount)', { numberFormatOf: at('B3'), wrapsText: true }),
      value('H4', 100, { numberFormatOf: at('B4') }),
      { kind: 'columnWidth', sheet: 'Plan', column: 7, width: 14 },
      { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$H$4:$H$7' },
      { kind: 'addSheet', name: 'Week results' },
      { kind: 'formula', cell: at('A1', 'Week results'), formula: 'Plan!A4', value: 'Wall tile white' },
      { kind: 'record', json: '{}' },
      { kind: 'recalculateOnOpening' },
    ]);
    expect(differences(before, after)).toEqual({
      changed: [
        '[Content_Types].xml',
        'xl/workbook.xml',
        'xl/_rels/workbook.xml.rels',
        'xl/styles.xml',
        'xl/worksheets/sheet1.xml',
      ],
      added: [
        'xl/worksheets/sheet4.xml',
        'customXml/item2.xml',
        'customXml/itemProps2.xml',
        'customXml/_rels/item2.xml.rels',
      ],
      removed: ['xl/calcChain.xml'],
    });
  });

  itNeeds('sheetFixtures', 'in the shared workbook with 41 parts of every kind', async () => {
    const before = new Uint8Array(readFileSync(path.join(pathOfNeed('sheetFixtures'), 'rich.xlsx')));
    const after = await written(before, [
      { kind: 'value', cell: at('B2', 'Model'), value: 10 },
      { kind: 'value', cell: at('B3', 'Model'), value: 20 },
      { kind: 'value', cell: at('H1', 'Model'), value: 'Optimum <&> ü' },
      { kind: 'value', cell: at('H2', 'Model'), value: 10 },
      { kind: 'storedValue', cell: at('B7', 'Model'), value: 130 },
      { kind: 'recalculateOnOpening' },
    ]);
    expect(inspectZip(before)).toHaveLength(41);
    expect(differences(before, after)).toEqual({
      changed: ['xl/workbook.xml', 'xl/worksheets/sheet1.xml'],
      added: [],
      removed: [],
    });
  });

  it('streamed zips and stored parts stay as they are packed', async () => {
    const parts = [...xlsxParts({ sheets: [{ name: 'Plan', cells: { A1: 1 } }] })];
    for (const bend of [{ hasDataDescriptor: true }, { isStored: true }]) {
      const before = buildZip(parts.map(([name, content]) => ({ name, content, ...bend })));
      const after = await written(before, [value('A1', 2)]);
      expect(differences(before, after).changed).toEqual([sheetPart]);
    }
  });
});

it('the committed week is the one that its script makes', () => {
  const committed = readFileSync(path.join(checkoutFolder, 'tests', 'golden', 'tile-week.xlsx'));
  const contents = (bytes: Uint8Array): [string, string][] =>
    inspectZip(bytes).map(({ name, content }) => [name, content.toString('utf8')]);
  expect(contents(makeTileWeek())).toEqual(contents(committed));
});

it('a zip of the large form (zip64), with comments and directories, is read and written', async () => {
  const writer = new ZipWriter(new Uint8ArrayWriter(), { useWebWorkers: false, zip64: true });
  await writer.add('xl/', undefined, { directory: true });
  for (const [name, content] of xlsxParts({ sheets: [{ name: 'Plan', cells: { A1: 1 } }] })) {
    await writer.add(name, new TextReader(content as string), { comment: `about ${name}` });
  }
  const before = await writer.close();
  const after = await written(before, [value('A1', 2)]);
  const entries = await new ZipReader(new Uint8ArrayReader(after), { useWebWorkers: false }).getEntries();
  expect(entries[0].filename).toBe('xl/');
  expect(entries[0].directory).toBe(true);
  expect(entries.find(({ filename }) => filename === sheetPart)?.comment).toBe(`about ${sheetPart}`);
});
