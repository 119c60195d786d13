/**
 * Reads cells and ranges of the grid.
 */
import { refuseTooLarge } from './array-size';
import type { GridNode, SheetGrid } from './calculation-grid';
import { forEachNode, isConstantEntry } from './dependency-graph';
import { isDependent, Matrix, type Area, type Scalar } from './evaluated-value';

export class RangeReader {
  /** @param valueOfNode what a formula, an array part or an input is worth */
  constructor(private readonly valueOfNode: (node: GridNode) => Scalar) {}

  /** The value in a cell. */
  read(grid: SheetGrid, row: number, column: number): Scalar {
    const entry = grid.columns[column]?.entries[row];
    if (typeof entry === 'number') {
      return entry;
    }
    if (entry === undefined) {
      return null;
    }
    return isConstantEntry(entry) ? entry : this.valueOfNode(entry);
  }

  /** The whole of an area, blanks included. */
  matrixOf(area: Area): Matrix {
    const rowCount = area.bottom - area.top + 1;
    const columnCount = area.right - area.left + 1;
    refuseTooLarge(rowCount * columnCount);
    const values = new Array<Scalar>(rowCount * columnCount).fill(null);
    const lastColumn = Math.min(area.right, area.grid.columns.length - 1);
    for (let column = area.left; column <= lastColumn; column++) {
      const entries = area.grid.columns[column]?.entries;
      if (entries === undefined) {
        continue;
      }
      const lastRow = Math.min(area.bottom, entries.length - 1);
      let at = column - area.left;
      for (let row = area.top; row <= lastRow; row++, at += columnCount) {
        const entry = entries[row];
        if (entry !== undefined) {
          values[at] = isConstantEntry(entry) ? entry : this.valueOfNode(entry);
        }
      }
    }
    return new Matrix(rowCount, columnCount, values);
  }

  /** Each cell of an area that is not blank, column by column. */
  forEachFilled(area: Area, visit: (value: Scalar) => void): void {
    const lastColumn = Math.min(area.right, area.grid.columns.length - 1);
    for (let column = area.left; column <= lastColumn; column++) {
      const entries = area.grid.columns[column]?.entries;
      if (entries === undefined) {
        continue;
      }
      const lastRow = Math.min(area.bottom, entries.length - 1);
      for (let row = area.top; row <= lastRow; row++) {
        const entry = entries[row];
        if (entry === undefined) {
          continue;
        }
        const value = isConstantEntry(entry) ? entry : this.valueOfNode(entry);
        if (value !== null) {
          visit(value);
        }
      }
    }
  }

  /** Whether a cell of an area depends on decisions. Constants are not looked at. */
  containsDependent(area: Area): boolean {
    let contains = false;
    forEachNode(area.grid, area, (node) => {
      contains ||= isDependent(this.valueOfNode(node));
    });
    return contains;
  }
}
