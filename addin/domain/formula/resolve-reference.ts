/**
 * What a defined name, or a reference typed as text, points at, without calculating anything.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { DefinedName } from '../sheet/defined-name';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { formulaCacheOf } from './formula-cache';
import type { BinaryNode, FormulaNode, UnaryNode } from './formula-syntax';
import type { RangeResolution } from './range-resolution';
import { isReferenceFault, rangeOfNode, rangeOfTable, type ReferenceFault } from './static-ranges';
import { workbookIndexOf, type WorkbookIndex } from './workbook-index';

/** Names that lead to names, in all: more than this is a name that leads back to itself. */
const maximumNames = 500;

/** Functions that can give a range; which one, only calculation tells. */
const rangeFunctions = new Set([
  'CHOOSE',
  'DROP',
  'IF',
  'IFS',
  'INDEX',
  'INDIRECT',
  'OFFSET',
  'SWITCH',
  'TAKE',
  'TRIMRANGE',
  'XLOOKUP',
]);

interface Lookup {
  readonly workbook: WorkbookSnapshot;
  readonly index: WorkbookIndex;
  readonly home: CellAddress;
  readonly hasHome: boolean;
  /** Names followed so far. */
  readonly followed: { count: number };
}

/** Relative references in a name are taken as they are written, that is as seen from A1. */
export function resolveName(workbook: WorkbookSnapshot, definedName: DefinedName): RangeResolution {
  return resolveText(definedName.formula, {
    workbook,
    index: workbookIndexOf(workbook),
    home: { sheet: definedName.scope ?? '', row: 0, column: 0 },
    hasHome: definedName.scope !== null,
    followed: { count: 0 },
  });
}

/**
 * @param text `A1:B5`, `Plan!B2`, `Costs[Clay]`, a name; a leading `=` may stand or not
 * @param homeSheet the sheet that a reference without one is on; null where there is none
 */
export function resolveReferenceText(
  workbook: WorkbookSnapshot,
  text: string,
  homeSheet: string | null,
): RangeResolution {
  return resolveText(text, {
    workbook,
    index: workbookIndexOf(workbook),
    home: { sheet: homeSheet ?? '', row: 0, column: 0 },
    hasHome: homeSheet !== null,
    followed: { count: 0 },
  });
}

function resolveText(text: string, lookup: Lookup): RangeResolution {
  const parsed = formulaCacheOf(lookup.workbook).parse(text.replace(/^\s*=/, ''), { row: 0, column: 0 });
  return parsed.kind === 'formula' ? resolveNode(parsed.tree, lookup) : { kind: 'not-a-range' };
}

function resolveNode(node: FormulaNode, lookup: Lookup): RangeResolution {
  switch (node.kind) {
    case 'number':
    case 'text':
    case 'boolean':
      return { kind: 'constant', value: node.value };
    case 'error':
      return node.error.code === '#REF!' ? { kind: 'dead' } : { kind: 'not-a-range' };
    case 'cell':
    case 'range':
      return node.sheet === null && !lookup.hasHome
        ? { kind: 'not-a-range' }
        : resolutionOf(rangeOfNode(node, lookup.index, lookup.home));
    case 'table':
      return resolutionOf(rangeOfTable(node, lookup.index, lookup.home));
    case 'name':
      return resolveNameText(node.name, node.sheet, lookup);
    case 'external':
      return { kind: 'external' };
    case 'unary':
      return resolveUnary(node, lookup);
    case 'binary':
      return resolveBinary(node, lookup);
    case 'call':
      return rangeFunctions.has(node.name)
        ? { kind: 'computed', functionName: node.name }
        : { kind: 'not-a-range' };
    case 'let':
    case 'invocation':
      return { kind: 'computed', functionName: node.kind === 'let' ? 'LET' : 'LAMBDA' };
    case 'omitted':
    case 'sheets':
    case 'array':
    case 'lambda':
      return { kind: 'not-a-range' };
  }
}

function resolutionOf(range: CellRange | ReferenceFault): RangeResolution {
  if (!isReferenceFault(range)) {
    return { kind: 'ranges', ranges: [range] };
  }
  return range.kind === 'unknown' ? range : { kind: 'not-a-range' };
}

