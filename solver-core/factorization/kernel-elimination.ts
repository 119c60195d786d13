/**
 * Eliminates what singletons have left of a basis matrix: owner of the active submatrix, of its counts and of the
 * entries of U that come up on the way. Pivots are chosen by markowitz-pivot-search.ts; each is eliminated along rows
 * or along columns, whichever look at fewer entries.
 *
 * Source: Duff, Erisman and Reid (1986), "Direct Methods for Sparse Matrices", ch. 10.
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import { ActiveSubmatrix, CountLists } from './active-submatrix';
import type { LuFactors } from './lu-factors';
import { MarkowitzPivotSearch } from './markowitz-pivot-search';

export interface EliminationSettings {
  /** Least size of a pivot relative to the largest entry of its column. */
  readonly threshold: number;
  /** Entries of magnitude below this count as 0; absolute. */
  readonly drop: number;
  /** A column whose largest entry is below this cannot be pivoted on; absolute. */
  readonly singularPivot: number;
}

export class KernelElimination {
  private readonly active: ActiveSubmatrix;
  private readonly columnsByCount: CountLists;
  private readonly rowsByCount: CountLists;
  private readonly search = new MarkowitzPivotSearch();
  /** Length m, by position: largest magnitude in the active column, −1 where it must be looked for. */
  private readonly columnLargest: Float64Array;
  /** Length m, all 0 between pivots: multipliers by row, or entries of the pivot row by position. */
  private readonly scratchValue: Float64Array;
  /** The other entries of the pivot row. */
  private readonly otherColumn: Int32Array;
  private readonly otherValue: Float64Array;
  private readonly scratchMark: Int32Array;
  private mark = 0;
  // entries of U, as linked lists by position
  private readonly upperHead: Int32Array;
  private upperNext = new Int32Array(64);
  private upperRow = new Int32Array(64);
  private upperEntry = new Float64Array(64);
  private upperListSize = 0;
  private work = 0;

  constructor(
    /** m */
    private readonly order: number,
    private readonly factors: LuFactors,
  ) {
    this.active = new ActiveSubmatrix(order);
    this.columnsByCount = new CountLists(order);
    this.rowsByCount = new CountLists(order);
    this.columnLargest = new Float64Array(order);
    this.scratchValue = new Float64Array(order);
    this.otherColumn = new Int32Array(order);
    this.otherValue = new Float64Array(order);
    this.scratchMark = new Int32Array(order);
    this.upperHead = new Int32Array(order);
  }

  /** Empties everything for the next matrix. */
  reset(): void {
    this.active.reset();
    this.upperHead.fill(-1);
    this.upperListSize = 0;
    this.work = 0;
  }

  openRow(row: number, expectedCount: number): void {
    this.active.openRow(row, expectedCount + 4);
  }

  openColumn(position: number, expectedCount: number): void {
    this.active.openColumn(position, expectedCount + 4);
  }

  addActiveEntry(row: number, position: number, value: number): void {
    this.active.addEntry(row, position, value);
  }

  /** An entry of U in this column that is known before the column is pivoted. */
  addUpperEntry(position: number, row: number, entry: number): void {
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

  /**
   * Pivots on the active positions until none is left, or none can be.
   * @param positions those with an active column, ascending
   * @param isRowDone length m: 0 for active rows; set to 1 as they are pivoted on
   * @param rowOfPosition length m: receives the row that each position is pivoted on
   * @returns work units
   */
  run(
    positions: readonly number[],
    isRowDone: Uint8Array,
    rowOfPosition: Int32Array,
    settings: EliminationSettings,
  ): number {
    const { active, columnsByCount, rowsByCount, columnLargest, search } = this;
    columnsByCount.reset();
    rowsByCount.reset();
    for (let k = positions.length - 1; k >= 0; k--) {
      const position = positions[k];
      columnLargest[position] = -1;
      columnsByCount.insert(position, active.columnCount[position]);
    }
    for (let row = this.order - 1; row >= 0; row--) {
      if (isRowDone[row] === 0) rowsByCount.insert(row, active.rowCount[row]);
    }
    for (let left = positions.length; left > 0; left--) {
      const found = search.find(
        active,
        columnsByCount,
        rowsByCount,
        columnLargest,
        left,
        settings.threshold,
        settings.singularPivot,
      );
      if (!found) break; // singular: the caller fills up with logicals
      this.eliminate(search.pivotRow, search.pivotColumn, search.pivotAt, settings.drop);
      rowOfPosition[search.pivotColumn] = search.pivotRow;
      isRowDone[search.pivotRow] = 1;
    }
    return this.work;
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
      this.addUpperEntry(column, pivotRow, this.otherValue[k]);
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
  }
}
