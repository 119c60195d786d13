/** Sentences around a result: each says what happened and, where something can be done, what. */
import { resultNotice, type ResultNotice } from '../../../addin/domain/results-to-sheet/result-notice';
import {
  resultTexts,
  sentenceOfFileFault,
  sentenceOfNoSuchPlan,
  sentenceOfNotice,
} from '../../../addin/wording/report-wording';

const cell = { sheet: 'Week plan', row: 6, column: 5 };

const notices: [ResultNotice, RegExp][] = [
  [
    resultNotice('kept-cell', cell, { name: 'Week.Optimum', value: 1250.5 }),
    /^'Week plan'!F7 .*1,250\.5.*Clear the cell/,
  ],
  [
    resultNotice('results-moved', cell, {
      names: ['Week.Slack', 'Week.DualValue'],
      ranges: ['Plan!F5:F9', 'Plan!G5:G9'],
    }),
    /Week\.Slack and Week\.DualValue now stand in Plan!F5:F9 and Plan!G5:G9/,
  ],
  [
    resultNotice('results-left', cell, { names: ['Week.Slack'], ranges: ['Plan!F5:F9'] }),
    /Plan!F5:F9 .*Delete it/,
  ],
  [
    resultNotice('results-on-own-sheet', null, { names: ['Week.Optimum'], sheet: 'Week results' }),
    /“Week results”/,
  ],
  [
    resultNotice('not-recalculated', cell, { reason: 'unknown-function' }),
    /F7 .*a function that is not known.*opened/,
  ],
  [
    resultNotice('workbook-disagrees', cell, { what: 'Kiln', workbook: '#N/A', model: 3 }),
    /Kiln.*#N\/A.*3.*Do not rely/,
  ],
];

it.each(notices)('$code has a sentence', (notice, sentence) => {
  const text = sentenceOfNotice(notice);
  expect(text).toMatch(sentence);
  expect(text).toMatch(/\.$/);
  expect(text).not.toMatch(/undefined|\[object/);
});

it('Every gloss has at most six words', () => {
  for (const { gloss } of Object.values(resultTexts.headings)) {
    expect(gloss.split(' ').length).toBeLessThanOrEqual(6);
  }
});

it('A missing plan is told with the names there are', () => {
  expect(sentenceOfNoSuchPlan('several', null, ['Day', 'Night'])).toMatch(
    /2 plans: “Day” and “Night”.*--plan/,
  );
  expect(sentenceOfNoSuchPlan('unknown', 'Noon', ['Day'])).toMatch(/“Noon”.*“Day”/);
  expect(sentenceOfNoSuchPlan('none', null, [])).toMatch(/no plan.*Week\.Decision/);
});

it.each(['ENOENT', 'EACCES', 'EISDIR', 'not-gzip', 'too-large', 'EIO', undefined])(
  'A file fault %s has a sentence that names the file',
  (fault) => {
    expect(sentenceOfFileFault('week.mps', fault)).toMatch(/^week\.mps .+\.$/);
  },
);