function resolveNameText(name: string, sheet: string | null, lookup: Lookup): RangeResolution {
  const { index } = lookup;
  if (sheet !== null && index.sheet(sheet) === undefined) {
    return { kind: 'unknown', what: sheet };
  }
  const from = sheet ?? (lookup.hasHome ? lookup.home.sheet : null);
  const definedName = index.definedName(name, from);
  if (definedName !== undefined) {
    if (++lookup.followed.count > maximumNames) {
      return { kind: 'not-a-range' };
    }
    return resolveText(definedName.formula, {
      ...lookup,
      home: { sheet: definedName.scope ?? '', row: 0, column: 0 },
      hasHome: definedName.scope !== null,
    });
  }
  if (index.table(name) !== undefined) {
    return resolutionOf(
      rangeOfTable({ kind: 'table', table: name, columns: [], sections: [] }, index, lookup.home),
    );
  }
  return { kind: 'unknown', what: name };
}

/** `-1` and `50%` are constants; `A1#` is what the formula in A1 fills. */
function resolveUnary(node: UnaryNode, lookup: Lookup): RangeResolution {
  const operand = resolveNode(node.operand, lookup);
  switch (node.operator) {
    case '#': {
      if (operand.kind !== 'ranges') {
        return operand.kind === 'constant' ? { kind: 'not-a-range' } : operand;
      }
      const [range] = operand.ranges;
      const filled = lookup.index.sheet(range.sheet)?.cell(range.top, range.left)?.arrayRange;
      return filled === undefined ? { kind: 'dead' } : { kind: 'ranges', ranges: [filled] };
    }
    case '@':
    case '+':
      return operand;
    case '-':
    case '%':
      if (operand.kind === 'constant' && typeof operand.value === 'number') {
        return {
          kind: 'constant',
          value: node.operator === '-' ? -operand.value : operand.value / 100,
        };
      }
      return operand.kind === 'ranges' || operand.kind === 'constant' ? { kind: 'not-a-range' } : operand;
  }
}

function resolveBinary(node: BinaryNode, lookup: Lookup): RangeResolution {
  const left = resolveNode(node.left, lookup);
  const right = resolveNode(node.right, lookup);
  for (const side of [left, right]) {
    if (side.kind !== 'ranges' && side.kind !== 'constant') {
      return side;
    }
  }
  if (left.kind !== 'ranges' || right.kind !== 'ranges') {
    return { kind: 'not-a-range' };
  }
  const areas = [...left.ranges, ...right.ranges];
  if (areas.some((area) => area.sheet !== areas[0].sheet)) {
    return { kind: 'not-a-range' };
  }
  switch (node.operator) {
    case ',':
      return { kind: 'ranges', ranges: areas };
    case ':':
      return { kind: 'ranges', ranges: [boundingRange(areas)] };
    case ' ': {
      if (left.ranges.length > 1 || right.ranges.length > 1) {
        return { kind: 'not-a-range' };
      }
      const shared = intersection(left.ranges[0], right.ranges[0]);
      return shared === undefined ? { kind: 'not-a-range' } : { kind: 'ranges', ranges: [shared] };
    }
    default:
      return { kind: 'not-a-range' };
  }
}

/** The smallest rectangle around all of them. */
export function boundingRange(ranges: readonly CellRange[]): CellRange {
  return {
    sheet: ranges[0].sheet,
    top: Math.min(...ranges.map((range) => range.top)),
    left: Math.min(...ranges.map((range) => range.left)),
    bottom: Math.max(...ranges.map((range) => range.bottom)),
    right: Math.max(...ranges.map((range) => range.right)),
  };
}

/** The cells that both hold, or undefined where there are none. */
export function intersection(a: CellRange, b: CellRange): CellRange | undefined {
  const shared = {
    sheet: a.sheet,
    top: Math.max(a.top, b.top),
    left: Math.max(a.left, b.left),
    bottom: Math.min(a.bottom, b.bottom),
    right: Math.min(a.right, b.right),
  };
  return shared.top > shared.bottom || shared.left > shared.right ? undefined : shared;
}
