/** The pane's texts: the trade's words only, glosses of at most six words, numbers as people write them. */
import {
  elapsedText,
  nameFaultText,
  paneTexts,
  partLabel,
  partLabels,
  readingText,
  selectionText,
  shortAmountText,
} from '../../../addin/wording/pane-texts';

const range = { sheet: 'Plan', top: 4, left: 5, bottom: 15, right: 5 };

it('every gloss has at most six words', () => {
  const long = Object.values(partLabels).filter(({ gloss }) => gloss.split(' ').length > 6);
  expect(long).toEqual([]);
});

it('a field says what it read', () => {
  expect(readingText('Decision', { kind: 'cells', ranges: [range], cellCount: 12, text: null })).toBe(
    '12 decision cells, Plan!F5:F16',
  );
  expect(readingText('Sense', { kind: 'constant', text: 'maximise' })).toBe('“maximise”, in the name itself');
  expect(readingText('Lower', { kind: 'dead' })).toMatch(/^Refers to nothing/);
  expect(partLabel('Decision', 2)).toBe('Decision cells 2');
});

it('amounts are short, elapsed time reads as a clock, counts have their plural', () => {
  expect([null, 1234.5678, -0, 1e7, Infinity].map(shortAmountText)).toEqual([
    '–',
    '1,234.57',
    '0',
    '10,000,000',
    'no limit',
  ]);
  expect([0, 7.9, 760].map(elapsedText)).toEqual(['0:00', '0:07', '12:40']);
  expect(selectionText([range])).toBe('Selected now: Plan!F5:F16 (12 cells)');
  expect(paneTexts.objectiveBefore(65, 870)).toBe('65 before, +805 since');
  expect(paneTexts.objectiveBefore(870, 65)).toBe('870 before, −805 since');
  expect(paneTexts.objectiveBefore(5, 5)).toBe('5 before, 0 since');
  expect(paneTexts.putBackDone(1)).toBe('1 decision cell holds again what it held before.');
});

it('every fault of a name says what to do', () => {
  const faults = ['blank', 'characters', 'like-a-cell', 'ends-in-part', 'too-long', 'taken'] as const;
  expect(new Set(faults.map(nameFaultText)).size).toBe(faults.length);
});
