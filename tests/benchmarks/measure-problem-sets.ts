/**
 * Our solve beside HiGHS on the public test problems of the shared folder.
 */
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { gunzipSync } from 'node:zlib';
import type { Highs } from 'highs';
import type { LinearProgram, SolveResult } from '#solver-core';
import { loadHighsOnce, solveWithHighs, toHighsModel } from '../oracles/highs-reference';
import { loadBuiltCore, type SolverCore } from './built-core';
import { lpFolder } from './lp-folder';
import { geometricMean, inMilliseconds, least, median, table, timeOf } from './timing';

/** Rounds of each problem: these at most; no further one is begun after `enough` milliseconds and `least` rounds. */
const rounds = { least: 3, most: 15 };
const enough = 1_000;
/** After this many milliseconds on one problem no further round is begun at all. */
const tooLong = 15_000;
/** Solved over and over before anything is timed, so that the engine has compiled what is hot. */
const warmUp = { problems: ['scagr7', 'scfxm1', 'stair'], milliseconds: 3_000 };

interface Measured {
  readonly name: string;
  readonly size: string;
  readonly reading: number;
  /** Milliseconds of each round. */
  readonly ours: readonly number[];
  readonly theirs: readonly number[];
  readonly withoutPresolve: readonly number[];
  readonly result: SolveResult;
  readonly isRight: boolean;
  readonly isRightWithoutPresolve: boolean;
}

/** A section of the report; '' where the shared folder is missing. */
export async function measureProblemSet(
  set: 'netlib' | 'kennington',
  only: readonly string[] | undefined,
): Promise<string> {
  if (!existsSync(lpFolder)) {
    process.stderr.write(`No shared folder of test problems: ${set} is left out.\n`);
    return '';
  }
  const core = await loadBuiltCore();
  const highs = await loadHighsOnce();
  const list = JSON.parse(readFileSync(path.join(lpFolder, 'reference.json'), 'utf8')) as {
    problems: Record<string, { nnz: number; expected: number }>;
  };
  const chosen = Object.entries(list.problems)
    .filter(([key]) => key.startsWith(`${set}/`) && (only?.includes(key.slice(set.length + 1)) ?? true))
    .sort(([, a], [, b]) => a.nnz - b.nnz);
  if (chosen.length === 0) {
    return '';
  }
  warm(core, highs);
  const measured: Measured[] = [];
  for (const [key, { expected }] of chosen) {
    const text = readText(key);
    measured.push(await measureProblem(core, highs, key.slice(set.length + 1), text, expected));
    process.stderr.write(`${key}\n`);
  }
  return report(set, measured);
}

function readText(key: string): string {
  return gunzipSync(readFileSync(path.join(lpFolder, `${key}.mps.gz`))).toString('latin1');
}

function warm(core: SolverCore, highs: Highs): void {
  const problems = warmUp.problems.map((name) => core.readMps(readText(`netlib/${name}`)));
  for (const begun = performance.now(); performance.now() - begun < warmUp.milliseconds;) {
    for (const problem of problems) {
      core.solve(problem);
      solveWithHighs(highs, problem, { presolve: 'on' });
    }
  }
}

async function measureProblem(
  core: SolverCore,
  highs: Highs,
  name: string,
  text: string,
  expected: number,
): Promise<Measured> {
  const { value: problem, milliseconds: reading } = await timeOf(() => core.readMps(text));
  const model = highs.createModel(toHighsModel(highs, problem));
  model.options.set({ output_flag: false, presolve: 'on', solver: 'simplex' });
  const ours: number[] = [];
  const theirs: number[] = [];
  const withoutPresolve: number[] = [];
  let result: SolveResult | undefined;
  let resultWithout: SolveResult | undefined;
  const begun = performance.now();
  for (let round = 0; round < rounds.most; round++) {
    const spent = performance.now() - begun;
    if ((round >= rounds.least && spent > enough) || spent > tooLong) break;
    model.clearSolver();
    theirs.push((await timeOf(() => model.run())).milliseconds);
    const run = await timeOf(() => core.solve(problem));
    ours.push(run.milliseconds);
    result = run.value;
    const runWithout = await timeOf(() => core.solve(problem, { presolve: false }));
    withoutPresolve.push(runWithout.milliseconds);
    resultWithout = runWithout.value;
  }
  model.dispose();
  return {
    name,
    size: sizeOf(problem),
    reading,
    ours,
    theirs,
    withoutPresolve,
    result: result!,
    isRight: isAt(expected, result!),
    isRightWithoutPresolve: isAt(expected, resultWithout!),
  };
}

