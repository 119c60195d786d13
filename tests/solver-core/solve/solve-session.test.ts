import { InvalidProblemError } from '../../../solver-core/control/solver-errors';
import type { LinearProgram } from '../../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../../solver-core/linear-program/linear-program-builder';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { solve, SolveSession } from '../../../solver-core/solve/solve-session';
import { lp } from '../../support/lp-notation';

/** A week of a tile works with `count` products on `lines` lines, feasible at 0, bounded by the lines. */
function tileWorks(count: number, lines: number, seed: number): LinearProgram {
  const random = new SeededRandom(seed);
  const builder = new LinearProgramBuilder({ sense: 'maximise' });
  for (let product = 0; product < count; product++) {
    builder.addColumn({
      cost: 5 + Math.floor(random.next() * 40),
      lower: 0,
      upper: random.next() < 0.3 ? 25 : Infinity,
    });
  }
  for (let line = 0; line < lines; line++) {
    const row = builder.addRow({ lower: -Infinity, upper: 200 + Math.floor(random.next() * 300) });
    for (let product = 0; product < count; product++) {
      if (line === 0 || random.next() < 0.3)
        builder.addEntry(row, product, 1 + Math.floor(random.next() * 9));
    }
  }
  return builder.build();
}

/** Changes numbers of a problem without touching the original. */
function edited(problem: LinearProgram, change: Partial<LinearProgram>): LinearProgram {
  return { ...problem, ...change };
}

test('the signs of dual values and reduced costs are those of the objective as stated', () => {
  // By hand: per press hour a bowl earns 50 and a plate 15, so 40 bowls; one plate would push out two bowls.
  const result = solve(
    lp(`
    maximise 30 plates + 50 bowls
    press: 2 plates + bowls <= 40
    plates <= 12
    `),
  );
  expect(result.status).toBe('optimal');
  if (result.status !== 'optimal') return;
  expect(result.objective).toBe(2000);
  expect([...result.x]).toEqual([0, 40]);
  expect([...result.rowDuals]).toEqual([50]);
  expect([...result.reducedCosts]).toEqual([30 - 100, 0]);
});

test('minimising, a binding >= row has a dual value of at least 0', () => {
  const result = solve(
    lp(`
    minimise 4 clay + 7 grog
    amount: clay + grog >= 10
    share: grog >= 2
    `),
  );
  expect(result.status === 'optimal' && [result.objective, ...result.rowDuals]).toEqual([46, 4, 3]);
});

test('the same answer comes in one go and in slices of any size', () => {
  const problem = tileWorks(60, 25, 2);
  const whole = solve(problem, { presolve: false });
  for (const slice of [1, 500, 20_000]) {
    const session = new SolveSession(problem, { presolve: false });
    let state = session.advance(slice);
    let slices = 1;
    while (state.state === 'running') {
      state = session.advance(slice);
      slices++;
    }
    expect(state.result).toEqual(whole);
    if (slice === 1) expect(slices).toBeGreaterThan(5);
    expect(session.advance(slice)).toEqual({ state: 'done', result: whole });
  }
});

test('progress tells stage, iterations and work, which never fall', () => {
  const session = new SolveSession(tileWorks(60, 25, 3), { presolve: false });
  let iterations = 0;
  let work = 0;
  for (let state = session.advance(300); state.state === 'running'; state = session.advance(300)) {
    expect(['dual phase one', 'dual', 'primal', 'clean-up']).toContain(state.progress.stage);
    expect(state.progress.iterations).toBeGreaterThanOrEqual(iterations);
    expect(state.progress.workUnits).toBeGreaterThan(work);
    iterations = state.progress.iterations;
    work = state.progress.workUnits;
  }
  expect(iterations).toBeGreaterThan(0);
});

test('a work limit ends as stopped, with a proved bound where there is one', () => {
  const problem = tileWorks(60, 25, 4);
  const best = solve(problem);
  const stopped = solve(problem, { workLimit: 3000, presolve: false });
  expect(stopped.status).toBe('stopped');
  if (stopped.status !== 'stopped' || best.status !== 'optimal') return;
  expect(stopped.cause).toBe('work-limit');
  if (stopped.bound !== undefined) expect(stopped.bound).toBeGreaterThanOrEqual(best.objective - 1e-6);
  if (stopped.best !== undefined) expect(stopped.best.objective).toBeLessThanOrEqual(best.objective + 1e-6);
});

