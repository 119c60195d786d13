/**
 * The bar at the foot of the pane: check, solve, stop, and how far it has come.
 */
import { Button, Checkbox, ProgressBar } from '@fluentui/react-components';
import { useEffect, useRef, type ReactNode } from 'react';
import { paneTexts } from '../../wording/pane-texts';
import type { Activity, PaneState } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

export function SolveBar({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const styles = usePaneStyles();
  const { activity } = state;
  const isBusy = activity.kind !== 'idle';
  const isSolving = activity.kind === 'solving';
  const solveButton = useRef<HTMLElement>(null);
  const hadFocus = useRef(false);

  // Whoever pressed Stop must not be left nowhere when that button goes.
  useEffect(() => {
    if (!isSolving && hadFocus.current) {
      hadFocus.current = false;
      solveButton.current?.focus();
    }
  }, [isSolving]);

  return (
    <footer className={styles.bar}>
      {activity.kind !== 'idle' && activity.kind !== 'stating' && <ProgressLines activity={activity} />}
      <Checkbox
        label={paneTexts.keepDecisions}
        checked={state.keepDecisions}
        disabled={isBusy}
        onChange={(_event, { checked }) =>
          dispatch({ kind: 'keep-decisions-switched', isOn: checked === true })
        }
      />
      <div className={styles.row}>
        <Button
          ref={(element: HTMLElement | null) => {
            solveButton.current = element;
          }}
          appearance="primary"
          disabledFocusable={isBusy}
          onClick={() => dispatch({ kind: 'solve-pressed' })}
        >
          {paneTexts.solve}
        </Button>
        <Button disabledFocusable={isBusy} onClick={() => dispatch({ kind: 'check-pressed' })}>
          {paneTexts.check}
        </Button>
        {isSolving && (
          <Button
            disabledFocusable={activity.isStopping}
            onFocus={() => {
              hadFocus.current = true;
            }}
            onBlur={(event) => {
              // A button that is taken away loses focus to nothing.
              if (event.relatedTarget !== null) hadFocus.current = false;
            }}
            onClick={() => dispatch({ kind: 'stop-pressed' })}
          >
            {activity.isStopping ? paneTexts.stopping : paneTexts.stop}
          </Button>
        )}
        {!isSolving && state.chosen?.canPutBack === true && (
          <Button disabledFocusable={isBusy} onClick={() => dispatch({ kind: 'put-back-pressed' })}>
            {paneTexts.putBack}
          </Button>
        )}
      </div>
    </footer>
  );
}

function ProgressLines({ activity }: { activity: Activity }): ReactNode {
  const styles = usePaneStyles();
  const text = activityText(activity);
  return (
    <div className={styles.tightStack}>
      <ProgressBar aria-label={text} />
      <div className={styles.row}>
        <span className={styles.grow}>{text}</span>
        {activity.kind === 'solving' && (
          <p className={styles.gloss}>
            {activity.progress !== null && `${paneTexts.iterations(activity.progress.iterations)}, `}
            {paneTexts.elapsed(activity.elapsedSeconds)}
          </p>
        )}
      </div>
    </div>
  );
}

function activityText(activity: Activity): string {
  switch (activity.kind) {
    case 'solving':
      return paneTexts.stages[activity.stage];
    case 'checking':
      return paneTexts.checking;
    case 'putting-back':
      return paneTexts.puttingBack;
    case 'reading':
      return paneTexts.starting;
    case 'mending':
      return paneTexts.stages.writing;
    case 'idle':
    case 'stating':
      return '';
  }
}
