/**
 * Problems of some hundred rows in the shapes that plans have, against HiGHS; statuses proved by their evidence.
 * 500 of each shape in `npm run prove`, the first share of them in `npm test`.
 */
import { solve } from '#solver-core';
import { loadHighsOnce, solveWithHighs } from '../oracles/highs-reference';
import { findEvidenceFaults } from '../support/find-evidence-faults';
import { relativeDifference } from '../support/reference-problems';
import { shareOf } from '../support/share';
import { structuredProgram, structures } from '../support/structured-programs';

const firstSeed = 300_000;
const count = shareOf(500, 10);
/** Relative, with 1 as the least to be relative to. */
const tolerance = 1e-6;

describe.each(structures)(`problems of the shape %s, seeds from ${firstSeed}`, (structure) => {
  it.each([true, false])(
    'SC-10 end as HiGHS ends them, proved twice (presolve %s)',
    async (presolve) => {
      const highs = await loadHighsOnce();
      const faults: string[] = [];
      const seen = new Set<string>();
      for (let seed = firstSeed; seed < firstSeed + count; seed++) {
        const problem = structuredProgram(seed, structure);
        const result = solve(problem, { presolve });
        const reference = solveWithHighs(highs, problem);
        seen.add(result.status);
        findEvidenceFaults(problem, result).forEach((fault) => faults.push(`seed ${seed}: ${fault}`));
        if (result.status !== reference.status) {
          faults.push(`seed ${seed}: ${result.status}, HiGHS ${reference.status}`);
        } else if (
          result.status === 'optimal' &&
          !(relativeDifference(result.objective, reference.objective) <= tolerance)
        ) {
          faults.push(`seed ${seed}: ${result.objective}, HiGHS ${reference.objective}`);
        }
      }
      expect(faults).toEqual([]);
      expect(seen).toContain('optimal');
    },
    600_000,
  );
});
