/**
 * Plans of 200 × 200 at four densities: solved from nothing, and solved again from the last basis after one number
 * was changed, as when a planner types.
 */
import type { Highs, Model } from 'highs';
import type { LinearProgram, OptimalResult } from '#solver-core';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';
import { loadHighsOnce, toHighsModel } from '../oracles/highs-reference';
import { loadBuiltCore, type SolverCore } from './built-core';
import { sheetPlan, withOneNumberChanged, type ChangedNumber } from './sheet-plan';
import { geometricMean, inMilliseconds, least, median, quantile, table, timeOf } from './timing';

const seeds = [1, 2, 3, 4, 5, 6];
const rounds = 12;
const changesPerPlan = 25;
/** Solved over and over before anything is timed. */
const warmUpMilliseconds = 3_000;
/** Figures to reach in milliseconds (median, warm), by density; for changes only where one is stated. */
const densities = [
  { share: 0.05, figure: 5, changedFigure: '2' },
  { share: 0.1, figure: 5, changedFigure: '2' },
  { share: 0.3, figure: 15, changedFigure: '' },
  { share: 1, figure: 15, changedFigure: '' },
];
const kinds: readonly ChangedNumber['kind'][] = ['cost', 'right side', 'coefficient'];

interface Times {
  readonly ours: number[];
  readonly theirs: number[];
}

/** Sections of the report. */
export async function measureSheetPlans(): Promise<string> {
  const core = await loadBuiltCore();
  const highs = await loadHighsOnce();
  const first = await timeOf(() => core.solve(sheetPlan(core, 1, 0.1)));
  warm(core, highs);
  const solves: string[][] = [];
  const changes: string[][] = [];
  for (const { share, figure, changedFigure } of densities) {
    const plans = seeds.map((seed) => sheetPlan(core, seed, share));
    const measured = [];
    for (const plan of plans) measured.push(await measureFromNothing(core, highs, plan));
    solves.push(rowOfSolves(share, figure, measured));
    for (const kind of kinds) {
      const times: Times = { ours: [], theirs: [] };
      for (const [index, plan] of plans.entries()) {
        await measureChanges(core, highs, plan, kind, seeds[index], times);
      }
      changes.push([
        `${100 * share} %, ${kind}`,
        ...[times.ours, times.theirs].flatMap((of) => [median(of), quantile(of, 0.9)].map(inMilliseconds)),
        changedFigure,
      ]);
    }
    process.stderr.write(`plans at ${100 * share} %\n`);
  }
  return [
    '## Plans of 200 × 200',
    '',
    `${seeds.length} seeded plans a density, ${rounds} rounds each, warm; geometric means over the plans. Every answer agrees with ` +
      `HiGHS to 1e-7. The very first solve of a process, nothing compiled yet, took ${inMilliseconds(first.milliseconds)} ms (10 %).`,
    '',
    table(
      [
        'density',
        'ours ms, median',
        'HiGHS ms, median',
        'ours ms, least',
        'HiGHS ms, least',
        'ratio of the least',
        'worst plan’s ratio',
        'iterations, mean',
        'figure to reach ms',
      ],
      solves,
    ),
    '',
    '## Solved again after one changed number',
    '',
    `From the basis of the solve before, ${changesPerPlan} changes by up to a tenth after each other in each of the same plans; HiGHS likewise from its own basis. Every answer agrees to 1e-7.`,
    '',
    table(
      [
        'density, what changed',
        'ours ms, median',
        'ours ms, 90th percentile',
        'HiGHS ms, median',
        'HiGHS ms, 90th percentile',
        'figure to reach ms',
      ],
      changes,
    ),
  ].join('\n');
}

function warm(core: SolverCore, highs: Highs): void {
  const plans = densities.map(({ share }) => sheetPlan(core, 99, share));
  for (const begun = performance.now(); performance.now() - begun < warmUpMilliseconds;) {
    for (const plan of plans) {
      const result = solveOptimally(core, plan);
      core.solve(plan, { startBasis: result.basis });
      modelOf(highs, plan).run();
    }
  }
}

