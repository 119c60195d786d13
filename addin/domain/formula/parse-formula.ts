/**
 * Formula text to syntax tree. The grammar is @borgar/fx's; this file mends what its trees leave open (prefixes of
 * newer functions, `Sheet!#REF!`, a blank before a bracket) and maps them to our own types.
 */
import {
  parse,
  parseA1Ref,
  parseStructRef,
  tokenize,
  type AstExpression,
  type RangeA1,
  type Token,
} from '@borgar/fx/xlsx';
import { CellError } from '../sheet/cell-value';
import {
  childrenOf,
  type CellNode,
  type FormulaNode,
  type FormulaSyntaxIssue,
  type NameNode,
  type ParsedFormula,
  type RangeNode,
  type ReferenceCorner,
  type TableSection,
} from './formula-syntax';

/** Brackets and functions within one another. Excel itself allows 64 functions; more than this is no planner's. */
export const maximumNesting = 400;

/** Where a formula stands: its references are kept as distances from here. */
export interface FormulaPlace {
  readonly row: number;
  readonly column: number;
}

/** Functions whose reference arguments are looked at for their place and shape, never for their values. */
const shapeOnlyFunctions = new Set(['ROW', 'ROWS', 'COLUMN', 'COLUMNS']);

/** Functions that give a range which only calculation can tell. */
const rangeComputingFunctions = new Set(['OFFSET', 'INDIRECT']);

/** fx's expression nodes, and the null it puts where an argument is left out. */
type FxNode = AstExpression | null;

class TooDeep extends Error {}
class NotUnderstood extends Error {}

/**
 * @param text without the leading `=`
 * @param isDefinedName tells `Rate (A1:A3)`, an intersection, from `SUM (A1:A3)`, a call typed with a blank
 */
export function parseFormula(
  text: string,
  place: FormulaPlace,
  isDefinedName: (name: string) => boolean,
): ParsedFormula | FormulaSyntaxIssue {
  try {
    const tokens = mendTokens(tokenize(`=${text}`, { mergeRefs: true }), isDefinedName);
    const tree = convert(parse(tokens, { permitArrayCalls: true, permitArrayRanges: true }), place, 0);
    const references: FormulaNode[] = [];
    const functionNames = new Set<string>();
    collectReferences(tree, references, functionNames);
    return { kind: 'formula', tree, references, functionNames: [...functionNames] };
  } catch (error) {
    // The parser calls itself for every bracket; where brackets go too deep it runs out of stack.
    if (error instanceof TooDeep || error instanceof RangeError) {
      return { kind: 'syntax-issue', code: 'too-deep', position: null };
    }
    const offset = (error as { sourceOffset?: unknown }).sourceOffset;
    return {
      kind: 'syntax-issue',
      code: 'formula-syntax',
      position: typeof offset === 'number' ? Math.max(0, offset - 1) : null,
    };
  }
}

function mendTokens(tokens: readonly Token[], isDefinedName: (name: string) => boolean): Token[] {
  const mended: Token[] = [];
  for (let at = 0; at < tokens.length; at++) {
    const token = tokens[at];
    const next = tokens[at + 1] as Token | undefined;
    const afterNext = tokens[at + 2] as Token | undefined;
    const isSheet = token.type === 'context' || token.type === 'context_quote';
    if (isSheet && next?.value === '!' && afterNext?.type === 'error') {
      // `Plan!#REF!`: the reference is gone, the sheet before it tells nothing more.
      mended.push(afterNext);
      at += 2;
    } else if (token.type === 'unknown' && token.value.endsWith('[') && next?.type === 'error') {
      // `Costs[#REF!]`: a table column that is gone.
      mended.push(next);
      at += afterNext?.value === ']' ? 2 : 1;
    } else if (token.type === 'func' || token.type === 'range_named') {
      const value = token.value.replace(/^(_xlfn\.|_xlws\.|_xlpm\.|_xludf\.)+/i, '');
      const isCallWithBlank =
        token.type === 'range_named' &&
        next?.type === 'whitespace' &&
        afterNext?.value === '(' &&
        /^[A-Za-z][A-Za-z0-9.]*$/.test(value) &&
        !isDefinedName(value);
      mended.push({ ...token, value, type: isCallWithBlank ? 'func' : token.type });
      if (isCallWithBlank) {
        at++;
      }
    } else {
      mended.push(token);
    }
  }
  return mended;
}

