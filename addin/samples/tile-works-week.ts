/**
 * One week of an invented tile works, as its planner keeps it: a sheet with the plan and its limits, a sheet with the
 * loading worked out from it, a sheet with rates, prices and hours in tables.
 *
 * Every stored value is worked out here from the same figures as its formula, in the same order of operations; a test
 * compares them with LibreOffice's own recalculation.
 */
import { absoluteRangeText } from '../domain/sheet/cell-range';
import { products, purchasePrices, resources, weeklyCosts } from './tile-works-figures';
import type { CellLook, SampleCell, SampleSheet, SampleWorkbook } from './sample-workbook';

const planSheet = 'Week plan';
const loadingSheet = 'Loading';
const costSheet = 'Costs';

const ink = '1F3A4D';
const pale = 'EEF3F6';
const looks = {
  title: { isBold: true, fontSize: 16, textColor: ink },
  heading: { isBold: true, textColor: ink, fillColor: pale, hasLineBelow: true, wrapsText: true },
  numberHeading: {
    isBold: true,
    textColor: ink,
    fillColor: pale,
    hasLineBelow: true,
    wrapsText: true,
    isRightAligned: true,
  },
  group: { isItalic: true, textColor: '5A6B75' },
  text: {},
  indented: { indent: 1 },
  amount: { numberFormat: '#,##0' },
  exactAmount: { numberFormat: '#,##0.0' },
  rate: { numberFormat: '0.00' },
  price: { numberFormat: '#,##0.00 "€"' },
  money: { numberFormat: '#,##0 "€"' },
  result: { numberFormat: '#,##0 "€"', isBold: true, fontSize: 12 },
  share: { numberFormat: '0%' },
  date: { numberFormat: 'd mmm yyyy', isRightAligned: true },
  // What the planner types in: the amounts to make.
  decision: { numberFormat: '#,##0.0', fillColor: 'FBF6E4' },
  relation: { isCentred: true },
  total: { numberFormat: '#,##0', isBold: true, hasLineAbove: true },
  totalText: { isBold: true, hasLineAbove: true },
  remark: { isItalic: true, textColor: '5A6B75', fontSize: 9 },
} satisfies Record<string, CellLook>;

const firstProductRow = 7;
const lastProductRow = firstProductRow + products.length - 1;
const firstLoadingRow = 6;
const lastLoadingRow = firstLoadingRow + products.length - 1;
const firstRateRow = 5;
const lastRateRow = firstRateRow + products.length - 1;

/** Monday 30 November 2026 as a day number counted from 1900. */
const weekBeginning = 46356;

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
const sumOf = (value: (product: (typeof products)[number]) => number): number => sum(products.map(value));

/** Money left from a square metre after clay, glaze, gas and packing, as the Costs sheet works it out. */
function contribution(product: (typeof products)[number]): number {
  const [clay, white, colour, none, gas, packing] = purchasePrices.map((input) => input.price);
  const glaze = { 'White glaze': white, 'Colour glaze': colour, 'No glaze': none }[product.glaze];
  return (
    product.price -
    product.bodyKilograms * clay -
    (product.glazeLitres / 100) * glaze -
    product.gasCubicMetres * gas -
    packing
  );
}

const pressHours = (product: (typeof products)[number]): number => (product.made * product.pressHours) / 100;
const kilnHours = (product: (typeof products)[number]): number => (product.made * product.kilnHours) / 100;
const glazeLitres = (product: (typeof products)[number]): number =>
  (product.made * product.glazeLitres) / 100;
const bodyTonnes = (product: (typeof products)[number]): number =>
  (product.made * product.bodyKilograms) / 1000;
const gasCubicMetres = (product: (typeof products)[number]): number => product.made * product.gasCubicMetres;
const packingHours = (product: (typeof products)[number]): number =>
  (product.made * product.packingHours) / 100;

const availableHours = (name: string): number => {
  const resource = resources.find((candidate) => candidate.name === name);
  if (resource === undefined) {
    throw new RangeError(`${name} has no hours.`);
  }
  return resource.shifts * resource.hoursPerShift * resource.running;
};

