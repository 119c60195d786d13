/**
 * Which cells feed which, as far as the formulas' references tell: what depends on the inputs, what must be
 * calculated anew, and in which order.
 *
 * References tell more than a formula uses (IF takes one of its branches), never less: a formula whose references
 * cannot all be told beforehand is marked as uncertain and is always calculated.
 *
 * Strongly connected components by Tarjan (1972), "Depth-first search and linear graph algorithms", SIAM J. Comput.
 * 1 (2), with a stack of its own: chains of 100,000 cells are usual. Components come out precedents first, which is
 * the order of calculation. What holds for one member of a component holds for all of it.
 */
import { CellError } from '../sheet/cell-value';
import type { CellRange } from '../sheet/cell-range';
import type { DefinedName } from '../sheet/defined-name';
import type { FormulaNode, ParsedFormula } from '../formula/formula-syntax';
import { isReferenceFault, rangeOfNode, rangeOfTable, type ReferenceFault } from '../formula/static-ranges';
import {
  ArrayPart,
  FormulaCell,
  InputCell,
  type CalculationGrid,
  type GridColumn,
  type GridEntry,
  type SheetGrid,
} from './calculation-grid';
import type { Area } from './evaluated-value';

/** Ranges of more cells than this are nodes of their own, shared by all formulas that refer to them. */
const directRangeCells = 8;
/** Names behind one formula; names that lead to names are walked by calls. */
const maximumNameCount = 500;

/** Functions whose value changes without any cell changing. */
const volatileFunctions = new Set(['TODAY', 'NOW']);

/** Works out a reference that calculation alone can tell; undefined where even that fails. */
export type ComputedReferenceResolver = (cell: FormulaCell, node: FormulaNode) => readonly Area[] | undefined;

const none: readonly never[] = [];

/** A formula cell, or a range that formulas refer to. */
export class GraphNode {
  /** Order of discovery; −1: not yet visited. */
  discovery = -1;
  lowest = -1;
  isOnStack = false;
  /** Position of the precedent to be searched next. */
  next = 0;
  /** Valid once visited. */
  dependsOnInputs = false;
  /** TODAY or NOW is among what it builds on. */
  isVolatile = false;
  /** So is a formula whose references cannot all be told beforehand, or that cannot be read. */
  isUncertain = false;
  precedents: readonly GraphNode[] = none;
  /** Inputs it refers to itself. */
  inputs: readonly InputCell[] = none;

  constructor(
    /** undefined: a range. */
    readonly cell: FormulaCell | undefined,
    /** For a range: what it covers, less what `before` covers. */
    readonly area: Area | undefined,
    /** For a range: a shorter one with the same first row, which this one lengthens. */
    readonly before: GraphNode | undefined,
  ) {}
}

export class DependencyGraph {
  /** Visited formula cells, precedents first. */
  readonly order: FormulaCell[] = [];

  private readonly nodes: (GraphNode | undefined)[] = [];
  private readonly ranges = new Map<string, GraphNode>();
  /** By first row and columns: the longest range so far. */
  private readonly longestRanges = new Map<string, GraphNode>();
  private discovered = 0;

  constructor(
    private readonly grid: CalculationGrid,
    private readonly resolveComputed: ComputedReferenceResolver,
  ) {}

  /** The cell's node, everything that it builds on visited. */
  visit(cell: FormulaCell): GraphNode {
    const node = this.nodeOf(cell);
    if (node.discovery < 0) {
      this.search(node);
    }
    return node;
  }

  /** Whether the stored value does not do: what the cell builds on may have changed, or nothing is stored. */
  needsEvaluation(cell: FormulaCell): boolean {
    const node = this.visit(cell);
    return node.dependsOnInputs || node.isVolatile || node.isUncertain || cell.cell.value === undefined;
  }

  private nodeOf(cell: FormulaCell): GraphNode {
    return (this.nodes[cell.id] ??= new GraphNode(cell, undefined, undefined));
  }

  // hot: once a search, a step a reference.
  private search(root: GraphNode): void {
    const path: GraphNode[] = [];
    const stack: GraphNode[] = [];
    let entered: GraphNode | undefined = root;
    for (;;) {
      if (entered !== undefined) {
        entered.discovery = entered.lowest = this.discovered++;
        entered.isOnStack = true;
        stack.push(entered);
        this.findPrecedents(entered);
        path.push(entered);
      }
      const node = path[path.length - 1];
      entered = undefined;
      const { precedents } = node;
      while (node.next < precedents.length) {
        const precedent = precedents[node.next++];
        if (precedent.discovery < 0) {
          entered = precedent;
          break;
        }
      }
      if (entered !== undefined) {
        continue;
      }
      path.pop();
      for (const precedent of precedents) {
        node.dependsOnInputs ||= precedent.dependsOnInputs;
        node.isVolatile ||= precedent.isVolatile;
        node.isUncertain ||= precedent.isUncertain;
        if (precedent.isOnStack && precedent.lowest < node.lowest) {
          node.lowest = precedent.lowest;
        }
      }
      if (node.lowest === node.discovery) {
        this.closeComponent(node, stack);
      }
      if (path.length === 0) {
        return;
      }
    }
  }

