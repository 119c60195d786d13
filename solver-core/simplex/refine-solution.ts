/**
 * Iterative refinement of the final basic solution and of rays: residuals in twice the working precision, corrections
 * by the factors at hand.
 *
 * Source: Wilkinson (1963), "Rounding Errors in Algebraic Processes", ch. 3; Gleixner, Steffy and Wolter (2016),
 * "Iterative refinement for linear programming", INFORMS J. on Computing 28, for its use here.
 */
import { CompensatedSum, CompensatedSums } from '../numerics/compensated-sum';
import { ScatteredVector } from '../sparse/scattered-vector';
import type { SimplexIterate } from './simplex-iterate';

/** Corrections after the first solve; with a basis that is not quite singular each wins several digits. */
const refinements = 2;

/** Corrects basic values so that [A | −I] z = 0 holds to the last digits, nonbasic values staying where they are. */
export function refinePrimalValues(iterate: SimplexIterate): void {
  const { form, basis, primal } = iterate;
  const z = primal.value;
  const { columnStart, rowIndex, value } = form.matrix;
  const residual = new CompensatedSums(form.rowCount);
  for (let column = 0; column < form.columnCount; column++) {
    if (z[column] === 0) continue;
    for (let entry = columnStart[column]; entry < columnStart[column + 1]; entry++) {
      residual.addProduct(rowIndex[entry], value[entry], z[column]);
    }
  }
  const correction = new ScatteredVector(form.rowCount);
  for (let row = 0; row < form.rowCount; row++) {
    residual.add(row, -z[form.columnCount + row]);
    correction.value[row] = residual.valueAt(row);
  }
  correction.count = -1;
  iterate.factorization.ftran(correction);
  for (let position = 0; position < form.rowCount; position++) {
    const step = correction.value[position];
    if (step !== 0 && Number.isFinite(step)) primal.add(basis.basicVariable[position], -step);
  }
}

/**
 * Row multipliers y with Bᵀ y = c_B for the costs in use, after refinement.
 * @returns length m, in the space of the form
 */
export function refinedMultipliers(iterate: SimplexIterate): Float64Array {
  const { basis, costs, form } = iterate;
  return refinedRowSolve(
    iterate,
    Float64Array.from({ length: form.rowCount }, (_, position) => costs.cost[basis.basicVariable[position]]),
  );
}

/**
 * Bᵀ y = right, refined.
 * @param right length m, by position; not changed
 * @returns length m, by row
 */
export function refinedRowSolve(iterate: SimplexIterate, right: Float64Array): Float64Array {
  const { form, basis } = iterate;
  const { columnStart, rowIndex, value } = form.matrix;
  const y = new Float64Array(form.rowCount);
  const vector = new ScatteredVector(form.rowCount);
  const sum = new CompensatedSum();
  for (let round = 0; round <= refinements; round++) {
    for (let position = 0; position < form.rowCount; position++) {
      const variable = basis.basicVariable[position];
      sum.reset();
      sum.add(right[position]);
      if (variable >= form.columnCount) sum.add(y[variable - form.columnCount]);
      else {
        for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
          sum.addProduct(-value[entry], y[rowIndex[entry]]);
        }
      }
      vector.value[position] = sum.value;
    }
    vector.count = -1;
    iterate.factorization.btran(vector);
    addFinite(y, vector);
  }
  return y;
}

/**
 * B v = column of a variable, refined.
 * @returns length m, by position
 */
export function refinedColumnSolve(iterate: SimplexIterate, variable: number): Float64Array {
  const { form, basis } = iterate;
  const { columnStart, rowIndex, value } = form.matrix;
  const v = new Float64Array(form.rowCount);
  const vector = new ScatteredVector(form.rowCount);
  for (let round = 0; round <= refinements; round++) {
    const residual = new CompensatedSums(form.rowCount);
    const addColumn = (which: number, factor: number): void => {
      if (factor === 0) return;
      if (which >= form.columnCount) residual.add(which - form.columnCount, -factor);
      else {
        for (let entry = columnStart[which]; entry < columnStart[which + 1]; entry++) {
          residual.addProduct(rowIndex[entry], factor, value[entry]);
        }
      }
    };
    addColumn(variable, 1);
    for (let position = 0; position < form.rowCount; position++)
      addColumn(basis.basicVariable[position], -v[position]);
    for (let row = 0; row < form.rowCount; row++) vector.value[row] = residual.valueAt(row);
    vector.count = -1;
    iterate.factorization.ftran(vector);
    addFinite(v, vector);
  }
  return v;
}

function addFinite(to: Float64Array, vector: ScatteredVector): void {
  for (let k = 0; k < to.length; k++) if (Number.isFinite(vector.value[k])) to[k] += vector.value[k];
  vector.clear();
}
