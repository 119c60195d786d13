/**
 * Works out formulas: one evaluator for plain numbers and for affine forms, by the number domain it is given.
 *
 * Within one formula the tree is walked by calls, whose depth the parser limits; from cell to cell there are no calls.
 * A formula that meets a cell not yet worked out is put aside, that cell is worked out, and the formula starts again.
 * Given the cells in the order of a DependencyGraph, that hardly ever happens.
 *
 * Ranges and single values. A formula of one cell takes one value where one value is asked for: of a range in its
 * operators, that in its own row or column. Inside a function that takes ranges everything is worked out over arrays,
 * as array formulas are throughout.
 */
import { CellError, type CellValue } from '../sheet/cell-value';
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { BinaryNode, CallNode, FormulaNode, NameNode, UnaryNode } from '../formula/formula-syntax';
import { isReferenceFault, rangeOfNode, rangeOfTable, type ReferenceFault } from '../formula/static-ranges';
import {
  ArrayPart,
  FormulaCell,
  InputCell,
  type CalculationGrid,
  type GridEntry,
  type GridNode,
  type SheetGrid,
} from './calculation-grid';
import { forEachNode, isConstantEntry } from './dependency-graph';
import {
  errorValue,
  isDependent,
  isScalar,
  isSingleCell,
  Lambda,
  Matrix,
  Reference,
  type Area,
  type Scalar,
  type Scope,
  type Value,
} from './evaluated-value';
import {
  DependentValueRefusal,
  ErrorValueSignal,
  errorSignal,
  EvaluationRefusal,
} from './evaluation-refusal';
import { refuseTooLarge } from './array-size';
import { worksheetFunctions } from './functions/worksheet-functions';
import type { Amount, AmountSum, NumberDomain } from './number-domain';
import { applyOperator, applyUnary, type ScalarOperator } from './operators';
import { RunningTotals } from './running-totals';
import type { FunctionContext, WorksheetFunction } from './worksheet-function';

/** Names that lead to names, and lambdas that call lambdas. */
const maximumScopeDepth = 200;
/** Names and lambdas followed for one cell: names that each mention another twice would go on for ever. */
const maximumScopeEntries = 1_000_000;

/** What became of a formula cell. */
export type CellOutcome =
  | { readonly kind: 'value'; readonly value: Scalar | Matrix }
  /** Its own formula cannot be worked out. */
  | { readonly kind: 'refused'; readonly refusal: EvaluationRefusal }
  /** It builds on a cell that cannot be worked out. */
  | { readonly kind: 'blocked' };

export interface EvaluatorSettings {
  readonly domain: NumberDomain;
  /** Values of the inputs, by their index. */
  readonly inputs: readonly Scalar[];
  /** Date and time of TODAY and NOW, as a serial date of the workbook. */
  readonly now: number;
  /** Whether the value stored beside a formula does not do. */
  readonly needsEvaluation: (cell: FormulaCell) => boolean;
  /** Looks at each cell's value as soon as it is worked out, and may put another of the same worth in its place. */
  readonly settle?: (cell: FormulaCell, value: Scalar | Matrix) => Scalar | Matrix;
}

const blockedOutcome: CellOutcome = { kind: 'blocked' };

/** A formula has met a cell that is not yet worked out. */
class CellNeeded extends Error {}
/** A formula has met a cell that cannot be worked out. */
class CellBlocked extends Error {}
const cellNeeded = new CellNeeded();
const cellBlocked = new CellBlocked();

export class Evaluator implements FunctionContext {
  readonly domain: NumberDomain;
  readonly now: number;
  readonly usesDates1904: boolean;
  row = 0;
  column = 0;

  private readonly outcomes: (CellOutcome | undefined)[] = [];
  private readonly isUnderWay: boolean[] = [];
  private readonly runningTotals = new RunningTotals();
  private needed: FormulaCell | undefined;
  private home: SheetGrid | undefined;
  private scope: Scope | undefined;
  private scopeDepth = 0;
  private scopeEntries = 0;
  private takesOneValue = false;

  constructor(
    private readonly grid: CalculationGrid,
    private readonly settings: EvaluatorSettings,
  ) {
    this.domain = settings.domain;
    this.now = settings.now;
    this.usesDates1904 = grid.workbook.usesDates1904;
  }

  /** The cell whose formula is being worked out. */
  get currentCell(): CellAddress {
    return this.homeAddress();
  }

