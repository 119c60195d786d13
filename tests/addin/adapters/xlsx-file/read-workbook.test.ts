import { CellError } from '../../../../addin/domain/sheet/cell-value';
import { cellText } from '../../../../addin/domain/sheet/cell-address';
import type { SheetCell, WorkbookSnapshot } from '../../../../addin/domain/sheet/sheet-snapshot';
import { openPackage, readWorkbook } from '../../../../addin/adapters/xlsx-file/read-workbook';
import { buildXlsx, xlsxParts, type XlsxDescription } from '../../../support/xlsx-builder';
import { buildZip } from '../../../support/zip-builder';

// Slow only on a busy machine, and never judged by time.
jest.setTimeout(60_000);

async function read(bytes: Uint8Array): Promise<WorkbookSnapshot> {
  return readWorkbook(await openPackage(bytes, 'week.xlsx'));
}

function readBuilt(description: XlsxDescription): Promise<WorkbookSnapshot> {
  return read(buildXlsx(description));
}

/** A file with one sheet whose part is this XML between `<worksheet …>` and its end. */
async function readSheetXml(
  inside: string,
  description: Partial<XlsxDescription> = {},
): Promise<WorkbookSnapshot> {
  const xml = `<worksheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">${inside}</worksheet>`;
  return readBuilt({
    sheets: [{ name: 'Plan' }],
    parts: { 'xl/worksheets/sheet1.xml': xml },
    ...description,
  });
}

function cellAt(workbook: WorkbookSnapshot, text: string, sheet = 0): SheetCell | undefined {
  let found: SheetCell | undefined;
  workbook.sheets[sheet].forEachCell((row, column, cell) => {
    if (cellText(row, column) === text) found = cell;
  });
  return found;
}

