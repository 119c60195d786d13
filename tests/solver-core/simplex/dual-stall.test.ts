import { solve } from '../../../solver-core/solve/solve-session';
import { shapedProgram } from '../../support/shaped-program';

test('seed 1055114: dual phase one repeated its bases for ever; the loop now sees that nothing rises, and the primal ends it', () => {
  const { problem } = shapedProgram(1055114, 'free', 'large');
  const result = solve(problem, { presolve: false, iterationLimit: 20_000 });
  expect(result.status).toBe('optimal');
  // The optimum that HiGHS gives.
  if (result.status === 'optimal') expect(result.objective).toBeCloseTo(-320.1071427443385, 6);
});