  /** Works out a cell, whether or not its stored value would do. */
  outcomeOf(cell: FormulaCell): CellOutcome {
    return this.outcomes[cell.id] ?? this.workOut(cell);
  }

  /** What an entry of the grid is worth: an array formula's first cell gives its first value. */
  entryOutcome(entry: GridEntry | undefined): CellOutcome {
    if (entry === undefined) {
      return { kind: 'value', value: null };
    }
    if (isConstantEntry(entry)) {
      return { kind: 'value', value: entry };
    }
    if (entry instanceof InputCell) {
      return { kind: 'value', value: this.settings.inputs[entry.index] };
    }
    const cell = entry instanceof ArrayPart ? entry.anchor : entry;
    if (!this.settings.needsEvaluation(cell)) {
      const stored = entry instanceof ArrayPart ? entry.stored : cell.cell.value;
      if (stored !== undefined) {
        return { kind: 'value', value: stored };
      }
    }
    const outcome = this.outcomeOf(cell);
    return outcome.kind === 'value' ? { kind: 'value', value: partOf(entry, cell, outcome.value) } : outcome;
  }

  /**
   * The cells that a reference within a cell's formula stands for, worked out with this evaluator's values; undefined
   * where it stands for none or cannot be told.
   */
  resolveReference(cell: FormulaCell, node: FormulaNode): readonly Area[] | undefined {
    for (;;) {
      try {
        this.enter(cell);
        const value = this.evaluateNode(node);
        return value instanceof Reference ? value.areas : value instanceof CellError ? undefined : [];
      } catch (error) {
        if (error === cellNeeded) {
          this.workOut(this.needed!);
          continue;
        }
        if (isRefusal(error) || error instanceof ErrorValueSignal || error instanceof RangeError) {
          return undefined;
        }
        throw error;
      }
    }
  }

  // From cell to cell.

  private workOut(wanted: FormulaCell): CellOutcome {
    // In the graph's order, this is all there is to it.
    const direct = this.tryFormula(wanted);
    if (direct !== undefined) {
      this.outcomes[wanted.id] = direct;
      return direct;
    }
    const pending = [wanted];
    while (pending.length > 0) {
      const cell = pending[pending.length - 1];
      if (this.outcomes[cell.id] !== undefined) {
        pending.pop();
        continue;
      }
      this.isUnderWay[cell.id] = true;
      const outcome = this.tryFormula(cell);
      if (outcome !== undefined) {
        this.finish(cell, outcome);
        pending.pop();
        continue;
      }
      const needed = this.needed!;
      if (this.isUnderWay[needed.id]) {
        // The formulas from the needed cell up to this one wait for each other.
        const circle = pending.slice(pending.indexOf(needed));
        const refusal = new EvaluationRefusal({ code: 'circular-reference', cells: circle });
        circle.forEach((member) => this.finish(member, { kind: 'refused', refusal }));
        continue;
      }
      pending.push(needed);
    }
    return this.outcomes[wanted.id]!;
  }

  private finish(cell: FormulaCell, outcome: CellOutcome): void {
    this.outcomes[cell.id] = outcome;
    this.isUnderWay[cell.id] = false;
  }

  /** undefined: another cell is needed first. */
  private tryFormula(cell: FormulaCell): CellOutcome | undefined {
    const { formula } = cell;
    if (formula.kind === 'syntax-issue') {
      const reason =
        formula.code === 'too-deep'
          ? { code: formula.code }
          : { code: formula.code, position: formula.position };
      return { kind: 'refused', refusal: new EvaluationRefusal(reason) };
    }
    try {
      this.enter(cell);
      const value = this.resultOf(cell, formula.tree);
      return { kind: 'value', value: this.settings.settle?.(cell, value) ?? value };
    } catch (error) {
      if (error === cellNeeded) {
        return undefined;
      }
      if (error === cellBlocked) {
        return blockedOutcome;
      }
      if (error instanceof ErrorValueSignal) {
        return { kind: 'value', value: error.value };
      }
      if (error instanceof EvaluationRefusal) {
        return { kind: 'refused', refusal: error };
      }
      if (error instanceof DependentValueRefusal) {
        const operation = error.operation ?? 'function';
        return {
          kind: 'refused',
          refusal: new EvaluationRefusal({ code: 'not-affine', operation, by: '' }),
        };
      }
      // A lambda that calls itself without end runs out of stack.
      if (error instanceof RangeError) {
        return { kind: 'refused', refusal: new EvaluationRefusal({ code: 'too-deep' }) };
      }
      throw error;
    }
  }

