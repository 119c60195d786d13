/**
 * Owner of what postsolve restores: values, multipliers and statuses of rows and columns, by their stated numbers and
 * to be minimised. At every moment those of the active rows and columns form a basic solution of the problem as it
 * stood between two reductions; each undo makes it one of the problem before its own.
 *
 * The same undos carry three kinds of thing back, told apart by two factors, so that no reduction needs to know:
 *
 *   a solution        costs and bounds as they are
 *   a Farkas ray      costs 0: the multipliers of a problem without objective. Statuses are by the signs: what uses a
 *                     lower bound is at lower, what uses an upper bound at upper, and what is 0 is basic.
 *   an unbounded ray  bounds 0 where there are any: the rates at which values may move. All statuses are basic.
 */
import { VariableStatus } from '../linear-program/basis';
import { CompensatedSum } from '../numerics/compensated-sum';
import type { ReadonlyFloat64Array, ReadonlyUint8Array } from '../numerics/typed-array-views';
import type { SavedEntries, Span } from './saved-entries';

export type RestoredKind = 'solution' | 'farkas ray' | 'unbounded ray';

/** Bound that holds a nonbasic variable. */
export type Side = 'lower' | 'upper';

export class PostsolveSolution {
  private readonly values: Float64Array;
  private readonly duals: Float64Array;
  private readonly reduced: Float64Array;
  private readonly statusOfColumn: Uint8Array;
  private readonly statusOfRow: Uint8Array;
  private readonly scratchSum = new CompensatedSum();

  constructor(
    rowCount: number,
    columnCount: number,
    readonly kind: RestoredKind,
    private readonly entries: SavedEntries,
  ) {
    this.values = new Float64Array(columnCount);
    this.duals = new Float64Array(rowCount);
    this.reduced = new Float64Array(columnCount);
    this.statusOfColumn = new Uint8Array(columnCount);
    this.statusOfRow = new Uint8Array(rowCount);
  }

  /** Length n. */
  get x(): ReadonlyFloat64Array {
    return this.values;
  }

  /** Length m: reduced costs of the logicals; positive at a lower bound when optimal. */
  get rowDuals(): ReadonlyFloat64Array {
    return this.duals;
  }

  /** Length n: cost − Aᵀ y. */
  get reducedCosts(): ReadonlyFloat64Array {
    return this.reduced;
  }

  get columnStatus(): ReadonlyUint8Array {
    return this.statusOfColumn;
  }

  get rowStatus(): ReadonlyUint8Array {
    return this.statusOfRow;
  }

  setColumn(column: number, value: number, reducedCost: number, status: number): void {
    this.values[column] = value;
    this.reduced[column] = reducedCost;
    this.statusOfColumn[column] = status;
  }

  setRow(row: number, dual: number, status: number): void {
    this.duals[row] = dual;
    this.statusOfRow[row] = status;
  }

  /** A cost as it counts here. */
  cost(cost: number): number {
    return this.kind === 'farkas ray' ? 0 : cost;
  }

  /** A bound, right side or fixed value as it counts here; an infinite one stays. */
  bound(bound: number): number {
    return this.kind === 'unbounded ray' && Number.isFinite(bound) ? 0 : bound;
  }

  /** Σ value × x over the saved entries of a row. */
  activity(span: Span): number {
    const sum = this.scratchSum;
    sum.reset();
    for (let k = span.start; k < span.end; k++) {
      sum.addProduct(this.entries.value(k), this.values[this.entries.index(k)]);
    }
    return sum.value;
  }

  /** (rightSide − activity of the others) / pivot: the value by which a row reaches its right side. */
  solvedFor(pivot: number, rightSide: number, others: Span): number {
    return (this.bound(rightSide) - this.activity(others)) / pivot;
  }

  /** cost − Σ value × dual over the saved entries of a column. */
  reducedCost(cost: number, span: Span): number {
    const sum = this.scratchSum;
    sum.reset();
    sum.add(this.cost(cost));
    for (let k = span.start; k < span.end; k++) {
      sum.addProduct(-this.entries.value(k), this.duals[this.entries.index(k)]);
    }
    return sum.value;
  }

  /**
   * The bound that holds a column; undefined for a basic or free one. Where both bounds are one number, the sign of
   * the reduced cost tells which of them is meant: they may stem from different rows.
   */
  sideOfColumn(column: number, isFixed: boolean): Side | undefined {
    return sideOf(this.statusOfColumn[column], this.reduced[column], isFixed);
  }

  /** The same of a row's logical. */
  sideOfRow(row: number, isEquation: boolean): Side | undefined {
    return sideOf(this.statusOfRow[row], this.duals[row], isEquation);
  }
}

function sideOf(status: number, multiplier: number, isFixed: boolean): Side | undefined {
  if (status !== VariableStatus.atLower && status !== VariableStatus.atUpper) return undefined;
  if (isFixed && multiplier !== 0) return multiplier > 0 ? 'lower' : 'upper';
  return status === VariableStatus.atLower ? 'lower' : 'upper';
}

/** The status of a nonbasic variable on this side. */
export function statusAt(side: Side): number {
  return side === 'lower' ? VariableStatus.atLower : VariableStatus.atUpper;
}

/** The status of a nonbasic variable that is held by both bounds at once, by the sign of its multiplier. */
export function statusWhenFixed(multiplier: number): number {
  return multiplier < 0 ? VariableStatus.atUpper : VariableStatus.atLower;
}
