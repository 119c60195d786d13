/**
 * The production bundle in Chromium, inside the far end of Excel on the web: opened on a workbook, used by keyboard,
 * judged by axe-core.
 */
import { existsSync, mkdirSync } from 'node:fs';
import path from 'node:path';
import axe, { type AxeResults } from 'axe-core';
import type { Browser, Frame, Page } from 'playwright-core';
import type { MemoryWorkbook } from '../../addin/adapters/memory/memory-workbook';
import { HostWorkbook } from '../office-host/host-workbook';
import { OfficeHost, type OfficeHostOptions } from '../office-host/office-host';
import { launchBrowser, openPaneInExcel, type PaneInExcel } from '../office-host/browser/browser-host';
import { checkoutFolder, pathOfNeed } from '../support/needs';

export const bundleFolder = path.join(checkoutFolder, 'dist', 'pane');
const shotsFolder = path.join(checkoutFolder, 'tests', 'browser', 'shots');

export type Scheme = 'light' | 'dark' | 'high-contrast';

export interface OpenOptions extends OfficeHostOptions {
  readonly width?: number;
  readonly height?: number;
  readonly scheme?: Scheme;
  /** `?start=solve`: as the ribbon's buttons open the page. */
  readonly query?: string;
}

export interface OpenedPane extends PaneInExcel {
  readonly host: OfficeHost;
  readonly keyboard: PaneKeyboard;
}

/** One browser for a file of tests; a page of its own for each. */
export class PaneBrowser {
  private browser: Browser | undefined;

  async open(workbook: MemoryWorkbook, options: OpenOptions = {}): Promise<OpenedPane> {
    if (!existsSync(path.join(bundleFolder, 'pane.html'))) {
      throw new Error('There is no bundle to test: run npm run build first.');
    }
    this.browser ??= await launchBrowser(pathOfNeed('browser'));
    const { width = 350, height = 700, scheme = 'light' } = options;
    const context = await this.browser.newContext({
      viewport: { width, height },
      colorScheme: scheme === 'light' ? 'light' : 'dark',
      forcedColors: scheme === 'high-contrast' ? 'active' : 'none',
      reducedMotion: 'reduce',
    });
    const page = await context.newPage();
    await page.addInitScript(watchLongTasks);
    const host = new OfficeHost(HostWorkbook.of(workbook.snapshot()), options);
    const address = `/pane.html${options.query ?? ''}`;
    const opened = await openPaneInExcel(page, host, bundleFolder, address, { width, height });
    return { ...opened, host, keyboard: new PaneKeyboard(page, opened.pane) };
  }

  async close(): Promise<void> {
    await this.browser?.close();
  }
}

interface TaskWindow {
  longestTask?: number;
}

function watchLongTasks(): void {
  const watched = window as TaskWindow;
  watched.longestTask = 0;
  new PerformanceObserver((list) => {
    for (const { duration, name } of list.getEntries()) {
      // Frames of one page share a thread: what the page that plays Excel does is not the pane's.
      if (name === 'self') watched.longestTask = Math.max(watched.longestTask ?? 0, duration);
    }
  }).observe({ entryTypes: ['longtask'] });
}

/** Milliseconds of the longest task of the pane's thread since this was last asked. */
export function longestTask(pane: Frame): Promise<number> {
  return pane.evaluate(() => {
    const watched = window as TaskWindow;
    const longest = watched.longestTask ?? 0;
    watched.longestTask = 0;
    return longest;
  });
}

/** How many Tab presses may lead from one control to another before it counts as out of reach. */
const mostTabs = 80;

/** The pane used without a pointer. */
export class PaneKeyboard {
  constructor(
    private readonly page: Page,
    private readonly pane: Frame,
  ) {}

  /** Presses Tab until the control of this role and name has focus. */
  async tabTo(role: 'button' | 'textbox' | 'combobox' | 'grid' | 'checkbox', name: string): Promise<void> {
    const wanted = this.pane.getByRole(role, { name, exact: role !== 'grid' }).first();
    await wanted.waitFor();
    for (let presses = 0; presses <= mostTabs; presses++) {
      if (await wanted.evaluate((element) => element === document.activeElement)) {
        return;
      }
      const before = await this.pane.evaluateHandle(() => document.activeElement);
      await this.page.keyboard.press('Tab');
      if (await before.evaluate((element) => element === document.activeElement)) {
        await this.enter();
      }
    }
    throw new Error(`${role} “${name}” cannot be reached by Tab.`);
  }

  /**
   * Excel on the web moves the focus itself: the library hands Tab at the pane's end to the sheet, and the sheet's key
   * (F6) gives it to the pane's first control.
   */
  private async enter(): Promise<void> {
    await this.page.locator('iframe').focus();
    await this.pane.evaluate(() => document.querySelector<HTMLElement>('select, button, input')?.focus());
  }

  async press(name: string): Promise<void> {
    await this.tabTo('button', name);
    await this.page.keyboard.press('Enter');
  }

  async type(text: string): Promise<void> {
    await this.page.keyboard.press('Control+A');
    await this.page.keyboard.type(text);
  }

  keys(...keys: readonly string[]): Promise<void> {
    return keys.reduce((before, key) => before.then(() => this.page.keyboard.press(key)), Promise.resolve());
  }

  /** What has the focus, as `button Solve`. */
  focused(): Promise<string> {
    return this.pane.evaluate(() => {
      const element = document.activeElement;
      return `${element?.tagName.toLowerCase() ?? ''} ${element?.textContent ?? ''}`.trim();
    });
  }
}

/** Violations of WCAG 2.2 AA and of axe's best practices, in short. */
export async function violationsOf(pane: Frame): Promise<string[]> {
  await pane.evaluate(axe.source);
  const { violations } = await pane.evaluate(() =>
    (window as unknown as { axe: { run(): Promise<AxeResults> } }).axe.run(),
  );
  return violations.map(
    ({ id, help, nodes }) => `${id}: ${help} (${nodes.map(({ target }) => target.join(' ')).join(', ')})`,
  );
}

/** Makes the pane's frame as wide as this, as a planner does by pulling its edge. */
export async function resizePane({ page, pane }: OpenedPane, width: number, height: number): Promise<void> {
  await page.setViewportSize({ width, height });
  await page.locator('iframe').evaluate(
    (frame, size) => {
      frame.style.width = `${size.width}px`;
      frame.style.height = `${size.height}px`;
    },
    { width, height },
  );
  await pane.waitForFunction((wanted) => window.innerWidth === wanted, width);
}

/** Kept for people to look at, when PLANROW_SHOTS=1 asks for new ones. */
export async function takeShot(page: Page, name: string): Promise<void> {
  if (process.env.PLANROW_SHOTS === '1') {
    mkdirSync(shotsFolder, { recursive: true });
    await page.screenshot({ path: path.join(shotsFolder, `${name}.png`) });
  }
}

/** Presses Solve on the large plan of pane-workbooks.ts and waits until its results are written. */
export async function solveLargePlan({
  pane,
  host,
  keyboard,
}: Pick<OpenedPane, 'pane' | 'host' | 'keyboard'>): Promise<void> {
  await keyboard.tabTo('button', 'Solve');
  host.resetTraffic();
  await keyboard.keys('Enter');
  // The last round trip writes; Put back is offered again once it is answered.
  while (host.traffic.roundTrips < 6) {
    await pane.evaluate(() => new Promise((resolve) => requestAnimationFrame(resolve)));
  }
  await pane.getByRole('button', { name: 'Put back' }).waitFor({ timeout: 50_000 });
}
