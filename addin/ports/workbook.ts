/**
 * What use-cases need of a workbook. Each adapter passes tests/contracts/workbook-contract.ts.
 */
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';

export type WorkbookErrorCode =
  | 'not-found'
  | 'not-readable'
  | 'not-a-workbook'
  | 'encrypted'
  | 'old-format'
  | 'binary-format'
  | 'damaged'
  | 'too-large'
  | 'refused-content'
  | 'would-overwrite'
  | 'write-failed'
  | 'not-verified';

/** Something is wrong with the workbook itself or with reaching it. The message is a sentence for the planner. */
export class WorkbookError extends Error {
  override readonly name = 'WorkbookError';
  constructor(
    readonly code: WorkbookErrorCode,
    message: string,
    options?: { cause?: unknown },
  ) {
    super(message, options);
  }
}

export interface Workbook {
  /** Everything that a plan can depend on, read at one moment. @throws WorkbookError */
  read(): Promise<WorkbookSnapshot>;
  /** Performs a plan whole or not at all. @throws WorkbookError */
  apply(plan: WritePlan): Promise<void>;
}
