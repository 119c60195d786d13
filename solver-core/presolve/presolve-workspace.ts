/**
 * Owner of the changeable problem during presolve: rows, columns, bounds and costs, to be minimised.
 *
 *   minimise   cost · x + constant   subject to   rowLower ≤ A x ≤ rowUpper,   columnLower ≤ x ≤ columnUpper
 *
 * A problem stated as `maximise` stands here with its costs and constant negated. Rows and columns keep their stated
 * numbers; what is removed is marked so.
 *
 * What a change may have made possible is queued: a row, when its entries, its bounds or the bounds of its columns
 * changed; a column, when its entries, cost or bounds changed, or a side of one of its rows fell away. So a fixed
 * point costs about the nonzeros, and nothing is looked at again for nothing.
 */
import { tolerances } from '../control/tolerances';
import type { LinearProgram } from '../linear-program/linear-program';
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';
import { ChangeQueue } from './change-queue';
import { LinkedEntries, listEnd } from './linked-entries';
import { RowActivities } from './row-activities';

export class PresolveWorkspace {
  readonly rowCount: number;
  readonly columnCount: number;
  readonly changedRows: ChangeQueue;
  readonly changedColumns: ChangeQueue;
  readonly activities: RowActivities;
  /** Work units since the start: entries looked at or changed. */
  work = 0;

  private readonly entries: LinkedEntries;
  private readonly lowerOfRow: Float64Array;
  private readonly upperOfRow: Float64Array;
  private readonly scaleOfRow: Float64Array;
  private readonly lowerOfColumn: Float64Array;
  private readonly upperOfColumn: Float64Array;
  private readonly costOfColumn: Float64Array;
  /** 1 while the row or column is part of the problem. */
  private readonly rowIsActive: Uint8Array;
  private readonly columnIsActive: Uint8Array;
  private objectiveConstant: number;

  /** Entry of one scattered column in each row, listEnd where it has none; all listEnd between calls. Length m. */
  private readonly scratchEntryOfRow: Int32Array;

