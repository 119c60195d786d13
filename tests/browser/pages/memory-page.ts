/**
 * The pane on a workbook in plain memory: the views, the worker and the policy of the real page, without a
 * spreadsheet program. The page's address says which workbook: `?workbook=tiles`.
 */
import { browserPlanEngine } from '../../../addin/adapters/solver-thread/browser-plan-engine';
import { MemoryHost } from '../../../addin/adapters/memory/memory-host';
import { mountPane } from '../../../addin/pane/mount-pane';
import { startCommandOf } from '../../../addin/pane/start-command';
import { formatCellRange, type CellRange } from '../../../addin/domain/sheet/cell-range';
import { storedValue } from '../../../addin/domain/sheet/sheet-snapshot';
import { pageWorkbooks } from './page-workbooks';

declare global {
  interface Window {
    /** What a test may do from outside: the part of the spreadsheet program. */
    sheet: {
      select(...ranges: CellRange[]): Promise<void>;
      selected(): Promise<string>;
      value(sheet: string, row: number, column: number): unknown;
      type(sheet: string, row: number, column: number, value: number | string): Promise<void>;
      names(): Record<string, string>;
    };
    longestTask: number;
  }
}

const query = new URLSearchParams(location.search);
const workbook = pageWorkbooks[query.get('workbook') ?? 'tiles']();
const host = new MemoryHost(workbook);

window.longestTask = 0;
new PerformanceObserver((list) => {
  for (const { duration } of list.getEntries()) {
    window.longestTask = Math.max(window.longestTask, duration);
  }
}).observe({ entryTypes: ['longtask'] });

window.sheet = {
  select: (...ranges) => host.select(ranges),
  selected: async () => (await host.selection.selected()).map(formatCellRange).join(','),
  value: (sheet, row, column) => {
    const value = storedValue(workbook.snapshot(), { sheet, row, column });
    return typeof value === 'object' ? null : value;
  },
  type: (sheet, row, column, value) =>
    host.changeByOthers([{ kind: 'value', cell: { sheet, row, column }, value }]),
  names: () => Object.fromEntries(workbook.snapshot().names.map(({ name, formula }) => [name, formula])),
};

mountPane(
  document.getElementById('pane')!,
  {
    host,
    engine: browserPlanEngine(),
    today: () => 46_000,
    repeat: (milliseconds, action) => {
      const timer = setInterval(action, milliseconds);
      return () => clearInterval(timer);
    },
  },
  startCommandOf(location.search),
);
