/**
 * What the pane's thread and the working thread say to each other. Both are built from one source and carry one
 * version; a worker that was kept in a cache from another day is recognised by it.
 */
import type { Progress } from '#solver-core';
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import type { ModelSize } from '../domain/model-from-sheet/read-plan';
import type { PlanOutcome } from '../domain/results-to-sheet/plan-outcome';
import type { PutBack } from '../domain/results-to-sheet/plan-put-back';
import type { WorkbookWrite, WritePlan } from '../domain/results-to-sheet/write-plan';
import { CellError } from '../domain/sheet/cell-value';
import type { PlanTask, SolveTask } from './plan-work';
import type { PackedWorkbook } from './workbook-transfer';

export const protocolVersion = 1;

interface Task {
  readonly version: number;
  /** Given by the sender; every reply carries the id of its request. */
  readonly id: number;
  readonly workbook: PackedWorkbook;
}

export type WorkerRequest =
  | (Task & { readonly kind: 'check'; readonly task: PlanTask })
  | (Task & { readonly kind: 'solve'; readonly task: SolveTask })
  | (Task & { readonly kind: 'put-back'; readonly task: PlanTask })
  | { readonly version: number; readonly id: number; readonly kind: 'stop' };

export interface CheckReply {
  readonly planName: string;
  readonly size: ModelSize | null;
  readonly issues: readonly ModelIssue[];
}

export type WorkerReply = { readonly version: number; readonly id: number } & (
  | { readonly kind: 'stage'; readonly stage: 'reading' | 'solving' | 'preparing' }
  | { readonly kind: 'progress'; readonly progress: Progress }
  | { readonly kind: 'checked'; readonly check: CheckReply }
  | { readonly kind: 'solved'; readonly outcome: PlanOutcome | { readonly kind: 'stopped-beforehand' } }
  | { readonly kind: 'planned-back'; readonly putBack: PutBack | null }
  /** A fault of ours. */
  | { readonly kind: 'crashed'; readonly message: string }
);

/** An error value by its code: objects of a class do not keep it on the way between threads. */
interface PackedError {
  readonly errorCode: string;
}

/** A write plan without objects of a class. Everything else in it passes as it is. */
export function packWritePlan(plan: WritePlan): WritePlan {
  return plan.map((write) =>
    'value' in write && write.value instanceof CellError
      ? ({ ...write, value: { errorCode: write.value.code } } as unknown as WorkbookWrite)
      : write,
  );
}

export function unpackWritePlan(plan: WritePlan): WritePlan {
  return plan.map((write) => {
    const value: unknown = 'value' in write ? write.value : undefined;
    return typeof value === 'object' && value !== null
      ? ({ ...write, value: CellError.of((value as PackedError).errorCode) } as WorkbookWrite)
      : write;
  });
}
