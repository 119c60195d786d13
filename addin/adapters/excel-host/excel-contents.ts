/// <reference types="office-js" />
/**
 * What cells hold at present, from a range that was loaded with values, formulas and valueTypes.
 */
import type { CellAddress } from '../../domain/sheet/cell-address';
import { cellsOf, type CellRange } from '../../domain/sheet/cell-range';
import type { CellContent } from './excel-journal';
import { formulaOf, valueOf } from './excel-sheet';

/** The properties to load. */
export const contentProperties = 'values,formulas,valueTypes';

/** Row by row. */
export function contentsOf(
  range: CellRange,
  loaded: Excel.Range,
): { readonly cell: CellAddress; readonly content: CellContent }[] {
  // The library looks its requirement sets up at every reading of a property, so each is read once.
  const { values, formulas, valueTypes } = loaded;
  return cellsOf(range).map((cell) => {
    const [down, across] = [cell.row - range.top, cell.column - range.left];
    const value: unknown = values[down][across];
    const formula = formulaOf(formulas[down][across], value);
    const type = valueTypes[down][across];
    return { cell, content: { value: valueOf(value, type, formula !== undefined), formula } };
  });
}
