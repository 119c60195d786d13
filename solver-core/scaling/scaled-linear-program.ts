/**
 * A linear program with its rows, columns and costs multiplied by powers of two, and the way back for values, duals
 * and rays. With R, C the factors: A' = R A C, x' = C⁻¹ x, row activity' = R · activity, cost' = s C cost.
 */
import { nearestPowerOfTwo } from '../numerics/power-of-two';
import type { LinearProgram } from '../linear-program/linear-program';
import { geometricScaling, type ScaleFactors } from './geometric-scaling';

export class ScaledLinearProgram {
  private constructor(
    readonly problem: LinearProgram,
    private readonly factors: ScaleFactors | undefined,
    /** s: all costs are multiplied by it. */
    private readonly costFactor: number,
  ) {}

  /** The stated problem itself. */
  static unscaled(stated: LinearProgram): ScaledLinearProgram {
    return new ScaledLinearProgram(stated, undefined, 1);
  }

  static of(stated: LinearProgram): ScaledLinearProgram {
    const factors = geometricScaling(stated.matrix);
    const costFactor = chooseCostFactor(stated, factors);
    if (factors === undefined && costFactor === 1) return ScaledLinearProgram.unscaled(stated);
    const { row, column } = factors ?? {
      row: new Float64Array(stated.rowCount).fill(1),
      column: new Float64Array(stated.columnCount).fill(1),
    };
    const { columnStart, rowIndex, value } = stated.matrix;
    const scaledValue = value.slice();
    for (let j = 0; j < stated.columnCount; j++) {
      for (let entry = columnStart[j]; entry < columnStart[j + 1]; entry++) {
        scaledValue[entry] *= column[j] * row[rowIndex[entry]];
      }
    }
    const problem: LinearProgram = {
      ...stated,
      matrix: { ...stated.matrix, value: scaledValue },
      cost: stated.cost.slice().map((cost, j) => cost * column[j] * costFactor),
      rowLower: stated.rowLower.slice().map((bound, i) => bound * row[i]),
      rowUpper: stated.rowUpper.slice().map((bound, i) => bound * row[i]),
      columnLower: stated.columnLower.slice().map((bound, j) => bound / column[j]),
      columnUpper: stated.columnUpper.slice().map((bound, j) => bound / column[j]),
    };
    return new ScaledLinearProgram(problem, { row, column }, costFactor);
  }

  /** A column's value, stated. */
  statedValue(column: number, scaled: number): number {
    return this.factors === undefined ? scaled : scaled * this.factors.column[column];
  }

  /** A row's multiplier for the stated costs. */
  statedDual(row: number, scaled: number): number {
    return this.factors === undefined ? scaled : (scaled * this.factors.row[row]) / this.costFactor;
  }

  /** A row's multiplier in a Farkas ray, where costs play no part. */
  statedRayEntry(row: number, scaled: number): number {
    return this.factors === undefined ? scaled : scaled * this.factors.row[row];
  }
}

/** Brings the largest scaled cost to about 1 when it is far away: dual tolerances are absolute. */
function chooseCostFactor(stated: LinearProgram, factors: ScaleFactors | undefined): number {
  let largest = 0;
  for (let j = 0; j < stated.columnCount; j++) {
    largest = Math.max(largest, Math.abs(stated.cost[j]) * (factors?.column[j] ?? 1));
  }
  if (largest === 0 || (largest >= 1 / 64 && largest <= 1024)) return 1;
  return nearestPowerOfTwo((largest > 1 ? 1024 : 1) / largest);
}
