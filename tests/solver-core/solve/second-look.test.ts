/**
 * Optima that met the acceptance thresholds and yet were wrong in the objective's fourth to sixth digit: entries of
 * sizes from 2^−16 to 2^16 let a reduced cost of 1e-9 to 1e-7 stand for a step that shows.
 */
import { solve } from '#solver-core';
import { solveExactly } from '../../oracles/exact-tableau-simplex';
import { randomLinearProgram } from '../../support/random-linear-program';
import { relativeDifference } from '../../support/reference-problems';

it.each([900_037, 900_670, 900_798, 901_161, 901_162, 901_171])(
  'SC-65 a second look brings seed %i to the optimum of the exact oracle, with presolve and without it',
  (seed) => {
    const problem = randomLinearProgram(seed, 'wild');
    const exact = solveExactly(problem);
    if (exact.status !== 'optimal') throw new Error(exact.status);
    for (const presolve of [true, false]) {
      const result = solve(problem, { presolve });
      if (result.status !== 'optimal') throw new Error(result.status);
      expect(relativeDifference(result.objective, exact.objective)).toBeLessThan(1e-8);
    }
  },
);
