/**
 * Twenty thousand seeded random problems in shapes that are hard on a simplex code: 16,000 small ones against the
 * exact rational oracle, 4,000 of 60 to 200 rows against HiGHS. Each is solved with presolve and without it; both
 * ends must be those of the reference, and both proofs must hold on the stated problem, twice judged: by the core's
 * verification and by the shadow check of the tests.
 *
 * Where units reach from 2^−20 to 2^20, HiGHS errs or goes round in circles, so it is asked about the same problem in
 * plain units; and a proof of infeasibility may then rest on columns of sizes past what is accepted (SC-22), so that
 * the solve ends `imprecise` (SC-24). On a few large problems in a thousand HiGHS fails with an error, comes to no end,
 * or contradicts a proof: GLPK is then asked, and it must side with the solve.
 *
 * All of them in `npm run prove`, the first share of each shape in `npm test`.
 */
import { solve, type LinearProgram, type SolveResult } from '#solver-core';
import { solveExactly } from '../oracles/exact-tableau-simplex';
import { solveWithGlpk } from '../oracles/glpk-reference';
import { loadHighsOnce, solveWithHighs } from '../oracles/highs-reference';
import { findEvidenceFaults } from '../support/find-evidence-faults';
import { relativeDifference } from '../support/reference-problems';
import { shareOf } from '../support/share';
import {
  programShapes,
  shapedProgram,
  type ProgramShape,
  type ProgramSize,
  type ShapedProgram,
} from '../support/shaped-program';

const firstSeed = 1_000_000;
/** Problems of each shape. */
const counts = { small: shareOf(2000, 1), large: shareOf(500, 1) };
/** Relative, with 1 as the least to be relative to. */
const tolerance = 1e-6;

/** Many times what any of them needs: a solve that goes round in circles is then a fault and no endless run. */
const iterationLimit = 20_000;

interface Reference {
  readonly status: string;
  readonly objective?: number;
}

const endings = { optimal: 0, infeasible: 0, unbounded: 0 };

/** Each shape and size has seeds of its own. */
function seedsOf(shape: ProgramShape, size: ProgramSize): number[] {
  const first = firstSeed + 10_000 * programShapes.indexOf(shape) + (size === 'large' ? 5_000 : 0);
  return Array.from({ length: counts[size] }, (_, k) => first + k);
}

/** What is wrong with an end, beside the reference and by itself. */
function faultsOf(problem: LinearProgram, result: SolveResult, reference: Reference): string[] {
  if (result.status !== reference.status) return [`${result.status}, by the reference ${reference.status}`];
  const isFar =
    result.status === 'optimal' && !(relativeDifference(result.objective, reference.objective!) <= tolerance);
  return [
    ...(isFar ? [`${result.objective}, by the reference ${reference.objective}`] : []),
    ...findEvidenceFaults(problem, result),
  ];
}

/** How many of 100 solves of a shape may be imprecise. */
const mostImprecise = (shape: ProgramShape): number => (shape === 'ill-scaled' ? 2 : 0);

function faultsOfAll(
  shape: ProgramShape,
  size: ProgramSize,
  refer: (shaped: ShapedProgram) => Reference,
  referAgain?: (shaped: ShapedProgram) => Reference,
): string[] {
  const imprecise: string[] = [];
  const faults = seedsOf(shape, size).flatMap((seed) => {
    const shaped = shapedProgram(seed, shape, size);
    const { problem } = shaped;
    const withPresolve = solve(problem, { iterationLimit });
    const first = refer(shaped);
    const reference = first.status === withPresolve.status ? first : (referAgain?.(shaped) ?? first);
    if (reference.status in endings) endings[reference.status as keyof typeof endings]++;
    return [true, false].flatMap((presolve) => {
      const result = presolve ? withPresolve : solve(problem, { presolve, iterationLimit });
      const named = (fault: string): string => `seed ${seed}, presolve ${presolve}: ${fault}`;
      if (result.status === 'imprecise') {
        imprecise.push(named(result.reason));
        return [];
      }
      return faultsOf(problem, result, reference).map(named);
    });
  });
  const solves = 2 * counts[size];
  return imprecise.length <= (mostImprecise(shape) / 100) * solves ? faults : [...faults, ...imprecise];
}

/** What HiGHS says; `unknown` where it fails. */
async function highsReference(): Promise<(shaped: ShapedProgram) => Reference> {
  const highs = await loadHighsOnce();
  return ({ plain }) => {
    try {
      return solveWithHighs(highs, plain);
    } catch (error) {
      if (error instanceof Error && error.name === 'HighsError') return { status: 'unknown' };
      throw error;
    }
  };
}

describe.each(programShapes)(`random problems of the shape %s, seeds from ${firstSeed}`, (shape) => {
  it('SC-10 SC-31 when small end as in exact arithmetic, with presolve and without it, proved twice', () => {
    expect(faultsOfAll(shape, 'small', ({ problem }) => solveExactly(problem))).toEqual([]);
  }, 600_000);

  it('SC-10 SC-31 when large end as HiGHS ends them, with presolve and without it, proved twice', async () => {
    const glpk = ({ plain }: ShapedProgram): Reference => solveWithGlpk([plain])[0];
    expect(faultsOfAll(shape, 'large', await highsReference(), glpk)).toEqual([]);
  }, 600_000);
});

describe('the problems of all shapes', () => {
  it('end in every way often enough to mean something', () => {
    const all = programShapes.length * (counts.small + counts.large);
    expect(endings.optimal + endings.infeasible + endings.unbounded).toBe(all);
    expect(endings.optimal).toBeGreaterThan(0.4 * all);
    expect(endings.infeasible).toBeGreaterThan(0.05 * all);
    expect(endings.unbounded).toBeGreaterThan(0.05 * all);
  });
});
