/**
 * A basis as plain data: one status a variable of [A | −I] z = 0. Variables 0 … n − 1 are the columns,
 * n … n + m − 1 the logicals of the rows (the logical of row i equals the row's activity and has its bounds).
 */
import type { ReadonlyUint8Array } from '../numerics/typed-array-views';

/** What a variable does in a basis. */
export const VariableStatus = {
  atLower: 0,
  atUpper: 1,
  basic: 2,
  /** Nonbasic with no bound: held at 0. */
  free: 3,
} as const;

/** A snapshot to start a later solve from. Exactly m variables are basic in one that the core gives out. */
export interface Basis {
  /** Length n, values of VariableStatus. */
  readonly columnStatus: ReadonlyUint8Array;
  /** Length m, values of VariableStatus. */
  readonly rowStatus: ReadonlyUint8Array;
}
