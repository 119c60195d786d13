/**
 * Seeded problems of some hundred rows in the shapes that plans have: shipping, stock over weeks, blending, and a
 * sparse mixture of everything.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';

export const structures = ['shipping', 'stock', 'blending', 'mixture'] as const;

export type Structure = (typeof structures)[number];

export function structuredProgram(seed: number, structure: Structure): LinearProgram {
  const random = new SeededRandom(seed);
  switch (structure) {
    case 'shipping':
      return shipping(random);
    case 'stock':
      return stock(random);
    case 'blending':
      return blending(random);
    case 'mixture':
      return mixture(random);
  }
}

/** Works to yards, amounts in whole lots on both sides: heavily degenerate. One in five asks for more than there is. */
function shipping(random: SeededRandom): LinearProgram {
  const [works, yards] = [random.nextInteger(4, 12), random.nextInteger(6, 25)];
  const builder = new LinearProgramBuilder({ sense: 'minimise' });
  const demand = Array.from({ length: yards }, () => 10 * random.nextInteger(1, 6));
  const supply = new Array<number>(works).fill(0);
  demand.forEach((amount) => (supply[random.nextInteger(0, works - 1)] += amount));
  if (random.next() < 0.2) supply[0] -= 10;
  const from = supply.map((amount) => builder.addRow({ lower: -Infinity, upper: Math.max(amount, 0) }));
  const to = demand.map((amount) => builder.addRow({ lower: amount, upper: Infinity }));
  for (const work of from) {
    for (const yard of to) {
      if (random.next() < 0.15) continue;
      const route = builder.addColumn({ cost: random.nextInteger(1, 9) });
      builder.addEntry(work, route, 1);
      builder.addEntry(yard, route, 1);
    }
  }
  return builder.build();
}

/** Made, kept and sold week by week: long chains of equations, boxes, a final stock that is ranged. */
function stock(random: SeededRandom): LinearProgram {
  const [products, weeks] = [random.nextInteger(2, 8), random.nextInteger(6, 26)];
  const builder = new LinearProgramBuilder({ sense: 'maximise' });
  const hours = Array.from({ length: weeks }, () =>
    builder.addRow({ lower: -Infinity, upper: random.nextInteger(50, 90) * products }),
  );
  for (let product = 0; product < products; product++) {
    let before = builder.addColumn({ lower: 20, upper: 20 });
    const [rate, price] = [random.nextInteger(5, 25) / 10, random.nextInteger(80, 200) / 10];
    for (let week = 0; week < weeks; week++) {
      const made = builder.addColumn({ cost: -price / 3, upper: random.nextInteger(20, 80) });
      const sold = builder.addColumn({
        cost: price,
        lower: random.nextInteger(0, 5),
        upper: random.nextInteger(10, 60),
      });
      const kept = builder.addColumn({ cost: -0.1 });
      const balance = builder.addRow({ lower: 0, upper: 0 });
      builder.addEntry(balance, before, 1);
      builder.addEntry(balance, made, 1);
      builder.addEntry(balance, sold, -1);
      builder.addEntry(balance, kept, -1);
      builder.addEntry(hours[week], made, rate);
      before = kept;
    }
    const finalStock = builder.addRow({ lower: 5, upper: 30 });
    builder.addEntry(finalStock, before, 1);
  }
  return builder.build();
}

/** Glazes from raw materials: shares between ends, as rows like Σ (share_k − end) · amount, in tenths of a percent. */
function blending(random: SeededRandom): LinearProgram {
  const [materials, glazes, oxides] = [
    random.nextInteger(5, 15),
    random.nextInteger(2, 7),
    random.nextInteger(2, 6),
  ];
  const builder = new LinearProgramBuilder({ sense: 'minimise' });
  const shares = Array.from({ length: materials }, () =>
    Array.from({ length: oxides }, () => random.nextInteger(0, 600) / 1000),
  );
  const stores = shares.map(() => builder.addRow({ lower: -Infinity, upper: random.nextInteger(100, 900) }));
  for (let glaze = 0; glaze < glazes; glaze++) {
    const amounts = shares.map((_, material) => {
      const amount = builder.addColumn({ cost: random.nextInteger(10, 90) / 10 });
      builder.addEntry(stores[material], amount, 1);
      return amount;
    });
    const order = random.nextInteger(20, 80);
    const total = builder.addRow({ lower: order, upper: order });
    amounts.forEach((amount) => builder.addEntry(total, amount, 1));
    for (let oxide = 0; oxide < oxides; oxide++) {
      const mean = shares.reduce((sum, share) => sum + share[oxide], 0) / materials;
      const least = builder.addRow({ lower: 0, upper: Infinity });
      const most = builder.addRow({ lower: -Infinity, upper: 0 });
      amounts.forEach((amount, material) => {
        builder.addEntry(least, amount, shares[material][oxide] - 0.9 * mean);
        builder.addEntry(most, amount, shares[material][oxide] - 1.1 * mean);
      });
    }
  }
  return builder.build();
}

/** Sparse rows of every kind over columns of every kind, sizes of rows and columns from 1/64 to 64. */
function mixture(random: SeededRandom): LinearProgram {
  const [rows, columns] = [random.nextInteger(20, 120), random.nextInteger(20, 160)];
  const builder = new LinearProgramBuilder({ sense: random.pick(['minimise', 'maximise']) });
  const unit = (): number => 2 ** random.nextInteger(-6, 6);
  const point: number[] = [];
  for (let column = 0; column < columns; column++) {
    const size = unit();
    const at = random.nextInteger(-3, 12) * size;
    point.push(at);
    const kind = random.nextInteger(0, 9);
    builder.addColumn({
      cost: random.nextInteger(-9, 9) / size,
      lower: kind === 0 ? -Infinity : at - random.nextInteger(0, 4) * size,
      upper: kind <= 2 ? Infinity : at + random.nextInteger(0, 9) * size,
    });
  }
  for (let row = 0; row < rows; row++) {
    const size = unit();
    const entries = Array.from({ length: random.nextInteger(1, 8) }, () => {
      const column = random.nextInteger(0, columns - 1);
      return [column, (random.nextInteger(1, 40) * random.pick([-1, 1]) * size) / 8] as const;
    });
    const activity = entries.reduce((sum, [column, value]) => sum + value * point[column], 0);
    const [below, above] = [random.nextInteger(0, 9) * size, random.nextInteger(0, 9) * size];
    const place = builder.addRow(
      random.pick([
        { lower: activity, upper: activity },
        { lower: activity - below, upper: Infinity },
        { lower: -Infinity, upper: activity + above },
        { lower: activity - below, upper: activity + above },
      ]),
    );
    entries.forEach(([column, value]) => builder.addEntry(place, column, value));
  }
  return builder.build();
}
