/**
 * The work on a plan, from a workbook's snapshot to what is to be shown and written. Runs wherever it is put: in the
 * working thread, or in slices on the pane's.
 */
import type { Progress } from '#solver-core';
import { buildLinearProgram } from '../domain/model-from-sheet/build-linear-program';
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import { findPlan } from '../domain/model-from-sheet/naming-convention';
import { readPlan, type ModelSize } from '../domain/model-from-sheet/read-plan';
import { outcomeOf, type PlanOutcome } from '../domain/results-to-sheet/plan-outcome';
import { planPutBack, type PutBack } from '../domain/results-to-sheet/plan-put-back';
import { planResultWrites } from '../domain/results-to-sheet/plan-result-writes';
import { planSolutionOf } from '../domain/results-to-sheet/plan-solution';
import { planValuesOf, solvedValuesOf } from '../domain/results-to-sheet/solved-values';
import { serialDateIn } from '../domain/sheet/serial-date';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import { resultTexts } from '../wording/report-wording';
import { solveInSlices, type Pacing } from './time-slicing';

/** Which plan, and the date for TODAY and NOW as a serial date counted from 1900. */
export interface PlanTask {
  readonly planName: string;
  readonly today: number;
}

export interface SolveTask extends PlanTask {
  readonly keepDecisions: boolean;
}

/** What the caller hears and says while a plan is solved. */
export interface SolveControl {
  readonly pacing: Pacing;
  readonly isStopping: () => boolean;
  readonly onStage: (stage: 'reading' | 'solving' | 'preparing') => void;
  readonly onProgress: (progress: Progress) => void;
}

export function checkPlan(
  workbook: WorkbookSnapshot,
  task: PlanTask,
): { planName: string; size: ModelSize | null; issues: readonly ModelIssue[] } {
  const { size, issues } = readPlan(workbook, task.planName, { now: serialDateIn(workbook, task.today) });
  return { planName: task.planName, size, issues };
}

export async function solvePlan(
  workbook: WorkbookSnapshot,
  task: SolveTask,
  control: SolveControl,
): Promise<PlanOutcome | { readonly kind: 'stopped-beforehand' }> {
  const now = serialDateIn(workbook, task.today);
  control.onStage('reading');
  await control.pacing.pause();
  if (control.isStopping()) {
    return { kind: 'stopped-beforehand' };
  }
  const { model, size, issues } = readPlan(workbook, task.planName, { now });
  if (model === null || size === null) {
    return { kind: 'invalid', planName: task.planName, issues };
  }
  const built = buildLinearProgram(model);
  control.onStage('solving');
  const { pacing, isStopping, onProgress } = control;
  const result = await solveInSlices(built.problem, {}, pacing, isStopping, onProgress);
  control.onStage('preparing');
  await pacing.pause();

  const values = planValuesOf(result);
  const solution = values === undefined ? null : planSolutionOf(model, solvedValuesOf(built, values));
  const { keepDecisions } = task;
  const writes =
    solution === null
      ? null
      : planResultWrites({ workbook, model, solution, keepDecisions, texts: resultTexts, now });
  return outcomeOf({ model, size, issues, result, solution, writes });
}

export function putBackPlan(workbook: WorkbookSnapshot, task: PlanTask): PutBack | null {
  const listing = findPlan(workbook, task.planName);
  return listing === undefined ? null : planPutBack(workbook, listing, serialDateIn(workbook, task.today));
}
