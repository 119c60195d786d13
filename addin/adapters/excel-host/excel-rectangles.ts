/**
 * Draws single cells together into rectangles, so that a column of results is one range for Excel and not a thousand.
 */
import type { CellAddress } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';

/** Rectangles that hold each of the cells once, and no other cell. */
export function rectanglesOf(cells: readonly CellAddress[]): CellRange[] {
  const open = new Map<string, CellRange>();
  const closed: CellRange[] = [];
  for (const run of upwardRunsOf(cells)) {
    // A run with the same rows as one in the column before widens it.
    const key = `${run.top}:${run.bottom}:${run.sheet}`;
    const before = open.get(key);
    if (before !== undefined && before.right === run.left - 1) {
      open.set(key, { ...before, right: run.right });
    } else {
      if (before !== undefined) closed.push(before);
      open.set(key, run);
    }
  }
  return [...closed, ...open.values()];
}

/** Cells below one another, column by column. */
function upwardRunsOf(cells: readonly CellAddress[]): CellRange[] {
  const sorted = [...cells].sort(
    (a, b) => compareText(a.sheet, b.sheet) || a.column - b.column || a.row - b.row,
  );
  const runs: CellRange[] = [];
  for (const { sheet, row, column } of sorted) {
    const last = runs[runs.length - 1];
    if (last !== undefined && last.sheet === sheet && last.left === column && last.bottom === row - 1) {
      runs[runs.length - 1] = { ...last, bottom: row };
    } else {
      runs.push({ sheet, top: row, left: column, bottom: row, right: column });
    }
  }
  return runs;
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
