/**
 * Which cells formulas refer to, as far as their text tells.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { DefinedName } from '../sheet/defined-name';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { formulaCacheOf, type FormulaCache } from './formula-cache';
import type { FormulaNode, ParsedFormula } from './formula-syntax';
import { isReferenceFault, rangeOfNode, rangeOfTable } from './static-ranges';
import { workbookIndexOf, type WorkbookIndex } from './workbook-index';

export interface FormulaReferences {
  /** Whole columns and rows reach to the last row or column that holds anything. */
  readonly ranges: readonly CellRange[];
  /** A part of what it refers to is known only once it is calculated (OFFSET, INDIRECT, `A1:INDEX(…)`). */
  readonly hasComputedRanges: boolean;
}

/** Names behind one formula; names that lead to names are walked by calls. */
const maximumNameCount = 500;

/** @param text without the leading `=`; a formula that cannot be read refers to nothing */
export function referencesOfFormula(
  workbook: WorkbookSnapshot,
  text: string,
  home: CellAddress,
): FormulaReferences {
  const ranges: CellRange[] = [];
  const cache = formulaCacheOf(workbook);
  const parsed = cache.parse(text, home);
  const hasComputedRanges =
    parsed.kind === 'formula' &&
    collectRanges(parsed, workbookIndexOf(workbook), cache, home, new Set(), (range) => ranges.push(range));
  return { ranges, hasComputedRanges };
}

/** Visits every range that some formula cell or defined name of the workbook refers to; the same one maybe often. */
export function forEachRangeReferredTo(workbook: WorkbookSnapshot, visit: (range: CellRange) => void): void {
  const cache = formulaCacheOf(workbook);
  const index = workbookIndexOf(workbook);
  const visitFormula = (text: string, home: CellAddress): void => {
    const parsed = cache.parse(text, home);
    if (parsed.kind === 'formula') {
      collectRanges(parsed, index, cache, home, new Set(), visit);
    }
  };
  for (const sheet of workbook.sheets) {
    sheet.forEachCell((row, column, cell) => {
      if (cell.formula !== undefined) {
        visitFormula(cell.formula, { sheet: sheet.name, row, column });
      }
    });
  }
  for (const name of workbook.names) {
    visitFormula(name.formula, { sheet: name.scope ?? '', row: 0, column: 0 });
  }
}

/** @returns whether a part is known only once it is calculated */
function collectRanges(
  parsed: ParsedFormula,
  index: WorkbookIndex,
  cache: FormulaCache,
  home: CellAddress,
  seenNames: Set<DefinedName>,
  visit: (range: CellRange) => void,
): boolean {
  let hasComputedRanges = false;
  const visitNode = (node: FormulaNode): void => {
    switch (node.kind) {
      case 'cell':
      case 'range':
      case 'table': {
        const range =
          node.kind === 'table' ? rangeOfTable(node, index, home) : rangeOfNode(node, index, home);
        if (!isReferenceFault(range)) {
          visit(range);
        }
        return;
      }
      case 'name': {
        const definedName = index.definedName(node.name, node.sheet ?? home.sheet);
        if (definedName === undefined || seenNames.has(definedName) || seenNames.size >= maximumNameCount) {
          return;
        }
        seenNames.add(definedName);
        const named = cache.parse(definedName.formula, { row: 0, column: 0 });
        if (named.kind === 'formula') {
          hasComputedRanges = collectRanges(named, index, cache, home, seenNames, visit) || hasComputedRanges;
        }
        return;
      }
      default:
        hasComputedRanges = true;
    }
  };
  parsed.references.forEach(visitNode);
  return hasComputedRanges;
}
