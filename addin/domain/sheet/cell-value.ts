/**
 * What a cell can hold: a number, a text, TRUE or FALSE, an error value, or nothing.
 */

/** An error value of the worksheet, such as #DIV/0!. One object per code, so that === compares codes. */
export class CellError {
  private static readonly known = new Map<string, CellError>();

  private constructor(
    /** As written in a cell: `#N/A`, `#REF!`, … */
    readonly code: string,
  ) {}

  static of(code: string): CellError {
    let error = CellError.known.get(code);
    if (error === undefined) {
      error = new CellError(code);
      CellError.known.set(code, error);
    }
    return error;
  }

  toString(): string {
    return this.code;
  }
}

/** null is a blank cell. */
export type CellValue = number | string | boolean | CellError | null;
