/**
 * The whole way on the sample workbook, from the bytes of the file to the best plan, against `highs` on the same week
 * written down from the works' figures: none of the sheet's formulas, and nothing of ours, stands between.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';
import loadHighs from 'highs';
import { solve, type OptimalResult } from '#solver-core';
import { XlsxWorkbook } from '../../../addin/adapters/xlsx-file/xlsx-workbook';
import { buildLinearProgram } from '../../../addin/domain/model-from-sheet/build-linear-program';
import { readPlan } from '../../../addin/domain/model-from-sheet/read-plan';
import type { SheetModel } from '../../../addin/domain/model-from-sheet/sheet-model';
import {
  products,
  purchasePrices,
  weeklyCosts,
  type Product,
} from '../../../addin/samples/tile-works-figures';
import { checkoutFolder } from '../../support/needs';

const priceOf = (input: string): number =>
  purchasePrices.find((price) => price.input === input)?.price ?? NaN;

const contributionOf = (product: Product): number =>
  product.price -
  product.bodyKilograms * priceOf('Clay body') -
  (product.glazeLitres / 100) * priceOf(product.glaze) -
  product.gasCubicMetres * priceOf('Gas') -
  priceOf('Packing');

const fixedCosts = weeklyCosts.reduce((total, cost) => total + cost.amount, 0);

/** The limits in the order of the sheet; hours available worked out by hand from shifts × hours × running. */
const limits: readonly [needs: (product: Product) => number, relation: '<=' | '>=' | '=', amount: number][] =
  [
    [(p) => (p.press === 'Small' ? p.pressHours / 100 : 0), '<=', 46.8],
    [(p) => (p.press === 'Large' ? p.pressHours / 100 : 0), '<=', 50.4],
    [(p) => (p.kiln === 'Roller' ? p.kilnHours / 100 : 0), '<=', 98.7],
    [(p) => (p.kiln === 'Shuttle' ? p.kilnHours / 100 : 0), '<=', 66.5],
    [(p) => (p.glaze === 'White glaze' ? p.glazeLitres / 100 : 0), '<=', 820],
    [(p) => (p.glaze === 'Colour glaze' ? p.glazeLitres / 100 : 0), '<=', 360],
    [(p) => p.bodyKilograms / 1000, '<=', 68],
    [(p) => p.gasCubicMetres, '<=', 9600],
    [(p) => p.packingHours / 100, '<=', 151.8],
    [(p) => 1 / p.palletSquareMetres, '<=', 100],
    [(p) => (p.name.startsWith('Fen') ? 1 : 0), '>=', 420],
    [(p) => (p.press === 'Small' && p.glaze === 'Colour glaze' ? 1 : 0), '>=', 705],
    [(p) => (p.name.endsWith('unglazed') ? 1 : 0), '=', 180],
    [(p) => (p.name.endsWith('charcoal') ? 0.6 : p.name.startsWith('Sedge') ? -0.4 : 0), '<=', 0],
  ];

/** The week in the LP format of `highs`. */
function weekAsText(): string {
  const sum = (coefficientOf: (product: Product) => number): string =>
    products
      .map((product, position) => [coefficientOf(product), position] as const)
      .filter(([coefficient]) => coefficient !== 0)
      .map(
        ([coefficient, position]) => `${coefficient < 0 ? '-' : '+'} ${Math.abs(coefficient)} x${position}`,
      )
      .join(' ');
  return [
    'Maximize',
    ` contribution: ${sum(contributionOf)}`,
    'Subject To',
    ...limits.map(([needs, relation, amount], row) => ` limit${row}: ${sum(needs)} ${relation} ${amount}`),
    'Bounds',
    ...products.map(
      (p, position) => ` ${Math.max(0, p.ordersLessStock)} <= x${position} <= ${p.sellsAtMost}`,
    ),
    'End',
  ].join('\n');
}

async function readWeek(): Promise<SheetModel> {
  const file = path.join(checkoutFolder, 'addin', 'samples', 'week-plan.xlsx');
  const workbook = await XlsxWorkbook.open(readFileSync(file), 'week-plan.xlsx');
  const { model, issues } = readPlan(await workbook.read(), 'Week', { now: 46357 });
  expect(issues).toEqual([]);
  if (model === null) {
    throw new Error('The sample has no plan that can be solved.');
  }
  return model;
}

describe('the best week of the sample', () => {
  let model: SheetModel;
  let ours: OptimalResult;
  let reference: Awaited<ReturnType<Awaited<ReturnType<typeof loadHighs>>['solve']>>;

  beforeAll(async () => {
    model = await readWeek();
    const result = solve(buildLinearProgram(model).problem);
    if (result.status !== 'optimal') {
      throw new Error(`The sample ended ${result.status}.`);
    }
    ours = result;
    reference = (await loadHighs()).solve(weekAsText());
  });

  it('is read from the sheet without a warning, with the labels that the planner sees', () => {
    expect(model.decisions.map((decision) => decision.label)).toEqual(
      products.map((product) => product.name),
    );
    expect(model.constraintSets.flatMap((set) => set.rows)).toHaveLength(limits.length);
    expect(model.constraintSets[0].rows[2].label).toBe('Roller kiln');
  });

  it('is worth what highs says, and makes the same amounts: this optimum is the only one', () => {
    expect(reference.Status).toBe('Optimal');
    expect(Math.abs(ours.objective - (reference.ObjectiveValue - fixedCosts))).toBeLessThan(1e-6);
    products.forEach((_product, position) => {
      const column = reference.Columns[`x${position}`];
      expect(Math.abs(ours.x[position] - ('Primal' in column ? column.Primal : NaN))).toBeLessThan(1e-6);
    });
  });

  it('has the dual values and reduced costs that highs says', () => {
    limits.forEach((_limit, row) => {
      const { Dual: dual } = reference.Rows[row] as { Dual: number };
      expect(Math.abs(ours.rowDuals[row] - dual)).toBeLessThan(1e-6);
    });
    products.forEach((_product, position) => {
      const { Dual: dual } = reference.Columns[`x${position}`] as { Dual: number };
      expect(Math.abs(ours.reducedCosts[position] - dual)).toBeLessThan(1e-6);
    });
  });

  it('is worth looking at: rows that bind, rows with slack, a product left out, last week’s plan bettered', () => {
    const binding = Array.from(ours.rowDuals).filter((dual) => dual !== 0).length;
    expect(binding).toBeGreaterThanOrEqual(5);
    expect(binding).toBeLessThan(limits.length);
    const leftOut = products
      .filter((_product, position) => ours.x[position] === 0)
      .map((product) => product.name);
    expect(leftOut).toEqual(['Heron 15×15 oxblood']);
    const lastWeek = products.reduce((total, p) => total + contributionOf(p) * p.made, 0) - fixedCosts;
    expect(ours.objective).toBeGreaterThan(lastWeek + 5000);
  });
});
