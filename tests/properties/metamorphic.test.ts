/**
 * Problems that say the same in another way must end the same way, and duals must say what a change is worth.
 *
 * No answer is needed from outside: each problem is compared with itself, restated.
 */
import { solve, VariableStatus, type Basis, type LinearProgram, type OptimalResult } from '#solver-core';
import { LinearProgramBuilder } from '../../solver-core/linear-program/linear-program-builder';
import { findEvidenceFaults } from '../support/find-evidence-faults';
import { SeededRandom } from '../../solver-core/numerics/seeded-random';
import { randomKinds, randomLinearProgram } from '../support/random-linear-program';
import { relativeDifference } from '../support/reference-problems';

const firstSeed = 200_000;
const count = 220;
const problems = Array.from({ length: count }, (_, k) => ({
  seed: firstSeed + k,
  problem: randomLinearProgram(firstSeed + k, randomKinds[k % randomKinds.length]),
}));
/** Relative, with 1 as the least to be relative to. */
const tolerance = 1e-6;

/** The seeds at which a restated problem does not end like the stated one; the objective is the stated one's × sign. */
function differences(
  restate: (problem: LinearProgram, seed: number) => LinearProgram,
  sign: 1 | -1 = 1,
): string[] {
  return problems.flatMap(({ seed, problem }) => {
    const stated = solve(problem);
    const other = restate(problem, seed);
    const restated = solve(other);
    const faults = findEvidenceFaults(other, restated).map((fault) => `seed ${seed}: ${fault}`);
    if (stated.status !== restated.status) {
      return [...faults, `seed ${seed}: ${stated.status}, restated ${restated.status}`];
    }
    return stated.status === 'optimal' &&
      restated.status === 'optimal' &&
      !(relativeDifference(restated.objective, sign * stated.objective) <= tolerance)
      ? [...faults, `seed ${seed}: ${stated.objective}, restated ${restated.objective}`]
      : faults;
  });
}

/** Rows and columns in another order, each row and column in units of its own. */
function rebuilt(
  problem: LinearProgram,
  rowOrder: readonly number[],
  columnOrder: readonly number[],
  rowUnit: (row: number) => number = () => 1,
  columnUnit: (column: number) => number = () => 1,
): LinearProgram {
  const builder = new LinearProgramBuilder({ sense: problem.sense });
  builder.objectiveConstant = problem.objectiveConstant;
  const rowPlace = new Map(rowOrder.map((row, place) => [row, place]));
  for (const row of rowOrder) {
    builder.addRow({
      lower: problem.rowLower[row] * rowUnit(row),
      upper: problem.rowUpper[row] * rowUnit(row),
    });
  }
  for (const column of columnOrder) {
    const unit = columnUnit(column);
    const place = builder.addColumn({
      cost: problem.cost[column] * unit,
      lower: problem.columnLower[column] / unit,
      upper: problem.columnUpper[column] / unit,
    });
    for (
      let entry = problem.matrix.columnStart[column];
      entry < problem.matrix.columnStart[column + 1];
      entry++
    ) {
      const row = problem.matrix.rowIndex[entry];
      builder.addEntry(rowPlace.get(row)!, place, problem.matrix.value[entry] * unit * rowUnit(row));
    }
  }
  return builder.build();
}

const inOrder = (length: number): number[] => Array.from({ length }, (_, index) => index);

