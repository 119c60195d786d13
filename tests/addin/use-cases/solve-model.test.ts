/**
 * The use-cases without a host: a workbook in memory, and a solver that answers as the test wants.
 */
import type { LinearProgram, SolveResult } from '#solver-core';
import { InlineSolver } from '../../../addin/adapters/solver-thread/inline-solver';
import { MemoryWorkbook } from '../../../addin/adapters/memory/memory-workbook';
import type { Solver } from '../../../addin/ports/solver';
import { checkModel } from '../../../addin/use-cases/check-model';
import { solveModel, type SolveModelRequest } from '../../../addin/use-cases/solve-model';
import { resultTexts } from '../../../addin/wording/report-wording';

/** maximise a + 2 b, a + b <= 4, b <= 3: a 1, b 3, objective 7; dual values 1 and 1. By hand. */
function workbook(changes: Record<string, string> = {}): MemoryWorkbook {
  return MemoryWorkbook.of({
    sheets: {
      Plan: {
        B5: 0,
        B6: 0,
        B8: '=B5+2*B6',
        B10: '=SUM(B5:B6)',
        C10: '<=',
        D10: 4,
        B11: '=B6',
        C11: '<=',
        D11: 3,
      },
    },
    names: {
      'Week.Decision': 'Plan!$B$5:$B$6',
      'Week.Objective': 'Plan!$B$8',
      'Week.Sense': '"max"',
      'Week.Constraint': 'Plan!$B$10:$D$11',
      ...changes,
    },
  });
}

const inline = new InlineSolver({ now: () => 0, pause: () => Promise.resolve() });

function request(over: Partial<SolveModelRequest>): SolveModelRequest {
  let seconds = 0;
  return {
    workbook: workbook(),
    solver: inline,
    planName: null,
    options: {},
    keepDecisions: false,
    texts: resultTexts,
    today: 46_000,
    clock: () => seconds++,
    ...over,
  };
}

/** A solver that changes what another one found. */
function solverThat(change: (result: SolveResult, problem: LinearProgram) => SolveResult): Solver {
  return {
    start: (problem, options) => ({
      result: inline.start(problem, options).result.then((result) => change(result, problem)),
      stop: () => undefined,
    }),
  };
}

const heldAt = (book: MemoryWorkbook, row: number) => book.snapshot().sheets[0].cell(row - 1, 1)?.value;

it('A plan is read, solved and written in one go, and each part is timed', async () => {
  const book = workbook();
  const solved = await solveModel(request({ workbook: book }));
  expect(solved).toMatchObject({
    kind: 'solved',
    status: 'optimal',
    planName: 'Week',
    size: { decisions: 2, constraints: 2 },
    solution: { objective: 7 },
    times: { read: 1, build: 1, solve: 1, write: 1 },
  });
  expect([heldAt(book, 5), heldAt(book, 6), heldAt(book, 8)]).toEqual([1, 3, 7]);
});

it('A plan with errors is not solved, and the workbook stays as it is', async () => {
  const book = workbook({ 'Week.Sense': '"best"' });
  const before = book.snapshot();
  const never: Solver = {
    start: () => {
      throw new Error('solved a plan with errors');
    },
  };
  const outcome = await solveModel(request({ workbook: book, solver: never }));
  expect(outcome).toMatchObject({ kind: 'invalid', planName: 'Week', issues: [{ code: 'unknown-sense' }] });
  expect(book.snapshot()).toBe(before);
});

it('An infeasible or unbounded plan, or one stopped before a plan was found, writes nothing', async () => {
  const effort = { iterations: 3, workUnits: 9 };
  const ends: SolveResult[] = [
    { status: 'infeasible', ray: new Float64Array(2), ...effort },
    { status: 'unbounded', x: new Float64Array(2), ray: new Float64Array(2), ...effort },
    { status: 'stopped', cause: 'caller', best: undefined, bound: undefined, basis: undefined, ...effort },
  ];
  for (const end of ends) {
    const book = workbook();
    const before = book.snapshot();
    const outcome = await solveModel(request({ workbook: book, solver: solverThat(() => end) }));
    expect(outcome).toMatchObject({ kind: 'solved', status: end.status, solution: null, writes: null });
    expect(book.snapshot()).toBe(before);
  }
});

it('The best plan of a stopped solve is written', async () => {
  const book = workbook();
  const solver = solverThat((result) => {
    if (result.status !== 'optimal') throw new Error(result.status);
    const best = { ...result, objective: 4, x: Float64Array.of(4, 0) };
    return { ...result, status: 'stopped', cause: 'caller', best, bound: 7 };
  });
  const outcome = await solveModel(request({ workbook: book, solver }));
  expect(outcome).toMatchObject({ status: 'stopped', solution: { objective: 4 } });
  expect([heldAt(book, 5), heldAt(book, 8)]).toEqual([4, 4]);
});

it('AD-88 an optimal plan with which the workbook’s own arithmetic disagrees is imprecise, and is written', async () => {
  // The right side counts the plan's own results: 4 while their cell is blank, 5 once the optimum stands there.
  const book = MemoryWorkbook.of({
    sheets: { Plan: { A3: 0, B3: '=A3', C3: '<=', D3: { formula: 'COUNT(Week.Optimum)+4', value: 4 } } },
    names: {
      'Week.Decision': 'Plan!$A$3',
      'Week.Objective': 'Plan!$B$3',
      'Week.Sense': '"max"',
      'Week.Constraint': 'Plan!$B$3:$D$3',
      'Week.Optimum': 'Plan!$N$3',
    },
  });
  const outcome = await solveModel(request({ workbook: book }));
  expect(outcome).toMatchObject({ status: 'imprecise', writes: { workbookAgrees: false } });
  expect(book.snapshot().sheets[0].cell(2, 0)?.value).toBe(4);
});

it('A workbook that counts its days from 1904 gets the caller’s date in its own count', async () => {
  const book = MemoryWorkbook.of({
    usesDates1904: true,
    sheets: { Plan: { A1: 0, B1: '=A1', C1: '<=', D1: '=TODAY()' } },
    names: {
      'Week.Decision': 'Plan!$A$1',
      'Week.Objective': 'Plan!$B$1',
      'Week.Sense': '"max"',
      'Week.Constraint': 'Plan!$B$1:$D$1',
    },
  });
  const outcome = await solveModel(request({ workbook: book, today: 46_000.75 }));
  expect(outcome).toMatchObject({ solution: { objective: 46_000 - 1462 } });
});

describe('which plan', () => {
  it('need not be said where there is one', async () => {
    expect(await checkModel({ workbook: workbook(), planName: null, today: 0 })).toMatchObject({
      kind: 'checked',
      planName: 'Week',
      isValid: true,
      issues: [],
    });
  });

  it.each([
    ['none', { 'Week.Decision': '' }, null],
    ['several', { 'Day.Decision': 'Plan!$B$5' }, null],
    ['unknown', {}, 'Month'],
  ])('is asked for or missed: %s', async (reason, names, planName) => {
    const book = reason === 'none' ? MemoryWorkbook.of({ sheets: { Plan: { A1: 1 } } }) : workbook(names);
    expect(await checkModel({ workbook: book, planName, today: 0 })).toMatchObject({
      kind: 'no-such-plan',
      reason,
    });
  });
});
