/**
 * What every reduction of presolve must do, used alone: keep the optimum, and be undone in full. A reduction's test
 * calls this with small problems whose answers are worked out by hand.
 *
 * For each problem: the reduction fires; the optimum of what is left is the hand-worked one, and that of the exact
 * oracle; what is restored is optimal on the stated problem by the shadow check; exactly m variables are basic; and
 * the simplex finds nothing to do, or to repair, when it starts from the restored basis.
 */
import { solve, VariableStatus, type LinearProgram, type OptimalResult } from '#solver-core';
import { WorkMeter } from '../../solver-core/control/work-meter';
import { presolve, type PresolveOutcome } from '../../solver-core/presolve/presolve';
import type { ReducedProblem, RestoredSolution } from '../../solver-core/presolve/reduced-problem';
import type { ReductionName } from '../../solver-core/presolve/reduction';
import type { ReductionSet } from '../../solver-core/presolve/reductions/all-reductions';
import { solveExactly } from '../oracles/exact-tableau-simplex';
import { lp } from '../support/lp-notation';
import { findFarkasFaults, findOptimalityFaults } from '../support/shadow-check';

export interface ReductionCase {
  /** What happens: a sentence, with the spec rule where there is one. */
  readonly sentence: string;
  /** In the notation of lp-notation.ts. */
  readonly problem: string;
  /** Worked out by hand. */
  readonly objective: number;
  /** Rows and columns that are left. */
  readonly left: readonly [rows: number, columns: number];
  /** By hand, where the optimum is unique: values by column name. */
  readonly x?: Readonly<Record<string, number>>;
  /** By hand, where they are unique: dual values by row name. */
  readonly rowDuals?: Readonly<Record<string, number>>;
}

/** Absolute; the numbers of the cases are of the size of 1 to 1000. */
const tolerance = 1e-9;

/** The reductions of a set, the others left out. */
export function onlyThese(reductions: Partial<ReductionSet>): ReductionSet {
  return { ofRows: [], ofColumns: [], ofProblem: [], ...reductions };
}

export function reductionContract(
  name: ReductionName,
  reductions: ReductionSet,
  cases: readonly ReductionCase[],
): void {
  describe(`the reduction ${name}`, () => {
    it.each(cases)('$sentence', (one) => {
      const problem = lp(one.problem);
      const reduced = expectReduced(presolve(problem, new WorkMeter(Infinity), reductions));
      expect(reduced.counts.get(name) ?? 0).toBeGreaterThan(0);
      expect([reduced.problem.rowCount, reduced.problem.columnCount]).toEqual(one.left);

      const end = solveToOptimum(reduced.problem);
      expect(end.objective).toBeCloseTo(one.objective, 9);
      const exact = solveExactly(problem);
      expect(exact.status === 'optimal' && exact.objective).toBeCloseTo(one.objective, 9);

      const restored = reduced.restoreSolution(end, end.basis);
      expect(findFaultsOfRestored(problem, restored)).toEqual([]);
      expectNamed(one.x, problem.columnNames, restored.x);
      expectNamed(one.rowDuals, problem.rowNames, restored.rowDuals);
    });
  });
}

/** Problems in which the reduction finds a contradiction; what it says must prove it on the stated problem. */
export function contradictionContract(
  name: ReductionName,
  reductions: ReductionSet,
  problems: readonly { readonly sentence: string; readonly problem: string }[],
): void {
  describe(`a contradiction found by ${name}`, () => {
    it.each(problems)('SC-63 $sentence', ({ problem: text }) => {
      const problem = lp(text);
      const outcome = presolve(problem, new WorkMeter(Infinity), reductions);
      expect(outcome.kind).toBe('infeasible');
      expect(outcome.kind === 'infeasible' && findFarkasFaults(problem, outcome.ray)).toEqual([]);
      expect(solveExactly(problem).status).toBe('infeasible');
    });
  });
}

/** What is wrong with a restored solution and its basis, on the stated problem. */
export function findFaultsOfRestored(problem: LinearProgram, restored: RestoredSolution): string[] {
  const { x, rowDuals, reducedCosts, basis } = restored;
  const objective = x.reduce(
    (sum, value, column) => sum + problem.cost[column] * value,
    problem.objectiveConstant,
  );
  const faults = findOptimalityFaults(problem, { objective, x, rowDuals, reducedCosts });
  const statuses = [...basis.columnStatus, ...basis.rowStatus];
  const basicCount = statuses.filter((status) => status === VariableStatus.basic).length;
  if (basicCount !== problem.rowCount)
    faults.push(`${basicCount} basic variables in ${problem.rowCount} rows`);
  const again = solve(problem, { startBasis: basis });
  if (again.status !== 'optimal') return [...faults, `from the restored basis: ${again.status}`];
  if (again.iterations > 0) faults.push(`${again.iterations} iterations from the restored basis`);
  const isSame = (a: ArrayLike<number>, b: ArrayLike<number>): boolean =>
    Array.from(a).every((status, k) => (status === VariableStatus.basic) === (b[k] === VariableStatus.basic));
  const isKept =
    isSame(basis.columnStatus, again.basis.columnStatus) && isSame(basis.rowStatus, again.basis.rowStatus);
  if (!isKept) faults.push('the restored basis was singular and had to be repaired');
  return faults;
}

export function expectReduced(outcome: PresolveOutcome): ReducedProblem {
  if (outcome.kind !== 'reduced') throw new Error(`presolve ended ${outcome.kind}`);
  return outcome.reduced;
}

function solveToOptimum(problem: LinearProgram): OptimalResult {
  const result = solve(problem, { presolve: false });
  if (result.status !== 'optimal') throw new Error(`the reduced problem ended ${result.status}`);
  return result;
}

function expectNamed(
  wanted: Readonly<Record<string, number>> | undefined,
  names: readonly string[],
  values: ArrayLike<number>,
): void {
  for (const [name, value] of Object.entries(wanted ?? {})) {
    const difference = Math.abs(values[names.indexOf(name)] - value);
    expect({ name, value: values[names.indexOf(name)], isRight: difference <= tolerance }).toEqual({
      name,
      value: values[names.indexOf(name)],
      isRight: true,
    });
  }
}
