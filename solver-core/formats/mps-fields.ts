/**
 * Cuts the data lines of an MPS text into their fields, in the free form (fields parted by blanks) or in the fixed
 * form (fields in set columns, so that names may hold blanks).
 *
 * A data line has up to six fields: a type, up to three names and two numbers:
 *
 *     field      1      2       3       4        5       6
 *     fixed     2–3   5–12   15–22   25–36   40–47   50–61      (columns counted from 1)
 *
 * Which fields a line must have depends on its section; where the set name of RHS, RANGES or BOUNDS is left out, the
 * free form tells by the count. The cutting works by index on the one text: no line is copied, no pattern is run.
 */

/** One data line, as positions in the text. */
export interface DataLine {
  /** Counted from 1. */
  readonly number: number;
  /** First character of the line, and one past its last without the line end. */
  readonly start: number;
  readonly end: number;
}

/** Most fields that a line of any section can have in the free form; more are an error. */
const mostFields = 6;

/** The fields of one line after another; the same object is used for all of them. */
export class FreeFields {
  /** How many fields the line has; one more than is ever allowed where it has more. */
  count = 0;
  private readonly starts = new Int32Array(mostFields + 1);
  private readonly ends = new Int32Array(mostFields + 1);

  constructor(private readonly text: string) {}

  // hot: once a line of the file
  cut(line: DataLine): void {
    const { text, starts, ends } = this;
    let at = line.start;
    let count = 0;
    while (count <= mostFields) {
      while (at < line.end && text.charCodeAt(at) <= blank) at++;
      if (at >= line.end) break;
      starts[count] = at;
      while (at < line.end && text.charCodeAt(at) > blank) at++;
      ends[count++] = at;
    }
    this.count = count;
  }

  field(index: number): string {
    return this.text.slice(this.starts[index], this.ends[index]);
  }
}

/** Where the fixed fields stand, counted from 0: from one field to the next, so that none is cut in two. */
const fixedStarts = [1, 4, 14, 24, 39, 49] as const;

/** Fields 1 to 6 of a line in the fixed form, without the blanks around them; '' for one that is empty. */
export function cutFixedFields(text: string, line: DataLine): readonly string[] {
  return fixedStarts.map((start, field) => {
    const end = field + 1 < fixedStarts.length ? fixedStarts[field + 1] : Infinity;
    return text.slice(Math.min(line.start + start, line.end), Math.min(line.start + end, line.end)).trim();
  });
}

/** Blanks, tabs and every other control character part fields. */
const blank = 32;

/**
 * The number that a field states, or undefined: decimal, with exponent marks e, E, d or D, or an infinity in words.
 */
export function parseMpsNumber(field: string): number | undefined {
  const first = field.charCodeAt(0);
  const second = field.charCodeAt(1);
  // Only plain decimals: Number would take '', '0x1F' and '0b1' too. A sign or point may stand before the digits.
  const isDecimal = (first >= 48 && first <= 57) || first === 46 || first === 45 || first === 43;
  if (isDecimal && !(second > 57 && second !== 69 && second !== 101 && second !== 68 && second !== 100)) {
    const value = Number(field);
    if (!Number.isNaN(value)) {
      return value;
    }
    const withFortranExponent = /^([+-]?(?:\d+\.?\d*|\.\d+))[dD]([+-]?\d+)$/.exec(field);
    return withFortranExponent === null
      ? undefined
      : Number(`${withFortranExponent[1]}e${withFortranExponent[2]}`);
  }
  const infinity = /^([+-]?)inf(?:inity)?$/i.exec(field);
  return infinity === null ? undefined : infinity[1] === '-' ? -Infinity : Infinity;
}
