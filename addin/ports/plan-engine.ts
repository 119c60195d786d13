/**
 * What use-cases need of whoever reads a plan into a model, solves it and works out what is to be written: another
 * thread as a rule, this one where no other can be had.
 */
import type { Progress } from '#solver-core';
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import type { ModelSize } from '../domain/model-from-sheet/read-plan';
import type { PlanOutcome } from '../domain/results-to-sheet/plan-outcome';
import type { PutBack } from '../domain/results-to-sheet/plan-put-back';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';

export interface PlanRequest {
  readonly workbook: WorkbookSnapshot;
  /** As `listPlans` gives it. */
  readonly planName: string;
  /** The caller's clock as a serial date counted from 1900, for TODAY and NOW. */
  readonly today: number;
}

export interface SolvePlanRequest extends PlanRequest {
  /** Leave the decision cells as they are; results are written beside them all the same. */
  readonly keepDecisions: boolean;
}

export interface PlanCheck {
  readonly planName: string;
  /** null where an issue is an error. */
  readonly size: ModelSize | null;
  readonly issues: readonly ModelIssue[];
}

/** Nothing was solved, because the solve was stopped before there was anything to solve. */
export interface StoppedBeforehand {
  readonly kind: 'stopped-beforehand';
}

export type SolveStage = 'reading' | 'solving' | 'preparing';

export interface RunningPlan {
  /** Rejects with PlanEngineError where the thread itself failed. */
  readonly outcome: Promise<PlanOutcome | StoppedBeforehand>;
  /** Asks it to end at the next occasion; does nothing once it has ended. */
  stop(): void;
}

export interface PlanEvents {
  /** Never after `outcome` is settled, as `onProgress`. */
  readonly onStage: (stage: SolveStage) => void;
  readonly onProgress: (progress: Progress) => void;
}

export interface PlanEngine {
  /** @throws PlanEngineError */
  check(request: PlanRequest): Promise<PlanCheck>;
  solve(request: SolvePlanRequest, events: PlanEvents): RunningPlan;
  /** null where nothing was written that could be put back. @throws PlanEngineError */
  putBack(request: PlanRequest): Promise<PutBack | null>;
}

export class PlanEngineError extends Error {
  override readonly name = 'PlanEngineError';

  constructor(
    /** `crashed`: a fault of ours, told by `message`. `lost`: the thread ended or does not answer. */
    readonly code: 'crashed' | 'lost',
    message: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
  }
}
