/**
 * Plans of the size of a sheet: 200 rows by 200 columns, seeded, one in ten coefficients filled in.
 */
import type { LinearProgram } from '#solver-core';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';
import { loadHighsOnce, toHighsModel } from '../oracles/highs-reference';
import { loadBuiltCore, type SolverCore } from './built-core';
import { geometricMean, inMilliseconds, median, table, timeOf } from './timing';

const seeds = Array.from({ length: 20 }, (_, k) => k + 1);
const rounds = 5;

/** A section of the report. */
export async function measureSheetPlans(): Promise<string> {
  const core = await loadBuiltCore();
  const highs = await loadHighsOnce();
  const rows: { cold: number; ours: number; theirs: number; iterations: number; isRight: boolean }[] = [];
  for (const seed of seeds) {
    const problem = sheetPlan(core, seed);
    const model = highs.createModel(toHighsModel(highs, problem));
    model.options.set({ output_flag: false, presolve: 'on', solver: 'simplex' });
    const ours: number[] = [];
    const theirs: number[] = [];
    let iterations = 0;
    let isRight = true;
    for (let round = 0; round < rounds; round++) {
      model.clearSolver();
      theirs.push((await timeOf(() => model.run())).milliseconds);
      const { milliseconds, value: result } = await timeOf(() => core.solve(problem));
      ours.push(milliseconds);
      iterations = result.iterations;
      const reference = model.getObjectiveValue();
      isRight &&=
        result.status === 'optimal' && Math.abs(result.objective - reference) <= 1e-7 * Math.abs(reference);
    }
    model.dispose();
    rows.push({ cold: ours[0], ours: median(ours), theirs: median(theirs), iterations, isRight });
  }
  const mean = geometricMean(rows.map(({ ours }) => ours));
  const theirMean = geometricMean(rows.map(({ theirs }) => theirs));
  return [
    `## Plans of 200 × 200, 10 % dense: ${rows.filter(({ isRight }) => isRight).length} of ${rows.length} right`,
    '',
    `Geometric mean: ours ${inMilliseconds(mean)} ms (figure to reach: 50), HiGHS ${inMilliseconds(theirMean)} ms, ratio ${(mean / theirMean).toFixed(2)}.` +
      ` The very first solve of a process, nothing compiled yet, took ${inMilliseconds(rows[0].cold)} ms.`,
    '',
    table(
      ['seed', 'ours ms', 'HiGHS ms', 'ratio', 'iterations'],
      rows.map(({ ours, theirs, iterations }, index) => [
        String(seeds[index]),
        inMilliseconds(ours),
        inMilliseconds(theirs),
        (ours / theirs).toFixed(2),
        String(iterations),
      ]),
    ),
  ].join('\n');
}

/** Products with a profit and a least order, machines with hours; every machine does a tenth of the products. */
function sheetPlan(core: SolverCore, seed: number): LinearProgram {
  const random = new SeededRandom(seed);
  const builder = new core.LinearProgramBuilder({ sense: 'maximise' });
  for (let product = 0; product < 200; product++) {
    const least = random.next() < 0.3 ? random.nextInteger(1, 5) : 0;
    const most = random.next() < 0.5 ? random.nextInteger(20, 200) : Infinity;
    builder.addColumn({ cost: random.nextInteger(50, 900) / 10, lower: least, upper: most });
  }
  for (let machine = 0; machine < 200; machine++) {
    const row = builder.addRow({ lower: -Infinity, upper: random.nextInteger(800, 4000) });
    // Product = machine is always there, so that every product is limited by something.
    for (let product = 0; product < 200; product++) {
      if (product === machine || random.next() < 0.1)
        builder.addEntry(row, product, random.nextInteger(5, 80) / 10);
    }
  }
  return builder.build();
}
