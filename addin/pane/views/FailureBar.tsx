/**
 * What went wrong outside the plan, with the ways out of it.
 */
import { Button, MessageBar, MessageBarActions, MessageBarBody } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import { paneTexts } from '../../wording/pane-texts';
import type { Failure, PaneState } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

interface Props {
  readonly failure: Failure;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function FailureBar({ failure, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const { ranges } = failure;
  return (
    <MessageBar intent="error" layout="multiline" style={{ marginBottom: '12px' }} politeness="polite">
      <MessageBarBody className={styles.breakable}>
        <p>{failure.sentence}</p>
        {failure.code === 'half-written' && ranges.length > 0 && <p>{paneTexts.cellsBetween(ranges)}</p>}
      </MessageBarBody>
      <MessageBarActions>
        <WaysOut failure={failure} state={state} dispatch={dispatch} />
        {failure.code !== 'half-written' && (
          <Button size="small" onClick={() => dispatch({ kind: 'failure-closed' })}>
            {paneTexts.dismiss}
          </Button>
        )}
      </MessageBarActions>
    </MessageBar>
  );
}

function WaysOut({ failure, state, dispatch }: Props): ReactNode {
  const hasUnwritten =
    state.result !== null && !state.result.isWritten && state.result.outcome.writes !== null;
  switch (failure.code) {
    case 'half-written':
      return (
        <>
          <Button size="small" onClick={() => dispatch({ kind: 'journal-pressed', way: 'finish' })}>
            {paneTexts.finishWriting}
          </Button>
          <Button size="small" onClick={() => dispatch({ kind: 'journal-pressed', way: 'put-back' })}>
            {paneTexts.restoreCells}
          </Button>
        </>
      );
    case 'filtered':
      return hasUnwritten ? (
        <Button size="small" onClick={() => dispatch({ kind: 'write-pressed' })}>
          {paneTexts.clearFilterAndWrite}
        </Button>
      ) : null;
    case 'protected-sheet':
    case 'protected-structure':
      return hasUnwritten ? (
        <Button size="small" onClick={() => dispatch({ kind: 'write-pressed' })}>
          {paneTexts.writeNow}
        </Button>
      ) : null;
    default:
      return failure.retry === null ? null : (
        <Button size="small" onClick={() => dispatch({ kind: 'retry-pressed' })}>
          {paneTexts.retry}
        </Button>
      );
  }
}
