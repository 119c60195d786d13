/**
 * Twenty-four hundred seeded random problems with what presolve looks for planted in them. With presolve and without
 * it they end alike, and as the exact oracle says; what is restored is optimal by itself, basis included.
 */
import { solve, type LinearProgram, type SolveResult } from '#solver-core';
import { WorkMeter } from '../../solver-core/control/work-meter';
import { presolve, type PresolveOutcome } from '../../solver-core/presolve/presolve';
import type { ReductionName } from '../../solver-core/presolve/reduction';
import { allReductions } from '../../solver-core/presolve/reductions/all-reductions';
import { verifyFarkasRay } from '../../solver-core/verification/verify-ray';
import { findFaultsOfRestored } from '../contracts/reduction-contract';
import { solveExactly, type ExactAnswer } from '../oracles/exact-tableau-simplex';
import { findEvidenceFaults } from '../support/find-evidence-faults';
import { presolveShapedProgram } from '../support/presolve-shaped-program';
import { relativeDifference } from '../support/reference-problems';

const firstSeed = 700_000;
const count = 2400;
/** Relative, with 1 as the least to be relative to. */
const tolerance = 1e-6;

interface Drawn {
  readonly seed: number;
  readonly problem: LinearProgram;
  readonly outcome: PresolveOutcome;
  readonly withPresolve: SolveResult;
  readonly without: SolveResult;
  readonly exact: ExactAnswer;
}

const drawn: Drawn[] = [];

beforeAll(() => {
  for (let seed = firstSeed; seed < firstSeed + count; seed++) {
    const problem = presolveShapedProgram(seed);
    drawn.push({
      seed,
      problem,
      outcome: presolve(problem, new WorkMeter(Infinity)),
      withPresolve: solve(problem),
      without: solve(problem, { presolve: false }),
      exact: solveExactly(problem),
    });
  }
}, 120_000);

const objectiveOf = (end: SolveResult | ExactAnswer): number =>
  end.status === 'optimal' ? end.objective : 0;

describe(`${count} random problems shaped for presolve, seeds from ${firstSeed}`, () => {
  it('SC-31 end with the same status and objective with presolve, without it, and by the exact oracle', () => {
    const differing = drawn.flatMap(({ seed, withPresolve, without, exact }) => {
      const objective = objectiveOf(exact);
      const isSame =
        withPresolve.status === exact.status &&
        without.status === exact.status &&
        relativeDifference(objectiveOf(withPresolve), objective) <= tolerance &&
        relativeDifference(objectiveOf(without), objective) <= tolerance;
      const show = (end: SolveResult | ExactAnswer): string => `${end.status} ${objectiveOf(end)}`;
      return isSame
        ? []
        : [`seed ${seed}: with ${show(withPresolve)}, without ${show(without)}, ${show(exact)}`];
    });
    expect(differing).toEqual([]);
  });

  it('SC-10 end with evidence that holds on the stated problem, twice judged', () => {
    const faults = drawn.flatMap(({ seed, problem, withPresolve }) =>
      findEvidenceFaults(problem, withPresolve).map((fault) => `seed ${seed}: ${fault}`),
    );
    expect(faults).toEqual([]);
  });

  it('SC-62 are restored with a basis from which the simplex has nothing to do or to repair', () => {
    const faults = drawn.flatMap(({ seed, problem, withPresolve }) =>
      withPresolve.status === 'optimal'
        ? findFaultsOfRestored(problem, {
            x: Float64Array.from(withPresolve.x),
            rowDuals: Float64Array.from(withPresolve.rowDuals),
            reducedCosts: Float64Array.from(withPresolve.reducedCosts),
            basis: withPresolve.basis,
          }).map((fault) => `seed ${seed}: ${fault}`)
        : [],
    );
    expect(faults).toEqual([]);
  });

  it('SC-61 have no optimum lost: what is left has the optimum of the whole', () => {
    const faults = drawn.flatMap(({ seed, outcome, exact }) => {
      if (outcome.kind === 'reduced') {
        const left = solve(outcome.reduced.problem, { presolve: false });
        if (exact.status !== 'optimal')
          return left.status === 'optimal' ? [`seed ${seed}: left an optimum`] : [];
        const isSame =
          left.status === 'optimal' && relativeDifference(left.objective, exact.objective) <= tolerance;
        return isSame ? [] : [`seed ${seed}: left ${left.status}`];
      }
      if (outcome.kind === 'unchanged') return [];
      return exact.status === 'optimal' ? [`seed ${seed}: presolve ended ${outcome.kind}`] : [];
    });
    expect(faults).toEqual([]);
  });

  it('make every reduction fire, most of them hundreds of times', () => {
    const fired = new Map<ReductionName, number>();
    for (const { outcome } of drawn) {
      if (outcome.kind !== 'reduced') continue;
      outcome.reduced.counts.forEach((times, name) => fired.set(name, (fired.get(name) ?? 0) + times));
    }
    const { ofRows, ofColumns, ofProblem } = allReductions;
    const names = [...ofRows, ...ofColumns, ...ofProblem].map(({ name }) => name);
    const seldom = names.filter((name) => (fired.get(name) ?? 0) < 20);
    expect({ seldom, fired: Object.fromEntries(fired) }).toEqual({
      seldom: [],
      fired: Object.fromEntries(fired),
    });
    expect(names).toHaveLength(15);
  });

  it('SC-63 are proved infeasible by what presolve or the smaller problem found, carried back', () => {
    // No promise for every problem: a column fixed by its cost may carry what a ray rests on. Here none does.
    const infeasible = drawn.filter(({ exact }) => exact.status === 'infeasible');
    const refused = infeasible.flatMap(({ seed, problem, outcome }) => {
      const ray = carriedRay(outcome);
      return ray === undefined || verifyFarkasRay(problem, ray).isProof ? [] : [`seed ${seed}`];
    });
    expect(infeasible.length).toBeGreaterThan(200);
    expect(refused).toEqual([]);
  });
});

function carriedRay(outcome: PresolveOutcome): Float64Array | undefined {
  if (outcome.kind === 'infeasible') return outcome.ray;
  if (outcome.kind !== 'reduced') return undefined;
  const left = solve(outcome.reduced.problem, { presolve: false });
  return left.status === 'infeasible' ? outcome.reduced.restoreFarkasRay(left.ray) : undefined;
}
