/**
 * The far end speaks as Excel does, to the genuine library: what must come out is documented by Microsoft (Excel
 * JavaScript API) or was seen with the library itself.
 */
/// <reference types="office-js" />
import { MemoryWorkbook } from '../../addin/adapters/memory/memory-workbook';
import type { OfficeHost, OfficeHostOptions } from './office-host';
import { startOfficeHost } from './node-host';

function openWeek(options: OfficeHostOptions = {}): OfficeHost {
  const book = MemoryWorkbook.of({
    sheets: {
      Plan: {
        A1: [
          [1, 2],
          [3, 4],
        ],
        C1: '=SUM(A1:B2)',
      },
    },
    names: { 'Week.Decision': 'Plan!$A$1:$A$2' },
  });
  return startOfficeHost(book.snapshot(), options);
}

async function errorOf(work: (context: Excel.RequestContext) => void): Promise<OfficeExtension.Error> {
  try {
    await Excel.run(async (context) => {
      work(context);
      await context.sync();
    });
  } catch (error) {
    return error as OfficeExtension.Error;
  }
  throw new Error('Nothing was refused.');
}

it('a value that is not loaded cannot be read, and one written is calculated on', async () => {
  openWeek();
  await Excel.run(async (context) => {
    const sheet = context.workbook.worksheets.getItem('Plan');
    const range = sheet.getRange('A1:B2');
    range.load('values');
    expect(() => range.values).toThrow(/PropertyNotLoaded|not available/);
    await context.sync();
    expect(range.values).toEqual([
      [1, 2],
      [3, 4],
    ]);
    range.values = [
      [10, null],
      [30, ''],
    ];
    const sum = sheet.getRange('C1').load('values,formulas');
    await context.sync();
    expect(sum.values).toEqual([[42]]);
    expect(sum.formulas).toEqual([['=SUM(A1:B2)']]);
  });
});

it('no range reference is left after a run', async () => {
  const host = openWeek();
  await Excel.run(async (context) => {
    context.workbook.worksheets.getItem('Plan').getRange('A1').load('values');
    await context.sync();
  });
  await new Promise((resolve) => setImmediate(resolve));
  expect(host.references.size).toBe(0);
  expect(host.traffic).toMatchObject({ roundTrips: 1, cleanups: 1 });
});

it('what is missing is a null object or an error with code and place', async () => {
  openWeek();
  await Excel.run(async (context) => {
    const missing = context.workbook.worksheets.getItemOrNullObject('Nowhere').load('name');
    const range = missing.getUsedRangeOrNullObject().load('address');
    await context.sync();
    expect([missing.isNullObject, range.isNullObject]).toEqual([true, true]);
  });
  const error = await errorOf((context) => context.workbook.worksheets.getItem('Nowhere').load('name'));
  expect(error.code).toBe('ItemNotFound');
  const wrongSize = await errorOf((context) => {
    context.workbook.worksheets.getItem('Plan').getRange('A1:B2').values = [[1]];
  });
  expect(wrongSize.code).toBe('InvalidArgument');
});

it('a member beyond the requirement set is refused by the library', async () => {
  openWeek({ requirementSet: '1.9' });
  const error = await errorOf((context) => {
    context.workbook.worksheets.getItem('Plan').getRange('A1').getMergedAreasOrNullObject();
  });
  expect(error.code).toBe('ApiNotFound');
  expect(error.message).toContain('ExcelApi 1.13');
});

it('an error midway leaves what was done before it', async () => {
  const host = openWeek();
  host.expectFault({ batch: 1, code: 'GeneralException', when: 'midway', isLasting: false });
  const error = await errorOf((context) => {
    const sheet = context.workbook.worksheets.getItem('Plan');
    for (const address of ['A1', 'B1', 'A2', 'B2']) sheet.getRange(address).values = [[7]];
  });
  expect(error.code).toBe('GeneralException');
  expect([host.value('Plan!A1'), host.value('Plan!B2')]).toEqual([7, 4]);
});

it('events reach those who registered', async () => {
  const host = openWeek();
  const seen: string[] = [];
  await Excel.run(async (context) => {
    context.workbook.worksheets.onChanged.add((event) => {
      seen.push(`changed ${event.address}`);
      return Promise.resolve();
    });
    context.workbook.worksheets.onSelectionChanged.add((event) => {
      seen.push(`selected ${event.address}`);
      return Promise.resolve();
    });
    await context.sync();
  });
  host.type('Plan!A1', 5);
  host.select('Plan', { top: 1, left: 0, bottom: 2, right: 1 });
  await new Promise((resolve) => setImmediate(resolve));
  expect(seen).toEqual(['changed A1', 'selected A2:B3']);
});

it('a large write is cut into slices by the library, in one message', async () => {
  const host = openWeek();
  await Excel.run(async (context) => {
    const rows = Array.from({ length: 2000 }, (_, row) => [row]);
    context.workbook.worksheets.getItem('Plan').getRange('E1:E2000').values = rows;
    await context.sync();
  });
  expect(host.value('Plan!E2000')).toBe(1999);
  expect(host.traffic.roundTrips).toBe(1);
});

it('a message over the limit is refused', async () => {
  const host = openWeek({ messageLimit: 10_000 });
  const tooMuch = await errorOf((context) => {
    const rows = Array.from({ length: 2000 }, () => ['something long enough to count']);
    context.workbook.worksheets.getItem('Plan').getRange('E1:E2000').values = rows;
  });
  expect(tooMuch.code).toBe('RequestPayloadSizeLimitExceeded');
  const tooLong = await errorOf((context) => {
    context.workbook.worksheets.getItem('Plan').getRange('A1:Z2000').load('values');
  });
  expect(tooLong.code).toBe('ResponsePayloadSizeLimitExceeded');
  expect(host.traffic.largestMessage).toBeGreaterThan(10_000);
});

it('values typed through the library become what Excel makes of them', async () => {
  const host = openWeek();
  // Left: entered. Right: what stands in the cell, by Microsoft's rules for Range.values, en-US.
  const cases: [string, unknown][] = [
    ['12.5', 12.5],
    ['007', 7],
    ["'007", '007'],
    ['TRUE', true],
    ['5%', 0.05],
    ['1,234', 1234],
    ['2026-03-04', 46_085],
    ['=A1+1', 2],
    ['-A1', -1],
    ['Wall tile', 'Wall tile'],
    ["'=A1", '=A1'],
    ['1e3', 1000],
  ];
  await Excel.run(async (context) => {
    const range = context.workbook.worksheets.getItem('Plan').getRange(`F1:F${cases.length}`);
    range.values = cases.map(([entered]) => [entered]);
    await context.sync();
  });
  cases.forEach(([entered, standing], row) => {
    expect([entered, host.value(`Plan!F${row + 1}`)]).toEqual([entered, standing]);
  });
});