  constructor(problem: LinearProgram) {
    const { rowCount, columnCount, matrix } = problem;
    const sign = problem.sense === 'maximise' ? -1 : 1;
    this.rowCount = rowCount;
    this.columnCount = columnCount;
    this.entries = new LinkedEntries(matrix);
    this.work += matrix.value.length;
    this.objectiveConstant = sign * problem.objectiveConstant;
    this.lowerOfRow = problem.rowLower.slice();
    this.upperOfRow = problem.rowUpper.slice();
    this.scaleOfRow = new Float64Array(rowCount);
    for (let row = 0; row < rowCount; row++) this.scaleOfRow[row] = finiteMagnitude(problem, row);
    this.lowerOfColumn = problem.columnLower.slice();
    this.upperOfColumn = problem.columnUpper.slice();
    this.costOfColumn = problem.cost.slice();
    if (sign < 0) for (let column = 0; column < columnCount; column++) this.costOfColumn[column] *= -1;
    this.rowIsActive = new Uint8Array(rowCount).fill(1);
    this.columnIsActive = new Uint8Array(columnCount).fill(1);
    this.scratchEntryOfRow = new Int32Array(rowCount).fill(listEnd);
    this.changedRows = ChangeQueue.ofAll(rowCount);
    this.changedColumns = ChangeQueue.ofAll(columnCount);
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

  // The entries, for readers: see linked-entries.ts.

  get rowLength(): ReadonlyInt32Array {
    return this.entries.rowLength;
  }

  get columnLength(): ReadonlyInt32Array {
    return this.entries.columnLength;
  }

  get singletonCount(): ReadonlyInt32Array {
    return this.entries.singletonCount;
  }

  get firstInRow(): ReadonlyInt32Array {
    return this.entries.firstInRow;
  }

  get firstInColumn(): ReadonlyInt32Array {
    return this.entries.firstInColumn;
  }

  get nextInRow(): ReadonlyInt32Array {
    return this.entries.nextInRow;
  }

  get nextInColumn(): ReadonlyInt32Array {
    return this.entries.nextInColumn;
  }

  get entryRow(): ReadonlyInt32Array {
    return this.entries.row;
  }

  get entryColumn(): ReadonlyInt32Array {
    return this.entries.column;
  }

  get entryValue(): ReadonlyFloat64Array {
    return this.entries.value;
  }

  /** Entries that were removed, added or given another value since the start. */
  get entryChanges(): number {
    return this.entries.changes;
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
    const { firstInColumn, nextInColumn, row } = this.entries;
    this.lowerOfColumn[column] = lower;
    this.upperOfColumn[column] = upper;
    this.changedColumns.add(column);
    for (let e = firstInColumn[column]; e !== listEnd; e = nextInColumn[e]) this.markRow(row[e]);
    this.work += this.entries.columnLength[column];
  }

  setCost(column: number, cost: number): void {
    this.costOfColumn[column] = cost;
    this.markColumn(column);
  }

  addToConstant(amount: number): void {
    this.objectiveConstant += amount;
  }

  /** Takes a row out of the problem. */
  removeRow(row: number): void {
    const { entries } = this;
    this.work += entries.rowLength[row];
    for (let e = entries.firstInRow[row]; e !== listEnd;) {
      const next = entries.nextInRow[e];
      const column = entries.column[e];
      entries.remove(e);
      this.markColumn(column);
      e = next;
    }
    this.rowIsActive[row] = 0;
  }

  /** Takes a column out of the problem, as if its value were 0. */
  removeColumn(column: number): void {
    const { entries } = this;
    this.work += entries.columnLength[column];
    for (let e = entries.firstInColumn[column]; e !== listEnd;) {
      const next = entries.nextInColumn[e];
      const row = entries.row[e];
      entries.remove(e);
      this.markRow(row);
      e = next;
    }
    this.columnIsActive[column] = 0;
  }

  /** Takes a column out of the problem at a value, which goes into the right sides and the constant. */
  substituteValue(column: number, value: number): void {
    const { firstInColumn, nextInColumn, row, value: coefficient } = this.entries;
    if (value !== 0) {
      for (let e = firstInColumn[column]; e !== listEnd; e = nextInColumn[e]) {
        this.shiftRow(row[e], -coefficient[e] * value);
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
    const { entries } = this;
    const rightSide = this.lowerOfRow[row];
    for (let e = entries.firstInColumn[column]; e !== listEnd; e = entries.nextInColumn[e]) {
      const other = entries.row[e];
      if (other !== row) this.shiftRow(other, (-entries.value[e] * rightSide) / pivot);
    }
    const price = this.costOfColumn[column] / pivot;
    this.objectiveConstant += price * rightSide;
    for (let e = entries.firstInRow[row]; e !== listEnd; e = entries.nextInRow[e]) {
      const other = entries.column[e];
      if (other === column) continue;
      const coefficient = entries.value[e];
      if (price !== 0) this.moveCost(other, price * coefficient);
      this.addMultiple(other, column, row, -coefficient / pivot);
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
    const { entries, scratchEntryOfRow } = this;
    // A column that much is put into grows long: then the few rows concerned are searched in its place.
    const isByRows = this.areRowsShorter(from, exceptRow, entries.columnLength[into]);
    if (!isByRows) this.scatterEntries(into);
    for (let e = entries.firstInColumn[from]; e !== listEnd; e = entries.nextInColumn[e]) {
      const row = entries.row[e];
      if (row === exceptRow) continue;
      const at = isByRows ? entries.find(row, into) : scratchEntryOfRow[row];
      this.work += isByRows ? entries.rowLength[row] : 1;
      this.addToEntry(at, row, into, factor * entries.value[e]);
    }
    if (!isByRows) this.clearScattered(into, from);
    this.changedColumns.add(into);
  }

  /** Are the rows of a column, but for one, together shorter than a length? */
  private areRowsShorter(column: number, exceptRow: number, length: number): boolean {
    const { firstInColumn, nextInColumn, row, rowLength } = this.entries;
    let sum = 0;
    for (let e = firstInColumn[column]; e !== listEnd && sum < length; e = nextInColumn[e]) {
      if (row[e] !== exceptRow) sum += rowLength[row[e]];
    }
    return sum < length;
  }

  private scatterEntries(column: number): void {
    const { firstInColumn, nextInColumn, row, columnLength } = this.entries;
    for (let e = firstInColumn[column]; e !== listEnd; e = nextInColumn[e])
      this.scratchEntryOfRow[row[e]] = e;
    this.work += columnLength[column];
  }

  /** Undoes scatterEntries, also where entries in the rows of `other` have gone since. */
  private clearScattered(column: number, other: number): void {
    const { firstInColumn, nextInColumn, row } = this.entries;
    for (const cleared of [column, other]) {
      for (let e = firstInColumn[cleared]; e !== listEnd; e = nextInColumn[e]) {
        this.scratchEntryOfRow[row[e]] = listEnd;
      }
    }
  }

  /** @param at the entry at this place, listEnd where there is none yet */
  private addToEntry(at: number, row: number, column: number, amount: number): void {
    this.markRow(row);
    if (at === listEnd) {
      this.entries.add(row, column, amount);
      return;
    }
    const before = this.entries.value[at];
    const after = withoutCancellation(before + amount, before, amount);
    if (after === 0) {
      this.entries.remove(at);
      this.markColumn(column);
    } else {
      this.entries.setValue(at, after);
    }
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

  /** A column whose entries or cost changed. One with a single entry is looked at from its row. */
  private markColumn(column: number): void {
    this.changedColumns.add(column);
    if (this.entries.columnLength[column] === 1) this.changedRows.add(this.entries.onlyRow(column));
  }

  private markColumnsOfRow(row: number): void {
    const { firstInRow, nextInRow, column, rowLength } = this.entries;
    for (let e = firstInRow[row]; e !== listEnd; e = nextInRow[e]) this.changedColumns.add(column[e]);
    this.work += rowLength[row];
  }
}

function finiteMagnitude({ rowLower, rowUpper }: LinearProgram, row: number): number {
  const lower = Math.abs(rowLower[row]);
  const upper = Math.abs(rowUpper[row]);
  return Math.max(lower < Infinity ? lower : 0, upper < Infinity ? upper : 0);
}

/** The sum of two terms, 0 where so little is left that it is their rounding. */
function withoutCancellation(sum: number, term: number, otherTerm: number): number {
  const size = Math.max(Math.abs(term), Math.abs(otherTerm));
  return Math.abs(sum) <= tolerances.presolveCancellation * size ? 0 : sum;
}
