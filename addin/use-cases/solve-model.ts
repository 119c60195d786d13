/**
 * Solve a plan of a workbook and bring the result onto its sheets: read → build → solve → plan the writes → apply.
 *
 * Nothing is written unless there is a plan to write: an optimal one, the best one of a stopped solve, or one whose
 * optimality could not be shown to the last figure (imprecise, which the caller must say).
 */
import type { Progress, SolveOptions, SolveResult } from '#solver-core';
import { buildLinearProgram } from '../domain/model-from-sheet/build-linear-program';
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import { readPlan, type ModelSize } from '../domain/model-from-sheet/read-plan';
import type { SheetModel } from '../domain/model-from-sheet/sheet-model';
import { planResultWrites, type ResultWrites } from '../domain/results-to-sheet/plan-result-writes';
import { planSolutionOf, type PlanSolution } from '../domain/results-to-sheet/plan-solution';
import type { ResultTexts } from '../domain/results-to-sheet/result-texts';
import { planValuesOf, solvedValuesOf } from '../domain/results-to-sheet/solved-values';
import { serialDateIn } from '../domain/sheet/serial-date';
import type { RunningSolve, Solver } from '../ports/solver';
import type { Workbook } from '../ports/workbook';
import { choosePlan, type NoSuchPlan } from './choose-plan';

export interface SolveModelRequest {
  readonly workbook: Workbook;
  readonly solver: Solver;
  /** null: the workbook's only plan. */
  readonly planName: string | null;
  readonly options: SolveOptions;
  /** Leave the decision cells as they are; results are written beside them all the same. */
  readonly keepDecisions: boolean;
  readonly texts: ResultTexts;
  /** The caller's clock as a serial date counted from 1900, for TODAY and NOW. */
  readonly today: number;
  /** Seconds since any fixed moment. */
  readonly clock: () => number;
  readonly onProgress?: (progress: Progress) => void;
  /** Given the running solve, so that the caller can stop it. */
  readonly onStart?: (running: RunningSolve) => void;
}

/** Seconds that each part took. */
export interface SolveTimes {
  readonly read: number;
  readonly build: number;
  readonly solve: number;
  readonly write: number;
}

/** The plan has errors: nothing was solved. */
export interface InvalidModel {
  readonly kind: 'invalid';
  readonly planName: string;
  readonly size: ModelSize | null;
  readonly issues: readonly ModelIssue[];
  readonly times: SolveTimes;
}

export interface SolvedModel {
  readonly kind: 'solved';
  readonly planName: string;
  readonly model: SheetModel;
  readonly size: ModelSize;
  /** Warnings only. */
  readonly issues: readonly ModelIssue[];
  readonly result: SolveResult;
  /**
   * The solver's status; `imprecise` in place of `optimal` where the workbook's own arithmetic disagrees with the
   * model, since the plan is not proved for the workbook then.
   */
  readonly status: SolveResult['status'];
  /** null where there is no plan: infeasible, unbounded, or stopped before one was found. */
  readonly solution: PlanSolution | null;
  /** What was written into the workbook; null where nothing was. */
  readonly writes: ResultWrites | null;
  readonly times: SolveTimes;
}

/**
 * @throws WorkbookError where the workbook cannot be read or written
 * @throws SolverThreadError, InvalidProblemError as the solver does
 */
export async function solveModel(
  request: SolveModelRequest,
): Promise<SolvedModel | InvalidModel | NoSuchPlan> {
  const watch = new Stopwatch(request.clock);
  const snapshot = await request.workbook.read();
  const read = watch.lap();
  const chosen = choosePlan(snapshot, request.planName);
  if (chosen.kind === 'no-such-plan') {
    return chosen;
  }
  const planName = chosen.listing.name;
  const now = serialDateIn(snapshot, request.today);
  const { model, size, issues } = readPlan(snapshot, planName, {
    now,
    dropsLots: request.options.relax === true,
  });
  if (model === null || size === null) {
    return {
      kind: 'invalid',
      planName,
      size,
      issues,
      times: { read, build: watch.lap(), solve: 0, write: 0 },
    };
  }
  const built = buildLinearProgram(model);
  const build = watch.lap();

  const running = request.solver.start(built.problem, request.options, request.onProgress);
  request.onStart?.(running);
  const result = await running.result;
  const solve = watch.lap();

  const values = planValuesOf(result);
  const solution = values === undefined ? null : planSolutionOf(model, solvedValuesOf(built, values));
  let writes: ResultWrites | null = null;
  if (solution !== null) {
    writes = planResultWrites({
      workbook: snapshot,
      model,
      solution,
      keepDecisions: request.keepDecisions,
      texts: request.texts,
      now,
    });
    await request.workbook.apply(writes.plan, snapshot);
  }
  const disagrees = writes?.workbookAgrees === false;
  return {
    kind: 'solved',
    planName,
    model,
    size,
    issues,
    result,
    status: result.status === 'optimal' && disagrees ? 'imprecise' : result.status,
    solution,
    writes,
    times: { read, build, solve, write: watch.lap() },
  };
}

/** Seconds between one lap and the next. */
class Stopwatch {
  private lastLap: number;

  constructor(private readonly clock: () => number) {
    this.lastLap = clock();
  }

  lap(): number {
    const now = this.clock();
    const seconds = now - this.lastLap;
    this.lastLap = now;
    return seconds;
  }
}
