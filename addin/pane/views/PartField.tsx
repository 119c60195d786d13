/**
 * One part of the statement: what it says that it read, a place to type its cells, a button that takes the selection,
 * and the question that is asked before it is pointed elsewhere.
 */
import { Button, Field, Input } from '@fluentui/react-components';
import { useEffect, useState, type FormEvent, type ReactNode } from 'react';
import type { StatedPart } from '../../domain/statement-to-sheet/describe-plans';
import { fieldHint, paneTexts, partLabel, partLabels } from '../../wording/pane-texts';
import { isSamePart, type PaneState, type PartKey, type Question } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

interface Props {
  readonly part: PartKey;
  readonly stated: StatedPart | undefined;
  readonly isRemovable: boolean;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function PartField({ part, stated, isRemovable, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const label = partLabel(part.role, part.number);
  const isBusy = state.activity.kind !== 'idle';
  const { question } = state;
  const fault = faultText(state, part);
  const hint = fieldHint(part.role, stated);
  return (
    <div className={styles.tightStack}>
      <ReferenceForm
        label={`${label} (${partLabels[part.role].gloss})`}
        reference={stated?.formula ?? ''}
        hint={hint}
        fault={fault}
        isBusy={isBusy}
        onSet={(text) => dispatch({ kind: 'reference-typed', part, text })}
      />
      <div className={styles.row}>
        <Button
          size="small"
          disabledFocusable={isBusy}
          aria-label={paneTexts.useSelectionFor(label)}
          onClick={() => dispatch({ kind: 'selection-wanted', part })}
        >
          {paneTexts.useSelection}
        </Button>
        {stated?.reading.kind === 'cells' && <ShowButton label={label} part={stated} dispatch={dispatch} />}
        {isRemovable && (
          <Button
            size="small"
            appearance="subtle"
            disabledFocusable={isBusy}
            aria-label={paneTexts.takeAwayFor(label)}
            onClick={() => dispatch({ kind: 'part-removed', part })}
          >
            {paneTexts.takeAway}
          </Button>
        )}
      </div>
      {question?.kind === 'point-elsewhere' && isSamePart(question.part, part) && (
        <PointElsewhere question={question} dispatch={dispatch} />
      )}
    </div>
  );
}

function faultText(state: PaneState, part: PartKey): string | null {
  if (state.fieldFault === null || !isSamePart(state.fieldFault.part, part)) {
    return null;
  }
  return state.fieldFault.kind === 'not-cells' ? paneTexts.typedReferenceFault : paneTexts.nothingSelected;
}

function ShowButton(props: { label: string; part: StatedPart; dispatch: Dispatch }): ReactNode {
  const { label, part, dispatch } = props;
  const ranges = part.reading.kind === 'cells' ? part.reading.ranges : [];
  return (
    <Button
      size="small"
      aria-label={paneTexts.showFor(label)}
      onClick={() => dispatch({ kind: 'ranges-pressed', ranges })}
    >
      {paneTexts.show}
    </Button>
  );
}

/** The reference as text; what is typed counts once it is set, by Enter or the button that then appears. */
function ReferenceForm(props: {
  readonly label: string;
  readonly reference: string;
  readonly hint: string;
  readonly fault: string | null;
  readonly isBusy: boolean;
  readonly onSet: (text: string) => void;
}): ReactNode {
  const { label, reference, hint, fault, isBusy, onSet } = props;
  const styles = usePaneStyles();
  const [text, setText] = useState(reference);
  useEffect(() => setText(reference), [reference]);
  const isChanged = text.trim() !== reference;
  const set = (event: FormEvent): void => {
    event.preventDefault();
    if (isChanged) {
      onSet(text);
    }
  };
  return (
    <form onSubmit={set}>
      <Field
        label={label}
        hint={{ children: hint, className: styles.breakable }}
        {...(fault === null ? {} : { validationMessage: fault })}
      >
        <Input
          size="small"
          value={text}
          readOnly={isBusy}
          spellCheck={false}
          autoComplete="off"
          onChange={(_event, { value }) => setText(value)}
          onKeyDown={({ key }) => {
            if (key === 'Escape') setText(reference);
          }}
          contentAfter={
            isChanged ? (
              <Button type="submit" size="small" appearance="transparent">
                {paneTexts.set}
              </Button>
            ) : null
          }
        />
      </Field>
    </form>
  );
}

function PointElsewhere(props: {
  readonly question: Extract<Question, { kind: 'point-elsewhere' }>;
  readonly dispatch: Dispatch;
}): ReactNode {
  const { question, dispatch } = props;
  const styles = usePaneStyles();
  return (
    <div
      className={styles.question}
      role="group"
      aria-label={paneTexts.pointElsewhere}
      onKeyDown={({ key }) => {
        if (key === 'Escape') dispatch({ kind: 'question-cancelled' });
      }}
    >
      <p className={styles.strong}>{paneTexts.pointElsewhere}</p>
      <p className={styles.breakable}>{paneTexts.pointFrom(question.from)}</p>
      <p className={styles.breakable}>{paneTexts.pointTo(question.to)}</p>
      <div className={styles.row}>
        <Button size="small" appearance="primary" onClick={() => dispatch({ kind: 'question-confirmed' })}>
          {paneTexts.pointThere}
        </Button>
        <Button size="small" onClick={() => dispatch({ kind: 'question-cancelled' })}>
          {paneTexts.keepAsIs}
        </Button>
      </div>
    </div>
  );
}
