/**
 * Owner of the changeable problem during presolve: rows, columns, entries, bounds and costs, to be minimised.
 *
 *   minimise   cost · x + constant   subject to   rowLower ≤ A x ≤ rowUpper,   columnLower ≤ x ≤ columnUpper
 *
 * A problem stated as `maximise` stands here with its costs and constant negated. Rows and columns keep their stated
 * numbers; what is removed is marked so. Entries are linked both ways along their row and along their column, so that
 * one costs a constant time to remove, and an elimination may add some.
 *
 * What a change may have made possible is queued: a row, when its entries, its bounds or the bounds of its columns
 * changed; a column, when its entries, cost or bounds changed, or a side of one of its rows fell away. So a fixed
 * point costs about the nonzeros, and nothing is looked at again for nothing.
 */
import { tolerances } from '../control/tolerances';
import type { LinearProgram } from '../linear-program/linear-program';
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';
import { nonzeroCount } from '../sparse/sparse-matrix';
import { ChangeQueue } from './change-queue';
import { RowActivities } from './row-activities';

/** What stands in a link after the last entry of a row or column. */
export const listEnd = -1;

export class PresolveWorkspace {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly changedRows: ChangeQueue;
  readonly changedColumns: ChangeQueue;
  readonly activities: RowActivities;
  /** Work units since the start: entries looked at or changed. */
  work = 0;
  /** Entries that were taken away, added or given another value since the start. */
  entryChanges = 0;

  private readonly lowerOfRow: Float64Array;
  private readonly upperOfRow: Float64Array;
  private readonly scaleOfRow: Float64Array;
  private readonly lowerOfColumn: Float64Array;
  private readonly upperOfColumn: Float64Array;
  private readonly costOfColumn: Float64Array;
  private readonly entriesInRow: Int32Array;
  private readonly entriesInColumn: Int32Array;
  private readonly singletonsInRow: Int32Array;
  private readonly firstOfRow: Int32Array;
  private readonly firstOfColumn: Int32Array;
  /** 1 while the row or column is part of the problem. */
  private readonly rowIsActive: Uint8Array;
  private readonly columnIsActive: Uint8Array;
  private objectiveConstant: number;
  private activeRows: number;
  private activeColumns: number;

  // Entries by number; the free ones are linked by nextOfRow from freeEntry.
  private rowOfEntry: Int32Array<ArrayBuffer>;
  private columnOfEntry: Int32Array<ArrayBuffer>;
  private valueOfEntry: Float64Array<ArrayBuffer>;
  private nextOfRow: Int32Array<ArrayBuffer>;
  private previousOfRow: Int32Array<ArrayBuffer>;
  private nextOfColumn: Int32Array<ArrayBuffer>;
  private previousOfColumn: Int32Array<ArrayBuffer>;
  private freeEntry = listEnd;
  private entriesMade: number;

  /** Entry of one scattered column in each row, listEnd where it has none; all listEnd between calls. Length m. */
  private readonly scratchEntryOfRow: Int32Array;

  constructor(problem: LinearProgram) {
    const { rowCount, columnCount, matrix } = problem;
    const sign = problem.sense === 'maximise' ? -1 : 1;
    const entryCount = nonzeroCount(matrix);
    this.rowCount = rowCount;
    this.columnCount = columnCount;
    this.activeRows = rowCount;
    this.activeColumns = columnCount;
    this.objectiveConstant = sign * problem.objectiveConstant;
    this.lowerOfRow = problem.rowLower.slice();
    this.upperOfRow = problem.rowUpper.slice();
    this.scaleOfRow = new Float64Array(rowCount);
    this.lowerOfColumn = problem.columnLower.slice();
    this.upperOfColumn = problem.columnUpper.slice();
    this.costOfColumn = problem.cost.slice();
    if (sign < 0) for (let column = 0; column < columnCount; column++) this.costOfColumn[column] *= -1;
    this.entriesInRow = new Int32Array(rowCount);
    this.entriesInColumn = new Int32Array(columnCount);
    this.singletonsInRow = new Int32Array(rowCount);
    this.firstOfRow = new Int32Array(rowCount).fill(listEnd);
    this.firstOfColumn = new Int32Array(columnCount).fill(listEnd);
    this.rowIsActive = new Uint8Array(rowCount).fill(1);
    this.columnIsActive = new Uint8Array(columnCount).fill(1);
    this.rowOfEntry = new Int32Array(entryCount);
    this.columnOfEntry = new Int32Array(entryCount);
    this.valueOfEntry = new Float64Array(entryCount);
    this.nextOfRow = new Int32Array(entryCount);
    this.previousOfRow = new Int32Array(entryCount);
    this.nextOfColumn = new Int32Array(entryCount);
    this.previousOfColumn = new Int32Array(entryCount);
    this.entriesMade = entryCount;
    this.scratchEntryOfRow = new Int32Array(rowCount).fill(listEnd);
    this.changedRows = ChangeQueue.ofAll(rowCount);
    this.changedColumns = ChangeQueue.ofAll(columnCount);
    this.loadEntries(problem);
    this.activities = new RowActivities(this);
  }

