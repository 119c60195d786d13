/**
 * What is written into a workbook in Excel, and what is refused before anything is touched.
 */
import type { WorkbookWrite } from '../../../../addin/domain/results-to-sheet/write-plan';
import type { WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { ExcelFilters } from '../../../../addin/adapters/excel-host/excel-filters';
import { ExcelBatches } from '../../../../addin/adapters/excel-host/excel-batch';
import { pointsOfCharacters } from '../../../../addin/adapters/excel-host/excel-widths';
import type { OfficeHost } from '../../../office-host/office-host';
import { stateOf } from '../../../office-host/host-state';
import { at, openDescribed, refusalOf } from './open-in-excel';

jest.setTimeout(120_000);

const week: WorkbookDescription = {
  sheets: {
    Plan: {
      B5: 0,
      B6: 0,
      B8: '=B5+2*B6',
      B10: '=SUM(B5:B6)',
      C10: '<=',
      D10: { value: 4, numberFormat: '#,##0.0' },
    },
    Costs: { A1: 3 },
  },
  names: {
    'Week.Decision': 'Plan!$B$5:$B$6',
    'Week.Objective': 'Plan!$B$8',
    'Week.Sense': '"max"',
    'Week.Constraint': 'Plan!$B$10:$D$10',
  },
};

const value = (text: string, written: number | string | boolean | null, sheet = 'Plan'): WorkbookWrite => ({
  kind: 'value',
  cell: at(sheet, text),
  value: written,
});

describe('AD-102 texts come back as the same texts', () => {
  // What Excel would otherwise make of them: dates, numbers, formulas, truth values, errors, in some language.
  const texts = [
    'Wall tile',
    'Optimum',
    'Slack\n(left over)',
    '1-2',
    '3/4',
    '007',
    '12.5',
    '1,234',
    '5%',
    '$7',
    '(12)',
    '1e3',
    '=>',
    '=<',
    '<=',
    '=A1',
    '+B1',
    '-B1',
    '@SUM',
    "'quoted",
    "''",
    'TRUE',
    'wahr',
    'May 5',
    '5 May',
    '2026-03-04',
    '12:30',
    '#N/A',
    '#REF!',
    '1 1/2',
    ' leading blank',
    'trailing blank ',
    'é à ü ß 漢字',
    'Größe 7',
    '-',
    '=',
  ];

  it.each(texts)('%j', async (text) => {
    for (const numberFormat of ['General', '0.00', '@', 'yyyy-mm-dd']) {
      const { workbook } = openDescribed({ sheets: { Plan: { A1: { value: 'x', numberFormat }, B1: 1 } } });
      await workbook.apply([value('A1', text), value('C3', text)]);
      const [plan] = (await workbook.read()).sheets;
      expect([numberFormat, plan.cell(0, 0)]).toMatchObject([
        numberFormat,
        { value: text, formula: undefined, numberFormat },
      ]);
      expect(plan.cell(2, 2)).toMatchObject({ value: text, formula: undefined, numberFormat: 'General' });
    }
  });
});

it('a number stays a number in a cell that was made for texts', async () => {
  const { workbook } = openDescribed({ sheets: { Plan: { A1: { value: '5', numberFormat: '@' } } } });
  await workbook.apply([value('A1', 12.5)]);
  expect((await workbook.read()).sheets[0].cell(0, 0)).toMatchObject({
    value: 12.5,
    numberFormat: 'General',
  });
});

it('numbers come back to the last bit', async () => {
  const numbers = [1 / 3, 0.1 + 0.2, 1e-300, 123_456_789.123_456_79, -7, 2 ** 53];
  const { workbook } = openDescribed(week);
  await workbook.apply(numbers.map((number, row) => value(`H${row + 1}`, number)));
  const [plan] = (await workbook.read()).sheets;
  expect(numbers.map((_, row) => plan.cell(row, 7)?.value)).toEqual(numbers);
});

it('headings break their text, columns get their width, and what depends on decisions is calculated', async () => {
  const { host, workbook } = openDescribed(week);
  await workbook.apply([
    value('B5', 1),
    value('B6', 3),
    { kind: 'value', cell: at('Plan', 'F4'), value: 'Optimum\n(best amount)', wrapsText: true },
    { kind: 'value', cell: at('Plan', 'F5'), value: 1, numberFormatOf: at('Plan', 'D10') },
    { kind: 'columnWidth', sheet: 'Plan', column: 5, width: 14 },
    { kind: 'storedValue', cell: at('Plan', 'B8'), value: 7 },
  ]);
  const sheet = host.workbook.sheets[0];
  expect(sheet.wrapsTextAt(3, 5)).toBe(true);
  expect(sheet.numberFormatAt(4, 5)).toBe('#,##0.0');
  // 14 characters of 7 pixels and 5 of margin, at 0.75 points (ECMA-376 Part 1, §18.3.1.13).
  expect(sheet.columnWidths.get(5)).toBe(77.25);
  expect(pointsOfCharacters(8.43)).toBe(48);
  expect([host.value('Plan!B8'), host.value('Plan!B10')]).toEqual([7, 4]);
});

it('a write takes two round trips, the comparison included', async () => {
  const { host, workbook } = openDescribed(week);
  const basis = await workbook.read();
  host.resetTraffic();
  await workbook.apply([value('B5', 1), value('F5', 1), { kind: 'record', json: '{}' }], basis);
  expect(host.traffic.roundTrips).toBe(2);
});

it('a workbook that the planner calculates by hand is calculated, and stays so', async () => {
  const { host, workbook } = openDescribed(week);
  host.workbook.calculationMode = 'Manual';
  await workbook.apply([value('B5', 1), value('B6', 3)]);
  expect(host.workbook.sheets[0].cell(7, 1)?.value).toBe(7);
  expect(host.workbook.calculationMode).toBe('Manual');
});

describe('AD-104 refused before anything is touched', () => {
  async function refused(
    description: WorkbookDescription,
    plan: WorkbookWrite[],
    prepare: (host: OfficeHost) => void = () => undefined,
  ): Promise<Awaited<ReturnType<typeof refusalOf>>> {
    const { host, workbook } = openDescribed(description);
    prepare(host);
    const before = stateOf(host.workbook);
    const basis = await workbook.read();
    const refusal = await refusalOf(workbook.apply(plan, basis));
    expect(stateOf(host.workbook)).toEqual(before);
    expect(workbook.unfinished()).toEqual([]);
    return refusal;
  }
  const plan = [value('B5', 1), value('F5', 1)];

  it('a protected sheet, by its name', async () => {
    const refusal = await refused({ ...week, protectedSheets: ['Plan'] }, plan);
    expect(refusal).toMatchObject({ code: 'protected-sheet', sheets: ['Plan'], canRetry: true });
    expect(refusal.message).toContain('Plan');
  });

  it('headings and totals of tables, cells of PivotTables, and cells that no sheet has', async () => {
    const description: WorkbookDescription = {
      sheets: {
        Plan: {
          A1: [
            ['Tile', 'Amount'],
            ['Wall', 4],
            ['Total', 4],
          ],
        },
      },
      tables: [{ name: 'Tiles', sheet: 'Plan', ref: 'A1:B3', totalsRowCount: 1 }],
      pivots: { Plan: ['E1:F5'] },
    };
    for (const [address, why] of [
      ['A1', 'a heading or a total of the table Tiles'],
      ['B3', 'a heading or a total of the table Tiles'],
      ['E4', 'a PivotTable'],
    ] as const) {
      const refusal = await refused(description, [value(address, 'x')]);
      expect(refusal.code).toBe('would-overwrite');
      expect(refusal.message).toContain(why);
    }
    const nowhere = { kind: 'value', cell: { sheet: 'Plan', row: -1, column: 0 }, value: 1 } as const;
    expect((await refused(description, [nowhere])).code).toBe('write-failed');
    const { host, workbook } = openDescribed(description);
    await workbook.apply([value('B2', 5)], await workbook.read());
    expect(host.value('Plan!B2')).toBe(5);
  });

  it('a protected structure, where a sheet is to be added', async () => {
    const added = [...plan, { kind: 'addSheet', name: 'Week results' } as const];
    const refusal = await refused(week, added, ({ workbook }) => (workbook.isStructureProtected = true));
    expect(refusal).toMatchObject({ code: 'protected-structure', sheets: ['Week results'] });
  });

  it('a structure that is protected is no matter where no sheet is added', async () => {
    const { host, workbook } = openDescribed(week);
    host.workbook.isStructureProtected = true;
    await workbook.apply(plan);
    expect(host.value('Plan!B5')).toBe(1);
  });

  it('a filter over the cells, until it is cleared', async () => {
    const filtered = { ...week, filteredSheets: ['Plan'], hiddenRows: { Plan: [6] } };
    const both = [value('B5', 1), value('B6', 3)];
    const refusal = await refused(filtered, both);
    expect(refusal).toMatchObject({ code: 'filtered', sheets: ['Plan'], canRetry: true });

    const { host, workbook } = openDescribed(filtered);
    const basis = await workbook.read();
    await refusalOf(workbook.apply(both, basis));
    await new ExcelFilters(new ExcelBatches()).clear(refusal.sheets);
    await workbook.apply(both, basis);
    expect([host.value('Plan!B5'), host.value('Plan!B6')]).toEqual([1, 3]);
  });

  it("a table's filter over the cells, until it is cleared", async () => {
    const open = openDescribed({
      ...week,
      sheets: { ...week.sheets, Plan: { ...week.sheets.Plan, A4: [['Tile'], ['Wall'], ['Floor']] } },
      tables: [{ name: 'Tiles', sheet: 'Plan', ref: 'A4:A6' }],
    });
    const [sheet] = open.host.workbook.sheets;
    const range = { sheet: 'Plan', top: 3, left: 0, bottom: 5, right: 0 };
    sheet.filters.push({ of: 'Tiles', range, hiddenRows: new Set([5]) });
    expect((await refusalOf(open.workbook.apply([value('B5', 1), value('B6', 3)]))).code).toBe('filtered');
    await new ExcelFilters(new ExcelBatches()).clear(['Plan']);
    expect(sheet.filters).toEqual([]);
  });

  it('a filter that hides other rows is no matter', async () => {
    const { host, workbook } = openDescribed({
      ...week,
      filteredSheets: ['Plan'],
      hiddenRows: { Plan: [10] },
    });
    await workbook.apply([value('B5', 1), value('B6', 3)]);
    expect([host.value('Plan!B5'), host.value('Plan!B6')]).toEqual([1, 3]);
  });

  it('a cell that is being edited', async () => {
    const { host, workbook } = openDescribed(week);
    const basis = await workbook.read();
    host.isEditingCell = true;
    const refusal = await refusalOf(workbook.apply(plan, basis));
    expect(refusal).toMatchObject({ code: 'editing-cell', canRetry: true });
    host.isEditingCell = false;
    await workbook.apply(plan, basis);
    expect(host.value('Plan!B5')).toBe(1);
  });

  it('another workbook in front', async () => {
    const { host, workbook } = openDescribed(week);
    host.isInBackground = true;
    expect(await refusalOf(workbook.apply(plan))).toMatchObject({ code: 'other-workbook', canRetry: true });
  });

  it('an open dialog, found when writing begins: the workbook is as it was', async () => {
    const { host, workbook } = openDescribed(week);
    const before = stateOf(host.workbook);
    host.isDialogOpen = true;
    expect(await refusalOf(workbook.apply(plan))).toMatchObject({ code: 'dialog-open', canRetry: true });
    expect(stateOf(host.workbook)).toEqual(before);
    host.isDialogOpen = false;
    await workbook.apply(plan);
    expect(host.value('Plan!B5')).toBe(1);
  });
});

describe('AD-103 a workbook that was changed after it was read', () => {
  const plan = [value('B5', 1), value('B6', 3), value('F5', 1)];

  async function afterChange(change: (host: OfficeHost) => void): Promise<string> {
    const { host, workbook } = openDescribed(week);
    const basis = await workbook.read();
    change(host);
    const before = stateOf(host.workbook);
    const outcome = await workbook.apply(plan, basis).then(
      () => 'written',
      (error: { code: string; message: string }) => `${error.code}: ${error.message}`,
    );
    if (outcome !== 'written') expect(stateOf(host.workbook)).toEqual(before);
    return outcome;
  }

  it('is not written where a decision, a limit or a formula is another', async () => {
    for (const [address, entry] of [
      ['Plan!B5', 2],
      ['Plan!D10', 5],
      ['Plan!C10', '>='],
      ['Plan!B8', '=B5+3*B6'],
      ['Plan!B10', 7],
    ] as const) {
      const outcome = await afterChange((host) => host.type(address, entry));
      expect([address, outcome]).toEqual([address, expect.stringContaining('changed-meanwhile')]);
      expect(outcome).toContain(address);
    }
  });

  it('is not written where a name leads elsewhere, is gone, or is new', async () => {
    const renamed = await afterChange(
      ({ workbook }) => (workbook.findName('week.decision', undefined)!.formula = 'Plan!$B$5'),
    );
    expect(renamed).toContain('Week.Decision');
    const gone = await afterChange(({ workbook }) =>
      workbook.deleteName(workbook.findName('Week.Sense', undefined)!),
    );
    expect(gone).toContain('Week.Sense');
    const added = await afterChange(({ workbook }) => workbook.addName('Week.Upper', undefined, '5', ''));
    expect(added).toContain('Week.Upper');
  });

  it('is not written where its sheet has another name', async () => {
    const outcome = await afterChange(({ workbook }) => {
      workbook.sheets[0].name = 'Plan 2';
      workbook.structureChanged();
    });
    expect(outcome).toMatch(/^(changed-meanwhile|write-failed)/);
  });

  it('is written where somebody works on cells that the plan does not use', async () => {
    expect(await afterChange((host) => host.type('Plan!A1', 'a remark'))).toBe('written');
    expect(await afterChange((host) => host.type('Costs!A1', 4))).toBe('written');
    expect(await afterChange((host) => host.type('Costs!B9', 4))).toBe('written');
    expect(await afterChange(({ workbook }) => workbook.addName('Remark', undefined, '5', ''))).toBe(
      'written',
    );
  });

  it('is not written over a value that somebody has put where results were to stand', async () => {
    const outcome = await afterChange((host) => host.type('Plan!F5', 'mine'));
    expect(outcome).toContain('changed-meanwhile');
    expect(outcome).toContain('Plan!F5');
  });
});

it('AD-105 what Excel does not keep is found out and put back: a merged cell that could not be seen', async () => {
  const { host, workbook } = openDescribed(
    { ...week, merged: { Plan: ['F5:F6'] } },
    { requirementSet: '1.9' },
  );
  const before = stateOf(host.workbook);
  const refusal = await refusalOf(workbook.apply([value('B5', 1), value('F5', 1), value('F6', 2)]));
  expect(refusal).toMatchObject({ code: 'not-verified', canRetry: true });
  expect(refusal.message).toContain('Plan!F6');
  expect(stateOf(host.workbook)).toEqual(before);
});

it('a plan beyond one message is written in several, whole', async () => {
  const { host, workbook } = openDescribed({ sheets: { Plan: { A1: 1 } } });
  const long = 'a remark on this order that is rather long '.repeat(20);
  const plan = Array.from({ length: 9000 }, (_, row): WorkbookWrite => ({
    kind: 'value',
    cell: { sheet: 'Plan', row, column: 3 },
    value: `${long}${row}`,
  }));
  host.resetTraffic();
  await workbook.apply(plan);
  expect(host.traffic.largestMessage).toBeLessThan(5 * 1024 * 1024);
  expect(host.value('Plan!D9000')).toBe(`${long}8999`);
  // What stands there now is as long, and is read before it is written over.
  await workbook.apply(plan.map((write) => ({ ...write, value: null }) as WorkbookWrite));
  expect(host.value('Plan!D9000')).toBeNull();
  expect(host.traffic.largestMessage).toBeLessThan(5 * 1024 * 1024);
});