test('a caller may stop before any work was done', () => {
  const session = new SolveSession(tileWorks(5, 3, 5));
  expect(session.stop()).toMatchObject({ status: 'stopped', cause: 'caller' });
  expect(session.advance(1000)).toMatchObject({ state: 'done', result: { status: 'stopped' } });
});

test('an iteration limit of 0 stops at the first basis', () => {
  const result = solve(tileWorks(10, 4, 6), { iterationLimit: 0, presolve: false });
  expect(result).toMatchObject({ status: 'stopped', cause: 'iteration-limit', iterations: 0 });
});

describe('warm start from the optimal basis (any edit of costs, bounds, right sides, coefficients, rows, columns)', () => {
  const problem = tileWorks(80, 30, 7);
  const first = solve(problem);
  const basis = first.status === 'optimal' ? first.basis : undefined;
  const random = new SeededRandom(8);
  const edits: [string, LinearProgram][] = [
    ['nothing', problem],
    [
      'costs',
      edited(problem, { cost: problem.cost.slice().map((cost) => cost * (0.8 + 0.4 * random.next())) }),
    ],
    [
      'right sides',
      edited(problem, {
        rowUpper: problem.rowUpper.slice().map((upper) => upper * (0.7 + 0.5 * random.next())),
      }),
    ],
    ['bounds', edited(problem, { columnUpper: problem.columnUpper.slice().map(() => 6) })],
    [
      'coefficients',
      edited(problem, {
        matrix: {
          ...problem.matrix,
          value: problem.matrix.value.slice().map((value) => value + random.next()),
        },
      }),
    ],
    ['a larger problem', tileWorks(95, 36, 7)],
    ['a smaller problem', tileWorks(40, 12, 7)],
  ];

  test.each(edits)('after editing %s the optimum is that of a cold start', (_, changed) => {
    const cold = solve(changed);
    const warm = solve(changed, { startBasis: basis! });
    expect([cold.status, warm.status]).toEqual(['optimal', 'optimal']);
    if (cold.status !== 'optimal' || warm.status !== 'optimal') return;
    expect(Math.abs(cold.objective - warm.objective)).toBeLessThan(1e-7 * (1 + Math.abs(cold.objective)));
  });

  test('an unchanged problem needs no iteration', () => {
    expect(solve(problem, { startBasis: basis! }).iterations).toBe(0);
  });
});

describe('what cannot be solved as it is', () => {
  const integer = lp(`
    maximise 3 racks
    kiln: 2 racks <= 5
    whole racks
  `);

  test('whole-number demands are refused by name, unless they are dropped', () => {
    expect(() => solve(integer)).toThrow(InvalidProblemError);
    expect(() => solve(integer)).toThrow(/racks/);
    expect(solve(integer, { relax: true })).toMatchObject({ status: 'optimal', objective: 7.5 });
  });

  test('an option that makes no sense is refused', () => {
    expect(() => solve(integer, { relax: true, workLimit: NaN })).toThrow(/workLimit/);
  });
});

describe('degenerate corners of the statement', () => {
  test('no rows: every column goes to its best bound', () => {
    const builder = new LinearProgramBuilder({ sense: 'maximise' });
    builder.addColumn({ cost: 2, upper: 3 });
    builder.addColumn({ cost: -1, lower: -4, upper: 3 });
    expect(solve(builder.build())).toMatchObject({ status: 'optimal', objective: 10 });
  });

  test('no rows and a cost without a bound: unbounded, with a ray', () => {
    const builder = new LinearProgramBuilder({ sense: 'maximise' });
    builder.addColumn({ cost: 2 });
    const result = solve(builder.build());
    expect(result.status === 'unbounded' && [...result.ray]).toEqual([1]);
  });

  test('no columns: the constant, or no plan where a row demands something', () => {
    const builder = new LinearProgramBuilder({ sense: 'minimise' });
    builder.objectiveConstant = 5;
    builder.addRow({ lower: -1, upper: 1 });
    expect(solve(builder.build())).toMatchObject({ status: 'optimal', objective: 5 });
    builder.addRow({ lower: 1, upper: 2 });
    expect(solve(builder.build()).status).toBe('infeasible');
  });

  test('nothing at all is optimal at its constant', () => {
    expect(solve(new LinearProgramBuilder({ sense: 'maximise' }).build())).toMatchObject({
      status: 'optimal',
      objective: 0,
    });
  });
});
