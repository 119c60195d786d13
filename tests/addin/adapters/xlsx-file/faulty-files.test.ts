/**
 * Files that are not what they should be. Each is refused with a sentence that names the file, says what is wrong
 * and what to do; none crashes, none gives a half-read workbook.
 */
import { gzipSync } from 'node:zlib';
import { openPackage, readWorkbook } from '../../../../addin/adapters/xlsx-file/read-workbook';
import { XlsxWorkbook } from '../../../../addin/adapters/xlsx-file/xlsx-workbook';
import { WorkbookError, type WorkbookErrorCode } from '../../../../addin/ports/workbook';
import { compoundFile } from '../../../support/compound-file';
import { buildXlsx, xlsxParts, type XlsxDescription } from '../../../support/xlsx-builder';
import { buildZip, type ZipEntry } from '../../../support/zip-builder';

// Large files and many rounds: slow only on a busy machine, and never judged by time.
jest.setTimeout(60_000);

const week: XlsxDescription = {
  sheets: [
    {
      name: 'Plan',
      cells: { A1: 'Wall tile', B1: 4, C1: { formula: 'B1*2', value: 8 } },
      notes: { A1: 'n' },
    },
  ],
  names: { 'Week.Decision': 'Plan!$B$1' },
  tables: [{ name: 'Costs', sheet: 'Plan', ref: 'A1:B2' }],
};

function entriesOf(description: XlsxDescription = week): ZipEntry[] {
  return [...xlsxParts(description)].map(([name, content]) => ({ name, content }));
}

/** The week with one part changed, left out (undefined) or bent. */
function withPart(part: string, change: (text: string) => string | Uint8Array | undefined): Uint8Array {
  let isFound = false;
  const entries = entriesOf().flatMap((entry) => {
    if (entry.name !== part) return [entry];
    isFound = true;
    const content = change(entry.content as string);
    return content === undefined ? [] : [{ ...entry, content }];
  });
  if (!isFound) throw new Error(`The week has no part ${part}.`);
  return buildZip(entries);
}

function withEntry(part: string, bend: Partial<ZipEntry>): Uint8Array {
  return buildZip(entriesOf().map((entry) => (entry.name === part ? { ...entry, ...bend } : entry)));
}

function sheetWith(cells: string): Uint8Array {
  return withPart('xl/worksheets/sheet1.xml', (xml) =>
    xml.replace(/<sheetData>.*<\/sheetData>/, `<sheetData>${cells}</sheetData>`),
  );
}

const sound = buildXlsx(week);
const sheet = 'xl/worksheets/sheet1.xml';
const damaged = (what: string): string =>
  `week.xlsx is damaged: ${what}; open it in your spreadsheet program, save it again as .xlsx, and use that copy.`;
const refused = (why: string): string =>
  `week.xlsx is not opened, because ${why}; open it in your spreadsheet program, save it again as .xlsx, and use that copy.`;
const large = (what: string): string =>
  `week.xlsx ${what}; if you trust it, remove what the plan does not need and save it again.`;
const noWorkbook =
  'week.xlsx is not an Excel workbook; open it in your spreadsheet program and save it as .xlsx.';
const otherDocument =
  'week.xlsx is another kind of document and no Excel workbook; open it in your spreadsheet program and save it as .xlsx.';

type Fault = [what: string, bytes: () => Uint8Array, code: WorkbookErrorCode, sentence: string];

