/**
 * Plans of the size of a sheet: 200 products by 200 machines, seeded, with a share of the coefficients filled in.
 */
import type { LinearProgram } from '#solver-core';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';
import type { SolverCore } from './built-core';

const size = 200;

/** Products with a profit and a least order, machines with hours, of which each product takes some. */
export function sheetPlan(core: SolverCore, seed: number, density: number): LinearProgram {
  const random = new SeededRandom(seed);
  const builder = new core.LinearProgramBuilder({ sense: 'maximise' });
  for (let product = 0; product < size; product++) {
    const least = random.next() < 0.3 ? random.nextInteger(1, 5) : 0;
    const most = random.next() < 0.5 ? random.nextInteger(20, 200) : Infinity;
    builder.addColumn({ cost: random.nextInteger(50, 900) / 10, lower: least, upper: most });
  }
  for (let machine = 0; machine < size; machine++) {
    // The hours grow with what the machine is asked for, so that the least orders can be met at every density.
    const hours = random.nextInteger(800, 4000) * Math.max(1, density * 10);
    const row = builder.addRow({ lower: -Infinity, upper: hours });
    // Product = machine is always there, so that every product is limited by something.
    for (let product = 0; product < size; product++) {
      if (product === machine || random.next() < density) {
        builder.addEntry(row, product, random.nextInteger(5, 80) / 10);
      }
    }
  }
  return builder.build();
}

export type ChangedNumber =
  | { readonly kind: 'cost'; readonly column: number; readonly value: number }
  | { readonly kind: 'right side'; readonly row: number; readonly value: number }
  | { readonly kind: 'coefficient'; readonly row: number; readonly column: number; readonly value: number };

/** One number of the plan, up to a tenth more or less than it was; and the plan with it. */
export function withOneNumberChanged(
  plan: LinearProgram,
  kind: ChangedNumber['kind'],
  random: SeededRandom,
): { plan: LinearProgram; change: ChangedNumber } {
  const factor = 0.9 + 0.2 * random.next();
  switch (kind) {
    case 'cost': {
      const column = random.nextInteger(0, plan.columnCount - 1);
      const cost = Float64Array.from(plan.cost);
      cost[column] *= factor;
      return { plan: { ...plan, cost }, change: { kind, column, value: cost[column] } };
    }
    case 'right side': {
      const row = random.nextInteger(0, plan.rowCount - 1);
      const rowUpper = Float64Array.from(plan.rowUpper);
      rowUpper[row] *= factor;
      return { plan: { ...plan, rowUpper }, change: { kind, row, value: rowUpper[row] } };
    }
    case 'coefficient': {
      const { columnStart, rowIndex } = plan.matrix;
      const entry = random.nextInteger(0, rowIndex.length - 1);
      let column = 0;
      while (columnStart[column + 1] <= entry) column++;
      const value = Float64Array.from(plan.matrix.value);
      value[entry] *= factor;
      return {
        plan: { ...plan, matrix: { ...plan.matrix, value } },
        change: { kind, row: rowIndex[entry], column, value: value[entry] },
      };
    }
  }
}
