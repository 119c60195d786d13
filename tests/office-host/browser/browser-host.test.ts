/**
 * The genuine loader and library in Chromium, spoken to over the frame protocol of Excel on the web.
 */
import type { Browser } from 'playwright-core';
import { MemoryWorkbook } from '../../../addin/adapters/memory/memory-workbook';
import { itNeeds, pathOfNeed } from '../../support/needs';
import { HostWorkbook } from '../host-workbook';
import { OfficeHost } from '../office-host';
import { launchBrowser, openPaneInExcel, type PageFile } from './browser-host';

const script = `
  Office.onReady(({ host, platform }) => { window.ready = host + ' ' + platform; });
  Office.actions.associate('SOLVE', (event) => { window.pressed = event.source.id; event.completed(); });
  window.readAndWrite = () => Excel.run(async (context) => {
    const sheet = context.workbook.worksheets.getItem('Plan');
    sheet.getRange('A1').values = [[20]];
    const sum = sheet.getRange('C1').load('values');
    context.workbook.worksheets.onChanged.add(async (event) => { window.changed = event.address; });
    await context.sync();
    return sum.values[0][0];
  });
  window.codeOf = () => Excel.run(async (context) => {
    context.workbook.worksheets.getItem('Plan').load('name');
    await context.sync();
  }).then(() => 'none', (error) => error.code);
`;

const files: Readonly<Record<string, PageFile>> = {
  '/pane.html': {
    contentType: 'text/html',
    body: `<!doctype html><title>Pane</title>
      <script src="https://appsforoffice.microsoft.com/lib/1/hosted/office.js"></script>
      <script src="pane.js"></script><p>Pane</p>`,
  },
  '/pane.js': { contentType: 'text/javascript', body: script },
};

interface PaneWindow {
  ready: string;
  pressed?: string;
  changed?: string;
  readAndWrite(): Promise<number>;
  codeOf(): Promise<string>;
}

describe('the far end in a browser', () => {
  let browser: Browser | undefined;

  afterAll(() => browser?.close());

  itNeeds(
    'browser',
    'runs the library, its events, its commands and its errors',
    async () => {
      browser = await launchBrowser(pathOfNeed('browser'));
      const page = await browser.newPage();
      const book = MemoryWorkbook.of({ sheets: { Plan: { A1: [[1, 2]], C1: '=SUM(A1:B1)' } } });
      const host = new OfficeHost(HostWorkbook.of(book.snapshot()));
      const { pane, refused, faults, invokeCommand } = await openPaneInExcel(
        page,
        host,
        (asked) => files[asked],
        '/pane.html',
      );
      await pane.waitForFunction(() => (window as unknown as PaneWindow).ready !== undefined);
      expect(await pane.evaluate(() => (window as unknown as PaneWindow).ready)).toBe('Excel OfficeOnline');
      expect(await pane.evaluate(() => (window as unknown as PaneWindow).readAndWrite())).toBe(22);
      host.type('Plan!B1', 5);
      await pane.waitForFunction(() => (window as unknown as PaneWindow).changed === 'B1');
      await invokeCommand('solve-button', 'SOLVE');
      await pane.waitForFunction(() => (window as unknown as PaneWindow).pressed === 'solve-button');
      host.isEditingCell = true;
      expect(await pane.evaluate(() => (window as unknown as PaneWindow).codeOf())).toBe(
        'InvalidOperationInCellEditMode',
      );
      expect(faults).toEqual([]);
      expect(refused).toEqual([]);
    },
    60_000,
  );
});
