/**
 * Draws single cells together into rectangles, so that a column of results is one range for Excel and not a thousand.
 */
import { maximumRowCount, type CellAddress } from '../../domain/sheet/cell-address';
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

/** Cells below one another, column by column, sheet by sheet. */
function upwardRunsOf(cells: readonly CellAddress[]): CellRange[] {
  const keysBySheet = new Map<string, number[]>();
  for (const { sheet, row, column } of cells) {
    const key = column * maximumRowCount + row;
    const keys = keysBySheet.get(sheet);
    if (keys === undefined) keysBySheet.set(sheet, [key]);
    else keys.push(key);
  }
  return [...keysBySheet].flatMap(([sheet, keys]) => {
    // Down a column, one key follows another.
    const sorted = Float64Array.from(keys).sort();
    const runs: CellRange[] = [];
    let start = 0;
    for (let end = 1; end <= sorted.length; end++) {
      const isNext = sorted[end] === sorted[end - 1] + 1 && sorted[end] % maximumRowCount !== 0;
      if (isNext) continue;
      const column = Math.floor(sorted[start] / maximumRowCount);
      const top = sorted[start] % maximumRowCount;
      runs.push({ sheet, top, left: column, bottom: top + end - 1 - start, right: column });
      start = end;
    }
    return runs;
  });
}
