/**
 * Presolve as a part of the solve: what it may claim, what is given out when a solve is stopped, what it costs.
 */
import {
  LinearProgramBuilder,
  readMps,
  solve,
  SolveSession,
  VariableStatus,
  type LinearProgram,
  type SolveResult,
} from '#solver-core';
import { WorkMeter } from '../../../solver-core/control/work-meter';
import { SeededRandom } from '../../../solver-core/numerics/seeded-random';
import { presolve } from '../../../solver-core/presolve/presolve';
import { expectReduced } from '../../contracts/reduction-contract';
import { findEvidenceFaults } from '../../support/find-evidence-faults';
import { lp } from '../../support/lp-notation';
import { itNeeds } from '../../support/needs';
import { readReferenceText, referenceProblems, relativeDifference } from '../../support/reference-problems';
import { findFarkasFaults, findPrimalFaults } from '../../support/shadow-check';
import { shareOf } from '../../support/share';

/** Work units of presolve alone. */
function workOf(problem: LinearProgram): number {
  const meter = new WorkMeter(Infinity);
  presolve(problem, meter);
  return meter.total;
}

/** Weeks of stock: last week's + made − sold = this week's; making costs, holding costs. */
function stockPlan(weeks: number, seed: number): LinearProgram {
  const random = new SeededRandom(seed);
  const builder = new LinearProgramBuilder({ sense: 'minimise' });
  let before: number | undefined;
  for (let week = 0; week < weeks; week++) {
    const sold = random.nextInteger(2, 18);
    const made = builder.addColumn({ cost: random.nextInteger(10, 40) / 8, upper: 20 });
    const stock = builder.addColumn({ cost: 0.125 });
    const balance = builder.addRow({ lower: sold, upper: sold });
    builder.addEntry(balance, made, 1);
    builder.addEntry(balance, stock, -1);
    if (before !== undefined) builder.addEntry(balance, before, 1);
    before = stock;
  }
  return builder.build();
}

/** Many amounts that are each a multiple of one, with a limit on each. */
function hub(spokes: number, seed: number): LinearProgram {
  const random = new SeededRandom(seed);
  const builder = new LinearProgramBuilder({ sense: 'maximise' });
  const centre = builder.addColumn({ cost: 1, upper: 50 });
  for (let spoke = 0; spoke < spokes; spoke++) {
    const amount = builder.addColumn({ cost: random.nextInteger(-4, 4) / 8 });
    const definition = builder.addRow({ lower: 0, upper: 0 });
    builder.addEntry(definition, amount, 1);
    builder.addEntry(definition, centre, -random.nextInteger(1, 5));
    const limit = builder.addRow({ lower: -Infinity, upper: 1000 + random.nextInteger(0, 100) });
    builder.addEntry(limit, amount, 1 + random.nextInteger(0, 8) / 8);
  }
  return builder.build();
}

