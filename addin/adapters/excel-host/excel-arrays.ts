/// <reference types="office-js" />
/**
 * Which cells are filled by an array formula, or by one that spills. Excel tells it cell by cell only, so it is asked
 * for those few whose neighbours make it possible.
 *
 * A cell that is filled shows either the formula of the first cell or its own value when asked for formulas: which,
 * differs between kinds of arrays. Both are taken.
 */
import type { CellRange } from '../../domain/sheet/cell-range';
import { cellRangeOf, rangeOn, type LoadedRange } from './excel-ranges';
import type { ExcelSheet } from './excel-sheet';

/** Cells asked about on one sheet: spilling formulas are few, and a question takes some hundred bytes. */
const questionLimit = 4_000;

/** A rectangle of cells that show one formula, or a single formula with a filled neighbour. */
interface Candidate {
  readonly range: CellRange;
  readonly spillsTo: LoadedRange;
  /** Asked only where several cells show one formula. */
  readonly whole: Excel.Range | undefined;
}

/** Asks about the possible arrays of a sheet; the returned function marks them once the answer is there. */
export function askForArrays(context: Excel.RequestContext, sheet: ExcelSheet): () => void {
  const candidates = candidateRanges(sheet)
    .slice(0, questionLimit)
    .map((range): Candidate => {
      const first = rangeOn(context, { ...range, bottom: range.top, right: range.left });
      const isOneCell = range.top === range.bottom && range.left === range.right;
      return {
        range,
        spillsTo: first.getSpillingToRangeOrNullObject().load('rowIndex,columnIndex,rowCount,columnCount'),
        whole: isOneCell ? undefined : rangeOn(context, range).load('savedAsArray'),
      };
    });
  return () => {
    for (const { range, spillsTo, whole } of candidates) {
      if (!spillsTo.isNullObject) sheet.markArray(cellRangeOf(range.sheet, spillsTo));
      else if (whole?.savedAsArray === true) sheet.markArray(range);
    }
  };
}

/** Where Excel cannot be asked: cells that show one and the same formula of other cells' places are one array. */
export function markArraysByText(sheet: ExcelSheet): void {
  for (const range of candidateRanges(sheet)) {
    const isOneCell = range.top === range.bottom && range.left === range.right;
    const formula = sheet.cell(range.top, range.left)?.formula ?? '';
    if (!isOneCell && hasRelativeReference(formula)) sheet.markArray(range);
  }
}

/** A copied formula with such a reference would differ from cell to cell. */
function hasRelativeReference(formula: string): boolean {
  // Texts, sheets' names and tables' columns may look like references; a table's own row shows as the same everywhere.
  let withoutTexts = formula.replace(/"[^"]*"/g, '').replace(/'(?:[^']|'')*'!/g, '');
  for (let before = ''; before !== withoutTexts;) {
    before = withoutTexts;
    withoutTexts = before.replace(/\[[^[\]]*\]/g, '');
  }
  return /(^|[^A-Za-z0-9_$.])[A-Za-z]{1,3}[0-9]{1,7}(?![A-Za-z0-9_.(])/.test(withoutTexts);
}

function candidateRanges(sheet: ExcelSheet): CellRange[] {
  const found: CellRange[] = [];
  const taken = new Set<string>();
  const formulaAt = (row: number, column: number): string | undefined => sheet.cell(row, column)?.formula;
  const isConstant = (row: number, column: number): boolean => {
    const cell = sheet.cell(row, column);
    return cell !== undefined && cell.formula === undefined;
  };
  sheet.forEachCell((top, left, { formula }) => {
    if (formula === undefined || taken.has(`${top},${left}`)) return;
    let right = left;
    while (formulaAt(top, right + 1) === formula) right++;
    let bottom = top;
    const isRowAlike = (row: number): boolean => {
      for (let column = left; column <= right; column++) if (formulaAt(row, column) !== formula) return false;
      return true;
    };
    while (isRowAlike(bottom + 1)) bottom++;
    const isOneCell = top === bottom && left === right;
    if (!isOneCell) {
      for (let row = top; row <= bottom; row++) {
        for (let column = left; column <= right; column++) taken.add(`${row},${column}`);
      }
    }
    if (!isOneCell || isConstant(top + 1, left) || isConstant(top, left + 1)) {
      found.push({ sheet: sheet.name, top, left, bottom, right });
    }
  });
  return found;
}
