/**
 * The open-source solver HiGHS as a cross-check: the problem is handed over as arrays, so that no file format of
 * ours stands between.
 */
import type { Highs, ModelData } from 'highs';
import loadHighs from 'highs';
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';

export type ReferenceStatus = 'optimal' | 'infeasible' | 'unbounded' | 'unknown';

export interface HighsAnswer {
  readonly status: ReferenceStatus;
  /** As stated, with its constant; of account only when optimal. */
  readonly objective: number;
  readonly x: Float64Array;
  /** d(objective as stated) / d(right side). */
  readonly rowDuals: Float64Array;
  readonly reducedCosts: Float64Array;
  readonly iterations: number;
  /** When infeasible and asked for. */
  readonly farkasRay: Float64Array | undefined;
  /** When unbounded and asked for. */
  readonly unboundedRay: Float64Array | undefined;
}

export interface HighsOptions {
  /** Default off, since presolve may end with "infeasible or unbounded". */
  readonly presolve?: 'on' | 'off';
  readonly withRays?: boolean;
}

let loaded: Promise<Highs> | undefined;

/** The solver, loaded once. */
export function loadHighsOnce(): Promise<Highs> {
  loaded ??= loadHighs();
  return loaded;
}

/** The problem without whole-number demands, as the solver takes it. */
export function toHighsModel(highs: Highs, problem: LinearProgram): ModelData {
  const { objectiveSense } = highs.constants;
  return {
    numCols: problem.columnCount,
    numRows: problem.rowCount,
    sense: problem.sense === 'maximise' ? objectiveSense.maximize : objectiveSense.minimize,
    offset: problem.objectiveConstant,
    colCost: Float64Array.from(problem.cost),
    colLower: Float64Array.from(problem.columnLower),
    colUpper: Float64Array.from(problem.columnUpper),
    rowLower: Float64Array.from(problem.rowLower),
    rowUpper: Float64Array.from(problem.rowUpper),
    matrix: {
      format: 'csc',
      numRows: problem.rowCount,
      numCols: problem.columnCount,
      starts: Int32Array.from(problem.matrix.columnStart),
      indices: Int32Array.from(problem.matrix.rowIndex),
      values: Float64Array.from(problem.matrix.value),
    },
  };
}

/** Solves by the simplex method. */
export function solveWithHighs(
  highs: Highs,
  problem: LinearProgram,
  options: HighsOptions = {},
): HighsAnswer {
  return highs.withModel(toHighsModel(highs, problem), (model) => {
    model.options.set({ output_flag: false, presolve: options.presolve ?? 'off', solver: 'simplex' });
    model.run();
    const { modelStatus } = highs.constants;
    const code = model.getModelStatus();
    const status: ReferenceStatus =
      code === modelStatus.optimal
        ? 'optimal'
        : code === modelStatus.infeasible
          ? 'infeasible'
          : code === modelStatus.unbounded
            ? 'unbounded'
            : 'unknown';
    const solution = model.getSolution();
    const withRays = options.withRays ?? false;
    return {
      status,
      objective: model.getObjectiveValue(),
      x: solution.colValue,
      rowDuals: solution.rowDual,
      reducedCosts: solution.colDual,
      iterations: Number(model.info.get('simplex_iteration_count')),
      farkasRay: withRays && status === 'infeasible' ? model.getDualRay()?.values : undefined,
      unboundedRay: withRays && status === 'unbounded' ? model.getPrimalRay()?.values : undefined,
    };
  });
}