describe('cells', () => {
  it('gives numbers, texts, booleans and errors as they are stored, shared texts and inline ones alike', async () => {
    for (const hasInlineStrings of [false, true]) {
      const workbook = await readBuilt({
        hasInlineStrings,
        sheets: [
          {
            name: 'Plan',
            cells: {
              A1: 5.25,
              B1: 'Wall tile',
              C1: true,
              D1: { error: '#N/A' },
              E1: 'a < b & "c"',
              AB12: -1e-7,
            },
          },
        ],
      });
      expect(cellAt(workbook, 'A1')?.value).toBe(5.25);
      expect(cellAt(workbook, 'B1')?.value).toBe('Wall tile');
      expect(cellAt(workbook, 'C1')?.value).toBe(true);
      expect(cellAt(workbook, 'D1')?.value).toBe(CellError.of('#N/A'));
      expect(cellAt(workbook, 'E1')?.value).toBe('a < b & "c"');
      expect(cellAt(workbook, 'AB12')?.value).toBe(-1e-7);
      expect(workbook.sheets[0].rowCount).toBe(12);
      expect(workbook.sheets[0].columnCount).toBe(28);
      expect(workbook.sheets[0].cell(0, 5)).toBeUndefined();
    }
  });

  it('gives a formula with the value stored beside it, and undefined where none is stored', async () => {
    const workbook = await readBuilt({
      sheets: [
        {
          name: 'Plan',
          cells: { A1: { formula: 'B1*2', value: 10 }, A2: '=B2', A3: { formula: 'B3&""', value: '' } },
        },
      ],
    });
    expect(cellAt(workbook, 'A1')).toMatchObject({ value: 10 });
    expect(cellAt(workbook, 'A1')?.formula).toBe('B1*2');
    expect(cellAt(workbook, 'A2')?.formula).toBe('B2');
    expect(cellAt(workbook, 'A2')?.value).toBeUndefined();
    expect(cellAt(workbook, 'A3')?.value).toBe('');
  });

  it('moves a shared formula to each of its cells: relative parts move, fixed parts and names stay', async () => {
    const formula = 'A1*$B$1+C$2-$D3+SUM(A:A)+Rate+Costs[@Qty]+SUM(E1:E1048576)+LOG10(A1)';
    const workbook = await readBuilt({
      sheets: [
        {
          name: 'Plan',
          cells: {
            F1: { formula, sharedRange: 'F1:G2', value: 1 },
            G1: { sharedFrom: 'F1', value: 2 },
            F2: { sharedFrom: 'F1' },
            G2: { sharedFrom: 'F1', value: 4 },
          },
        },
      ],
    });
    expect(cellAt(workbook, 'F1')?.formula).toBe(formula);
    // By hand: one column right, then one row down, then both.
    expect(cellAt(workbook, 'G1')?.formula).toBe(
      'B1*$B$1+D$2-$D3+SUM(B:B)+Rate+Costs[@Qty]+SUM(F:F)+LOG10(B1)',
    );
    expect(cellAt(workbook, 'F2')?.formula).toBe(
      'A2*$B$1+C$2-$D4+SUM(A:A)+Rate+Costs[@Qty]+SUM(E:E)+LOG10(A2)',
    );
    expect(cellAt(workbook, 'G2')?.formula).toBe(
      'B2*$B$1+D$2-$D4+SUM(B:B)+Rate+Costs[@Qty]+SUM(F:F)+LOG10(B2)',
    );
    expect(cellAt(workbook, 'F2')?.value).toBeUndefined();
  });

  it('keeps two groups of shared formulas apart, and texts that only look like references', async () => {
    const workbook = await readBuilt({
      sheets: [
        {
          name: 'Plan',
          cells: {
            A1: { formula: '"B1"&B1', sharedRange: 'A1:A2' },
            A2: { sharedFrom: 'A1' },
            D1: { formula: "'Cost data'!B1*_xlfn.LET(_xlpm.r,B1,_xlpm.r)", sharedRange: 'D1:D2' },
            D2: { sharedFrom: 'D1' },
          },
        },
      ],
    });
    expect(cellAt(workbook, 'A2')?.formula).toBe('"B1"&B2');
    expect(cellAt(workbook, 'D2')?.formula).toBe("'Cost data'!B2*_xlfn.LET(_xlpm.r,B2,_xlpm.r)");
  });

  it('gives the range that an array formula or a spill fills, at its first cell alone', async () => {
    const workbook = await readBuilt({
      sheets: [
        {
          name: 'Plan',
          cells: {
            A1: { formula: 'B1:B3*2', arrayRange: 'A1:A3', value: 2 },
            A2: 4,
            A3: 6,
            C1: { formula: '_xlfn._xlws.SORT(B1:B3)', arrayRange: 'C1:C3', isDynamicArray: true, value: 1 },
          },
        },
      ],
    });
    expect(cellAt(workbook, 'A1')?.arrayRange).toEqual({
      sheet: 'Plan',
      top: 0,
      left: 0,
      bottom: 2,
      right: 0,
    });
    expect(cellAt(workbook, 'A2')?.arrayRange).toBeUndefined();
    expect(cellAt(workbook, 'A2')).toMatchObject({ value: 4 });
    expect(cellAt(workbook, 'C1')?.formula).toBe('_xlfn._xlws.SORT(B1:B3)');
    expect(cellAt(workbook, 'C1')?.arrayRange?.bottom).toBe(2);
  });

  it('shows the cells of a what-if table as a formula of their own, never as constants', async () => {
    const workbook = await readSheetXml(
      '<sheetData><row r="1"><c r="B1"><f t="dataTable" ref="B1:B3" dt2D="0" dtr="0" r1="A9"/><v>4</v></c></row></sheetData>',
    );
    expect(cellAt(workbook, 'B1')?.formula).toBe('TABLE(,A9)');
    expect(cellAt(workbook, 'B1')?.arrayRange?.bottom).toBe(2);
  });

  it('takes rich text without its phonetic hints, and _xHHHH_ for the character that it means', async () => {
    const strings =
      '<sst xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">' +
      '<si><r><t>Wall </t></r><r><rPr><b/></rPr><t xml:space="preserve">tile </t></r><rPh sb="0" eb="1"><t>hint</t></rPh></si>' +
      '<si><t>a_x000D_b_x005F_x0041_</t></si><si/></sst>';
    const workbook = await readBuilt({
      sheets: [{ name: 'Plan', cells: { A1: 'first', B1: 'second', C1: 'third' } }],
      parts: { 'xl/sharedStrings.xml': strings },
    });
    expect(cellAt(workbook, 'A1')?.value).toBe('Wall tile ');
    expect(cellAt(workbook, 'B1')?.value).toBe('a\rb_x0041_');
    expect(cellAt(workbook, 'C1')?.value).toBe('');
  });

  it('counts rows and cells that carry no place of their own', async () => {
    const workbook = await readSheetXml(
      '<sheetData><row><c><v>1</v></c><c><v>2</v></c></row><row r="5"><c r="C5"><v>3</v></c><c><v>4</v></c></row>' +
        '<row/><row><c><v>5</v></c></row></sheetData>',
    );
    expect([1, 2, 3, 4, 5]).toEqual(
      ['A1', 'B1', 'C5', 'D5', 'A7'].map((text) => cellAt(workbook, text)?.value),
    );
  });

  it('takes a date written as text for its serial number', async () => {
    const workbook = await readSheetXml(
      '<sheetData><row><c t="d"><v>2023-03-15</v></c><c t="d"><v>1900-01-01T12:00:00</v></c><c t="d"><v>2023-03-15T06:00:00Z</v></c></row></sheetData>',
    );
    // LibreOffice shows 45000 as 2023-03-15; day 1 of the 1900 system is 1900-01-01.
    expect(cellAt(workbook, 'A1')).toMatchObject({ value: 45000 });
    expect(cellAt(workbook, 'A1')?.isDate).toBe(true);
    expect(cellAt(workbook, 'B1')?.value).toBe(1.5);
    expect(cellAt(workbook, 'C1')?.value).toBe(45000.25);
  });

  it('knows dates by their number format, and gives the format', async () => {
    const workbook = await readBuilt({
      date1904: true,
      sheets: [
        {
          name: 'Plan',
          cells: {
            A1: { value: 45000, isDate: true },
            B1: { value: 3, numberFormat: '0.00 "days"' },
            C1: { value: 'x', isDate: true },
            D1: 7,
          },
        },
      ],
    });
    expect(workbook.usesDates1904).toBe(true);
    expect(cellAt(workbook, 'A1')?.isDate).toBe(true);
    expect(cellAt(workbook, 'B1')?.isDate).toBe(false);
    expect(cellAt(workbook, 'B1')?.numberFormat).toBe('0.00 "days"');
    expect(cellAt(workbook, 'C1')?.isDate).toBe(false);
    expect(cellAt(workbook, 'D1')?.numberFormat).toBe('General');
  });
});

