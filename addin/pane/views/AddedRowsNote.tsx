/**
 * Points out rows that were added under a block and look like it, with one press to take them in.
 */
import { Button, MessageBar, MessageBarActions, MessageBarBody } from '@fluentui/react-components';
import { useMemo, type ReactNode } from 'react';
import type { StatedPlan } from '../../domain/statement-to-sheet/describe-plans';
import { findAddedRows } from '../../domain/statement-to-sheet/find-added-rows';
import { paneTexts } from '../../wording/pane-texts';
import type { PaneState } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

interface Props {
  readonly chosen: StatedPlan;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}

export function AddedRowsNote({ chosen, state, dispatch }: Props): ReactNode {
  const styles = usePaneStyles();
  const { workbook } = state;
  const added = useMemo(() => (workbook === null ? [] : findAddedRows(workbook, chosen)), [workbook, chosen]);
  return added.map(({ name, range, names, writes }) => (
    <MessageBar key={name} intent="info" layout="multiline" politeness="polite">
      <MessageBarBody className={styles.breakable}>{paneTexts.addedRows(name, range)}</MessageBarBody>
      <MessageBarActions>
        <Button
          size="small"
          disabledFocusable={state.activity.kind !== 'idle'}
          onClick={() => dispatch({ kind: 'extension-pressed', writes })}
        >
          {paneTexts.extendNames(names)}
        </Button>
        <Button
          size="small"
          aria-label={paneTexts.showFor(name)}
          onClick={() => dispatch({ kind: 'ranges-pressed', ranges: [range] })}
        >
          {paneTexts.show}
        </Button>
      </MessageBarActions>
    </MessageBar>
  ));
}
