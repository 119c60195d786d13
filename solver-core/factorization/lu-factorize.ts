/**
 * Computes the LU factors of a basis matrix: singletons are peeled off first, the rest is eliminated with Markowitz
 * pivots under a threshold.
 *
 * Source: Suhl and Suhl (1990), "Computing sparse LU factorizations for large-scale linear programming bases",
 * ORSA Journal on Computing 2; Duff, Erisman and Reid (1986), "Direct Methods for Sparse Matrices", ch. 7 and 10.
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import type { SparseMatrix } from '../sparse/sparse-matrix';
import { ActiveSubmatrix, CountLists } from './active-submatrix';
import type { LuFactors } from './lu-factors';
import { MarkowitzPivotSearch } from './markowitz-pivot-search';

export interface FactorizeSettings {
  /** Least size of a pivot relative to the largest entry of its column. */
  readonly threshold: number;
  readonly drop: number;
  readonly singularPivot: number;
}

/** What came of a factorization. */
export interface FactorizeOutcome {
  /** Variables that had to leave the basis because their columns depend on the others. */
  readonly rejectedVariables: readonly number[];
  /** Rows whose logicals took their places; as many as rejected variables. */
  readonly replacedRows: readonly number[];
  /** Work done, in units of the work meter. */
  readonly work: number;
}

export class LuFactorizer {
  private readonly active: ActiveSubmatrix;
  private readonly columnsByCount: CountLists;
  private readonly rowsByCount: CountLists;
  private readonly search = new MarkowitzPivotSearch();
  /** Length m. For each position in the basis, the row it was pivoted on, or −1. */
  private readonly rowOfPosition: Int32Array;
  /** Length m: 1 once a row has its pivot. */
  private readonly isRowDone: Uint8Array;
  private readonly columnLargest: Float64Array;
  /** Length m, all 0 between pivots: multipliers by row, or entries of the pivot row by position. */
  private readonly scratchValue: Float64Array;
  /** The other entries of the pivot row. */
  private readonly otherColumn: Int32Array;
  private readonly otherValue: Float64Array;
  private readonly scratchMark: Int32Array;
  private mark = 0;
  private readonly patternStart: Int32Array;
  private patternPosition = new Int32Array(64);
  private readonly activeInColumn: Int32Array;
  private readonly activeInRow: Int32Array;
  private readonly queue: Int32Array;
  // entries that elimination puts into U, as linked lists by position
  private readonly upperHead: Int32Array;
  private upperNext = new Int32Array(64);
  private upperRow = new Int32Array(64);
  private upperEntry = new Float64Array(64);
  private upperListSize = 0;
  private work = 0;

  constructor(
    private readonly matrix: SparseMatrix,
    private readonly factors: LuFactors,
  ) {
    const m = matrix.rowCount;
    this.active = new ActiveSubmatrix(m);
    this.columnsByCount = new CountLists(m);
    this.rowsByCount = new CountLists(m);
    this.rowOfPosition = new Int32Array(m);
    this.isRowDone = new Uint8Array(m);
    this.columnLargest = new Float64Array(m);
    this.scratchValue = new Float64Array(m);
    this.otherColumn = new Int32Array(m);
    this.otherValue = new Float64Array(m);
    this.scratchMark = new Int32Array(m);
    this.patternStart = new Int32Array(m + 1);
    this.activeInColumn = new Int32Array(m);
    this.activeInRow = new Int32Array(m);
    this.queue = new Int32Array(2 * m);
    this.upperHead = new Int32Array(m);
  }

  /**
   * Factorizes the basis and reorders it so that `basicVariable[row]` is the variable pivoted on that row.
   * @param basicVariable length m, changed in place; a variable k ≥ n is the logical of row k − n, column −e
   */
  factorize(basicVariable: Int32Array, settings: FactorizeSettings): FactorizeOutcome {
    const { matrix, factors } = this;
    const m = matrix.rowCount;
    factors.reset();
    this.rowOfPosition.fill(-1);
    this.isRowDone.fill(0);
    this.upperHead.fill(-1);
    this.upperListSize = 0;
    this.work = m;

    this.pivotLogicals(basicVariable);
    this.countActiveEntries(basicVariable);
    this.peelSingletons(basicVariable, settings);
    const kernelOrder = this.loadKernel(basicVariable);
    if (kernelOrder > 0) this.eliminateKernel(basicVariable, kernelOrder, settings);

    const rejectedVariables: number[] = [];
    const replacedRows: number[] = [];
    const newHead = new Int32Array(m).fill(-1);
    for (let position = 0; position < m; position++) {
      const row = this.rowOfPosition[position];
      if (row >= 0) newHead[row] = basicVariable[position];
      else rejectedVariables.push(basicVariable[position]);
    }
    for (let row = 0; row < m; row++) {
      if (newHead[row] >= 0) continue;
      newHead[row] = matrix.columnCount + row;
      replacedRows.push(row);
      this.pivotOnLogical(row);
    }
    basicVariable.set(newHead);
    factors.buildRowCopies();
    this.work += 2 * (factors.lowerSize + factors.upperSize);
    return { rejectedVariables, replacedRows, work: this.work };
  }

