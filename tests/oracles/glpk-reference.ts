/**
 * The open-source solver GLPK as a cross-check, for many small problems at once.
 */
import { spawnSync } from 'node:child_process';
import path from 'node:path';
import type { LinearProgram } from '../../solver-core/linear-program/linear-program';
import type { ReferenceStatus } from './highs-reference';

export interface GlpkAnswer {
  readonly status: ReferenceStatus;
  /** With the constant as stated; of account only when optimal. */
  readonly objective: number;
}

/** Kinds of bounds, as GLPK numbers them: free, lower, upper, double, fixed. */
const boundType = { free: 1, lower: 2, upper: 3, both: 4, fixed: 5 } as const;

interface StatedBounds {
  readonly type: number;
  readonly lb: number;
  readonly ub: number;
}

/**
 * The answers, in the order of the problems, without whole-number demands.
 * @throws Error when the other process fails
 */
export function solveWithGlpk(problems: readonly LinearProgram[]): readonly GlpkAnswer[] {
  const child = spawnSync(process.execPath, ['--import', 'tsx', path.join(__dirname, 'glpk-child.ts')], {
    input: JSON.stringify(problems.map(toGlpkModel)),
    encoding: 'utf8',
    maxBuffer: 1 << 28,
    timeout: 60_000,
  });
  if (child.status !== 0) {
    throw new Error(`glpk.js failed: ${child.stderr}`);
  }
  const answers = JSON.parse(child.stdout) as readonly GlpkAnswer[];
  return answers.map(({ status, objective }, index) => ({
    status,
    objective: objective + problems[index].objectiveConstant,
  }));
}

function toGlpkModel(problem: LinearProgram): object {
  const { columnStart, rowIndex, value } = problem.matrix;
  const rows = Array.from({ length: problem.rowCount }, (_, row) => ({
    name: `r${row}`,
    vars: [] as { name: string; coef: number }[],
    bnds: bounds(problem.rowLower[row], problem.rowUpper[row]),
  }));
  for (let column = 0; column < problem.columnCount; column++) {
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      rows[rowIndex[entry]].vars.push({ name: `x${column}`, coef: value[entry] });
    }
  }
  return {
    name: 'problem',
    objective: {
      direction: problem.sense === 'maximise' ? 2 : 1,
      name: 'objective',
      vars: Array.from(problem.cost, (coef, column) => ({ name: `x${column}`, coef })),
    },
    subjectTo: rows,
    bounds: Array.from(problem.columnLower, (lower, column) => ({
      name: `x${column}`,
      ...bounds(lower, problem.columnUpper[column]),
    })),
  };
}

function bounds(lower: number, upper: number): StatedBounds {
  if (lower === upper) return { type: boundType.fixed, lb: lower, ub: upper };
  if (lower === -Infinity && upper === Infinity) return { type: boundType.free, lb: 0, ub: 0 };
  if (lower === -Infinity) return { type: boundType.upper, lb: 0, ub: upper };
  if (upper === Infinity) return { type: boundType.lower, lb: lower, ub: 0 };
  return { type: boundType.both, lb: lower, ub: upper };
}
