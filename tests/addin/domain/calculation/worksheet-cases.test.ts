/**
 * The 46 formulas by which ready-made engines were compared before our own was written. Expected values by hand, from
 * the cells below.
 */
import type { WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { evaluateFormula, expectValue, type StatedValue } from './evaluate-formula';

const workbook: WorkbookDescription = {
  sheets: {
    Data: {
      A1: [
        [1, 10, 'x'],
        [2, 20, 'y'],
        [3, 30, 'x'],
        [4, 40, 'y'],
        [5, 50, 'x'],
      ],
      E1: [
        ['Item', 'Qty', 'Cost'],
        ['a', 2, 3],
        ['b', 4, 5],
        ['c', 6, 7],
      ],
    },
    'Model Sheet': { A1: '=SUMPRODUCT(Data!A1:A5,Data!B1:B5)' },
  },
  names: { Rate: 'Data!$B$2', Qtys: 'Data!$A$1:$A$5', K: '0.25' },
  tables: [{ name: 'Tbl', sheet: 'Data', ref: 'E1:G4' }],
};

const cases: readonly (readonly [string, StatedValue])[] = [
  ['SUMPRODUCT(Data!A1:A5,Data!B1:B5)', 550],
  ['SUMIFS(Data!B1:B5,Data!C1:C5,"x",Data!A1:A5,">1")', 80],
  ['INDEX(Data!B1:B5,MATCH(4,Data!A1:A5,0))', 40],
  ['XLOOKUP(3,Data!A1:A5,Data!B1:B5)', 30],
  ['SUM(MMULT({1,2;3,4},{5;6}))', 56],
  ['SUM(Tbl[Cost])', 15],
  ['SUMPRODUCT(Tbl[Qty],Tbl[Cost])', 68],
  ['Rate*2', 40],
  ['K*100', 25],
  ['SUM(Qtys)', 15],
  ['50%*Data!B1', 5],
  ['"a"&Data!A1&TEXT(0.5,"0%")', 'a150%'],
  ['SUM((Data!A1:A5>2)*Data!B1:B5)', 120],
  ['LET(x,2,x*3)', 6],
  ['SUM(FILTER(Data!B1:B5,Data!A1:A5>2))', 120],
  ['SUM(SEQUENCE(4))', 10],
  ['IFERROR(1/0,7)', 7],
  ['SUM(OFFSET(Data!A1,1,0,3,1))', 9],
  ['SUM(INDIRECT("Data!A1:A3"))', 6],
  ['VLOOKUP(2,Data!A1:B5,2,FALSE)', 20],
  ['SUMIF(Data!C1:C5,"y",Data!B1:B5)', 60],
  ['COUNTIFS(Data!C1:C5,"x")', 3],
  ['SUM(Data!A:A)', 15],
  ['-2^2', 4],
  ['SUM(TRANSPOSE(Data!A1:A5)*{1,1,1,1,1})', 15],
  ['SUMPRODUCT((Data!C1:C5="x")*Data!B1:B5)', 90],
  ['SUMPRODUCT(--(Data!C1:C5="x"),Data!B1:B5)', 90],
  ['MAX(IF(Data!C1:C5="y",Data!B1:B5))', 40],
  ['ROUND(NPV(10%,Data!A1:A3),6)', 4.815928],
  ['SUM(Data!A1:INDEX(Data!A1:A5,3))', 6],
  ['SUBTOTAL(9,Data!A1:A5)', 15],
  ['AGGREGATE(9,6,Data!A1:A5)', 15],
  ['SUM(BYROW(Data!A1:B2,LAMBDA(r,SUM(r))))', 33],
  ['TEXT(DATE(2024,2,29),"yyyy-mm-dd")', '2024-02-29'],
  ["'Model Sheet'!A1+0", 550],
  ['SUM((Data!A1:A2,Data!B1:B2))', 33],
  ['SUM(Data!A1:B3 Data!B2:C4)', 50],
  ['CHOOSE(2,10,20)', 20],
  ['SUMSQ(Data!A1:A3)', 14],
  ['@Data!A1:A5', '#VALUE!'],
  ['ROUND(2.5,0)', 3],
  ['ROUND(SUM(MINVERSE({2,0;0,4})),6)', 0.75],
  ['COUNTA(UNIQUE(Data!C1:C5))', 2],
  ['XMATCH(4,Data!A1:A5)', 4],
  ['ROWS(Tbl[#All])', 4],
  ['SUM(HSTACK(Data!A1:A2,Data!B1:B2))', 33],
];

it.each(cases)('%s is worked out', (formula, expected) => {
  expectValue(evaluateFormula(formula, workbook), expected);
});

it.each(cases)(
  '%s is worked out with the prefixes that files put before newer functions',
  (formula, expected) => {
    const stored = formula
      .replace(/\b(XLOOKUP|LET|SEQUENCE|BYROW|LAMBDA|UNIQUE|XMATCH|HSTACK|AGGREGATE)\(/g, '_xlfn.$1(')
      .replace('FILTER(', '_xlfn._xlws.FILTER(')
      .replace('LET(x,2,x*3)', 'LET(_xlpm.x,2,_xlpm.x*3)')
      .replace('LAMBDA(r,SUM(r))', 'LAMBDA(_xlpm.r,SUM(_xlpm.r))')
      .replace(/^@(.*)$/, '_xlfn.SINGLE($1)');
    expectValue(evaluateFormula(stored, workbook), expected);
  },
);
