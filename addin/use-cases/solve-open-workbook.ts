/**
 * Solve a plan of a workbook that is open in a spreadsheet program, with the work done by an engine. A result that
 * cannot be written (a filter, a protected sheet) is not lost: it comes back with the reason, and can be written later.
 */
import type { Progress } from '#solver-core';
import type { InvalidOutcome, SolvedOutcome } from '../domain/results-to-sheet/plan-outcome';
import type { PutBack } from '../domain/results-to-sheet/plan-put-back';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import type { PlanCheck, PlanEngine, SolveStage, StoppedBeforehand } from '../ports/plan-engine';
import { WorkbookError, type Workbook } from '../ports/workbook';

export interface OpenPlan {
  readonly workbook: Workbook;
  readonly engine: PlanEngine;
  readonly planName: string;
  /** The caller's clock as a serial date counted from 1900, for TODAY and NOW. */
  readonly today: number;
}

export interface SolveOpenPlan extends OpenPlan {
  readonly keepDecisions: boolean;
  readonly onStage: (stage: SolveStage | 'writing') => void;
  readonly onProgress: (progress: Progress) => void;
  /** Given the way to stop, as soon as there is something to stop. */
  readonly onStart: (stop: () => void) => void;
}

export interface SolvedOpenPlan {
  readonly kind: 'solved';
  readonly outcome: SolvedOutcome;
  /** What the plan was read from. */
  readonly read: WorkbookSnapshot;
  /** Why the results could not be written; null where they were, or where there are none. */
  readonly fault: WorkbookError | null;
}

export type OpenPlanEnd =
  | SolvedOpenPlan
  | { readonly kind: 'invalid'; readonly outcome: InvalidOutcome; readonly read: WorkbookSnapshot }
  | StoppedBeforehand;

/** @throws WorkbookError where the workbook cannot be read; PlanEngineError */
export async function solveOpenPlan(request: SolveOpenPlan): Promise<OpenPlanEnd> {
  const { workbook, engine, planName, today, keepDecisions, onStage, onProgress } = request;
  const read = await workbook.read();
  const running = engine.solve({ workbook: read, planName, today, keepDecisions }, { onStage, onProgress });
  request.onStart(() => running.stop());
  const outcome = await running.outcome;
  switch (outcome.kind) {
    case 'stopped-beforehand':
      return outcome;
    case 'invalid':
      return { kind: 'invalid', outcome, read };
    case 'solved': {
      onStage('writing');
      const fault = outcome.writes === null ? null : await faultOf(workbook.apply(outcome.writes.plan, read));
      return { kind: 'solved', outcome, read, fault };
    }
  }
}

export interface CheckedOpenPlan {
  readonly check: PlanCheck;
  readonly read: WorkbookSnapshot;
}

/** @throws WorkbookError, PlanEngineError */
export async function checkOpenPlan({
  workbook,
  engine,
  planName,
  today,
}: OpenPlan): Promise<CheckedOpenPlan> {
  const read = await workbook.read();
  return { check: await engine.check({ workbook: read, planName, today }), read };
}

export interface PutBackOpenPlan {
  /** null where nothing was written that could be put back. */
  readonly putBack: PutBack | null;
  readonly read: WorkbookSnapshot;
}

/** @throws WorkbookError, PlanEngineError */
export async function putBackOpenPlan({
  workbook,
  engine,
  planName,
  today,
}: OpenPlan): Promise<PutBackOpenPlan> {
  const read = await workbook.read();
  const putBack = await engine.putBack({ workbook: read, planName, today });
  if (putBack !== null) {
    await workbook.apply(putBack.plan, read);
  }
  return { putBack, read };
}

/** The workbook's refusal as a value. Anything else is a fault of ours, and is thrown. */
async function faultOf(applied: Promise<void>): Promise<WorkbookError | null> {
  try {
    await applied;
    return null;
  } catch (error) {
    if (error instanceof WorkbookError) {
      return error;
    }
    throw error;
  }
}
