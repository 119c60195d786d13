/**
 * The result of the last solve: status in words, objective and change, tables of decisions and constraint rows, where
 * results stand, and what is worth knowing about them.
 */
import { Link, MessageBar, MessageBarBody } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import type { SolvedOutcome } from '../../domain/results-to-sheet/plan-outcome';
import type { ResultWrites } from '../../domain/results-to-sheet/plan-result-writes';
import { formatCellRange } from '../../domain/sheet/cell-range';
import { sentenceOfIssue } from '../../wording/issue-sentences';
import { bindingText, paneTexts } from '../../wording/pane-texts';
import { caution, sentenceOfNotice } from '../../wording/report-wording';
import { statusSentence } from '../../wording/status-sentences';
import { amountText } from '../../wording/word-forms';
import type { PaneState, ShownResult } from '../pane-state';
import { ConstraintTable } from './ConstraintTable';
import { DecisionTable } from './DecisionTable';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

interface Props {
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function ResultView({ state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const { result } = state;
  if (result === null) {
    return <p>{paneTexts.noResultYet}</p>;
  }
  const { outcome } = result;
  return (
    <div className={styles.stack}>
      {state.isOutdated && (
        <MessageBar intent="warning" layout="multiline" politeness="polite">
          <MessageBarBody>
            {paneTexts.outdated} {paneTexts.solveAgain}
          </MessageBarBody>
        </MessageBar>
      )}
      <StatusLines outcome={outcome} />
      {outcome.objective !== null && (
        <>
          <DecisionTable lines={outcome.decisions} dispatch={dispatch} />
          {outcome.constraints.length > 0 && (
            <ConstraintTable lines={outcome.constraints} dispatch={dispatch} />
          )}
        </>
      )}
      <WrittenLines result={result} dispatch={dispatch} />
      <NoticeLines outcome={outcome} />
      {outcome.objective !== null && <p className={styles.gloss}>{caution}</p>}
    </div>
  );
}

function StatusLines({ outcome }: { outcome: SolvedOutcome }): ReactNode {
  const styles = usePaneStyles();
  const { status, objective, objectiveBefore, constraints } = outcome;
  const binding = constraints.filter(({ isBinding }) => isBinding).length;
  return (
    <section className={styles.tightStack} aria-label={paneTexts.result}>
      <p className={styles.strong}>{statusSentence(status, objective !== null)}</p>
      {objective !== null && (
        <>
          <p>{paneTexts.objective}</p>
          <span className={styles.figure}>{amountText(objective)}</span>
          {objectiveBefore !== null && (
            <p className={styles.gloss}>{paneTexts.objectiveBefore(objectiveBefore, objective)}</p>
          )}
          <p className={styles.gloss}>{bindingText(binding, constraints.length)}</p>
        </>
      )}
    </section>
  );
}

function WrittenLines({ result, dispatch }: { result: ShownResult; dispatch: Dispatch }): ReactNode {
  const styles = usePaneStyles();
  const { isWritten, putBack } = result;
  const { writes } = result.outcome;
  if (writes === null || !isWritten) {
    return <p>{paneTexts.notWritten}</p>;
  }
  return (
    <section className={styles.section} aria-labelledby="written-heading">
      <h2 className={styles.heading} id="written-heading">
        {paneTexts.written}
      </h2>
      {putBack === null ? (
        <p>{paneTexts.writtenDecisions(writes.decisionCount)}</p>
      ) : (
        <p className={styles.breakable}>
          {paneTexts.putBackDone(putBack.restoredCount)}
          {putBack.left.length > 0 && ` ${paneTexts.putBackLeft(putBack.left)}`}
        </p>
      )}
      <ColumnList columns={writes.columns} dispatch={dispatch} />
    </section>
  );
}

function ColumnList(props: { columns: ResultWrites['columns']; dispatch: Dispatch }): ReactNode {
  const { columns, dispatch } = props;
  const styles = usePaneStyles();
  return (
    <ul className={styles.list}>
      {columns.map(({ name, range }) => (
        <li key={name} className={styles.breakable}>
          {name}:{' '}
          <Link as="button" onClick={() => dispatch({ kind: 'ranges-pressed', ranges: [range] })}>
            {formatCellRange(range)}
          </Link>
        </li>
      ))}
    </ul>
  );
}

function NoticeLines({ outcome }: { outcome: SolvedOutcome }): ReactNode {
  const styles = usePaneStyles();
  const sentences = [
    ...(outcome.reason === null ? [] : [outcome.reason]),
    ...outcome.issues.map(sentenceOfIssue),
    ...(outcome.writes?.notices.map(sentenceOfNotice) ?? []),
  ];
  if (sentences.length === 0) {
    return null;
  }
  return (
    <section className={styles.section} aria-labelledby="notices-heading">
      <h2 className={styles.heading} id="notices-heading">
        {paneTexts.notices}
      </h2>
      <ul className={styles.list}>
        {sentences.map((sentence, position) => (
          <li key={position} className={styles.breakable}>
            {sentence}
          </li>
        ))}
      </ul>
    </section>
  );
}
