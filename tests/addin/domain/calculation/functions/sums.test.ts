/**
 * Expected values by hand from the cells below, unless a line says otherwise. "Documented" examples are those of
 * Microsoft's function reference, from memory.
 */
import type { WorkbookDescription } from '../../../../../addin/adapters/memory/memory-workbook';
import { CellError } from '../../../../../addin/domain/sheet/cell-value';
import { evaluateFormula, expectValue, type StatedValue } from '../evaluate-formula';

/** A week at the kilns: tile, line, square metres, price. C7 is a text, C8 blank, C9 TRUE. */
const workbook: WorkbookDescription = {
  sheets: {
    Kiln: {
      A1: [
        ['Tile', 'Line', 'Made', 'Price'],
        ['Sea', 'wall', 120, 9.5],
        ['Moss', 'wall', 80, 11],
        ['Slate', 'floor', 200, 7.25],
        ['Dune', 'floor', 50, 8],
        ['Seam', 'trim', 10, 21],
        ['none', 'trim', '35', 20],
        ['blank', 'trim', null, 20],
        ['true', 'trim', true, 20],
      ],
      F1: [[1], [2], [CellError.of('#N/A')]],
      H1: [[2], [3], ['=SUBTOTAL(9,H1:H2)'], [4], ['=SUBTOTAL(9,H1:H4)']],
    },
  },
  hiddenRows: { Kiln: [3] },
};