  private enter(cell: FormulaCell): void {
    this.home = cell.grid;
    this.row = cell.row;
    this.column = cell.column;
    this.scope = undefined;
    this.scopeDepth = 0;
    this.scopeEntries = 0;
    this.takesOneValue = false;
  }

  private resultOf(cell: FormulaCell, tree: FormulaNode): Scalar | Matrix {
    if (cell.isArrayFormula) {
      const matrix = this.matrixOf(this.evaluateNode(tree));
      return matrix.rowCount === 1 && matrix.columnCount === 1 ? (matrix.values[0] ?? 0) : matrix;
    }
    this.takesOneValue = true;
    // A formula that refers to a blank cell shows 0.
    return this.scalarOf(this.evaluateNode(tree)) ?? 0;
  }

  // Cells and ranges.

  /** The value in a cell. */
  private read(grid: SheetGrid, row: number, column: number): Scalar {
    const entry = grid.columns[column]?.entries[row];
    if (typeof entry === 'number') {
      return entry;
    }
    if (entry === undefined) {
      return null;
    }
    return isConstantEntry(entry) ? entry : this.readNode(entry);
  }

  private readNode(node: GridNode): Scalar {
    if (node instanceof InputCell) {
      return this.settings.inputs[node.index];
    }
    const cell = node instanceof ArrayPart ? node.anchor : node;
    const outcome = this.outcomes[cell.id];
    if (outcome === undefined) {
      if (!this.settings.needsEvaluation(cell)) {
        const stored = node instanceof ArrayPart ? node.stored : cell.cell.value;
        if (stored !== undefined) {
          return stored;
        }
      }
      this.needed = cell;
      throw cellNeeded;
    }
    if (outcome.kind !== 'value') {
      throw cellBlocked;
    }
    return outcome.value instanceof Matrix ? partOf(node, cell, outcome.value) : outcome.value;
  }

  scalarAt(area: Area, row: number, column: number): Scalar {
    return this.read(area.grid, row, column);
  }

  /** The whole of an area, blanks included. */
  private areaMatrix(area: Area): Matrix {
    const rowCount = area.bottom - area.top + 1;
    const columnCount = area.right - area.left + 1;
    refuseTooLarge(rowCount * columnCount);
    const values = new Array<Scalar>(rowCount * columnCount).fill(null);
    const lastColumn = Math.min(area.right, area.grid.columns.length - 1);
    for (let column = area.left; column <= lastColumn; column++) {
      const entries = area.grid.columns[column]?.entries;
      if (entries === undefined) {
        continue;
      }
      const lastRow = Math.min(area.bottom, entries.length - 1);
      let at = column - area.left;
      for (let row = area.top; row <= lastRow; row++, at += columnCount) {
        const entry = entries[row];
        if (entry !== undefined) {
          values[at] = isConstantEntry(entry) ? entry : this.readNode(entry);
        }
      }
    }
    return new Matrix(rowCount, columnCount, values);
  }

  matrixOf(value: Value): Matrix {
    if (value instanceof Matrix) {
      return value;
    }
    if (value instanceof Reference) {
      if (value.areas.length > 1) {
        throw errorSignal(errorValue.value);
      }
      return this.areaMatrix(value.areas[0]);
    }
    if (value instanceof Lambda) {
      throw errorSignal(errorValue.calculation);
    }
    return new Matrix(1, 1, [value]);
  }

  scalarOf(value: Value): Scalar {
    if (value instanceof Reference) {
      return value.isSingleCell
        ? this.read(value.areas[0].grid, value.areas[0].top, value.areas[0].left)
        : this.ownRowOrColumn(value);
    }
    if (value instanceof Matrix) {
      return value.values[0];
    }
    if (value instanceof Lambda) {
      return errorValue.calculation;
    }
    return value;
  }

  /** Of a line of cells, the one beside or above the formula. */
  private ownRowOrColumn(reference: Reference): Scalar {
    if (reference.areas.length > 1) {
      return errorValue.value;
    }
    const [area] = reference.areas;
    if (area.left === area.right && this.row >= area.top && this.row <= area.bottom) {
      return this.read(area.grid, this.row, area.left);
    }
    if (area.top === area.bottom && this.column >= area.left && this.column <= area.right) {
      return this.read(area.grid, area.top, this.column);
    }
    return errorValue.value;
  }

