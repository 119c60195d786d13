/**
 * LibreOffice Calc as an outside judge of our worksheet functions: the same formulas over the same cells. Left out is
 * where Calc and Excel differ: truth values in ranges, texts as truth values, dates before March 1900, weeks over New Year.
 */
import { MemoryWorkbook, type CellContent } from '../../../../addin/adapters/memory/memory-workbook';
import { recalculate } from '../../../../addin/domain/calculation/recalculate';
import { formatCellAddress } from '../../../../addin/domain/sheet/cell-address';
import { CellError } from '../../../../addin/domain/sheet/cell-value';
import { itNeeds } from '../../../support/needs';
import { recalculateInLibreOffice } from '../../../support/recalculate-in-libreoffice';
import { buildXlsx, type CellDescription } from '../../../support/xlsx-builder';

/** Ten tiles: square metres made, price, hours a hundred square metres, line. G1 is 1 and enters every formula. */
const rows = [
  [120, 9.5, 0.75, 'wall'],
  [80, 11.25, 1, 'wall'],
  [200.5, 7.25, 0.5, 'floor'],
  [50, 8, 1.25, 'floor'],
  [10, 21, 2, 'trim'],
  [0, 20.4, 2.5, 'trim'],
  [-35, 14, 3, 'roof'],
  [61.7, 3.3, 0.1, 'wall'],
  [61.7, 12, 0.2, 'floor'],
  [999.99, 1.005, 0.3, 'edge'],
] as const;

const single = [
  ...['ABS', 'INT', 'SIGN', 'EXP', 'TRUNC', 'EVEN', 'ODD', 'N', 'ISNUMBER', 'ISTEXT', 'ISBLANK'],
  ...['ISEVEN', 'ISODD', 'LEN', 'SQRT', 'LN', 'LOG10'],
];
const singleArguments = ['A1', 'A3', '-A3/7', 'B10*1000', 'C8', 'A6'];

const ofDates = ['YEAR', 'MONTH', 'DAY', 'WEEKDAY', 'HOUR', 'MINUTE', 'SECOND', 'ISOWEEKNUM', 'WEEKNUM'];
const dateArguments = ['61', 'A10', 'B10*1000', '46357.999', '36584', '36585.5', '73000.3'];

const overRanges = [
  ...['SUM', 'AVERAGE', 'MAX', 'MIN', 'COUNT', 'COUNTA', 'PRODUCT', 'SUMSQ', 'MEDIAN', 'STDEV', 'STDEVP'],
  ...['VAR', 'VARP', 'AVERAGEA', 'MAXA', 'MINA', 'SUMPRODUCT'],
];
const ranges = ['A1:A10', 'C1:C10', 'A1:C10', 'D1:D10', 'E1:E3'];

