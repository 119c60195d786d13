/**
 * The basis a solve starts from: all logicals, or a snapshot made to fit.
 */
import { VariableStatus, type Basis } from '../linear-program/basis';
import type { ComputationalForm } from './computational-form';
import { nonbasicStatus, type WorkingBasis } from './working-basis';

/** Logicals basic, columns at the bound nearer to 0. */
export function loadLogicalBasis(form: ComputationalForm, basis: WorkingBasis): void {
  const { rowCount: m, columnCount: n, lower, upper } = form;
  const status = new Uint8Array(n + m).fill(VariableStatus.basic);
  for (let column = 0; column < n; column++) {
    const prefersUpper = Math.abs(upper[column]) < Math.abs(lower[column]);
    status[column] = nonbasicStatus(column, lower, upper, prefersUpper);
  }
  basis.load(
    Int32Array.from({ length: m }, (_, row) => n + row),
    status,
  );
}

/**
 * Statuses as in the snapshot where the bounds allow them. Rows and columns that the snapshot lacks (added since) get
 * basic logicals and resting columns; too many basic variables give some up, too few are filled with logicals. What
 * is still singular is repaired by the first factorization.
 */
export function loadSnapshot(form: ComputationalForm, snapshot: Basis, basis: WorkingBasis): void {
  const { rowCount: m, columnCount: n, lower, upper } = form;
  const status = new Uint8Array(n + m);
  const basic: number[] = [];
  const place = (variable: number, wanted: number | undefined, otherwise: number): void => {
    const stands = wanted ?? otherwise;
    if (stands === VariableStatus.basic && basic.length < m) {
      basic.push(variable);
      status[variable] = VariableStatus.basic;
    } else {
      status[variable] = nonbasicStatus(variable, lower, upper, stands === VariableStatus.atUpper);
    }
  };
  for (let column = 0; column < n; column++)
    place(column, snapshot.columnStatus[column], VariableStatus.atLower);
  for (let row = 0; row < m; row++) place(n + row, snapshot.rowStatus[row], VariableStatus.basic);
  for (let row = 0; row < m && basic.length < m; row++) {
    if (status[n + row] === VariableStatus.basic) continue;
    status[n + row] = VariableStatus.basic;
    basic.push(n + row);
  }
  basis.load(basic, status);
}
