/**
 * The few texts that results bring onto a sheet. They are handed in, since every sentence and gloss has one home
 * (addin/wording).
 */
import type { ResultRole } from './result-roles';

export interface ResultTexts {
  /** Heading of a result column: the trade's word, and a gloss of at most six words for the second line. */
  readonly headings: Readonly<Record<ResultRole, { readonly title: string; readonly gloss: string }>>;
  /** Name wanted for a sheet of results; made fit for a sheet and unique by whoever places it. */
  resultsSheetName(planName: string): string;
  /** Headings of the two columns that stand before the results in a table on a sheet of its own. */
  readonly table: {
    readonly decision: string;
    readonly decisionCell: string;
    readonly constraintRow: string;
    readonly rightSide: string;
  };
}

/** The heading as it stands in its cell: the gloss on a line of its own. */
export function headingText(texts: ResultTexts, role: ResultRole): string {
  const { title, gloss } = texts.headings[role];
  return `${title}\n${gloss}`;
}
