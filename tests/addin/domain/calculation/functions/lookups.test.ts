/**
 * Expected values by hand from the cells below.
 */
import type { WorkbookDescription } from '../../../../../addin/adapters/memory/memory-workbook';
import { evaluateFormula, expectValue, type StatedValue } from '../evaluate-formula';

/** Tiles by thickness, thickness sorted. */
const workbook: WorkbookDescription = {
  sheets: {
    Clay: {
      A1: [
        ['Thickness', 'Clay', 'Hours'],
        [4, 'red', 0.5],
        [6, 'white', 0.75],
        [8, 'grey', 1],
        [10, 'black', 1.25],
      ],
      F1: [
        ['Mon', 'Tue', 'Wed'],
        [10, 20, 30],
        [100, 200, 300],
      ],
      J1: [[9], [7], [5], [3]],
      L1: ['tile~1', 'tile*', 'Tile?'].map((text) => [text]),
      N1: [[1.1], [2], [3]],
    },
    Work: { B2: 5, C2: 6, B3: 7, C3: 8 },
  },
  names: { Twice: 'LAMBDA(x,x*2)' },
};

const cases: readonly (readonly [string, StatedValue])[] = [
  ['INDEX(Clay!A2:C5,2,3)', 0.75],
  ['INDEX(Clay!A2:C5,3,2)', 'grey'],
  ['SUM(INDEX(Clay!A2:C5,0,3))', 3.5],
  ['SUM(INDEX(Clay!F2:H3,2,0))', 600],
  ['INDEX(Clay!F2:H2,2)', 20],
  ['INDEX(Clay!A2:A5,5)', '#REF!'],
  ['INDEX({1,2;3,4},2,2)', 4],
  ['INDEX((Clay!A2:A5,Clay!C2:C5),2,1,2)', 0.75],
  ['MATCH(8,Clay!A2:A5,0)', 3],
  ['MATCH(7,Clay!A2:A5,1)', 2],
  ['MATCH(7,Clay!A2:A5)', 2],
  ['MATCH(3,Clay!A2:A5)', '#N/A'],
  ['MATCH(6,Clay!J1:J4,-1)', 2],
  ['MATCH("WHITE",Clay!B2:B5,0)', 2],
  ['MATCH("g*",Clay!B2:B5,0)', 3],
  ['MATCH("tile~*",Clay!L1:L3,0)', 2],
  ['MATCH("8",Clay!A2:A5,0)', '#N/A'],
  ['MATCH(8,Clay!A2:B5,0)', '#N/A'],
  ['MATCH(1.1,Clay!N1:N3,0)', 1],
  ['MATCH(0.1*11,Clay!N1:N3,0)', 1],
  ['XMATCH(7,Clay!A2:A5,-1)', 2],
  ['XMATCH(7,Clay!A2:A5,1)', 3],
  ['XMATCH("t*",Clay!L1:L3,2,-1)', 3],
  ['XLOOKUP(6,Clay!A2:A5,Clay!C2:C5)', 0.75],
  ['XLOOKUP(7,Clay!A2:A5,Clay!C2:C5)', '#N/A'],
  ['XLOOKUP(7,Clay!A2:A5,Clay!C2:C5,"none")', 'none'],
  ['XLOOKUP(7,Clay!A2:A5,Clay!C2:C5,0,-1)', 0.75],
  ['XLOOKUP(7,Clay!A2:A5,Clay!C2:C5,0,1)', 1],
  ['SUM(XLOOKUP("Tue",Clay!F1:H1,Clay!F2:H3))', 220],
  ['SUM(XLOOKUP(6,Clay!A2:A5,Clay!B2:C5))', 0.75],
  ['SUM(XLOOKUP({4,10},Clay!A2:A5,Clay!C2:C5))', 1.75],
  ['SUM(XLOOKUP("Mon",Clay!F1:H1,Clay!F2:H2):Clay!G2)', 30],
  ['VLOOKUP(6,Clay!A2:C5,3,FALSE)', 0.75],
  ['VLOOKUP(7,Clay!A2:C5,2)', 'white'],
  ['VLOOKUP(7,Clay!A2:C5,2,FALSE)', '#N/A'],
  ['VLOOKUP(6,Clay!A2:C5,4,FALSE)', '#REF!'],
  ['VLOOKUP(6,Clay!A2:C5,0,FALSE)', '#VALUE!'],
  ['HLOOKUP("Wed",Clay!F1:H3,3,FALSE)', 300],
  ['LOOKUP(9,Clay!A2:A5,Clay!B2:B5)', 'grey'],
  ['LOOKUP(5,Clay!A2:C5)', 0.5],
  ['SUM(OFFSET(Clay!A1,1,2,4,1))', 3.5],
  ['SUM(OFFSET(Clay!A5,0,0,-2,1))', 18],
  ['OFFSET(Clay!A1,-1,0)', '#REF!'],
  ['INDIRECT("Clay!B"&3)', 'white'],
  ['INDIRECT("Clay!ZZZZ9")', '#REF!'],
  ['INDIRECT("nowhere")', '#REF!'],
  ['ROW()', 40],
  ['COLUMN()', 10],
  ['ROW(Clay!B7)', 7],
  ['SUM(ROW(Clay!A1:A4))', 10],
  ['COLUMN(Clay!C1)', 3],
  ['ROWS(Clay!A1:C5)', 5],
  ['COLUMNS(Clay!A1:C5)', 3],
  ['COLUMNS({1,2,3;4,5,6})', 3],
  ['Twice(4)', 8],
  ['SUM(B2:C3 C2:C3)', 14],
  ['B2:B3 C2:C3', '#NULL!'],
  ['SUM(Clay!A2:Clay!A3)', 10],
  ['Clay!Z99+1', 1],
  ['Gone!A1', '#REF!'],
  ['Clay!#REF!+1', '#REF!'],
  ['Unnamed+1', '#NAME?'],
];

it.each(cases)('%s is %s', (formula, expected) => {
  expectValue(evaluateFormula(formula, workbook), expected);
});

it('a range where one value is asked for gives the one in the own row', () => {
  expect(evaluateFormula('Clay!A1:A5*10', workbook, 'D3')).toBe(60);
  expect(evaluateFormula('Clay!F2:H2', workbook, 'G40')).toBe(20);
  expect(evaluateFormula('Clay!A1:C5+1', workbook, 'D3')).toBe('#VALUE!');
});
