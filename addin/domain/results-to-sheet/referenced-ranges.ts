/**
 * Cells that mean something to the workbook though they may be blank: those that a formula refers to (a value written
 * there would change its result), and those that a defined name calls its own.
 */
import type { CellRange } from '../sheet/cell-range';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { referencesOfFormula } from '../formula/formula-references';

/**
 * What is printed and which rows repeat on each page is no block of cells: a print area holds whatever stands in it,
 * and repeated rows reach across the whole sheet.
 */
const printNames = /^_xlnm\.Print_(Area|Titles)$/i;

/**
 * Visits every range on the given sheets that a formula or a defined name refers to; the same range maybe often, and
 * ranges of other sheets maybe as well. Tables are not looked at: they are in nobody's way twice.
 */
export function forEachMeaningfulRange(
  workbook: WorkbookSnapshot,
  sheetNames: ReadonlySet<string>,
  visit: (range: CellRange) => void,
): void {
  // A formula of another sheet can mean these only by their name, as it is typed in formulas, or by a defined name,
  // whose ranges are visited below. Most formulas of a large workbook need not be taken apart.
  const spellings = [...sheetNames].map((name) => name.replaceAll("'", "''").toLowerCase());
  const mentionsThem = (formula: string): boolean => {
    const text = formula.toLowerCase();
    return spellings.some((spelling) => text.includes(spelling));
  };
  for (const sheet of workbook.sheets) {
    const isOneOfThem = sheetNames.has(sheet.name);
    sheet.forEachCell((row, column, cell) => {
      if (cell.formula !== undefined && (isOneOfThem || mentionsThem(cell.formula))) {
        const home = { sheet: sheet.name, row, column };
        referencesOfFormula(workbook, cell.formula, home).ranges.forEach(visit);
      }
    });
  }
  for (const name of workbook.names) {
    if (!printNames.test(name.name)) {
      const home = { sheet: name.scope ?? '', row: 0, column: 0 };
      referencesOfFormula(workbook, name.formula, home).ranges.forEach(visit);
    }
  }
}
