/**
 * Entries of rows and columns as they stood when a reduction was applied, for its undo: one growing store, of which
 * each record holds spans. Appended to while presolve runs, read while postsolve does.
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import { listEnd } from './linked-entries';
import type { PresolveWorkspace } from './presolve-workspace';

/** Places start … end − 1 of the store. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

export class SavedEntries {
  private indices = new Int32Array(256);
  private values = new Float64Array(256);
  private count = 0;

  /** Row (in a column's span) or column (in a row's span) of each place. */
  index(place: number): number {
    return this.indices[place];
  }

  value(place: number): number {
    return this.values[place];
  }

  /** The entries of a row as (column, value), but for one column. */
  saveRow(workspace: PresolveWorkspace, row: number, exceptColumn?: number): Span {
    const { nextInRow, entryColumn, entryValue } = workspace;
    const start = this.count;
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = nextInRow[e]) {
      if (entryColumn[e] !== exceptColumn) this.append(entryColumn[e], entryValue[e]);
    }
    workspace.work += this.count - start;
    return { start, end: this.count };
  }

  /** The entries of a column as (row, value), but for one row. */
  saveColumn(workspace: PresolveWorkspace, column: number, exceptRow?: number): Span {
    const { nextInColumn, entryRow, entryValue } = workspace;
    const start = this.count;
    for (let e = workspace.firstInColumn[column]; e !== listEnd; e = nextInColumn[e]) {
      if (entryRow[e] !== exceptRow) this.append(entryRow[e], entryValue[e]);
    }
    workspace.work += this.count - start;
    return { start, end: this.count };
  }

  private append(index: number, value: number): void {
    if (this.count === this.indices.length) {
      this.indices = grownInt32(this.indices, this.count + 1);
      this.values = grownFloat64(this.values, this.indices.length);
    }
    this.indices[this.count] = index;
    this.values[this.count++] = value;
  }
}