  forEachFilled(value: Value, visit: (value: Scalar, isCell: boolean) => void): void {
    if (value instanceof Reference) {
      for (const area of value.areas) {
        this.forEachFilledCell(area, visit);
      }
    } else if (value instanceof Matrix) {
      for (const element of value.values) {
        if (element !== null) {
          visit(element, true);
        }
      }
    } else if (value instanceof Lambda) {
      throw errorSignal(errorValue.calculation);
    } else if (value !== null) {
      visit(value, false);
    }
  }

  private forEachFilledCell(area: Area, visit: (value: Scalar, isCell: boolean) => void): void {
    const lastColumn = Math.min(area.right, area.grid.columns.length - 1);
    for (let column = area.left; column <= lastColumn; column++) {
      const entries = area.grid.columns[column]?.entries;
      if (entries === undefined) {
        continue;
      }
      const lastRow = Math.min(area.bottom, entries.length - 1);
      for (let row = area.top; row <= lastRow; row++) {
        const entry = entries[row];
        if (entry === undefined) {
          continue;
        }
        const value = isConstantEntry(entry) ? entry : this.readNode(entry);
        if (value !== null) {
          visit(value, true);
        }
      }
    }
  }

  isRowHidden(area: Area, row: number, byFilterOnly: boolean): boolean {
    const { sheet } = area.grid;
    return sheet.isRowHidden(row) && (!byFilterOnly || sheet.hasActiveFilter);
  }

  isSubtotal(area: Area, row: number, column: number): boolean {
    const entry = area.grid.at(row, column);
    const formula = entry instanceof FormulaCell ? entry.formula : undefined;
    return (
      formula?.kind === 'formula' &&
      (formula.functionNames.includes('SUBTOTAL') || formula.functionNames.includes('AGGREGATE'))
    );
  }

  newSum(): AmountSum {
    return this.domain.newSum();
  }

  runningTotal(area: Area, sum: (area: Area, from: Amount | undefined) => Amount): Amount {
    return this.runningTotals.totalOf(area, sum, (total) =>
      typeof total === 'number' ? total : this.domain.keep(total),
    );
  }

  // Trees.

  evaluate(node: FormulaNode): Value {
    const takesOneValue = this.takesOneValue;
    this.takesOneValue = false;
    const value = this.evaluateNode(node);
    this.takesOneValue = takesOneValue;
    return value;
  }

  evaluateBranch(node: FormulaNode): Value {
    return this.evaluateNode(node);
  }

  private evaluateNode(node: FormulaNode): Value {
    switch (node.kind) {
      case 'number':
      case 'text':
      case 'boolean':
        return node.value;
      case 'error':
        return node.error;
      case 'omitted':
        return null;
      case 'cell': {
        const { corner } = node;
        if (node.sheet === null && this.takesOneValue) {
          const row = corner.rowIsAbsolute ? corner.row! : corner.row! + this.row;
          const column = corner.columnIsAbsolute ? corner.column! : corner.column! + this.column;
          if (row >= 0 && column >= 0) {
            return this.read(this.home!, row, column);
          }
        }
        return this.referenceOrValue(rangeOfNode(node, this.grid.index, this.homeAddress()));
      }
      case 'range':
        return this.referenceOrValue(rangeOfNode(node, this.grid.index, this.homeAddress()));
      case 'table':
        return this.referenceOrValue(rangeOfTable(node, this.grid.index, this.homeAddress()));
      case 'name':
        return this.evaluateName(node);
      case 'external':
        throw new EvaluationRefusal({ code: 'external-reference', reference: node.text });
      case 'sheets':
        throw new EvaluationRefusal({ code: 'several-sheets', reference: node.text });
      case 'array':
        return this.evaluateArray(node.rows);
      case 'unary':
        return this.evaluateUnary(node);
      case 'binary':
        return this.evaluateBinary(node);
      case 'call':
        return this.evaluateCall(node);
      case 'let': {
        const outer = this.scope;
        for (const declaration of node.declarations) {
          const value = this.evaluate(declaration.value);
          this.scope = { name: declaration.name, value, outer: this.scope };
        }
        const value = this.evaluateNode(node.body);
        this.scope = outer;
        return value;
      }
      case 'lambda':
        return new Lambda(node.parameters, node.body, this.scope);
      case 'invocation': {
        const callee = this.evaluate(node.callee);
        if (!(callee instanceof Lambda)) {
          return callee instanceof CellError ? callee : errorValue.reference;
        }
        return this.callLambda(
          callee,
          node.arguments.map((argument) => this.evaluate(argument)),
        );
      }
    }
  }

