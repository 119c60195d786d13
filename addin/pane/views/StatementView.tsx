/**
 * The statement of the plan at hand, part by part: what each name refers to, and how to point it at cells.
 */
import { Button, Field, Select } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import type { StatedPlan } from '../../domain/statement-to-sheet/describe-plans';
import type { PlanSense } from '../../domain/model-from-sheet/sheet-model';
import type { StatementRole } from '../../domain/model-from-sheet/naming-convention';
import {
  paneTexts,
  partLabel,
  partLabels,
  fieldHint,
  selectionText,
  senseTexts,
} from '../../wording/pane-texts';
import { isSamePart, type PaneState, type PartKey } from '../pane-state';
import { AddedRowsNote } from './AddedRowsNote';
import { ConstraintSets } from './ConstraintSets';
import type { Dispatch } from './dispatch';
import { IssueList } from './IssueList';
import { usePaneStyles } from './pane-styles';
import { PageLinks } from './PageLinks';
import { PartField } from './PartField';

interface Props {
  readonly chosen: StatedPlan;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function StatementView({ chosen, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  return (
    <div className={styles.stack}>
      <p className={`${styles.gloss} ${styles.breakable}`}>{selectionText(state.selected)}</p>
      {state.check !== null && <IssueList check={state.check} state={state} dispatch={dispatch} />}
      <AddedRowsNote chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="Decision" isNeeded chosen={chosen} state={state} dispatch={dispatch} />
      <SenseField chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="Objective" isNeeded chosen={chosen} state={state} dispatch={dispatch} />
      <ConstraintSets chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="Lower" chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="Upper" chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="DecisionLabel" chosen={chosen} state={state} dispatch={dispatch} />
      <NumberedFields role="ConstraintLabel" chosen={chosen} state={state} dispatch={dispatch} />
      <PageLinks />
    </div>
  );
}

/** The fields of one role that the statement has, or that were opened, by number. */
function partsOfRole({ chosen, state }: Pick<Props, 'chosen' | 'state'>, role: StatementRole): PartKey[] {
  const stated: PartKey[] = chosen.parts.filter((part) => part.role === role);
  const opened = state.openFields.filter(
    (part) => part.role === role && !stated.some((one) => isSamePart(one, part)),
  );
  return [...stated, ...opened].map(({ number }) => ({ role, number })).sort((a, b) => a.number - b.number);
}

function NumberedFields(
  props: Props & { readonly role: StatementRole; readonly isNeeded?: boolean },
): ReactNode {
  const { role, isNeeded = false, chosen, state, dispatch } = props;
  const styles = usePaneStyles();
  const parts = partsOfRole(props, role);
  const shown = parts.length === 0 && isNeeded ? [{ role, number: 1 }] : parts;
  const next = { role, number: (shown.at(-1)?.number ?? 0) + 1 };
  const hasRoom = role === 'Decision' ? parts.length > 0 : next.number <= blockCountFor(role, chosen);
  return (
    <section className={styles.section} aria-label={partLabels[role].label}>
      {shown.map((part) => (
        <PartField
          key={part.number}
          part={part}
          stated={chosen.parts.find((one) => isSamePart(one, part))}
          isRemovable={!isNeeded || part.number > 1}
          state={state}
          dispatch={dispatch}
        />
      ))}
      {hasRoom && (
        <div>
          <Button
            size="small"
            appearance="subtle"
            disabledFocusable={state.activity.kind !== 'idle'}
            onClick={() => dispatch({ kind: 'field-added', part: next })}
          >
            {paneTexts.addAnother(partLabel(role, next.number).toLowerCase())}
          </Button>
        </div>
      )}
    </section>
  );
}

/** How many blocks there are that a part of this role could belong to. */
function blockCountFor(role: StatementRole, chosen: StatedPlan): number {
  const numbersOf = (...roles: StatementRole[]): number[] =>
    chosen.parts.filter((part) => roles.includes(part.role)).map(({ number }) => number);
  return role === 'ConstraintLabel'
    ? Math.max(0, ...numbersOf('Constraint', 'Left'))
    : Math.max(0, ...numbersOf('Decision'));
}

function SenseField({ chosen, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const stated = chosen.parts.find(({ role }) => role === 'Sense');
  const { label, gloss } = partLabels.Sense;
  const isInCell = stated?.reading.kind === 'cells';
  return (
    <section className={styles.section} aria-label={label}>
      <Field label={`${label} (${gloss})`} hint={fieldHint('Sense', stated)}>
        <Select
          size="small"
          value={chosen.sense ?? ''}
          // A sense that stands in a cell is the planner's to change there.
          disabled={state.activity.kind !== 'idle' || isInCell}
          onChange={(_event, { value }) => {
            if (value !== '') dispatch({ kind: 'sense-picked', sense: value as PlanSense });
          }}
        >
          {chosen.sense === null && <option value="">{paneTexts.pickSense}</option>}
          <option value="maximise">{senseTexts.maximise}</option>
          <option value="minimise">{senseTexts.minimise}</option>
        </Select>
      </Field>
    </section>
  );
}
