/**
 * What is read of a workbook in Excel, and how: round trips and message sizes after design.md §9.
 */
import type { WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { CellError } from '../../../../addin/domain/sheet/cell-value';
import { findSheet } from '../../../../addin/domain/sheet/sheet-snapshot';
import { at, openDescribed, refusalOf } from './open-in-excel';
import { largePlan } from './large-plan';

/** What one message may hold, and the figure that reading is measured by. */
const messageLimit = 5 * 1024 * 1024;
const countedMessage = 4_000_000;

jest.setTimeout(120_000);

async function read(
  description: WorkbookDescription,
  options: Parameters<typeof openDescribed>[1] = {},
): Promise<ReturnType<typeof openDescribed> & { read: Awaited<ReturnType<typeof readOf>> }> {
  const open = openDescribed(description, options);
  open.host.resetTraffic();
  return { ...open, read: await readOf(open) };
}

const readOf = ({ workbook }: ReturnType<typeof openDescribed>) => workbook.read();

it('values of every kind come as they are', async () => {
  const { read: snapshot } = await read({
    sheets: {
      Plan: {
        A1: 'Wall tile',
        A2: 12.5,
        A3: true,
        A4: CellError.of('#DIV/0!'),
        A5: { value: 46_000, isDate: true },
        A6: { formula: 'IF(A2>0,"","x")', value: '' },
        A7: { value: '=no formula' },
        A8: { value: '#N/A' },
        A9: '007',
      },
    },
  });
  const cells = Array.from({ length: 9 }, (_, row) => snapshot.sheets[0].cell(row, 0)!);
  expect(cells.map(({ value }) => value)).toEqual([
    'Wall tile',
    12.5,
    true,
    CellError.of('#DIV/0!'),
    46_000,
    '',
    '=no formula',
    '#N/A',
    '007',
  ]);
  expect(cells.map(({ formula }) => formula).filter((formula) => formula !== undefined)).toEqual([
    'IF(A2>0,"","x")',
  ]);
  expect(cells.map(({ isDate }) => isDate).indexOf(true)).toBe(4);
});

it('AD-100 names that lead nowhere, to computed ranges or to several areas are read as text, and never resolved by Excel', async () => {
  const { host, read: snapshot } = await read({
    sheets: { Plan: { A1: 1 } },
    names: {
      Dead: '#REF!',
      Moving: 'OFFSET(Plan!$A$1,0,0,COUNT(Plan!$A:$A),1)',
      Several: 'Plan!$A$1,Plan!$C$3',
      Constant: '"max"',
    },
    localNames: { Plan: { Print_Area: 'Plan!$A$1:$C$3' } },
  });
  expect(snapshot.names.map(({ name, formula }) => [name, formula])).toEqual([
    ['Dead', '#REF!'],
    ['Moving', 'OFFSET(Plan!$A$1,0,0,COUNT(Plan!$A:$A),1)'],
    ['Several', 'Plan!$A$1,Plan!$C$3'],
    ['Constant', '"max"'],
    ['_xlnm.Print_Area', 'Plan!$A$1:$C$3'],
  ]);
  const used = [...host.usedMembers].filter((member) => member.startsWith('NamedItem.'));
  expect(used.sort()).toEqual([
    'NamedItem.Formula',
    'NamedItem.Name',
    'NamedItem.Scope',
    'NamedItem.Visible',
  ]);
});

it('hidden rows and columns are known beyond what is used, where results may stand', async () => {
  const { read: snapshot } = await read({
    sheets: { Plan: { B2: 1, C3: 2 } },
    hiddenRows: { Plan: [2] },
    hiddenColumns: { Plan: ['C'] },
  });
  const [plan] = snapshot.sheets;
  expect([0, 1, 2].map((row) => plan.isRowHidden(row))).toEqual([false, true, false]);
  expect([1, 2, 3].map((column) => plan.isColumnHidden(column))).toEqual([false, true, false]);

  const open = openDescribed({ sheets: { Plan: { A1: 1 } } });
  open.host.workbook.sheets[0].hiddenColumns.add(20);
  open.host.workbook.sheets[0].hiddenRows.add(15);
  const [beyond] = (await open.workbook.read()).sheets;
  expect([beyond.isColumnHidden(20), beyond.isRowHidden(15)]).toEqual([true, true]);
});

it('tables, merged cells, comments, PivotTables, protection and filters are known', async () => {
  const { read: snapshot } = await read({
    sheets: {
      Plan: {
        A1: [
          ['Tile', 'Price'],
          ['Wall', 4],
        ],
        A9: 'merged',
      },
      Data: { A1: 1 },
    },
    tables: [{ name: 'Prices', sheet: 'Plan', ref: 'A1:B2' }],
    merged: { Plan: ['A9:C9', 'H20:H21'] },
    noted: { Plan: ['B2'] },
    pivots: { Data: ['A1:B5'] },
    protectedSheets: ['Data'],
    filteredSheets: ['Plan'],
    hiddenSheets: ['Data'],
  });
  const [plan, data] = snapshot.sheets;
  expect(snapshot.tables).toEqual([
    {
      name: 'Prices',
      range: { sheet: 'Plan', top: 0, left: 0, bottom: 1, right: 1 },
      headerRowCount: 1,
      totalsRowCount: 0,
      columnNames: ['Tile', 'Price'],
    },
  ]);
  expect(plan.mergedRanges).toContainEqual({ sheet: 'Plan', top: 8, left: 0, bottom: 8, right: 2 });
  expect(plan.notedCells).toEqual([at('Plan', 'B2')]);
  expect(data.pivotRanges).toEqual([{ sheet: 'Data', top: 0, left: 0, bottom: 4, right: 1 }]);
  expect([plan.isProtected, data.isProtected]).toEqual([false, true]);
  expect([plan.hasActiveFilter, data.hasActiveFilter]).toEqual([true, false]);
  expect([plan.visibility, data.visibility]).toEqual(['visible', 'hidden']);
});

it('a workbook that counts days from 1904 is told by what DATE gives', async () => {
  const sheets = { Plan: { A1: 1 } };
  expect((await read({ sheets })).read.usesDates1904).toBe(false);
  expect((await read({ sheets, usesDates1904: true })).read.usesDates1904).toBe(true);
});

it.each(['1.9', '1.11', '1.12', '1.15'])(
  'cells that an array formula fills are known with ExcelApi %s',
  async (requirementSet) => {
    const { host, read: snapshot } = await read(
      {
        sheets: {
          Plan: {
            A1: [[1], [2], [3]],
            C1: { formula: 'A1:A3*2', fills: 'C1:C3', value: 2 },
            C2: 4,
            C3: 6,
            // The same text in three cells, and no array: nothing in it would change from cell to cell.
            E1: '=$A$1+1',
            E2: '=$A$1+1',
            E3: '=$A$1+1',
          },
        },
      },
      { requirementSet },
    );
    const [plan] = snapshot.sheets;
    expect(plan.cell(0, 2)).toMatchObject({
      formula: 'A1:A3*2',
      value: 2,
      arrayRange: { sheet: 'Plan', top: 0, left: 2, bottom: 2, right: 2 },
    });
    expect([plan.cell(1, 2)?.formula, plan.cell(1, 2)?.value]).toEqual([undefined, 4]);
    expect([plan.cell(2, 4)?.formula, plan.cell(2, 4)?.arrayRange]).toEqual(['$A$1+1', undefined]);
    expect(host.traffic.roundTrips).toBeLessThanOrEqual(4);
  },
);

it('an empty workbook is read', async () => {
  const { read: snapshot } = await read({ sheets: { Plan: {} } });
  expect(snapshot.sheets[0].rowCount).toBe(0);
  expect(snapshot.names).toEqual([]);
});

it('cells that stand far from the first ones are read in their place', async () => {
  const { host, read: snapshot } = await read({ sheets: { Plan: { AZ5000: 7, AZ5001: '=AZ5000*2' } } });
  expect(snapshot.sheets[0].cell(4999, 51)?.value).toBe(7);
  expect(snapshot.sheets[0].cell(5000, 51)).toMatchObject({ value: 14, formula: 'AZ5000*2' });
  expect(host.traffic.roundTrips).toBe(3);
});

it('AD-100 a plan of 3,000 decisions and 1,200 rows is read in the round trips of the design', async () => {
  const { host, read: snapshot } = await read(largePlan(3000, 1200, 30));
  const { roundTrips, responseBytes, largestMessage } = host.traffic;
  expect(roundTrips).toBeLessThanOrEqual(3 + Math.ceil(responseBytes / countedMessage));
  expect(largestMessage).toBeLessThan(messageLimit);
  expect(findSheet(snapshot, 'Plan')?.cell(1200, 0)?.formula).toMatch(/^SUMPRODUCT/);
});

it('a workbook of many messages is read in 4 MB pieces', async () => {
  const row = (position: number): string[] =>
    Array.from({ length: 10 }, (_, column) => `tile ${position} in column ${column} of the list`);
  const sheets = { Plan: { A1: Array.from({ length: 26_000 }, (_, position) => row(position)) } };
  const { host, read: snapshot } = await read({ sheets });
  const { roundTrips, responseBytes, largestMessage } = host.traffic;
  expect(responseBytes).toBeGreaterThan(4 * countedMessage);
  expect(roundTrips).toBeLessThanOrEqual(3 + Math.ceil(responseBytes / countedMessage));
  expect(largestMessage).toBeLessThan(messageLimit);
  expect(snapshot.sheets[0].cell(25_999, 9)?.value).toBe('tile 25999 in column 9 of the list');
});

it('an answer that comes out too large is asked for again in smaller pieces', async () => {
  // Short entries first, so that the length of the later ones comes as a surprise.
  const long = 'a glaze with a very long description '.repeat(60);
  const rows = Array.from({ length: 40_000 }, (_, position) => [
    position < 38_000 ? 1 : `${position} ${long}`,
  ]);
  const { host, read: snapshot } = await read({ sheets: { Plan: { A1: rows } } });
  expect(snapshot.sheets[0].cell(0, 0)?.value).toBe(1);
  expect(snapshot.sheets[0].cell(39_999, 0)?.value).toBe(`39999 ${long}`);
  expect(host.traffic.largestMessage).toBeLessThan(messageLimit);
});

it('AD-101 of a very large workbook, only sheets that the plans lead to are read', async () => {
  const filled = (value: number): number[][] =>
    Array.from({ length: 50_000 }, () => [value, value, value, value]);
  const { host, read: snapshot } = await read({
    sheets: {
      Plan: { A1: 5, B1: '=A1*Rate', C1: '=SUM(Prices[Price])' },
      Rates: { A1: '=Sources!A1' },
      Sources: { A1: 3 },
      'Price list': { A1: [['Price'], [4]] },
      'Old data': { A1: filled(1) },
      'Older data': { A1: filled(2) },
      'Cost data': { A1: filled(3) },
    },
    tables: [{ name: 'Prices', sheet: 'Price list', ref: 'A1:A2' }],
    names: { 'Week.Decision': 'Plan!$A$1', Rate: 'Rates!$A$1' },
  });
  const isRead = (name: string): boolean => findSheet(snapshot, name)!.cell(0, 0) !== undefined;
  expect(['Plan', 'Rates', 'Sources', 'Price list'].map(isRead)).toEqual([true, true, true, true]);
  expect(['Old data', 'Older data', 'Cost data'].map(isRead)).toEqual([false, false, false]);
  // Three, and two that were found only through formulas.
  expect(host.traffic.roundTrips).toBeLessThanOrEqual(5);
});

it('a formula that puts the name of a sheet together makes every sheet be read', async () => {
  const filled = Array.from({ length: 60_000 }, () => [1, 1, 1, 1, 1, 1, 1]);
  const { read: snapshot } = await read({
    sheets: { Plan: { A1: 5, B1: '=INDIRECT("Old"&" data!A1")' }, 'Old data': { A1: filled } },
    names: { 'Week.Decision': 'Plan!$A$1', 'Week.Objective': 'Plan!$B$1' },
  });
  expect(findSheet(snapshot, 'Old data')!.cell(0, 0)?.value).toBe(1);
});

it('a sheet that reaches far beyond its data is refused with its name', async () => {
  const { workbook } = openDescribed({
    sheets: { Plan: { A1: 1, XFD900: 1 } },
    names: { 'Week.Decision': 'Plan!$A$1' },
  });
  const refusal = await refusalOf(workbook.read());
  expect(refusal.code).toBe('too-large');
  expect(refusal.message).toContain('Plan reaches to XFD900');
});

it('AD-107 an Excel that is older than we need is refused before anything is asked', async () => {
  const { host, workbook } = openDescribed({ sheets: { Plan: { A1: 1 } } }, { requirementSet: '1.8' });
  host.resetTraffic();
  expect((await refusalOf(workbook.read())).code).toBe('host-too-old');
  expect(host.traffic.roundTrips).toBe(0);
});
