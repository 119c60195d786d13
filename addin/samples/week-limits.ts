/**
 * The constraint rows of the tile works' week, under headings, in formula form: what is needed, relation, what there is.
 */
import { products } from './tile-works-figures';
import {
  firstLoadingRow,
  firstProductRow,
  lastLoadingRow,
  lastProductRow,
  loadingSheetName,
} from './sheet-layout';
import {
  availableHours,
  bodyTonnes,
  gasCubicMetres,
  glazeLitres,
  kilnHours,
  packingHours,
  pressHours,
  sum,
  sumOf,
} from './week-arithmetic';

export interface Limit {
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
export function weekLimits(): readonly (string | Limit)[] {
  const loadingOf = (column: string, criteriaColumn: string, criterion: string): string =>
    `SUMIF(${loadingSheetName}!$${criteriaColumn}$${firstLoadingRow}:$${criteriaColumn}$${lastLoadingRow},"${criterion}",` +
    `${loadingSheetName}!$${column}$${firstLoadingRow}:$${column}$${lastLoadingRow})`;
  const loadingTotal = (column: string): string => `${loadingSheetName}!${column}${lastLoadingRow + 1}`;
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
