/**
 * Owner of a changeable sparse matrix: its entries by number, linked both ways along their row and along their column,
 * so that one costs a constant time to remove, and some may be added.
 *
 * Lists are read as `for (let e = firstInRow[row]; e !== listEnd; e = nextInRow[e])`. Views may be held while entries
 * are removed; adding may replace the arrays by longer ones.
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';
import type { SparseMatrix } from '../sparse/sparse-matrix';

/** What stands in a link after the last entry of a row or column. */
export const listEnd = -1;

export class LinkedEntries {
  /** Entries that were removed, added or given another value since the start. */
  changes = 0;

  // By entry number; the free ones are linked by nextOfRow from freeEntry.
  private rowOfEntry: Int32Array<ArrayBuffer>;
  private columnOfEntry: Int32Array<ArrayBuffer>;
  private valueOfEntry: Float64Array<ArrayBuffer>;
  private nextOfRow: Int32Array<ArrayBuffer>;
  private previousOfRow: Int32Array<ArrayBuffer>;
  private nextOfColumn: Int32Array<ArrayBuffer>;
  private previousOfColumn: Int32Array<ArrayBuffer>;
  private freeEntry = listEnd;
  private entriesMade: number;

  // By row and by column.
  private readonly firstOfRow: Int32Array;
  private readonly firstOfColumn: Int32Array;
  private readonly entriesInRow: Int32Array;
  private readonly entriesInColumn: Int32Array;
  private readonly singletonsInRow: Int32Array;

  constructor(matrix: SparseMatrix) {
    const { rowCount, columnCount } = matrix;
    const entryCount = matrix.value.length;
    this.rowOfEntry = new Int32Array(entryCount);
    this.columnOfEntry = new Int32Array(entryCount);
    this.valueOfEntry = new Float64Array(entryCount);
    this.nextOfRow = new Int32Array(entryCount);
    this.previousOfRow = new Int32Array(entryCount);
    this.nextOfColumn = new Int32Array(entryCount);
    this.previousOfColumn = new Int32Array(entryCount);
    this.entriesMade = entryCount;
    this.firstOfRow = new Int32Array(rowCount).fill(listEnd);
    this.firstOfColumn = new Int32Array(columnCount).fill(listEnd);
    this.entriesInRow = new Int32Array(rowCount);
    this.entriesInColumn = new Int32Array(columnCount);
    this.singletonsInRow = new Int32Array(rowCount);
    this.load(matrix);
  }

  /** Number of entries of each row. */
  get rowLength(): ReadonlyInt32Array {
    return this.entriesInRow;
  }

  get columnLength(): ReadonlyInt32Array {
    return this.entriesInColumn;
  }

  /** Number of entries of each row whose columns have no other. */
  get singletonCount(): ReadonlyInt32Array {
    return this.singletonsInRow;
  }

  /** First entry of each row, listEnd where it has none. */
  get firstInRow(): ReadonlyInt32Array {
    return this.firstOfRow;
  }

  get firstInColumn(): ReadonlyInt32Array {
    return this.firstOfColumn;
  }

  /** By entry: the next in its row, listEnd after the last. */
  get nextInRow(): ReadonlyInt32Array {
    return this.nextOfRow;
  }

  get nextInColumn(): ReadonlyInt32Array {
    return this.nextOfColumn;
  }

  get row(): ReadonlyInt32Array {
    return this.rowOfEntry;
  }

  get column(): ReadonlyInt32Array {
    return this.columnOfEntry;
  }

  get value(): ReadonlyFloat64Array {
    return this.valueOfEntry;
  }

  /** The row of a column with one entry. */
  onlyRow(column: number): number {
    return this.rowOfEntry[this.firstOfColumn[column]];
  }

  /** The entry at a place, found along the row; listEnd where there is none. */
  find(row: number, column: number): number {
    let e = this.firstOfRow[row];
    while (e !== listEnd && this.columnOfEntry[e] !== column) e = this.nextOfRow[e];
    return e;
  }

  setValue(entry: number, value: number): void {
    this.valueOfEntry[entry] = value;
    this.changes++;
  }

  /** Adds an entry at a place that has none. */
  add(row: number, column: number, value: number): void {
    let e = this.freeEntry;
    if (e !== listEnd) this.freeEntry = this.nextOfRow[e];
    else {
      e = this.entriesMade++;
      this.grow();
    }
    this.rowOfEntry[e] = row;
    this.columnOfEntry[e] = column;
    this.valueOfEntry[e] = value;
    this.linkIntoRow(e, row);
    if (this.entriesInColumn[column] === 0) this.singletonsInRow[row]++;
    else if (this.entriesInColumn[column] === 1) this.singletonsInRow[this.onlyRow(column)]--;
    this.linkIntoColumn(e, column);
    this.changes++;
  }

  remove(entry: number): void {
    const row = this.rowOfEntry[entry];
    const column = this.columnOfEntry[entry];
    this.unlinkFromRow(entry, row);
    this.unlinkFromColumn(entry, column);
    if (this.entriesInColumn[column] === 0) this.singletonsInRow[row]--;
    else if (this.entriesInColumn[column] === 1) this.singletonsInRow[this.onlyRow(column)]++;
    this.nextOfRow[entry] = this.freeEntry;
    this.freeEntry = entry;
    this.changes++;
  }

  private linkIntoRow(e: number, row: number): void {
    const after = this.firstOfRow[row];
    this.nextOfRow[e] = after;
    this.previousOfRow[e] = listEnd;
    if (after !== listEnd) this.previousOfRow[after] = e;
    this.firstOfRow[row] = e;
    this.entriesInRow[row]++;
  }

  private linkIntoColumn(e: number, column: number): void {
    const after = this.firstOfColumn[column];
    this.nextOfColumn[e] = after;
    this.previousOfColumn[e] = listEnd;
    if (after !== listEnd) this.previousOfColumn[after] = e;
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
    this.entriesInColumn[column]--;
  }

  private grow(): void {
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
  private load({ rowCount, columnCount, columnStart, rowIndex, value }: SparseMatrix): void {
    const lastOfRow = new Int32Array(rowCount).fill(listEnd);
    for (let column = 0; column < columnCount; column++) {
      const start = columnStart[column];
      const end = columnStart[column + 1];
      this.entriesInColumn[column] = end - start;
      if (end > start) this.firstOfColumn[column] = start;
      if (end === start + 1) this.singletonsInRow[rowIndex[start]]++;
      for (let e = start; e < end; e++) {
        const row = rowIndex[e];
        this.rowOfEntry[e] = row;
        this.columnOfEntry[e] = column;
        this.valueOfEntry[e] = value[e];
        this.nextOfColumn[e] = e + 1 < end ? e + 1 : listEnd;
        this.previousOfColumn[e] = e > start ? e - 1 : listEnd;
        const last = lastOfRow[row];
        if (last === listEnd) this.firstOfRow[row] = e;
        else this.nextOfRow[last] = e;
        this.previousOfRow[e] = last;
        this.nextOfRow[e] = listEnd;
        lastOfRow[row] = e;
        this.entriesInRow[row]++;
      }
    }
  }
}
