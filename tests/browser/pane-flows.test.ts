/**
 * What a planner does in the pane, by keyboard alone, on the production bundle inside genuine Office.js. The small
 * plan's best (870) is worked out by hand in tests/addin/pane/pane-program.test.ts.
 */
import { formatCellRange } from '../../addin/domain/sheet/cell-range';
import { describeNeeds } from '../support/needs';
import { PaneBrowser, solveLargePlan, type OpenedPane } from './pane-in-browser';
import { paneWorkbooks } from './pane-workbooks';

const browser = new PaneBrowser();
afterAll(() => browser.close());

const cells = (top: number, left: number, bottom = top, right = left) => ({ top, left, bottom, right });
const decisions = ['Plan!B2', 'Plan!B3', 'Plan!B4'];

const opened: OpenedPane[] = [];
const open: PaneBrowser['open'] = async (...how) => {
  const pane = await browser.open(...how);
  opened.push(pane);
  return pane;
};

/** Waits until the far end shows what is expected: it hears of a press when its batch arrives. */
async function eventually<T>(pane: OpenedPane, seen: () => T, expected: T): Promise<void> {
  for (let turns = 0; turns < 200 && JSON.stringify(seen()) !== JSON.stringify(expected); turns++) {
    // A round trip to the page: events of this process and of the page get their turn.
    await pane.pane.evaluate(() => new Promise((resolve) => requestAnimationFrame(resolve)));
  }
  expect(seen()).toEqual(expected);
}

const optimal = 'Optimal: no other plan within these limits does better.';

