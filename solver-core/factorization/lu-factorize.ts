/**
 * Computes the LU factors of a basis matrix: singletons are peeled off first, the rest is eliminated with Markowitz
 * pivots under a threshold.
 *
 * Source: Suhl and Suhl (1990), "Computing sparse LU factorizations for large-scale linear programming bases",
 * ORSA Journal on Computing 2; Duff, Erisman and Reid (1986), "Direct Methods for Sparse Matrices", ch. 7 and 10.
 */
import type { SparseMatrix } from '../sparse/sparse-matrix';
import { KernelElimination, type EliminationSettings } from './kernel-elimination';
import type { LuFactors } from './lu-factors';

/** What came of a factorization. */
export interface FactorizeOutcome {
  /** Variables that had to leave the basis because their columns depend on the others. */
  readonly rejectedVariables: readonly number[];
  /** Rows whose logicals took their places; as many as rejected variables. */
  readonly replacedRows: readonly number[];
  /** Work done, in units of the work meter. */
  readonly work: number;
}

export class LuFactorizer {
  private readonly kernel: KernelElimination;
  /** Length m. For each position in the basis, the row it was pivoted on, or −1. */
  private readonly rowOfPosition: Int32Array;
  /** Length m: 1 once a row has its pivot. */
  private readonly isRowDone: Uint8Array;
  private readonly patternStart: Int32Array;
  private patternPosition = new Int32Array(64);
  private readonly activeInColumn: Int32Array;
  private readonly activeInRow: Int32Array;
  private readonly queue: Int32Array;
  private work = 0;

  constructor(
    private readonly matrix: SparseMatrix,
    private readonly factors: LuFactors,
  ) {
    const m = matrix.rowCount;
    this.kernel = new KernelElimination(m, factors);
    this.rowOfPosition = new Int32Array(m);
    this.isRowDone = new Uint8Array(m);
    this.patternStart = new Int32Array(m + 1);
    this.activeInColumn = new Int32Array(m);
    this.activeInRow = new Int32Array(m);
    this.queue = new Int32Array(2 * m);
  }

  /**
   * Factorizes the basis and reorders it so that `basicVariable[row]` is the variable pivoted on that row.
   * @param basicVariable length m, changed in place; a variable k ≥ n is the logical of row k − n, column −e
   */
  factorize(basicVariable: Int32Array, settings: EliminationSettings): FactorizeOutcome {
    const { matrix, factors } = this;
    const m = matrix.rowCount;
    factors.reset();
    this.rowOfPosition.fill(-1);
    this.isRowDone.fill(0);
    this.kernel.reset();
    this.work = m;

    this.pivotLogicals(basicVariable);
    this.countActiveEntries(basicVariable);
    this.peelSingletons(basicVariable, settings);
    const positions = this.loadKernel(basicVariable);
    if (positions.length > 0) {
      this.work += this.kernel.run(positions, this.isRowDone, this.rowOfPosition, settings);
    }

    const rejectedVariables: number[] = [];
    const replacedRows: number[] = [];
    const newHead = new Int32Array(m).fill(-1);
    for (let position = 0; position < m; position++) {
      const row = this.rowOfPosition[position];
      if (row >= 0) newHead[row] = basicVariable[position];
      else rejectedVariables.push(basicVariable[position]);
    }
    for (let row = 0; row < m; row++) {
      if (newHead[row] >= 0) continue;
      newHead[row] = matrix.columnCount + row;
      replacedRows.push(row);
      this.pivotOnLogical(row);
    }
    basicVariable.set(newHead);
    factors.buildRowCopies();
    this.work += 2 * (factors.lowerSize + factors.upperSize);
    return { rejectedVariables, replacedRows, work: this.work };
  }

  private pivotOnLogical(row: number): void {
    const { factors } = this;
    factors.lowerStart[row] = factors.lowerEnd[row] = factors.lowerSize;
    factors.upperStart[row] = factors.upperEnd[row] = factors.upperSize;
    factors.diagonal[row] = -1;
    factors.appendToUpperOrder(row);
    this.isRowDone[row] = 1;
  }

  private pivotLogicals(basicVariable: Int32Array): void {
    const n = this.matrix.columnCount;
    for (let position = 0; position < basicVariable.length; position++) {
      const row = basicVariable[position] - n;
      if (row < 0) continue;
      this.pivotOnLogical(row);
      this.rowOfPosition[position] = row;
    }
  }

