/**
 * What the pane needs of Excel beside the workbook: the selection, hints of changes, filters, the theme.
 */
import { connectExcel } from '../../../../addin/adapters/excel-host/excel-spreadsheet-host';
import type { WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import type { SpreadsheetHost } from '../../../../addin/ports/spreadsheet-host';
import type { OfficeHost } from '../../../office-host/office-host';
import { at, openDescribed, refusalOf } from './open-in-excel';

const week: WorkbookDescription = {
  sheets: { Plan: { B5: 0, B6: 0, B8: '=B5+2*B6' }, 'Cost data': { A1: 3 }, Kept: { A1: 1 } },
  hiddenSheets: ['Kept'],
};

function connect(): { host: OfficeHost; excel: SpreadsheetHost } {
  const { host } = openDescribed(week);
  return { host, excel: connectExcel() };
}

/** Events are handed on in turns of their own. */
const eventsAreTold = (): Promise<void> => new Promise((resolve) => setImmediate(resolve));

describe('the selection', () => {
  it('is told as rectangles of the sheet in front', async () => {
    const { host, excel } = connect();
    host.select(
      'Cost data',
      { top: 0, left: 0, bottom: 0, right: 2 },
      { top: 4, left: 1, bottom: 9, right: 1 },
    );
    expect(await excel.selection.selected()).toEqual([
      { sheet: 'Cost data', top: 0, left: 0, bottom: 0, right: 2 },
      { sheet: 'Cost data', top: 4, left: 1, bottom: 9, right: 1 },
    ]);
    expect(await excel.selection.activeSheet()).toBe('Cost data');
  });

  it('is nothing where a picture is selected', async () => {
    const { host, excel } = connect();
    host.expectFault({ batch: 1, code: 'InvalidSelection', when: 'midway', isLasting: false });
    expect(await excel.selection.selected()).toEqual([]);
  });

  it('can be moved to cells of another sheet; of several rectangles to the first, with the sets of the library', async () => {
    const { host, excel } = connect();
    const one = { sheet: 'Cost data', top: 0, left: 0, bottom: 1, right: 1 };
    await excel.selection.select([one]);
    expect(host.workbook.selection.sheet.name).toBe('Cost data');
    expect(host.workbook.selection.ranges).toMatchObject([{ top: 0, left: 0, bottom: 1, right: 1 }]);
    const more = [
      { sheet: 'Plan', top: 4, left: 1, bottom: 5, right: 1 },
      { sheet: 'Plan', top: 7, left: 1, bottom: 7, right: 1 },
    ];
    await excel.selection.select(more);
    expect(host.workbook.selection.ranges).toEqual([more[0]]);
    await excel.selection.select([]);
    expect(host.workbook.selection.ranges).toEqual([more[0]]);
  });

  it('cannot be moved to a hidden or a deleted sheet, and says so', async () => {
    const { excel } = connect();
    const on = (sheet: string) => [{ sheet, top: 0, left: 0, bottom: 0, right: 0 }];
    expect((await refusalOf(excel.selection.select(on('Kept')))).message).toContain(
      'Kept!A1 is on a hidden sheet',
    );
    expect((await refusalOf(excel.selection.select(on('Gone')))).message).toContain('no sheet named Gone');
  });

  it('is watched until it is no longer', async () => {
    const { host, excel } = connect();
    let count = 0;
    const stop = await excel.selection.watch(() => count++);
    host.select('Plan', { top: 4, left: 1, bottom: 5, right: 1 });
    await eventsAreTold();
    expect(count).toBe(1);
    // Another sheet comes to the front, and something on it is selected.
    host.select('Cost data', { top: 0, left: 0, bottom: 0, right: 0 });
    await eventsAreTold();
    expect(count).toBe(3);
    stop();
    stop();
    await eventsAreTold();
    expect([...host.registeredEvents]).toEqual([]);
    host.select('Plan', { top: 0, left: 0, bottom: 0, right: 0 });
    await eventsAreTold();
    expect(count).toBe(3);
  });
});

describe('changes', () => {
  it('by others are told, our own are not', async () => {
    const { host, excel } = connect();
    let count = 0;
    const stop = await excel.changes.watch(() => count++);
    host.type('Plan!B5', 2);
    await eventsAreTold();
    expect(count).toBe(1);
    await excel.workbook.apply([{ kind: 'value', cell: at('Plan', 'B6'), value: 3 }]);
    await eventsAreTold();
    expect(count).toBe(1);
    host.addSheet('More');
    await eventsAreTold();
    expect(count).toBe(2);
    stop();
    await eventsAreTold();
    host.type('Plan!B5', 4);
    await eventsAreTold();
    expect(count).toBe(2);
  });
});

it('filters of sheets that are not filtered, or not there, are cleared without harm', async () => {
  const { excel } = connect();
  await excel.filters.clear(['Plan', 'Gone']);
  await excel.filters.clear([]);
});

it('the journal is that of the workbook', async () => {
  const { host, excel } = connect();
  host.expectFault({ batch: 2, code: 'GeneralException', when: 'midway', isLasting: true });
  await refusalOf(excel.workbook.apply([{ kind: 'value', cell: at('Plan', 'B5'), value: 3 }]));
  host.clearFault();
  expect(excel.journal.unfinished()).toEqual([{ sheet: 'Plan', top: 4, left: 1, bottom: 4, right: 1 }]);
  await excel.journal.finish();
  expect(host.value('Plan!B5')).toBe(3);
});

it('the theme is dark, light or unknown', () => {
  const { host, excel } = connect();
  const themes: [unknown, boolean | null][] = [
    [undefined, null],
    [null, null],
    [{ bodyBackgroundColor: '#262626' }, true],
    [{ bodyBackgroundColor: '#FFFFFF' }, false],
    [{ bodyBackgroundColor: '#FFFFFF', isDarkTheme: true }, true],
  ];
  for (const [theme, isDark] of themes) {
    host.officeTheme = theme;
    expect([theme, excel.isDark()]).toEqual([theme, isDark]);
  }
});
