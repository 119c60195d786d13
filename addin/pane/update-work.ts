/**
 * Checking, solving, writing, putting back.
 */
import { withStatementWrites } from '../domain/statement-to-sheet/statement-edits';
import { paneTexts } from '../wording/pane-texts';
import { sentenceOfCheck, sentenceOfSolved } from './announcements';
import type { Updated } from './pane-events';
import type { Activity, PaneState } from './pane-state';
import {
  again,
  announced,
  begin,
  idle,
  only,
  startOfSolve,
  withWorkbook,
  type EventOf,
} from './update-steps';

export type WorkEvent = EventOf<
  | 'check-pressed'
  | 'checked'
  | 'solve-pressed'
  | 'stop-pressed'
  | 'stage-reached'
  | 'progressed'
  | 'second-passed'
  | 'solve-ended'
  | 'write-pressed'
  | 'results-written'
  | 'put-back-pressed'
  | 'put-back-ended'
>;

export function updateWork(state: PaneState, event: WorkEvent): Updated {
  const planName = state.chosen?.listing.name;
  switch (event.kind) {
    case 'check-pressed':
      return planName === undefined
        ? only(state)
        : begin(state, { kind: 'checking' }, { kind: 'check', planName });
    case 'checked': {
      const { check, read } = event.checked;
      const seen = withWorkbook({ ...state, activity: idle, check, isOutdated: false }, read);
      return only(announced({ ...seen, view: 'statement' }, sentenceOfCheck(check)));
    }
    case 'solve-pressed':
      return planName === undefined
        ? only(state)
        : begin(state, startOfSolve, { kind: 'solve', planName, keepDecisions: state.keepDecisions });
    case 'stop-pressed':
      return state.activity.kind === 'solving'
        ? {
            state: { ...state, activity: { ...state.activity, isStopping: true } },
            commands: [{ kind: 'stop' }],
          }
        : only(state);
    case 'stage-reached':
      return onlySolving(state, { stage: event.stage });
    case 'progressed':
      return onlySolving(state, { progress: event.progress });
    case 'second-passed':
      return onlySolving(state, { elapsedSeconds: event.elapsedSeconds });
    case 'solve-ended':
      return afterSolve(state, event);
    case 'write-pressed': {
      const { result, failure } = state;
      if (result === null || result.outcome.writes === null) {
        return only(state);
      }
      const filteredSheets = failure?.code === 'filtered' ? failure.sheets : [];
      return again(state, { kind: 'write-results', result, filteredSheets });
    }
    case 'results-written':
      return only(afterWriting({ ...state, activity: idle, failure: null }));
    case 'put-back-pressed':
      return planName === undefined
        ? only(state)
        : begin(state, { kind: 'putting-back' }, { kind: 'put-back', planName });
    case 'put-back-ended':
      return afterPutBack(state, event);
  }
}

function onlySolving(state: PaneState, change: Partial<Extract<Activity, { kind: 'solving' }>>): Updated {
  return only(
    state.activity.kind === 'solving' ? { ...state, activity: { ...state.activity, ...change } } : state,
  );
}

function afterSolve(state: PaneState, { end, failure }: EventOf<'solve-ended'>): Updated {
  const ended: PaneState = { ...state, activity: idle, failure };
  switch (end.kind) {
    case 'stopped-beforehand':
      return only(announced(ended, paneTexts.stopped));
    case 'invalid': {
      const check = { planName: end.outcome.planName, size: null, issues: end.outcome.issues };
      const seen = withWorkbook({ ...ended, check, result: null, isOutdated: false }, end.read);
      return only(announced({ ...seen, view: 'statement' }, sentenceOfCheck(check)));
    }
    case 'solved': {
      const { outcome, read } = end;
      const result = { outcome, read, isWritten: false, putBack: null };
      const check = { planName: outcome.planName, size: outcome.size, issues: outcome.issues };
      const seen = withWorkbook({ ...ended, check, result, isOutdated: false, view: 'result' }, read);
      const shown = outcome.writes === null || end.fault !== null ? seen : afterWriting(seen);
      return only(announced(shown, failure?.sentence ?? sentenceOfSolved(outcome)));
    }
  }
}

/** The results of the plan at hand stand in the workbook now, names and record among them. */
function afterWriting(state: PaneState): PaneState {
  const { result, workbook } = state;
  if (result === null || workbook === null || result.outcome.writes === null) {
    return state;
  }
  const seen = withWorkbook(state, withStatementWrites(workbook, result.outcome.writes.plan));
  return { ...seen, result: { ...result, isWritten: true, putBack: null } };
}

function afterPutBack(state: PaneState, { ended: { putBack, read } }: EventOf<'put-back-ended'>): Updated {
  const workbook = putBack === null ? read : withStatementWrites(read, putBack.plan);
  const seen = withWorkbook({ ...state, activity: idle }, workbook);
  if (putBack === null) {
    return only(announced(seen, paneTexts.nothingToPutBack));
  }
  const said = [
    paneTexts.putBackDone(putBack.restoredCount),
    ...(putBack.left.length > 0 ? [paneTexts.putBackLeft(putBack.left)] : []),
  ].join(' ');
  const result = seen.result && { ...seen.result, putBack };
  return only(announced({ ...seen, result }, said));
}
