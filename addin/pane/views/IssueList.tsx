/**
 * What is wrong with the statement, sorted by place. Each issue shows its cell when pressed; a relation that is
 * missing or unknown is picked from a list right there.
 */
import { Link, mergeClasses, MessageBar, MessageBarBody, Select } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import type { ModelIssue } from '../../domain/model-from-sheet/model-issue';
import type { Relation } from '../../domain/model-from-sheet/sheet-model';
import type { CellAddress } from '../../domain/sheet/cell-address';
import type { PlanCheck } from '../../ports/plan-engine';
import { sentenceOfIssue } from '../../wording/issue-sentences';
import { paneTexts, relationTexts } from '../../wording/pane-texts';
import type { PaneState } from '../pane-state';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

/** More would only be scrolled past: the first ones are mended first. */
const mostShown = 100;

export function IssueList(props: {
  readonly check: PlanCheck;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}): ReactNode {
  const { check, state, dispatch } = props;
  const styles = usePaneStyles();
  const errors = check.issues.filter(({ severity }) => severity === 'error').length;
  if (check.issues.length === 0 && check.size !== null) {
    return (
      <MessageBar intent="success" layout="multiline" politeness="polite">
        <MessageBarBody>{paneTexts.noIssues(check.size.decisions, check.size.constraints)}</MessageBarBody>
      </MessageBar>
    );
  }
  return (
    <section className={styles.section} aria-labelledby="issues-heading">
      <h2 className={styles.heading} id="issues-heading">
        {paneTexts.issues}: {paneTexts.issueCounts(errors, check.issues.length - errors)}
      </h2>
      <ul className={styles.list}>
        {check.issues.slice(0, mostShown).map((issue, position) => (
          <IssueItem key={position} issue={issue} state={state} dispatch={dispatch} />
        ))}
      </ul>
      {check.issues.length > mostShown && (
        <p className={styles.gloss}>{paneTexts.rowsShown(mostShown, check.issues.length)}</p>
      )}
    </section>
  );
}

function IssueItem(props: {
  readonly issue: ModelIssue;
  readonly state: PaneState;
  readonly dispatch: Dispatch;
}): ReactNode {
  const { issue, state, dispatch } = props;
  const styles = usePaneStyles();
  const { cell } = issue;
  return (
    <li className={styles.tightStack}>
      <div>
        <SeverityBadge severity={issue.severity} />{' '}
        <span className={styles.breakable}>{sentenceOfIssue(issue)}</span>
      </div>
      {cell !== null && (
        <div className={styles.row}>
          <Link as="button" onClick={() => dispatch({ kind: 'ranges-pressed', ranges: [rangeOf(cell)] })}>
            {paneTexts.showCell(cell)}
          </Link>
          {needsRelation(issue) && (
            <Select
              size="small"
              aria-label={paneTexts.pickRelation(cell)}
              value=""
              disabled={state.activity.kind !== 'idle'}
              onChange={(_event, { value }) =>
                dispatch({ kind: 'relation-picked', cell, relation: value as Relation })
              }
            >
              <option value="">{paneTexts.pickOne}</option>
              {Object.entries(relationTexts).map(([value, text]) => (
                <option key={value} value={value}>
                  {text}
                </option>
              ))}
            </Select>
          )}
        </div>
      )}
    </li>
  );
}

/** Errors and warnings differ by word and shape, not by colour alone. */
function SeverityBadge({ severity }: { severity: ModelIssue['severity'] }): ReactNode {
  const styles = usePaneStyles();
  return severity === 'error' ? (
    <span className={mergeClasses(styles.badge, styles.errorBadge)}>{paneTexts.error}</span>
  ) : (
    <span className={styles.badge}>{paneTexts.warning}</span>
  );
}

function needsRelation({ code }: ModelIssue): boolean {
  return code === 'missing-relation' || code === 'unknown-relation' || code === 'strict-relation';
}

function rangeOf({ sheet, row, column }: CellAddress) {
  return { sheet, top: row, left: column, bottom: row, right: column };
}
