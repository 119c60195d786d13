/**
 * One cell of a workbook, and its A1 text both ways. Rows and columns count from 0.
 */

export interface CellAddress {
  /** Name of the sheet, as shown on its tab. */
  readonly sheet: string;
  readonly row: number;
  readonly column: number;
}

export const maximumRowCount = 1_048_576;
export const maximumColumnCount = 16_384;

/** `A` for 0, `Z` for 25, `AA` for 26. */
export function columnLetters(column: number): string {
  let letters = '';
  for (let rest = column + 1; rest > 0; rest = Math.floor((rest - 1) / 26)) {
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  }
  return letters;
}

/** 0 for `A`; letters of either case. */
export function columnOfLetters(letters: string): number {
  let column = 0;
  for (const letter of letters.toUpperCase()) {
    column = column * 26 + letter.charCodeAt(0) - 64;
  }
  return column - 1;
}

/** `B7`, without the sheet. */
export function cellText(row: number, column: number): string {
  return columnLetters(column) + String(row + 1);
}

/** The sheet's name as it stands in a formula: quoted where a formula needs quotes. */
export function quotedSheetName(sheet: string): string {
  const isPlain = /^[\p{L}_][\p{L}\p{N}_.]*$/u.test(sheet);
  const looksLikeReference = /^[A-Za-z]{1,3}\d+$/.test(sheet) || /^[Rr]\d*([Cc]\d*)?$|^[Cc]\d*$/.test(sheet);
  const isBoolean = /^(true|false)$/i.test(sheet);
  return isPlain && !looksLikeReference && !isBoolean ? sheet : `'${sheet.replaceAll("'", "''")}'`;
}

/** `Plan!B7`, `'Cost data'!B7`: the sheet quoted as in a formula, no `$`. */
export function formatCellAddress(address: CellAddress): string {
  return `${quotedSheetName(address.sheet)}!${cellText(address.row, address.column)}`;
}

/** A key for maps: unique for a sheet's cell. Within one sheet only. */
export function cellKey(row: number, column: number): number {
  return row * maximumColumnCount + column;
}