describe(`${count} random problems of all kinds, restated, seeds from ${firstSeed}`, () => {
  it('SC-11 end alike when costs change their sign and minimise becomes maximise', () => {
    const turned = (problem: LinearProgram): LinearProgram => ({
      ...problem,
      sense: problem.sense === 'minimise' ? 'maximise' : 'minimise',
      cost: problem.cost.slice().map((cost) => -cost),
      objectiveConstant: -problem.objectiveConstant,
    });
    expect(differences(turned, -1)).toEqual([]);
  });

  it('end alike with rows and columns in the reverse order', () => {
    const reversed = (problem: LinearProgram): LinearProgram =>
      rebuilt(problem, inOrder(problem.rowCount).reverse(), inOrder(problem.columnCount).reverse());
    expect(differences(reversed)).toEqual([]);
  });

  it('end alike in other units of rows and columns', () => {
    const inOtherUnits = (problem: LinearProgram, seed: number): LinearProgram => {
      const random = new SeededRandom(seed);
      const units = (length: number): number[] =>
        Array.from({ length }, () => 2 ** random.nextInteger(-4, 4));
      const [rows, columns] = [units(problem.rowCount), units(problem.columnCount)];
      return rebuilt(
        problem,
        inOrder(problem.rowCount),
        inOrder(problem.columnCount),
        (row) => rows[row],
        (column) => columns[column],
      );
    };
    expect(differences(inOtherUnits)).toEqual([]);
  });

  it('end alike with every row stated twice', () => {
    const doubled = (problem: LinearProgram): LinearProgram => {
      const { rowCount, columnCount } = problem;
      const builder = new LinearProgramBuilder({ sense: problem.sense });
      builder.objectiveConstant = problem.objectiveConstant;
      for (let row = 0; row < 2 * rowCount; row++) {
        builder.addRow({ lower: problem.rowLower[row % rowCount], upper: problem.rowUpper[row % rowCount] });
      }
      for (let column = 0; column < columnCount; column++) {
        const [lower, upper] = [problem.columnLower[column], problem.columnUpper[column]];
        builder.addColumn({ cost: problem.cost[column], lower, upper });
        for (let k = problem.matrix.columnStart[column]; k < problem.matrix.columnStart[column + 1]; k++) {
          builder.addEntry(problem.matrix.rowIndex[k], column, problem.matrix.value[k]);
          builder.addEntry(problem.matrix.rowIndex[k] + rowCount, column, problem.matrix.value[k]);
        }
      }
      return builder.build();
    };
    expect(differences(doubled)).toEqual([]);
  });

  it('SC-33 end alike from any start basis, even one drawn at random', () => {
    const faults = problems.flatMap(({ seed, problem }) => {
      const cold = solve(problem);
      const warm = solve(problem, { startBasis: randomBasis(problem, seed) });
      if (cold.status !== warm.status) return [`seed ${seed}: ${cold.status}, from the basis ${warm.status}`];
      return cold.status === 'optimal' &&
        warm.status === 'optimal' &&
        !(relativeDifference(warm.objective, cold.objective) <= tolerance)
        ? [`seed ${seed}: ${cold.objective}, from the basis ${warm.objective}`]
        : [];
    });
    expect(faults).toEqual([]);
  });

  it('SC-11 dual values and reduced costs never promise more than a change is worth', () => {
    // The optimum is a convex function of right sides and bounds (minimising): it lies above each of its tangents,
    // and a dual value is the slope of one. Holds at degenerate optima too, whichever dual value is given.
    const faults = problems.flatMap(({ seed, problem }) => {
      const result = solve(problem);
      if (result.status !== 'optimal') return [];
      const random = new SeededRandom(seed);
      const by = random.pick([-1, 1]) * random.pick([0.25, 1, 3]);
      return [...rowChanges(problem, result, by), ...columnChanges(problem, result, by)]
        .filter(({ changed, promised }) => {
          const after = solve(changed);
          if (after.status !== 'optimal') return after.status === 'unbounded';
          const sense = problem.sense === 'minimise' ? 1 : -1;
          const gain = sense * (after.objective - result.objective);
          const scale = Math.max(1, Math.abs(result.objective), Math.abs(promised));
          return gain < sense * promised - tolerance * scale;
        })
        .map(({ what }) => `seed ${seed}: ${what} by ${by}`);
    });
    expect(faults).toEqual([]);
  });
});

interface Change {
  readonly what: string;
  readonly changed: LinearProgram;
  /** What the objective should change by, by the dual value or reduced cost. */
  readonly promised: number;
}

/** Each row's bounds moved. */
function rowChanges(problem: LinearProgram, { rowDuals }: OptimalResult, by: number): Change[] {
  return inOrder(problem.rowCount).map((row) => ({
    what: `row ${row} moved`,
    changed: {
      ...problem,
      rowLower: problem.rowLower.slice().map((bound, k) => (k === row ? bound + by : bound)),
      rowUpper: problem.rowUpper.slice().map((bound, k) => (k === row ? bound + by : bound)),
    },
    promised: rowDuals[row] * by,
  }));
}

/** Each column's bounds moved. */
function columnChanges(problem: LinearProgram, { reducedCosts }: OptimalResult, by: number): Change[] {
  return inOrder(problem.columnCount).map((column) => ({
    what: `column ${column} moved`,
    changed: {
      ...problem,
      columnLower: problem.columnLower.slice().map((bound, k) => (k === column ? bound + by : bound)),
      columnUpper: problem.columnUpper.slice().map((bound, k) => (k === column ? bound + by : bound)),
    },
    promised: reducedCosts[column] * by,
  }));
}

/** Any statuses at all: too many or too few basic variables, bounds that are not there, singular or not. */
function randomBasis(problem: LinearProgram, seed: number): Basis {
  const random = new SeededRandom(seed);
  const statuses = Object.values(VariableStatus);
  const draw = (length: number): Uint8Array => Uint8Array.from({ length }, () => random.pick(statuses));
  return { columnStatus: draw(problem.columnCount), rowStatus: draw(problem.rowCount) };
}