function isAt(expected: number, result: SolveResult): boolean {
  const allowed = 1e-6 * Math.max(1, Math.abs(expected));
  return result.status === 'optimal' && Math.abs(result.objective - expected) <= allowed;
}

function sizeOf({ rowCount, columnCount, matrix }: LinearProgram): string {
  return `${rowCount} × ${columnCount}, ${matrix.value.length}`;
}

function report(set: string, measured: readonly Measured[]): string {
  const rows = measured.map((one) => [
    one.name,
    one.size,
    inMilliseconds(one.reading),
    inMilliseconds(median(one.ours)),
    inMilliseconds(median(one.theirs)),
    inMilliseconds(least(one.ours)),
    inMilliseconds(least(one.theirs)),
    (least(one.ours) / least(one.theirs)).toFixed(2),
    inMilliseconds(least(one.withoutPresolve)) + (one.isRightWithoutPresolve ? '' : ' **wrong**'),
    String(one.result.iterations),
    one.isRight ? 'right' : `**${one.result.status}**`,
    ...(one.result.status === 'optimal'
      ? [one.result.residuals.primal, one.result.residuals.dual, one.result.residuals.dualityGap].map(
          (residual) => residual.toExponential(0),
        )
      : ['', '', '']),
  ]);
  const meanOf = (take: (one: Measured) => number): number => geometricMean(measured.map(take));
  const ratioOf = (of: (values: readonly number[]) => number): string =>
    meanOf(({ ours, theirs }) => of(ours) / of(theirs)).toFixed(2);
  const slow = measured.filter(({ ours, theirs }) => median(theirs) > 50 && least(ours) > 5 * least(theirs));
  const right = measured.filter(({ isRight }) => isRight).length;
  const rightWithout = measured.filter(({ isRightWithoutPresolve }) => isRightWithoutPresolve).length;
  return [
    `## ${set}: ${right} of ${measured.length} right to 1e-6, ${rightWithout} without presolve`,
    '',
    `Solve alone, geometric means. Medians: ours ${inMilliseconds(meanOf(({ ours }) => median(ours)))} ms, ` +
      `HiGHS ${inMilliseconds(meanOf(({ theirs }) => median(theirs)))} ms, ratio ${ratioOf(median)}. ` +
      `Least of the rounds: ours ${inMilliseconds(meanOf(({ ours }) => least(ours)))} ms, ` +
      `HiGHS ${inMilliseconds(meanOf(({ theirs }) => least(theirs)))} ms, ratio **${ratioOf(least)}** (figure to reach: 1.00); ` +
      `ours without presolve ${inMilliseconds(meanOf(({ withoutPresolve }) => least(withoutPresolve)))} ms. ` +
      `Over five times HiGHS where that needs over 50 ms: ${slow.length === 0 ? 'none' : slow.map(({ name }) => name).join(', ')}.`,
    '',
    table(
      [
        'problem',
        'rows × columns, entries',
        'reading ms',
        'ours ms, median',
        'HiGHS ms, median',
        'ours ms, least',
        'HiGHS ms, least',
        'ratio of the least',
        'no presolve ms, least',
        'iterations',
        'answer',
        'primal',
        'dual',
        'gap',
      ],
      rows,
    ),
  ].join('\n');
}