  get rowLower(): ReadonlyFloat64Array {
    return this.lowerOfRow;
  }

  get rowUpper(): ReadonlyFloat64Array {
    return this.upperOfRow;
  }

  /** Largest number that entered the bounds of each row by substitution: their rounding is relative to it. */
  get rowScale(): ReadonlyFloat64Array {
    return this.scaleOfRow;
  }

  get columnLower(): ReadonlyFloat64Array {
    return this.lowerOfColumn;
  }

  get columnUpper(): ReadonlyFloat64Array {
    return this.upperOfColumn;
  }

  get cost(): ReadonlyFloat64Array {
    return this.costOfColumn;
  }

  get constant(): number {
    return this.objectiveConstant;
  }

  /** Number of entries of each row. */
  get rowLength(): ReadonlyInt32Array {
    return this.entriesInRow;
  }

  /** Number of entries of each row whose columns have no other. */
  get singletonCount(): ReadonlyInt32Array {
    return this.singletonsInRow;
  }

  get columnLength(): ReadonlyInt32Array {
    return this.entriesInColumn;
  }

  /** First entry of each row, listEnd where it has none; go on by nextInRow. */
  get firstInRow(): ReadonlyInt32Array {
    return this.firstOfRow;
  }

  get firstInColumn(): ReadonlyInt32Array {
    return this.firstOfColumn;
  }

  get nextInRow(): ReadonlyInt32Array {
    return this.nextOfRow;
  }

  get nextInColumn(): ReadonlyInt32Array {
    return this.nextOfColumn;
  }

  get entryRow(): ReadonlyInt32Array {
    return this.rowOfEntry;
  }

  get entryColumn(): ReadonlyInt32Array {
    return this.columnOfEntry;
  }

  get entryValue(): ReadonlyFloat64Array {
    return this.valueOfEntry;
  }

  get activeRowCount(): number {
    return this.activeRows;
  }

  get activeColumnCount(): number {
    return this.activeColumns;
  }

  isRowActive(row: number): boolean {
    return this.rowIsActive[row] === 1;
  }

  isColumnActive(column: number): boolean {
    return this.columnIsActive[column] === 1;
  }

  isEquation(row: number): boolean {
    return this.lowerOfRow[row] === this.upperOfRow[row];
  }

  setRowBounds(row: number, lower: number, upper: number): void {
    const losesSide =
      (lower === -Infinity && this.lowerOfRow[row] !== -Infinity) ||
      (upper === Infinity && this.upperOfRow[row] !== Infinity);
    const wasEquation = this.isEquation(row);
    this.lowerOfRow[row] = lower;
    this.upperOfRow[row] = upper;
    this.changedRows.add(row);
    if (losesSide || wasEquation !== this.isEquation(row)) this.markColumnsOfRow(row);
  }

  setColumnBounds(column: number, lower: number, upper: number): void {
    this.lowerOfColumn[column] = lower;
    this.upperOfColumn[column] = upper;
    this.changedColumns.add(column);
    for (let e = this.firstOfColumn[column]; e !== listEnd; e = this.nextOfColumn[e]) {
      this.markRow(this.rowOfEntry[e]);
    }
    this.work += this.entriesInColumn[column];
  }

  setCost(column: number, cost: number): void {
    this.costOfColumn[column] = cost;
    this.changedColumns.add(column);
    this.markRowOfSingleton(column);
  }

