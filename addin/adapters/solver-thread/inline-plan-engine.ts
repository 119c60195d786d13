/**
 * PlanEngine on this very thread: for tests, and where the host lets no worker start. Solving is done in slices;
 * reading a plan is one piece.
 */
import {
  PlanEngineError,
  type PlanCheck,
  type PlanEngine,
  type PlanEvents,
  type PlanRequest,
  type RunningPlan,
  type SolvePlanRequest,
} from '../../ports/plan-engine';
import type { PutBack } from '../../domain/results-to-sheet/plan-put-back';
import { checkPlan, putBackPlan, solvePlan } from '../../worker/plan-work';
import type { Pacing } from '../../worker/time-slicing';

export class InlinePlanEngine implements PlanEngine {
  constructor(private readonly pacing: Pacing) {}

  async check(request: PlanRequest): Promise<PlanCheck> {
    await this.pacing.pause();
    return asEngineFault(() => checkPlan(request.workbook, request));
  }

  solve(request: SolvePlanRequest, events: PlanEvents): RunningPlan {
    let isStopping = false;
    const outcome = asEngineFault(() =>
      solvePlan(request.workbook, request, {
        pacing: this.pacing,
        isStopping: () => isStopping,
        ...events,
      }),
    );
    return {
      outcome,
      stop: () => {
        isStopping = true;
      },
    };
  }

  async putBack(request: PlanRequest): Promise<PutBack | null> {
    await this.pacing.pause();
    return asEngineFault(() => putBackPlan(request.workbook, request));
  }
}

async function asEngineFault<T>(work: () => T | Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    throw new PlanEngineError('crashed', error instanceof Error ? error.message : String(error), {
      cause: error,
    });
  }
}
