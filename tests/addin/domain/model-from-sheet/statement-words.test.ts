import {
  isBlankText,
  looksLikeNumber,
  readRelation,
  readSense,
  saysFree,
} from '../../../../addin/domain/model-from-sheet/statement-words';

// The spellings are those of the statement's rules (addin/SPEC.md), each tried in odd case and spacing.
it.each([
  ['<=', ['<=', '=<', '≤', ' < = ', 'at most', 'AT  MOST', 'atmost', '\u00a0<=\u00a0']],
  ['>=', ['>=', '=>', '≥', 'at least', 'At Least']],
  ['=', ['=', '==', 'exactly', 'EXACTLY ']],
  ['strict', ['<', ' > ']],
] as const)('AD-25 the relation %s may be spelt in several ways', (relation, spellings) => {
  for (const text of spellings) {
    expect([text, readRelation(text)]).toEqual([text, relation]);
  }
});

it.each(['', 'below', '<>', '=<=', 'at', 'less than', '!='])('AD-25 %p is no relation', (text) => {
  expect(readRelation(text)).toBeUndefined();
});

it.each([
  ['maximise', ['maximise', 'Maximize', 'MAX', ' max imise ']],
  ['minimise', ['minimise', 'MINIMIZE', 'min']],
] as const)('AD-14 the sense %s may be spelt in several ways', (sense, spellings) => {
  for (const text of spellings) {
    expect([text, readSense(text)]).toEqual([text, sense]);
  }
});

it.each(['', 'maximum', 'best', 'maxi', '1'])('AD-14 %p is no sense', (text) => {
  expect(readSense(text)).toBeUndefined();
});

it('AD-31 free says that there is no lower bound, in any case', () => {
  expect(['free', ' FREE ', 'Free'].map(saysFree)).toEqual([true, true, true]);
  expect(['freed', '', 'none'].map(saysFree)).toEqual([false, false, false]);
});

it.each([
  '12',
  ' 12,5 ',
  '1 234',
  '1,234.50',
  '-3',
  '−3',
  '(3)',
  '+.5',
  '€ 5',
  '5 €',
  '12%',
  '1.5E-3',
  "1'000",
  "'12",
])('AD-51 %p looks like a number', (text) => {
  expect(looksLikeNumber(text)).toBe(true);
});

it.each(['', 'twelve', '12 pcs', 'A12', '1.2.x', '-', '%', '1/2', 'E5'])(
  'AD-51 %p is plainly a text',
  (text) => {
    expect(looksLikeNumber(text)).toBe(false);
  },
);

it('AD-24 blanks of every kind hold nothing', () => {
  expect(['', ' ', '\u00a0', '\u200b\n'].map(isBlankText)).toEqual([true, true, true, true]);
  expect(isBlankText(' . ')).toBe(false);
});
