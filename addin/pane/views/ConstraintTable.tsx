/**
 * The constraint rows of a solved plan: both sides, slack, dual value; binding rows are marked by a word in a frame.
 */
import { Checkbox, Field, Input } from '@fluentui/react-components';
import { useMemo, useState, type ReactNode } from 'react';
import type { ConstraintOutcome } from '../../domain/results-to-sheet/plan-outcome';
import { formatCellAddress } from '../../domain/sheet/cell-address';
import { glossOf } from '../../wording/glosses';
import { paneTexts } from '../../wording/pane-texts';
import { AmountTable, type AmountColumn } from './AmountTable';
import { AmountCell, filterByLabel } from './DecisionTable';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

export function ConstraintTable(props: {
  readonly lines: readonly ConstraintOutcome[];
  readonly dispatch: Dispatch;
}): ReactNode {
  const { lines, dispatch } = props;
  const styles = usePaneStyles();
  const [wanted, setWanted] = useState('');
  const [isBindingOnly, setBindingOnly] = useState(false);
  const shown = useMemo(
    () => filterByLabel(lines, wanted).filter(({ isBinding }) => isBinding || !isBindingOnly),
    [lines, wanted, isBindingOnly],
  );
  return (
    <section className={styles.section} aria-labelledby="rows-heading">
      <h2 className={styles.heading} id="rows-heading">
        {paneTexts.constraintRows}
      </h2>
      <Field label={paneTexts.filterRows}>
        <Input size="small" type="search" value={wanted} onChange={(_event, { value }) => setWanted(value)} />
      </Field>
      <Checkbox
        label={paneTexts.bindingOnly}
        checked={isBindingOnly}
        onChange={(_event, { checked }) => setBindingOnly(checked === true)}
      />
      <AmountTable
        label={paneTexts.constraintRows}
        lines={shown}
        columns={columns}
        onShow={({ cell: { sheet, row, column } }) =>
          dispatch({
            kind: 'ranges-pressed',
            ranges: [{ sheet, top: row, left: column, bottom: row, right: column }],
          })
        }
      />
      <p className={styles.gloss}>{paneTexts.rowsShown(shown.length, lines.length)}</p>
    </section>
  );
}

const columns: readonly AmountColumn<ConstraintOutcome>[] = [
  {
    title: paneTexts.columns.row,
    gloss: 'left side, relation, right side',
    sortValue: ({ label }) => label,
    render: (line) => <RowLabel line={line} />,
  },
  {
    title: paneTexts.columns.slack,
    gloss: glossOf('slack'),
    sortValue: ({ slack }) => slack,
    render: ({ slack }) => <AmountCell amount={slack} />,
  },
  {
    title: paneTexts.columns.dualValue,
    gloss: glossOf('dual value'),
    sortValue: ({ dualValue }) => dualValue,
    render: ({ dualValue }) => <AmountCell amount={dualValue} />,
  },
];

function RowLabel({ line }: { line: ConstraintOutcome }): ReactNode {
  const styles = usePaneStyles();
  return (
    <>
      <div className={styles.clipped} title={`${line.label}, ${formatCellAddress(line.cell)}`}>
        {line.label}
      </div>
      <div className={`${styles.gloss} ${styles.clipped}`}>
        {line.isBinding && (
          <>
            <span className={styles.badge}>{paneTexts.binding}</span>{' '}
          </>
        )}
        {paneTexts.sides(line.leftSide, line.relation, line.rightSide)}
      </div>
    </>
  );
}
