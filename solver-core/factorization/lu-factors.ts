/**
 * Storage of the factors of a basis matrix: B = L · R₁⁻¹ ⋯ Rₖ⁻¹ · U after k updates, up to row and column order.
 *
 * Everything is indexed by rows of the matrix. A column of the basis is known by the row it was pivoted on, and so is
 * its column of L and of U; the order of pivots is kept apart. An update puts a row at the end of U's order and leaves
 * everything else where it is (Forrest and Tomlin 1972; the arrangement after Suhl and Suhl 1993).
 *
 *   L:  unit lower triangular in the order `lowerOrder`; column p holds the multipliers below its pivot.
 *   R:  row transformations of the updates, in order; each changes one row.
 *   U:  upper triangular in the order `upperOrder`; column p holds its diagonal apart and the entries above it; a copy
 *       by rows serves the transposed solves.
 */
import { grownFloat64, grownInt32 } from '../numerics/growable-arrays';

export class LuFactors {
  // --- L by columns; column p: lowerStart[p] … lowerEnd[p] − 1
  readonly lowerStart: Int32Array;
  readonly lowerEnd: Int32Array;
  lowerIndex = new Int32Array(64);
  lowerValue = new Float64Array(64);
  lowerSize = 0;
  /** Pivot rows with a column of L that is not empty, in the order of elimination. */
  readonly lowerOrder: Int32Array;
  lowerCount = 0;
  // --- L by rows; row p: the columns q in which p has a multiplier
  readonly lowerRowStart: Int32Array;
  readonly lowerRowEnd: Int32Array;
  lowerRowIndex = new Int32Array(64);
  lowerRowValue = new Float64Array(64);

  // --- U by columns
  readonly upperStart: Int32Array;
  readonly upperEnd: Int32Array;
  upperIndex = new Int32Array(64);
  upperValue = new Float64Array(64);
  upperSize = 0;
  /** Diagonal of U by pivot row. */
  readonly diagonal: Float64Array;
  /** Pivot rows in U's order; −1 where an update has moved one to the end. */
  upperOrder: Int32Array<ArrayBuffer>;
  upperCount = 0;
  /** Place of each pivot row in upperOrder. */
  readonly upperPlace: Int32Array;
  // --- U by rows, with room to grow; row p: upperRowStart[p] … upperRowEnd[p] − 1, room to upperRowLimit[p]
  readonly upperRowStart: Int32Array;
  readonly upperRowEnd: Int32Array;
  readonly upperRowLimit: Int32Array;
  upperRowIndex = new Int32Array(64);
  upperRowValue = new Float64Array(64);
  upperRowSize = 0;

  // --- R: update u changes row etaRow[u] by etaStart[u] … etaStart[u + 1] − 1
  etaRow = new Int32Array(64);
  etaStart = new Int32Array(65);
  etaIndex = new Int32Array(64);
  etaValue = new Float64Array(64);
  etaCount = 0;

  /** Length m, all 0 between updates. */
  readonly scratchColumn: Float64Array;

  constructor(
    /** m: order of the basis matrix. */
    readonly rowCount: number,
  ) {
    const m = rowCount;
    this.scratchColumn = new Float64Array(m);
    this.lowerStart = new Int32Array(m);
    this.lowerEnd = new Int32Array(m);
    this.lowerOrder = new Int32Array(m);
    this.lowerRowStart = new Int32Array(m);
    this.lowerRowEnd = new Int32Array(m);
    this.upperStart = new Int32Array(m);
    this.upperEnd = new Int32Array(m);
    this.diagonal = new Float64Array(m);
    this.upperOrder = new Int32Array(2 * m + 64);
    this.upperPlace = new Int32Array(m);
    this.upperRowStart = new Int32Array(m);
    this.upperRowEnd = new Int32Array(m);
    this.upperRowLimit = new Int32Array(m);
  }

  /** Empties everything, keeping the storage. */
  reset(): void {
    this.lowerStart.fill(0);
    this.lowerEnd.fill(0);
    this.lowerSize = 0;
    this.lowerCount = 0;
    this.upperStart.fill(0);
    this.upperEnd.fill(0);
    this.upperSize = 0;
    this.upperCount = 0;
    this.upperRowSize = 0;
    this.etaCount = 0;
    this.etaStart[0] = 0;
  }

  reserveLower(additional: number): void {
    this.lowerIndex = grownInt32(this.lowerIndex, this.lowerSize + additional);
    this.lowerValue = grownFloat64(this.lowerValue, this.lowerSize + additional);
  }

  reserveUpper(additional: number): void {
    this.upperIndex = grownInt32(this.upperIndex, this.upperSize + additional);
    this.upperValue = grownFloat64(this.upperValue, this.upperSize + additional);
  }

  /** Puts a pivot row at the end of U's order. */
  appendToUpperOrder(row: number): void {
    this.upperOrder = grownInt32(this.upperOrder, this.upperCount + 1);
    this.upperPlace[row] = this.upperCount;
    this.upperOrder[this.upperCount++] = row;
  }

  /** Makes the copies of L and U by rows, once the columns are complete. */
  buildRowCopies(): void {
    this.buildLowerRows();
    this.buildUpperRows();
  }

  private buildLowerRows(): void {
    const { rowCount, lowerStart, lowerEnd, lowerIndex, lowerValue, lowerRowStart, lowerRowEnd } = this;
    this.lowerRowIndex = grownInt32(this.lowerRowIndex, this.lowerSize);
    this.lowerRowValue = grownFloat64(this.lowerRowValue, this.lowerSize);
    lowerRowEnd.fill(0);
    for (let entry = 0; entry < this.lowerSize; entry++) lowerRowEnd[lowerIndex[entry]]++;
    let at = 0;
    for (let row = 0; row < rowCount; row++) {
      const count = lowerRowEnd[row];
      lowerRowStart[row] = at;
      lowerRowEnd[row] = at;
      at += count;
    }
    for (let k = 0; k < this.lowerCount; k++) {
      const pivotRow = this.lowerOrder[k];
      for (let entry = lowerStart[pivotRow]; entry < lowerEnd[pivotRow]; entry++) {
        const place = lowerRowEnd[lowerIndex[entry]]++;
        this.lowerRowIndex[place] = pivotRow;
        this.lowerRowValue[place] = lowerValue[entry];
      }
    }
  }

  private buildUpperRows(): void {
    const {
      rowCount,
      upperStart,
      upperEnd,
      upperIndex,
      upperValue,
      upperRowStart,
      upperRowEnd,
      upperRowLimit,
    } = this;
    upperRowEnd.fill(0);
    for (let entry = 0; entry < this.upperSize; entry++) upperRowEnd[upperIndex[entry]]++;
    let at = 0;
    for (let row = 0; row < rowCount; row++) {
      const count = upperRowEnd[row];
      upperRowStart[row] = at;
      upperRowEnd[row] = at;
      at += count + 4; // room for a few entries of updates before the row has to move
      upperRowLimit[row] = at;
    }
    this.upperRowIndex = grownInt32(this.upperRowIndex, at);
    this.upperRowValue = grownFloat64(this.upperRowValue, at);
    this.upperRowSize = at;
    for (let k = 0; k < this.upperCount; k++) {
      const pivotRow = this.upperOrder[k];
      for (let entry = upperStart[pivotRow]; entry < upperEnd[pivotRow]; entry++) {
        const place = upperRowEnd[upperIndex[entry]]++;
        this.upperRowIndex[place] = pivotRow;
        this.upperRowValue[place] = upperValue[entry];
      }
    }
  }
}
