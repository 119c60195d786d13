/**
 * The syntax tree that everything above works on, free of its parser.
 *
 * References are kept relative to the cell that holds the formula, so that the same formula filled down a column is
 * one tree for all its cells: `A1*2` in B1 and `A2*2` in B2 are both "the cell one to the left, times 2".
 */
import type { CellError } from '../sheet/cell-value';

/** One end of a reference. A row or column that is not absolute counts from the formula's own cell. */
export interface ReferenceCorner {
  /** null: the whole column. */
  readonly row: number | null;
  readonly rowIsAbsolute: boolean;
  /** null: the whole row. */
  readonly column: number | null;
  readonly columnIsAbsolute: boolean;
}

export interface NumberNode {
  readonly kind: 'number';
  readonly value: number;
}

export interface TextNode {
  readonly kind: 'text';
  readonly value: string;
}

export interface BooleanNode {
  readonly kind: 'boolean';
  readonly value: boolean;
}

export interface ErrorNode {
  readonly kind: 'error';
  readonly error: CellError;
}

/** An argument left out, as the second in `IF(A1,,2)`. */
export interface OmittedNode {
  readonly kind: 'omitted';
}

export interface CellNode {
  readonly kind: 'cell';
  /** null: the sheet of the formula. */
  readonly sheet: string | null;
  readonly corner: ReferenceCorner;
}

/** A rectangle, whole columns or whole rows. The corners may stand in either order. */
export interface RangeNode {
  readonly kind: 'range';
  readonly sheet: string | null;
  readonly first: ReferenceCorner;
  readonly last: ReferenceCorner;
  /** `A1.:.A10`: blank rows and columns at these ends do not count. */
  readonly trim: 'none' | 'head' | 'tail' | 'both';
}

export type TableSection = 'all' | 'data' | 'headers' | 'totals' | 'this row';

export interface TableNode {
  readonly kind: 'table';
  /** Empty: the table that the formula stands in. */
  readonly table: string;
  /** None: all columns. Two: from the first to the second. */
  readonly columns: readonly string[];
  readonly sections: readonly TableSection[];
}

export interface NameNode {
  readonly kind: 'name';
  /** The sheet written before the name; null where none is. */
  readonly sheet: string | null;
  readonly name: string;
}

/** Something in another workbook, such as `[1]Costs!$B$2`. */
export interface ExternalNode {
  readonly kind: 'external';
  readonly text: string;
}

/** The same cells on several sheets, such as `Jan:Mar!B2`: on all tabs from the first to the last. */
export interface SheetsNode {
  readonly kind: 'sheets';
  readonly text: string;
  readonly firstSheet: string;
  readonly lastSheet: string;
  readonly reference: CellNode | RangeNode;
}

export interface ArrayNode {
  readonly kind: 'array';
  readonly rows: readonly (readonly FormulaNode[])[];
}

export type UnaryOperator = '+' | '-' | '%' | '@' | '#';

export interface UnaryNode {
  readonly kind: 'unary';
  readonly operator: UnaryOperator;
  readonly operand: FormulaNode;
}

export type ArithmeticOperator = '+' | '-' | '*' | '/' | '^';
export type ComparisonOperator = '=' | '<>' | '<' | '>' | '<=' | '>=';
/** Union is `,`, intersection a blank. */
export type ReferenceOperator = ':' | ',' | ' ';
export type BinaryOperator = ArithmeticOperator | ComparisonOperator | ReferenceOperator | '&';

export interface BinaryNode {
  readonly kind: 'binary';
  readonly operator: BinaryOperator;
  readonly left: FormulaNode;
  readonly right: FormulaNode;
}

export interface CallNode {
  readonly kind: 'call';
  /** Upper case, without the prefixes of newer functions. */
  readonly name: string;
  readonly arguments: readonly FormulaNode[];
}

export interface LetNode {
  readonly kind: 'let';
  /** Names in lower case. */
  readonly declarations: readonly { readonly name: string; readonly value: FormulaNode }[];
  readonly body: FormulaNode;
}

export interface LambdaNode {
  readonly kind: 'lambda';
  /** In lower case. */
  readonly parameters: readonly string[];
  readonly body: FormulaNode;
}

/** A lambda called where it stands: `LAMBDA(x,x+1)(2)`. */
export interface InvocationNode {
  readonly kind: 'invocation';
  readonly callee: FormulaNode;
  readonly arguments: readonly FormulaNode[];
}

export type FormulaNode =
  | NumberNode
  | TextNode
  | BooleanNode
  | ErrorNode
  | OmittedNode
  | CellNode
  | RangeNode
  | TableNode
  | NameNode
  | ExternalNode
  | SheetsNode
  | ArrayNode
  | UnaryNode
  | BinaryNode
  | CallNode
  | LetNode
  | LambdaNode
  | InvocationNode;

/** Why a formula could not be read. */
export interface FormulaSyntaxIssue {
  readonly kind: 'syntax-issue';
  readonly code: 'formula-syntax' | 'too-deep';
  /** Where in the text the reader stopped, from 0 (without `=`); null where that is not known. */
  readonly position: number | null;
}

/** What can be calculated: the tree, and the parts of it that refer to cells. */
export interface ParsedFormula {
  readonly kind: 'formula';
  readonly tree: FormulaNode;
  /**
   * Every node that refers to something, in the order written: cells, ranges, tables, names, and the operators and
   * functions whose range is known only once it is worked out (`A1:INDEX(…)`, OFFSET, INDIRECT, `A1#`).
   */
  readonly references: readonly FormulaNode[];
  /** Functions called, upper case, each once. */
  readonly functionNames: readonly string[];
}

/** The children of a node, in the order written. */
export function childrenOf(node: FormulaNode): readonly FormulaNode[] {
  switch (node.kind) {
    case 'sheets':
      return [node.reference];
    case 'array':
      return node.rows.flat();
    case 'unary':
      return [node.operand];
    case 'binary':
      return [node.left, node.right];
    case 'call':
      return node.arguments;
    case 'let':
      return [...node.declarations.map((declaration) => declaration.value), node.body];
    case 'lambda':
      return [node.body];
    case 'invocation':
      return [node.callee, ...node.arguments];
    default:
      return [];
  }
}
