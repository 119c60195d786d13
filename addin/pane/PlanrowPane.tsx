/**
 * The frame of the pane: theme, plan at hand, the two views, the bar that solves, and the live region.
 */
import {
  FluentProvider,
  Spinner,
  Tab,
  TabList,
  Text,
  webDarkTheme,
  webLightTheme,
} from '@fluentui/react-components';
import { useSyncExternalStore, type ReactNode } from 'react';
import { paneTexts } from '../wording/pane-texts';
import type { PaneProgram } from './pane-program';
import type { PaneState } from './pane-state';
import { usePaneStyles } from './views/pane-styles';
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
  return (
    <div className={styles.frame}>
      <header className={styles.header}>
        <h1 className={styles.title}>{paneTexts.title}</h1>
        {state.workbook !== null && <PlanChooser state={state} dispatch={dispatch} />}
        {state.chosen !== null && <ViewTabs state={state} dispatch={dispatch} />}
      </header>
      <main className={styles.main}>
        {state.failure !== null && <FailureBar failure={state.failure} state={state} dispatch={dispatch} />}
        <MainView state={state} dispatch={dispatch} />
      </main>
      {state.chosen !== null && <SolveBar state={state} dispatch={dispatch} />}
      <div role="status" aria-live="polite" className={styles.visuallyHidden}>
        {/* Another key makes a sentence that is said twice be heard twice. */}
        <span key={state.announcement.number}>{state.announcement.text}</span>
      </div>
    </div>
  );
}

function ViewTabs({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  return (
    <TabList
      size="small"
      aria-label={paneTexts.parts}
      selectedValue={state.view}
      onTabSelect={(_event, { value }) => dispatch({ kind: 'view-chosen', view: value as PaneState['view'] })}
    >
      <Tab value="statement" id="tab-statement" aria-controls="view">
        {paneTexts.statement}
      </Tab>
      <Tab value="result" id="tab-result" aria-controls="view">
        {paneTexts.result}
      </Tab>
    </TabList>
  );
}

function MainView({ state, dispatch }: { state: PaneState; dispatch: Dispatch }): ReactNode {
  const { workbook, chosen, view } = state;
  if (workbook === null) {
    return state.activity.kind === 'reading' ? (
      <Spinner size="small" label={paneTexts.starting} />
    ) : (
      <Text>{paneTexts.purpose}</Text>
    );
  }
  if (chosen === null) {
    return <Text>{paneTexts.noPlanYet}</Text>;
  }
  return (
    <div id="view" role="tabpanel" aria-labelledby={`tab-${view}`}>
      {view === 'statement' ? (
        <StatementView chosen={chosen} state={state} dispatch={dispatch} />
      ) : (
        <ResultView state={state} dispatch={dispatch} />
      )}
    </div>
  );
}
