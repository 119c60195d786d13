/**
 * A second judge of a solver's evidence, written for the tests alone: plain sums over lists of entries, no code
 * shared with solver-core/verification. It looks at the conditions in their textbook form and says what it finds
 * wrong.
 */
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';

type Vector = ArrayLike<number>;

/** A row or column of A as pairs of place and coefficient. */
type Line = readonly (readonly [place: number, coefficient: number])[];

/** Relative to the largest number in the sum, 1 at least. Coarser than what the core accepts: sums here are plain. */
const tolerance = 1e-6;

/** What may be left of a sum that is 0 in theory, relative to its largest term. */
const noise = 1e-8;

function linesOf(problem: LinearProgram): { rows: readonly Line[]; columns: readonly Line[] } {
  const { columnStart, rowIndex, value } = problem.matrix;
  const rows = Array.from({ length: problem.rowCount }, (): [number, number][] => []);
  const columns = Array.from({ length: problem.columnCount }, (): [number, number][] => []);
  columns.forEach((column, j) => {
    for (let k = columnStart[j]; k < columnStart[j + 1]; k++) {
      column.push([rowIndex[k], value[k]]);
      rows[rowIndex[k]].push([j, value[k]]);
    }
  });
  return { rows, columns };
}

function dot(line: Line, vector: Vector): { sum: number; largest: number } {
  let sum = 0;
  let largest = 0;
  for (const [place, coefficient] of line) {
    const term = coefficient * vector[place];
    sum += term;
    largest = Math.max(largest, Math.abs(term));
  }
  return { sum, largest };
}

function costLine(problem: LinearProgram): Line {
  return Array.from(problem.cost, (cost, j) => [j, cost] as const);
}

/** What is wrong with x as a feasible point. */
export function findPrimalFaults(problem: LinearProgram, x: Vector): string[] {
  const faults: string[] = [];
  linesOf(problem).rows.forEach((row, i) => {
    const { sum, largest } = dot(row, x);
    const slack = tolerance * Math.max(1, largest);
    if (!(sum >= problem.rowLower[i] - slack && sum <= problem.rowUpper[i] + slack)) {
      faults.push(`row ${i}: ${sum} not in [${problem.rowLower[i]}, ${problem.rowUpper[i]}]`);
    }
  });
  for (let j = 0; j < problem.columnCount; j++) {
    const slack = tolerance * Math.max(1, Math.abs(x[j]));
    if (!(x[j] >= problem.columnLower[j] - slack && x[j] <= problem.columnUpper[j] + slack)) {
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
  const { rows, columns } = linesOf(problem);
  const primal = dot(costLine(problem), claim.x).sum + problem.objectiveConstant;
  let dual = problem.objectiveConstant;
  let largest = Math.max(1, Math.abs(primal));

  const price = (
    what: string,
    multiplier: number,
    scale: number,
    lower: number,
    upper: number,
    at: number,
  ): void => {
    const bound = sense * multiplier > 0 ? lower : upper;
    const isThere = Number.isFinite(bound);
    if (!isThere && !(Math.abs(multiplier) <= tolerance * scale)) {
      faults.push(`${what}: multiplier ${multiplier} on a bound that is not there`);
    }
    const worth = multiplier * (isThere ? bound : at);
    dual += worth;
    largest = Math.max(largest, Math.abs(worth));
  };
  rows.forEach((row, i) => {
    const y = claim.rowDuals[i];
    price(
      `row ${i}`,
      y,
      Math.max(1, Math.abs(y)),
      problem.rowLower[i],
      problem.rowUpper[i],
      dot(row, claim.x).sum,
    );
  });
  columns.forEach((column, j) => {
    const { sum, largest: largestTerm } = dot(column, claim.rowDuals);
    const reduced = problem.cost[j] - sum;
    const scale = Math.max(1, largestTerm, Math.abs(problem.cost[j]));
    if (!(Math.abs(reduced - claim.reducedCosts[j]) <= tolerance * scale)) {
      faults.push(`column ${j}: reduced cost ${claim.reducedCosts[j]}, by the row duals ${reduced}`);
    }
    price(`column ${j}`, reduced, scale, problem.columnLower[j], problem.columnUpper[j], claim.x[j]);
  });
  if (!(Math.abs(primal - claim.objective) <= tolerance * Math.max(1, Math.abs(primal)))) {
    faults.push(`objective ${claim.objective}, by the point ${primal}`);
  }
  if (!(Math.abs(primal - dual) <= tolerance * largest)) {
    faults.push(`objective ${primal}, dual objective ${dual}`);
  }
  return faults;
}

/** What is wrong with y as a proof that there is no feasible point. */
export function findFarkasFaults(problem: LinearProgram, y: Vector): string[] {
  // Rows: y · r can be no less than `least`. Columns: (Aᵀ y) · x can be no more than `greatest`.
  let least = 0;
  let greatest = 0;
  for (let i = 0; i < problem.rowCount; i++) {
    if (y[i] !== 0) {
      least += y[i] * (y[i] > 0 ? problem.rowLower[i] : problem.rowUpper[i]);
    }
  }
  linesOf(problem).columns.forEach((column, j) => {
    const { sum, largest } = dot(column, y);
    const bound = sum > 0 ? problem.columnUpper[j] : problem.columnLower[j];
    if (sum !== 0 && (Number.isFinite(bound) || !(Math.abs(sum) <= noise * largest))) {
      greatest += sum * bound;
    }
  });
  return greatest < least ? [] : [`columns reach ${greatest}, rows need at least ${least}`];
}

/** What is wrong with x and v as a proof that the objective improves without end. */
export function findUnboundedFaults(problem: LinearProgram, x: Vector, v: Vector): string[] {
  const faults = findPrimalFaults(problem, x);
  const watch = (what: string, rate: number, size: number, lower: number, upper: number): void => {
    const slack = noise * size;
    if (!((rate >= -slack || lower === -Infinity) && (rate <= slack || upper === Infinity))) {
      faults.push(`${what} moves toward its bound at ${rate}`);
    }
  };
  let largest = 0;
  for (let j = 0; j < problem.columnCount; j++) {
    largest = Math.max(largest, Math.abs(v[j]));
  }
  for (let j = 0; j < problem.columnCount; j++) {
    watch(`column ${j}`, v[j], largest, problem.columnLower[j], problem.columnUpper[j]);
  }
  linesOf(problem).rows.forEach((row, i) => {
    const { sum, largest: largestTerm } = dot(row, v);
    watch(`row ${i}`, sum, largestTerm, problem.rowLower[i], problem.rowUpper[i]);
  });
  const { sum } = dot(costLine(problem), v);
  const gain = problem.sense === 'minimise' ? -sum : sum;
  if (!(gain > 0)) {
    faults.push(`the objective does not improve: ${gain}`);
  }
  return faults;
}
