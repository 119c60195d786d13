/**
 * One workbook's parsed formulas. Formulas that mean the same seen from their cells are parsed once (see
 * relative-key.ts). Kept as long as the snapshot itself is.
 */
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { parseFormula, type FormulaPlace } from './parse-formula';
import { childrenOf, type FormulaNode, type FormulaSyntaxIssue, type ParsedFormula } from './formula-syntax';
import { relativeKey } from './relative-key';

export class FormulaCache {
  private readonly byKey = new Map<string, ParsedFormula | FormulaSyntaxIssue>();
  private readonly definedNames: ReadonlySet<string>;

  constructor(workbook: WorkbookSnapshot) {
    this.definedNames = new Set([
      ...workbook.names.map((name) => name.name.toLowerCase()),
      ...workbook.tables.map((table) => table.name.toLowerCase()),
    ]);
  }

  /** @param text without the leading `=` */
  parse(text: string, place: FormulaPlace): ParsedFormula | FormulaSyntaxIssue {
    const { key, referenceCount } = relativeKey(text, place.row, place.column);
    const known = this.byKey.get(key);
    if (known !== undefined) {
      return known;
    }
    // The key is cut by a scan of its own. Where that scan and the parser do not see the same references, the tree
    // is good for this one cell only.
    const ownKey = `${text}\u0000${place.row},${place.column}`;
    const knownAlone = this.byKey.get(ownKey);
    if (knownAlone !== undefined) {
      return knownAlone;
    }
    const parsed = parseFormula(text, place, (name) => this.definedNames.has(name.toLowerCase()));
    const isShared = parsed.kind === 'syntax-issue' || cornerCount(parsed) === referenceCount;
    this.byKey.set(isShared ? key : ownKey, parsed);
    return parsed;
  }
}

const caches = new WeakMap<WorkbookSnapshot, FormulaCache>();

/** The cache that goes with a snapshot: everyone who reads it shares the parsed formulas. */
export function formulaCacheOf(workbook: WorkbookSnapshot): FormulaCache {
  let cache = caches.get(workbook);
  if (cache === undefined) {
    cache = new FormulaCache(workbook);
    caches.set(workbook, cache);
  }
  return cache;
}

/** Cells written in a formula, a range's two corners counted apart; whole rows and columns not at all. */
function cornerCount(parsed: ParsedFormula): number {
  let count = 0;
  const pending: FormulaNode[] = [parsed.tree];
  while (pending.length > 0) {
    const node = pending.pop()!;
    switch (node.kind) {
      case 'cell':
        count++;
        break;
      case 'range':
        count += node.first.row === null || node.first.column === null ? 0 : 2;
        break;
      default:
        pending.push(...childrenOf(node));
    }
  }
  return count;
}
