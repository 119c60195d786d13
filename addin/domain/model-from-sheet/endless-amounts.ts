/**
 * Amounts so large that they can only mean "none": some planners type 1E+30 or 9.99E+307 where they have no limit.
 */

/** From this size on, a bound or right side means none; the same size as in MPS files. */
const endlessAmount = 1e30;

/** Infinity for an upper limit that stands for none, otherwise the limit. */
export function endlessAbove(upper: number): number {
  return upper >= endlessAmount ? Infinity : upper;
}

/** −Infinity for a lower limit that stands for none, otherwise the limit. */
export function endlessBelow(lower: number): number {
  return lower <= -endlessAmount ? -Infinity : lower;
}
