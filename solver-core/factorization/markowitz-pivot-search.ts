/**
 * The next pivot of the active submatrix: least Markowitz count among the first few candidates whose entry is large
 * enough in its column.
 *
 * Source: Markowitz (1957); the bounded search by ascending count after Suhl and Suhl (1990), "Computing sparse LU
 * factorizations for large-scale linear programming bases".
 */
import type { ActiveSubmatrix, CountLists } from './active-submatrix';

/** How many rows and columns that offer a pivot are looked at before the best so far is taken. */
const searchDepth = 4;

export class MarkowitzPivotSearch {
  /** The pivot found; valid after `find` returned true. */
  pivotRow = -1;
  pivotColumn = -1;
  /** Where it stands in its column. */
  pivotAt = -1;

  /**
   * @param columnLargest largest magnitude in each active column, or −1 where it must be computed again
   * @returns false when no active entry is acceptable: the rest of the matrix counts as singular
   */
  find(
    active: ActiveSubmatrix,
    columnsByCount: CountLists,
    rowsByCount: CountLists,
    columnLargest: Float64Array,
    activeOrder: number,
    threshold: number,
    singularPivot: number,
  ): boolean {
    let bestMerit = Infinity;
    let looked = 0;
    this.pivotRow = -1;
    for (let count = 1; count <= activeOrder; count++) {
      // A pivot found in lists of a lower count has merit at least (count − 1)²; nothing better can come.
      if (bestMerit <= (count - 1) * (count - 1)) return true;
      for (let column = columnsByCount.firstWith(count); column >= 0; column = columnsByCount.after(column)) {
        const largest = largestInColumn(active, column, columnLargest);
        if (largest < singularPivot) continue;
        const { columnIndex, columnValue, rowCount } = active;
        const wanted = threshold * largest;
        const start = active.columnStart[column];
        const end = start + active.columnCount[column];
        for (let at = start; at < end; at++) {
          const row = columnIndex[at];
          const merit = (count - 1) * (rowCount[row] - 1);
          if (merit >= bestMerit || Math.abs(columnValue[at]) < wanted) continue;
          bestMerit = merit;
          this.pivotRow = row;
          this.pivotColumn = column;
          this.pivotAt = at;
        }
        if (this.pivotRow >= 0 && (++looked >= searchDepth || bestMerit <= (count - 1) * (count - 1)))
          return true;
      }
      for (let row = rowsByCount.firstWith(count); row >= 0; row = rowsByCount.after(row)) {
        const start = active.rowStart[row];
        const end = start + active.rowCount[row];
        for (let place = start; place < end; place++) {
          const column = active.rowIndex[place];
          const merit = (count - 1) * (active.columnCount[column] - 1);
          if (merit >= bestMerit) continue;
          const largest = largestInColumn(active, column, columnLargest);
          if (largest < singularPivot) continue;
          const at = active.rowLink[place];
          if (Math.abs(active.columnValue[at]) < threshold * largest) continue;
          bestMerit = merit;
          this.pivotRow = row;
          this.pivotColumn = column;
          this.pivotAt = at;
          this.pivotAt = at;
        }
        if (this.pivotRow >= 0 && (++looked >= searchDepth || bestMerit <= count * (count - 1))) return true;
      }
    }
    return this.pivotRow >= 0;
  }
}

function largestInColumn(active: ActiveSubmatrix, column: number, columnLargest: Float64Array): number {
  let largest = columnLargest[column];
  if (largest < 0) {
    largest = 0;
    const start = active.columnStart[column];
    const end = start + active.columnCount[column];
    for (let at = start; at < end; at++) {
      const size = Math.abs(active.columnValue[at]);
      if (size > largest) largest = size;
    }
    columnLargest[column] = largest;
  }
  return largest;
}
