/**
 * What can be wrong with a block as a piece of sheet, whatever it holds: hidden rows and columns, merged cells, cells
 * that another plan decides as well.
 */
import { columnLetters, type CellAddress } from '../sheet/cell-address';
import {
  cellCountOf,
  columnCountOf,
  formatCellRange,
  rangesOverlap,
  rowCountOf,
  type CellRange,
} from '../sheet/cell-range';
import { findSheet, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import type { NamedArea } from './model-declaration';
import { statementIssue, type ModelIssue } from './model-issue';

/** @param areas the blocks that hold decisions and amounts */
export function inspectBlocks(workbook: WorkbookSnapshot, areas: readonly NamedArea[]): ModelIssue[] {
  return [
    ...mergedCells(workbook, areas),
    ...hiddenLines(workbook, areas, 'rows'),
    ...hiddenLines(workbook, areas, 'columns'),
  ];
}

/**
 * A merged cell over several cells of a block hides all but one of them; one whose first cell lies outside the block
 * hides the block's.
 */
function mergedCells(workbook: WorkbookSnapshot, areas: readonly NamedArea[]): ModelIssue[] {
  const issues: ModelIssue[] = [];
  for (const { name, ranges } of areas) {
    for (const range of ranges) {
      for (const merged of findSheet(workbook, range.sheet)?.mergedRanges ?? []) {
        const common = intersectionOf(range, merged);
        const isHarmless =
          common === undefined ||
          (cellCountOf(common) === 1 && common.top === merged.top && common.left === merged.left);
        if (!isHarmless) {
          const cell = { sheet: range.sheet, row: common.top, column: common.left };
          issues.push(statementIssue('merged-cells', cell, { name, merged: formatCellRange(merged) }));
        }
      }
    }
  }
  return issues;
}

function intersectionOf(a: CellRange, b: CellRange): CellRange | undefined {
  if (!rangesOverlap({ ...b, sheet: a.sheet }, a)) {
    return undefined;
  }
  return {
    sheet: a.sheet,
    top: Math.max(a.top, b.top),
    left: Math.max(a.left, b.left),
    bottom: Math.min(a.bottom, b.bottom),
    right: Math.min(a.right, b.right),
  };
}

interface HiddenLine {
  readonly sheet: string;
  readonly line: number;
  readonly cell: CellAddress;
  readonly names: string[];
}

/** One warning for each run of hidden rows (or columns) that lies in the same blocks. */
function hiddenLines(
  workbook: WorkbookSnapshot,
  areas: readonly NamedArea[],
  kind: 'rows' | 'columns',
): ModelIssue[] {
  const lines = new Map<string, HiddenLine>();
  for (const { name, ranges } of areas) {
    for (const range of ranges) {
      const sheet = findSheet(workbook, range.sheet);
      const first = kind === 'rows' ? range.top : range.left;
      const count = kind === 'rows' ? rowCountOf(range) : columnCountOf(range);
      for (let line = first; line < first + count; line++) {
        const isHidden = kind === 'rows' ? sheet?.isRowHidden(line) : sheet?.isColumnHidden(line);
        if (isHidden !== true) {
          continue;
        }
        const key = `${range.sheet}\n${line}`;
        const known = lines.get(key);
        if (known === undefined) {
          const cell = {
            sheet: range.sheet,
            row: kind === 'rows' ? line : range.top,
            column: kind === 'rows' ? range.left : line,
          };
          lines.set(key, { sheet: range.sheet, line, cell, names: [name] });
        } else if (!known.names.includes(name)) {
          known.names.push(name);
        }
      }
    }
  }
  return runsOf([...lines.values()]).map((run) => {
    const [first, last] = [run[0], run[run.length - 1]];
    const shown = (line: number): string => (kind === 'rows' ? String(line + 1) : columnLetters(line));
    return statementIssue(`hidden-${kind}`, first.cell, {
      names: first.names,
      lines: run.length === 1 ? shown(first.line) : `${shown(first.line)} to ${shown(last.line)}`,
      count: run.length,
    });
  });
}

function runsOf(lines: readonly HiddenLine[]): HiddenLine[][] {
  const sorted = [...lines].sort((a, b) =>
    a.sheet === b.sheet ? a.line - b.line : a.sheet < b.sheet ? -1 : 1,
  );
  const runs: HiddenLine[][] = [];
  for (const line of sorted) {
    const run = runs.at(-1);
    const last = run?.at(-1);
    const continues =
      last?.sheet === line.sheet &&
      last.line + 1 === line.line &&
      last.names.join('\n') === line.names.join('\n');
    if (run !== undefined && continues) {
      run.push(line);
    } else {
      runs.push([line]);
    }
  }
  return runs;
}
