/**
 * A sortable table of amounts that stays quick with thousands of lines: only those in sight are drawn. The table
 * itself has the keyboard, and names its active line to screen readers, so that a line which scrolls out of sight
 * takes no focus with it.
 */
import { Button, mergeClasses } from '@fluentui/react-components';
import { useId, useLayoutEffect, useMemo, useRef, useState, type KeyboardEvent, type ReactNode } from 'react';
import { paneTexts } from '../../wording/pane-texts';
import { lineHeight, usePaneStyles } from './pane-styles';
import { scrollToLine, visibleLines } from './visible-lines';

export interface AmountColumn<Line> {
  readonly title: string;
  /** Its gloss, shown when the heading is pointed at. */
  readonly gloss: string;
  /** What it is sorted by: nothing stands behind everything. */
  readonly sortValue: (line: Line) => number | string | null;
  readonly render: (line: Line) => ReactNode;
}

interface Props<Line> {
  readonly label: string;
  /** In the order of the sheet. */
  readonly lines: readonly Line[];
  /** Three: a label and two amounts. */
  readonly columns: readonly AmountColumn<Line>[];
  readonly onShow: (line: Line) => void;
}

interface Sorting {
  readonly column: number;
  readonly isDescending: boolean;
}

const viewHeight = 320 - 30;

export function AmountTable<Line>({ label, lines, columns, onShow }: Props<Line>): ReactNode {
  const styles = usePaneStyles();
  const id = useId();
  const grid = useRef<HTMLDivElement>(null);
  const [sorting, setSorting] = useState<Sorting | null>(null);
  const [active, setActive] = useState(0);
  const [scrollTop, setScrollTop] = useState(0);
  const sorted = useMemo(() => sortLines(lines, columns, sorting), [lines, columns, sorting]);
  const activeLine = Math.min(active, sorted.length - 1);
  const { first, end } = visibleLines(scrollTop, viewHeight, lineHeight, sorted.length);

  // Lines that were filtered away leave the table shorter than it was scrolled.
  useLayoutEffect(() => {
    const most = Math.max(0, sorted.length * lineHeight - viewHeight);
    if (grid.current !== null && grid.current.scrollTop > most) {
      grid.current.scrollTop = most;
    }
  }, [sorted.length]);

  const moveTo = (line: number): void => {
    const wanted = Math.max(0, Math.min(sorted.length - 1, line));
    setActive(wanted);
    if (grid.current !== null) {
      grid.current.scrollTop = scrollToLine(wanted, grid.current.scrollTop, viewHeight, lineHeight);
    }
  };
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.target !== grid.current) {
      return;
    }
    const page = Math.floor(viewHeight / lineHeight);
    const targets: Readonly<Record<string, number>> = {
      ArrowDown: activeLine + 1,
      ArrowUp: activeLine - 1,
      PageDown: activeLine + page,
      PageUp: activeLine - page,
      Home: 0,
      End: sorted.length - 1,
    };
    if (event.key in targets) {
      event.preventDefault();
      moveTo(targets[event.key]);
    } else if ((event.key === 'Enter' || event.key === ' ') && activeLine >= 0) {
      event.preventDefault();
      onShow(sorted[activeLine]);
    }
  };

  return (
    <div
      ref={grid}
      role="grid"
      aria-label={`${label}. ${paneTexts.tableHint}`}
      aria-rowcount={sorted.length + 1}
      aria-readonly
      {...(activeLine >= first && activeLine < end ? { 'aria-activedescendant': `${id}-${activeLine}` } : {})}
      tabIndex={0}
      className={styles.table}
      onKeyDown={onKeyDown}
      onScroll={({ currentTarget }) => setScrollTop(currentTarget.scrollTop)}
    >
      <div role="rowgroup" className={styles.tableHead}>
        <div role="row" aria-rowindex={1} className={styles.tableLine}>
          {columns.map(({ title, gloss }, column) => (
            <SortHeading
              key={title}
              title={title}
              gloss={gloss}
              isFirst={column === 0}
              direction={sorting?.column === column ? sorting : null}
              onSort={() => setSorting(nextSorting(sorting, column))}
            />
          ))}
        </div>
      </div>
      <div role="rowgroup" style={{ height: `${sorted.length * lineHeight}px`, position: 'relative' }}>
        {sorted.slice(first, end).map((line, offset) => {
          const position = first + offset;
          const isActive = position === activeLine;
          return (
            <div
              key={position}
              id={`${id}-${position}`}
              role="row"
              aria-rowindex={position + 2}
              aria-selected={isActive}
              className={mergeClasses(styles.tableLine, styles.bodyLine)}
              style={{ position: 'absolute', top: `${position * lineHeight}px`, left: 0, right: 0 }}
              onClick={() => {
                setActive(position);
                onShow(line);
              }}
            >
              {columns.map(({ title, render }, column) => (
                <div
                  key={title}
                  role="gridcell"
                  className={column === 0 ? styles.clipped : styles.figureCell}
                >
                  {render(line)}
                </div>
              ))}
            </div>
          );
        })}
      </div>
    </div>
  );
}

function SortHeading(props: {
  readonly title: string;
  readonly gloss: string;
  readonly isFirst: boolean;
  readonly direction: Sorting | null;
  readonly onSort: () => void;
}): ReactNode {
  const { title, gloss, isFirst, direction, onSort } = props;
  const styles = usePaneStyles();
  const sort = direction === null ? 'none' : direction.isDescending ? 'descending' : 'ascending';
  return (
    <div role="columnheader" aria-sort={sort}>
      <Button
        size="small"
        appearance="transparent"
        className={mergeClasses(styles.sortButton, isFirst ? styles.sortLeft : styles.sortRight)}
        title={`${paneTexts.sortBy(title)} (${gloss})`}
        onClick={onSort}
      >
        {title}
        {direction !== null && <span aria-hidden> {direction.isDescending ? '▼' : '▲'}</span>}
      </Button>
    </div>
  );
}

/** A column is sorted upwards, then downwards, then the sheet's order is back. */
function nextSorting(sorting: Sorting | null, column: number): Sorting | null {
  if (sorting?.column !== column) {
    return { column, isDescending: false };
  }
  return sorting.isDescending ? null : { column, isDescending: true };
}

function sortLines<Line>(
  lines: readonly Line[],
  columns: readonly AmountColumn<Line>[],
  sorting: Sorting | null,
): readonly Line[] {
  if (sorting === null) {
    return lines;
  }
  const { sortValue } = columns[sorting.column];
  const direction = sorting.isDescending ? -1 : 1;
  return [...lines].sort((a, b) => {
    const [first, second] = [sortValue(a), sortValue(b)];
    if (first === null || second === null) {
      return Number(first === null) - Number(second === null);
    }
    const order =
      typeof first === 'string' || typeof second === 'string'
        ? String(first).localeCompare(String(second), 'en-US', { numeric: true })
        : first - second;
    return direction * order;
  });
}
