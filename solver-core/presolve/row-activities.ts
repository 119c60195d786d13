/**
 * Owner of the least and greatest activities of the rows under the column bounds: the finite parts, and how many terms
 * are infinite, so that what a row implies for one of its columns can be told without the column's own term.
 *
 * A row is summed afresh when it is first asked for after a change: sums that are kept up to date by differences drift.
 */
import { tolerances } from '../control/tolerances';
import { feasibilitySlack } from './feasibility-slack';
import { listEnd } from './linked-entries';
import type { PresolveWorkspace } from './presolve-workspace';

export class RowActivities {
  // Length m each, valid where isCurrent is 1.
  private readonly leastFinite: Float64Array;
  private readonly leastInfinite: Int32Array;
  private readonly greatestFinite: Float64Array;
  private readonly greatestInfinite: Int32Array;
  /** Largest finite term, or number that entered the row's bounds by substitution. */
  private readonly largestTerm: Float64Array;
  private readonly largestEntry: Float64Array;
  private readonly isCurrent: Uint8Array;

  constructor(private readonly workspace: PresolveWorkspace) {
    const { rowCount } = workspace;
    this.leastFinite = new Float64Array(rowCount);
    this.leastInfinite = new Int32Array(rowCount);
    this.greatestFinite = new Float64Array(rowCount);
    this.greatestInfinite = new Int32Array(rowCount);
    this.largestTerm = new Float64Array(rowCount);
    this.largestEntry = new Float64Array(rowCount);
    this.isCurrent = new Uint8Array(rowCount);
  }

  /** The row's entries, the bounds of its columns or its scale changed. */
  markStale(row: number): void {
    this.isCurrent[row] = 0;
  }

  least(row: number): number {
    this.refresh(row);
    return this.leastInfinite[row] > 0 ? -Infinity : this.leastFinite[row];
  }

  greatest(row: number): number {
    this.refresh(row);
    return this.greatestInfinite[row] > 0 ? Infinity : this.greatestFinite[row];
  }

  /** The least activity of the other columns, given one term's own least value. */
  leastWithout(row: number, term: number): number {
    this.refresh(row);
    const isInfinite = this.leastInfinite[row] > (term === -Infinity ? 1 : 0);
    if (isInfinite) return -Infinity;
    return term === -Infinity ? this.leastFinite[row] : this.leastFinite[row] - term;
  }

  /** The greatest activity of the other columns, given one term's own greatest value. */
  greatestWithout(row: number, term: number): number {
    this.refresh(row);
    const isInfinite = this.greatestInfinite[row] > (term === Infinity ? 1 : 0);
    if (isInfinite) return Infinity;
    return term === Infinity ? this.greatestFinite[row] : this.greatestFinite[row] - term;
  }

  /** May this entry of the row be the pivot of an elimination? */
  isPivot(row: number, entry: number): boolean {
    this.refresh(row);
    return Math.abs(entry) >= tolerances.presolvePivot * this.largestEntry[row];
  }

  /** By how much the row's activity may pass a bound and still meet it. */
  slack(row: number): number {
    this.refresh(row);
    return feasibilitySlack(this.largestTerm[row]);
  }

  private refresh(row: number): void {
    if (this.isCurrent[row] === 1) return;
    const { nextInRow, entryColumn, entryValue, columnLower, columnUpper } = this.workspace;
    let least = 0;
    let leastInfinite = 0;
    let greatest = 0;
    let greatestInfinite = 0;
    let largestTerm = this.workspace.rowScale[row];
    let largestEntry = 0;
    for (let e = this.workspace.firstInRow[row]; e !== listEnd; e = nextInRow[e]) {
      const value = entryValue[e];
      const column = entryColumn[e];
      const size = Math.abs(value);
      if (size > largestEntry) largestEntry = size;
      const low = value * (value > 0 ? columnLower[column] : columnUpper[column]);
      const high = value * (value > 0 ? columnUpper[column] : columnLower[column]);
      if (low === -Infinity) leastInfinite++;
      else {
        least += low;
        if (Math.abs(low) > largestTerm) largestTerm = Math.abs(low);
      }
      if (high === Infinity) greatestInfinite++;
      else {
        greatest += high;
        if (Math.abs(high) > largestTerm) largestTerm = Math.abs(high);
      }
    }
    this.leastFinite[row] = least;
    this.leastInfinite[row] = leastInfinite;
    this.greatestFinite[row] = greatest;
    this.greatestInfinite[row] = greatestInfinite;
    this.largestTerm[row] = largestTerm;
    this.largestEntry[row] = largestEntry;
    this.isCurrent[row] = 1;
    this.workspace.work += this.workspace.rowLength[row];
  }
}