  /** Everything on the stack down to the root is one component. */
  private closeComponent(root: GraphNode, stack: GraphNode[]): void {
    if (stack[stack.length - 1] === root) {
      stack.pop();
      this.close(root, root);
      return;
    }
    const members = stack.splice(stack.lastIndexOf(root)).reverse();
    const flags = {
      dependsOnInputs: members.some((member) => member.dependsOnInputs),
      isVolatile: members.some((member) => member.isVolatile),
      isUncertain: members.some((member) => member.isUncertain),
    };
    members.forEach((member) => this.close(member, flags));
  }

  private close(
    member: GraphNode,
    flags: Pick<GraphNode, 'dependsOnInputs' | 'isVolatile' | 'isUncertain'>,
  ): void {
    member.isOnStack = false;
    member.dependsOnInputs = flags.dependsOnInputs;
    member.isVolatile = flags.isVolatile;
    member.isUncertain = flags.isUncertain;
    if (member.cell !== undefined) {
      this.order.push(member.cell);
    }
  }

  private findPrecedents(node: GraphNode): void {
    const precedents: GraphNode[] = [];
    const inputs: InputCell[] = [];
    if (node.cell !== undefined) {
      const { formula } = node.cell;
      if (formula.kind === 'formula') {
        this.collect(node, node.cell, formula, new Set(), precedents, inputs);
      } else {
        node.isUncertain = true;
      }
    } else if (node.area !== undefined) {
      if (node.before !== undefined) {
        precedents.push(node.before);
        this.visitNodesOf(node.area, node.before.area!.bottom + 1, precedents, inputs);
      } else {
        this.visitNodesOf(node.area, node.area.top, precedents, inputs);
      }
    }
    if (precedents.length > 0) {
      node.precedents = precedents;
    }
    if (inputs.length > 0) {
      node.inputs = inputs;
      node.dependsOnInputs = true;
    }
  }

  private collect(
    node: GraphNode,
    cell: FormulaCell,
    formula: ParsedFormula,
    seenNames: Set<DefinedName>,
    precedents: GraphNode[],
    inputs: InputCell[],
  ): void {
    for (const name of formula.functionNames) {
      if (volatileFunctions.has(name)) {
        node.isVolatile = true;
      }
      // A name that stands for a LAMBDA is called like a function, and its body may refer to anything.
      this.collectNamed(node, cell, name, cell.grid.name, seenNames, precedents, inputs);
    }
    for (const reference of formula.references) {
      switch (reference.kind) {
        case 'cell':
          if (reference.sheet === null) {
            const { corner } = reference;
            const row = corner.rowIsAbsolute ? corner.row! : corner.row! + cell.row;
            const column = corner.columnIsAbsolute ? corner.column! : corner.column! + cell.column;
            if (row >= 0 && column >= 0) {
              this.addEntry(cell.grid.at(row, column), precedents, inputs);
              break;
            }
          }
          this.addRange(rangeOfNode(reference, this.grid.index, cell.address), precedents, inputs);
          break;
        case 'range':
          this.addRange(rangeOfNode(reference, this.grid.index, cell.address), precedents, inputs);
          break;
        case 'table':
          this.addRange(rangeOfTable(reference, this.grid.index, cell.address), precedents, inputs);
          break;
        case 'sheets':
          for (const sheet of this.sheetsBetween(reference.firstSheet, reference.lastSheet)) {
            const range = rangeOfNode({ ...reference.reference, sheet }, this.grid.index, cell.address);
            this.addRange(range, precedents, inputs);
          }
          break;
        case 'name':
          this.collectNamed(
            node,
            cell,
            reference.name,
            reference.sheet ?? cell.grid.name,
            seenNames,
            precedents,
            inputs,
          );
          break;
        case 'binary':
        case 'unary':
        case 'call': {
          const areas = this.resolveComputed(cell, reference);
          if (areas === undefined) {
            node.isUncertain = true;
          } else {
            areas.forEach((area) => this.addArea(area, precedents, inputs));
          }
          break;
        }
        default:
      }
    }
  }

