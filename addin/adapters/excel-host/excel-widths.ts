/**
 * Column widths: planned in characters of the default font, as files count them, and set in points, as Excel's
 * add-ins do.
 */

/** Pixels of a figure in the default font (Calibri 11, and near it Aptos Narrow 11). */
const figurePixels = 7;
/** Pixels of margin and gridline in each column. */
const marginPixels = 5;
const pointsPerPixel = 0.75;

/** ECMA-376 Part 1, §18.3.1.13 (width): characters to pixels, for 96 pixels an inch. */
export function pointsOfCharacters(characters: number): number {
  return (Math.round(characters * figurePixels) + marginPixels) * pointsPerPixel;
}
