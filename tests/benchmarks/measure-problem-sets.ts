/**
 * Our solve beside HiGHS on the public test problems of the shared folder.
 */
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { gunzipSync } from 'node:zlib';
import type { Highs } from 'highs';
import type { LinearProgram, SolveResult } from '#solver-core';
import { loadHighsOnce, solveWithHighs, toHighsModel } from '../oracles/highs-reference';
import { loadBuiltCore, type SolverCore } from './built-core';
import { geometricMean, inMilliseconds, median, table, timeOf } from './timing';

const lpFolder =
  process.env.PLANROW_LP ??
  path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..', '..', 'shared', 'lp');

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
  readonly ours: number;
  readonly theirs: number;
  readonly result: SolveResult;
  readonly isRight: boolean;
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
  let result: SolveResult | undefined;
  const begun = performance.now();
  for (let round = 0; round < rounds.most; round++) {
    const spent = performance.now() - begun;
    if ((round >= rounds.least && spent > enough) || spent > tooLong) break;
    model.clearSolver();
    theirs.push((await timeOf(() => model.run())).milliseconds);
    const run = await timeOf(() => core.solve(problem));
    ours.push(run.milliseconds);
    result = run.value;
  }
  model.dispose();
  const isRight =
    result!.status === 'optimal' &&
    Math.abs(result!.objective - expected) <= 1e-6 * Math.max(1, Math.abs(expected));
  return {
    name,
    size: sizeOf(problem),
    reading,
    ours: median(ours),
    theirs: median(theirs),
    result: result!,
    isRight,
  };
}

function sizeOf({ rowCount, columnCount, matrix }: LinearProgram): string {
  return `${rowCount} × ${columnCount}, ${matrix.value.length}`;
}

function report(set: string, measured: readonly Measured[]): string {
  const rows = measured.map(({ name, size, reading, ours, theirs, result, isRight }) => [
    name,
    size,
    inMilliseconds(reading),
    inMilliseconds(ours),
    inMilliseconds(theirs),
    (ours / theirs).toFixed(2),
    String(result.iterations),
    isRight ? 'right' : `**${result.status}**`,
    ...(result.status === 'optimal'
      ? [result.residuals.primal, result.residuals.dual, result.residuals.dualityGap].map((residual) =>
          residual.toExponential(0),
        )
      : ['', '', '']),
  ]);
  const mean = geometricMean(measured.map(({ ours }) => ours));
  const theirMean = geometricMean(measured.map(({ theirs }) => theirs));
  const right = measured.filter(({ isRight }) => isRight).length;
  return [
    `## ${set}: ${right} of ${measured.length} right to 1e-6`,
    '',
    `Solve alone, geometric mean: ours ${inMilliseconds(mean)} ms, HiGHS ${inMilliseconds(theirMean)} ms, ratio ${(mean / theirMean).toFixed(2)}.`,
    '',
    table(
      [
        'problem',
        'rows × columns, entries',
        'reading ms',
        'ours ms',
        'HiGHS ms',
        'ratio',
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
