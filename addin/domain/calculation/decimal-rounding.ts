/**
 * Rounding in decimal digits, as worksheets do: 2.675 is taken as written and not as the binary number just below it.
 */

/** Digits that a worksheet shows, and by which it rounds and compares: the last bits of a number are not looked at. */
export const significantDigits = 15;

/** number × 10^places, exact in the decimal digits shown. */
function shiftPoint(number: number, places: number): number {
  const [mantissa, exponent] = number.toExponential().split('e');
  return Number(`${mantissa}e${Number(exponent) + places}`);
}

/** Rounds the size of a number to so many decimal places, the sign aside. */
export function roundSize(number: number, places: number, round: (size: number) => number): number {
  if (number === 0 || !Number.isFinite(number)) {
    return number;
  }
  // Beyond what a double tells apart there is nothing to round.
  const limited = Math.max(-308, Math.min(308, places));
  const size = Number(Math.abs(number).toPrecision(significantDigits));
  const shifted = Number(shiftPoint(size, limited).toPrecision(significantDigits));
  if (!Number.isFinite(shifted)) {
    return number;
  }
  return Math.sign(number) * shiftPoint(round(shifted), -limited);
}

/** 2.5 becomes 3 and −2.5 becomes −3. */
export function roundHalfAway(number: number, places: number): number {
  return roundSize(number, places, (size) => Math.floor(size + 0.5));
}
