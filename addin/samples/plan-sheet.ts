/**
 * The sheet on which the planner decides: products with the amounts to make, and below them what limits the week.
 */
import { collectCells } from './cell-collector';
import { looks } from './sample-looks';
import type { SampleSheet } from './sample-workbook';
import { firstLimitRow, firstProductRow, lastProductRow, planSheetName } from './sheet-layout';
import { products } from './tile-works-figures';
import { contribution, fixedCosts, sum, sumOf } from './week-arithmetic';
import { weekLimits } from './week-limits';

/** Monday 30 November 2026 as a day number counted from 1900. */
const weekBeginning = 46356;

export function planSheet(): SampleSheet {
  const { cells, put, putFormula, paint } = collectCells();
  const productRange = (column: string): string => `${column}${firstProductRow}:${column}${lastProductRow}`;
  const contributions = products.map(contribution);

  put('A1', 'Week plan', looks.title);
  put('A2', 'Week beginning', looks.text);
  put('B2', weekBeginning, looks.date);
  put('D2', 'Amounts in square metres of first quality.', looks.remark);
  put('A3', 'Contribution after fixed costs', looks.text);
  putFormula(
    'B3',
    `SUMPRODUCT(${productRange('D')},${productRange('H')})-FixedCosts`,
    sum(products.map((product, position) => contributions[position] * product.made)) - fixedCosts,
    looks.result,
  );
  put('C3', 'maximise', looks.indented);
  put('A4', 'Square metres in all', looks.text);
  putFormula(
    'B4',
    `SUM(${productRange('H')})`,
    sumOf((product) => product.made),
    looks.amount,
  );

  put('A6', 'Product', looks.heading);
  put('B6', 'Press', looks.heading);
  put('C6', 'Kiln', looks.heading);
  put('D6', 'Contribution per m²', looks.numberHeading);
  put('E6', 'Orders less stock, m²', looks.numberHeading);
  put('F6', 'At least, m²', looks.numberHeading);
  put('G6', 'Sells at most, m²', looks.numberHeading, 'Sales’ figure for the week, orders included.');
  put('H6', 'Make, m²', looks.numberHeading);
  products.forEach((product, position) => {
    const row = firstProductRow + position;
    const rateOf = (column: string): string => `INDEX(Rates[${column}],MATCH($A${row},Rates[Product],0))`;
    put(`A${row}`, product.name, looks.text);
    putFormula(`B${row}`, rateOf('Press'), product.press, looks.text);
    putFormula(`C${row}`, rateOf('Kiln'), product.kiln, looks.text);
    putFormula(`D${row}`, rateOf('Contribution'), contributions[position], looks.price);
    put(`E${row}`, product.ordersLessStock, looks.amount);
    putFormula(`F${row}`, `MAX(0,E${row})`, Math.max(0, product.ordersLessStock), looks.amount);
    put(`G${row}`, product.sellsAtMost, looks.amount);
    put(`H${row}`, product.made, looks.decision);
  });
  const totalRow = lastProductRow + 1;
  put(`A${totalRow}`, 'All products', looks.totalText);
  paint([`B${totalRow}`, `C${totalRow}`, `D${totalRow}`, `E${totalRow}`], looks.totalText);
  putFormula(
    `F${totalRow}`,
    `SUM(${productRange('F')})`,
    sumOf((product) => Math.max(0, product.ordersLessStock)),
    looks.total,
  );
  putFormula(
    `G${totalRow}`,
    `SUM(${productRange('G')})`,
    sumOf((product) => product.sellsAtMost),
    looks.total,
  );
  putFormula(
    `H${totalRow}`,
    `SUM(${productRange('H')})`,
    sumOf((product) => product.made),
    looks.total,
  );

  const headingRow = firstLimitRow - 1;
  put(`A${headingRow}`, 'What limits the week', looks.heading);
  put(`B${headingRow}`, 'Unit', looks.heading);
  paint([`C${headingRow}`, `D${headingRow}`], looks.heading);
  put(`E${headingRow}`, 'Load', looks.numberHeading);
  put(`F${headingRow}`, 'Needed', looks.numberHeading);
  put(`G${headingRow}`, 'Relation', { ...looks.heading, isCentred: true });
  put(`H${headingRow}`, 'Available', looks.numberHeading);
  const limits = weekLimits();
  const lastLimitRow = firstLimitRow + limits.length - 1;
  limits.forEach((limit, position) => {
    const row = firstLimitRow + position;
    if (typeof limit === 'string') {
      put(`A${row}`, limit, looks.group);
      return;
    }
    const { needed, available } = limit;
    put(`A${row}`, limit.label, looks.indented, limit.note);
    put(`B${row}`, limit.unit, looks.text);
    if (limit.isOrder !== true) {
      putFormula(`E${row}`, `F${row}/H${row}`, needed.value / available.value, looks.share);
    }
    putFormula(`F${row}`, needed.formula, needed.value, looks.exactAmount);
    put(`G${row}`, limit.relation, looks.relation);
    if (available.formula === undefined) {
      put(`H${row}`, available.value, looks.exactAmount);
    } else {
      putFormula(`H${row}`, available.formula, available.value, looks.exactAmount);
    }
  });

  return {
    name: planSheetName,
    cells,
    columnWidths: { A: 33, B: 14, C: 11, D: 13, E: 12, F: 12, G: 12, H: 12, I: 3 },
    // Room for a heading of three lines beside both blocks.
    rowHeights: { 1: 24, 6: 42, [headingRow]: 42 },
    frozenAt: `B${firstProductRow}`,
    pickList: {
      range: `G${firstLimitRow}:G${lastLimitRow}`,
      choices: ['<=', '>=', '='],
      hint: 'at most, at least, or exactly',
    },
    highlight: { range: `E${firstLimitRow}:E${lastLimitRow}`, atLeast: 1, textColor: 'A33A2A' },
    chart: {
      title: 'Square metres to make',
      axisTitle: 'm² of first quality',
      from: { column: 0, row: lastLimitRow + 1 },
      to: { column: 8, row: lastLimitRow + 23 },
      categories: productRange('A'),
      values: productRange('H'),
      seriesNameCell: 'H6',
      barColor: '4F7F96',
    },
    isPortrait: true,
    printArea: `A1:H${lastLimitRow + 23}`,
    printTitleRows: '$6:$6',
    pageFooter: '&LWeek plan&CPage &P of &N&RPrinted &D',
  };
}
