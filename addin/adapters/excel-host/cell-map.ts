/**
 * Something for each of many cells, looked up without making a text of every address.
 */
import { cellKey, type CellAddress } from '../../domain/sheet/cell-address';

export class CellMap<T> {
  private readonly sheets = new Map<string, Map<number, T>>();

  get(cell: CellAddress): T | undefined {
    return this.sheets.get(cell.sheet)?.get(cellKey(cell.row, cell.column));
  }

  set(cell: CellAddress, value: T): void {
    let ofSheet = this.sheets.get(cell.sheet);
    if (ofSheet === undefined) {
      ofSheet = new Map();
      this.sheets.set(cell.sheet, ofSheet);
    }
    ofSheet.set(cellKey(cell.row, cell.column), value);
  }
}