const fixedCosts = sum(weeklyCosts.map((cost) => cost.amount));

/** Collects a sheet's cells: `put('A1', value, look)` or `putFormula('B1', formula, value, look)`. */
function cellCollector(): {
  cells: Map<string, SampleCell>;
  put: (name: string, value: number | string, look: CellLook, note?: string) => void;
  putFormula: (name: string, formula: string, value: number | string, look: CellLook) => void;
} {
  const cells = new Map<string, SampleCell>();
  return {
    cells,
    put: (name, value, look, note) => {
      cells.set(name, note === undefined ? { value, look } : { value, look, note });
    },
    putFormula: (name, formula, value, look) => {
      cells.set(name, { value, formula, look });
    },
  };
}

interface Limit {
  readonly label: string;
  readonly unit: string;
  readonly needed: { readonly formula: string; readonly value: number };
  readonly relation: '<=' | '>=' | '=';
  readonly available: { readonly formula?: string; readonly value: number };
  readonly note?: string;
  /** A demand and not a capacity: no load is shown. */
  readonly isOrder?: boolean;
}

/** A text is a heading between the limits. */
function weekLimits(): readonly (string | Limit)[] {
  const loadingOf = (column: string, criteriaColumn: string, criterion: string): string =>
    `SUMIF(${loadingSheet}!$${criteriaColumn}$${firstLoadingRow}:$${criteriaColumn}$${lastLoadingRow},"${criterion}",` +
    `${loadingSheet}!$${column}$${firstLoadingRow}:$${column}$${lastLoadingRow})`;
  const loadingTotal = (column: string): string => `${loadingSheet}!${column}${lastLoadingRow + 1}`;
  const planned = `H${firstProductRow}:H${lastProductRow}`;
  const rowOf = (name: string): number =>
    firstProductRow + products.findIndex((product) => product.name === name);
  const madeOf = (name: string): number => products[rowOf(name) - firstProductRow].made;
  const hoursOf = (label: string): { formula: string; value: number } => ({
    formula: `INDEX(Hours[Available],MATCH("${label}",Hours[Resource],0))`,
    value: availableHours(label),
  });
  const fen = ['Fen 30×60 sand, roller kiln', 'Fen 30×60 sand, shuttle kiln'];
  const colouredWall = ['Marl 10×20 sea green', 'Heron 15×15 oxblood', 'Lark 7×30 cobalt crackle'];
  const charcoal = rowOf('Sedge 20×20 charcoal');
  const grey = rowOf('Sedge 20×20 matt grey');
  const sedgeMade = products[grey - firstProductRow].made + products[charcoal - firstProductRow].made;
  return [
    'Presses and kilns',
    {
      label: 'Small presses',
      unit: 'h',
      needed: {
        formula: loadingOf('F', 'B', 'Small'),
        value: sumOf((p) => (p.press === 'Small' ? pressHours(p) : 0)),
      },
      relation: '<=',
      available: hoursOf('Small presses'),
    },
    {
      label: 'Large press',
      unit: 'h',
      needed: {
        formula: loadingOf('F', 'B', 'Large'),
        value: sumOf((p) => (p.press === 'Large' ? pressHours(p) : 0)),
      },
      relation: '<=',
      available: hoursOf('Large press'),
    },
    {
      label: 'Roller kiln',
      unit: 'h',
      needed: {
        formula: loadingOf('G', 'C', 'Roller'),
        value: sumOf((p) => (p.kiln === 'Roller' ? kilnHours(p) : 0)),
      },
      relation: '<=',
      available: hoursOf('Roller kiln'),
    },
    {
      label: 'Shuttle kiln',
      unit: 'h',
      needed: {
        formula: loadingOf('G', 'C', 'Shuttle'),
        value: sumOf((p) => (p.kiln === 'Shuttle' ? kilnHours(p) : 0)),
      },
      relation: '<=',
      available: hoursOf('Shuttle kiln'),
      note: 'One firing less on Thursday: burner service.',
    },
    'Material',
    {
      label: 'White glaze',
      unit: 'l',
      needed: {
        formula: loadingOf('H', 'D', 'White glaze'),
        value: sumOf((p) => (p.glaze === 'White glaze' ? glazeLitres(p) : 0)),
      },
      relation: '<=',
      available: { formula: '340+480', value: 820 },
      note: '340 l in the vat, 480 l mixed on Monday.',
    },
    {
      label: 'Colour glaze',
      unit: 'l',
      needed: {
        formula: loadingOf('H', 'D', 'Colour glaze'),
        value: sumOf((p) => (p.glaze === 'Colour glaze' ? glazeLitres(p) : 0)),
      },
      relation: '<=',
      available: { value: 360 },
    },
    {
      label: 'Clay body',
      unit: 't',
      needed: { formula: loadingTotal('I'), value: sumOf(bodyTonnes) },
      relation: '<=',
      available: { value: 68 },
    },
    {
      label: 'Gas, contract',
      unit: 'm³',
      needed: { formula: loadingTotal('J'), value: sumOf(gasCubicMetres) },
      relation: '<=',
      available: { value: 9600 },
    },
    'Hands and yard',
    {
      label: 'Sorting and packing',
      unit: 'h',
      needed: { formula: loadingTotal('K'), value: sumOf(packingHours) },
      relation: '<=',
      available: hoursOf('Sorting and packing'),
    },
    {
      label: 'Pallet places',
      unit: 'pallets',
      needed: {
        formula: `SUMPRODUCT(${planned}/Rates[Pallet m2])`,
        value: sumOf((p) => p.made / p.palletSquareMetres),
      },
      relation: '<=',
      available: { value: 100 },
    },
    'Orders over several products',
    {
      label: 'Fen 30×60 sand, both kilns',
      unit: 'm²',
      needed: { formula: fen.map((name) => `H${rowOf(name)}`).join('+'), value: sum(fen.map(madeOf)) },
      isOrder: true,
      relation: '>=',
      available: { value: 420 },
    },
    {
      label: 'Coloured wall tiles, spring range',
      unit: 'm²',
      needed: {
        formula: `SUM(${colouredWall.map((name) => `H${rowOf(name)}`).join(',')})`,
        value: sum(colouredWall.map(madeOf)),
      },
      isOrder: true,
      relation: '>=',
      available: { value: 705 },
      note: 'Promised to the showrooms for this week; last week’s plan is short of it.',
    },
    {
      label: 'Unglazed Quay, riverside path',
      unit: 'm²',
      needed: { formula: `H${rowOf('Quay 30×30 unglazed')}`, value: madeOf('Quay 30×30 unglazed') },
      isOrder: true,
      relation: '=',
      available: { value: 180 },
    },
    {
      label: 'Charcoal within 40 % of Sedge',
      unit: 'm²',
      needed: { formula: `H${charcoal}`, value: products[charcoal - firstProductRow].made },
      isOrder: true,
      relation: '<=',
      available: { formula: `40%*(H${grey}+H${charcoal})`, value: 0.4 * sedgeMade },
    },
  ];
}

