/**
 * The plan at hand, and what can be done with whole plans: start, duplicate, rename, delete.
 */
import { Button, Field, Input, Select } from '@fluentui/react-components';
import type { FormEvent, ReactNode } from 'react';
import { nameFaultText, paneTexts } from '../../wording/pane-texts';
import type { PaneState, Question } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

interface Props {
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function PlanChooser({ state, dispatch }: Props): ReactNode {
  const { plans, chosen, question } = state;
  const styles = usePaneStyles();
  const isBusy = state.activity.kind !== 'idle';
  const listed = plans.map(({ listing }) => listing.name);
  const chosenName = chosen?.listing.name ?? '';
  // A plan that was only just started has no decision cells, and so is not listed in the workbook.
  const names = chosen === null || listed.includes(chosenName) ? listed : [...listed, chosenName];
  return (
    <div className={styles.tightStack}>
      {names.length > 0 && (
        <Field label={paneTexts.plan} orientation="horizontal">
          <Select
            value={chosenName}
            disabled={isBusy}
            onChange={(_event, { value }) => dispatch({ kind: 'plan-chosen', name: value })}
          >
            {names.map((name) => (
              <option key={name} value={name}>
                {name}
              </option>
            ))}
          </Select>
        </Field>
      )}
      <PlanActions state={state} dispatch={dispatch} />
      {question?.kind === 'name' && <NameForm question={question} dispatch={dispatch} />}
      {question?.kind === 'delete' && (
        <DeletionForm planName={chosenName} users={question.users} dispatch={dispatch} />
      )}
    </div>
  );
}

function PlanActions({ state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const isBusy = state.activity.kind !== 'idle';
  const isListed = state.plans.some(({ listing }) => listing.name === state.chosen?.listing.name);
  return (
    <div role="group" aria-label={paneTexts.planActions} className={styles.buttons}>
      <Button
        size="small"
        disabledFocusable={isBusy}
        onClick={() => dispatch({ kind: 'name-asked', purpose: 'new' })}
        appearance={state.chosen === null ? 'primary' : 'subtle'}
      >
        {paneTexts.newPlan}
      </Button>
      {isListed && (
        <>
          <Button
            size="small"
            appearance="subtle"
            disabledFocusable={isBusy}
            onClick={() => dispatch({ kind: 'name-asked', purpose: 'duplicate' })}
          >
            {paneTexts.duplicate}
          </Button>
          <Button
            size="small"
            appearance="subtle"
            disabledFocusable={isBusy}
            onClick={() => dispatch({ kind: 'name-asked', purpose: 'rename' })}
          >
            {paneTexts.rename}
          </Button>
          <Button
            size="small"
            appearance="subtle"
            disabledFocusable={isBusy}
            onClick={() => dispatch({ kind: 'deletion-asked' })}
          >
            {paneTexts.remove}
          </Button>
        </>
      )}
    </div>
  );
}

const purposes = {
  new: { label: paneTexts.nameOfNewPlan, done: paneTexts.create },
  duplicate: { label: paneTexts.nameOfCopy, done: paneTexts.makeCopy },
  rename: { label: paneTexts.newName, done: paneTexts.rename },
};

function NameForm(props: {
  readonly question: Extract<Question, { kind: 'name' }>;
  readonly dispatch: Dispatch;
}): ReactNode {
  const { question, dispatch } = props;
  const styles = usePaneStyles();
  const { label, done } = purposes[question.purpose];
  const confirm = (event: FormEvent): void => {
    event.preventDefault();
    dispatch({ kind: 'question-confirmed' });
  };
  return (
    <form className={styles.question} onSubmit={confirm} onKeyDown={onEscape(dispatch)}>
      <Field
        label={label}
        {...(question.fault === null ? {} : { validationMessage: nameFaultText(question.fault) })}
      >
        <Input
          value={question.text}
          autoFocus
          onChange={(_event, { value }) => dispatch({ kind: 'name-typed', text: value })}
        />
      </Field>
      <div className={styles.row}>
        <Button type="submit" appearance="primary" size="small">
          {done}
        </Button>
        <Button size="small" onClick={() => dispatch({ kind: 'question-cancelled' })}>
          {paneTexts.cancel}
        </Button>
      </div>
    </form>
  );
}

function DeletionForm(props: {
  readonly planName: string;
  readonly users: readonly string[];
  readonly dispatch: Dispatch;
}): ReactNode {
  const { planName, users, dispatch } = props;
  const styles = usePaneStyles();
  return (
    <div
      className={styles.question}
      role="group"
      aria-label={paneTexts.deletePlan(planName)}
      onKeyDown={onEscape(dispatch)}
    >
      <p className={styles.strong}>{paneTexts.deletePlan(planName)}</p>
      <p>{paneTexts.deleteMeans}</p>
      {users.length > 0 && <p className={styles.breakable}>{paneTexts.nameUsers(users)}</p>}
      <div className={styles.row}>
        <Button size="small" autoFocus onClick={() => dispatch({ kind: 'question-cancelled' })}>
          {paneTexts.cancel}
        </Button>
        <Button size="small" onClick={() => dispatch({ kind: 'question-confirmed' })}>
          {paneTexts.remove}
        </Button>
      </div>
    </div>
  );
}

function onEscape(dispatch: Dispatch): (event: { readonly key: string }) => void {
  return ({ key }) => {
    if (key === 'Escape') {
      dispatch({ kind: 'question-cancelled' });
    }
  };
}
