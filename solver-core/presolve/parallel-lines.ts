/**
 * Finds rows, or columns, whose entries are multiples of each other's.
 *
 * Each line gets a hash of which places it fills and a key, a weighted sum of its entries relative to the one in its
 * first place: parallel lines agree in the hash exactly and in the key up to rounding. Sorting brings them together;
 * what stands together is then compared entry by entry, so that neither hash nor key decides.
 * Source: the order of comparison after Tomlin and Welch (1986), "Finding duplicate rows in a linear programming
 * model", Operations Research Letters 5; hashing in place of their successive splitting.
 */
import { tolerances } from '../control/tolerances';
import type { ReadonlyFloat64Array, ReadonlyInt32Array } from '../numerics/typed-array-views';
import { listEnd } from './linked-entries';
import type { PresolveWorkspace } from './presolve-workspace';

/** Lines parallel to the leader: entries of `line` = ratio × entries of the leader. */
export interface ParallelGroup {
  readonly leader: number;
  readonly others: readonly { readonly line: number; readonly ratio: number }[];
}

/** What rows and columns have in common. */
interface Lines {
  readonly count: number;
  /** Length of the other kind. */
  readonly placeCount: number;
  readonly isActive: (line: number) => boolean;
  readonly length: ReadonlyInt32Array;
  readonly first: ReadonlyInt32Array;
  readonly next: ReadonlyInt32Array;
  readonly place: ReadonlyInt32Array;
  readonly value: ReadonlyFloat64Array;
}

/** Groups of parallel rows with at least two entries (one entry makes a bound). */
export function parallelRows(workspace: PresolveWorkspace): ParallelGroup[] {
  const lines: Lines = {
    count: workspace.rowCount,
    placeCount: workspace.columnCount,
    isActive: (row) => workspace.isRowActive(row),
    length: workspace.rowLength,
    first: workspace.firstInRow,
    next: workspace.nextInRow,
    place: workspace.entryColumn,
    value: workspace.entryValue,
  };
  return parallelLines(workspace, lines, 2);
}

/** Groups of parallel columns. */
export function parallelColumns(workspace: PresolveWorkspace): ParallelGroup[] {
  const lines: Lines = {
    count: workspace.columnCount,
    placeCount: workspace.rowCount,
    isActive: (column) => workspace.isColumnActive(column),
    length: workspace.columnLength,
    first: workspace.firstInColumn,
    next: workspace.nextInColumn,
    place: workspace.entryRow,
    value: workspace.entryValue,
  };
  return parallelLines(workspace, lines, 1);
}

function parallelLines(workspace: PresolveWorkspace, lines: Lines, leastLength: number): ParallelGroup[] {
  const { count, length } = lines;
  const marks = new LineMarks(count);
  // How many lines fall into each bucket of hashes: one that is alone there has no parallel.
  const buckets = new Uint32Array(bucketCountFor(count));
  const mask = buckets.length - 1;
  const compared: number[] = [];
  for (let line = 0; line < count; line++) {
    if (!lines.isActive(line) || length[line] < leastLength) continue;
    marks.setHash(lines, line);
    buckets[marks.hash[line] & mask]++;
    compared.push(line);
    workspace.work += length[line];
  }
  const candidates = compared.filter((line) => buckets[marks.hash[line] & mask] > 1);
  for (const line of candidates) {
    marks.setKey(lines, line);
    workspace.work += length[line];
  }
  // Line numbers last: the order, and with it which line leads, is the same everywhere.
  const { hash, key } = marks;
  candidates.sort((a, b) => hash[a] - hash[b] || key[a] - key[b] || a - b);
  return groupsOf(workspace, lines, candidates, marks);
}

/** What lines are brought together by. Length: the number of lines. */
class LineMarks {
  /** Of the places that a line fills, and how many. */
  readonly hash: Int32Array;
  /** Σ weight × entry, relative to the entry in the line's first place. */
  readonly key: Float64Array;
  /** The same of magnitudes: what the rounding of the key is relative to. */
  private readonly keySize: Float64Array;
  /** The entry in the line's first place. */
  private readonly reference: Float64Array;

