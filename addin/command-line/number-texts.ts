/**
 * Numbers as a planner reads them in a report: grouped, with as many decimals as a column needs and no more.
 */

/** Digits that a reader can use; --json has them all. */
const shownDigits = 7;
const mostDecimals = 4;
/** Beyond these a number is easier to read with an exponent. */
const smallestPlain = 1e-4;
const largestPlain = 1e12;

/** `1,234.5`, with at most seven digits that matter unless the number before the point has more. */
export function numberText(value: number | null): string {
  if (value === null) {
    return '–';
  }
  if (!Number.isFinite(value)) {
    return value > 0 ? 'none above' : value < 0 ? 'none below' : 'unknown';
  }
  if (needsExponent(value)) {
    return value.toExponential(shownDigits - 3);
  }
  const whole = Math.trunc(Math.abs(value)).toString().length;
  return new Intl.NumberFormat('en-US', { maximumSignificantDigits: Math.max(shownDigits, whole) }).format(
    value === 0 ? 0 : value,
  );
}

/** A column of numbers with the same number of decimals, so that the points stand below each other. */
export function columnTexts(values: readonly (number | null)[]): string[] {
  const decimals = Math.max(0, ...values.map(decimalsOf));
  const format = new Intl.NumberFormat('en-US', {
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  });
  return values.map((value) =>
    value === null || !Number.isFinite(value) || needsExponent(value)
      ? numberText(value)
      : format.format(value === 0 ? 0 : value),
  );
}

/** `0.04 s`, `12.3 s`, `2 min 5 s`. */
export function secondsText(seconds: number): string {
  if (seconds >= 100) {
    const whole = Math.round(seconds);
    return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  }
  return `${seconds.toFixed(seconds < 10 ? 2 : 1)} s`;
}

/** `1 decision`, `12 decisions`. */
export function countedNoun(count: number, noun: string): string {
  return `${count.toLocaleString('en-US')} ${noun}${count === 1 ? '' : 's'}`;
}

function needsExponent(value: number): boolean {
  const size = Math.abs(value);
  return size !== 0 && (size < smallestPlain || size >= largestPlain);
}

/** Decimals that show the number to seven digits, at most four. */
function decimalsOf(value: number | null): number {
  if (value === null || !Number.isFinite(value) || needsExponent(value)) {
    return 0;
  }
  const shown = Number(value.toPrecision(shownDigits));
  for (let decimals = 0; decimals < mostDecimals; decimals++) {
    if (Number(shown.toFixed(decimals)) === shown) {
      return decimals;
    }
  }
  return mostDecimals;
}