const faults: Fault[] = [
  // Other kinds of files.
  [
    'an empty file',
    () => new Uint8Array(0),
    'not-a-workbook',
    'week.xlsx is empty; choose the workbook that holds the plan.',
  ],
  ['a text file', () => Buffer.from('Product;Cost\nTile;4\n'), 'not-a-workbook', noWorkbook],
  ['a page saved as .xlsx', () => Buffer.from('<html><table></table></html>'), 'not-a-workbook', noWorkbook],
  ['a compressed file of another kind', () => gzipSync('x'), 'not-a-workbook', noWorkbook],
  ['one byte', () => new Uint8Array([0x50]), 'not-a-workbook', noWorkbook],
  [
    'a workbook with a password for opening',
    () => compoundFile(['EncryptionInfo', 'EncryptedPackage']),
    'encrypted',
    'week.xlsx is protected by a password for opening; remove that password in your spreadsheet program and save it again.',
  ],
  [
    'an .xls file',
    () => compoundFile(['Workbook', '\u0005SummaryInformation']),
    'old-format',
    'week.xlsx is in the old .xls format; open it in your spreadsheet program and save it as .xlsx.',
  ],
  [
    'an old file of another program',
    () => compoundFile(['WordDocument']),
    'not-a-workbook',
    'week.xlsx is in an old Office format and no workbook of today; open it in your spreadsheet program and save it as .xlsx.',
  ],
  [
    'an old file cut off in its header',
    () => compoundFile(['Workbook']).subarray(0, 100),
    'not-a-workbook',
    'week.xlsx is in an old Office format and no workbook of today; open it in your spreadsheet program and save it as .xlsx.',
  ],
  [
    'a binary workbook',
    () =>
      buildZip(
        entriesOf().map((entry) => ({
          name: entry.name.replace('workbook.xml', 'workbook.bin'),
          content: (entry.content as string)
            .replaceAll('workbook.xml', 'workbook.bin')
            .replace(
              /application\/vnd\.[a-z.-]*sheet\.main\+xml/,
              'application/vnd.ms-excel.sheet.binary.macroEnabled.main',
            ),
        })),
      ),
    'binary-format',
    'week.xlsx is in the binary .xlsb format; open it in your spreadsheet program and save it as .xlsx.',
  ],
  [
    'a text document in a package',
    () =>
      withPart('[Content_Types].xml', (xml) =>
        xml.replace('spreadsheetml.sheet.main', 'wordprocessingml.document.main'),
      ),
    'not-a-workbook',
    otherDocument,
  ],
  [
    'an OpenDocument spreadsheet',
    () =>
      buildZip([
        { name: 'mimetype', content: 'application/vnd.oasis.opendocument.spreadsheet', isStored: true },
        { name: 'content.xml', content: '<office/>' },
      ]),
    'not-a-workbook',
    otherDocument,
  ],
  [
    'a zip of photographs',
    () => buildZip([{ name: 'tile.jpg', content: 'x' }]),
    'not-a-workbook',
    otherDocument,
  ],
  ['an empty zip', () => buildZip([]), 'not-a-workbook', otherDocument],
  // The container.
  [
    'a file cut off in the middle',
    () => sound.subarray(0, Math.floor(sound.length / 2)),
    'damaged',
    damaged('its end is missing or does not fit the rest, as after a broken download'),
  ],
  [
    'a file cut off before its last byte',
    () => sound.subarray(0, sound.length - 1),
    'damaged',
    damaged('its end is missing or does not fit the rest, as after a broken download'),
  ],
  [
    'a part that was changed on the way',
    () => withEntry(sheet, { claimedChecksum: 12345 }),
    'damaged',
    damaged(`its part ${sheet} cannot be unpacked`),
  ],
  [
    'a part whose packed bytes are garbage',
    () => {
      const bytes = Buffer.from(sound);
      const at = bytes.indexOf(sheet, 0, 'latin1') + sheet.length;
      bytes.fill(0xff, at, at + 20);
      return bytes;
    },
    'damaged',
    damaged(`its part ${sheet} cannot be unpacked`),
  ],
  [
    'a part that holds more than it says',
    () => withEntry(sheet, { claimedSize: 100 }),
    'damaged',
    damaged(`its part ${sheet} cannot be unpacked`),
  ],
  [
    'a part that holds less than it says',
    () => withEntry(sheet, { claimedSize: 100_000 }),
    'damaged',
    damaged(`its part ${sheet} cannot be unpacked`),
  ],
  [
    'a part with a password of its own',
    () => withEntry(sheet, { flags: 1 }),
    'encrypted',
    'week.xlsx is protected by a password; remove that password and save it again as .xlsx.',
  ],
  [
    'a part that would unpack to a thousand times its size',
    () => withPart(sheet, () => new Uint8Array(40 * 1024 * 1024)),
    'too-large',
    large(`is packed more densely than any workbook is (${sheet}) and is not unpacked`),
  ],
  [
    'a part that says it is small and would unpack to 60 MB',
    () =>
      buildZip(
        entriesOf().map((entry) =>
          entry.name === sheet
            ? { name: sheet, content: new Uint8Array(60 * 1024 * 1024), claimedSize: 4000 }
            : entry,
        ),
      ),
    'damaged',
    damaged(`its part ${sheet} cannot be unpacked`),
  ],
  [
    'a part that claims to be huge',
    () => withEntry(sheet, { claimedSize: 3_000_000_000 }),
    'too-large',
    large(`would unpack to more than can be held in memory (${sheet})`),
  ],
  [
    'parts that are huge together',
    () =>
      buildZip([
        ...entriesOf(),
        ...Array.from({ length: 4 }, (_, i) => ({
          name: `xl/media/image${i}.png`,
          content: new Uint8Array(2 * 1024 * 1024).map((_byte, at) => (at * 2654435761) >>> 13),
          claimedSize: 300 * 1024 * 1024,
          isStored: true,
        })),
      ]),
    'too-large',
    large('would unpack to more than can be held in memory'),
  ],
  [
    'more parts than any workbook has',
    () => buildZip(Array.from({ length: 20_001 }, (_, i) => ({ name: `p${i}`, content: '' }))),
    'too-large',
    large('has more than 20000 parts inside'),
  ],
  [
    'two parts of one name',
    () => buildZip([...entriesOf(), { name: sheet, content: '<worksheet/>' }]),
    'refused-content',
    refused(`two parts inside it have the same name (${sheet})`),
  ],
  [
    'two parts whose names differ in case alone',
    () => buildZip([...entriesOf(), { name: 'XL/Workbook.xml', content: '<workbook/>' }]),
    'refused-content',
    refused('two parts inside it have the same name (XL/Workbook.xml)'),
  ],
  ...[
    '../../home/.profile',
    '/etc/passwd',
    'xl\\workbook2.xml',
    'C:/x.xml',
    'xl//a.xml',
    'xl/./a.xml',
    'xl/a\u0000.xml',
  ].map((name): Fault => [
    `a part named ${JSON.stringify(name)}`,
    () => buildZip([...entriesOf(), { name, content: 'x' }]),
    'refused-content',
    refused(`the name of a part inside it (${name.replace('\u0000', ' ')}) leads elsewhere`),
  ]),
  // The parts.
  [
    'no content types',
    () => withPart('[Content_Types].xml', () => undefined),
    'damaged',
    damaged('its part [Content_Types].xml is missing'),
  ],
  [
    'no relationships',
    () => withPart('_rels/.rels', () => undefined),
    'damaged',
    damaged('it names no workbook part'),
  ],
  [
    'no workbook part',
    () => withPart('xl/workbook.xml', () => undefined),
    'damaged',
    damaged('its part xl/workbook.xml is missing'),
  ],
  [
    'no relationships of the workbook',
    () => withPart('xl/_rels/workbook.xml.rels', () => undefined),
    'damaged',
    damaged('the part with the sheet Plan is missing'),
  ],
  [
    'no sheet part',
    () => withPart(sheet, () => undefined),
    'damaged',
    damaged('the part with the sheet Plan is missing'),
  ],
  [
    'no table part',
    () => withPart('xl/tables/table1.xml', () => undefined),
    'damaged',
    damaged('its part xl/tables/table1.xml is missing'),
  ],
  [
    'no styles part',
    () => withPart('xl/styles.xml', () => undefined),
    'damaged',
    damaged('its part xl/styles.xml is missing'),
  ],
  [
    'no shared strings',
    () => withPart('xl/sharedStrings.xml', () => undefined),
    'damaged',
    damaged('its part xl/sharedStrings.xml is missing'),
  ],
  [
    'a workbook without sheets',
    () => withPart('xl/workbook.xml', (xml) => xml.replace(/<sheet .*\/>/, '')),
    'damaged',
    damaged('it has no sheets'),
  ],
  [
    'two sheets of one name',
    () => withPart('xl/workbook.xml', (xml) => xml.replace(/(<sheet [^>]*>)/, '$1$1')),
    'damaged',
    damaged("a sheet's name is missing or stands twice (Plan)"),
  ],
  [
    'a workbook part that is none',
    () => withPart('xl/workbook.xml', () => '<book/>'),
    'damaged',
    damaged('its part xl/workbook.xml is no workbook'),
  ],
  [
    'a name that belongs to a sheet which is not there',
    () =>
      withPart('xl/workbook.xml', (xml) => xml.replace('<definedName ', '<definedName localSheetId="7" ')),
    'damaged',
    damaged('the defined name Week.Decision belongs to no sheet of it'),
  ],
  // The XML.
  [
    'XML that breaks off',
    () => withPart(sheet, (xml) => xml.slice(0, -20)),
    'damaged',
    damaged(`its part ${sheet} is not well-formed (unclosed tag: tableParts)`),
  ],
  [
    'XML with an unknown entity',
    () => withPart('xl/sharedStrings.xml', (xml) => xml.replace('Wall', '&wall;')),
    'damaged',
    damaged('its part xl/sharedStrings.xml is not well-formed (undefined entity)'),
  ],
  [
    'XML with a character that it must not have',
    () => withPart('xl/sharedStrings.xml', (xml) => xml.replace('Wall', '\u0001')),
    'damaged',
    damaged('its part xl/sharedStrings.xml is not well-formed (disallowed character)'),
  ],
  [
    'an empty part',
    () => withPart('xl/workbook.xml', () => ''),
    'damaged',
    damaged('its part xl/workbook.xml is not well-formed (document must contain a root element)'),
  ],
  [
    'a document type declaration',
    () =>
      withPart('xl/workbook.xml', (xml) =>
        xml.replace('<workbook', '<!DOCTYPE x [<!ENTITY a SYSTEM "file:///etc/passwd">]><workbook'),
      ),
    'refused-content',
    refused('its part xl/workbook.xml has a document type declaration'),
  ],
  [
    'elements nested without end',
    () => withPart('xl/workbook.xml', () => `${'<a>'.repeat(5000)}${'</a>'.repeat(5000)}`),
    'refused-content',
    refused('its part xl/workbook.xml is nested too deeply'),
  ],
  [
    'bytes that are no UTF-8',
    () => withPart('xl/sharedStrings.xml', (xml) => Buffer.from(xml.replace('Wall', 'Größe'), 'latin1')),
    'damaged',
    damaged('its part xl/sharedStrings.xml is not valid text'),
  ],
  [
    'another encoding',
    () => withPart('xl/workbook.xml', (xml) => xml.replace('UTF-8', 'windows-1252')),
    'damaged',
    damaged('its part xl/workbook.xml is in the encoding windows-1252, not UTF-8'),
  ],
  // The sheet.
  [
    'a sheet part that is no sheet',
    () => withPart(sheet, () => '<list/>'),
    'damaged',
    damaged('the part of its sheet Plan is no sheet'),
  ],
  ...(
    [
      ['a cell without a proper place', '<row r="1"><c r="1A"><v>1</v></c></row>', 'it has a cell called 1A'],
      [
        'a cell beyond the last column',
        '<row r="1"><c r="XFE1"><v>1</v></c></row>',
        'it has a cell called XFE1',
      ],
      [
        'a cell beyond the last row',
        '<row r="1"><c r="A1048577"><v>1</v></c></row>',
        'it has a cell called A1048577',
      ],
      ['a row beyond the last', '<row r="1048577"/>', 'it has a row numbered 1048577'],
      ['a row numbered zero', '<row r="0"/>', 'it has a row numbered 0'],
      ['a row without a proper number', '<row r="x"/>', 'it has a row numbered x'],
      ['a row that stands twice', '<row r="2"/><row r="2"/>', 'its row 2 stands twice or behind a later one'],
      [
        'a cell that stands twice',
        '<row r="1"><c r="A1"/><c r="A1"/></row>',
        'its cell A1 stands out of order',
      ],
      ['a cell in the wrong row', '<row r="1"><c r="A2"/></row>', 'its cell A2 stands out of order'],
      [
        'a text that is not in the table',
        '<row r="1"><c r="A1" t="s"><v>99</v></c></row>',
        'its cell A1 shows a text that is not in the file (99)',
      ],
      [
        'a text number that is none',
        '<row r="1"><c r="A1" t="s"><v>-1</v></c></row>',
        'its cell A1 shows a text that is not in the file (-1)',
      ],
      [
        'a number that is none',
        '<row r="1"><c r="A1"><v>12,5</v></c></row>',
        'its cell A1 holds no number (12,5)',
      ],
      [
        'a number that is not finite',
        '<row r="1"><c r="A1"><v>NaN</v></c></row>',
        'its cell A1 holds no number (NaN)',
      ],
      [
        'a date that is none',
        '<row r="1"><c r="A1" t="d"><v>2026-02-30</v></c></row>',
        'its cell A1 holds no date (2026-02-30)',
      ],
      [
        'a cell of an unknown type',
        '<row r="1"><c r="A1" t="zz"><v>1</v></c></row>',
        'its cell A1 is of an unknown type (zz)',
      ],
      [
        'a shared formula without its text',
        '<row r="1"><c r="A1"><f t="shared" si="4"/></c></row>',
        'the formula of its cell A1 is missing',
      ],
      [
        'an array formula that fills nothing',
        '<row r="1"><c r="A1"><f t="array" ref="Z">B1</f></c></row>',
        'the array formula in its cell A1 fills no range (Z)',
      ],
    ] as const
  ).map(([what, cells, sentence]): Fault => [
    what,
    () => sheetWith(cells),
    'damaged',
    damaged(`in its sheet Plan, ${sentence}`),
  ]),
];

