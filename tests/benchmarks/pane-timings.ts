/**
 * Times the pane of the production build in Chromium, inside the far end of the genuine Office.js, and writes
 * PANE-RESULTS.md. Run by `npm run bench:pane` after a build; the figures to reach are those of the design.
 */
import { writeFileSync } from 'node:fs';
import { cpus } from 'node:os';
import path from 'node:path';
import { longestTask, PaneBrowser, solveLargePlan } from '../browser/pane-in-browser';
import { paneWorkbooks } from '../browser/pane-workbooks';
import { checkoutFolder, describeNeeds } from '../support/needs';

const rounds = 7;
const median = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[values.length >> 1];
const rows: string[] = [];

/** Least and median of the rounds, beside the figure to reach. */
function record(what: string, values: readonly number[], unit: string, wanted: number): void {
  const text = (value: number): string => `${value.toFixed(unit === 's' ? 2 : 0)} ${unit}`;
  rows.push(`| ${what} | ${text(Math.min(...values))} | ${text(median(values))} | ${text(wanted)} |`);
}

describeNeeds('browser', 'the pane', () => {
  jest.setTimeout(600_000);

  it('is timed from a cold browser to its first control', async () => {
    const seconds: number[] = [];
    for (let round = 0; round < rounds; round++) {
      const browser = new PaneBrowser();
      try {
        const { pane } = await browser.open(paneWorkbooks.tiles());
        await pane.getByRole('button', { name: 'Solve', exact: true }).click();
        const usable = await pane.evaluate(() => performance.getEntriesByName('usable')[0].startTime);
        seconds.push(usable / 1000);
      } finally {
        await browser.close();
      }
    }
    record('usable after navigation, cold browser', seconds, 's', 1);
  });

  it('is timed on 3,000 decisions under 1,200 rows', async () => {
    const seconds: number[] = [];
    const longest: number[] = [];
    const browser = new PaneBrowser();
    try {
      const opened = await browser.open(paneWorkbooks.large());
      await opened.pane.getByText('3,000 decision cells, Plan!B1:BI50').waitFor();
      for (let round = 0; round < rounds; round++) {
        await longestTask(opened.pane);
        const startedAt = performance.now();
        await solveLargePlan(opened);
        seconds.push((performance.now() - startedAt) / 1000);
        longest.push(await longestTask(opened.pane));
      }
    } finally {
      await browser.close();
    }
    record('3,000 × 1,200 plan, press to results written', seconds, 's', 4);
    record('longest task on the pane’s thread meanwhile', longest, 'ms', 100);
  });

  afterAll(() => {
    const [processor] = cpus();
    const text = [
      '# The pane, timed',
      '',
      `${new Date().toISOString().slice(0, 10)}, ${cpus().length} shared cores (${processor.model}), Node ${process.version}. Made by \`npm run bench:pane\`, ${rounds} rounds.`,
      '',
      '| what | least | median | to reach |',
      '| --- | ---: | ---: | ---: |',
      ...rows,
      '',
    ].join('\n');
    writeFileSync(path.join(checkoutFolder, 'tests', 'benchmarks', 'PANE-RESULTS.md'), text);
  });
});