function convert(node: FxNode, place: FormulaPlace, depth: number): FormulaNode {
  if (depth > maximumNesting) {
    throw new TooDeep();
  }
  if (node === null) {
    return { kind: 'omitted' };
  }
  switch (node.type) {
    case 'Literal':
      return convertLiteral(node.value);
    case 'ErrorLiteral':
      return { kind: 'error', error: CellError.of(node.value.toUpperCase()) };
    case 'ReferenceIdentifier':
      return convertReference(node.value, node.kind, place);
    case 'UnaryExpression':
      return {
        kind: 'unary',
        operator: node.operator,
        operand: convert(node.arguments[0], place, depth + 1),
      };
    case 'BinaryExpression':
      return convertBinary(node, place, depth);
    case 'ArrayExpression':
      return {
        kind: 'array',
        rows: node.elements.map((row) => row.map((element) => convert(element, place, depth + 1))),
      };
    case 'LetExpression':
      return {
        kind: 'let',
        declarations: node.declarations.map((declaration) => ({
          name: declaration.id.name.toLowerCase(),
          value: convert(declaration.init, place, depth + 1),
        })),
        body: convert(node.body, place, depth + 1),
      };
    case 'LambdaExpression':
      return {
        kind: 'lambda',
        parameters: node.params.map((parameter) => parameter.name.toLowerCase()),
        body: convert(node.body, place, depth + 1),
      };
    case 'CallExpression': {
      const called = node.arguments.map((argument) => convert(argument, place, depth + 1));
      const callee: AstExpression | { type: 'Identifier'; name: string } = node.callee;
      if (callee.type !== 'Identifier') {
        return { kind: 'invocation', callee: convert(callee, place, depth + 1), arguments: called };
      }
      return convertCall(callee.name.toUpperCase(), called);
    }
  }
  throw new NotUnderstood();
}

function convertLiteral(value: string | number | boolean): FormulaNode {
  switch (typeof value) {
    case 'string':
      return { kind: 'text', value };
    case 'boolean':
      return { kind: 'boolean', value };
    default:
      // 1E400 is more than a cell can hold.
      return Number.isFinite(value)
        ? { kind: 'number', value }
        : { kind: 'error', error: CellError.of('#NUM!') };
  }
}

function convertCall(name: string, called: readonly FormulaNode[]): FormulaNode {
  // As files spell the operators `@` and `#`.
  if (name === 'SINGLE' && called.length === 1) {
    return { kind: 'unary', operator: '@', operand: called[0] };
  }
  if (name === 'ANCHORARRAY' && called.length === 1) {
    return { kind: 'unary', operator: '#', operand: called[0] };
  }
  return { kind: 'call', name, arguments: called };
}

/** Long sums lean to the left, thousands of operators deep, so that side is walked and not called. */
function convertBinary(
  node: Extract<AstExpression, { type: 'BinaryExpression' }>,
  place: FormulaPlace,
  depth: number,
): FormulaNode {
  const spine = [node];
  let leftmost: AstExpression = node.arguments[0];
  while (leftmost !== null && leftmost.type === 'BinaryExpression') {
    spine.push(leftmost);
    leftmost = leftmost.arguments[0];
  }
  let left = convert(leftmost, place, depth + 1);
  for (let at = spine.length - 1; at >= 0; at--) {
    left = {
      kind: 'binary',
      operator: spine[at].operator,
      left,
      right: convert(spine[at].arguments[1], place, depth + 1),
    };
  }
  return left;
}

function convertReference(text: string, kind: string, place: FormulaPlace): FormulaNode {
  if (kind === 'table') {
    return convertTable(text);
  }
  const parsed = parseA1Ref(text);
  if (parsed === undefined) {
    // A parameter of LAMBDA may be called `r` or `c`, which no defined name may.
    if (kind === 'name' && !text.includes('!')) {
      return { kind: 'name', sheet: null, name: text };
    }
    throw new NotUnderstood();
  }
  if (parsed.workbookName !== undefined && parsed.workbookName !== '') {
    return { kind: 'external', text };
  }
  const sheet = parsed.sheetName === undefined || parsed.sheetName === '' ? null : parsed.sheetName;
  if ('name' in parsed) {
    return { kind: 'name', sheet, name: parsed.name };
  }
  const reference = convertRange(text, sheet, parsed.range, place);
  if (sheet !== null && sheet.includes(':')) {
    const [firstSheet, lastSheet] = sheet.split(':');
    return { kind: 'sheets', text, firstSheet, lastSheet, reference };
  }
  return reference;
}

