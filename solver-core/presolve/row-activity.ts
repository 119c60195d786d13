/**
 * Least and greatest activity of one row under bounds on its columns: the finite parts, and how many terms are
 * infinite, so that the bound that a row implies for one of its columns can be told without the column's own term.
 */
import { tolerances } from '../control/tolerances';
import { feasibilitySlack } from './feasibility-slack';
import { listEnd, type PresolveWorkspace } from './presolve-workspace';

export class RowActivity {
  private leastFinite = 0;
  private leastInfinite = 0;
  private greatestFinite = 0;
  private greatestInfinite = 0;
  private largestTerm = 0;
  private largestEntry = 0;

  compute(workspace: PresolveWorkspace, row: number): void {
    const { nextInRow, entryColumn, entryValue, columnLower, columnUpper } = workspace;
    let least = 0;
    let leastInfinite = 0;
    let greatest = 0;
    let greatestInfinite = 0;
    let largest = workspace.rowScale[row];
    let largestEntry = 0;
    for (let e = workspace.firstInRow[row]; e !== listEnd; e = nextInRow[e]) {
      const value = entryValue[e];
      const column = entryColumn[e];
      if (Math.abs(value) > largestEntry) largestEntry = Math.abs(value);
      const low = value * (value > 0 ? columnLower[column] : columnUpper[column]);
      const high = value * (value > 0 ? columnUpper[column] : columnLower[column]);
      if (low === -Infinity) leastInfinite++;
      else {
        least += low;
        if (Math.abs(low) > largest) largest = Math.abs(low);
      }
      if (high === Infinity) greatestInfinite++;
      else {
        greatest += high;
        if (Math.abs(high) > largest) largest = Math.abs(high);
      }
    }
    this.leastFinite = least;
    this.leastInfinite = leastInfinite;
    this.greatestFinite = greatest;
    this.greatestInfinite = greatestInfinite;
    this.largestTerm = largest;
    this.largestEntry = largestEntry;
  }

  get least(): number {
    return this.leastInfinite > 0 ? -Infinity : this.leastFinite;
  }

  get greatest(): number {
    return this.greatestInfinite > 0 ? Infinity : this.greatestFinite;
  }

  /** The least activity of the other columns, given one term's own least value. */
  leastWithout(term: number): number {
    if (term === -Infinity) return this.leastInfinite > 1 ? -Infinity : this.leastFinite;
    return this.leastInfinite > 0 ? -Infinity : this.leastFinite - term;
  }

  /** The greatest activity of the other columns, given one term's own greatest value. */
  greatestWithout(term: number): number {
    if (term === Infinity) return this.greatestInfinite > 1 ? Infinity : this.greatestFinite;
    return this.greatestInfinite > 0 ? Infinity : this.greatestFinite - term;
  }

  /** May this entry of the row be the pivot of an elimination? */
  isPivot(entry: number): boolean {
    return Math.abs(entry) >= tolerances.presolvePivot * this.largestEntry;
  }

  /** By how much an activity may pass a bound and still meet it. */
  get tolerance(): number {
    return feasibilitySlack(this.largestTerm);
  }
}
