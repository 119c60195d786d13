/**
 * A write that broke off and could not be taken back: which cells are between, and the two ways out of it. There is
 * at most one such write; nothing else is written before it has ended.
 */
import type { CellRange } from '../domain/sheet/cell-range';

export interface WriteJournal {
  /** The cells that may hold either what they held or what was to be written; none where every write has ended. */
  unfinished(): readonly CellRange[];
  /** Writes what is missing. @throws WorkbookError; the journal is kept then */
  finish(): Promise<void>;
  /** Restores what was there before the write. @throws WorkbookError; the journal is kept then */
  putBack(): Promise<void>;
}