function convertRange(
  text: string,
  sheet: string | null,
  range: RangeA1,
  place: FormulaPlace,
): CellNode | RangeNode {
  const corner = (
    row: number | null | undefined,
    rowIsAbsolute: boolean | null | undefined,
    column: number | null | undefined,
    columnIsAbsolute: boolean | null | undefined,
  ): ReferenceCorner => {
    // Whole columns and rows are kept as written: their text stands in the shared key as it is.
    const isWhole = row == null || column == null;
    const keepsRow = isWhole || rowIsAbsolute === true;
    const keepsColumn = isWhole || columnIsAbsolute === true;
    return {
      row: row == null ? null : keepsRow ? row : row - place.row,
      rowIsAbsolute: keepsRow,
      column: column == null ? null : keepsColumn ? column : column - place.column,
      columnIsAbsolute: keepsColumn,
    };
  };
  const first = corner(range.top, range.$top, range.left, range.$left);
  // `A1:A1` is a range though its corners are one cell; a colon before the last `!` belongs to sheets.
  if (!text.slice(text.lastIndexOf('!') + 1).includes(':')) {
    return { kind: 'cell', sheet, corner: first };
  }
  const last = corner(range.bottom, range.$bottom, range.right, range.$right);
  return { kind: 'range', sheet, first, last, trim: range.trim ?? 'none' };
}

function convertTable(text: string): FormulaNode {
  const parsed = parseStructRef(text);
  if (parsed === undefined) {
    throw new NotUnderstood();
  }
  if (parsed.workbookName !== undefined && parsed.workbookName !== '') {
    return { kind: 'external', text };
  }
  return {
    kind: 'table',
    table: parsed.table ?? '',
    columns: parsed.columns ?? [],
    sections: (parsed.sections ?? []).map((section) => section.toLowerCase() as TableSection),
  };
}

/** Names bound by LET or LAMBDA refer to nothing in the workbook. */
function collectReferences(tree: FormulaNode, references: FormulaNode[], functionNames: Set<string>): void {
  const bound = new Map<string, number>();
  const bind = (name: string, by: number): void => {
    bound.set(name, (bound.get(name) ?? 0) + by);
  };
  const isBound = (node: NameNode): boolean =>
    node.sheet === null && (bound.get(node.name.toLowerCase()) ?? 0) > 0;

  const visit = (node: FormulaNode): void => {
    switch (node.kind) {
      case 'cell':
      case 'range':
      case 'table':
      case 'external':
      case 'sheets':
        references.push(node);
        return;
      case 'name':
        if (!isBound(node)) {
          references.push(node);
        }
        return;
      case 'unary':
        if (node.operator === '#') {
          references.push(node);
        }
        visit(node.operand);
        return;
      case 'binary': {
        let leftmost: FormulaNode = node;
        const rights: FormulaNode[] = [];
        while (leftmost.kind === 'binary') {
          if (leftmost.operator === ':') {
            references.push(leftmost);
          }
          rights.push(leftmost.right);
          leftmost = leftmost.left;
        }
        visit(leftmost);
        rights.reverse().forEach(visit);
        return;
      }
      case 'call': {
        functionNames.add(node.name);
        if (rangeComputingFunctions.has(node.name)) {
          references.push(node);
        }
        const asksShape = shapeOnlyFunctions.has(node.name);
        for (const argument of node.arguments) {
          if (!asksShape || (argument.kind !== 'cell' && argument.kind !== 'range')) {
            visit(argument);
          }
        }
        return;
      }
      case 'let':
        for (const declaration of node.declarations) {
          visit(declaration.value);
          bind(declaration.name, 1);
        }
        visit(node.body);
        node.declarations.forEach((declaration) => bind(declaration.name, -1));
        return;
      case 'lambda':
        node.parameters.forEach((parameter) => bind(parameter, 1));
        visit(node.body);
        node.parameters.forEach((parameter) => bind(parameter, -1));
        return;
      default:
        childrenOf(node).forEach(visit);
    }
  };
  visit(tree);
}