const others = [
  'SUMPRODUCT(A1:A10,B1:B10)',
  'SUMPRODUCT(A1:A10,B1:B10,C1:C10)',
  'SUMPRODUCT((D1:D10="wall")*(A1:A10>60),B1:B10)',
  'SUMIF(D1:D10,"wall",A1:A10)',
  'SUMIF(A1:A10,">60")',
  'SUMIF(A1:A10,"<>0",B1)',
  'SUMIF(D1:D10,"w*",A1:A10)',
  'SUMIF(D1:D10,"????",A1:A10)',
  'SUMIFS(A1:A10,D1:D10,"floor",B1:B10,">=8")',
  'COUNTIF(A1:A10,61.7)',
  'COUNTIF(D1:D10,"<>wall")',
  'COUNTIFS(D1:D10,"wall",C1:C10,"<1")',
  'AVERAGEIF(D1:D10,"floor",B1:B10)',
  'AVERAGEIFS(B1:B10,D1:D10,"wall",A1:A10,">70")',
  'COUNTBLANK(A1:E10)',
  'LARGE(A1:A10,3)',
  'SMALL(A1:A10,3)',
  'RANK(A8,A1:A10)',
  'RANK(A8,A1:A10,1)',
  'PERCENTILE(A1:A10,0.35)',
  'QUARTILE(A1:A10,3)',
  'SUBTOTAL(9,A1:A10)',
  'SUBTOTAL(1,A1:A10)',
  'SUBTOTAL(4,A1:A10)',
  'AGGREGATE(9,6,A1:A10)',
  'INDEX(A1:C10,3,2)',
  'INDEX(A1:A10,MATCH("trim",D1:D10,0))',
  'MATCH(61.7,A1:A10,0)',
  'MATCH(1.1,{0.5,1,1.5,2},1)',
  'MATCH(1.1,{2,1.5,1,0.5},-1)',
  'VLOOKUP(80,A1:D10,4,FALSE)',
  'VLOOKUP(1.2,{0.5,10;1,20;1.5,30},2)',
  'HLOOKUP(2,{1,2,3;4,5,6},2,FALSE)',
  'LOOKUP(1.7,{0.5,1,1.5,2},{10,20,30,40})',
  'IFERROR(VLOOKUP(81,A1:D10,4,FALSE),"none")',
  'SUM(OFFSET(A1,2,1,3,2))',
  'SUM(INDIRECT("A"&2&":B4"))',
  'SUM(MMULT(TRANSPOSE(A1:A10),B1:C10))',
  'SUM(MINVERSE({4,7;2,6}))',
  'MDETERM({2,0,1;1,3,2;1,1,4})',
  'SUM(TRANSPOSE(A1:A3)*{1,2,3})',
  'SUM(IF(D1:D10="wall",A1:A10,0))',
  'MAX(IF(D1:D10="floor",B1:B10))',
  'ROUND(A3/7,3)',
  'ROUND(B10,2)',
  'ROUND(-2.5,0)',
  'ROUND(1234.567,-2)',
  'ROUNDUP(A8/9,2)',
  'ROUNDDOWN(-A8/9,1)',
  'MROUND(A3,4)',
  'CEILING(A3,7)',
  'FLOOR(A3,7)',
  'MOD(A3,7)',
  'MOD(-A3,7)',
  'MOD(A3,-7)',
  'QUOTIENT(-A3,7)',
  'POWER(B1,1.5)',
  'LOG(A1,3)',
  'GCD(84,36,60)',
  'LCM(4,6,10)',
  'NPV(8%,A1:A10)',
  '-2^2',
  '2^3^2',
  '50%*A1',
  '1-2-3/4/5',
  '"a"&A1&B1',
  '1/3&""',
  'IF(A1>100,"much","little")',
  'IFS(A1>500,1,A1>100,2,TRUE,3)',
  'CHOOSE(3,A1,B1,C1)',
  'SWITCH(D1,"floor",1,"wall",2)',
  'AND(A1>1,B1<100)',
  'OR(A1>1000,B1>1000)',
  'XOR(TRUE,FALSE,TRUE)',
  'LEFT(D3,2)&RIGHT(D3,2)&MID(D3,2,3)',
  'UPPER(D1)&LOWER("ABC")&PROPER("red clay")',
  'TRIM("  a   b ")',
  'FIND("o",D3)',
  'SEARCH("O",D3)',
  'SUBSTITUTE("banana","an","o",2)',
  'REPLACE("kiln one",6,3,"two")',
  'REPT("ab",3)',
  'CONCATENATE(D1," ",D3)',
  'TEXTJOIN("-",TRUE,D1:D4)',
  'VALUE("12.5")+1',
  'TEXT(1234.567,"#,##0.00")',
  'TEXT(0.256,"0.0%")',
  'TEXT(-5,"0.00;(0.00)")',
  'TEXT(45627.75,"yyyy-mm-dd hh:mm")',
  'TEXT(45627,"d mmm yyyy")',
  'DATE(2026,12,1)',
  'DATE(2026,14,-3)',
  'EDATE(DATE(2026,1,31),1)',
  'EOMONTH(DATE(2024,1,15),1)',
  'WEEKDAY(DATE(2026,12,1),2)',
  'WEEKNUM(DATE(2026,12,1))',
  'WEEKNUM(DATE(2026,12,1),2)',
  'ISOWEEKNUM(DATE(2027,1,1))',
  'NETWORKDAYS(DATE(2026,11,1),DATE(2026,11,30))',
  'DAYS(DATE(2026,12,1),DATE(2026,2,1))',
  'TIME(25,30,0)',
  'ROWS(A1:C10)*COLUMNS(A1:C10)',
  'ROW(A7)+COLUMN(C1)',
  'SUM((A1:A2,C1:C2))',
  'SUM(A1:B3 B2:C4)',
  'A1:A3 C1:C3',
  '1/0',
  'A1+D1',
  'SQRT(-1)',
  'VLOOKUP("x",D1:D10,1,FALSE)',
  'IFERROR(1/0,"caught")',
  'AND(ISERROR(1/0),ISNA(NA()))',
  '0.1+0.2=0.3',
  '"a"="A"',
  'TRUE+TRUE',
  'COUNT("3","x",4)',
  'SUMX2MY2(A1:A5,B1:B5)',
  'SUMX2PY2(A1:A5,B1:B5)',
  'SUMXMY2(A1:A5,B1:B5)',
  'FIXED(1234.567,1)',
  'MAXIFS(A1:A10,D1:D10,"wall")',
  'MINIFS(A1:A10,D1:D10,"wall")',
  'CEILING.MATH(-8.1,2)',
  'FLOOR.MATH(-8.1,2)',
];

