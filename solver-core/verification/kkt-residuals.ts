/**
 * The optimality conditions of Karush, Kuhn and Tucker at a claimed solution, as numbers.
 *
 * With s = 1 when minimising and −1 when maximising, y the row duals and d = cost − Aᵀ y the reduced costs, a point x
 * with activities a = A x is optimal exactly when
 *
 *   primal           rowLower ≤ a ≤ rowUpper,  columnLower ≤ x ≤ columnUpper
 *   dual             s·y_i > 0 only where a_i stands at its lower bound,  s·y_i < 0 only where it stands at its upper;
 *                    the same for s·d_j and x_j
 *   no gap           cost · x + constant = constant + Σ y_i · (bound by the sign of s·y_i) + Σ d_j · (likewise)
 *
 * How each is measured. A row's violation is relative to 1 + the largest term |a_ij x_j| of its activity, a column's
 * to 1 + |x_j|, a reduced cost's to 1 + the largest of |cost_j| and |a_ij y_i|, a row dual's to 1 + |y_i|.
 * A multiplier violates its sign by its own relative size or by the relative distance of its variable from the
 * bound it calls for, whichever is less: one of the two must vanish. A bound that is not there is infinitely far.
 *
 * y and d are not believed to belong together: d is recomputed from y, and a claimed d that differs from it by more
 * than the others' violations shows as the dual residual.
 */
import type { LinearProgram } from '../linear-program/linear-program';
import type { Residuals } from '../linear-program/solve-result';
import { CompensatedSum } from '../numerics/compensated-sum';
import type { ReadonlyFloat64Array } from '../numerics/typed-array-views';
import { recomputeObjective, recomputeReducedCosts, recomputeRowActivities } from './recomputed-sums';

/** What is claimed to be optimal. */
export interface ClaimedSolution {
  /** Length n. */
  readonly x: ReadonlyFloat64Array;
  /** Length m. */
  readonly rowDuals: ReadonlyFloat64Array;
  /** Length n; where left out, cost − Aᵀ y is taken. */
  readonly reducedCosts?: ReadonlyFloat64Array;
}

/** A place of the problem. */
export interface Place {
  readonly kind: 'row' | 'column';
  readonly index: number;
}

/** The residuals, and where the two that have a place are largest (undefined when they are 0). */
export interface LocatedResiduals extends Residuals {
  readonly primalPlace: Place | undefined;
  readonly dualPlace: Place | undefined;
}

/**
 * The largest violation of each optimality condition on the stated problem; Infinity where a number is not finite.
 * @param claim signs as in linear-program/solve-result.ts
 */
export function kktResiduals(problem: LinearProgram, claim: ClaimedSolution): LocatedResiduals {
  const { x, rowDuals } = claim;
  const activities = recomputeRowActivities(problem.matrix, x);
  const reducedCosts = recomputeReducedCosts(problem.matrix, rowDuals, problem.cost);
  const objective = recomputeObjective(problem, x);
  const tally = new Tally(problem.sense === 'minimise' ? 1 : -1, problem.objectiveConstant);

  for (let row = 0; row < problem.rowCount; row++) {
    tally.take({
      place: { kind: 'row', index: row },
      value: activities.values[row],
      valueScale: 1 + activities.largestTerms[row],
      lower: problem.rowLower[row],
      upper: problem.rowUpper[row],
      multiplier: rowDuals[row],
      multiplierScale: 1 + Math.abs(rowDuals[row]),
    });
  }
  for (let column = 0; column < problem.columnCount; column++) {
    const place: Place = { kind: 'column', index: column };
    const multiplierScale = 1 + reducedCosts.largestTerms[column];
    tally.take({
      place,
      value: x[column],
      valueScale: 1 + Math.abs(x[column]),
      lower: problem.columnLower[column],
      upper: problem.columnUpper[column],
      multiplier: reducedCosts.values[column],
      multiplierScale,
    });
    if (claim.reducedCosts !== undefined) {
      const difference = Math.abs(claim.reducedCosts[column] - reducedCosts.values[column]);
      tally.takeDual(difference / multiplierScale, place);
    }
  }
  return tally.residuals(objective);
}

/** A variable, column or row activity, with all that its conditions speak of. */
interface Variable {
  readonly place: Place;
  readonly value: number;
  readonly valueScale: number;
  readonly lower: number;
  readonly upper: number;
  readonly multiplier: number;
  readonly multiplierScale: number;
}

/** Gathers the largest violations and the dual objective over all variables. */
class Tally {
  private primal = 0;
  private primalPlace: Place | undefined;
  private dual = 0;
  private dualPlace: Place | undefined;
  private largestProduct = 0;
  private readonly dualObjective = new CompensatedSum();

  constructor(
    private readonly sign: 1 | -1,
    objectiveConstant: number,
  ) {
    this.dualObjective.add(objectiveConstant);
  }

  take(variable: Variable): void {
    const { value, valueScale, lower, upper, multiplier, multiplierScale } = variable;
    this.takePrimal(Math.max(lower - value, value - upper, 0) / valueScale, variable.place);
    if (multiplier === 0) {
      return;
    }
    const bound = this.sign * multiplier > 0 ? lower : upper;
    const distance = Math.abs(value - bound);
    this.takeDual(Math.min(Math.abs(multiplier) / multiplierScale, distance / valueScale), variable.place);
    if (Number.isFinite(bound)) {
      this.largestProduct = Math.max(this.largestProduct, Math.abs(multiplier) * distance);
      this.dualObjective.addProduct(multiplier, bound);
    } else {
      // The sign's own violation stands in the dual residual; as a bound the variable's value keeps the gap finite.
      this.dualObjective.addProduct(multiplier, value);
    }
  }

  takePrimal(violation: number, place: Place): void {
    const counted = infiniteUnlessNumber(violation);
    if (counted > this.primal) {
      this.primal = counted;
      this.primalPlace = place;
    }
  }

  takeDual(violation: number, place: Place): void {
    const counted = infiniteUnlessNumber(violation);
    if (counted > this.dual) {
      this.dual = counted;
      this.dualPlace = place;
    }
  }

  residuals(objective: number): LocatedResiduals {
    const scale = 1 + Math.abs(objective);
    return {
      primal: this.primal,
      primalPlace: this.primalPlace,
      dual: this.dual,
      dualPlace: this.dualPlace,
      complementarity: infiniteUnlessNumber(this.largestProduct / scale),
      dualityGap: infiniteUnlessNumber(Math.abs(objective - this.dualObjective.value) / scale),
    };
  }
}

/** A violation that cannot be told must never pass for small. */
function infiniteUnlessNumber(violation: number): number {
  return Number.isNaN(violation) ? Infinity : violation;
}
