/**
 * Row and column factors, powers of two, that bring the magnitudes of a matrix near 1.
 *
 * Source: Fulkerson and Wolfe (1962), "An algorithm for scaling matrices", SIAM Review 4 (geometric mean of the extreme
 * magnitudes); power-of-two rounding so that scaling changes no digit.
 */
import { nearestPowerOfTwo } from '../numerics/power-of-two';
import type { SparseMatrix } from '../sparse/sparse-matrix';

export interface ScaleFactors {
  /** Length m: row i is multiplied by row[i]. */
  readonly row: Float64Array;
  /** Length n: column j is multiplied by column[j]; the scaled variable is the stated one divided by it. */
  readonly column: Float64Array;
}

/** Passes over the matrix; more bring little (Tomlin 1975, "On scaling linear programming problems"). */
const passes = 6;
/** Magnitudes within this range are left alone. */
const wellScaled = { least: 0.125, greatest: 8 };

/** undefined where the matrix is well scaled as it is. */
export function geometricScaling(matrix: SparseMatrix): ScaleFactors | undefined {
  const { rowCount: m, columnCount: n, columnStart, rowIndex, value } = matrix;
  if (isWellScaled(value)) return undefined;
  const row = new Float64Array(m).fill(1);
  const column = new Float64Array(n).fill(1);
  const least = new Float64Array(m);
  const greatest = new Float64Array(m);
  for (let pass = 0; pass < passes; pass++) {
    least.fill(Infinity);
    greatest.fill(0);
    for (let j = 0; j < n; j++) {
      for (let entry = columnStart[j]; entry < columnStart[j + 1]; entry++) {
        const size = Math.abs(value[entry]) * column[j];
        const i = rowIndex[entry];
        if (size < least[i]) least[i] = size;
        if (size > greatest[i]) greatest[i] = size;
      }
    }
    for (let i = 0; i < m; i++) if (greatest[i] > 0) row[i] = 1 / Math.sqrt(least[i] * greatest[i]);
    for (let j = 0; j < n; j++) {
      let small = Infinity;
      let large = 0;
      for (let entry = columnStart[j]; entry < columnStart[j + 1]; entry++) {
        const size = Math.abs(value[entry]) * row[rowIndex[entry]];
        if (size < small) small = size;
        if (size > large) large = size;
      }
      if (large > 0) column[j] = 1 / Math.sqrt(small * large);
    }
  }
  // Last, every column's largest magnitude is brought to about 1: reduced costs are then comparable.
  for (let i = 0; i < m; i++) row[i] = nearestPowerOfTwo(row[i]);
  for (let j = 0; j < n; j++) {
    let large = 0;
    for (let entry = columnStart[j]; entry < columnStart[j + 1]; entry++) {
      large = Math.max(large, Math.abs(value[entry]) * row[rowIndex[entry]]);
    }
    column[j] = large > 0 ? nearestPowerOfTwo(1 / large) : 1;
  }
  return { row, column };
}

function isWellScaled(value: SparseMatrix['value']): boolean {
  for (let entry = 0; entry < value.length; entry++) {
    const size = Math.abs(value[entry]);
    if (size < wellScaled.least || size > wellScaled.greatest) return false;
  }
  return true;
}
