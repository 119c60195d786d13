/**
 * The oracles are tested against each other before anything is tested against them.
 */
import { loadHighsOnce, solveWithHighs } from './highs-reference';
import { fromNumber, solveExactly, toNumber } from './exact-tableau-simplex';
import { solveByEnumeration } from './vertex-enumeration';
import { lp } from '../support/lp-notation';
import { randomKinds, randomLinearProgram } from '../support/random-linear-program';
import { findFarkasFaults, findOptimalityFaults, findUnboundedFaults } from '../support/shadow-check';

/** All kinds whose numbers are exact in binary. */
const exactKinds = randomKinds.filter((kind) => kind !== 'decimal');

describe('the exact tableau simplex', () => {
  it('gives a fraction exactly', () => {
    const answer = solveExactly(
      lp(`
      maximise x + y
      a: 3 x + y <= 4
      b: x + 3 y <= 5`),
    );
    // By hand: x = 7/8, y = 11/8, sum 9/4.
    expect(answer).toEqual({
      status: 'optimal',
      objective: 2.25,
      exactObjective: { numerator: 9n, denominator: 4n },
    });
  });

  it('takes a double for the binary fraction that it is and gives it back', () => {
    for (const value of [0.1, -3, 1e-20, 123456.789, 2 ** 70]) {
      expect(toNumber(fromNumber(value))).toBe(value);
    }
  });

  it('agrees with vertex enumeration on boxed problems, seeds 1 to 60', () => {
    let tried = 0;
    for (let seed = 1; seed <= 60; seed++) {
      const problem = randomLinearProgram(seed, 'boxed');
      if (problem.columnCount > 4 || problem.rowCount > 5) continue;
      tried++;
      const exact = solveExactly(problem);
      const enumerated = solveByEnumeration(problem);
      expect({ seed, status: enumerated.status }).toEqual({ seed, status: exact.status });
      if (exact.status === 'optimal' && enumerated.status === 'optimal') {
        expect(enumerated.objective).toBeCloseTo(exact.objective, 6);
      }
    }
    expect(tried).toBeGreaterThanOrEqual(5);
  });

  it('agrees with HiGHS in status and objective, seeds 1000 to 1099', async () => {
    const highs = await loadHighsOnce();
    for (let seed = 1000; seed < 1100; seed++) {
      const problem = randomLinearProgram(seed, exactKinds[seed % exactKinds.length]);
      const exact = solveExactly(problem);
      const reference = solveWithHighs(highs, problem);
      expect({ seed, status: exact.status }).toEqual({ seed, status: reference.status });
      if (exact.status === 'optimal') {
        const difference =
          Math.abs(exact.objective - reference.objective) / Math.max(1, Math.abs(exact.objective));
        expect({ seed, isClose: difference < 1e-7 }).toEqual({ seed, isClose: true });
      }
    }
  });
});

describe('the shadow check', () => {
  it('finds no fault with the evidence that HiGHS gives, and faults with evidence that is bent', async () => {
    const highs = await loadHighsOnce();
    for (let seed = 2000; seed < 2200; seed++) {
      const problem = randomLinearProgram(seed, exactKinds[seed % exactKinds.length]);
      const answer = solveWithHighs(highs, problem, { withRays: true });
      if (answer.status === 'optimal') {
        expect({ seed, faults: findOptimalityFaults(problem, answer) }).toEqual({ seed, faults: [] });
        const bent = { ...answer, objective: answer.objective + 0.01 * (1 + Math.abs(answer.objective)) };
        expect(findOptimalityFaults(problem, bent)).not.toEqual([]);
      } else if (answer.farkasRay !== undefined) {
        const signs = [answer.farkasRay, answer.farkasRay.map((y) => -y)];
        expect({ seed, isProof: signs.some((y) => findFarkasFaults(problem, y).length === 0) }).toEqual({
          seed,
          isProof: true,
        });
        expect(findFarkasFaults(problem, new Float64Array(problem.rowCount))).not.toEqual([]);
      } else if (answer.unboundedRay !== undefined) {
        expect({ seed, faults: findUnboundedFaults(problem, answer.x, answer.unboundedRay) }).toEqual({
          seed,
          faults: [],
        });
        expect(
          findUnboundedFaults(
            problem,
            answer.x,
            answer.unboundedRay.map((v) => -v),
          ),
        ).not.toEqual([]);
      }
    }
  });
});
