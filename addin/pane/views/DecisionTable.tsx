/**
 * The decision cells of a solved plan: optimum, what the cell held before, reduced cost.
 */
import { Field, Input } from '@fluentui/react-components';
import { useMemo, useState, type ReactNode } from 'react';
import type { DecisionOutcome } from '../../domain/results-to-sheet/plan-outcome';
import { formatCellAddress } from '../../domain/sheet/cell-address';
import { glossOf } from '../../wording/glosses';
import { paneTexts, shortAmountText } from '../../wording/pane-texts';
import { amountText } from '../../wording/word-forms';
import { AmountTable, type AmountColumn } from './AmountTable';
import type { Dispatch } from './dispatch';
import { usePaneStyles } from './pane-styles';

export function DecisionTable(props: {
  readonly lines: readonly DecisionOutcome[];
  readonly dispatch: Dispatch;
}): ReactNode {
  const { lines, dispatch } = props;
  const styles = usePaneStyles();
  const [wanted, setWanted] = useState('');
  const shown = useMemo(() => filterByLabel(lines, wanted), [lines, wanted]);
  return (
    <section className={styles.section} aria-labelledby="decisions-heading">
      <h2 className={styles.heading} id="decisions-heading">
        {paneTexts.decisions}
      </h2>
      <Field label={paneTexts.filterDecisions}>
        <Input size="small" type="search" value={wanted} onChange={(_event, { value }) => setWanted(value)} />
      </Field>
      <AmountTable
        label={paneTexts.decisions}
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

/** Lines whose label or cell holds all the words, in any case. */
export function filterByLabel<Line extends Pick<DecisionOutcome, 'label' | 'cell'>>(
  lines: readonly Line[],
  wanted: string,
): readonly Line[] {
  const words = wanted
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  return words.length === 0
    ? lines
    : lines.filter(({ label, cell }) => {
        const text = `${label} ${formatCellAddress(cell)}`.toLowerCase();
        return words.every((word) => text.includes(word));
      });
}

const columns: readonly AmountColumn<DecisionOutcome>[] = [
  {
    title: paneTexts.columns.decision,
    gloss: glossOf('decision cell'),
    sortValue: ({ label }) => label,
    render: (line) => <DecisionLabel line={line} />,
  },
  {
    title: paneTexts.columns.optimum,
    gloss: glossOf('optimum'),
    sortValue: ({ optimum }) => optimum,
    render: ({ optimum }) => <AmountCell amount={optimum} />,
  },
  {
    title: paneTexts.columns.reducedCost,
    gloss: glossOf('reduced cost'),
    sortValue: ({ reducedCost }) => reducedCost,
    render: ({ reducedCost }) => <AmountCell amount={reducedCost} />,
  },
];

function DecisionLabel({ line }: { line: DecisionOutcome }): ReactNode {
  const styles = usePaneStyles();
  return (
    <>
      <div className={styles.clipped} title={`${line.label}, ${formatCellAddress(line.cell)}`}>
        {line.label}
      </div>
      <div className={`${styles.gloss} ${styles.clipped}`}>{paneTexts.beforeAmount(line.before)}</div>
    </>
  );
}

/** An amount short enough for its column; in full where it is pointed at. */
export function AmountCell({ amount }: { amount: number | null }): ReactNode {
  return <span title={amount === null ? '' : amountText(amount)}>{shortAmountText(amount)}</span>;
}
