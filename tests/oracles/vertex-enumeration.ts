/**
 * The plainest oracle there is: every point where n of the problem's bounds, of columns and rows, meet is tried.
 * For tiny problems whose columns are all bounded on both sides, so that a feasible problem has an optimal vertex.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';

export type EnumeratedAnswer =
  { readonly status: 'infeasible' } | { readonly status: 'optimal'; readonly objective: number };

interface Plane {
  readonly coefficients: readonly number[];
  readonly rightSide: number;
}

/** Absolute; the problems tried are of small whole numbers. */
const tolerance = 1e-9;

/** @throws Error when a column is not bounded on both sides */
export function solveByEnumeration(problem: LinearProgram): EnumeratedAnswer {
  const n = problem.columnCount;
  const rows = Array.from({ length: problem.rowCount }, () => new Array<number>(n).fill(0));
  for (let j = 0; j < n; j++) {
    if (!Number.isFinite(problem.columnLower[j]) || !Number.isFinite(problem.columnUpper[j])) {
      throw new Error('enumeration needs bounds on both sides of every column');
    }
    for (let k = problem.matrix.columnStart[j]; k < problem.matrix.columnStart[j + 1]; k++) {
      rows[problem.matrix.rowIndex[k]][j] = problem.matrix.value[k];
    }
  }
  const units = Array.from({ length: n }, (_, j) => Array.from({ length: n }, (__, k) => (j === k ? 1 : 0)));
  const lines = [...units, ...rows];
  const lower = [...problem.columnLower, ...problem.rowLower];
  const upper = [...problem.columnUpper, ...problem.rowUpper];
  const planes: Plane[] = lines.flatMap((coefficients, k) =>
    [...new Set([lower[k], upper[k]])]
      .filter(Number.isFinite)
      .map((rightSide) => ({ coefficients, rightSide })),
  );

  const sense = problem.sense === 'minimise' ? 1 : -1;
  let best = Infinity;
  for (const chosen of subsets(planes, n)) {
    const x = intersection(chosen);
    if (x === undefined || lines.some((line, k) => !isWithin(dot(line, x), lower[k], upper[k]))) continue;
    best = Math.min(best, sense * dot(Array.from(problem.cost), x));
  }
  return best === Infinity
    ? { status: 'infeasible' }
    : { status: 'optimal', objective: sense * best + problem.objectiveConstant };
}

function isWithin(value: number, lower: number, upper: number): boolean {
  return value >= lower - tolerance && value <= upper + tolerance;
}

function dot(a: readonly number[], b: readonly number[]): number {
  return a.reduce((sum, value, k) => sum + value * b[k], 0);
}

function* subsets<T>(items: readonly T[], size: number, from = 0): Generator<readonly T[]> {
  if (size === 0) {
    yield [];
    return;
  }
  for (let first = from; first <= items.length - size; first++) {
    for (const rest of subsets(items, size - 1, first + 1)) yield [items[first], ...rest];
  }
}

/** The one point that lies on all planes, by elimination with the largest pivot; undefined where there is not one. */
function intersection(planes: readonly Plane[]): number[] | undefined {
  const n = planes.length;
  const system = planes.map(({ coefficients, rightSide }) => [...coefficients, rightSide]);
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(system[i][k]) > Math.abs(system[pivot][k])) pivot = i;
    if (Math.abs(system[pivot][k]) < tolerance) return undefined;
    [system[k], system[pivot]] = [system[pivot], system[k]];
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const factor = system[i][k] / system[k][k];
      for (let j = k; j <= n; j++) system[i][j] -= factor * system[k][j];
    }
  }
  return system.map((line, k) => line[n] / line[k]);
}