  /** Counts the entries in rows without a pivot and lists, by rows, the positions that have them. */
  private countActiveEntries(basicVariable: Int32Array): void {
    const { columnStart, rowIndex, columnCount: n, rowCount: m } = this.matrix;
    const { patternStart, activeInColumn, activeInRow, isRowDone } = this;
    activeInRow.fill(0);
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      activeInColumn[position] = 0;
      if (variable >= n) continue;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 1) continue;
        activeInColumn[position]++;
        activeInRow[row]++;
      }
    }
    let total = 0;
    for (let row = 0; row < m; row++) {
      patternStart[row] = total;
      total += activeInRow[row];
    }
    patternStart[m] = total;
    if (this.patternPosition.length < total) this.patternPosition = new Int32Array(total + (total >> 1));
    const place = this.queue; // not in use yet
    for (let row = 0; row < m; row++) place[row] = patternStart[row];
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      if (variable >= n) continue;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 0) this.patternPosition[place[row]++] = position;
      }
    }
    this.work += 2 * total;
  }

  /**
   * Pivots on columns with one entry left (their column of L is empty) and on rows with one entry left (their column
   * of L needs no update of others), until there are none.
   */
  private peelSingletons(basicVariable: Int32Array, settings: EliminationSettings): void {
    const { columnCount: n, rowCount: m, columnStart, rowIndex, value } = this.matrix;
    const { queue, activeInColumn, activeInRow, isRowDone, rowOfPosition, patternStart, patternPosition } =
      this;
    let queueEnd = 0;
    // Positions are queued as they are, rows as −1 − row.
    for (let position = 0; position < m; position++) {
      if (basicVariable[position] < n && activeInColumn[position] === 1) queue[queueEnd++] = position;
    }
    for (let row = 0; row < m; row++) {
      if (isRowDone[row] === 0 && activeInRow[row] === 1) queue[queueEnd++] = -1 - row;
    }
    for (let head = 0; head < queueEnd; head++) {
      let position = queue[head];
      let row = -1;
      if (position >= 0) {
        if (rowOfPosition[position] >= 0 || activeInColumn[position] !== 1) continue;
        const variable = basicVariable[position];
        for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
          if (isRowDone[rowIndex[entry]] === 0) row = rowIndex[entry];
        }
      } else {
        row = -1 - position;
        if (isRowDone[row] === 1 || activeInRow[row] !== 1) continue;
        for (let at = patternStart[row]; at < patternStart[row + 1]; at++) {
          if (rowOfPosition[patternPosition[at]] < 0) position = patternPosition[at];
        }
      }
      const variable = basicVariable[position];
      let pivot = 0;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        if (rowIndex[entry] === row) pivot = value[entry];
      }
      if (Math.abs(pivot) < settings.singularPivot) continue;
      this.storeSingleton(variable, row, pivot);
      rowOfPosition[position] = row;
      isRowDone[row] = 1;
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const other = rowIndex[entry];
        if (isRowDone[other] === 0 && --activeInRow[other] === 1 && queueEnd < queue.length)
          queue[queueEnd++] = -1 - other;
      }
      for (let at = patternStart[row]; at < patternStart[row + 1]; at++) {
        const other = patternPosition[at];
        if (rowOfPosition[other] < 0 && --activeInColumn[other] === 1 && queueEnd < queue.length)
          queue[queueEnd++] = other;
      }
      this.work +=
        columnStart[variable + 1] - columnStart[variable] + patternStart[row + 1] - patternStart[row];
    }
  }

  /** Rows already done make up U's column, those still active L's. */
  private storeSingleton(variable: number, row: number, pivot: number): void {
    const { columnStart, rowIndex, value } = this.matrix;
    const { factors, isRowDone } = this;
    const length = columnStart[variable + 1] - columnStart[variable];
    factors.reserveLower(length);
    factors.reserveUpper(length);
    const { lowerIndex, lowerValue, upperIndex, upperValue } = factors;
    let lower = (factors.lowerStart[row] = factors.lowerSize);
    let upper = (factors.upperStart[row] = factors.upperSize);
    for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
      const at = rowIndex[entry];
      if (at === row) continue;
      if (isRowDone[at] === 1) {
        upperIndex[upper] = at;
        upperValue[upper++] = value[entry];
      } else {
        lowerIndex[lower] = at;
        lowerValue[lower++] = value[entry] / pivot;
      }
    }
    if (lower > factors.lowerSize) factors.lowerOrder[factors.lowerCount++] = row;
    factors.lowerSize = factors.lowerEnd[row] = lower;
    factors.upperSize = factors.upperEnd[row] = upper;
    factors.diagonal[row] = pivot;
    factors.appendToUpperOrder(row);
  }

  /** Hands what singletons left over to the kernel. @returns its positions, ascending */
  private loadKernel(basicVariable: Int32Array): number[] {
    const { columnCount: n, rowCount: m, columnStart, rowIndex, value } = this.matrix;
    const { kernel, isRowDone, rowOfPosition, activeInColumn, activeInRow } = this;
    const positions: number[] = [];
    for (let row = 0; row < m; row++) {
      if (isRowDone[row] === 0) kernel.openRow(row, activeInRow[row]);
    }
    for (let position = 0; position < m; position++) {
      const variable = basicVariable[position];
      if (variable >= n || rowOfPosition[position] >= 0) continue;
      positions.push(position);
      kernel.openColumn(position, activeInColumn[position]);
      for (let entry = columnStart[variable]; entry < columnStart[variable + 1]; entry++) {
        const row = rowIndex[entry];
        if (isRowDone[row] === 1) kernel.addUpperEntry(position, row, value[entry]);
        else kernel.addActiveEntry(row, position, value[entry]);
      }
    }
    return positions;
  }
}