  /** What a defined name, or a table called by its bare name, refers to; nothing where there is none. */
  private collectNamed(
    node: GraphNode,
    cell: FormulaCell,
    name: string,
    sheet: string,
    seenNames: Set<DefinedName>,
    precedents: GraphNode[],
    inputs: InputCell[],
  ): void {
    const definedName = this.grid.index.definedName(name, sheet);
    if (definedName !== undefined) {
      // A name says the same wherever in this formula it is met.
      if (seenNames.has(definedName)) {
        return;
      }
      seenNames.add(definedName);
      const named = this.grid.formulas.parse(definedName.formula, { row: 0, column: 0 });
      if (named.kind === 'syntax-issue' || seenNames.size > maximumNameCount) {
        node.isUncertain = true;
      } else {
        this.collect(node, cell, named, seenNames, precedents, inputs);
      }
    } else if (this.grid.index.table(name) !== undefined) {
      const table = { kind: 'table', table: name, columns: [], sections: [] } as const;
      this.addRange(rangeOfTable(table, this.grid.index, cell.address), precedents, inputs);
    }
  }

  private sheetsBetween(first: string, last: string): string[] {
    const names = this.grid.workbook.sheets.map((sheet) => sheet.name);
    const lower = names.map((name) => name.toLowerCase());
    const ends = [lower.indexOf(first.toLowerCase()), lower.indexOf(last.toLowerCase())];
    return ends.includes(-1) ? [] : names.slice(Math.min(...ends), Math.max(...ends) + 1);
  }

  private addRange(range: CellRange | ReferenceFault, precedents: GraphNode[], inputs: InputCell[]): void {
    if (!isReferenceFault(range)) {
      this.addArea(this.areaOf(range), precedents, inputs);
    }
  }

  private areaOf(range: CellRange): Area {
    return {
      grid: this.grid.sheetGrid(range.sheet)!,
      top: range.top,
      left: range.left,
      bottom: range.bottom,
      right: range.right,
    };
  }

  private addArea(area: Area, precedents: GraphNode[], inputs: InputCell[]): void {
    const cellCount = (area.bottom - area.top + 1) * (area.right - area.left + 1);
    if (cellCount <= directRangeCells) {
      for (let column = area.left; column <= area.right; column++) {
        for (let row = area.top; row <= area.bottom; row++) {
          this.addEntry(area.grid.at(row, column), precedents, inputs);
        }
      }
      return;
    }
    precedents.push(this.rangeNode(area));
  }

  private rangeNode(area: Area): GraphNode {
    const lane = `${area.grid.name}\u0000${area.left},${area.right},${area.top}`;
    const key = `${lane},${area.bottom}`;
    let node = this.ranges.get(key);
    if (node === undefined) {
      // Running totals (`SUM(A$2:A9)` filled down) lengthen one range again and again; each then adds its new rows
      // only, and not all rows from the first.
      const longest = this.longestRanges.get(lane);
      const before = longest !== undefined && longest.area!.bottom < area.bottom ? longest : undefined;
      node = new GraphNode(undefined, area, before);
      this.ranges.set(key, node);
      if (longest === undefined || before !== undefined) {
        this.longestRanges.set(lane, node);
      }
    }
    return node;
  }

  private visitNodesOf(area: Area, fromRow: number, precedents: GraphNode[], inputs: InputCell[]): void {
    forEachNode(area.grid, { ...area, top: fromRow }, (entry) => this.addEntry(entry, precedents, inputs));
  }

  private addEntry(entry: GridEntry | undefined, precedents: GraphNode[], inputs: InputCell[]): void {
    if (entry instanceof FormulaCell) {
      precedents.push(this.nodeOf(entry));
    } else if (entry instanceof InputCell) {
      inputs.push(entry);
    } else if (entry instanceof ArrayPart) {
      precedents.push(this.nodeOf(entry.anchor));
    }
  }
}

/** Visits the formulas, array parts and inputs in a rectangle, column by column; constants are not looked at. */
export function forEachNode(
  grid: SheetGrid,
  area: Omit<Area, 'grid'>,
  visit: (node: FormulaCell | ArrayPart | InputCell) => void,
): void {
  const lastColumn = Math.min(area.right, grid.columns.length - 1);
  for (let column = area.left; column <= lastColumn; column++) {
    const lane = grid.columns[column];
    if (lane === undefined || lane.nodes.length === 0) {
      continue;
    }
    for (let at = firstNodeFrom(lane, area.top); at < lane.nodes.length; at++) {
      const node = lane.nodes[at];
      if (node.row > area.bottom) {
        break;
      }
      visit(node);
    }
  }
}

/** Position of the first node at or below a row. */
function firstNodeFrom(column: GridColumn, row: number): number {
  let low = 0;
  let high = column.nodes.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (column.nodes[middle].row < row) {
      low = middle + 1;
    } else {
      high = middle;
    }
  }
  return low;
}

/** Whether an entry of the grid is a plain value. */
export function isConstantEntry(entry: GridEntry): entry is number | string | boolean | CellError {
  return typeof entry !== 'object' || entry instanceof CellError;
}
