/**
 * Public test problems of real size, whole solves from MPS text to proved status: the Netlib and Kennington sets, the
 * infeasible set, Klee–Minty cubes, and the MIPLIB problems without their whole-number demands.
 *
 * Values to test against: the list in the shared folder (agreement of three solvers to 1e-7, beside the published
 * optimum); for the relaxations of MIPLIB the catalogue's few printed digits; for Debian's samples the value HiGHS
 * finds in the same run.
 */
import { readMps, solve, type SolveResult } from '#solver-core';
import { loadHighsOnce, solveWithHighs } from '../oracles/highs-reference';
import { findEvidenceFaults } from '../support/find-evidence-faults';
import { itNeeds } from '../support/needs';
import {
  readCoinSample,
  readReferenceText,
  referenceProblems,
  relativeDifference,
  type ProblemSet,
} from '../support/reference-problems';
import { shareOf } from '../support/share';

/** Relative to the expected value, floor 1. */
const tolerance = 1e-6;
/** A count that no problem here comes near: a solve that loops ends as stopped, with a name. */
const iterationLimit = 200_000;
const minute = 60_000;

interface Line {
  readonly problem: string;
  readonly status: string;
  readonly objective: number | undefined;
  readonly expected: number | string;
  readonly isRight: boolean;
}

function lineOf(
  name: string,
  result: SolveResult,
  expected: number | undefined,
  faults: readonly string[],
): Line {
  const objective = result.status === 'optimal' ? result.objective : undefined;
  const isRight =
    faults.length === 0 &&
    (expected === undefined
      ? result.status === 'infeasible'
      : objective !== undefined && relativeDifference(objective, expected) <= tolerance);
  const status = faults.length === 0 ? result.status : faults.join('; ');
  return { problem: name, status, objective, expected: expected ?? 'infeasible', isRight };
}

/** Solves the problems of a set; what is not right comes back as lines to read. */
function wrongLines(set: ProblemSet, atLeast: number): readonly Line[] {
  // Small ones first, so that a share of the set is quick.
  const bySize = [...referenceProblems(set)].sort((a, b) => a.rows * a.columns - b.rows * b.columns);
  return bySize
    .slice(0, shareOf(bySize.length, atLeast))
    .map(({ name, expected }) => {
      const problem = readMps(readReferenceText(set, name));
      const result = solve(problem, { iterationLimit });
      return lineOf(name, result, expected, findEvidenceFaults(problem, result));
    })
    .filter(({ isRight }) => !isRight);
}

describe('problems of the shared folder', () => {
  itNeeds('lpFolder', 'are 49 of Netlib, 3 of Kennington, 4 infeasible ones and 6 Klee–Minty cubes', () => {
    const counts = (['netlib', 'kennington', 'infeas', 'misc'] as const).map(
      (set) => referenceProblems(set).length,
    );
    expect(counts).toEqual([49, 3, 4, 6]);
  });

  itNeeds(
    'lpFolder',
    'Netlib: every problem ends optimal, at the published optimum, proved',
    () => {
      // In `npm test` the 44 smallest, 20 seconds; in `npm run prove` also stocfor3, dfl001, 80bau3b, greenbeb, pilot87.
      expect(wrongLines('netlib', 44)).toEqual([]);
    },
    5 * minute,
  );

  itNeeds(
    'lpFolder',
    'Kennington: every problem ends optimal, at the published optimum, proved',
    () => {
      expect(wrongLines('kennington', 3)).toEqual([]);
    },
    2 * minute,
  );

  itNeeds(
    'lpFolder',
    'the infeasible set: every problem ends infeasible, with a ray that proves it',
    () => {
      expect(wrongLines('infeas', 3)).toEqual([]);
    },
    2 * minute,
  );

  itNeeds('lpFolder', 'Klee–Minty cubes end optimal without a walk through all their corners', () => {
    expect(wrongLines('misc', 6)).toEqual([]);
    for (const { name, columns } of referenceProblems('misc')) {
      const { iterations } = solve(readMps(readReferenceText('misc', name)));
      expect({ name, isShort: iterations < 2 ** columns - 1 }).toEqual({ name, isShort: true });
    }
  });

  itNeeds(
    'lpFolder',
    'MIPLIB without whole-number demands ends at the published relaxation',
    () => {
      const bySize = [...referenceProblems('mip')].sort((a, b) => a.rows * a.columns - b.rows * b.columns);
      const lines = bySize
        .slice(0, shareOf(bySize.length, 16))
        .map(({ name, publishedRelaxation }) => {
          const problem = readMps(readReferenceText('mip', name));
          const result = solve(problem, { relax: true, iterationLimit });
          const faults = findEvidenceFaults(problem, result);
          const value = result.status === 'optimal' ? result.objective : NaN;
          const isRight = faults.length === 0 && isAsPrinted(value, publishedRelaxation!);
          return { name, status: result.status, value, publishedRelaxation, faults, isRight };
        })
        .filter(({ isRight }) => !isRight);
      expect(lines).toEqual([]);
    },
    5 * minute,
  );
});

/** Does the value agree with a printed one to half a unit of its last digit, or to 1e-6? */
function isAsPrinted(value: number, printed: number): boolean {
  const decimals = (String(printed).split('.')[1] ?? '').length;
  return Math.abs(value - printed) <= Math.max(0.51 * 10 ** -decimals, tolerance * Math.abs(printed));
}

describe("Debian's sample problems", () => {
  const samples = ['afiro', 'brandy', 'e226', 'finnis', 'galenet', 'galenetbnds', 'exmip1', 'tp3', 'tp4', 'tp5', 'lseu',
    'p0033', 'p0201', 'p0548', 'pack1', 'retail3', 'hello', 'atm_5_10_1', 'wedding_16'] as const; // prettier-ignore

  // Published optima: Netlib lp/data readme (afiro, brandy, e226 and finnis with their constants as HiGHS reads them).
  const published: Readonly<Record<string, number>> = { afiro: -464.75314286, brandy: 1518.5098965 };

  itNeeds(
    'coinSamples',
    'end as HiGHS ends them, proved',
    async () => {
      const highs = await loadHighsOnce();
      for (const name of samples) {
        const problem = readMps(readCoinSample(name));
        const result = solve(problem, { relax: true, iterationLimit });
        const reference = solveWithHighs(highs, problem);
        expect({ name, faults: findEvidenceFaults(problem, result) }).toEqual({ name, faults: [] });
        expect({ name, status: result.status }).toEqual({ name, status: reference.status });
        if (result.status === 'optimal') {
          expect({
            name,
            difference:
              relativeDifference(result.objective, published[name] ?? reference.objective) < tolerance,
          }).toEqual({ name, difference: true });
        }
      }
    },
    minute,
  );
});