  addToConstant(amount: number): void {
    this.objectiveConstant += amount;
  }

  /** Takes a row out of the problem. */
  removeRow(row: number): void {
    for (let e = this.firstOfRow[row]; e !== listEnd;) {
      const next = this.nextOfRow[e];
      const column = this.columnOfEntry[e];
      this.unlinkFromColumn(e, column);
      this.changedColumns.add(column);
      this.releaseEntry(e);
      e = next;
    }
    this.work += this.entriesInRow[row];
    this.firstOfRow[row] = listEnd;
    this.entriesInRow[row] = 0;
    this.rowIsActive[row] = 0;
    this.activeRows--;
  }

  /** Takes a column out of the problem, as if its value were 0. */
  removeColumn(column: number): void {
    if (this.entriesInColumn[column] === 1) this.singletonsInRow[this.onlyRow(column)]--;
    for (let e = this.firstOfColumn[column]; e !== listEnd;) {
      const next = this.nextOfColumn[e];
      const row = this.rowOfEntry[e];
      this.unlinkFromRow(e, row);
      this.markRow(row);
      this.releaseEntry(e);
      e = next;
    }
    this.work += this.entriesInColumn[column];
    this.firstOfColumn[column] = listEnd;
    this.entriesInColumn[column] = 0;
    this.columnIsActive[column] = 0;
    this.activeColumns--;
  }

  /** Takes a column out of the problem at a value, which goes into the right sides and the constant. */
  substituteValue(column: number, value: number): void {
    if (value !== 0) {
      for (let e = this.firstOfColumn[column]; e !== listEnd; e = this.nextOfColumn[e]) {
        this.shiftRow(this.rowOfEntry[e], -this.valueOfEntry[e] * value);
      }
      this.objectiveConstant += this.costOfColumn[column] * value;
    }
    this.removeColumn(column);
  }

  /**
   * Takes a column and an equation out of the problem: x_j = (b − Σ a_ik x_k) / a_ij is put into every other row of
   * the column and into the objective.
   */
  eliminate(row: number, column: number, pivot: number): void {
    const rightSide = this.lowerOfRow[row];
    for (let e = this.firstOfColumn[column]; e !== listEnd; e = this.nextOfColumn[e]) {
      if (this.rowOfEntry[e] !== row)
        this.shiftRow(this.rowOfEntry[e], (-this.valueOfEntry[e] * rightSide) / pivot);
    }
    const price = this.costOfColumn[column] / pivot;
    this.objectiveConstant += price * rightSide;
    for (let e = this.firstOfRow[row]; e !== listEnd; e = this.nextOfRow[e]) {
      const other = this.columnOfEntry[e];
      if (other === column) continue;
      if (price !== 0) this.moveCost(other, price * this.valueOfEntry[e]);
      this.addMultiple(other, column, row, -this.valueOfEntry[e] / pivot);
    }
    this.removeRow(row);
    this.removeColumn(column);
  }

  /** Takes what a column's cost is worth through a row out of another column's cost; a difference in noise is 0. */
  moveCost(column: number, amount: number): void {
    const before = this.costOfColumn[column];
    this.setCost(column, withoutCancellation(before - amount, before, amount));
  }

  /** Entries of `into` += factor × entries of `from`, except in one row. */
  private addMultiple(into: number, from: number, exceptRow: number, factor: number): void {
    const { scratchEntryOfRow } = this;
    // A column that much is put into grows long: then the few rows concerned are searched in its place.
    const isByRows = this.areRowsShorter(from, exceptRow, this.entriesInColumn[into]);
    if (!isByRows) this.scatterEntries(into);
    for (let e = this.firstOfColumn[from]; e !== listEnd; e = this.nextOfColumn[e]) {
      const row = this.rowOfEntry[e];
      if (row === exceptRow) continue;
      const at = isByRows ? this.entryAt(row, into) : scratchEntryOfRow[row];
      this.addToEntry(at, row, into, factor * this.valueOfEntry[e]);
    }
    if (!isByRows) this.clearScattered(into, from);
    this.work += this.entriesInColumn[from] + (isByRows ? 0 : this.entriesInColumn[into]);
    this.changedColumns.add(into);
  }