function modelOf(highs: Highs, plan: LinearProgram): Model {
  const model = highs.createModel(toHighsModel(highs, plan));
  model.options.set({ output_flag: false, presolve: 'on', solver: 'simplex' });
  return model;
}

function solveOptimally(
  core: SolverCore,
  plan: LinearProgram,
  startBasis?: OptimalResult['basis'],
): OptimalResult {
  const result = core.solve(plan, startBasis === undefined ? {} : { startBasis });
  if (result.status !== 'optimal') throw new Error(`a plan ended ${result.status}`);
  return result;
}

function assertSame(result: OptimalResult, model: Model): void {
  const reference = model.getObjectiveValue();
  if (!(Math.abs(result.objective - reference) <= 1e-7 * Math.abs(reference))) {
    throw new Error(`a plan ended at ${result.objective}, by HiGHS ${reference}`);
  }
}

async function measureFromNothing(
  core: SolverCore,
  highs: Highs,
  plan: LinearProgram,
): Promise<Times & { iterations: number }> {
  const times: Times = { ours: [], theirs: [] };
  const model = modelOf(highs, plan);
  let iterations = 0;
  for (let round = 0; round < rounds; round++) {
    model.clearSolver();
    times.theirs.push((await timeOf(() => model.run())).milliseconds);
    const { milliseconds, value: result } = await timeOf(() => solveOptimally(core, plan));
    times.ours.push(milliseconds);
    assertSame(result, model);
    iterations = result.iterations;
  }
  model.dispose();
  return { ...times, iterations };
}

function rowOfSolves(
  share: number,
  figure: number,
  measured: readonly (Times & { iterations: number })[],
): string[] {
  const meanOf = (take: (times: Times) => number): number => geometricMean(measured.map(take));
  const ratios = measured.map(({ ours, theirs }) => least(ours) / least(theirs));
  return [
    `${100 * share} %`,
    inMilliseconds(meanOf(({ ours }) => median(ours))),
    inMilliseconds(meanOf(({ theirs }) => median(theirs))),
    inMilliseconds(meanOf(({ ours }) => least(ours))),
    inMilliseconds(meanOf(({ theirs }) => least(theirs))),
    geometricMean(ratios).toFixed(2),
    `${Math.max(...ratios).toFixed(2)} (seed ${seeds[ratios.indexOf(Math.max(...ratios))]})`,
    (measured.reduce((sum, { iterations }) => sum + iterations, 0) / measured.length).toFixed(0),
    String(figure),
  ];
}

async function measureChanges(
  core: SolverCore,
  highs: Highs,
  plan: LinearProgram,
  kind: ChangedNumber['kind'],
  seed: number,
  times: Times,
): Promise<void> {
  const random = new SeededRandom(seed);
  const model = modelOf(highs, plan);
  model.run();
  let current = plan;
  let { basis } = solveOptimally(core, plan);
  for (let k = 0; k < changesPerPlan; k++) {
    const changed = withOneNumberChanged(current, kind, random);
    current = changed.plan;
    apply(model, changed.change);
    times.theirs.push((await timeOf(() => model.run())).milliseconds);
    const { milliseconds, value: result } = await timeOf(() => solveOptimally(core, current, basis));
    times.ours.push(milliseconds);
    assertSame(result, model);
    basis = result.basis;
  }
  model.dispose();
}

function apply(model: Model, change: ChangedNumber): void {
  switch (change.kind) {
    case 'cost':
      model.changeColCost(change.column, change.value);
      break;
    case 'right side':
      model.changeRowBounds(change.row, -Infinity, change.value);
      break;
    case 'coefficient':
      model.changeCoefficient(change.row, change.column, change.value);
      break;
  }
}