it.each(faults)('%s is refused with its sentence', async (_what, bytes, code, sentence) => {
  const content = new Uint8Array(bytes());
  const opening = openPackage(content, 'week.xlsx').then(readWorkbook);
  const error: unknown = await opening.then(
    () => undefined,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(WorkbookError);
  expect((error as WorkbookError).message).toBe(sentence);
  expect((error as WorkbookError).code).toBe(code);
});

it('has at least 25 kinds of faulty files here', () => {
  expect(faults.length).toBeGreaterThanOrEqual(25);
});

it('the sound file that the faulty ones are made from is read', async () => {
  const workbook = await readWorkbook(await openPackage(sound, 'week.xlsx'));
  expect(workbook.sheets[0].cell(0, 2)?.formula).toBe('B1*2');
});

it('a file cut off at any place, or with any one byte changed, gives a sentence or a workbook and never crashes', async () => {
  // Seed 1: a linear congruential generator, constants after Numerical Recipes (from memory).
  let state = 1;
  const random = (below: number): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
  for (let round = 0; round < 300; round++) {
    let bytes = new Uint8Array(sound);
    if (round % 3 === 0) bytes = bytes.slice(0, random(bytes.length));
    else bytes[random(bytes.length)] ^= 1 + random(255);
    try {
      const workbook = await XlsxWorkbook.open(bytes, 'week.xlsx');
      await workbook.read();
    } catch (error) {
      expect(error).toBeInstanceOf(WorkbookError);
      expect((error as WorkbookError).message).toMatch(/^week\.xlsx .*\.$/);
    }
  }
});
