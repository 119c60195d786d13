/**
 * The transpose of a sparse matrix, which is the same matrix in compressed rows.
 */
import { nonzeroCount, type SparseMatrix } from './sparse-matrix';

/** Aᵀ; its columns are A's rows. One counting sort, entries ascending. */
export function transpose(matrix: SparseMatrix): SparseMatrix {
  const { rowCount, columnCount, columnStart, rowIndex, value } = matrix;
  const entryCount = nonzeroCount(matrix);
  const start = new Int32Array(rowCount + 1);
  for (let entry = 0; entry < entryCount; entry++) start[rowIndex[entry] + 1]++;
  for (let row = 0; row < rowCount; row++) start[row + 1] += start[row];
  const place = start.slice(0, rowCount);
  const index = new Int32Array(entryCount);
  const values = new Float64Array(entryCount);
  for (let column = 0; column < columnCount; column++) {
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      const at = place[rowIndex[entry]]++;
      index[at] = column;
      values[at] = value[entry];
    }
  }
  return { rowCount: columnCount, columnCount: rowCount, columnStart: start, rowIndex: index, value: values };
}
