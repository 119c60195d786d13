/**
 * Cuts reads and writes into messages that Excel on the web takes: at most 5 MB each way, so 4 MB are aimed at.
 */
import { cellCountOf, columnCountOf, rowCountOf, type CellRange } from '../../domain/sheet/cell-range';

/** Bytes aimed at in one message. What cannot be foreseen to the byte has a fourth of it to spare. */
export const messageTarget = 4_000_000;

/** Bytes of one cell, with value, formula, kind and format, as long as none has been read yet. */
export const firstGuess = 60;
/** Cells looked at to learn how many bytes they take. */
const sampleSize = 2_000;

/** What comes back for a part of a sheet: one matrix a property, rows first. */
export type ReadMatrices = readonly (readonly (readonly unknown[])[])[];

/**
 * The parts of a list of ranges in the order given, each list of parts small enough for one message. It learns from
 * what has come back how large the next can be.
 */
export class RangeQueue {
  private readonly waiting: CellRange[];

  /** @param bytesPerCell as far as it is known beforehand */
  constructor(
    ranges: readonly CellRange[],
    private bytesPerCell = firstGuess,
  ) {
    this.waiting = [...ranges];
  }

  get isEmpty(): boolean {
    return this.waiting.length === 0;
  }

  /**
   * The parts for the next message, taken off the queue.
   * @param bytes what the message has room for; a cell is always taken, unless there is no room at all
   */
  take(bytes = messageTarget): CellRange[] {
    if (bytes <= 0) return [];
    const taken: CellRange[] = [];
    let room = Math.max(1, Math.floor(bytes / this.bytesPerCell));
    while (room > 0 && this.waiting.length > 0) {
      // Rather another message than a row in pieces.
      if (taken.length > 0 && columnCountOf(this.waiting[0]) > room) break;
      const [first, ...rest] = splitRange(this.waiting[0], room);
      taken.push(first);
      room -= cellCountOf(first);
      this.waiting.splice(0, 1, ...rest);
    }
    return taken;
  }

  /** Says what a message came to. */
  learn(read: readonly ReadMatrices[]): void {
    let cells = 0;
    let bytes = 0;
    for (const matrices of read) {
      const rowCount = matrices[0].length;
      const cellCount = rowCount * (matrices[0][0]?.length ?? 0);
      const step = Math.max(1, Math.floor(cellCount / sampleSize / Math.max(1, matrices[0][0]?.length ?? 1)));
      let sampledRows = 0;
      let sampledBytes = 0;
      for (let row = 0; row < rowCount; row += step, sampledRows++) {
        for (const matrix of matrices) sampledBytes += JSON.stringify(matrix[row]).length + 1;
      }
      cells += cellCount;
      bytes += (sampledBytes / Math.max(1, sampledRows)) * rowCount;
    }
    if (cells > 0) this.bytesPerCell = Math.max(1, bytes / cells);
  }

  /** The last message was too large: its parts come again, in smaller pieces. */
  putBack(taken: readonly CellRange[]): void {
    this.waiting.unshift(...taken);
    const cells = taken.reduce((sum, range) => sum + cellCountOf(range), 0);
    this.bytesPerCell = Math.max(this.bytesPerCell, messageTarget / Math.max(1, cells)) * 2;
  }
}

/**
 * The range in pieces, of which the first holds no more cells than wanted, but one at least: whole rows as long as
 * one fits, otherwise a part of the first row.
 */
export function splitRange(range: CellRange, wanted: number): [first: CellRange, ...rest: CellRange[]] {
  const room = Math.max(1, wanted);
  if (cellCountOf(range) <= room) {
    return [range];
  }
  const rows = Math.floor(room / columnCountOf(range));
  if (rows >= 1) {
    const bottom = range.top + rows - 1;
    return [
      { ...range, bottom },
      { ...range, top: bottom + 1 },
    ];
  }
  if (rowCountOf(range) > 1) {
    const firstRow = { ...range, bottom: range.top };
    return [...splitRange(firstRow, room), { ...range, top: range.top + 1 }];
  }
  const right = range.left + room - 1;
  return [
    { ...range, right },
    { ...range, left: right + 1 },
  ];
}
