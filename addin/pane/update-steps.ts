/**
 * Small steps that the pane's updates are made of.
 */
import type { PlanListing } from '../domain/model-from-sheet/naming-convention';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import { describePlan, describePlans } from '../domain/statement-to-sheet/describe-plans';
import type { PaneEvent, Updated } from './pane-events';
import type { Activity, PaneCommand, PaneState } from './pane-state';

export const idle: Activity = { kind: 'idle' };

export type EventOf<Kind extends PaneEvent['kind']> = Extract<PaneEvent, { kind: Kind }>;

export function only(state: PaneState): Updated {
  return { state, commands: [] };
}

export function isBusy(state: PaneState): boolean {
  return state.activity.kind !== 'idle';
}

/** Begins the one thing that is under way; does nothing where something is already. */
export function begin(state: PaneState, activity: Activity, ...commands: PaneCommand[]): Updated {
  return isBusy(state) ? only(state) : { state: { ...state, activity, failure: null }, commands };
}

export function announced(state: PaneState, text: string): PaneState {
  return { ...state, announcement: { text, number: state.announcement.number + 1 } };
}

export function again(state: PaneState, command: PaneCommand): Updated {
  return begin(state, activityOf(command), command);
}

function activityOf(command: PaneCommand): Activity {
  switch (command.kind) {
    case 'read':
      return { kind: 'reading' };
    case 'check':
      return { kind: 'checking' };
    case 'solve':
      return startOfSolve;
    case 'write-results':
      return { ...startOfSolve, stage: 'writing' };
    case 'put-back':
      return { kind: 'putting-back' };
    case 'end-journal':
      return { kind: 'mending' };
    case 'write-statement':
      return { kind: 'stating' };
    case 'read-selection':
    case 'select':
    case 'stop':
      return idle;
  }
}

export const startOfSolve: Extract<Activity, { kind: 'solving' }> = {
  kind: 'solving',
  stage: 'reading-workbook',
  progress: null,
  elapsedSeconds: 0,
  isStopping: false,
};

/** The workbook as it is now, with the plan at hand found again in it. */
export function withWorkbook(
  state: PaneState,
  workbook: WorkbookSnapshot,
  wanted: PlanListing | null = state.chosen?.listing ?? null,
): PaneState {
  const plans = describePlans(workbook);
  const found = wanted && plans.find(({ listing }) => isSamePlan(listing, wanted));
  const chosen = found ?? (wanted === null ? null : describePlan(workbook, wanted));
  return { ...state, workbook, plans, chosen };
}

function isSamePlan(a: PlanListing, b: PlanListing): boolean {
  return a.name.toLowerCase() === b.name.toLowerCase();
}

export function writeStatement(
  state: PaneState,
  writes: WritePlan,
  next: PlanListing | null = state.chosen?.listing ?? null,
): Updated {
  const command: PaneCommand = { kind: 'write-statement', writes, next };
  return begin({ ...state, question: null }, { kind: 'stating' }, command);
}
