/**
 * Every tolerance of the way from result to sheet: the question it answers, what it is relative to, and why.
 */
export const resultTolerances = {
  /**
   * Is a value the bound itself but for rounding? Relative to 1 + |bound|. Values outside a bound are drawn onto it
   * whatever the distance (the solver has shown that it is within its own tolerance); this one is for values inside.
   * Far below the solver's accepted violation (1e-7), so that no constraint row notices the change.
   */
  boundSnap: 1e-9,
  /** Is a positive slack nothing but rounding? Relative to 1 + the largest term of the row's two sides. */
  slackRounding: 1e-9,
  /**
   * Is a negative slack within what the solver may leave? Relative as above; the solver's accepted row violation.
   * A greater one is shown as it is.
   */
  acceptedViolation: 1e-7,
  /**
   * Does the workbook's own arithmetic agree with the model? Relative to 1 + the largest term. Both add the same
   * terms in another order, and a formula may pass through greater numbers than the model's terms.
   */
  workbookAgreement: 1e-7,
  /**
   * Is a stored number the one that was recorded? Relative. Some spreadsheet programs keep 15 significant digits
   * where we wrote 17.
   */
  sameStoredNumber: 1e-14,
} as const;

/** Whether `value` equals `reference` within `tolerance` times `scale`. */
export function isWithin(value: number, reference: number, tolerance: number, scale: number): boolean {
  return Math.abs(value - reference) <= tolerance * scale;
}
