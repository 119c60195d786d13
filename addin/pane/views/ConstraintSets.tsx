/**
 * The sets of constraint rows: each in one block, or in parts that stand apart with one relation for all or one each.
 */
import { Button, Field, Select } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import type { StatedPlan } from '../../domain/statement-to-sheet/describe-plans';
import type { Relation } from '../../domain/model-from-sheet/sheet-model';
import type { StatementRole } from '../../domain/model-from-sheet/naming-convention';
import { readRelation } from '../../domain/model-from-sheet/statement-words';
import { paneTexts, partLabels, relationTexts } from '../../wording/pane-texts';
import { isSamePart, type PaneState } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';
import { PartField } from './PartField';

interface Props {
  readonly chosen: StatedPlan;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

const partRoles = ['Left', 'Relation', 'Right'] as const;

export function ConstraintSets({ chosen, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const numbersOf = (...roles: readonly StatementRole[]): number[] => {
    const parts = [...chosen.parts, ...state.openFields].filter((part) => roles.includes(part.role));
    return [...new Set(parts.map(({ number }) => number))].sort((a, b) => a - b);
  };
  const blocks = numbersOf('Constraint');
  const apart = numbersOf(...partRoles);
  const next = Math.max(0, ...blocks, ...apart) + 1;
  const isBusy = state.activity.kind !== 'idle';
  return (
    <section className={styles.section} aria-label={partLabels.Constraint.label}>
      {blocks.map((number) => {
        const part = { role: 'Constraint', number } as const;
        return (
          <PartField
            key={number}
            part={part}
            stated={chosen.parts.find((one) => isSamePart(one, part))}
            isRemovable
            state={state}
            dispatch={dispatch}
          />
        );
      })}
      {apart.map((number) => (
        <PartsApart key={number} number={number} chosen={chosen} state={state} dispatch={dispatch} />
      ))}
      <div className={styles.row}>
        <Button
          size="small"
          appearance="subtle"
          disabledFocusable={isBusy}
          onClick={() => dispatch({ kind: 'field-added', part: { role: 'Constraint', number: next } })}
        >
          {paneTexts.addAnother(paneTexts.constraintsTogether)}
        </Button>
        <Button
          size="small"
          appearance="subtle"
          disabledFocusable={isBusy}
          onClick={() => dispatch({ kind: 'field-added', part: { role: 'Left', number: next } })}
        >
          {paneTexts.addAnother(paneTexts.constraintsApart)}
        </Button>
      </div>
    </section>
  );
}

function PartsApart(props: Props & { readonly number: number }): ReactNode {
  const { number, chosen, state, dispatch } = props;
  const styles = usePaneStyles();
  const relation = chosen.parts.find((part) => part.role === 'Relation' && part.number === number);
  const common = relation?.reading.kind === 'constant' ? readRelation(relation.reading.text) : undefined;
  const field = (role: StatementRole): ReactNode => {
    const part = { role, number };
    return (
      <PartField
        part={part}
        stated={chosen.parts.find((one) => isSamePart(one, part))}
        isRemovable
        state={state}
        dispatch={dispatch}
      />
    );
  };
  return (
    <div className={styles.question} role="group" aria-label={`${partLabels.Constraint.label} ${number}`}>
      {field('Left')}
      <Field label={paneTexts.commonRelation}>
        <Select
          size="small"
          value={common === undefined || common === 'strict' ? '' : common}
          disabled={state.activity.kind !== 'idle'}
          onChange={(_event, { value }) => {
            if (value !== '') {
              dispatch({ kind: 'common-relation-picked', number, relation: value as Relation });
            }
          }}
        >
          <option value="">{relation === undefined ? paneTexts.pickOne : paneTexts.relationFromCells}</option>
          {Object.entries(relationTexts).map(([value, text]) => (
            <option key={value} value={value}>
              {text}
            </option>
          ))}
        </Select>
      </Field>
      {common === undefined && field('Relation')}
      {field('Right')}
    </div>
  );
}
