/** Numbers in the report. Expected texts by hand. */
import { columnTexts, numberText, secondsText } from '../../../addin/command-line/number-texts';
import { tableLines } from '../../../addin/command-line/text-table';

describe('a number', () => {
  it.each([
    [0, '0'],
    [-0, '0'],
    [1234.5, '1,234.5'],
    [1 / 3, '0.3333333'],
    [123456789.25, '123,456,789'],
    [-0.5, '-0.5'],
    [1e-9, '1.0000e-9'],
    [2.5e15, '2.5000e+15'],
    [Infinity, 'none above'],
    [-Infinity, 'none below'],
    [null, '–'],
  ])('%p reads %s', (value, text) => {
    expect(numberText(value)).toBe(text);
  });
});

describe('a column of numbers', () => {
  it('has as many decimals as its numbers need, so that the points stand below each other', () => {
    expect(columnTexts([512, 0.25, -1250])).toEqual(['512.00', '0.25', '-1,250.00']);
  });

  it('has none where all are whole, and four at most', () => {
    expect(columnTexts([3, 40])).toEqual(['3', '40']);
    expect(columnTexts([1 / 3, 2])).toEqual(['0.3333', '2.0000']);
  });

  it('shows a tiny number for what it is and not as nothing', () => {
    expect(columnTexts([0.00001, 1])).toEqual(['1.0000e-5', '1']);
  });

  it('shows what is not known as a dash', () => {
    expect(columnTexts([null, 1.5])).toEqual(['–', '1.5']);
  });
});

it('Times read as seconds, and as minutes once they are long', () => {
  expect([0.031, 12.34, 125].map(secondsText)).toEqual(['0.03 s', '12.3 s', '2 min 5 s']);
});

it('A table sets texts to the left and numbers to the right, and cuts what is too wide', () => {
  const lines = tableLines([
    { heading: 'Tile', cells: ['Slate', 'x'.repeat(60)], isNumber: false },
    { heading: 'm²', cells: ['5', '1,000'], isNumber: true },
  ]);
  expect(lines[0]).toBe(`  Tile${' '.repeat(40)}      m²`);
  expect(lines[1]).toBe(`  Slate${' '.repeat(39)}       5`);
  expect(lines[2]).toBe(`  ${'x'.repeat(43)}…   1,000`);
});
