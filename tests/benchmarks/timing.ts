/**
 * Milliseconds of a piece of work, and what is made of many of them.
 */
export async function timeOf<T>(work: () => T | Promise<T>): Promise<{ milliseconds: number; value: T }> {
  const start = performance.now();
  const value = await work();
  return { milliseconds: performance.now() - start, value };
}

/** The value below which this share of the values lies: 0 the least, 0.5 the (lower) middle one. */
export function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) * share)];
}

export function median(values: readonly number[]): number {
  return quantile(values, 0.5);
}

export function least(values: readonly number[]): number {
  return quantile(values, 0);
}

export function geometricMean(values: readonly number[]): number {
  return Math.exp(values.reduce((sum, value) => sum + Math.log(value), 0) / values.length);
}

/** Milliseconds for a table: three figures. */
export function inMilliseconds(value: number): string {
  return value >= 100 ? value.toFixed(0) : value >= 10 ? value.toFixed(1) : value.toFixed(2);
}

/** A table in Markdown; the first column to the left, the others to the right. */
export function table(headings: readonly string[], rows: readonly (readonly string[])[]): string {
  const lines = [headings, headings.map((_, column) => (column === 0 ? '---' : '---:')), ...rows];
  return lines.map((cells) => `| ${cells.join(' | ')} |`).join('\n');
}
