/**
 * What a planner must hear about the writing of results, as data. The sentences stand in
 * addin/wording/report-wording.ts.
 */
import type { NotRecalculatedReason } from '../calculation/recalculate';
import type { CellAddress } from '../sheet/cell-address';

/** Facts of each notice: numbers, and cells and ranges as text. */
export interface ResultNoticeFacts {
  /** A result cell holds something else than what was last written: it is the planner's and was left alone. */
  'kept-cell': { readonly name: string; readonly value: number };
  /** The block grew, shrank or lost its place: these columns stand elsewhere now. */
  'results-moved': { readonly names: readonly string[]; readonly ranges: readonly string[] };
  /** Not all cells at the old place are known to be ours: those were left alone, and results placed anew. */
  'results-left': { readonly names: readonly string[]; readonly ranges: readonly string[] };
  /** No free columns near the block (or a grid): its results stand in a table on a sheet of their own. */
  'results-on-own-sheet': { readonly names: readonly string[]; readonly sheet: string };
  /** A formula depends on the plan and could not be recalculated: it has no stored value until the file is opened. */
  'not-recalculated': { readonly reason: NotRecalculatedReason };
  /** The workbook's own arithmetic gives another value than the model. */
  'workbook-disagrees': { readonly what: string; readonly workbook: number | string; readonly model: number };
}

export type ResultNoticeCode = keyof ResultNoticeFacts;

export type ResultNotice = {
  readonly [Code in ResultNoticeCode]: {
    readonly code: Code;
    readonly severity: 'warning';
    readonly cell: CellAddress | null;
    readonly facts: ResultNoticeFacts[Code];
  };
}[ResultNoticeCode];

export function resultNotice<Code extends ResultNoticeCode>(
  code: Code,
  cell: CellAddress | null,
  facts: ResultNoticeFacts[Code],
): ResultNotice {
  return { code, severity: 'warning', cell, facts } as unknown as ResultNotice;
}