const firstLimitRow = lastProductRow + 4;
const lastLimitRow = firstLimitRow + weekLimits().length - 1;

function weekPlanSheet(): SampleSheet {
  const { cells, put, putFormula } = cellCollector();
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
  ['B', 'C', 'D', 'E'].forEach((column) => {
    cells.set(`${column}${totalRow}`, { value: null, look: looks.totalText });
  });
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
  ['C', 'D'].forEach((column) => {
    cells.set(`${column}${headingRow}`, { value: null, look: looks.heading });
  });
  put(`E${headingRow}`, 'Load', looks.numberHeading);
  put(`F${headingRow}`, 'Needed', looks.numberHeading);
  put(`G${headingRow}`, 'Relation', { ...looks.heading, isCentred: true });
  put(`H${headingRow}`, 'Available', looks.numberHeading);
  weekLimits().forEach((limit, position) => {
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
    name: planSheet,
    cells,
    columnWidths: { A: 33, B: 13, C: 11, D: 13, E: 12, F: 12, G: 12, H: 12, I: 3 },
    rowHeights: { 1: 24, 6: 28 },
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

function loadingSheetOf(): SampleSheet {
  const { cells, put, putFormula } = cellCollector();
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
    putFormula(`A${row}`, `'${planSheet}'!A${planRow}`, product.name, looks.text);
    putFormula(`B${row}`, rateOf('Press'), product.press, looks.text);
    putFormula(`C${row}`, rateOf('Kiln'), product.kiln, looks.text);
    putFormula(`D${row}`, rateOf('Glaze'), product.glaze, looks.text);
    putFormula(`E${row}`, `'${planSheet}'!H${planRow}`, product.made, looks.exactAmount);
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
  ['B', 'C', 'D'].forEach((column) => {
    cells.set(`${column}${totalRow}`, { value: null, look: looks.totalText });
  });
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
    name: loadingSheet,
    cells,
    columnWidths: { A: 33, B: 9, C: 9, D: 13, E: 10, F: 10, G: 10, H: 10, I: 11, J: 10, K: 10 },
    rowHeights: { 1: 24, 5: 28 },
    frozenAt: `B${firstLoadingRow}`,
    pageFooter: '&LLoading&CPage &P of &N',
  };
}

function costSheetOf(): SampleSheet {
  const { cells, put, putFormula } = cellCollector();
  const firstPriceRow = lastRateRow + 4;
  const lastPriceRow = firstPriceRow + purchasePrices.length - 1;
  const rowOfPrice = (input: string): number =>
    firstPriceRow + purchasePrices.findIndex((candidate) => candidate.input === input);
  const firstHoursRow = lastPriceRow + 4;
  const lastHoursRow = firstHoursRow + resources.length - 1;
  const firstCostRow = lastHoursRow + 4;
  const lastCostRow = firstCostRow + weeklyCosts.length - 1;
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
  put(`A${lastCostRow + 1}`, 'Fixed costs', looks.totalText);
  putFormula(`B${lastCostRow + 1}`, `SUM(B${firstCostRow}:B${lastCostRow})`, fixedCosts, {
    ...looks.total,
    numberFormat: looks.money.numberFormat,
  });

  return {
    name: costSheet,
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

/** The range of the week plan's sheet as a defined name refers to it; rows as numbered on the sheet. */
function planRange(firstColumn: number, firstRow: number, lastColumn: number, lastRow: number): string {
  return absoluteRangeText({
    sheet: planSheet,
    top: firstRow - 1,
    left: firstColumn,
    bottom: lastRow - 1,
    right: lastColumn,
  });
}

/** The whole workbook, with the plan stated in it by names. */
export function tileWorksWeek(): SampleWorkbook {
  const [a, b, c, f, g, h] = [0, 1, 2, 5, 6, 7];
  const costs = costSheetOf();
  const fixedCostsCell = [...costs.cells]
    .find(([, cell]) => cell.value === 'Fixed costs')?.[0]
    .replace('A', '');
  return {
    title: 'Week plan of a tile works',
    sheets: [weekPlanSheet(), loadingSheetOf(), costs],
    names: {
      FixedCosts: `${costSheet}!$B$${fixedCostsCell ?? ''}`,
      'Week.Decision': planRange(h, firstProductRow, h, lastProductRow),
      'Week.DecisionLabel': planRange(a, firstProductRow, a, lastProductRow),
      'Week.Lower': planRange(f, firstProductRow, f, lastProductRow),
      'Week.Upper': planRange(g, firstProductRow, g, lastProductRow),
      'Week.Objective': planRange(b, 3, b, 3),
      'Week.Sense': planRange(c, 3, c, 3),
      'Week.Constraint': planRange(f, firstLimitRow, h, lastLimitRow),
      'Week.ConstraintLabel': planRange(a, firstLimitRow, a, lastLimitRow),
    },
  };
}
