/**
 * The sheet of rates, prices, hours and fixed costs, the first three as tables that formulas refer to by name.
 */
import { collectCells } from './cell-collector';
import { looks } from './sample-looks';
import type { SampleSheet } from './sample-workbook';
import {
  costSheetName,
  firstCostRow,
  firstHoursRow,
  firstPriceRow,
  firstRateRow,
  fixedCostsRow,
  lastCostRow,
  lastHoursRow,
  lastPriceRow,
  lastRateRow,
} from './sheet-layout';
import { products, purchasePrices, resources, weeklyCosts } from './tile-works-figures';
import { availableHours, contribution, fixedCosts } from './week-arithmetic';

export function costSheet(): SampleSheet {
  const { cells, put, putFormula } = collectCells();
  const rowOfPrice = (input: string): number =>
    firstPriceRow + purchasePrices.findIndex((candidate) => candidate.input === input);
  const thisRow = (column: string): string => `Rates[[#This Row],[${column}]]`;
  const contributionFormula = [
    thisRow('Price'),
    `${thisRow('Body kg')}*$C$${rowOfPrice('Clay body')}`,
    `${thisRow('Glaze litres')}/100*INDEX(Purchases[Price],MATCH(${thisRow('Glaze')},Purchases[Input],0))`,
    `${thisRow('Gas m3')}*$C$${rowOfPrice('Gas')}`,
    `$C$${rowOfPrice('Packing')}`,
  ].join('-');
  const availableFormula = ['Shifts', 'Hours a shift', 'Running']
    .map((column) => `Hours[[#This Row],[${column}]]`)
    .join('*');

  put('A1', 'Rates, prices and hours', looks.title);
  put('A2', 'Hours and glaze per 100 m²; clay, gas, price and contribution per m².', looks.remark);
  const rateColumns = [
    'Product',
    'Press',
    'Kiln',
    'Glaze',
    'Price',
    'Body kg',
    'Glaze litres',
    'Press hours',
    'Kiln hours',
    'Gas m3',
    'Packing hours',
    'Pallet m2',
    'Contribution',
  ];
  rateColumns.forEach((heading, position) => {
    put(`${'ABCDEFGHIJKLM'[position]}4`, heading, position < 4 ? looks.heading : looks.numberHeading);
  });
  products.forEach((product, position) => {
    const row = firstRateRow + position;
    put(`A${row}`, product.name, looks.text);
    put(`B${row}`, product.press, looks.text);
    put(`C${row}`, product.kiln, looks.text);
    put(`D${row}`, product.glaze, looks.text);
    put(`E${row}`, product.price, looks.price);
    put(`F${row}`, product.bodyKilograms, looks.exactAmount);
    put(`G${row}`, product.glazeLitres, looks.exactAmount);
    put(`H${row}`, product.pressHours, looks.rate);
    put(`I${row}`, product.kilnHours, looks.rate);
    put(`J${row}`, product.gasCubicMetres, looks.rate);
    put(`K${row}`, product.packingHours, looks.rate);
    put(`L${row}`, product.palletSquareMetres, looks.amount);
    putFormula(`M${row}`, contributionFormula, contribution(product), looks.price);
  });

  ['Input', 'Unit', 'Price'].forEach((heading, position) => {
    put(
      `${'ABC'[position]}${firstPriceRow - 1}`,
      heading,
      position < 2 ? looks.heading : looks.numberHeading,
    );
  });
  purchasePrices.forEach((input, position) => {
    const row = firstPriceRow + position;
    put(`A${row}`, input.input, looks.text);
    put(`B${row}`, input.unit, looks.text);
    put(`C${row}`, input.price, looks.price);
  });

  ['Resource', 'Shifts', 'Hours a shift', 'Running', 'Available'].forEach((heading, position) => {
    put(
      `${'ABCDE'[position]}${firstHoursRow - 1}`,
      heading,
      position < 1 ? looks.heading : looks.numberHeading,
    );
  });
  resources.forEach((resource, position) => {
    const row = firstHoursRow + position;
    put(`A${row}`, resource.name, looks.text);
    put(`B${row}`, resource.shifts, looks.amount);
    put(`C${row}`, resource.hoursPerShift, looks.exactAmount);
    put(`D${row}`, resource.running, looks.share);
    putFormula(`E${row}`, availableFormula, availableHours(resource.name), looks.exactAmount);
  });

  put(`A${firstCostRow - 1}`, 'Costs of every week', looks.heading);
  put(`B${firstCostRow - 1}`, 'Amount', looks.numberHeading);
  weeklyCosts.forEach((cost, position) => {
    put(`A${firstCostRow + position}`, cost.name, looks.text);
    put(`B${firstCostRow + position}`, cost.amount, looks.money);
  });
  put(`A${fixedCostsRow}`, 'Fixed costs', looks.totalText);
  putFormula(`B${fixedCostsRow}`, `SUM(B${firstCostRow}:B${lastCostRow})`, fixedCosts, {
    ...looks.total,
    numberFormat: looks.money.numberFormat,
  });

  return {
    name: costSheetName,
    cells,
    columnWidths: { A: 33, B: 11, C: 12, D: 13, E: 11, F: 9, G: 11, H: 11, I: 11, J: 9, K: 12, L: 10, M: 13 },
    rowHeights: { 1: 24, 4: 28 },
    frozenAt: `B${firstRateRow}`,
    tables: [
      {
        name: 'Rates',
        range: `A4:M${lastRateRow}`,
        columnFormulas: { Contribution: contributionFormula },
      },
      { name: 'Purchases', range: `A${firstPriceRow - 1}:C${lastPriceRow}` },
      {
        name: 'Hours',
        range: `A${firstHoursRow - 1}:E${lastHoursRow}`,
        columnFormulas: { Available: availableFormula },
      },
    ],
    pageFooter: '&LRates, prices and hours&CPage &P of &N',
  };
}
