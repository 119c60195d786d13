/**
 * Collects (row, column, value) in any order and yields a SparseMatrix. Repeated places are summed, zeros dropped.
 */
import { BrokenInvariantError } from '../control/solver-errors';
import type { SparseMatrix } from './sparse-matrix';

export class TripletBuilder {
  private readonly rows: number[] = [];
  private readonly columns: number[] = [];
  private readonly values: number[] = [];

  add(row: number, column: number, value: number): void {
    this.rows.push(row);
    this.columns.push(column);
    this.values.push(value);
  }

  /** @throws BrokenInvariantError when an entry lies outside rowCount × columnCount */
  build(rowCount: number, columnCount: number): SparseMatrix {
    const { rows, columns, values } = this;
    const byRow = this.orderByRow(rowCount);
    const columnStart = new Int32Array(columnCount + 1);
    for (const column of columns) {
      if (column < 0 || column >= columnCount)
        throw new BrokenInvariantError(`column ${column} is outside the matrix`);
      columnStart[column + 1]++;
    }
    for (let column = 0; column < columnCount; column++) columnStart[column + 1] += columnStart[column];
    const place = columnStart.slice(0, columnCount);
    const rowIndex = new Int32Array(rows.length);
    const value = new Float64Array(rows.length);
    for (const entry of byRow) {
      const at = place[columns[entry]]++;
      rowIndex[at] = rows[entry];
      value[at] = values[entry];
    }
    return sumRepeated(rowCount, columnCount, columnStart, rowIndex, value);
  }

  /** Entry numbers in ascending order of their rows: one counting sort, so that columns come out sorted. */
  private orderByRow(rowCount: number): Int32Array {
    const start = new Int32Array(rowCount + 1);
    for (const row of this.rows) {
      if (row < 0 || row >= rowCount) throw new BrokenInvariantError(`row ${row} is outside the matrix`);
      start[row + 1]++;
    }
    for (let row = 0; row < rowCount; row++) start[row + 1] += start[row];
    const order = new Int32Array(this.rows.length);
    for (let entry = 0; entry < this.rows.length; entry++) order[start[this.rows[entry]]++] = entry;
    return order;
  }
}

function sumRepeated(
  rowCount: number,
  columnCount: number,
  start: Int32Array,
  rowIndex: Int32Array,
  value: Float64Array,
): SparseMatrix {
  const columnStart = new Int32Array(columnCount + 1);
  let kept = 0;
  for (let column = 0; column < columnCount; column++) {
    let entry = start[column];
    while (entry < start[column + 1]) {
      const row = rowIndex[entry];
      let sum = 0;
      for (; entry < start[column + 1] && rowIndex[entry] === row; entry++) sum += value[entry];
      if (sum !== 0) {
        rowIndex[kept] = row;
        value[kept++] = sum;
      }
    }
    columnStart[column + 1] = kept;
  }
  return {
    rowCount,
    columnCount,
    columnStart,
    rowIndex: rowIndex.slice(0, kept),
    value: value.slice(0, kept),
  };
}
