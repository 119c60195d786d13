/**
 * Small pieces of sentences: amounts, counts, lists and quoted texts as a planner reads them.
 */

const amountFormat = new Intl.NumberFormat('en-US', { maximumSignificantDigits: 10 });

/** `1,250.5`; at most ten digits that matter. Infinite amounts say that there is no limit. */
export function amountText(amount: number): string {
  if (Number.isFinite(amount)) {
    return amountFormat.format(amount === 0 ? 0 : amount);
  }
  return 'no limit';
}

/** `1 cell`, `3 cells`. */
export function countText(count: number, noun: string): string {
  return `${count.toLocaleString('en-US')} ${noun}${count === 1 ? '' : 's'}`;
}

/** `a`, `a and b`, `a, b and c`. */
export function listText(items: readonly string[]): string {
  const last = items.at(-1) ?? '';
  return items.length < 2 ? last : `${items.slice(0, -1).join(', ')} and ${last}`;
}

/** As much of a cell's text as a sentence can carry. */
const quotedLength = 40;

/** A text from a cell in quotation marks, cut where it is long. */
export function quoted(text: string): string {
  const line = text.replace(/\s+/g, ' ').trim();
  const characters = [...line];
  return `“${characters.length > quotedLength ? `${characters.slice(0, quotedLength).join('')}…` : line}”`;
}