  private homeAddress(): CellAddress {
    return { sheet: this.home!.name, row: this.row, column: this.column };
  }

  private referenceOrValue(range: CellRange | ReferenceFault): Value {
    if (isReferenceFault(range)) {
      return range.kind === 'unknown' ? errorValue.reference : errorValue.value;
    }
    const area: Area = {
      grid: this.grid.sheetGrid(range.sheet)!,
      top: range.top,
      left: range.left,
      bottom: range.bottom,
      right: range.right,
    };
    if (!this.takesOneValue) {
      return new Reference([area]);
    }
    return isSingleCell(area)
      ? this.read(area.grid, area.top, area.left)
      : this.ownRowOrColumn(new Reference([area]));
  }

  private evaluateName(node: NameNode): Value {
    if (node.sheet === null && this.scope !== undefined) {
      const wanted = node.name.toLowerCase();
      for (let scope: Scope | undefined = this.scope; scope !== undefined; scope = scope.outer) {
        if (scope.name === wanted) {
          return this.takesOneValue ? this.oneValueOf(scope.value) : scope.value;
        }
      }
    }
    const { index, formulas } = this.grid;
    const definedName = index.definedName(node.name, node.sheet ?? this.home!.name);
    if (definedName === undefined) {
      if (index.table(node.name) !== undefined) {
        const table = { kind: 'table', table: node.name, columns: [], sections: [] } as const;
        return this.referenceOrValue(rangeOfTable(table, index, this.homeAddress()));
      }
      return errorValue.name;
    }
    const parsed = formulas.parse(definedName.formula, { row: 0, column: 0 });
    if (parsed.kind === 'syntax-issue') {
      return errorValue.name;
    }
    return this.inScope(undefined, () => this.evaluateNode(parsed.tree));
  }

  /** A value bound by LET, where one value is asked for: of a range that in the own row or column. */
  private oneValueOf(value: Value): Value {
    return value instanceof Reference ? this.scalarOf(value) : value;
  }

  private inScope<T>(scope: Scope | undefined, work: () => T): T {
    if (++this.scopeDepth > maximumScopeDepth || ++this.scopeEntries > maximumScopeEntries) {
      throw new EvaluationRefusal({ code: 'too-deep' });
    }
    const outer = this.scope;
    this.scope = scope;
    const result = work();
    this.scope = outer;
    this.scopeDepth--;
    return result;
  }

  callLambda(lambda: Lambda, values: readonly Value[]): Value {
    if (values.length > lambda.parameters.length) {
      return errorValue.value;
    }
    let scope = lambda.scope;
    lambda.parameters.forEach((name, at) => {
      scope = { name, value: at < values.length ? values[at] : null, outer: scope };
    });
    return this.inScope(scope, () => this.evaluate(lambda.body));
  }

  private evaluateArray(rows: readonly (readonly FormulaNode[])[]): Matrix {
    const values = rows.flatMap((row) => row.map((element) => this.scalarOf(this.evaluate(element))));
    return new Matrix(rows.length, rows[0].length, values);
  }

  private evaluateUnary(node: UnaryNode): Value {
    switch (node.operator) {
      case '+':
        return this.evaluateNode(node.operand);
      case '-':
      case '%': {
        const { operator } = node;
        const operand = this.evaluateNode(node.operand);
        if (typeof operand === 'number') {
          return operator === '-' ? -operand : operand / 100;
        }
        return this.lift([operand], ([value]) => applyUnary(operator, value, this.domain));
      }
      case '@':
        return this.scalarOf(this.evaluate(node.operand));
      case '#': {
        const operand = this.evaluate(node.operand);
        const anchor = operand instanceof Reference ? operand.areas[0] : undefined;
        const entry = anchor?.grid.at(anchor.top, anchor.left);
        if (!(entry instanceof FormulaCell) || entry.cell.arrayRange === undefined) {
          return errorValue.reference;
        }
        return this.referenceOrValue({ ...entry.cell.arrayRange, sheet: entry.grid.name });
      }
    }
  }

