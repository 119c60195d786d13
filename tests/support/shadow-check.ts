/**
 * A second judge of a solver's evidence, written for the tests alone: dense arrays, plain sums, no code shared with
 * solver-core/verification. It looks at the conditions in their textbook form and returns what it finds wrong.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';

type Vector = ArrayLike<number>;

/** Relative to 1 + the largest number in the sum. Coarser than what the core accepts, since sums here are plain. */
const tolerance = 1e-6;

/** A as rows of dense coefficients. */
function denseRows(problem: LinearProgram): number[][] {
  const rows = Array.from({ length: problem.rowCount }, () => new Array<number>(problem.columnCount).fill(0));
  for (let column = 0; column < problem.columnCount; column++) {
    for (let k = problem.matrix.columnStart[column]; k < problem.matrix.columnStart[column + 1]; k++) {
      rows[problem.matrix.rowIndex[k]][column] = problem.matrix.value[k];
    }
  }
  return rows;
}

function dot(a: Vector, b: Vector): { sum: number; size: number } {
  let sum = 0;
  let size = 1;
  for (let k = 0; k < a.length; k++) {
    const term = a[k] * b[k];
    sum += term;
    size = Math.max(size, Math.abs(term));
  }
  return { sum, size };
}

/** What is wrong with x as a feasible point. */
export function findPrimalFaults(problem: LinearProgram, x: Vector): string[] {
  const faults: string[] = [];
  denseRows(problem).forEach((row, i) => {
    const { sum, size } = dot(row, x);
    if (!(sum >= problem.rowLower[i] - tolerance * size && sum <= problem.rowUpper[i] + tolerance * size)) {
      faults.push(`row ${i}: ${sum} not in [${problem.rowLower[i]}, ${problem.rowUpper[i]}]`);
    }
  });
  for (let j = 0; j < problem.columnCount; j++) {
    const size = tolerance * (1 + Math.abs(x[j]));
    if (!(x[j] >= problem.columnLower[j] - size && x[j] <= problem.columnUpper[j] + size)) {
      faults.push(`column ${j}: ${x[j]} not in [${problem.columnLower[j]}, ${problem.columnUpper[j]}]`);
    }
  }
  return faults;
}

/** What is wrong with a claimed optimum: feasibility, dual signs, and objective = dual objective. */
export function findOptimalityFaults(
  problem: LinearProgram,
  claim: { objective: number; x: Vector; rowDuals: Vector; reducedCosts: Vector },
): string[] {
  const faults = findPrimalFaults(problem, claim.x);
  const sense = problem.sense === 'minimise' ? 1 : -1;
  const rows = denseRows(problem);
  const primal = dot(Array.from(problem.cost), claim.x).sum + problem.objectiveConstant;
  let dual = problem.objectiveConstant;
  let largest = 1 + Math.abs(primal);

  const price = (
    what: string,
    multiplier: number,
    size: number,
    lower: number,
    upper: number,
    at: number,
  ): void => {
    const bound = sense * multiplier > 0 ? lower : upper;
    if (Number.isFinite(bound)) {
      dual += multiplier * bound;
      largest = Math.max(largest, Math.abs(multiplier * bound));
    } else {
      dual += multiplier * at;
      if (!(Math.abs(multiplier) <= tolerance * size)) {
        faults.push(`${what}: multiplier ${multiplier} on a bound that is not there`);
      }
    }
  };
  rows.forEach((row, i) => {
    price(
      `row ${i}`,
      claim.rowDuals[i],
      1 + Math.abs(claim.rowDuals[i]),
      problem.rowLower[i],
      problem.rowUpper[i],
      dot(row, claim.x).sum,
    );
  });
  for (let j = 0; j < problem.columnCount; j++) {
    const column = rows.map((row) => row[j]);
    const { sum, size } = dot(column, claim.rowDuals);
    const reduced = problem.cost[j] - sum;
    const scale = Math.max(size, 1 + Math.abs(problem.cost[j]));
    if (!(Math.abs(reduced - claim.reducedCosts[j]) <= tolerance * scale)) {
      faults.push(`column ${j}: reduced cost ${claim.reducedCosts[j]}, by the row duals ${reduced}`);
    }
    price(`column ${j}`, reduced, scale, problem.columnLower[j], problem.columnUpper[j], claim.x[j]);
  }
  if (!(Math.abs(primal - claim.objective) <= tolerance * (1 + Math.abs(primal)))) {
    faults.push(`objective ${claim.objective}, by the point ${primal}`);
  }
  if (!(Math.abs(primal - dual) <= tolerance * largest)) {
    faults.push(`objective ${primal}, dual objective ${dual}`);
  }
  return faults;
}

/** What is wrong with y as a proof that there is no feasible point. */
export function findFarkasFaults(problem: LinearProgram, y: Vector): string[] {
  const faults: string[] = [];
  const rows = denseRows(problem);
  // Row side: y · r can be no less than `least`. Column side: (Aᵀ y) · x can be no more than `greatest`.
  let least = 0;
  let greatest = 0;
  for (let i = 0; i < problem.rowCount; i++) {
    if (y[i] !== 0) {
      least += y[i] * (y[i] > 0 ? problem.rowLower[i] : problem.rowUpper[i]);
    }
  }
  for (let j = 0; j < problem.columnCount; j++) {
    const { sum, size } = dot(
      rows.map((row) => row[j]),
      y,
    );
    const bound = sum > 0 ? problem.columnUpper[j] : problem.columnLower[j];
    const largestTerm = rows.reduce((largest, row, i) => Math.max(largest, Math.abs(row[j] * y[i])), 0);
    if (sum === 0 || (!Number.isFinite(bound) && Math.abs(sum) <= 1e-8 * largestTerm)) continue;
    greatest += sum * bound;
    if (Number.isNaN(size)) faults.push(`column ${j}: not a number`);
  }
  if (!(greatest < least)) {
    faults.push(`columns reach ${greatest}, rows need at least ${least}`);
  }
  return faults;
}

/** What is wrong with x and v as a proof that the objective improves without end. */
export function findUnboundedFaults(problem: LinearProgram, x: Vector, v: Vector): string[] {
  const faults = findPrimalFaults(problem, x);
  const largest = Math.max(...Array.from(v, Math.abs), 0);
  const watch = (what: string, rate: number, size: number, lower: number, upper: number): void => {
    const slack = 1e-8 * size;
    if (!((rate >= -slack || lower === -Infinity) && (rate <= slack || upper === Infinity))) {
      faults.push(`${what} moves toward its bound at ${rate}`);
    }
  };
  for (let j = 0; j < problem.columnCount; j++) {
    watch(`column ${j}`, v[j], largest, problem.columnLower[j], problem.columnUpper[j]);
  }
  denseRows(problem).forEach((row, i) => {
    const size = row.reduce((most, a, j) => Math.max(most, Math.abs(a * v[j])), 0);
    watch(`row ${i}`, dot(row, v).sum, size, problem.rowLower[i], problem.rowUpper[i]);
  });
  const { sum } = dot(Array.from(problem.cost), v);
  const gain = problem.sense === 'minimise' ? -sum : sum;
  if (!(gain > 0)) {
    faults.push(`the objective does not improve: ${gain}`);
  }
  return faults;
}
