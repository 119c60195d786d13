/**
 * What the pane knows and shows: plain values, changed only by pane-update.ts.
 */
import type { Progress } from '#solver-core';
import type { PlanListing, StatementRole } from '../domain/model-from-sheet/naming-convention';
import type { SolvedOutcome } from '../domain/results-to-sheet/plan-outcome';
import type { PutBack } from '../domain/results-to-sheet/plan-put-back';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import type { CellRange } from '../domain/sheet/cell-range';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import type { PlanNameFault } from '../domain/statement-to-sheet/statement-edits';
import type { StatedPlan } from '../domain/statement-to-sheet/describe-plans';
import type { PlanCheck, SolveStage } from '../ports/plan-engine';
import type { WorkbookErrorCode } from '../ports/workbook';

/** What was asked for by the button that opened the pane. */
export type StartCommand = 'open' | 'solve' | 'put-back';

/** The one thing that is under way; nothing else is begun meanwhile. */
export type Activity =
  | { readonly kind: 'idle' }
  | { readonly kind: 'reading' }
  | { readonly kind: 'stating' }
  | { readonly kind: 'checking' }
  | {
      readonly kind: 'solving';
      readonly stage: SolveStage | 'reading-workbook' | 'writing';
      readonly progress: Progress | null;
      readonly elapsedSeconds: number;
      readonly isStopping: boolean;
    }
  | { readonly kind: 'putting-back' }
  | { readonly kind: 'mending' };

/** Which part of a statement is meant. */
export interface PartKey {
  readonly role: StatementRole;
  readonly number: number;
}

/** Something that the planner must say before it is done. */
export type Question =
  | {
      readonly kind: 'name';
      readonly purpose: 'new' | 'duplicate' | 'rename';
      readonly text: string;
      /** null until it was tried. */
      readonly fault: PlanNameFault | null;
    }
  | { readonly kind: 'delete'; readonly users: readonly string[] }
  | {
      readonly kind: 'point-elsewhere';
      readonly part: PartKey;
      /** What the name refers to now, and what it would refer to, without `=`. */
      readonly from: string;
      readonly to: string;
    };

/** Something went wrong outside the plan. */
export interface Failure {
  readonly sentence: string;
  /** null for a fault that is not the workbook's. */
  readonly code: WorkbookErrorCode | null;
  readonly sheets: readonly string[];
  readonly ranges: readonly CellRange[];
  /** What to do again on `Try again`; null where that makes no sense. */
  readonly retry: PaneCommand | null;
}

export interface ShownResult {
  readonly outcome: SolvedOutcome;
  /** What the plan was read from: the basis of a later writing. */
  readonly read: WorkbookSnapshot;
  /** Its writes stand in the workbook. */
  readonly isWritten: boolean;
  /** What was put back since; null where nothing was. */
  readonly putBack: PutBack | null;
}

export interface PaneState {
  /** null until it was read for the first time. */
  readonly workbook: WorkbookSnapshot | null;
  readonly plans: readonly StatedPlan[];
  /** The plan at hand; also one that has no decision cells yet, and so is not among `plans`. */
  readonly chosen: StatedPlan | null;
  readonly view: 'statement' | 'result';
  readonly activity: Activity;
  /** Of the plan at hand, as last checked or tried to solve. */
  readonly check: PlanCheck | null;
  /** Of the plan at hand. */
  readonly result: ShownResult | null;
  readonly question: Question | null;
  readonly failure: Failure | null;
  /** A field whose typed text could not be read, or for which nothing was selected. */
  readonly fieldFault: { readonly part: PartKey; readonly kind: 'not-cells' | 'nothing-selected' } | null;
  /** Fields opened by `Add` that have no name yet. */
  readonly openFields: readonly PartKey[];
  readonly selected: readonly CellRange[];
  readonly isOutdated: boolean;
  readonly keepDecisions: boolean;
  /** What a screen reader says next; the number makes two equal ones two. */
  readonly announcement: { readonly text: string; readonly number: number };
  /** What is to begin once the workbook is read. */
  readonly startCommand: StartCommand;
}

export const initialState: PaneState = {
  workbook: null,
  plans: [],
  chosen: null,
  view: 'statement',
  activity: { kind: 'idle' },
  check: null,
  result: null,
  question: null,
  failure: null,
  fieldFault: null,
  openFields: [],
  selected: [],
  isOutdated: false,
  keepDecisions: false,
  announcement: { text: '', number: 0 },
  startCommand: 'open',
};

export type PaneCommand =
  | { readonly kind: 'read' }
  | { readonly kind: 'read-selection'; readonly part: PartKey | null }
  | { readonly kind: 'select'; readonly ranges: readonly CellRange[] }
  /** A change of the statement: names, or a relation in a cell. */
  | { readonly kind: 'write-statement'; readonly writes: WritePlan; readonly next: PlanListing | null }
  | { readonly kind: 'check'; readonly planName: string }
  | { readonly kind: 'solve'; readonly planName: string; readonly keepDecisions: boolean }
  | { readonly kind: 'stop' }
  | {
      readonly kind: 'write-results';
      readonly result: ShownResult;
      readonly filteredSheets: readonly string[];
    }
  | { readonly kind: 'put-back'; readonly planName: string }
  | { readonly kind: 'end-journal'; readonly way: 'finish' | 'put-back' };

export function isSamePart(a: PartKey, b: PartKey): boolean {
  return a.role === b.role && a.number === b.number;
}
