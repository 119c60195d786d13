/**
 * What a write changes, with what was there before: enough to finish it, or to take it back, at any later time.
 */
import type { CellAddress } from '../../domain/sheet/cell-address';
import type { CellRange } from '../../domain/sheet/cell-range';
import type { CellValue } from '../../domain/sheet/cell-value';
import { CellMap } from './cell-map';
import { rangesOfAddress } from './excel-ranges';
import { rectanglesOf } from './excel-rectangles';

/** What a cell holds: a formula with the value beside it, or a value. */
export interface CellContent {
  readonly value: CellValue;
  /** Without `=`. */
  readonly formula: string | undefined;
}

export interface CellChange {
  readonly cell: CellAddress;
  readonly before: CellContent;
  readonly after: CellContent;
  readonly formatBefore: string;
  readonly formatAfter: string;
  /** Only headings break their text; undefined where that is left as it is. */
  readonly wrapsBefore: boolean | undefined;
  readonly wrapsAfter: boolean | undefined;
}

export interface WidthChange {
  readonly sheet: string;
  readonly column: number;
  /** Points. */
  readonly before: number;
  readonly after: number;
}

export interface NameChange {
  readonly name: string;
  /** null: of the whole workbook. */
  readonly scope: string | null;
  /** Without `=`; null where there is no such name. */
  readonly before: string | null;
  readonly after: string | null;
  readonly wasVisible: boolean;
}

/** The record's XML; null where there is none. */
export interface RecordChange {
  readonly before: string | null;
  readonly after: string;
}

export interface Journal {
  readonly cells: readonly CellChange[];
  readonly widths: readonly WidthChange[];
  readonly names: readonly NameChange[];
  readonly record: RecordChange | undefined;
  readonly addedSheets: readonly string[];
  /** The planner has Excel calculate by hand: then it is asked to. */
  readonly calculatesByHand: boolean;
}

/** Which way a journal is carried out. */
export type Direction = 'forward' | 'back';

/** Numbers that Excel stores and gives back differ by no more than this of their size. */
const sameNumber = 2 ** -50;

/** Whether a cell holds this. A formula is told by its being one, since Excel may spell it in its own way. */
export function holds(present: CellContent, wanted: CellContent): boolean {
  if (wanted.formula !== undefined || present.formula !== undefined) {
    return wanted.formula !== undefined && present.formula !== undefined;
  }
  const [a, b] = [present.value, wanted.value];
  if (typeof a === 'number' && typeof b === 'number') {
    return Math.abs(a - b) <= sameNumber * Math.abs(b);
  }
  return (a === '' ? null : a) === (b === '' ? null : b);
}

/**
 * Where a cell stands between what it held and what it is to hold; `other` is what somebody else has put there. A
 * cell that is to hold what it held stands at both ends.
 */
export function standingOf(change: CellChange, present: CellContent): Direction | 'both' | 'other' {
  const isBefore = holds(present, change.before);
  const isAfter = holds(present, change.after);
  if (isBefore && isAfter) return 'both';
  return isBefore ? 'back' : isAfter ? 'forward' : 'other';
}

/**
 * The cells that may be between the two ends of a journal, as rectangles. A journal that changes names alone is told
 * by what these refer to.
 */
export function rangesOfJournal({ cells, names }: Journal): CellRange[] {
  const changed = cells.filter(({ before, after }) => !holds(before, after));
  if (cells.length > 0) {
    return rectanglesOf((changed.length > 0 ? changed : cells).map(({ cell }) => cell));
  }
  return names.flatMap(({ scope, before, after }) => {
    const formula = after ?? before ?? '';
    const sheet = /^(?:'((?:[^']|'')+)'|([^'!]+))!/.exec(formula);
    return rangesOfAddress((sheet?.[1] ?? sheet?.[2] ?? scope ?? '').replaceAll("''", "'"), formula);
  });
}

export function changesByCell(changes: readonly CellChange[]): CellMap<CellChange> {
  const byCell = new CellMap<CellChange>();
  changes.forEach((change) => byCell.set(change.cell, change));
  return byCell;
}
