/**
 * What use-cases need of a workbook. Each adapter passes tests/contracts/workbook-contract.ts.
 */
import type { CellRange } from '../domain/sheet/cell-range';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';

/** Something is wrong with the file. */
export type FileErrorCode =
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

/** The program that has the workbook open does not let us, or not now. */
export type HostErrorCode =
  /** A cell is being typed in. */
  | 'editing-cell'
  | 'dialog-open'
  /** Another workbook has come to the front. */
  | 'other-workbook'
  | 'host-busy'
  | 'no-answer'
  | 'host-fault'
  | 'host-too-old'
  | 'not-permitted'
  | 'protected-sheet'
  | 'protected-structure'
  /** A filter hides rows in which results would stand. */
  | 'filtered'
  /** Somebody changed what the plan was read from. */
  | 'changed-meanwhile'
  /** A write broke off and could not be taken back: the write journal tells which cells are between. */
  | 'half-written';

export type WorkbookErrorCode = FileErrorCode | HostErrorCode;

export interface WorkbookErrorDetails {
  readonly cause?: unknown;
  /** The same may well succeed when it is tried again. */
  readonly canRetry?: boolean;
  /** The sheets that are protected or filtered. */
  readonly sheets?: readonly string[];
  /** The cells it is about. */
  readonly ranges?: readonly CellRange[];
}

/** Something is wrong with the workbook itself or with reaching it. The message is a sentence for the planner. */
export class WorkbookError extends Error {
  override readonly name = 'WorkbookError';
  readonly canRetry: boolean;
  readonly sheets: readonly string[];
  readonly ranges: readonly CellRange[];

  constructor(
    readonly code: WorkbookErrorCode,
    message: string,
    { canRetry = false, sheets = [], ranges = [], ...options }: WorkbookErrorDetails = {},
  ) {
    super(message, options);
    this.canRetry = canRetry;
    this.sheets = sheets;
    this.ranges = ranges;
  }
}

export interface Workbook {
  /** Everything that a plan can depend on, read at one moment. @throws WorkbookError */
  read(): Promise<WorkbookSnapshot>;
  /**
   * Performs a plan whole or not at all.
   * @param basis what the plan was made from: where others may change the workbook between reading and writing, it is
   *   compared once more before anything is touched
   * @throws WorkbookError changed-meanwhile where the workbook is no longer as the plan was made for
   */
  apply(plan: WritePlan, basis?: WorkbookSnapshot): Promise<void>;
}