  /** Long sums lean to the left, thousands of operators deep, so that side is walked and not called. */
  private evaluateBinary(node: BinaryNode): Value {
    if (node.left.kind !== 'binary') {
      return this.evaluatePair(node, this.leftValue(node, node.left), node.right);
    }
    const spine = [node];
    let leftmost: FormulaNode = node.left;
    while (leftmost.kind === 'binary') {
      spine.push(leftmost);
      leftmost = leftmost.left;
    }
    let left = this.leftValue(spine[spine.length - 1], leftmost);
    for (let at = spine.length - 1; at >= 0; at--) {
      left = this.evaluatePair(spine[at], left, spine[at].right);
    }
    return left;
  }

  /** The left side of a reference operator stays a reference. */
  private leftValue(node: BinaryNode, left: FormulaNode): Value {
    return isReferenceOperator(node.operator) ? this.evaluate(left) : this.evaluateNode(left);
  }

  private evaluatePair(node: BinaryNode, left: Value, rightNode: FormulaNode): Value {
    const { operator } = node;
    if (isReferenceOperator(operator)) {
      const combined = combineReferences(operator, left, this.evaluate(rightNode));
      return this.takesOneValue ? this.oneValueOf(combined) : combined;
    }
    const right = this.evaluateNode(rightNode);
    if (isScalar(left) && isScalar(right)) {
      return applyOperator(operator, left, right, this.domain);
    }
    return this.lift([left, right], ([a, b]) => applyOperator(operator, a, b, this.domain));
  }

  private evaluateCall(node: CallNode): Value {
    const called = worksheetFunctions.get(node.name);
    if (called === undefined) {
      return this.evaluateNamedLambda(node);
    }
    if (node.arguments.length < called.minimum || node.arguments.length > called.maximum) {
      return errorValue.value;
    }
    const { scope, scopeDepth, takesOneValue } = this;
    try {
      return this.applyFunction(node, called);
    } catch (error) {
      if (error instanceof ErrorValueSignal) {
        this.scope = scope;
        this.scopeDepth = scopeDepth;
        this.takesOneValue = takesOneValue;
        return error.value;
      }
      if (error instanceof DependentValueRefusal) {
        const operation = error.operation === 'condition' ? 'condition' : 'function';
        throw new EvaluationRefusal({ code: 'not-affine', operation, by: node.name });
      }
      throw error;
    }
  }

  private applyFunction(node: CallNode, called: WorksheetFunction): Value {
    switch (called.kind) {
      case 'lazy':
        return called.apply(node.arguments, this);
      case 'general': {
        const values = node.arguments.map((argument) => this.evaluate(argument));
        if (this.domain.hasDependentNumbers) {
          this.refuseDependentArguments(node.name, values);
        }
        const value = called.apply(values, this);
        return this.takesOneValue ? this.oneValueOf(value) : value;
      }
      case 'scalar': {
        const values = node.arguments.map((argument) => this.evaluateNode(argument));
        if (this.domain.hasDependentNumbers) {
          this.refuseDependentArguments(node.name, values);
        }
        return this.lift(values, (scalars) => called.apply(scalars, this));
      }
    }
  }

  /** A name that stands for a LAMBDA can be called like a function. */
  private evaluateNamedLambda(node: CallNode): Value {
    const isNamed =
      this.hasInScope(node.name) || this.grid.index.definedName(node.name, this.home!.name) !== undefined;
    if (isNamed) {
      const named = this.evaluate({ kind: 'name', sheet: null, name: node.name });
      if (named instanceof Lambda) {
        return this.callLambda(
          named,
          node.arguments.map((argument) => this.evaluate(argument)),
        );
      }
    }
    throw new EvaluationRefusal({ code: 'unknown-function', functionName: node.name });
  }

  private hasInScope(name: string): boolean {
    const wanted = name.toLowerCase();
    for (let scope = this.scope; scope !== undefined; scope = scope.outer) {
      if (scope.name === wanted) {
        return true;
      }
    }
    return false;
  }

  /** Fail closed: what is not known to keep within the domain is not given a dependent number. */
  private refuseDependentArguments(functionName: string, values: readonly Value[]): void {
    for (let at = 0; at < values.length; at++) {
      if (!this.domain.acceptsDependent(functionName, at) && this.containsDependent(values[at])) {
        throw new EvaluationRefusal({ code: 'not-affine', operation: 'function', by: functionName });
      }
    }
  }

