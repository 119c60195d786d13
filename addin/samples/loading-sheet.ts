/**
 * The sheet that works out from the plan what each product takes of presses, kilns, glaze, clay, gas and hands.
 */
import { collectCells } from './cell-collector';
import { looks } from './sample-looks';
import type { SampleSheet } from './sample-workbook';
import {
  firstLoadingRow,
  firstProductRow,
  lastLoadingRow,
  loadingSheetName,
  planSheetName,
} from './sheet-layout';
import { products } from './tile-works-figures';
import {
  bodyTonnes,
  gasCubicMetres,
  glazeLitres,
  kilnHours,
  packingHours,
  pressHours,
  sumOf,
} from './week-arithmetic';

export function loadingSheet(): SampleSheet {
  const { cells, put, putFormula, paint } = collectCells();
  put('A1', 'Loading', looks.title);
  put('A2', 'Worked out from the week plan and the rates; nothing is typed in here.', looks.remark);
  const headings = [
    'Product',
    'Press',
    'Kiln',
    'Glaze',
    'Make, m²',
    'Press h',
    'Kiln h',
    'Glaze l',
    'Clay body t',
    'Gas m³',
    'Packing h',
  ];
  headings.forEach((heading, position) => {
    const look = position < 4 ? looks.heading : looks.numberHeading;
    put(`${'ABCDEFGHIJK'[position]}5`, heading, look);
  });
  products.forEach((product, position) => {
    const row = firstLoadingRow + position;
    const planRow = firstProductRow + position;
    const rateOf = (column: string): string => `INDEX(Rates[${column}],MATCH($A${row},Rates[Product],0))`;
    putFormula(`A${row}`, `'${planSheetName}'!A${planRow}`, product.name, looks.text);
    putFormula(`B${row}`, rateOf('Press'), product.press, looks.text);
    putFormula(`C${row}`, rateOf('Kiln'), product.kiln, looks.text);
    putFormula(`D${row}`, rateOf('Glaze'), product.glaze, looks.text);
    putFormula(`E${row}`, `'${planSheetName}'!H${planRow}`, product.made, looks.exactAmount);
    putFormula(`F${row}`, `$E${row}*${rateOf('Press hours')}/100`, pressHours(product), looks.exactAmount);
    putFormula(`G${row}`, `$E${row}*${rateOf('Kiln hours')}/100`, kilnHours(product), looks.exactAmount);
    putFormula(`H${row}`, `$E${row}*${rateOf('Glaze litres')}/100`, glazeLitres(product), looks.exactAmount);
    putFormula(`I${row}`, `$E${row}*${rateOf('Body kg')}/1000`, bodyTonnes(product), looks.rate);
    putFormula(`J${row}`, `$E${row}*${rateOf('Gas m3')}`, gasCubicMetres(product), looks.amount);
    putFormula(
      `K${row}`,
      `$E${row}*${rateOf('Packing hours')}/100`,
      packingHours(product),
      looks.exactAmount,
    );
  });
  const totalRow = lastLoadingRow + 1;
  put(`A${totalRow}`, 'All products', looks.totalText);
  paint([`B${totalRow}`, `C${totalRow}`, `D${totalRow}`], looks.totalText);
  const totals: [column: string, value: number][] = [
    ['E', sumOf((product) => product.made)],
    ['F', sumOf(pressHours)],
    ['G', sumOf(kilnHours)],
    ['H', sumOf(glazeLitres)],
    ['I', sumOf(bodyTonnes)],
    ['J', sumOf(gasCubicMetres)],
    ['K', sumOf(packingHours)],
  ];
  totals.forEach(([column, value]) => {
    const range = `${column}${firstLoadingRow}:${column}${lastLoadingRow}`;
    putFormula(`${column}${totalRow}`, `SUM(${range})`, value, looks.total);
  });
  return {
    name: loadingSheetName,
    cells,
    columnWidths: { A: 33, B: 9, C: 9, D: 13, E: 10, F: 10, G: 10, H: 10, I: 11, J: 10, K: 10 },
    rowHeights: { 1: 24, 5: 28 },
    frozenAt: `B${firstLoadingRow}`,
    pageFooter: '&LLoading&CPage &P of &N',
  };
}
