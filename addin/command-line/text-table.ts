/**
 * Rows of text set in columns: texts to the left, numbers to the right.
 */
export interface TextColumn {
  readonly heading: string;
  readonly cells: readonly string[];
  readonly isNumber: boolean;
}

/** Widest a column of texts may become; longer ones are cut. */
const widestText = 44;

/** Lines without trailing blanks, the headings first, each row indented by two. */
export function tableLines(columns: readonly TextColumn[]): string[] {
  const rowCount = Math.max(0, ...columns.map((column) => column.cells.length));
  const set = columns.map((column) => {
    const cells = column.isNumber ? column.cells : column.cells.map(cut);
    const width = Math.max(lengthOf(column.heading), ...cells.map(lengthOf));
    const align = (text: string): string => {
      const blanks = ' '.repeat(width - lengthOf(text));
      return column.isNumber ? blanks + text : text + blanks;
    };
    return { heading: align(column.heading), cells: cells.map(align) };
  });
  const line = (texts: readonly string[]): string => `  ${texts.join('   ')}`.trimEnd();
  return [
    line(set.map(({ heading }) => heading)),
    ...Array.from({ length: rowCount }, (_, row) => line(set.map(({ cells }) => cells[row] ?? ''))),
  ];
}

function cut(text: string): string {
  const characters = [...text.replace(/\s+/g, ' ')];
  return characters.length > widestText
    ? `${characters.slice(0, widestText - 1).join('')}…`
    : characters.join('');
}

/** Characters as seen: an accent written apart takes no place of its own. */
function lengthOf(text: string): number {
  return [...text.replace(/\p{M}/gu, '')].length;
}