describe('sheets, names and what stands around the cells', () => {
  it('gives sheets in the order of their tabs, with visibility and protection', async () => {
    const workbook = await readBuilt({
      sheets: [
        { name: 'Plan', cells: { A1: 1 } },
        { name: 'Cost & data', visibility: 'hidden', isProtected: true },
        { name: 'Rates', visibility: 'veryHidden' },
      ],
    });
    expect(
      workbook.sheets.map(({ name, visibility, isProtected }) => [name, visibility, isProtected]),
    ).toEqual([
      ['Plan', 'visible', false],
      ['Cost & data', 'hidden', true],
      ['Rates', 'veryHidden', false],
    ]);
    expect(workbook.usesDates1904).toBe(false);
    expect(workbook.record).toBeNull();
  });

  it('gives names of the workbook and of single sheets, hidden ones marked', async () => {
    const workbook = await readBuilt({
      sheets: [{ name: 'Plan' }, { name: 'Next', names: { 'Week.Sense': '"maximise"' } }],
      names: { 'Week.Decision': 'Plan!$B$2:$B$9', Rate: '0.25' },
      hiddenNames: { Secret: 'Plan!$A$1' },
    });
    expect(workbook.names).toEqual([
      { name: 'Week.Decision', scope: null, formula: 'Plan!$B$2:$B$9', isHidden: false },
      { name: 'Rate', scope: null, formula: '0.25', isHidden: false },
      { name: 'Secret', scope: null, formula: 'Plan!$A$1', isHidden: true },
      { name: 'Week.Sense', scope: 'Next', formula: '"maximise"', isHidden: false },
    ]);
  });

  it('gives tables with their headings, and where notes, merged cells and PivotTables stand', async () => {
    const workbook = await readBuilt({
      sheets: [
        {
          name: 'Plan',
          cells: { A1: 'Tile', B1: 'Cost', A2: 'Wall', B2: 4 },
          merges: ['D1:E2'],
          notes: { B2: 'per square metre' },
          pivotRanges: ['H3:J9'],
        },
      ],
      tables: [{ name: 'Costs', sheet: 'Plan', ref: 'A1:B3', hasTotalsRow: true }],
    });
    expect(workbook.tables).toEqual([
      {
        name: 'Costs',
        range: { sheet: 'Plan', top: 0, left: 0, bottom: 2, right: 1 },
        headerRowCount: 1,
        totalsRowCount: 1,
        columnNames: ['Tile', 'Cost'],
      },
    ]);
    const [sheet] = workbook.sheets;
    expect(sheet.mergedRanges).toEqual([{ sheet: 'Plan', top: 0, left: 3, bottom: 1, right: 4 }]);
    expect(sheet.notedCells).toEqual([{ sheet: 'Plan', row: 1, column: 1 }]);
    expect(sheet.pivotRanges).toEqual([{ sheet: 'Plan', top: 2, left: 7, bottom: 8, right: 9 }]);
  });

  it('knows hidden rows and columns, one by one and by default, and active filters', async () => {
    const workbook = await readBuilt({
      sheets: [
        { name: 'Plan', cells: { A1: 'x' }, hiddenRows: [3, 7], hiddenColumns: ['C'] },
        { name: 'Filter', cells: { A1: 'Item', A2: 'x' }, filterRange: 'A1:A2', isFiltered: true },
        { name: 'Buttons', cells: { A1: 'Item' }, filterRange: 'A1:A2' },
        {
          name: 'Rest hidden',
          cells: { A1: 1 },
          xmlBeforeCells:
            '<sheetFormatPr defaultRowHeight="15" zeroHeight="1"/><cols><col min="4" max="16384" width="0"/></cols>',
        },
      ],
    });
    const [plan, filter, buttons, rest] = workbook.sheets;
    expect([1, 2, 3, 6].map((row) => plan.isRowHidden(row))).toEqual([false, true, false, true]);
    expect([1, 2, 3].map((column) => plan.isColumnHidden(column))).toEqual([false, true, false]);
    expect([plan, filter, buttons].map((sheet) => sheet.hasActiveFilter)).toEqual([false, true, false]);
    expect([rest.isRowHidden(0), rest.isRowHidden(1)]).toEqual([false, true]);
    expect([rest.isColumnHidden(2), rest.isColumnHidden(3), rest.isColumnHidden(900)]).toEqual([
      false,
      true,
      true,
    ]);
  });
});