  /** Are the rows of a column, but for one, together shorter than a length? */
  private areRowsShorter(column: number, exceptRow: number, length: number): boolean {
    let sum = 0;
    for (let e = this.firstOfColumn[column]; e !== listEnd && sum < length; e = this.nextOfColumn[e]) {
      if (this.rowOfEntry[e] !== exceptRow) sum += this.entriesInRow[this.rowOfEntry[e]];
    }
    return sum < length;
  }

  /** The entry at a place, listEnd where there is none; found along the row. */
  private entryAt(row: number, column: number): number {
    let e = this.firstOfRow[row];
    while (e !== listEnd && this.columnOfEntry[e] !== column) e = this.nextOfRow[e];
    this.work += this.entriesInRow[row];
    return e;
  }

  private scatterEntries(column: number): void {
    for (let e = this.firstOfColumn[column]; e !== listEnd; e = this.nextOfColumn[e]) {
      this.scratchEntryOfRow[this.rowOfEntry[e]] = e;
    }
  }

  /** Undoes scatterEntries, also where entries in the rows of `other` have gone since. */
  private clearScattered(column: number, other: number): void {
    for (const cleared of [column, other]) {
      for (let e = this.firstOfColumn[cleared]; e !== listEnd; e = this.nextOfColumn[e]) {
        this.scratchEntryOfRow[this.rowOfEntry[e]] = listEnd;
      }
    }
  }

  /** @param at the entry at this place, listEnd where there is none yet */
  private addToEntry(at: number, row: number, column: number, amount: number): void {
    if (at === listEnd) {
      this.addEntry(row, column, amount);
      return;
    }
    const before = this.valueOfEntry[at];
    const after = withoutCancellation(before + amount, before, amount);
    if (after === 0) this.removeEntry(at);
    else this.valueOfEntry[at] = after;
    this.entryChanges++;
    this.markRow(row);
  }

  private shiftRow(row: number, amount: number): void {
    this.lowerOfRow[row] += amount;
    this.upperOfRow[row] += amount;
    this.scaleOfRow[row] = Math.max(this.scaleOfRow[row], Math.abs(amount));
    this.markRow(row);
  }

  /** A row whose entries, column bounds or scale changed. */
  private markRow(row: number): void {
    this.activities.markStale(row);
    this.changedRows.add(row);
  }

  private markColumnsOfRow(row: number): void {
    for (let e = this.firstOfRow[row]; e !== listEnd; e = this.nextOfRow[e]) {
      this.changedColumns.add(this.columnOfEntry[e]);
    }
    this.work += this.entriesInRow[row];
  }

  /** A column with one entry is looked at from its row. */
  private markRowOfSingleton(column: number): void {
    if (this.entriesInColumn[column] === 1) this.changedRows.add(this.onlyRow(column));
  }

  /** The row of a column with one entry. */
  private onlyRow(column: number): number {
    return this.rowOfEntry[this.firstOfColumn[column]];
  }

  private addEntry(row: number, column: number, value: number): void {
    this.entryChanges++;
    let e = this.freeEntry;
    if (e !== listEnd) this.freeEntry = this.nextOfRow[e];
    else {
      e = this.entriesMade++;
      this.growEntries();
    }
    this.rowOfEntry[e] = row;
    this.columnOfEntry[e] = column;
    this.valueOfEntry[e] = value;
    this.linkFirst(e, row, column);
    this.markRow(row);
  }

  private removeEntry(entry: number): void {
    const row = this.rowOfEntry[entry];
    this.unlinkFromRow(entry, row);
    this.unlinkFromColumn(entry, this.columnOfEntry[entry]);
    this.releaseEntry(entry);
  }

  private linkFirst(e: number, row: number, column: number): void {
    const afterInRow = this.firstOfRow[row];
    this.nextOfRow[e] = afterInRow;
    this.previousOfRow[e] = listEnd;
    if (afterInRow !== listEnd) this.previousOfRow[afterInRow] = e;
    this.firstOfRow[row] = e;
    this.entriesInRow[row]++;
    if (this.entriesInColumn[column] === 0) this.singletonsInRow[row]++;
    else if (this.entriesInColumn[column] === 1) this.singletonsInRow[this.onlyRow(column)]--;
    const afterInColumn = this.firstOfColumn[column];
    this.nextOfColumn[e] = afterInColumn;
    this.previousOfColumn[e] = listEnd;
    if (afterInColumn !== listEnd) this.previousOfColumn[afterInColumn] = e;
    this.firstOfColumn[column] = e;
    this.entriesInColumn[column]++;
  }

