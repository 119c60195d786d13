/**
 * Read a plan and report what is wrong with it and how large it is. Solves nothing, writes nothing.
 */
import type { ModelIssue } from '../domain/model-from-sheet/model-issue';
import { readPlan, type ModelSize } from '../domain/model-from-sheet/read-plan';
import { serialDateIn } from '../domain/sheet/serial-date';
import type { Workbook } from '../ports/workbook';
import { choosePlan, type NoSuchPlan } from './choose-plan';

export interface CheckedModel {
  readonly kind: 'checked';
  readonly planName: string;
  /** No error was found: the plan can be solved. Warnings are allowed. */
  readonly isValid: boolean;
  /** null where the plan could not be read so far. */
  readonly size: ModelSize | null;
  readonly issues: readonly ModelIssue[];
}

export interface CheckModelRequest {
  readonly workbook: Workbook;
  /** null: the workbook's only plan. */
  readonly planName: string | null;
  /** The caller's clock as a serial date counted from 1900, for TODAY and NOW. */
  readonly today: number;
}

/** @throws WorkbookError where the workbook cannot be read */
export async function checkModel(request: CheckModelRequest): Promise<CheckedModel | NoSuchPlan> {
  const snapshot = await request.workbook.read();
  const chosen = choosePlan(snapshot, request.planName);
  if (chosen.kind === 'no-such-plan') {
    return chosen;
  }
  const planName = chosen.listing.name;
  const now = serialDateIn(snapshot, request.today);
  const { model, size, issues } = readPlan(snapshot, planName, { now });
  return { kind: 'checked', planName, isValid: model !== null, size, issues };
}
