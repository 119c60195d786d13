/**
 * Writes that break off, and what becomes of them while others go on working in the workbook.
 */
import { ExcelBatches } from '../../../../addin/adapters/excel-host/excel-batch';
import { holds, standingOf, type CellChange } from '../../../../addin/adapters/excel-host/excel-journal';
import { ExcelWorkbook } from '../../../../addin/adapters/excel-host/excel-workbook';
import type { WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import type { WorkbookWrite } from '../../../../addin/domain/results-to-sheet/write-plan';
import { stateOf } from '../../../office-host/host-state';
import type { Fault } from '../../../office-host/office-host';
import { at, impatient, openDescribed, refusalOf, type OpenInExcel } from './open-in-excel';

const week: WorkbookDescription = {
  sheets: { Plan: { B5: 0, B6: 0, B8: '=B5+2*B6', D5: 'old' } },
  names: { 'Week.Decision': 'Plan!$B$5:$B$6' },
};

const value = (text: string, written: number | string | null, sheet = 'Plan'): WorkbookWrite => ({
  kind: 'value',
  cell: at(sheet, text),
  value: written,
});

const plan: WorkbookWrite[] = [
  { kind: 'addSheet', name: 'Week results' },
  value('A1', 'Wall tile', 'Week results'),
  value('B5', 1),
  value('B6', 3),
  value('D5', null),
  { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$F$5:$F$6' },
];

function open(): OpenInExcel {
  const { host } = openDescribed(week);
  return { host, workbook: new ExcelWorkbook(new ExcelBatches(impatient)) };
}

const lasting: Fault = { batch: 2, code: 'ServiceNotAvailable', when: 'after', isLasting: true };

/** A write that was carried out whole, whose answer was lost, as was every later one. */
async function brokenOff(fault: Fault = lasting): Promise<OpenInExcel> {
  const opened = open();
  opened.host.expectFault(fault);
  expect((await refusalOf(opened.workbook.apply(plan))).code).toBe('half-written');
  opened.host.clearFault();
  return opened;
}

it('AD-106 the cells that may be between are listed, and nothing else is written until the journal has ended', async () => {
  const { host, workbook } = await brokenOff();
  expect(workbook.unfinished()).toEqual([
    { sheet: 'Plan', top: 4, left: 1, bottom: 5, right: 1 },
    { sheet: 'Plan', top: 4, left: 3, bottom: 4, right: 3 },
    { sheet: 'Week results', top: 0, left: 0, bottom: 0, right: 0 },
  ]);
  const before = stateOf(host.workbook);
  const refusal = await refusalOf(workbook.apply([value('H1', 1)]));
  expect(refusal).toMatchObject({ code: 'half-written', ranges: workbook.unfinished() });
  expect(stateOf(host.workbook)).toEqual(before);
  await workbook.putBack();
  await workbook.apply([value('H1', 1)]);
  expect(host.value('Plan!H1')).toBe(1);
});

it('AD-106 putting back leaves alone what somebody has changed since', async () => {
  const { host, workbook } = await brokenOff();
  host.type('Plan!B6', 50);
  await workbook.putBack();
  expect([host.value('Plan!B5'), host.value('Plan!B6'), host.value('Plan!D5')]).toEqual([0, 50, 'old']);
  expect(workbook.unfinished()).toEqual([]);
});

it('AD-106 finishing leaves alone what somebody has changed since', async () => {
  const { host, workbook } = await brokenOff({ ...lasting, when: 'before' });
  host.type('Plan!B6', 50);
  await workbook.finish();
  expect([host.value('Plan!B5'), host.value('Plan!B6'), host.value('Plan!D5')]).toEqual([1, 50, null]);
  expect(host.value('Week results!A1')).toBe('Wall tile');
});

it('a sheet that was added stays where somebody has put something on it', async () => {
  const { host, workbook } = await brokenOff();
  host.type('Week results!C3', 'mine');
  await workbook.putBack();
  expect(host.workbook.sheets.map(({ name }) => name)).toEqual(['Plan', 'Week results']);
  expect([host.value('Week results!A1'), host.value('Week results!C3')]).toEqual([null, 'mine']);
});

it('a sheet that somebody has deleted meanwhile is no obstacle', async () => {
  const { host, workbook } = await brokenOff();
  host.workbook.deleteSheet(host.workbook.sheetNamed('Week results')!);
  await workbook.putBack();
  expect(host.value('Plan!B5')).toBe(0);
  expect(host.workbook.sheets).toHaveLength(1);
});

it('a name that somebody has pointed elsewhere meanwhile stays', async () => {
  const { host, workbook } = await brokenOff();
  host.workbook.findName('Week.Optimum', undefined)!.formula = 'Plan!$J$1';
  await workbook.putBack();
  expect(host.workbook.findName('Week.Optimum', undefined)?.formula).toBe('Plan!$J$1');
});

it('names alone are a journal too', async () => {
  const { host, workbook } = open();
  const names: WorkbookWrite[] = [
    { kind: 'name', name: 'Month.Decision', scope: null, formula: 'Plan!$B$5:$B$6' },
    { kind: 'removeName', name: 'Week.Decision', scope: null },
  ];
  const before = stateOf(host.workbook);
  host.expectFault({ batch: 2, code: 'GeneralException', when: 'midway', isLasting: true });
  await refusalOf(workbook.apply(names));
  host.clearFault();
  expect(workbook.unfinished()).toContainEqual({ sheet: 'Plan', top: 4, left: 1, bottom: 5, right: 1 });
  await workbook.putBack();
  expect(stateOf(host.workbook)).toEqual(before);
});

it('a user who types between looking and writing loses nothing: the write is taken back around it', async () => {
  const { host, workbook } = open();
  host.resetTraffic();
  host.beforeBatch = (number) => {
    // After the write broke off, before it is looked at again.
    if (number === 3) host.type('Plan!B6', 50);
  };
  host.expectFault({ batch: 2, code: 'GeneralException', when: 'after', isLasting: false });
  const refusal = await refusalOf(workbook.apply(plan));
  expect(refusal).toMatchObject({ code: 'host-fault', canRetry: true });
  expect([host.value('Plan!B5'), host.value('Plan!B6'), host.value('Plan!D5')]).toEqual([0, 50, 'old']);
});

it('a batch that is carried out after nobody waits for it any more is found out', async () => {
  const { host, workbook } = open();
  host.expectFault({ batch: 2, code: 'no-answer', when: 'after', isLasting: true });
  const refusal = await refusalOf(workbook.apply(plan));
  expect(refusal.code).toBe('half-written');
  expect(refusal.message).toContain('Excel has not answered for 60 seconds');
  host.clearFault();
  await workbook.finish();
  expect([host.value('Plan!B5'), host.value('Plan!B8')]).toEqual([1, 7]);
});

it('reads and writes wait for one another', async () => {
  const { workbook } = open();
  const read = workbook.read();
  const write = workbook.apply([value('B5', 9)]);
  const [before, , after] = await Promise.all([read, write, workbook.read()]);
  expect([before, after].map(({ sheets }) => sheets[0].cell(4, 1)?.value)).toEqual([0, 9]);
});

it('no reference is left in Excel, whatever a write came to', async () => {
  for (const when of ['before', 'midway', 'after'] as const) {
    const { host, workbook } = await brokenOff({ ...lasting, when });
    await workbook.putBack();
    await new Promise((resolve) => setImmediate(resolve));
    expect(host.references.size).toBe(0);
  }
});

describe('where a cell stands', () => {
  const change = (before: number | string | null, after: number | string | null): CellChange => ({
    cell: at('Plan', 'A1'),
    before: { value: before, formula: undefined },
    after: { value: after, formula: undefined },
    formatBefore: 'General',
    formatAfter: 'General',
    wrapsBefore: undefined,
    wrapsAfter: undefined,
  });
  const present = (held: number | string | null, formula?: string) => ({ value: held, formula });

  it('is told by what it holds', () => {
    expect(standingOf(change(1, 2), present(1))).toBe('back');
    expect(standingOf(change(1, 2), present(2))).toBe('forward');
    expect(standingOf(change(1, 2), present(3))).toBe('other');
    expect(standingOf(change(1, 1), present(1))).toBe('both');
    expect(standingOf(change(1, 2), present(2, 'A2'))).toBe('other');
    expect(standingOf(change(null, 'x'), present(''))).toBe('back');
  });

  it('allows a number the last bits that Excel may lose', () => {
    expect(holds(present(0.1 + 0.2), present(0.3))).toBe(true);
    expect(holds(present(0.3 + 1e-12), present(0.3))).toBe(false);
  });
});
