/**
 * The part of a basis matrix that is still to be eliminated: columns with values, rows as patterns, both in storage
 * that grows, and lists of rows and columns by their count (Duff, Erisman and Reid 1986, §10.2).
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';

export class ActiveSubmatrix {
  // columns by position in the basis
  readonly columnStart: Int32Array;
  readonly columnCount: Int32Array;
  readonly columnRoom: Int32Array;
  columnIndex = new Int32Array(256);
  columnValue = new Float64Array(256);
  private columnEnd = 0;
  // rows as lists of the columns that have an entry in them
  readonly rowStart: Int32Array;
  readonly rowCount: Int32Array;
  readonly rowRoom: Int32Array;
  rowIndex = new Int32Array(256);
  private rowEnd = 0;

  constructor(readonly order: number) {
    this.columnStart = new Int32Array(order);
    this.columnCount = new Int32Array(order);
    this.columnRoom = new Int32Array(order);
    this.rowStart = new Int32Array(order);
    this.rowCount = new Int32Array(order);
    this.rowRoom = new Int32Array(order);
  }

  reset(): void {
    this.columnEnd = 0;
    this.rowEnd = 0;
  }

  openColumn(column: number, room: number): void {
    this.columnIndex = grownInt32(this.columnIndex, this.columnEnd + room);
    this.columnValue = grownFloat64(this.columnValue, this.columnEnd + room);
    this.columnStart[column] = this.columnEnd;
    this.columnCount[column] = 0;
    this.columnRoom[column] = room;
    this.columnEnd += room;
  }

  openRow(row: number, room: number): void {
    this.rowIndex = grownInt32(this.rowIndex, this.rowEnd + room);
    this.rowStart[row] = this.rowEnd;
    this.rowCount[row] = 0;
    this.rowRoom[row] = room;
    this.rowEnd += room;
  }

  addEntry(row: number, column: number, value: number): void {
    if (this.columnCount[column] === this.columnRoom[column]) this.moveColumn(column);
    const at = this.columnStart[column] + this.columnCount[column]++;
    this.columnIndex[at] = row;
    this.columnValue[at] = value;
    if (this.rowCount[row] === this.rowRoom[row]) this.moveRow(row);
    this.rowIndex[this.rowStart[row] + this.rowCount[row]++] = column;
  }

  /** Takes the entry standing at `at` out of a column; the last entry of the column moves into its place. */
  removeColumnEntry(column: number, at: number): void {
    const last = this.columnStart[column] + --this.columnCount[column];
    this.columnIndex[at] = this.columnIndex[last];
    this.columnValue[at] = this.columnValue[last];
  }

  removeFromRow(row: number, column: number): void {
    const { rowIndex } = this;
    const start = this.rowStart[row];
    let at = start;
    while (rowIndex[at] !== column) at++;
    rowIndex[at] = rowIndex[start + --this.rowCount[row]];
  }

  /** Place of row's entry in a column, or −1. */
  findInColumn(column: number, row: number): number {
    const { columnIndex } = this;
    const start = this.columnStart[column];
    const end = start + this.columnCount[column];
    for (let at = start; at < end; at++) if (columnIndex[at] === row) return at;
    return -1;
  }

  /** To the end of the storage, with twice the room. Old places are not used again before reset: they are few. */
  private moveColumn(column: number): void {
    const count = this.columnCount[column];
    const from = this.columnStart[column];
    const room = Math.max(8, 2 * count);
    this.columnIndex = grownInt32(this.columnIndex, this.columnEnd + room);
    this.columnValue = grownFloat64(this.columnValue, this.columnEnd + room);
    this.columnIndex.copyWithin(this.columnEnd, from, from + count);
    this.columnValue.copyWithin(this.columnEnd, from, from + count);
    this.columnStart[column] = this.columnEnd;
    this.columnRoom[column] = room;
    this.columnEnd += room;
  }

  private moveRow(row: number): void {
    const count = this.rowCount[row];
    const from = this.rowStart[row];
    const room = Math.max(8, 2 * count);
    this.rowIndex = grownInt32(this.rowIndex, this.rowEnd + room);
    this.rowIndex.copyWithin(this.rowEnd, from, from + count);
    this.rowStart[row] = this.rowEnd;
    this.rowRoom[row] = room;
    this.rowEnd += room;
  }
}

/** Members 0 … order − 1 in doubly linked lists by their count. */
export class CountLists {
  private readonly first: Int32Array;
  private readonly next: Int32Array;
  private readonly previous: Int32Array;

  constructor(order: number) {
    this.first = new Int32Array(order + 2).fill(-1);
    this.next = new Int32Array(order);
    this.previous = new Int32Array(order);
  }

  reset(): void {
    this.first.fill(-1);
  }

  firstWith(count: number): number {
    return this.first[count];
  }

  after(member: number): number {
    return this.next[member];
  }

  insert(member: number, count: number): void {
    const head = this.first[count];
    this.next[member] = head;
    this.previous[member] = -1;
    if (head >= 0) this.previous[head] = member;
    this.first[count] = member;
  }

  remove(member: number, count: number): void {
    const next = this.next[member];
    const previous = this.previous[member];
    if (previous >= 0) this.next[previous] = next;
    else this.first[count] = next;
    if (next >= 0) this.previous[next] = previous;
  }
}
