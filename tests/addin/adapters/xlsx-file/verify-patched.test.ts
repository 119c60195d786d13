/** The check before saving must find every way in which a written file could be wrong. */
import { verifyPatched } from '../../../../addin/adapters/xlsx-file/verify-patched';
import { XlsxWorkbook } from '../../../../addin/adapters/xlsx-file/xlsx-workbook';
import type { WritePlan } from '../../../../addin/domain/results-to-sheet/write-plan';
import { WorkbookError } from '../../../../addin/ports/workbook';
import { buildXlsx } from '../../../support/xlsx-builder';
import { buildZip } from '../../../support/zip-builder';
import { inspectZip } from '../../../support/zip-inspector';

// Slow only on a busy machine, and never judged by time.
jest.setTimeout(60_000);

const before = buildXlsx({
  sheets: [
    {
      name: 'Plan',
      cells: {
        A1: 'Wall tile',
        B1: 4,
        C1: { formula: 'B1*2', value: 8 },
        C2: { formula: 'B2*2', value: 0 },
        D1: { value: 1, numberFormat: '0.00' },
      },
      merges: ['A5:B5'],
    },
    { name: 'Cost data', cells: { A1: 3 } },
  ],
  names: { 'Week.Decision': 'Plan!$B$1', Rate: '0.25' },
  tables: [{ name: 'Costs', sheet: 'Cost data', ref: 'A1:A2' }],
});

const plan: WritePlan = [
  { kind: 'value', cell: { sheet: 'Plan', row: 0, column: 1 }, value: 5 },
  { kind: 'storedValue', cell: { sheet: 'Plan', row: 0, column: 2 }, value: 10 },
  { kind: 'value', cell: { sheet: 'Plan', row: 0, column: 5 }, value: 'Optimum' },
  {
    kind: 'value',
    cell: { sheet: 'Plan', row: 0, column: 6 },
    value: 7,
    numberFormatOf: { sheet: 'Plan', row: 0, column: 3 },
  },
  { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$F$2' },
  { kind: 'record', json: '{"a":1}' },
];

async function planned(): Promise<Uint8Array> {
  const workbook = await XlsxWorkbook.open(before, 'week.xlsx');
  await workbook.apply(plan);
  return workbook.bytes();
}

/** The written file with one part's text bent. */
function bent(bytes: Uint8Array, part: string, from: string | RegExp, to: string): Uint8Array {
  return buildZip(
    inspectZip(bytes).map(({ name, content }) => {
      if (name !== part) return { name, content };
      const text = content.toString('utf8');
      const changed = text.replace(from, to);
      if (changed === text) throw new Error(`${part} has nothing like ${String(from)}`);
      return { name, content: changed };
    }),
  );
}

const sheet = 'xl/worksheets/sheet1.xml';
const sorry = (why: string): string =>
  `week.xlsx was not saved, because ${why}; your file is as it was, and this is a fault of Planrow.`;

it('a file that was written as planned passes', async () => {
  await expect(verifyPatched(before, await planned(), plan, 'week.xlsx')).resolves.toBeUndefined();
});

it.each<[string, (bytes: Uint8Array) => Uint8Array, string]>([
  [
    'a value that was not written',
    (b) => bent(b, sheet, '<v>5</v>', '<v>4</v>'),
    'Plan!B1 does not hold what was to be written',
  ],
  [
    'a stored value that differs',
    (b) => bent(b, sheet, '<v>10</v>', '<v>11</v>'),
    'Plan!C1 does not hold what was to be written',
  ],
  [
    'a text that differs',
    (b) => bent(b, sheet, 'Optimum', 'optimum'),
    'Plan!F1 does not hold what was to be written',
  ],
  [
    'a number format that was not taken',
    (b) => bent(b, sheet, '<c r="G1" s="1">', '<c r="G1">'),
    'Plan!G1 does not have the number format that it should',
  ],
  [
    'a formula that changed under its renewed value',
    (b) => bent(b, sheet, 'B1*2', 'B1*3'),
    'Plan!C1 does not hold what was to be written',
  ],
  [
    'a formula that was turned into its value',
    (b) => bent(b, sheet, '<f>B1*2</f>', ''),
    'Plan!C1 does not hold what was to be written',
  ],
  ['another formula that changed', (b) => bent(b, sheet, 'B2*2', 'B2*4'), 'Plan!C2 has changed'],
  [
    'another value that changed',
    (b) => bent(b, sheet, /<c r="A1" t="s"><v>0/, '<c r="A1"><v>0'),
    'Plan!A1 has changed',
  ],
  [
    'another cell that lost its format',
    (b) => bent(b, sheet, '<c r="D1" s="1">', '<c r="D1">'),
    'Plan!D1 has changed',
  ],
  ['a cell that is gone', (b) => bent(b, sheet, /<c r="D1".*?<\/c>/, ''), 'Plan!D1 has changed'],
  [
    'a cell too many',
    (b) => bent(b, sheet, '</row><row r="2">', '<c r="H1"><v>1</v></c></row><row r="2">'),
    'the sheet Plan has changed where nothing was to be written',
  ],
  [
    'a merged cell that is gone',
    (b) => bent(b, sheet, /<mergeCells.*<\/mergeCells>/, ''),
    'the sheet Plan has changed where nothing was to be written',
  ],
  [
    'a name that refers elsewhere',
    (b) => bent(b, 'xl/workbook.xml', '$F$2', '$F$3'),
    'the name week.optimum does not refer to what it should',
  ],
  [
    'another name that is gone',
    (b) => bent(b, 'xl/workbook.xml', /<definedName name="Rate">.*?<\/definedName>/, ''),
    'the name rate does not refer to what it should',
  ],
  [
    'a name too many',
    (b) =>
      bent(
        b,
        'xl/workbook.xml',
        '</definedNames>',
        '<definedName name="Zone">1</definedName></definedNames>',
      ),
    'it has names that it should not have',
  ],
  [
    'a sheet under another name',
    (b) => bent(b, 'xl/workbook.xml', '"Cost data"', '"Costs"'),
    'its sheets are not the ones it should have',
  ],
  [
    'a record that differs',
    (b) => bent(b, 'customXml/item1.xml', '{"a":1}', '{"a":2}'),
    'its record differs',
  ],
  [
    'a part of nobody’s that changed',
    (b) => bent(b, 'xl/styles.xml', 'Calibri', 'Arial'),
    'its part xl/styles.xml has changed',
  ],
  [
    'a sheet that nothing was written to',
    (b) => bent(b, 'xl/worksheets/sheet2.xml', '<v>3</v>', '<v>4</v>'),
    'its part xl/worksheets/sheet2.xml has changed',
  ],
  [
    'a part that is gone',
    (b) => buildZip(inspectZip(b).filter(({ name }) => name !== 'xl/tables/table1.xml')),
    'what was written cannot be read again',
  ],
  [
    'parts in another order',
    (b) => buildZip([...inspectZip(b)].reverse()),
    'its parts are not the ones it had, or not in their order',
  ],
  ['a file cut off', (b) => b.slice(0, b.length - 40), 'what was written cannot be read again'],
  ['the file as it was before', () => before, 'Plan!B1 does not hold what was to be written'],
])('%s is found', async (_what, spoil, why) => {
  const error: unknown = await verifyPatched(before, spoil(await planned()), plan, 'week.xlsx').catch(
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(WorkbookError);
  expect((error as WorkbookError).code).toBe('not-verified');
  expect((error as WorkbookError).message).toBe(sorry(why));
});