  private unlinkFromRow(e: number, row: number): void {
    const before = this.previousOfRow[e];
    const after = this.nextOfRow[e];
    if (before === listEnd) this.firstOfRow[row] = after;
    else this.nextOfRow[before] = after;
    if (after !== listEnd) this.previousOfRow[after] = before;
    this.entriesInRow[row]--;
  }

  private unlinkFromColumn(e: number, column: number): void {
    const before = this.previousOfColumn[e];
    const after = this.nextOfColumn[e];
    if (before === listEnd) this.firstOfColumn[column] = after;
    else this.nextOfColumn[before] = after;
    if (after !== listEnd) this.previousOfColumn[after] = before;
    if (this.entriesInColumn[column]-- === 1) this.singletonsInRow[this.rowOfEntry[e]]--;
    else if (this.entriesInColumn[column] === 1) this.singletonsInRow[this.onlyRow(column)]++;
    this.markRowOfSingleton(column);
  }

  private releaseEntry(e: number): void {
    this.entryChanges++;
    this.nextOfRow[e] = this.freeEntry;
    this.freeEntry = e;
  }

  private growEntries(): void {
    const wanted = this.entriesMade;
    this.rowOfEntry = grownInt32(this.rowOfEntry, wanted);
    this.columnOfEntry = grownInt32(this.columnOfEntry, wanted);
    this.valueOfEntry = grownFloat64(this.valueOfEntry, wanted);
    this.nextOfRow = grownInt32(this.nextOfRow, wanted);
    this.previousOfRow = grownInt32(this.previousOfRow, wanted);
    this.nextOfColumn = grownInt32(this.nextOfColumn, wanted);
    this.previousOfColumn = grownInt32(this.previousOfColumn, wanted);
  }

  /** Links the stated entries: along columns by rows, along rows by columns, both ascending. */
  private loadEntries(problem: LinearProgram): void {
    const { columnStart, rowIndex, value } = problem.matrix;
    const lastOfRow = new Int32Array(this.rowCount).fill(listEnd);
    for (let column = 0; column < this.columnCount; column++) {
      const end = columnStart[column + 1];
      this.entriesInColumn[column] = end - columnStart[column];
      if (end > columnStart[column]) this.firstOfColumn[column] = columnStart[column];
      if (end === columnStart[column] + 1) this.singletonsInRow[rowIndex[columnStart[column]]]++;
      for (let e = columnStart[column]; e < end; e++) {
        const row = rowIndex[e];
        this.rowOfEntry[e] = row;
        this.columnOfEntry[e] = column;
        this.valueOfEntry[e] = value[e];
        this.nextOfColumn[e] = e + 1 < end ? e + 1 : listEnd;
        this.previousOfColumn[e] = e > columnStart[column] ? e - 1 : listEnd;
        const last = lastOfRow[row];
        if (last === listEnd) this.firstOfRow[row] = e;
        else this.nextOfRow[last] = e;
        this.previousOfRow[e] = last;
        this.nextOfRow[e] = listEnd;
        lastOfRow[row] = e;
        this.entriesInRow[row]++;
      }
    }
    for (let row = 0; row < this.rowCount; row++) this.scaleOfRow[row] = finiteMagnitude(this, row);
    this.work += value.length;
  }
}

function finiteMagnitude(workspace: PresolveWorkspace, row: number): number {
  const lower = Math.abs(workspace.rowLower[row]);
  const upper = Math.abs(workspace.rowUpper[row]);
  return Math.max(lower < Infinity ? lower : 0, upper < Infinity ? upper : 0);
}

/** The sum of two terms, 0 where so little is left that it is their rounding. */
function withoutCancellation(sum: number, term: number, otherTerm: number): number {
  const size = Math.max(Math.abs(term), Math.abs(otherTerm));
  return Math.abs(sum) <= tolerances.presolveCancellation * size ? 0 : sum;
}