describe('presolve within a solve', () => {
  it('SC-60 runs unless it is switched off or a start basis is given', () => {
    const problem = lp('maximise 3 plates + 2 bowls\n cap: plates + bowls <= 10\n plates <= 6');
    const reduced = solve(problem);
    expect(reduced.iterations).toBe(0);
    expect(solve(problem, { presolve: false }).iterations).toBeGreaterThan(0);
    const logicals = { columnStatus: new Uint8Array(2), rowStatus: Uint8Array.of(VariableStatus.basic) };
    expect(solve(problem, { startBasis: logicals }).iterations).toBeGreaterThan(0);
  });

  it('SC-60 counts its work, and leaves the stated problem alone', () => {
    const problem = stockPlan(30, 1);
    const before = JSON.stringify(problem);
    const result = solve(problem);
    expect(result.workUnits).toBeGreaterThanOrEqual(workOf(problem));
    expect(JSON.stringify(problem)).toBe(before);
  });

  it('SC-63 a problem that presolve suspects to be without bound, and that has no plan, ends infeasible', () => {
    const problem = lp(`
      maximise extra + plates
      a: plates + bowls >= 9
      b: plates + 2 bowls <= 4
      c: plates - bowls <= 1`);
    expect(presolve(problem, new WorkMeter(Infinity)).kind).toBe('unbounded');
    const result = solve(problem);
    expect(result.status).toBe('infeasible');
    expect(result.status === 'infeasible' && findFarkasFaults(problem, result.ray)).toEqual([]);
  });

  it('SC-63 an end without bound that the smaller problem has is shown on the stated one', () => {
    // x, y and z rise together, t with them as 2 x + 1, u as half of x + y: t, u and w are gone when the ray is found.
    const problem = lp(`
      maximise x + y + z + t
      a: -5 <= x - 2 y + z <= 5
      b: -4 <= 2 x - y - z <= 4
      twice: t - 2 x = 1
      half: x + y - 2 u = 0
      once: 3 w = 6`);
    expect(presolve(problem, new WorkMeter(Infinity)).kind).toBe('reduced');
    const result = solve(problem);
    expect(result.status).toBe('unbounded');
    expect(findEvidenceFaults(problem, result)).toEqual([]);
  });

  it('SC-64 a stopped solve gives out a point, a bound and a basis of the stated problem', () => {
    const problem = stockPlan(60, 2);
    const optimum = solve(problem);
    if (optimum.status !== 'optimal') throw new Error(optimum.status);
    let points = 0;
    let bounds = 0;
    for (let limit = 0; limit < optimum.iterations; limit += 3) {
      const result = solve(problem, { iterationLimit: limit });
      if (result.status !== 'stopped') throw new Error(result.status);
      expect(result.cause).toBe('iteration-limit');
      const statuses = [...result.basis!.columnStatus, ...result.basis!.rowStatus];
      expect(statuses).toHaveLength(problem.columnCount + problem.rowCount);
      expect(statuses.filter((status) => status === VariableStatus.basic)).toHaveLength(problem.rowCount);
      if (result.best !== undefined) {
        points++;
        expect(findPrimalFaults(problem, result.best.x)).toEqual([]);
        expect(result.best.objective).toBeGreaterThanOrEqual(optimum.objective - 1e-9);
      }
      if (result.bound !== undefined) {
        bounds++;
        expect(result.bound).toBeLessThanOrEqual(optimum.objective + 1e-9);
      }
      const resumed = solve(problem, { startBasis: result.basis! });
      expect(
        resumed.status === 'optimal' && relativeDifference(resumed.objective, optimum.objective),
      ).toBeLessThan(1e-9);
    }
    expect(points + bounds).toBeGreaterThan(0);
  });

  it('SC-2 SC-4 gives the same bits in slices of any size', () => {
    const problem = stockPlan(40, 3);
    const whole = solve(problem);
    for (const slice of [1, 777, 20_000]) {
      const session = new SolveSession(problem);
      let state = session.advance(slice);
      for (let turn = 0; state.state === 'running' && turn < 1_000_000; turn++)
        state = session.advance(slice);
      expect(state.state === 'done' && withoutWork(state.result)).toEqual(withoutWork(whole));
    }
  });

  it('costs work in proportion to the entries', () => {
    const perEntry = (problem: LinearProgram): number => workOf(problem) / problem.matrix.value.length;
    expect(perEntry(stockPlan(4000, 4))).toBeLessThan(1.2 * perEntry(stockPlan(500, 4)));
    expect(perEntry(hub(4000, 5))).toBeLessThan(1.2 * perEntry(hub(500, 5)));
    expect(expectReduced(presolve(hub(4000, 5), new WorkMeter(Infinity))).problem.columnCount).toBe(0);
  });
});

/** Slices round the work up; everything else is the same to the bit. */
function withoutWork(result: SolveResult): SolveResult {
  return { ...result, workUnits: 0 };
}

describe('presolve on the problems of the shared folder', () => {
  const minute = 60_000;

  itNeeds(
    'lpFolder',
    'SC-31 SC-62 Netlib and Kennington end alike with presolve and without it, with bases that are optimal as restored',
    () => {
      const problems = [...referenceProblems('netlib'), ...referenceProblems('kennington')].sort(
        (a, b) => a.rows * a.columns - b.rows * b.columns,
      );
      const faults = problems.slice(0, shareOf(problems.length, 24)).flatMap(({ set, name, expected }) => {
        const problem = readMps(readReferenceText(set, name));
        const [on, off] = [solve(problem), solve(problem, { presolve: false })];
        if (on.status !== 'optimal' || off.status !== 'optimal')
          return [`${name}: ${on.status}, ${off.status}`];
        const again = solve(problem, { startBasis: on.basis });
        const isSame =
          relativeDifference(on.objective, expected!) <= 1e-6 &&
          relativeDifference(off.objective, expected!) <= 1e-6;
        return [
          ...(isSame ? [] : [`${name}: ${on.objective}, ${off.objective}, expected ${expected}`]),
          ...(again.iterations === 0
            ? []
            : [`${name}: ${again.iterations} iterations from the restored basis`]),
          ...(on.iterations <= off.iterations + 50
            ? []
            : [`${name}: ${on.iterations} against ${off.iterations}`]),
        ];
      });
      expect(faults).toEqual([]);
    },
    5 * minute,
  );

  itNeeds(
    'lpFolder',
    'SC-63 the infeasible set is proved so with presolve and without it',
    () => {
      const problems = [...referenceProblems('infeas')].sort(
        (a, b) => a.rows * a.columns - b.rows * b.columns,
      );
      const faults = problems.slice(0, shareOf(problems.length, 2)).flatMap(({ set, name }) => {
        const problem = readMps(readReferenceText(set, name));
        return [true, false].flatMap((isOn) => {
          const result = solve(problem, { presolve: isOn });
          return result.status === 'infeasible'
            ? findEvidenceFaults(problem, result)
            : [`${name}: ${result.status}`];
        });
      });
      expect(faults).toEqual([]);
    },
    5 * minute,
  );
});
