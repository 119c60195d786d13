/**
 * One event, one new state, and what is to be done: pure. While something is under way nothing else is begun, so that
 * there is one solve at a time and no write crosses another.
 */
import type { WorkbookSnapshot } from '../domain/sheet/sheet-snapshot';
import { describePlans } from '../domain/statement-to-sheet/describe-plans';
import { paneTexts } from '../wording/pane-texts';
import type { PaneEvent, Updated } from './pane-events';
import type { PaneState } from './pane-state';
import { updatePlans } from './update-plans';
import { updateStatement } from './update-statement';
import { again, announced, begin, idle, isBusy, only, withWorkbook } from './update-steps';
import { updateWork } from './update-work';

export function updatePane(state: PaneState, event: PaneEvent): Updated {
  switch (event.kind) {
    case 'started':
      return begin({ ...state, startCommand: event.command }, { kind: 'reading' }, { kind: 'read' });
    case 'workbook-read':
      return afterReading(state, event.workbook, event.activeSheet);
    case 'workbook-changed':
      return only(isBusy(state) ? state : { ...state, isOutdated: true });
    case 'failed':
      return only(announced({ ...state, activity: idle, failure: event.failure }, event.failure.sentence));
    case 'failure-closed':
      return only({ ...state, failure: null });
    case 'retry-pressed':
      return state.failure?.retry == null ? only(state) : again(state, state.failure.retry);
    case 'journal-pressed':
      return begin(state, { kind: 'mending' }, { kind: 'end-journal', way: event.way });
    case 'journal-ended':
      return afterJournal(state, event.way);
    case 'view-chosen':
      return only({ ...state, view: event.view });
    case 'ranges-pressed':
      return { state, commands: [{ kind: 'select', ranges: event.ranges }] };
    case 'keep-decisions-switched':
      return only({ ...state, keepDecisions: event.isOn });
    case 'plan-chosen':
    case 'name-asked':
    case 'name-typed':
    case 'deletion-asked':
    case 'question-confirmed':
    case 'question-cancelled':
      return updatePlans(state, event);
    case 'field-added':
    case 'selection-wanted':
    case 'selection-read':
    case 'reference-typed':
    case 'part-removed':
    case 'extension-pressed':
    case 'sense-picked':
    case 'common-relation-picked':
    case 'relation-picked':
    case 'statement-written':
      return updateStatement(state, event);
    case 'check-pressed':
    case 'checked':
    case 'solve-pressed':
    case 'stop-pressed':
    case 'stage-reached':
    case 'progressed':
    case 'second-passed':
    case 'solve-ended':
    case 'write-pressed':
    case 'results-written':
    case 'put-back-pressed':
    case 'put-back-ended':
      return updateWork(state, event);
  }
}

// Reading, and the button that opened the pane.

function afterReading(state: PaneState, workbook: WorkbookSnapshot, activeSheet: string): Updated {
  const onSheet = describePlans(workbook).filter(({ sheets }) => sheets.includes(activeSheet));
  const seen = withWorkbook({ ...state, activity: idle, isOutdated: false }, workbook);
  const chosen = state.chosen === null ? (onSheet.at(0) ?? seen.plans.at(0) ?? null) : seen.chosen;
  const read: PaneState = { ...seen, chosen, startCommand: 'open' };
  if (state.startCommand === 'open' || chosen === null) {
    return only(read);
  }
  if (onSheet.length > 1) {
    // Which plan is meant, only the planner knows.
    return only(announced(read, paneTexts.choosePlanFirst));
  }
  return updateWork(read, { kind: state.startCommand === 'solve' ? 'solve-pressed' : 'put-back-pressed' });
}

function afterJournal(state: PaneState, way: 'finish' | 'put-back'): Updated {
  const said = way === 'finish' ? paneTexts.journalFinished : paneTexts.journalPutBack;
  const result = state.result && { ...state.result, isWritten: way === 'finish' };
  const next = announced({ ...state, activity: idle, failure: null, result }, said);
  return begin(next, { kind: 'reading' }, { kind: 'read' });
}
