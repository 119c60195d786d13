import { glossOf, termWithGloss, type GlossedTerm } from '../../../addin/wording/glosses';
import { statusSentence } from '../../../addin/wording/status-sentences';
import { amountText, countText, listText, quoted } from '../../../addin/wording/word-forms';

const terms: readonly GlossedTerm[] = [
  'decision cell',
  'objective',
  'left side',
  'right side',
  'lower bound',
  'upper bound',
  'lot',
  'least run',
  'optimum',
  'before',
  'slack',
  'dual value',
  'reduced cost',
  'binding',
  'feasible',
  'infeasible',
  'unbounded',
];

it.each(terms)('the gloss of %s has at most six words', (term) => {
  expect(glossOf(term).split(' ').length).toBeLessThanOrEqual(6);
});

it('a term stands with its gloss as design §2 gives it', () => {
  expect(termWithGloss('slack')).toBe('Slack (left over)');
  expect(termWithGloss('dual value')).toBe('Dual value (worth of one more)');
  expect(termWithGloss('reduced cost')).toBe('Reduced cost (what adding one would change)');
});

it('every end of a solve has its sentence, which begins with the status', () => {
  const statuses = ['optimal', 'infeasible', 'unbounded', 'stopped', 'imprecise'] as const;
  for (const status of statuses) {
    expect(statusSentence(status).toLowerCase().startsWith(status)).toBe(true);
  }
  expect(statusSentence('invalid')).toBe('Not solved: the plan has errors.');
  expect(statusSentence('stopped', true)).not.toBe(statusSentence('stopped', false));
});

it('amounts are readable and keep what matters', () => {
  expect([0, -0, 1250.5, 1 / 3, 1e6, -0.25].map(amountText)).toEqual([
    '0',
    '0',
    '1,250.5',
    '0.3333333333',
    '1,000,000',
    '-0.25',
  ]);
  expect(amountText(Infinity)).toBe('no limit');
});

it('counts, lists and quotations are written as people write them', () => {
  expect([countText(1, 'cell'), countText(1200, 'cell')]).toEqual(['1 cell', '1,200 cells']);
  expect([listText([]), listText(['a']), listText(['a', 'b']), listText(['a', 'b', 'c'])]).toEqual([
    '',
    'a',
    'a and b',
    'a, b and c',
  ]);
  expect(quoted('  two\n lines ')).toBe('“two lines”');
  expect(quoted('x'.repeat(60))).toBe(`“${'x'.repeat(40)}…”`);
});
