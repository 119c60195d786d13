/**
 * A row of the tableau: ρᵀ [A | −I] over the nonbasic variables, for ρ = B⁻ᵀ e_r or any other row vector.
 */
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyUint8Array } from '../numerics/typed-array-views';
import type { ScatteredVector } from '../sparse/scattered-vector';
import { columnDot } from '../sparse/sparse-products';
import type { ComputationalForm } from './computational-form';
import { tolerances } from '../control/tolerances';

/** Above this share of nonzeros in ρ a pass over columns costs less than one over rows. */
const columnwiseDensity = 0.25;

/**
 * hot: once an iteration.
 * @param rho length m, listed
 * @param status length n + m
 * @param row length n + m; comes back with its nonbasic nonzeros listed, everything else 0
 * @returns work units
 */
export function tableauRow(
  form: ComputationalForm,
  rho: ScatteredVector,
  status: ReadonlyUint8Array,
  row: ScatteredVector,
): number {
  row.clear();
  const { rowCount: m, columnCount: n } = form;
  const alpha = row.value;
  const list = row.index;
  let count = 0;
  let work = m;
  if (rho.count > columnwiseDensity * m) {
    for (let variable = 0; variable < n; variable++) {
      if (status[variable] === VariableStatus.basic) continue;
      const entry = columnDot(form.matrix, variable, rho.value);
      if (entry > -tolerances.solveDrop && entry < tolerances.solveDrop) continue;
      alpha[variable] = entry;
      list[count++] = variable;
    }
    work += form.matrix.value.length;
  } else {
    const { columnStart, rowIndex, value } = form.rowMatrix;
    for (let k = 0; k < rho.count; k++) {
      const at = rho.index[k];
      const factor = rho.value[at];
      const end = columnStart[at + 1];
      for (let entry = columnStart[at]; entry < end; entry++) {
        const variable = rowIndex[entry];
        const before = alpha[variable];
        if (before === 0) list[count++] = variable;
        const after = before + factor * value[entry];
        alpha[variable] = after === 0 ? Number.MIN_VALUE : after; // stays listed once
      }
      work += end - columnStart[at];
    }
    let kept = 0;
    for (let k = 0; k < count; k++) {
      const variable = list[k];
      const entry = alpha[variable];
      if (
        status[variable] === VariableStatus.basic ||
        (entry > -tolerances.solveDrop && entry < tolerances.solveDrop)
      ) {
        alpha[variable] = 0;
      } else list[kept++] = variable;
    }
    count = kept;
  }
  for (let k = 0; k < rho.count; k++) {
    const at = rho.index[k];
    if (status[n + at] === VariableStatus.basic) continue;
    alpha[n + at] = -rho.value[at];
    list[count++] = n + at;
  }
  row.count = count;
  return work;
}
