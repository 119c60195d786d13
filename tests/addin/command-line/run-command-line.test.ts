/**
 * Ends that a file cannot bring about at will: a bug, a signature, a stop with a plan, long lists. The run is in this
 * process, on a workbook in memory and a solver that answers as the test wants.
 */
import type { SolveResult } from '#solver-core';
import { InlineSolver } from '../../../addin/adapters/solver-thread/inline-solver';
import { MemoryWorkbook } from '../../../addin/adapters/memory/memory-workbook';
import type { CommandLineHost, WorkbookFile } from '../../../addin/command-line/command-line-host';
import { runCommandLine } from '../../../addin/command-line/run-command-line';
import { WorkbookError } from '../../../addin/ports/workbook';

const inline = new InlineSolver({ now: () => 0, pause: () => Promise.resolve() });

/** `count` tiles, 1 € each, at most 5 m² of each and 5 · count − 1 in all. */
function workbook(count = 2): MemoryWorkbook {
  const last = 4 + count;
  const tiles = Object.fromEntries(
    Array.from({ length: count }, (_, k) => [`A${5 + k}`, `Tile ${k + 1}`] as const),
  );
  return MemoryWorkbook.of({
    sheets: {
      Plan: {
        ...tiles,
        B1: `=SUM(B5:B${last})`,
        D1: 5,
        E3: `=SUM(B5:B${last})`,
        F3: '<=',
        G3: 5 * count - 1,
      },
    },
    names: {
      'Week.Decision': `Plan!$B$5:$B$${last}`,
      'Week.Objective': 'Plan!$B$1',
      'Week.Sense': '"max"',
      'Week.Upper': 'Plan!$D$1',
      'Week.Constraint': 'Plan!$E$3:$G$3',
    },
  });
}

interface Run {
  readonly exitCode: number;
  readonly printed: string;
  readonly complained: string;
  readonly saves: number;
}

async function run(
  words: string[],
  over: Partial<CommandLineHost> = {},
  file: Partial<WorkbookFile> = {},
): Promise<Run> {
  const seen = { printed: '', complained: '', saves: 0 };
  let seconds = 0;
  const host: CommandLineHost = {
    openWorkbook: () =>
      Promise.resolve({
        workbook: workbook(),
        isSigned: false,
        save: () => {
          seen.saves++;
          return Promise.resolve('week-planned.xlsx');
        },
        ...file,
      }),
    solver: inline,
    clock: () => (seconds += 0.6),
    today: () => 46_000,
    runAfter: () => () => undefined,
    print: (text) => (seen.printed += text),
    printError: (text) => (seen.complained += text),
    ...over,
  };
  const exitCode = await runCommandLine(words, host);
  return { exitCode, ...seen };
}

/** A solver that bends what the real one found. */
function bent(
  change: (result: Extract<SolveResult, { status: 'optimal' }>) => SolveResult,
): CommandLineHost['solver'] {
  return {
    start: (problem, options) => ({
      result: inline.start(problem, options).result.then((result) => {
        if (result.status !== 'optimal') throw new Error(result.status);
        return change(result);
      }),
      stop: () => undefined,
    }),
  };
}

const solve = ['solve', 'week.xlsx'];

it('AD-92 a bug of ours ends with 1, says so on standard error, and still prints one JSON object', async () => {
  const solver: CommandLineHost['solver'] = {
    start: () => {
      throw new TypeError('a pivot went missing');
    },
  };
  const { exitCode, printed, complained, saves } = await run([...solve, '--json'], { solver });
  expect([exitCode, saves]).toEqual([1, 0]);
  expect(JSON.parse(printed)).toMatchObject({ status: null, issues: [{ code: 'bug', severity: 'error' }] });
  expect(complained).toMatch(/a pivot went missing/);
});

it('AD-92 a solve that stopped with a plan ends with 6, writes it, and says that a better one may exist', async () => {
  const solver = bent((result) => ({
    ...result,
    status: 'stopped',
    cause: 'caller',
    best: result,
    bound: 10,
  }));
  const forPeople = await run(solve, { solver });
  expect([forPeople.exitCode, forPeople.saves]).toEqual([6, 1]);
  expect(forPeople.printed).toMatch(/a better one may exist/);
  expect(forPeople.printed).toMatch(/Bound +10 +\(gap 10 %\)/);
  const { printed } = await run([...solve, '--json'], { solver });
  expect(JSON.parse(printed)).toMatchObject({
    status: 'stopped',
    objective: 9,
    bound: 10,
    gap: 0.1,
    checks: { primal: null, workbookObjective: 9 },
  });
});

it('AD-92 an imprecise plan ends with 7 and is written with its residuals', async () => {
  const solver = bent((result) => ({
    ...result,
    status: 'imprecise',
    reason: 'dual',
    residuals: { ...result.residuals, dual: 1e-5 },
  }));
  const { exitCode, printed, saves } = await run([...solve, '--json'], { solver });
  expect([exitCode, saves]).toEqual([7, 1]);
  expect(JSON.parse(printed)).toMatchObject({
    status: 'imprecise',
    bound: null,
    gap: null,
    checks: { dual: 1e-5 },
  });
});

it('A signed workbook is written with the warning that its signature no longer fits', async () => {
  const { exitCode, printed } = await run([...solve, '--json'], {}, { isSigned: true });
  expect(exitCode).toBe(0);
  expect(JSON.parse(printed)).toMatchObject({ issues: [{ code: 'signature-lost', severity: 'warning' }] });
});

it('AD-90 a file that cannot be written ends with 2, and the plan is told all the same', async () => {
  const save = () =>
    Promise.reject(new WorkbookError('write-failed', 'The disk is full; make room and try again.'));
  const { exitCode, printed } = await run([...solve, '--json'], {}, { save });
  expect(exitCode).toBe(2);
  expect(JSON.parse(printed)).toMatchObject({
    status: 'optimal',
    objective: 9,
    written: null,
    issues: [{ code: 'write-failed', severity: 'error', cell: null }],
  });
  const forPeople = await run(solve, {}, { save });
  expect(forPeople.printed).toMatch(/Error: The disk is full/);
  expect(forPeople.printed).not.toMatch(/Written to/);
});

it('A time limit stops the solve when it is over, and is called off when the solve ends before', async () => {
  let calledOff = 0;
  let limit = 0;
  const runAfter: CommandLineHost['runAfter'] = (seconds) => {
    limit = seconds;
    return () => calledOff++;
  };
  expect((await run([...solve, '--time-limit', '30'], { runAfter })).exitCode).toBe(0);
  expect([limit, calledOff]).toEqual([30, 1]);
  const atOnce: CommandLineHost['runAfter'] = (_seconds, action) => {
    action();
    return () => undefined;
  };
  expect((await run([...solve, '--time-limit', '30'], { runAfter: atOnce })).exitCode).toBe(6);
});

it('Lists longer than a screen are cut with a count; JSON has them whole', async () => {
  const long = {
    openWorkbook: () =>
      Promise.resolve({ workbook: workbook(55), isSigned: false, save: () => Promise.resolve('a.xlsx') }),
  };
  const { printed } = await run(solve, long);
  expect(printed).toMatch(/Tile 40 /);
  expect(printed).not.toMatch(/Tile 41 /);
  expect(printed).toMatch(/… and 15 more \(all with --json\)/);
  const json = await run([...solve, '--json'], long);
  expect((JSON.parse(json.printed) as { decisions: unknown[] }).decisions).toHaveLength(55);
});
