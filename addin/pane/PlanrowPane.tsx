/**
 * The frame of the pane: theme, plan at hand, the two views, the bar that solves, and the live region.
 */
import {
  Button,
  FluentProvider,
  mergeClasses,
  ProgressBar,
  webDarkTheme,
  webLightTheme,
} from '@fluentui/react-components';
import { memo, useMemo, useSyncExternalStore, type ReactNode } from 'react';
import { paneTexts } from '../wording/pane-texts';
import type { PaneProgram } from './pane-program';
import type { PaneState } from './pane-state';
import { usePaneStyles } from './views/pane-styles';
import { PageLinks } from './views/PageLinks';
import { FailureBar } from './views/FailureBar';
import { PlanChooser } from './views/PlanChooser';
import { ResultView } from './views/ResultView';
import { SolveBar } from './views/SolveBar';
import { StatementView } from './views/StatementView';
import { useIsDark } from './views/use-is-dark';
import type { Dispatch } from './views/dispatch';

export function PlanrowPane(props: { program: PaneProgram; isHostDark: boolean | null }): ReactNode {
  const { program } = props;
  const state = useSyncExternalStore(program.subscribe, program.state);
  const isDark = useIsDark(props.isHostDark);
  return (
    <FluentProvider theme={isDark ? webDarkTheme : webLightTheme}>
      <PaneFrame state={state} dispatch={program.dispatch} />
    </FluentProvider>
  );
}

function PaneFrame({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const styles = usePaneStyles();
  const steady = useSteadyState(state);
  return (
    <div className={styles.frame}>
      <SteadyParts state={steady} dispatch={dispatch} />
      {state.chosen !== null && <SolveBar state={state} dispatch={dispatch} />}
      <div role="status" aria-live="polite" className={styles.visuallyHidden}>
        {/* Another key makes a sentence that is said twice be heard twice. */}
        <span key={state.announcement.number}>{state.announcement.text}</span>
      </div>
    </div>
  );
}

/**
 * The state without the beat of progress: the same object until something else has changed, so that all but the bar
 * is left alone while a plan is solved.
 */
function useSteadyState(state: PaneState): PaneState {
  const { activity } = state;
  const kept = { ...state, activity: activity.kind, announcement: null };
  // The list of what counts has always the same length: the fields of the state.
  return useMemo(() => state, Object.values(kept));
}

/** All but the bar and the live region. */
const SteadyParts = memo(function SteadyParts(props: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const { state, dispatch } = props;
  const styles = usePaneStyles();
  return (
    <>
      <header className={styles.header}>
        <h1 className={styles.title}>{paneTexts.title}</h1>
        {state.workbook !== null && <PlanChooser state={state} dispatch={dispatch} />}
        {state.chosen !== null && <ViewSwitch state={state} dispatch={dispatch} />}
      </header>
      <main className={styles.main}>
        {state.failure !== null && <FailureBar failure={state.failure} state={state} dispatch={dispatch} />}
        <MainView state={state} dispatch={dispatch} />
      </main>
    </>
  );
});

/** Two buttons of which one is down: the view that is shown. */
function ViewSwitch({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const styles = usePaneStyles();
  return (
    <div role="group" aria-label={paneTexts.parts} className={styles.viewSwitch}>
      {(['statement', 'result'] as const).map((view) => (
        <Button
          key={view}
          size="small"
          appearance="subtle"
          aria-pressed={state.view === view}
          className={mergeClasses(styles.viewButton, state.view === view && styles.viewShown)}
          onClick={() => dispatch({ kind: 'view-chosen', view })}
        >
          {paneTexts[view]}
        </Button>
      ))}
    </div>
  );
}

function MainView({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const styles = usePaneStyles();
  const { workbook, chosen, view } = state;
  if (workbook === null) {
    return state.activity.kind === 'reading' ? (
      <div className={styles.tightStack}>
        <ProgressBar aria-label={paneTexts.starting} />
        {paneTexts.starting}
      </div>
    ) : (
      <p>{paneTexts.purpose}</p>
    );
  }
  if (chosen === null) {
    return (
      <div className={styles.stack}>
        <p>{paneTexts.noPlanYet}</p>
        <PageLinks />
      </div>
    );
  }
  return view === 'statement' ? (
    <StatementView chosen={chosen} state={state} dispatch={dispatch} />
  ) : (
    <ResultView state={state} dispatch={dispatch} />
  );
}