describe('the package', () => {
  const plain: XlsxDescription = {
    sheets: [{ name: 'Größe', cells: { A1: 'Fliese 😀', B1: { formula: 'LEN(A1)', value: 8 } } }],
    names: { 'Woche.Decision': 'Größe!$A$1' },
  };
  const expectPlain = (workbook: WorkbookSnapshot): void => {
    expect(workbook.sheets[0].name).toBe('Größe');
    expect(cellAt(workbook, 'A1')?.value).toBe('Fliese 😀');
    expect(cellAt(workbook, 'B1')?.formula).toBe('LEN(A1)');
    expect(workbook.names[0].formula).toBe('Größe!$A$1');
  };
  const bend = (change: (name: string, text: string) => [string, string | Uint8Array]): Uint8Array =>
    buildZip(
      [...xlsxParts(plain)].map(([name, content]) => {
        const [bentName, bent] = change(name, content as string);
        return { name: bentName, content: bent };
      }),
    );

  it('is read in the strict form of the standard', async () => {
    expectPlain(
      await read(
        bend((name, text) => [
          name,
          text
            .replaceAll(
              'http://schemas.openxmlformats.org/spreadsheetml/2006/main',
              'http://purl.oclc.org/ooxml/spreadsheetml/main',
            )
            .replaceAll(
              'http://schemas.openxmlformats.org/officeDocument/2006/relationships',
              'http://purl.oclc.org/ooxml/officeDocument/relationships',
            ),
        ]),
      ),
    );
  });

  it('is read with prefixes on every element', async () => {
    expectPlain(
      await read(
        bend((name, text) => [
          name,
          text.includes('xmlns="http://schemas.openxmlformats.org/spreadsheetml')
            ? text.replace(/<(\/?)([a-zA-Z])/g, '<$1x:$2').replaceAll('xmlns="', 'xmlns:x="')
            : text,
        ]),
      ),
    );
  });

  it('is read wherever its parts stand, and whatever the case of their names', async () => {
    expectPlain(
      await read(
        bend((name, text) => [
          name
            .replace('xl/workbook', 'Book/Main')
            .replace('xl/_rels/workbook', 'Book/_rels/Main')
            .replace('xl/', 'Other/'),
          text
            .replaceAll('xl/workbook', 'book/main')
            .replace('"worksheets/', '"../Other/worksheets/')
            .replace('"styles', '"/Other/styles')
            .replace('"sharedStrings', '"../OTHER/sharedStrings'),
        ]),
      ),
    );
  });

  it('is read in UTF-16 of either order, and in UTF-8 with a byte order mark', async () => {
    const utf16 = (text: string): Buffer =>
      Buffer.from(`\uFEFF${text.replace('UTF-8', 'UTF-16')}`, 'utf16le');
    expectPlain(await read(bend((name, text) => [name, utf16(text)])));
    expectPlain(await read(bend((name, text) => [name, utf16(text).swap16()])));
    expectPlain(await read(bend((name, text) => [name, `\uFEFF${text}`])));
  });

  it('is read from a streamed zip and from a stored one', async () => {
    const entries = [...xlsxParts(plain)].map(([name, content]) => ({ name, content }));
    expectPlain(await read(buildZip(entries.map((entry) => ({ ...entry, hasDataDescriptor: true })))));
    expectPlain(await read(buildZip(entries.map((entry) => ({ ...entry, isStored: true })))));
  });

  it('passes over comments, processing instructions and CDATA that look like cells', async () => {
    const workbook = await readSheetXml(
      '<!-- <sheetData><row r="1"><c r="A1"><v>9</v></c></row></sheetData> -->\r\n<sheetData>\r\n<?x <c r="A1"/> ?>' +
        '<row r="1"><!-- <c r="A1"/> --><c r="A1" t="str"><v><![CDATA[<c r="B1"><v>9</v></c>]]></v></c></row></sheetData>',
    );
    expect(cellAt(workbook, 'A1')?.value).toBe('<c r="B1"><v>9</v></c>');
    expect(cellAt(workbook, 'B1')).toBeUndefined();
  });

  it('gives back the record that stands in a part of our own, and passes over the custom parts of others', async () => {
    const relationships = [...xlsxParts(plain)].find(
      ([name]) => name === 'xl/_rels/workbook.xml.rels',
    )![1] as string;
    const custom = (id: string): string =>
      `<Relationship Id="c${id}" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/customXml" Target="../customXml/item${id}.xml"/>`;
    const workbook = await readBuilt({
      ...plain,
      parts: {
        'xl/_rels/workbook.xml.rels': relationships.replace(
          '</Relationships>',
          `${custom('1')}${custom('2')}</Relationships>`,
        ),
        'customXml/item1.xml': '<broken',
        'customXml/item2.xml': '<r:record xmlns:r="urn:planrow:record:1">{"a":"&lt;b&gt;"}</r:record>',
      },
    });
    expect(workbook.record).toBe('{"a":"<b>"}');
  });
});

it('reads 150,000 cells, 100,000 of them formulas', async () => {
  const cells: Record<
    string,
    { value: number; formula?: string; sharedRange?: string; sharedFrom?: string }
  > = {};
  const rows = 50_000;
  for (let row = 1; row <= rows; row++) {
    cells[`A${row}`] = { value: row };
    cells[`B${row}`] = { formula: `A${row}*2`, value: row * 2 };
    cells[`C${row}`] =
      row === 1
        ? { formula: 'A1+B1', sharedRange: `C1:C${rows}`, value: 3 }
        : { sharedFrom: 'C1', value: row * 3 };
  }
  const workbook = await readBuilt({ sheets: [{ name: 'Plan', cells }] });
  let formulas = 0;
  workbook.sheets[0].forEachCell((_row, _column, cell) => {
    if (cell.formula !== undefined) formulas++;
  });
  expect(formulas).toBe(100_000);
  expect(workbook.sheets[0].cell(49_999, 2)?.formula).toBe('A50000+B50000');
  expect(workbook.sheets[0].cell(49_999, 2)?.value).toBe(150_000);
});
