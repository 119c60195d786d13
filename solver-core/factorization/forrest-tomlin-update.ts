/**
 * Replaces one column of U and keeps it triangular: the row of the replaced pivot is eliminated by a row
 * transformation R and put last in the order.
 *
 * With U's row p eliminated by the rows below it, r = −(U⁻ᵀ e_p) · u_pp off the diagonal: so the row that btran has
 * computed on its way is all that is needed. The new diagonal must equal pivot · u_pp, which is the test of stability.
 *
 * Source: Forrest and Tomlin (1972), "Updated triangular factors of the basis to maintain sparsity in the product form
 * simplex method", Math. Programming 2; storage after Suhl and Suhl (1993), Annals of Operations Research 43.
 */
import { tolerances } from '../control/tolerances';
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';
import type { LuFactors } from './lu-factors';

/** Whether the factors can be used further, or must be renewed. */
export type UpdateOutcome = 'updated' | 'unstable';

export interface PackedVector {
  readonly index: Int32Array;
  readonly value: Float64Array;
  readonly count: number;
}

/**
 * @param position pivot row whose column is replaced
 * @param pivot the entering column's entry there, after B⁻¹
 * @param spike the entering column after L and R
 * @param row U⁻ᵀ e_position
 */
export function appendUpdate(
  f: LuFactors,
  position: number,
  pivot: number,
  spike: PackedVector,
  row: PackedVector,
): UpdateOutcome {
  const oldDiagonal = f.diagonal[position];
  storeEta(f, position, oldDiagonal, row);
  let computed = 0;
  let largest = 0;
  {
    // the spike's entry in the eliminated row: s_p + Σ eta_i s_i
    const { etaStart, etaIndex, etaValue, etaCount, scratchColumn } = f;
    for (let k = 0; k < spike.count; k++) {
      scratchColumn[spike.index[k]] = spike.value[k];
      largest = Math.max(largest, Math.abs(spike.value[k]));
    }
    computed = scratchColumn[position];
    for (let at = etaStart[etaCount - 1]; at < etaStart[etaCount]; at++) {
      computed += etaValue[at] * scratchColumn[etaIndex[at]];
    }
    for (let k = 0; k < spike.count; k++) scratchColumn[spike.index[k]] = 0;
  }
  const expected = pivot * oldDiagonal;
  removeColumn(f, position);
  removeRow(f, position);
  f.upperOrder[f.upperPlace[position]] = -1;
  insertSpike(f, position, spike);
  f.diagonal[position] = expected;
  f.appendToUpperOrder(position);
  const isAgreed =
    Math.abs(computed - expected) <=
    tolerances.updateAgreement * Math.max(Math.abs(expected), 1e-6 * largest);
  return isAgreed && expected !== 0 ? 'updated' : 'unstable';
}

function storeEta(f: LuFactors, position: number, oldDiagonal: number, row: PackedVector): void {
  const start = f.etaStart[f.etaCount];
  f.etaRow = grownInt32(f.etaRow, f.etaCount + 1);
  f.etaStart = grownInt32(f.etaStart, f.etaCount + 2);
  f.etaIndex = grownInt32(f.etaIndex, start + row.count);
  f.etaValue = grownFloat64(f.etaValue, start + row.count);
  let end = start;
  for (let k = 0; k < row.count; k++) {
    if (row.index[k] === position) continue;
    f.etaIndex[end] = row.index[k];
    f.etaValue[end++] = row.value[k] * oldDiagonal;
  }
  f.etaRow[f.etaCount++] = position;
  f.etaStart[f.etaCount] = end;
}

function removeColumn(f: LuFactors, column: number): void {
  const { upperStart, upperEnd, upperIndex, upperRowStart, upperRowEnd, upperRowIndex, upperRowValue } = f;
  for (let at = upperStart[column]; at < upperEnd[column]; at++) {
    const row = upperIndex[at];
    let place = upperRowStart[row];
    while (upperRowIndex[place] !== column) place++;
    const last = --upperRowEnd[row];
    upperRowIndex[place] = upperRowIndex[last];
    upperRowValue[place] = upperRowValue[last];
  }
  upperEnd[column] = upperStart[column];
}

function removeRow(f: LuFactors, row: number): void {
  const { upperStart, upperEnd, upperIndex, upperValue, upperRowStart, upperRowEnd, upperRowIndex } = f;
  for (let at = upperRowStart[row]; at < upperRowEnd[row]; at++) {
    const column = upperRowIndex[at];
    let place = upperStart[column];
    while (upperIndex[place] !== row) place++;
    const last = --upperEnd[column];
    upperIndex[place] = upperIndex[last];
    upperValue[place] = upperValue[last];
  }
  upperRowEnd[row] = upperRowStart[row];
}

function insertSpike(f: LuFactors, column: number, spike: PackedVector): void {
  f.reserveUpper(spike.count);
  let at = (f.upperStart[column] = f.upperSize);
  for (let k = 0; k < spike.count; k++) {
    const row = spike.index[k];
    if (row === column) continue;
    f.upperIndex[at] = row;
    f.upperValue[at++] = spike.value[k];
    if (f.upperRowEnd[row] === f.upperRowLimit[row]) moveRow(f, row);
    const place = f.upperRowEnd[row]++;
    f.upperRowIndex[place] = column;
    f.upperRowValue[place] = spike.value[k];
  }
  f.upperEnd[column] = f.upperSize = at;
}

/** To the end of the storage, with twice the room. */
function moveRow(f: LuFactors, row: number): void {
  const start = f.upperRowStart[row];
  const count = f.upperRowEnd[row] - start;
  const room = 2 * count + 8;
  f.upperRowIndex = grownInt32(f.upperRowIndex, f.upperRowSize + room);
  f.upperRowValue = grownFloat64(f.upperRowValue, f.upperRowSize + room);
  f.upperRowIndex.copyWithin(f.upperRowSize, start, start + count);
  f.upperRowValue.copyWithin(f.upperRowSize, start, start + count);
  f.upperRowStart[row] = f.upperRowSize;
  f.upperRowEnd[row] = f.upperRowSize + count;
  f.upperRowSize += room;
  f.upperRowLimit[row] = f.upperRowSize;
}