const formulas = [
  ...single.flatMap((name) => singleArguments.map((argument) => `${name}(${argument})`)),
  ...ofDates.flatMap((name) => dateArguments.map((argument) => `${name}(${argument})`)),
  ...overRanges.flatMap((name) => ranges.map((range) => `${name}(${range})`)),
  ...others,
];

/** As files store functions that came after the format. */
function stored(formula: string): string {
  const newer =
    /\b(IFS|SWITCH|XOR|TEXTJOIN|ISOWEEKNUM|DAYS|MAXIFS|MINIFS|CEILING\.MATH|FLOOR\.MATH|AGGREGATE)\(/g;
  return formula.replace(newer, '_xlfn.$1(');
}

itNeeds(
  'libreOffice',
  `${formulas.length} formulas come out as LibreOffice works them out`,
  () => {
    const cells: Record<string, CellContent> = { E1: 'text', E2: 'more text', E3: 4, G1: 1 };
    rows.forEach((row, at) =>
      row.forEach((value, column) => (cells['ABCD'[column] + String(at + 1)] = value)),
    );
    const file: Record<string, CellDescription> = { ...(cells as Record<string, CellDescription>) };
    formulas.forEach((formula, at) => {
      // G1 is what changes, so that every formula is recalculated; IF leaves the formula's own value alone.
      const typed = `IF(G1=1,${stored(formula)})`;
      cells[`J${at + 1}`] = `=${typed}`;
      const place = `J${at + 1}`;
      file[place] = formula.includes('IF(D1:D10')
        ? { formula: typed, arrayRange: place }
        : { formula: typed };
    });
    const judged = recalculateInLibreOffice(buildXlsx({ sheets: [{ name: 'Plan', cells: file }] }))[0];
    const { values, notRecalculated } = recalculate(
      MemoryWorkbook.of({ sheets: { Plan: cells } }).snapshot(),
      new Map([['Plan!G1', 1]]),
      46_358,
    );
    expect(notRecalculated).toEqual([]);
    const ours = new Map(values.map(({ cell, value }) => [formatCellAddress(cell), value]));
    const differing = formulas.flatMap((formula, at) => {
      const mine = ours.get(`Plan!J${at + 1}`);
      const theirs = judged.get(`J${at + 1}`);
      const isSame =
        typeof mine === 'number'
          ? Math.abs(mine - Number(theirs)) <= 1e-9 * Math.max(1, Math.abs(mine))
          : mine instanceof CellError
            ? theirs?.startsWith('#') === true
            : typeof mine === 'boolean'
              ? theirs === (mine ? '1' : '0')
              : (theirs ?? '') === (mine ?? '');
      return isSame ? [] : [`${formula}: ${String(mine)}, LibreOffice ${String(theirs)}`];
    });
    expect(differing).toEqual([]);
  },
  120_000,
);
