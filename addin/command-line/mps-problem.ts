/**
 * A problem in an MPS file (.mps, or packed as .mps.gz): read, and reported by the names it gives its rows and
 * columns. It has no cells, and nothing is written.
 */
import { readFile } from 'node:fs/promises';
import { promisify } from 'node:util';
import { gunzip } from 'node:zlib';
import { MpsSyntaxError, readMpsWithWarnings, type LinearProgram, type SolveResult } from '#solver-core';
import { planValuesOf } from '../domain/results-to-sheet/solved-values';
import { sentenceOfFileFault, sentenceOfIntegerColumn } from '../wording/report-wording';
import {
  errorEntry,
  type ConstraintEntry,
  type DecisionEntry,
  type IssueEntry,
  type SolveReport,
} from './solve-report';
import { solverFigures } from './solver-figures';
import { UsageError } from './usage-error';

/** A packed file that grows beyond this is no problem that fits in memory. */
const largestText = 1 << 29;

export interface MpsFile {
  readonly problem: LinearProgram;
  readonly warnings: readonly IssueEntry[];
}

export function isMpsFileName(path: string): boolean {
  return /\.mps(\.gz)?$/i.test(path);
}

/** @throws UsageError where the file cannot be read or is no MPS file */
export async function readMpsFile(path: string): Promise<MpsFile> {
  const text = await readText(path);
  try {
    const { problem, warnings } = readMpsWithWarnings(text);
    return {
      problem,
      warnings: warnings.map((warning) => ({
        code: warning.code,
        severity: 'warning',
        cell: null,
        message: warning.message,
      })),
    };
  } catch (error) {
    if (error instanceof MpsSyntaxError) {
      throw new UsageError(error.code, `${path}: ${error.message}`, { cause: error });
    }
    throw error;
  }
}

async function readText(path: string): Promise<string> {
  let bytes: Buffer;
  try {
    bytes = await readFile(path);
  } catch (error) {
    throw new UsageError(
      'unreadable-file',
      sentenceOfFileFault(path, (error as NodeJS.ErrnoException).code),
      {
        cause: error,
      },
    );
  }
  if (!/\.gz$/i.test(path)) {
    return bytes.toString('utf8');
  }
  try {
    return (await promisify(gunzip)(bytes, { maxOutputLength: largestText })).toString('utf8');
  } catch (error) {
    const isTooLarge = (error as NodeJS.ErrnoException).code === 'ERR_BUFFER_TOO_LARGE';
    throw new UsageError(
      'unreadable-file',
      sentenceOfFileFault(path, isTooLarge ? 'too-large' : 'not-gzip'),
      {
        cause: error,
      },
    );
  }
}

/** The problem's name in its file; null where it gives none. */
export function nameOfProblem(problem: LinearProgram): string | null {
  return problem.name === '' ? null : problem.name;
}

/** Why the problem cannot be solved without --relax; nothing where no column must be a whole number. */
export function refusalOfIntegers(problem: LinearProgram): IssueEntry[] {
  const column = problem.isInteger.slice().indexOf(1);
  return column < 0
    ? []
    : [errorEntry('integers-not-supported', sentenceOfIntegerColumn(problem.columnNames[column]))];
}

/** @param issues warnings of reading */
export function reportOfProblem(
  problem: LinearProgram,
  result: SolveResult,
  issues: readonly IssueEntry[],
): Omit<SolveReport, 'seconds'> {
  const values = planValuesOf(result);
  const objective = values?.objective ?? null;
  return {
    status: result.status,
    plan: nameOfProblem(problem),
    sense: problem.sense,
    objective,
    ...solverFigures(result, objective, null),
    decisions: problem.columnNames.map((name, column): DecisionEntry => {
      return {
        name,
        cell: null,
        value: values?.x[column] ?? null,
        lower: problem.columnLower[column],
        upper: problem.columnUpper[column],
        reducedCost: values?.reducedCosts[column] ?? null,
        costFrom: null,
        costTo: null,
      };
    }),
    constraints: problem.rowNames.map((name, row): ConstraintEntry => {
      const lower = problem.rowLower[row];
      const upper = problem.rowUpper[row];
      const relation = relationOf(lower, upper);
      const activity = values?.rowActivities[row] ?? null;
      return {
        name,
        cell: null,
        leftSide: activity,
        relation,
        rightSide: relation === '>=' ? lower : relation === '<=' || relation === '=' ? upper : null,
        lower,
        upper,
        slack: activity === null ? null : slackOf(activity, lower, upper),
        dualValue: values?.rowDuals[row] ?? null,
        dualMore: null,
        dualLess: null,
        validFrom: null,
        validTo: null,
      };
    }),
    conflict: null,
    relaxation: null,
    written: null,
    issues,
  };
}

function relationOf(lower: number, upper: number): ConstraintEntry['relation'] {
  if (lower === upper) {
    return '=';
  }
  if (lower === -Infinity) {
    return upper === Infinity ? 'free' : '<=';
  }
  return upper === Infinity ? '>=' : 'range';
}

/** Distance to the nearer end; none for an equation; a violation within the solver's tolerance is no slack. */
function slackOf(activity: number, lower: number, upper: number): number | null {
  if (lower === upper) {
    return 0;
  }
  const distance = Math.min(activity - lower, upper - activity);
  return Number.isFinite(distance) ? Math.max(0, distance) : null;
}