describeNeeds('browser', 'the pane by keyboard alone', () => {
  jest.setTimeout(120_000);

  // Nothing asked for from elsewhere, no error of the page, no range left behind in the host.
  afterEach(async () => {
    for (const pane of opened.splice(0)) {
      await eventually(pane, () => [...pane.host.references.keys()], []);
      expect({ refused: pane.refused, faults: pane.faults }).toEqual({ refused: [], faults: [] });
      await pane.page.context().close();
    }
  });

  it('states a plan from scratch, solves it, shows cells from the result, and puts back', async () => {
    const at = await open(paneWorkbooks.unstated());
    const { pane, host, keyboard } = at;
    await keyboard.press('New plan');
    await keyboard.type('Mix');
    await keyboard.keys('Enter');
    const steps = [
      ['Decision cells', cells(1, 1, 3, 1), '3 decision cells, Plan!B2:B4'],
      ['Objective', cells(10, 1), '1 objective cell, Plan!B11'],
    ] as const;
    for (const [label, range, read] of steps) {
      host.select('Plan', range);
      await keyboard.press(`Use selection for ${label}`);
      await pane.getByText(read).waitFor();
    }
    await keyboard.press('Add rows in one block');
    host.select('Plan', cells(6, 1, 8, 3));
    await keyboard.press('Use selection for Constraint rows');
    await pane.getByText('9 cells, Plan!B7:D9').waitFor();
    await keyboard.press('Add upper bounds');
    await keyboard.tabTo('textbox', 'Upper bounds (the most that is allowed)');
    await keyboard.type('E2:E4');
    await keyboard.keys('Enter');
    await pane.getByText('3 upper bounds, Plan!E2:E4').waitFor();

    await keyboard.press('Solve');
    await pane.getByText(optimal).first().waitFor();
    // Nobody was moved away from the button that was pressed.
    expect(await keyboard.focused()).toBe('button Solve');
    expect([...decisions, 'Plan!B11'].map((cell) => host.value(cell))).toEqual([60, 0, 40, 870]);

    await keyboard.tabTo('grid', 'Constraint rows');
    await keyboard.keys('ArrowDown', 'Enter');
    await eventually(at, () => host.workbook.selection.ranges.map(formatCellRange), ['Plan!C8']);

    await keyboard.press('Put back');
    await pane.getByText('hold again what they held before').first().waitFor();
    expect(decisions.map((cell) => host.value(cell))).toEqual([10, null, null]);
  });

  it('lists issues that select their cell, and picks a relation from a list', async () => {
    const at = await open(paneWorkbooks.faulty());
    const { pane, host, keyboard } = at;
    await keyboard.press('Check');
    await pane.getByRole('heading', { name: 'What to mend: 3 errors' }).waitFor();
    await keyboard.press('Show Plan!C8');
    await eventually(at, () => host.workbook.selection.ranges.map(formatCellRange), ['Plan!C8']);
    await keyboard.tabTo('combobox', 'Relation for Plan!C7');
    await keyboard.keys('ArrowDown');
    await pane.getByRole('heading', { name: 'What to mend: 2 errors' }).waitFor();
    expect(host.value('Plan!C7')).toBe('<=');
    await keyboard.tabTo('combobox', 'Relation for Plan!C8');
    await keyboard.keys('ArrowDown');
    host.type('Plan!D9', 15);
    await keyboard.press('Check');
    await pane
      .getByText('Nothing is wrong: 3 decision cells and 3 constraint rows were read.')
      .first()
      .waitFor();
  });

  it('shows old and new cells before a part is pointed elsewhere', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.tiles());
    await pane.getByText('3 decision cells, Plan!B2:B4').waitFor();
    host.select('Plan', cells(1, 1, 2, 1));
    await keyboard.press('Use selection for Decision cells');
    await pane.getByText('Now: Plan!$B$2:$B$4').first().waitFor();
    await pane.getByText('Then: Plan!$B$2:$B$3').first().waitFor();
    await keyboard.press('Point there');
    await pane.getByText('2 decision cells, Plan!B2:B3').waitFor();
  });

  it('duplicates, renames and deletes a plan', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.tiles());
    await keyboard.press('Duplicate');
    await keyboard.keys('Enter');
    await pane
      .locator('select')
      .first()
      .and(pane.getByRole('combobox', { name: 'Plan' }))
      .waitFor();
    await pane.getByRole('option', { name: 'Week2' }).waitFor({ state: 'attached' });
    await keyboard.press('Rename');
    await keyboard.type('Rush');
    await keyboard.keys('Enter');
    await pane.getByRole('option', { name: 'Rush' }).waitFor({ state: 'attached' });
    await keyboard.press('Delete');
    await pane.getByText('Delete the plan “Rush”?').waitFor();
    await keyboard.keys('Escape');
    await keyboard.press('Delete');
    await keyboard.keys('Tab', 'Enter');
    await pane.getByRole('option', { name: 'Rush' }).waitFor({ state: 'detached' });
    expect(host.workbook.snapshot().names.map(({ name }) => name)).toHaveLength(6);
  });

  it('keeps a result that a filter forbids to write, and writes it once the filter is cleared', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.filtered());
    await keyboard.press('Solve');
    await pane.getByRole('button', { name: 'Clear the filter and write' }).waitFor();
    await pane.getByText('870').first().waitFor();
    expect(host.value('Plan!B2')).toBe(10);
    await keyboard.press('Clear the filter and write');
    await pane.getByRole('heading', { name: 'Where results stand' }).waitFor();
    expect(decisions.map((cell) => host.value(cell))).toEqual([60, 0, 40]);
  });

  it('says that a sheet is protected, and keeps the result', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.protected());
    await keyboard.press('Solve');
    await pane
      .getByText(/protected/)
      .first()
      .waitFor();
    await pane.getByText('Nothing has been written into the workbook.').waitFor();
    expect(host.value('Plan!B2')).toBe(10);
  });

  it('waits for a cell that is being edited, and goes on with Try again', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.tiles());
    await pane.getByText('3 decision cells, Plan!B2:B4').waitFor();
    host.isEditingCell = true;
    await keyboard.press('Solve');
    await pane.getByRole('button', { name: 'Try again' }).waitFor();
    host.isEditingCell = false;
    await keyboard.press('Try again');
    await pane.getByText(optimal).first().waitFor();
  });

  it('tells that no plan keeps every limit', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.infeasible());
    await keyboard.press('Solve');
    await pane.getByText('Infeasible: no plan keeps every limit at once.').first().waitFor();
    expect(host.value('Plan!B2')).toBe(10);
  });

  it('solves at once where the ribbon’s Solve opened it', async () => {
    const { pane, host } = await open(paneWorkbooks.tiles(), { query: '?start=solve' });
    await pane.getByText(optimal).first().waitFor();
    expect(host.value('Plan!B2')).toBe(60);
  });

  it('says when the workbook has changed since', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.tiles());
    await keyboard.press('Solve');
    await pane.getByText(optimal).first().waitFor();
    const outdated = pane.getByText('The workbook has changed since this plan was found.');
    expect(await outdated.count()).toBe(0);
    // Right after a write of its own the pane does not listen: somebody types on.
    for (let typed = 90; (await outdated.count()) === 0; typed++) {
      host.type('Plan!D8', typed);
      await pane.evaluate(() => new Promise((resolve) => requestAnimationFrame(resolve)));
    }
  });

  it('names what comes of a solve in its live region', async () => {
    const { pane, keyboard } = await open(paneWorkbooks.tiles());
    await keyboard.press('Solve');
    await pane
      .getByRole('status')
      .filter({ hasText: `${optimal} Objective 870. 1 of 3 constraint rows is binding.` })
      .waitFor();
  });

  it('solves 3,000 decisions under 1,200 rows in few round trips, and draws only the lines in sight', async () => {
    const { pane, host, keyboard } = await open(paneWorkbooks.large());
    await pane.getByText('3,000 decision cells, Plan!B1:BI50').waitFor();
    await solveLargePlan({ pane, host, keyboard });
    expect(host.traffic.largestMessage).toBeLessThan(5 * 1024 * 1024);
    // Reading: 3 and one for each 4 MB. Writing: 2. And the sheet in front.
    expect(host.traffic.roundTrips).toBeLessThanOrEqual(3 + 1 + 2 + 1);
    expect(await pane.getByRole('row').count()).toBeLessThan(60);
  });
});
