/**
 * A row of the tableau: ρᵀ [A | −I] over the nonbasic variables, for ρ = B⁻ᵀ e_r or any other row vector.
 */
import { VariableStatus } from '../linear-program/basis';
import type { ReadonlyUint8Array } from '../numerics/typed-array-views';
import type { ScatteredVector } from '../sparse/scattered-vector';
import type { ComputationalForm } from './computational-form';
import { tolerances } from '../control/tolerances';
import { nonbasicFixed } from './working-basis';

/** Above this share of nonzeros in ρ a pass over columns costs less than one over rows. */
const columnwiseDensity = 0.4;
/** When the rows to be added up hold more than this share of n entries, listing as they come is not worth it. */
const listingShare = 0.3;

/**
 * hot: once an iteration.
 * @param rho length m, listed
 * @param status length n + m, of the working basis
 * @param row length n + m; comes back with the nonzeros of nonbasic, not fixed variables listed, everything else 0
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
  let work = rho.count;
  let count: number;
  if (rho.count > columnwiseDensity * m) {
    count = addUpColumns(form, rho, status, row);
    work += form.matrix.value.length;
  } else {
    const { columnStart } = form.rowMatrix;
    let entries = 0;
    for (let k = 0; k < rho.count; k++) entries += columnStart[rho.index[k] + 1] - columnStart[rho.index[k]];
    if (entries > listingShare * n) {
      count = addUpRows(form, rho, status, row);
      work += entries + n;
    } else {
      count = addUpRowsListing(form, rho, status, row);
      work += 2 * entries;
    }
  }
  const alpha = row.value;
  const list = row.index;
  for (let k = 0; k < rho.count; k++) {
    const at = rho.index[k];
    const stands = status[n + at];
    if (stands === VariableStatus.basic || stands === nonbasicFixed) continue;
    alpha[n + at] = -rho.value[at];
    list[count++] = n + at;
  }
  row.count = count;
  return work;
}

/** hot: dense ρ. One dot product a column. */
function addUpColumns(
  form: ComputationalForm,
  rho: ScatteredVector,
  status: ReadonlyUint8Array,
  row: ScatteredVector,
): number {
  const { columnStart, rowIndex, value } = form.matrix;
  const multiplier = rho.value;
  const alpha = row.value;
  const list = row.index;
  let count = 0;
  for (let variable = 0; variable < form.columnCount; variable++) {
    const stands = status[variable];
    if (stands === VariableStatus.basic || stands === nonbasicFixed) continue;
    let sum = 0;
    const end = columnStart[variable + 1];
    for (let entry = columnStart[variable]; entry < end; entry++)
      sum += value[entry] * multiplier[rowIndex[entry]];
    if (sum > -tolerances.solveDrop && sum < tolerances.solveDrop) continue;
    alpha[variable] = sum;
    list[count++] = variable;
  }
  return count;
}

/** hot: ρ of middling density. Rows are added up blindly, then everything is looked at once. */
function addUpRows(
  form: ComputationalForm,
  rho: ScatteredVector,
  status: ReadonlyUint8Array,
  row: ScatteredVector,
): number {
  const { columnStart, rowIndex, value } = form.rowMatrix;
  const alpha = row.value;
  const list = row.index;
  for (let k = 0; k < rho.count; k++) {
    const at = rho.index[k];
    const factor = rho.value[at];
    const end = columnStart[at + 1];
    for (let entry = columnStart[at]; entry < end; entry++) alpha[rowIndex[entry]] += factor * value[entry];
  }
  let count = 0;
  for (let variable = 0; variable < form.columnCount; variable++) {
    const entry = alpha[variable];
    if (entry === 0) continue;
    const stands = status[variable];
    if (
      stands === VariableStatus.basic ||
      stands === nonbasicFixed ||
      (entry > -tolerances.solveDrop && entry < tolerances.solveDrop)
    ) {
      alpha[variable] = 0;
    } else list[count++] = variable;
  }
  return count;
}

/** hot: sparse ρ. Only what is touched is looked at. */
function addUpRowsListing(
  form: ComputationalForm,
  rho: ScatteredVector,
  status: ReadonlyUint8Array,
  row: ScatteredVector,
): number {
  const { columnStart, rowIndex, value } = form.rowMatrix;
  const alpha = row.value;
  const list = row.index;
  let count = 0;
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
  }
  let kept = 0;
  for (let k = 0; k < count; k++) {
    const variable = list[k];
    const entry = alpha[variable];
    const stands = status[variable];
    if (
      stands === VariableStatus.basic ||
      stands === nonbasicFixed ||
      (entry > -tolerances.solveDrop && entry < tolerances.solveDrop)
    ) {
      alpha[variable] = 0;
    } else list[kept++] = variable;
  }
  return kept;
}