const cases: readonly (readonly [string, StatedValue])[] = [
  ['SUM(Kiln!C2:C6)', 460],
  ['SUM(Kiln!C2:C9)', 460],
  ['SUM("3",TRUE,4)', 8],
  ['SUM(Kiln!C2,Kiln!C4:C5,1)', 371],
  ['SUM(Kiln!F1:F3)', '#N/A'],
  ['SUM("many")', '#VALUE!'],
  ['SUM({1,2;3,"x"})', 6],
  ['PRODUCT(Kiln!C5,Kiln!C6,2)', 1000],
  ['PRODUCT(Kiln!C7:C9)', 0],
  ['SUMSQ(3,4)', 25],
  ['SUMPRODUCT(Kiln!C2:C6,Kiln!D2:D6)', 4080],
  ['SUMPRODUCT(Kiln!C2:C9,Kiln!D2:D9)', 4080],
  ['SUMPRODUCT(Kiln!C2:C6,Kiln!D2:D5)', '#VALUE!'],
  ['SUMPRODUCT((Kiln!B2:B6="wall")*(Kiln!C2:C6>100))', 1],
  // Documented.
  ['SUMX2MY2({2,3,9,1,8,7,5},{6,5,11,7,5,4,4})', -55],
  ['SUMX2PY2({2,3,9,1,8,7,5},{6,5,11,7,5,4,4})', 521],
  ['SUMXMY2({2,3,9,1,8,7,5},{6,5,11,7,5,4,4})', 79],
  ['SUMIF(Kiln!B2:B6,"wall",Kiln!C2:C6)', 200],
  ['SUMIF(Kiln!C2:C6,">=80")', 400],
  ['SUMIF(Kiln!A2:A6,"sea*",Kiln!C2:C6)', 130],
  ['SUMIF(Kiln!A2:A6,"s?a",Kiln!C2:C6)', 120],
  ['SUMIF(Kiln!B2:B6,"<>wall",Kiln!C2)', 260],
  ['SUMIF(Kiln!C2:C9,"=35",Kiln!D2:D9)', 20],
  ['SUMIFS(Kiln!C2:C6,Kiln!B2:B6,"floor",Kiln!D2:D6,"<8")', 200],
  ['SUMIFS(Kiln!C2:C6,Kiln!B2:B5,"floor")', '#VALUE!'],
  ['SUM(SUMIFS(Kiln!C2:C6,Kiln!B2:B6,{"wall","trim"}))', 210],
  ['COUNTIF(Kiln!C2:C9,"")', 1],
  ['COUNTIF(Kiln!C2:C9,"<>")', 7],
  ['COUNTIF(Kiln!C2:C9,TRUE)', 1],
  ['COUNTIF(Kiln!A2:A9,"~*")', 0],
  ['COUNTIFS(Kiln!B2:B6,"wall",Kiln!C2:C6,">100")', 1],
  ['AVERAGEIF(Kiln!B2:B6,"wall",Kiln!D2:D6)', 10.25],
  ['AVERAGEIF(Kiln!B2:B6,"roof",Kiln!D2:D6)', '#DIV/0!'],
  ['AVERAGEIFS(Kiln!C2:C6,Kiln!B2:B6,"floor",Kiln!C2:C6,">60")', 200],
  ['MAXIFS(Kiln!C2:C6,Kiln!B2:B6,"floor")', 200],
  ['MINIFS(Kiln!C2:C6,Kiln!B2:B6,"floor")', 50],
  ['AVERAGE(Kiln!C2:C9)', 92],
  ['AVERAGE(Kiln!C8:C8)', '#DIV/0!'],
  ['AVERAGEA(Kiln!C6:C9)', 11 / 3],
  ['COUNT(Kiln!C2:C9)', 5],
  ['COUNT(1,"2","x",TRUE,Kiln!F1:F3)', 5],
  ['COUNTA(Kiln!C2:C9)', 7],
  ['COUNTBLANK(Kiln!C2:C9)', 1],
  ['MAX(Kiln!C2:C9)', 200],
  ['MIN(Kiln!C2:C9,"5")', 5],
  ['MAX(Kiln!C8)', 0],
  ['MAXA(Kiln!C8:C9)', 1],
  ['MEDIAN(1,2,3,4,5,6)', 3.5], // documented
  ['MODE.SNGL({5.6,4,4,3,2,4})', 4], // documented
  ['LARGE({3,5,3,5,4,4,2,4,6,7},3)', 5], // documented
  ['SMALL({3,4,5,2,3,4,6,4,7},4)', 4], // documented
  ['LARGE({1,2},3)', '#NUM!'],
  ['RANK(3.5,{7,3.5,3.5,1,2},1)', 3], // documented
  ['RANK.EQ(7,{7,3.5,3.5,1,2},1)', 5], // documented
  ['ROUND(STDEV.S({1345,1301,1368,1322,1310,1370,1318,1350,1303,1299}),5)', 27.46392], // documented
  ['ROUND(STDEV.P({1345,1301,1368,1322,1310,1370,1318,1350,1303,1299}),5)', 26.05456], // documented
  ['ROUND(VAR({1345,1301,1368,1322,1310,1370,1318,1350,1303,1299}),1)', 754.3], // documented
  ['PERCENTILE.INC({1,3,2,4},0.3)', 1.9], // documented
  ['QUARTILE({1,2,4,7,8,9,10,12},1)', 3.5], // documented
  // Row 3 is hidden by hand, row 5 of column H is a subtotal itself.
  ['SUBTOTAL(9,Kiln!C2:C6)', 460],
  ['SUBTOTAL(109,Kiln!C2:C6)', 380],
  ['SUBTOTAL(101,Kiln!C2:C6)', 95],
  ['SUBTOTAL(2,Kiln!C2:C6)', 5],
  ['SUBTOTAL(3,Kiln!A2:C6)', 15],
  ['SUBTOTAL(4,Kiln!C2:C6)', 200],
  ['SUBTOTAL(5,Kiln!C2:C6)', 10],
  ['SUBTOTAL(6,Kiln!C5:C6)', 500],
  ['SUBTOTAL(12,Kiln!C2:C6)', '#VALUE!'],
  ['Kiln!H5', 9],
  ['AGGREGATE(9,6,Kiln!F1:F3)', 3],
  ['AGGREGATE(9,4,Kiln!F1:F3)', '#N/A'],
  ['AGGREGATE(4,5,Kiln!C2:C6)', 200],
  ['NPV(0.1,-10000,3000,4200,6800)', 1188.4434123352207], // documented as 1,188.44
];

it.each(cases)('%s is %s', (formula, expected) => {
  expectValue(evaluateFormula(formula, workbook), expected);
});

it('SUBTOTAL 9 leaves out rows that a filter hides', () => {
  expect(evaluateFormula('SUBTOTAL(9,Kiln!C2:C6)', { ...workbook, filteredSheets: ['Kiln'] })).toBe(380);
});
