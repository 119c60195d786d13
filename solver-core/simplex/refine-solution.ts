/**
 * One step of iterative refinement of the final basic solution: residuals in twice the working precision, corrections
 * by the factors at hand.
 *
 * Source: Wilkinson (1963), "Rounding Errors in Algebraic Processes", ch. 3; Gleixner, Steffy and Wolter (2016),
 * "Iterative refinement for linear programming", INFORMS J. on Computing 28, for its use here.
 */
import { CompensatedSum, CompensatedSums } from '../numerics/compensated-sum';
import { ScatteredVector } from '../sparse/scattered-vector';
import type { SimplexIterate } from './simplex-iterate';

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
 * Row multipliers y with Bᵀ y = c_B for the costs in use, after one refinement.
 * @returns length m, in the space of the form
 */
export function refinedMultipliers(iterate: SimplexIterate): Float64Array {
  const { form, basis, costs } = iterate;
  const { columnStart, rowIndex, value } = form.matrix;
  const vector = new ScatteredVector(form.rowCount);
  for (let position = 0; position < form.rowCount; position++) {
    vector.value[position] = costs.cost[basis.basicVariable[position]];
  }
  vector.count = -1;
  iterate.factorization.btran(vector);
  const y = vector.value.slice();
  vector.clear();
  const sum = new CompensatedSum();
  for (let position = 0; position < form.rowCount; position++) {
    const variable = basis.basicVariable[position];
    sum.reset();
    sum.add(costs.cost[variable]);
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
  for (let row = 0; row < form.rowCount; row++) {
    if (Number.isFinite(vector.value[row])) y[row] += vector.value[row];
  }
  return y;
}
