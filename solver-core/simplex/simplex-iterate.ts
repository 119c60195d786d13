/**
 * The current iterate of the simplex algorithms: basis, bounds, costs, values, reduced costs and factors, each with
 * its own owner. `applyPivot`, `flipBounds` and `refactorize` are the only ways in which a loop changes it.
 */
import { VariableStatus, type Basis } from '../linear-program/basis';
import { CompensatedSum } from '../numerics/compensated-sum';
import { BasisFactorization } from '../factorization/basis-factorization';
import type { UpdateOutcome } from '../factorization/forrest-tomlin-update';
import { ScatteredVector } from '../sparse/scattered-vector';
import type { ComputationalForm } from './computational-form';
import { PrimalValues } from './primal-values';
import { ReducedCosts } from './reduced-costs';
import { nonbasicFixed, nonbasicStatus, WorkingBasis } from './working-basis';
import { WorkingBounds } from './working-bounds';
import { WorkingCosts } from './working-costs';

/** What a pivot does; both steps are signed as the textbooks have them. */
export interface Pivot {
  /** Position whose variable leaves. */
  readonly position: number;
  readonly entering: number;
  /** d_entering / α: reduced costs change by −dualStep × row. */
  readonly dualStep: number;
  /** Change of the entering variable; basic ones change by −primalStep × column. */
  readonly primalStep: number;
  /** Where the leaving variable comes to rest. */
  readonly leavingStatus: number;
  /** Pivot element as ftran gave it. */
  readonly alpha: number;
}

export class SimplexIterate {
  readonly basis: WorkingBasis;
  readonly bounds: WorkingBounds;
  readonly costs: WorkingCosts;
  readonly primal: PrimalValues;
  readonly reduced: ReducedCosts;
  readonly factorization: BasisFactorization;
  /** Pivots and bound flips of entering variables so far. */
  iterations = 0;
  /** Bases that had to be repaired with logicals. */
  repairs = 0;
  private readonly scratchFlip: ScatteredVector;

  constructor(
    readonly form: ComputationalForm,
    /** Primal feasibility, absolute, in the space of the form. */
    primalTolerance: number,
  ) {
    this.basis = new WorkingBasis(form.rowCount, form.columnCount);
    this.bounds = new WorkingBounds(form);
    this.costs = new WorkingCosts(form);
    this.primal = new PrimalValues(form, this.basis, this.bounds, primalTolerance);
    this.reduced = new ReducedCosts(form, this.basis, this.costs);
    this.factorization = new BasisFactorization(form.matrix);
    this.scratchFlip = new ScatteredVector(form.rowCount);
  }

  /** Fresh factors of the current basis (repaired where it is singular), values and reduced costs. */
  refactorize(): void {
    const { form, basis, bounds } = this;
    basis.reorder((basic) => {
      const { rejectedVariables, replacedRows } = this.factorization.factorize(basic);
      if (rejectedVariables.length === 0) return;
      this.repairs++;
      for (const variable of rejectedVariables) {
        const isNearUpper =
          Math.abs(this.primal.value[variable] - bounds.upper[variable]) <
          Math.abs(this.primal.value[variable] - bounds.lower[variable]);
        basis.setStatus(variable, nonbasicStatus(variable, bounds.lower, bounds.upper, isNearUpper));
      }
      for (const row of replacedRows) basis.setStatus(form.columnCount + row, VariableStatus.basic);
    });
    this.recompute();
  }

  recompute(): void {
    this.primal.recompute(this.factorization);
    this.reduced.recompute(this.factorization);
  }

  /** In this order and nowhere else: reduced costs, values, basis, factors. */
  applyPivot(pivot: Pivot, row: ScatteredVector, column: ScatteredVector): UpdateOutcome {
    const { position, entering, dualStep, primalStep, leavingStatus } = pivot;
    const leaving = this.basis.basicVariable[position];
    this.reduced.stepAlongRow(dualStep, row);
    this.reduced.set(entering, 0);
    this.reduced.set(leaving, -dualStep);
    this.primal.stepBasics(primalStep, column);
    this.primal.add(entering, primalStep);
    const isFixed = this.bounds.lower[leaving] === this.bounds.upper[leaving];
    this.basis.replace(position, entering, isFixed ? nonbasicFixed : leavingStatus);
    this.primal.set(leaving, this.primal.restingValue(leaving));
    this.primal.watch(position);
    this.iterations++;
    return this.factorization.update(position, pivot.alpha);
  }

