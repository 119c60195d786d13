/**
 * A solved plan in the sheet's own terms: what each decision cell should hold, and for every constraint row its two
 * sides, slack and dual value.
 *
 * Signs. Slack: right − left for `<=`, left − right for `>=`, 0 for `=`; never negative at a feasible plan. Dual
 * value: d(objective as stated) / d(right side), so when minimising `>=` rows give ≥ 0 and `<=` rows ≤ 0, when
 * maximising the reverse; where the right side holds decisions, per unit added to it as a constant. Reduced cost:
 * d(objective) / d(decision), 0 for a basic decision. These are the solver's own signs (its rows are left − right
 * with the constants on the right), so multipliers pass through unchanged.
 */
import type { AffineForm } from '../linearization/affine-form';
import type { ConstraintRow, Relation, SheetModel } from '../model-from-sheet/sheet-model';
import { resultTolerances } from './result-tolerances';

/** What a solver found, by the parts of the model and not by rows and columns of a linear program. */
export interface SolvedValues {
  /** One a decision cell, in the model's order. */
  readonly values: readonly number[];
  readonly reducedCosts: readonly number[];
  /** One a constraint row, all sets in order; 0 for a row that the program did not need. */
  readonly dualValues: readonly number[];
}

export interface DecisionSolution {
  /** Full precision, drawn onto a bound where it lies within tolerance of it. */
  readonly value: number;
  readonly reducedCost: number;
}

export interface ConstraintSolution {
  readonly leftSide: number;
  readonly rightSide: number;
  readonly slack: number;
  readonly dualValue: number;
  /** Slack is 0: the row limits the plan, or at least touches it. */
  readonly isBinding: boolean;
  /** 1 + the largest term of the two sides: what a difference in them is relative to. */
  readonly scale: number;
}

export interface PlanSolution {
  /** The model's objective at these decision values. */
  readonly objective: number;
  /** 1 + the largest term of the objective: what a difference in it is relative to. */
  readonly objectiveScale: number;
  readonly decisions: readonly DecisionSolution[];
  /** All sets of constraint rows in order. */
  readonly constraints: readonly ConstraintSolution[];
}

/** The constraint rows of all sets, in the order in which results list them. */
export function constraintRowsOf(model: SheetModel): ConstraintRow[] {
  return model.constraintSets.flatMap((set) => set.rows);
}

/** Works out what stands on the sheet at the plan that a solver found. */
export function planSolutionOf(model: SheetModel, solved: SolvedValues): PlanSolution {
  const decisions = model.decisions.map((decision, position) => ({
    value: snapToBounds(solved.values[position], decision.lower, decision.upper),
    reducedCost: withoutNegativeZero(solved.reducedCosts[position]),
  }));
  const variables = variableValuesAt(
    model,
    decisions.map((decision) => decision.value),
  );
  const objective = evaluateForm(model.objective, variables);
  const constraints = constraintRowsOf(model).map((row, position) =>
    constraintSolutionAt(row, variables, solved.dualValues[position]),
  );
  return { objective: objective.value, objectiveScale: 1 + objective.largestTerm, decisions, constraints };
}

/**
 * The bound, where a value lies beyond it or within tolerance of it. A decision between two bounds that are closer
 * than the tolerance takes the nearer one.
 */
export function snapToBounds(value: number, lower: number, upper: number): number {
  const isAt = (bound: number): boolean =>
    Number.isFinite(bound) && Math.abs(value - bound) <= resultTolerances.boundSnap * (1 + Math.abs(bound));
  if (value <= lower || (isAt(lower) && !(isAt(upper) && upper - value < value - lower))) {
    return withoutNegativeZero(lower);
  }
  return withoutNegativeZero(value >= upper || isAt(upper) ? upper : value);
}

/**
 * Values of all variables of the model's forms: the decisions, then the cells with a defining row, each from those
 * before it.
 */
export function variableValuesAt(model: SheetModel, decisionValues: readonly number[]): Float64Array {
  const highest = model.definingRows.reduce((most, row) => Math.max(most, row.variable), -1);
  const variables = new Float64Array(Math.max(model.decisions.length, highest + 1));
  variables.set(decisionValues);
  for (const row of model.definingRows) {
    variables[row.variable] = evaluateForm(row.form, variables).value;
  }
  return variables;
}

export interface EvaluatedForm {
  readonly value: number;
  /** The greatest |term| of the sum, the constant included: what a rounding error in it is relative to. */
  readonly largestTerm: number;
}

/** Compensated (Neumaier 1974), since feasibility and agreement are judged by it. */
export function evaluateForm(form: AffineForm, variables: ArrayLike<number>): EvaluatedForm {
  let sum = form.constant;
  let correction = 0;
  let largestTerm = Math.abs(form.constant);
  for (let position = 0; position < form.variables.length; position++) {
    const term = form.coefficients[position] * variables[form.variables[position]];
    const next = sum + term;
    correction += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
    sum = next;
    largestTerm = Math.max(largestTerm, Math.abs(term));
  }
  return { value: sum + correction, largestTerm };
}

function constraintSolutionAt(
  row: ConstraintRow,
  variables: Float64Array,
  dualValue: number,
): ConstraintSolution {
  const left = evaluateForm(row.left, variables);
  const right = evaluateForm(row.right, variables);
  const scale = 1 + Math.max(left.largestTerm, right.largestTerm);
  const slack = slackOf(row.relation, left.value, right.value, scale);
  return {
    leftSide: withoutNegativeZero(left.value),
    rightSide: withoutNegativeZero(right.value),
    slack,
    dualValue: withoutNegativeZero(dualValue),
    isBinding: slack <= 0,
    scale,
  };
}

function slackOf(relation: Relation, left: number, right: number, scale: number): number {
  if (relation === '=') {
    return 0;
  }
  const slack = relation === '<=' ? right - left : left - right;
  const isRounding =
    slack <= resultTolerances.slackRounding * scale && slack >= -resultTolerances.acceptedViolation * scale;
  return isRounding ? 0 : slack;
}

function withoutNegativeZero(value: number): number {
  return value === 0 ? 0 : value;
}