  private containsDependent(value: Value): boolean {
    if (value instanceof Reference) {
      let contains = false;
      for (const area of value.areas) {
        forEachNode(area.grid, area, (node) => {
          contains ||= isDependent(this.readNode(node));
        });
      }
      return contains;
    }
    return value instanceof Matrix ? value.values.some(isDependent) : isDependent(value);
  }

  lift(values: readonly Value[], combine: (scalars: readonly Scalar[]) => Scalar): Value {
    if (values.every(isScalar)) {
      return combineSafely(combine, values);
    }
    if (values.some((value) => value instanceof Reference && value.areas.length > 1)) {
      return errorValue.value;
    }
    if (values.some((value) => value instanceof Lambda)) {
      return errorValue.calculation;
    }
    const matrices = values.map((value) => this.matrixOf(value));
    const rowCount = Math.max(...matrices.map((matrix) => matrix.rowCount));
    const columnCount = Math.max(...matrices.map((matrix) => matrix.columnCount));
    if (rowCount === 1 && columnCount === 1) {
      return combineSafely(
        combine,
        matrices.map((matrix) => matrix.values[0]),
      );
    }
    refuseTooLarge(rowCount * columnCount);
    const combined: Scalar[] = [];
    for (let row = 0; row < rowCount; row++) {
      for (let column = 0; column < columnCount; column++) {
        combined.push(
          combineSafely(
            combine,
            matrices.map((matrix) => matrix.at(row, column)),
          ),
        );
      }
    }
    return new Matrix(rowCount, columnCount, combined);
  }

  referenceOfText(text: string): Reference {
    const parsed = this.grid.formulas.parse(text.replace(/^\s*=/, ''), {
      row: this.row,
      column: this.column,
    });
    const value = parsed.kind === 'formula' ? this.evaluate(parsed.tree) : errorValue.reference;
    if (!(value instanceof Reference)) {
      throw errorSignal(errorValue.reference);
    }
    return value;
  }
}

export function isRefusal(error: unknown): boolean {
  return (
    error instanceof EvaluationRefusal || error instanceof DependentValueRefusal || error === cellBlocked
  );
}

/** An error value in one element of an array is that element's, not the whole array's. */
function combineSafely(combine: (scalars: readonly Scalar[]) => Scalar, scalars: readonly Scalar[]): Scalar {
  try {
    return combine(scalars);
  } catch (error) {
    if (error instanceof ErrorValueSignal) {
      return error.value;
    }
    throw error;
  }
}

/** The value that falls to one cell of an array formula. */
function partOf(entry: GridNode, anchor: FormulaCell, value: Scalar | Matrix): Scalar {
  if (!(value instanceof Matrix)) {
    return value;
  }
  return value.at(entry.row - anchor.row, entry.column - anchor.column) ?? 0;
}

type ReferenceOperatorText = ':' | ',' | ' ';

function isReferenceOperator(operator: BinaryNode['operator']): operator is ReferenceOperatorText {
  return operator === ':' || operator === ',' || operator === ' ';
}

function combineReferences(operator: ReferenceOperatorText, left: Value, right: Value): Value {
  for (const side of [left, right]) {
    if (side instanceof CellError) {
      return side;
    }
  }
  if (!(left instanceof Reference) || !(right instanceof Reference)) {
    return errorValue.value;
  }
  if (operator === ',') {
    return new Reference([...left.areas, ...right.areas]);
  }
  const [first] = left.areas;
  const [second] = right.areas;
  if (first.grid !== second.grid) {
    return errorValue.value;
  }
  if (operator === ':') {
    const all = [...left.areas, ...right.areas];
    return new Reference([
      {
        grid: first.grid,
        top: Math.min(...all.map((area) => area.top)),
        left: Math.min(...all.map((area) => area.left)),
        bottom: Math.max(...all.map((area) => area.bottom)),
        right: Math.max(...all.map((area) => area.right)),
      },
    ]);
  }
  const shared: Area = {
    grid: first.grid,
    top: Math.max(first.top, second.top),
    left: Math.max(first.left, second.left),
    bottom: Math.min(first.bottom, second.bottom),
    right: Math.min(first.right, second.right),
  };
  return shared.top > shared.bottom || shared.left > shared.right
    ? errorValue.noIntersection
    : new Reference([shared]);
}

/** A scalar as a cell can hold it. */
export function cellValueOf(value: Scalar): CellValue | undefined {
  return isDependent(value) ? undefined : value;
}

export type { ScalarOperator };
