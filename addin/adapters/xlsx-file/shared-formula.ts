/**
 * A formula that several cells share (ECMA-376 Part 1, §18.3.1.40): written once at its first cell, and moved to
 * another cell only when somebody asks for it there. Most cells of a large workbook are never asked.
 */
import { tokenize, translateTokensToA1, translateTokensToR1C1, type Token } from '@borgar/fx/xlsx';
import {
  cellText,
  columnLetters,
  maximumColumnCount,
  maximumRowCount,
} from '../../domain/sheet/cell-address';

export class SharedFormula {
  /** The formula's tokens with its references relative, made at the first question. */
  private relativeTokens: Token[] | undefined;

  constructor(
    private readonly formula: string,
    private readonly row: number,
    private readonly column: number,
  ) {}

  /** The formula as it stands in another of its cells. References past an edge of the sheet go round it. */
  at(row: number, column: number): string {
    this.relativeTokens ??= translateTokensToR1C1(
      tokenize(`=${this.formula}`, { mergeRefs: true }).map(withWholeLines),
      cellText(this.row, this.column),
    );
    let moved = '';
    for (const token of translateTokensToA1(this.relativeTokens, cellText(row, column))) {
      moved += token.value;
    }
    // The first token is the sign of equality.
    return moved.slice(1);
  }
}

const wholeColumns = new RegExp(`^(.*!)?(\\$?[A-Z]{1,3})\\$?1:(\\$?[A-Z]{1,3})\\$?${maximumRowCount}$`);
const lastColumn = columnLetters(maximumColumnCount - 1);
const wholeRows = new RegExp(`^(.*!)?\\$?A(\\$?[0-9]+):\\$?${lastColumn}(\\$?[0-9]+)$`);

/** `B1:B1048576` means the column wherever it is moved; taken as two cells, it would shrink on the way. */
function withWholeLines(token: Token): Token {
  if (token.type !== 'range') return token;
  const value = token.value
    .replace(
      wholeColumns,
      (_, sheet: string | undefined, from: string, to: string) => `${sheet ?? ''}${from}:${to}`,
    )
    .replace(
      wholeRows,
      (_, sheet: string | undefined, from: string, to: string) => `${sheet ?? ''}${from}:${to}`,
    );
  return value === token.value ? token : { ...token, value };
}
