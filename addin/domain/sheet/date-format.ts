/**
 * Which number formats show a date or a time (ECMA-376 Part 1, §18.8.31).
 */

/**
 * Whether a format code shows a date or a time. Literal text, escapes, colours, currencies and conditions do not
 * count; `[h]`, `[m]` and `[s]` (elapsed time) do.
 */
export function isDateFormat(code: string): boolean {
  return code.split(';').some((section) => {
    const bare = section
      .replace(/"[^"]*"?|\\.|_.|\*./g, '')
      .replace(/\[(?!h+\]|m+\]|s+\])[^\]]*\]/gi, '')
      .replace(/general/gi, '')
      .replace(/s\.0+/gi, 's');
    // A digit placeholder makes it a number; E+ and E- belong to numbers.
    return !/[0#?]/.test(bare) && /[dmyhs]|AM\/PM|A\/P/i.test(bare);
  });
}