  constructor(count: number) {
    this.hash = new Int32Array(count);
    this.key = new Float64Array(count);
    this.keySize = new Float64Array(count);
    this.reference = new Float64Array(count);
  }

  setHash({ length, first, next, place, value }: Lines, line: number): void {
    let sum = length[line];
    let firstPlace = Infinity;
    let reference = 1;
    for (let e = first[line]; e !== listEnd; e = next[e]) {
      sum = (sum + mixed(place[e])) | 0;
      if (place[e] < firstPlace) {
        firstPlace = place[e];
        reference = value[e];
      }
    }
    this.hash[line] = sum;
    this.reference[line] = reference;
  }

  setKey({ first, next, place, value }: Lines, line: number): void {
    let sum = 0;
    let size = 0;
    for (let e = first[line]; e !== listEnd; e = next[e]) {
      const term = value[e] * (1 + (mixed(place[e]) >>> 0) / 4294967296);
      sum += term;
      size += Math.abs(term);
    }
    this.key[line] = sum / this.reference[line];
    this.keySize[line] = size / Math.abs(this.reference[line]);
  }

  /** May these be parallel? */
  areClose(line: number, other: number): boolean {
    return (
      this.hash[line] === this.hash[other] &&
      Math.abs(this.key[line] - this.key[other]) <= tolerances.presolveParallelKey * this.keySize[line]
    );
  }
}

/** A power of two, a few times the number of lines. */
function bucketCountFor(lineCount: number): number {
  let buckets = 64;
  while (buckets < 4 * lineCount) buckets *= 2;
  return buckets;
}

function groupsOf(
  workspace: PresolveWorkspace,
  lines: Lines,
  candidates: readonly number[],
  marks: LineMarks,
): ParallelGroup[] {
  const scratchValue = new Float64Array(lines.placeCount);
  const groups: ParallelGroup[] = [];
  let at = 0;
  while (at < candidates.length) {
    const leader = candidates[at++];
    if (at === candidates.length || !marks.areClose(leader, candidates[at])) continue;
    const others: { line: number; ratio: number }[] = [];
    scatter(lines, leader, scratchValue);
    for (; at < candidates.length && marks.areClose(leader, candidates[at]); at++) {
      const ratio = parallelRatio(lines, leader, candidates[at], scratchValue);
      workspace.work += lines.length[leader];
      if (ratio === undefined) break;
      others.push({ line: candidates[at], ratio });
    }
    clear(lines, leader, scratchValue);
    if (others.length > 0) groups.push({ leader, others });
  }
  return groups;
}

/** Entries of `line` divided by the leader's, where that is one number. */
function parallelRatio(
  lines: Lines,
  leader: number,
  line: number,
  leaderValue: Float64Array,
): number | undefined {
  const { length, first, next, place, value } = lines;
  if (length[line] !== length[leader]) return undefined;
  // The quotient of the largest entries: their rounding counts least.
  let ratio = 0;
  let largest = 0;
  for (let e = first[line]; e !== listEnd; e = next[e]) {
    const other = leaderValue[place[e]];
    if (other === 0) return undefined;
    if (Math.abs(value[e]) <= largest) continue;
    largest = Math.abs(value[e]);
    ratio = value[e] / other;
  }
  for (let e = first[line]; e !== listEnd; e = next[e]) {
    const difference = Math.abs(value[e] - ratio * leaderValue[place[e]]);
    if (difference > tolerances.presolveParallel * Math.abs(value[e])) return undefined;
  }
  return ratio;
}

function scatter({ first, next, place, value }: Lines, line: number, into: Float64Array): void {
  for (let e = first[line]; e !== listEnd; e = next[e]) into[place[e]] = value[e];
}

function clear({ first, next, place }: Lines, line: number, scattered: Float64Array): void {
  for (let e = first[line]; e !== listEnd; e = next[e]) scattered[place[e]] = 0;
}

/** A place number with its bits spread: sums of few places then seldom agree by chance (Knuth 1998, §6.4). */
function mixed(place: number): number {
  const spread = Math.imul(place + 1, 0x9e3779b1);
  return Math.imul(spread ^ (spread >>> 15), 0x85ebca6b);
}
