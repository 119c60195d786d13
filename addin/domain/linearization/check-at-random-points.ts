/**
 * Model and formulas must agree: both are evaluated at random points, the formulas by the evaluator over plain
 * numbers. A slip in the algebra of affine forms, or a function wrongly marked as affine, shows here and nowhere else
 * before the plan is wrong.
 */
import type { DefiningRow } from './defining-rows';
import type { AffineForm } from './affine-form';

/** Largest difference, relative to 1 + the sum of the sizes of the form's terms: what rounding alone makes of it. */
const agreementTolerance = 1e-9;
/**
 * The same where large constants cancel within a formula (`(A1 + 1E9) − 1E9`) and leave their rounding behind. That
 * does not grow with the decisions, so the difference must then vanish at a point `farFactor` times as far out.
 */
const cancellationTolerance = 1e-6;
const farFactor = 1000;

const pointCount = 2;

/** What the formula gives at a point; anything but a number is a disagreement. */
export type FormulaEvaluation = (point: readonly number[]) => readonly unknown[];

export interface Disagreement {
  /** Position among the forms. */
  readonly target: number;
  readonly model: number;
  readonly evaluated: unknown;
}

/**
 * @param forms over decisions and the variables of the rows
 * @param evaluateFormulas values of the same targets, in their order, by their formulas
 * @returns the first disagreement of each target that has one
 */
export function checkAtRandomPoints(
  decisionCount: number,
  forms: readonly AffineForm[],
  rows: readonly DefiningRow[],
  evaluateFormulas: FormulaEvaluation,
): readonly Disagreement[] {
  const disagreements = new Map<number, Disagreement>();
  const random = seededNumbers(20_261_201);
  for (let round = 0; round < pointCount; round++) {
    const point = Array.from({ length: decisionCount }, () => 1 + 9 * random());
    const doubtful = differencesAt(point, forms, rows, evaluateFormulas, agreementTolerance);
    if (doubtful.length === 0) {
      continue;
    }
    const farPoint = point.map((value) => value * farFactor);
    const far = new Set(
      differencesAt(farPoint, forms, rows, evaluateFormulas, agreementTolerance).map(({ target }) => target),
    );
    for (const disagreement of doubtful) {
      const isCancellation = !far.has(disagreement.target) && disagreement.relative <= cancellationTolerance;
      if (!isCancellation && !disagreements.has(disagreement.target)) {
        disagreements.set(disagreement.target, disagreement);
      }
    }
  }
  return [...disagreements.values()];
}

function differencesAt(
  point: readonly number[],
  forms: readonly AffineForm[],
  rows: readonly DefiningRow[],
  evaluateFormulas: FormulaEvaluation,
  tolerance: number,
): (Disagreement & { readonly relative: number })[] {
  const values = [...point];
  // Rows refer to decisions and earlier rows only.
  for (const row of rows) {
    values[row.variable] = row.form.valueAt(values);
  }
  const evaluated = evaluateFormulas(point);
  return forms.flatMap((form, target) => {
    const model = form.valueAt(values);
    const value = evaluated[target];
    const relative =
      typeof value === 'number' ? Math.abs(model - value) / (1 + sizeOfTerms(form, values)) : Infinity;
    return relative <= tolerance ? [] : [{ target, model, evaluated: value, relative }];
  });
}

function sizeOfTerms(form: AffineForm, values: readonly number[]): number {
  let size = Math.abs(form.constant);
  for (let at = 0; at < form.variables.length; at++) {
    size += Math.abs(form.coefficients[at] * values[form.variables[at]]);
  }
  return size;
}

/**
 * Numbers in [0, 1), the same from the same seed everywhere.
 * Source: Park, Miller and Stockmeyer (1993), "Technical correspondence: another test for randomness", CACM 36 (7):
 * x ← 48271 x mod (2³¹ − 1)
 */
function seededNumbers(seed: number): () => number {
  const modulus = 2_147_483_647;
  let state = seed % modulus;
  return () => {
    state = (state * 48_271) % modulus;
    return state / modulus;
  };
}
