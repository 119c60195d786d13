/**
 * Owner of which variable is basic in each position, and of every variable's status. Positions are rows of the matrix
 * (see factorization/basis-factorization.ts); a refactorization reorders them.
 */
import { VariableStatus, type Basis } from '../linear-program/basis';
import type {
  ReadonlyFloat64Array,
  ReadonlyInt32Array,
  ReadonlyUint8Array,
} from '../numerics/typed-array-views';

/** Nonbasic with equal bounds: never a candidate for anything. Known inside the simplex only; snapshots say atLower. */
export const nonbasicFixed = 4;

export class WorkingBasis {
  private readonly basic: Int32Array;
  private readonly statuses: Uint8Array;

  constructor(
    readonly rowCount: number,
    readonly columnCount: number,
  ) {
    this.basic = new Int32Array(rowCount);
    this.statuses = new Uint8Array(rowCount + columnCount);
  }

  /** Length m: variable that is basic in each position. */
  get basicVariable(): ReadonlyInt32Array {
    return this.basic;
  }

  /** Length n + m: values of VariableStatus, or nonbasicFixed. */
  get status(): ReadonlyUint8Array {
    return this.statuses;
  }

  /** Replaces everything; `basic` lists exactly m variables. */
  load(basic: readonly number[] | Int32Array, statuses: ReadonlyUint8Array): void {
    this.basic.set(basic);
    for (let k = 0; k < this.statuses.length; k++) this.statuses[k] = statuses[k];
  }

  /** Lets the factorization reorder (and repair) the basis in place. */
  reorder(change: (basic: Int32Array) => void): void {
    change(this.basic);
  }

  setStatus(variable: number, status: number): void {
    this.statuses[variable] = status;
  }

  /** `entering` becomes basic in `position`, the variable that was there nonbasic with `leavingStatus`. */
  replace(position: number, entering: number, leavingStatus: number): void {
    this.statuses[this.basic[position]] = leavingStatus;
    this.basic[position] = entering;
    this.statuses[entering] = VariableStatus.basic;
  }

  snapshot(): Basis {
    const statuses = this.statuses.map((status) =>
      status === nonbasicFixed ? VariableStatus.atLower : status,
    );
    return { columnStatus: statuses.slice(0, this.columnCount), rowStatus: statuses.slice(this.columnCount) };
  }
}

/** Where a nonbasic variable stands with these bounds: at the bound wanted, else at the one there is, else free. */
export function nonbasicStatus(
  variable: number,
  lower: ReadonlyFloat64Array,
  upper: ReadonlyFloat64Array,
  prefersUpper: boolean,
): number {
  if (lower[variable] === upper[variable]) return nonbasicFixed;
  const hasLower = lower[variable] > -Infinity;
  const hasUpper = upper[variable] < Infinity;
  if (hasLower && (!prefersUpper || !hasUpper)) return VariableStatus.atLower;
  if (hasUpper) return VariableStatus.atUpper;
  return VariableStatus.free;
}
