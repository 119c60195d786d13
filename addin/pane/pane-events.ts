/**
 * What can happen to the pane: presses and typing of the planner, and answers to the pane's own commands.
 */
import type { Progress } from '#solver-core';
import type { PlanListing } from '../domain/model-from-sheet/naming-convention';
import type { PlanSense, Relation } from '../domain/model-from-sheet/sheet-model';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import type { CellAddress } from '../domain/sheet/cell-address';
import type { CellRange } from '../domain/sheet/cell-range';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import type { SolveStage } from '../ports/plan-engine';
import type { CheckedOpenPlan, OpenPlanEnd, PutBackOpenPlan } from '../use-cases/solve-open-workbook';
import type { Failure, PaneCommand, PaneState, PartKey, Question, StartCommand } from './pane-state';

type Press =
  | { readonly kind: 'started'; readonly command: StartCommand }
  | { readonly kind: 'plan-chosen'; readonly name: string }
  | { readonly kind: 'view-chosen'; readonly view: PaneState['view'] }
  | {
      readonly kind: 'name-asked';
      readonly purpose: Extract<Question, { kind: 'name' }>['purpose'];
    }
  | { readonly kind: 'name-typed'; readonly text: string }
  | { readonly kind: 'deletion-asked' }
  | { readonly kind: 'question-confirmed' }
  | { readonly kind: 'question-cancelled' }
  | { readonly kind: 'field-added'; readonly part: PartKey }
  | { readonly kind: 'selection-wanted'; readonly part: PartKey }
  | { readonly kind: 'reference-typed'; readonly part: PartKey; readonly text: string }
  | { readonly kind: 'part-removed'; readonly part: PartKey }
  | { readonly kind: 'extension-pressed'; readonly writes: WritePlan }
  | { readonly kind: 'sense-picked'; readonly sense: PlanSense }
  | { readonly kind: 'common-relation-picked'; readonly number: number; readonly relation: Relation }
  | { readonly kind: 'relation-picked'; readonly cell: CellAddress; readonly relation: Relation }
  | { readonly kind: 'ranges-pressed'; readonly ranges: readonly CellRange[] }
  | { readonly kind: 'check-pressed' }
  | { readonly kind: 'solve-pressed' }
  | { readonly kind: 'stop-pressed' }
  | { readonly kind: 'keep-decisions-switched'; readonly isOn: boolean }
  | { readonly kind: 'write-pressed' }
  | { readonly kind: 'put-back-pressed' }
  | { readonly kind: 'retry-pressed' }
  | { readonly kind: 'journal-pressed'; readonly way: 'finish' | 'put-back' }
  | { readonly kind: 'failure-closed' };

type Answer =
  | { readonly kind: 'workbook-read'; readonly workbook: WorkbookSnapshot; readonly activeSheet: string }
  | {
      readonly kind: 'selection-read';
      readonly part: PartKey | null;
      readonly ranges: readonly CellRange[];
    }
  | {
      readonly kind: 'statement-written';
      readonly writes: WritePlan;
      readonly next: PlanListing | null;
    }
  | { readonly kind: 'checked'; readonly checked: CheckedOpenPlan }
  | { readonly kind: 'stage-reached'; readonly stage: SolveStage | 'writing' }
  | { readonly kind: 'progressed'; readonly progress: Progress }
  | { readonly kind: 'second-passed'; readonly elapsedSeconds: number }
  | { readonly kind: 'solve-ended'; readonly end: OpenPlanEnd; readonly failure: Failure | null }
  | { readonly kind: 'results-written' }
  | { readonly kind: 'put-back-ended'; readonly ended: PutBackOpenPlan }
  | { readonly kind: 'journal-ended'; readonly way: 'finish' | 'put-back' }
  | { readonly kind: 'failed'; readonly failure: Failure }
  | { readonly kind: 'workbook-changed' };

export type PaneEvent = Press | Answer;

export interface Updated {
  readonly state: PaneState;
  readonly commands: readonly PaneCommand[];
}
