/**
 * The part of a basis matrix that is still to be eliminated. Every entry stands twice, in its column (with its value)
 * and in its row, and each knows where the other stands: so that an entry can be found from either side and taken out
 * at once, and elimination may run along rows or along columns. Rows and columns are also kept in lists by their count
 * (Duff, Erisman and Reid 1986, §10.2).
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';

export class ActiveSubmatrix {
  // columns by position in the basis: row, value, and the place of the same entry in its row
  readonly columnStart: Int32Array;
  readonly columnCount: Int32Array;
  private readonly columnRoom: Int32Array;
  columnIndex = new Int32Array(256);
  columnValue = new Float64Array(256);
  private columnLink = new Int32Array(256);
  private columnEnd = 0;
  // rows: column, and the place of the same entry in its column
  readonly rowStart: Int32Array;
  readonly rowCount: Int32Array;
  private readonly rowRoom: Int32Array;
  rowIndex = new Int32Array(256);
  rowLink = new Int32Array(256);
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
    this.reserveColumns(room);
    this.columnStart[column] = this.columnEnd;
    this.columnCount[column] = 0;
    this.columnRoom[column] = room;
    this.columnEnd += room;
  }

  openRow(row: number, room: number): void {
    this.reserveRows(room);
    this.rowStart[row] = this.rowEnd;
    this.rowCount[row] = 0;
    this.rowRoom[row] = room;
    this.rowEnd += room;
  }

  addEntry(row: number, column: number, value: number): void {
    if (this.columnCount[column] === this.columnRoom[column]) this.moveColumn(column);
    if (this.rowCount[row] === this.rowRoom[row]) this.moveRow(row);
    const at = this.columnStart[column] + this.columnCount[column]++;
    const place = this.rowStart[row] + this.rowCount[row]++;
    this.columnIndex[at] = row;
    this.columnValue[at] = value;
    this.columnLink[at] = place;
    this.rowIndex[place] = column;
    this.rowLink[place] = at;
  }

  /** Takes out the entry that stands at `at` in a column; the last ones of its column and row move into the gaps. */
  removeEntry(column: number, at: number): void {
    this.removeFromRow(at);
    this.removeFromColumn(column, at);
  }

  /** Only from the column: for a row that is given up as a whole. */
  removeFromColumn(column: number, at: number): void {
    const { columnIndex, columnValue, columnLink } = this;
    const last = this.columnStart[column] + --this.columnCount[column];
    if (at === last) return;
    columnIndex[at] = columnIndex[last];
    columnValue[at] = columnValue[last];
    columnLink[at] = columnLink[last];
    this.rowLink[columnLink[at]] = at;
  }

  /** Only from the row of the entry at `at`: for a column that is given up as a whole. */
  removeFromRow(at: number): void {
    const { rowIndex, rowLink } = this;
    const place = this.columnLink[at];
    const row = this.columnIndex[at];
    const last = this.rowStart[row] + --this.rowCount[row];
    if (place === last) return;
    rowIndex[place] = rowIndex[last];
    rowLink[place] = rowLink[last];
    this.columnLink[rowLink[place]] = place;
  }

  private reserveColumns(additional: number): void {
    this.columnIndex = grownInt32(this.columnIndex, this.columnEnd + additional);
    this.columnValue = grownFloat64(this.columnValue, this.columnEnd + additional);
    this.columnLink = grownInt32(this.columnLink, this.columnEnd + additional);
  }

  private reserveRows(additional: number): void {
    this.rowIndex = grownInt32(this.rowIndex, this.rowEnd + additional);
    this.rowLink = grownInt32(this.rowLink, this.rowEnd + additional);
  }

  /** To the end of the storage, with twice the room. Old places are not used again before reset: they are few. */
  private moveColumn(column: number): void {
    const count = this.columnCount[column];
    const from = this.columnStart[column];
    const room = Math.max(8, 2 * count);
    this.reserveColumns(room);
    const to = this.columnEnd;
    for (let k = 0; k < count; k++) {
      this.columnIndex[to + k] = this.columnIndex[from + k];
      this.columnValue[to + k] = this.columnValue[from + k];
      this.columnLink[to + k] = this.columnLink[from + k];
      this.rowLink[this.columnLink[to + k]] = to + k;
    }
    this.columnStart[column] = to;
    this.columnRoom[column] = room;
    this.columnEnd += room;
  }

  private moveRow(row: number): void {
    const count = this.rowCount[row];
    const from = this.rowStart[row];
    const room = Math.max(8, 2 * count);
    this.reserveRows(room);
    const to = this.rowEnd;
    for (let k = 0; k < count; k++) {
      this.rowIndex[to + k] = this.rowIndex[from + k];
      this.rowLink[to + k] = this.rowLink[from + k];
      this.columnLink[this.rowLink[to + k]] = to + k;
    }
    this.rowStart[row] = to;
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