  private pivotOnLogical(row: number): void {
    const { factors } = this;
    factors.lowerStart[row] = factors.lowerEnd[row] = factors.lowerSize;
    factors.upperStart[row] = factors.upperEnd[row] = factors.upperSize;
    factors.diagonal[row] = -1;
    factors.appendToUpperOrder(row);
    this.isRowDone[row] = 1;
  }

  private pivotLogicals(basicVariable: Int32Array): void {
    const n = this.matrix.columnCount;
    for (let position = 0; position < basicVariable.length; position++) {
      const row = basicVariable[position] - n;
      if (row < 0) continue;
      this.pivotOnLogical(row);
      this.rowOfPosition[position] = row;
    }
  }

  /** Counts the entries in rows without a pivot and lists, by rows, the positions that have them. */
  private countActiveEntries(basicVariable: Int32Array): void {
    const { columnStart, rowIndex, columnCount: n, rowCount: m } = this.matrix;
    const { patternStart, activeInColumn, activeInRow, isRowDone } = this;
    activeInRow.fill(0);
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      activeInColumn[position] = 0;
      if (variable >= n) continue;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 1) continue;
        activeInColumn[position]++;
        activeInRow[row]++;
      }
    }
    let total = 0;
    for (let row = 0; row < m; row++) {
      patternStart[row] = total;
      total += activeInRow[row];
    }
    patternStart[m] = total;
    if (this.patternPosition.length < total) this.patternPosition = new Int32Array(total + (total >> 1));
    const place = this.queue; // not in use yet
    for (let row = 0; row < m; row++) place[row] = patternStart[row];
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      if (variable >= n) continue;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 0) this.patternPosition[place[row]++] = position;
      }
    }
    this.work += 2 * total;
  }

  /**
   * Pivots on columns with one entry left (their column of L is empty) and on rows with one entry left (their column
   * of L needs no update of others), until there are none.
   */
  private peelSingletons(basicVariable: Int32Array, settings: FactorizeSettings): void {
    const { columnCount: n, rowCount: m, columnStart, rowIndex, value } = this.matrix;
    const { queue, activeInColumn, activeInRow, isRowDone, rowOfPosition, patternStart, patternPosition } =
      this;
    let queueEnd = 0;
    // Positions are queued as they are, rows as −1 − row.
    for (let position = 0; position < m; position++) {
      if (basicVariable[position] < n && activeInColumn[position] === 1) queue[queueEnd++] = position;
    }
    for (let row = 0; row < m; row++) {
      if (isRowDone[row] === 0 && activeInRow[row] === 1) queue[queueEnd++] = -1 - row;
    }
    for (let head = 0; head < queueEnd; head++) {
      let position = queue[head];
      let row = -1;
      if (position >= 0) {
        if (rowOfPosition[position] >= 0 || activeInColumn[position] !== 1) continue;
        const variable = basicVariable[position];
        for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
          if (isRowDone[rowIndex[entry]] === 0) row = rowIndex[entry];
        }
      } else {
        row = -1 - position;
        if (isRowDone[row] === 1 || activeInRow[row] !== 1) continue;
        for (let at = patternStart[row]; at < patternStart[row + 1]; at++) {
          if (rowOfPosition[patternPosition[at]] < 0) position = patternPosition[at];
        }
      }
      const variable = basicVariable[position];
      let pivot = 0;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        if (rowIndex[entry] === row) pivot = value[entry];
      }
      if (Math.abs(pivot) < settings.singularPivot) continue;
      this.storeSingleton(variable, row, pivot);
      rowOfPosition[position] = row;
      isRowDone[row] = 1;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const other = rowIndex[entry];
        if (isRowDone[other] === 0 && --activeInRow[other] === 1 && queueEnd < queue.length)
          queue[queueEnd++] = -1 - other;
      }
      for (let at = patternStart[row]; at < patternStart[row + 1]; at++) {
        const other = patternPosition[at];
        if (rowOfPosition[other] < 0 && --activeInColumn[other] === 1 && queueEnd < queue.length)
          queue[queueEnd++] = other;
      }
      this.work +=
        columnStart[variable + 1] - columnStart[variable] + patternStart[row + 1] - patternStart[row];
    }
  }

  /** Rows already done make up U's column, those still active L's. */
  private storeSingleton(variable: number, row: number, pivot: number): void {
    const { columnStart, rowIndex, value } = this.matrix;
    const { factors, isRowDone } = this;
    const length = columnStart[variable + 1] - columnStart[variable];
    factors.reserveLower(length);
    factors.reserveUpper(length);
    const { lowerIndex, lowerValue, upperIndex, upperValue } = factors;
    let lower = (factors.lowerStart[row] = factors.lowerSize);
    let upper = (factors.upperStart[row] = factors.upperSize);
    for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
      const at = rowIndex[entry];
      if (at === row) continue;
      if (isRowDone[at] === 1) {
        upperIndex[upper] = at;
        upperValue[upper++] = value[entry];
      } else {
        lowerIndex[lower] = at;
        lowerValue[lower++] = value[entry] / pivot;
      }
    }
    if (lower > factors.lowerSize) factors.lowerOrder[factors.lowerCount++] = row;
    factors.lowerSize = factors.lowerEnd[row] = lower;
    factors.upperSize = factors.upperEnd[row] = upper;
    factors.diagonal[row] = pivot;
    factors.appendToUpperOrder(row);
  }

  /** Copies what singletons left over into the active submatrix. @returns its order */
  private loadKernel(basicVariable: Int32Array): number {
    const { columnCount: n, rowCount: m, columnStart, rowIndex, value } = this.matrix;
    const { active, isRowDone, rowOfPosition, activeInColumn, activeInRow } = this;
    active.reset();
    let order = 0;
    for (let row = 0; row < m; row++) {
      if (isRowDone[row] === 0) active.openRow(row, activeInRow[row] + 4);
    }
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      if (variable >= n || rowOfPosition[position] >= 0) continue;
      order++;
      active.openColumn(position, activeInColumn[position] + 4);
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 1) this.pushUpper(position, row, value[entry]);
        else active.addEntry(row, position, value[entry]);
      }
    }
    return order;
  }

  private pushUpper(position: number, row: number, entry: number): void {
    const size = this.upperListSize + 1;
    this.upperNext = grownInt32(this.upperNext, size);
    this.upperRow = grownInt32(this.upperRow, size);
    this.upperEntry = grownFloat64(this.upperEntry, size);
    const at = this.upperListSize++;
    this.upperRow[at] = row;
    this.upperEntry[at] = entry;
    this.upperNext[at] = this.upperHead[position];
    this.upperHead[position] = at;
  }

  private eliminateKernel(basicVariable: Int32Array, kernelOrder: number, settings: FactorizeSettings): void {
    const { active, columnsByCount, rowsByCount, rowOfPosition, isRowDone, columnLargest } = this;
    const m = this.matrix.rowCount;
    const n = this.matrix.columnCount;
    columnsByCount.reset();
    rowsByCount.reset();
    for (let position = m - 1; position >= 0; position--) {
      if (basicVariable[position] < n && rowOfPosition[position] < 0) {
        columnLargest[position] = -1;
        columnsByCount.insert(position, active.columnCount[position]);
      }
    }
    for (let row = m - 1; row >= 0; row--) {
      if (isRowDone[row] === 0) rowsByCount.insert(row, active.rowCount[row]);
    }
    for (let left = kernelOrder; left > 0; left--) {
      const found = this.search.find(
        active,
        columnsByCount,
        rowsByCount,
        columnLargest,
        left,
        settings.threshold,
        settings.singularPivot,
      );
      if (!found) return; // singular: the caller fills up with logicals
      this.eliminate(this.search.pivotRow, this.search.pivotColumn, this.search.pivotAt, settings.drop);
    }
  }

  /** Takes out one pivot: stores its columns of L and U and updates the rest. */
  private eliminate(pivotRow: number, pivotColumn: number, pivotAt: number, drop: number): void {
    const { active, columnsByCount, rowsByCount, factors, columnLargest } = this;
    const pivot = active.columnValue[pivotAt];
    columnsByCount.remove(pivotColumn, active.columnCount[pivotColumn]);
    rowsByCount.remove(pivotRow, active.rowCount[pivotRow]);
    active.removeEntry(pivotColumn, pivotAt);
    const lowerCount = this.takeLowerColumn(pivotRow, pivotColumn, pivot);
    const otherCount = this.takePivotRow(pivotRow);
    if (lowerCount > 0 && otherCount > 0) {
      if (this.isCheaperAlongRows(pivotRow, otherCount)) this.updateRows(pivotRow, otherCount, drop);
      else this.updateColumns(pivotRow, otherCount, drop);
    } else {
      for (let k = 0; k < otherCount; k++) columnLargest[this.otherColumn[k]] = -1;
    }
    for (let k = 0; k < otherCount; k++) {
      columnsByCount.insert(this.otherColumn[k], active.columnCount[this.otherColumn[k]]);
    }
    for (let lower = factors.lowerStart[pivotRow]; lower < factors.lowerEnd[pivotRow]; lower++) {
      const row = factors.lowerIndex[lower];
      rowsByCount.insert(row, active.rowCount[row]);
    }
    this.storeUpperColumn(pivotRow, pivotColumn, pivot);
  }

  /** L's column from what is left of the pivot column, which is given up; its rows leave their lists. @returns its length */
  private takeLowerColumn(pivotRow: number, pivotColumn: number, pivot: number): number {
    const { active, factors, rowsByCount } = this;
    const count = active.columnCount[pivotColumn];
    factors.reserveLower(count);
    const lowerStart = (factors.lowerStart[pivotRow] = factors.lowerSize);
    const start = active.columnStart[pivotColumn];
    for (let k = 0; k < count; k++) {
      const row = active.columnIndex[start + k];
      factors.lowerIndex[lowerStart + k] = row;
      factors.lowerValue[lowerStart + k] = active.columnValue[start + k] / pivot;
      rowsByCount.remove(row, active.rowCount[row]);
      active.removeFromRow(start + k);
    }
    factors.lowerEnd[pivotRow] = factors.lowerSize = lowerStart + count;
    if (count > 0) factors.lowerOrder[factors.lowerCount++] = pivotRow;
    return count;
  }

  /** The other entries of the pivot row, which is given up; their columns leave their lists. @returns how many */
  private takePivotRow(pivotRow: number): number {
    const { active, columnsByCount } = this;
    const count = active.rowCount[pivotRow];
    const start = active.rowStart[pivotRow];
    for (let k = 0; k < count; k++) {
      const column = active.rowIndex[start + k];
      const at = active.rowLink[start + k];
      this.otherColumn[k] = column;
      this.otherValue[k] = active.columnValue[at];
      columnsByCount.remove(column, active.columnCount[column]);
      active.removeFromColumn(column, at);
      this.pushUpper(column, pivotRow, this.otherValue[k]);
    }
    return count;
  }

  /** Elimination looks at all entries of the rows it changes, or at all of the columns: whichever are fewer. */
  private isCheaperAlongRows(pivotRow: number, otherCount: number): boolean {
    const { active, factors } = this;
    let inColumns = 0;
    for (let k = 0; k < otherCount; k++) inColumns += active.columnCount[this.otherColumn[k]];
    let inRows = 0;
    for (let lower = factors.lowerStart[pivotRow]; lower < factors.lowerEnd[pivotRow]; lower++) {
      inRows += active.rowCount[factors.lowerIndex[lower]];
    }
    this.work += Math.min(inRows, inColumns);
    return inRows < inColumns;
  }

  /** hot: subtracts multiples of the pivot row from each row of L's column, row by row. */
  private updateRows(pivotRow: number, otherCount: number, drop: number): void {
    const { active, factors, otherColumn, otherValue, scratchValue, scratchMark, columnLargest } = this;
    for (let k = 0; k < otherCount; k++) {
      scratchValue[otherColumn[k]] = otherValue[k];
      columnLargest[otherColumn[k]] = -1;
    }
    for (let lower = factors.lowerStart[pivotRow]; lower < factors.lowerEnd[pivotRow]; lower++) {
      const row = factors.lowerIndex[lower];
      const multiplier = factors.lowerValue[lower];
      const mark = ++this.mark;
      const { rowIndex, rowLink, columnValue } = active;
      let touched = 0;
      let end = active.rowStart[row] + active.rowCount[row];
      for (let place = active.rowStart[row]; place < end; place++) {
        const column = rowIndex[place];
        const entry = scratchValue[column];
        if (entry === 0) continue;
        scratchMark[column] = mark;
        touched++;
        const at = rowLink[place];
        const updated = columnValue[at] - multiplier * entry;
        columnValue[at] = updated;
        if (updated > -drop && updated < drop) {
          active.removeEntry(column, at);
          place--;
          end--;
        }
      }
      if (touched === otherCount) continue;
      for (let k = 0; k < otherCount; k++) {
        if (scratchMark[otherColumn[k]] === mark) continue;
        const filled = -multiplier * otherValue[k];
        if (filled <= -drop || filled >= drop) active.addEntry(row, otherColumn[k], filled);
      }
      this.work += otherCount;
    }
    for (let k = 0; k < otherCount; k++) scratchValue[otherColumn[k]] = 0;
  }

  /** The same, column by column. */
  private updateColumns(pivotRow: number, otherCount: number, drop: number): void {
    const { factors, scratchValue, columnLargest, otherColumn, otherValue } = this;
    const lowerStart = factors.lowerStart[pivotRow];
    const lowerEnd = factors.lowerEnd[pivotRow];
    for (let lower = lowerStart; lower < lowerEnd; lower++) {
      scratchValue[factors.lowerIndex[lower]] = factors.lowerValue[lower];
    }
    for (let k = 0; k < otherCount; k++) {
      const column = otherColumn[k];
      columnLargest[column] = this.updateColumn(column, otherValue[k], lowerStart, lowerEnd, drop);
    }
    this.work += otherCount * (lowerEnd - lowerStart);
    for (let lower = lowerStart; lower < lowerEnd; lower++) scratchValue[factors.lowerIndex[lower]] = 0;
  }

  /**
   * hot: subtracts `entry` × the pivot column's multipliers from a column.
   * @returns largest magnitude in the column afterwards
   */
  private updateColumn(
    column: number,
    entry: number,
    lowerStart: number,
    lowerEnd: number,
    drop: number,
  ): number {
    const { active, scratchValue, scratchMark } = this;
    const { columnIndex, columnValue } = active;
    const mark = ++this.mark;
    let largest = 0;
    let marked = 0;
    let end = active.columnStart[column] + active.columnCount[column];
    // No branch on whether a row has a multiplier: it could not be foretold, and 0 changes nothing.
    for (let at = active.columnStart[column]; at < end; at++) {
      const row = columnIndex[at];
      const multiplier = scratchValue[row];
      marked += multiplier === 0 ? 0 : 1;
      scratchMark[row] = mark;
      const updated = columnValue[at] - multiplier * entry;
      columnValue[at] = updated;
      const size = Math.abs(updated);
      if (size < drop) {
        active.removeEntry(column, at);
        at--;
        end--;
      } else largest = Math.max(largest, size);
    }
    if (marked === lowerEnd - lowerStart) return largest;
    const { lowerIndex, lowerValue } = this.factors;
    for (let lower = lowerStart; lower < lowerEnd; lower++) {
      const row = lowerIndex[lower];
      if (scratchMark[row] === mark) continue;
      const filled = -lowerValue[lower] * entry;
      const size = filled < 0 ? -filled : filled;
      if (size < drop) continue;
      active.addEntry(row, column, filled);
      if (size > largest) largest = size;
    }
    return largest;
  }

  private storeUpperColumn(pivotRow: number, pivotColumn: number, pivot: number): void {
    const { factors } = this;
    let upperCount = 0;
    for (let at = this.upperHead[pivotColumn]; at >= 0; at = this.upperNext[at]) upperCount++;
    factors.reserveUpper(upperCount);
    let upper = (factors.upperStart[pivotRow] = factors.upperSize);
    for (let at = this.upperHead[pivotColumn]; at >= 0; at = this.upperNext[at]) {
      factors.upperIndex[upper] = this.upperRow[at];
      factors.upperValue[upper++] = this.upperEntry[at];
    }
    factors.upperEnd[pivotRow] = factors.upperSize = upper;
    factors.diagonal[pivotRow] = pivot;
    factors.appendToUpperOrder(pivotRow);
    this.rowOfPosition[pivotColumn] = pivotRow;
    this.isRowDone[pivotRow] = 1;
  }
}