  /** Moves nonbasic boxed variables to their other bounds; the basic ones follow. */
  flipBounds(variables: Int32Array, count: number): void {
    if (count === 0) return;
    const { form, basis, primal, scratchFlip } = this;
    const { columnStart, rowIndex, value } = form.matrix;
    const right = scratchFlip.value;
    let listed = 0;
    for (let k = 0; k < count; k++) {
      const variable = variables[k];
      const isAtLower = basis.status[variable] === VariableStatus.atLower;
      basis.setStatus(variable, isAtLower ? VariableStatus.atUpper : VariableStatus.atLower);
      const before = primal.value[variable];
      const after = primal.restingValue(variable);
      primal.set(variable, after);
      const step = after - before;
      if (step === 0) continue;
      if (variable >= form.columnCount) {
        const at = variable - form.columnCount;
        if (right[at] === 0) scratchFlip.index[listed++] = at;
        right[at] -= step;
        if (right[at] === 0) right[at] = Number.MIN_VALUE;
        continue;
      }
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const at = rowIndex[entry];
        if (right[at] === 0) scratchFlip.index[listed++] = at;
        right[at] += value[entry] * step;
        if (right[at] === 0) right[at] = Number.MIN_VALUE; // stays listed once
      }
    }
    scratchFlip.count = listed;
    this.factorization.ftran(scratchFlip);
    primal.stepBasics(1, scratchFlip);
    scratchFlip.clear();
  }

  /** The box of dual phase one; variables that it fixes are left out of tableau rows, so their d are stale at its end. */
  boxBounds(): void {
    this.bounds.boxForPhaseOne();
    this.restAtRightBounds();
  }

  restoreBounds(): void {
    this.bounds.restore();
    this.alignStatuses();
  }

  relaxBounds(seed: number, size: number): void {
    this.bounds.relax(seed, size);
    this.alignStatuses();
  }

  /** Statuses that fit the bounds in use, on the same side where there is one. Values must be recomputed after. */
  private alignStatuses(): void {
    const { basis, bounds } = this;
    for (let variable = 0; variable < this.form.variableCount; variable++) {
      const stands = basis.status[variable];
      if (stands === VariableStatus.basic) continue;
      const isUpper = stands === VariableStatus.atUpper;
      basis.setStatus(variable, nonbasicStatus(variable, bounds.lower, bounds.upper, isUpper));
    }
  }

  /**
   * Shifts the cost of every variable whose reduced cost has the wrong sign by no more than `largest`, so that it
   * becomes 0. @returns whether none is left wrong
   */
  shiftCostsToFeasibility(tolerance: number, largest: number): boolean {
    const { reduced, costs } = this;
    let isFeasible = true;
    for (let variable = 0; variable < this.form.variableCount; variable++) {
      const amount = reduced.infeasibility(variable);
      if (amount <= tolerance) continue;
      if (amount > largest) isFeasible = false;
      else {
        costs.shift(variable, -reduced.value[variable]);
        reduced.set(variable, 0);
      }
    }
    return isFeasible;
  }

  /** Puts every nonbasic boxed variable at the bound that its reduced cost asks for, and others where they can be. */
  restAtRightBounds(): void {
    const { form, basis, bounds, reduced } = this;
    for (let variable = 0; variable < form.variableCount; variable++) {
      if (basis.status[variable] === VariableStatus.basic) continue;
      const d = reduced.value[variable];
      const prefersUpper = d < 0 || (d === 0 && basis.status[variable] === VariableStatus.atUpper);
      basis.setStatus(variable, nonbasicStatus(variable, bounds.lower, bounds.upper, prefersUpper));
    }
    this.primal.recompute(this.factorization);
  }

  /** Σ cost in use × value. */
  objective(): number {
    const { cost } = this.costs;
    const z = this.primal.value;
    const sum = new CompensatedSum();
    for (let variable = 0; variable < this.form.variableCount; variable++) {
      if (cost[variable] !== 0) sum.addProduct(cost[variable], z[variable]);
    }
    return sum.value;
  }

  /** Column of [A | −I] into an empty vector. */
  loadColumn(variable: number, into: ScatteredVector): void {
    const { form } = this;
    into.clear();
    if (variable >= form.columnCount) {
      const row = variable - form.columnCount;
      into.value[row] = -1;
      into.index[0] = row;
      into.count = 1;
      return;
    }
    const { columnStart, rowIndex, value } = form.matrix;
    let count = 0;
    for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
      into.value[rowIndex[entry]] = value[entry];
      into.index[count++] = rowIndex[entry];
    }
    into.count = count;
  }

  snapshot(): Basis {
    return this.basis.snapshot();
  }
}
