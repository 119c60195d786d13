/**
 * How much a cell can hold: the spreadsheet programs' own limits, in characters.
 */
export const cellLimits = {
  textLength: 32_767,
  formulaLength: 8_192,
} as const;
