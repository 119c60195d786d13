/**
 * How the pane looks and is heard: axe-core on each view, in light, dark and high contrast, at 320, 380 and 450 pixels;
 * nothing runs off the side. With PLANROW_SHOTS=1 the pictures in tests/browser/shots are taken anew, to be looked at.
 */
import type { Frame } from 'playwright-core';
import { describeNeeds } from '../support/needs';
import {
  PaneBrowser,
  resizePane,
  takeShot,
  violationsOf,
  type OpenedPane,
  type Scheme,
} from './pane-in-browser';
import { paneWorkbooks } from './pane-workbooks';

const browser = new PaneBrowser();
afterAll(() => browser.close());

const press = (pane: Frame, name: string): Promise<void> =>
  pane.getByRole('button', { name, exact: true }).click();

/** Pixels by which the page is wider than its window. */
const overhang = (pane: Frame): Promise<number> =>
  pane.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);

/** Each view that a planner sees, and how it is brought about. */
const views: Readonly<
  Record<string, { workbook: keyof typeof paneWorkbooks; show: (opened: OpenedPane) => Promise<void> }>
> = {
  'no-plan': {
    workbook: 'unstated',
    show: async ({ pane }) => {
      await press(pane, 'New plan');
      await pane.getByRole('textbox', { name: 'Name of the new plan' }).fill('A 1');
      await press(pane, 'Start plan');
      await pane.getByText(/^Use letters, digits/).waitFor();
    },
  },
  statement: {
    workbook: 'tiles',
    show: async ({ pane, host }) => {
      await pane.getByText('3 decision cells, Plan!B2:B4').waitFor();
      host.select('Plan', { top: 1, left: 1, bottom: 2, right: 1 });
      await press(pane, 'Use selection for Decision cells');
      await pane.getByText('Then: Plan!$B$2:$B$3').first().waitFor();
    },
  },
  issues: {
    workbook: 'faulty',
    show: async ({ pane }) => {
      await press(pane, 'Check');
      await pane.getByRole('heading', { name: /^What to mend/ }).waitFor();
    },
  },
  result: {
    workbook: 'tiles',
    show: async ({ pane }) => {
      await press(pane, 'Solve');
      await pane.getByRole('heading', { name: 'Where results stand' }).waitFor();
    },
  },
  filtered: {
    workbook: 'filtered',
    show: async ({ pane }) => {
      await press(pane, 'Solve');
      await pane.getByRole('button', { name: 'Clear the filter and write' }).waitFor();
    },
  },
};

const schemes: readonly Scheme[] = ['light', 'dark', 'high-contrast'];
const widths = [320, 380, 450];
/** One picture a view and scheme is kept, each scheme at a width of its own. */
const shotWidths: Readonly<Record<Scheme, number>> = { light: 380, dark: 450, 'high-contrast': 320 };
const cases = Object.keys(views).flatMap((view) => schemes.map((scheme) => [view, scheme] as const));
const height = 760;

describeNeeds('browser', 'the pane’s looks', () => {
  jest.setTimeout(60_000);

  it.each(cases)(
    '%s, %s: axe finds nothing and nothing runs off the side at any width',
    async (view, scheme) => {
      const { workbook, show } = views[view];
      const opened = await browser.open(paneWorkbooks[workbook](), { scheme, width: widths[0], height });
      await show(opened);
      for (const width of widths) {
        await resizePane(opened, width, height);
        expect({ width, violations: await violationsOf(opened.pane) }).toEqual({ width, violations: [] });
        expect(await overhang(opened.pane)).toBeLessThanOrEqual(0);
        if (shotWidths[scheme] === width) {
          await takeShot(opened.page, `${view}-${scheme}-${width}`);
        }
      }
      if (view === 'result') {
        await resizePane(opened, shotWidths[scheme], height);
        await opened.pane.locator('main').evaluate((main) => main.scrollTo(0, 420));
        await takeShot(opened.page, `${view}-rows-${scheme}-${shotWidths[scheme]}`);
      }
      await opened.page.context().close();
    },
  );
});
