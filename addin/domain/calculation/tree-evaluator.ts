/**
 * Works out the tree of one formula, for one cell.
 *
 * The tree is walked by calls, whose depth the parser limits; long sums, which lean to the left, are walked without.
 * The walk is one class: every kind of node may hold every other, so its parts cannot be told apart by what they call.
 *
 * Ranges and single values. A formula of one cell takes one value where one value is asked for: of a range in its
 * operators, that in its own row or column. Inside a function that takes ranges everything is worked out over arrays,
 * as array formulas are throughout.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import { CellError } from '../sheet/cell-value';
import type { BinaryNode, CallNode, FormulaNode, NameNode, UnaryNode } from '../formula/formula-syntax';
import { isReferenceFault, rangeOfNode, rangeOfTable, type ReferenceFault } from '../formula/static-ranges';
import { refuseTooLarge } from './array-size';
import { FormulaCell, type CalculationGrid, type GridNode, type SheetGrid } from './calculation-grid';
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
import { worksheetFunctions } from './functions/worksheet-functions';
import type { Amount, AmountSum, NumberDomain } from './number-domain';
import { applyOperator, applyUnary } from './operators';
import { RangeReader } from './range-reader';
import { combineReferences, isReferenceOperator } from './reference-operators';
import { RunningTotals } from './running-totals';
import type { FunctionContext, WorksheetFunction } from './worksheet-function';

/** Names that lead to names, and lambdas that call lambdas. */
const maximumScopeDepth = 200;
/** Names and lambdas followed for one cell: names that each mention another twice would go on for ever. */
const maximumScopeEntries = 1_000_000;

export class TreeEvaluator implements FunctionContext {
  readonly usesDates1904: boolean;
  row = 0;
  column = 0;

  private readonly ranges: RangeReader;
  private readonly runningTotals = new RunningTotals();
  private home: SheetGrid | undefined;
  private scope: Scope | undefined;
  private scopeDepth = 0;
  private scopeEntries = 0;
  private takesOneValue = false;

  /** @param valueOfNode what a formula, an array part or an input is worth; may throw to put this formula aside */
  constructor(
    private readonly grid: CalculationGrid,
    readonly domain: NumberDomain,
    readonly now: number,
    valueOfNode: (node: GridNode) => Scalar,
  ) {
    this.usesDates1904 = grid.workbook.usesDates1904;
    this.ranges = new RangeReader(valueOfNode);
  }

  /** The cell whose formula is being worked out. */
  get currentCell(): CellAddress {
    return this.homeAddress();
  }

  /** What the cell shows, or for an array formula all that it fills. */
  resultOf(cell: FormulaCell, tree: FormulaNode): Scalar | Matrix {
    this.enter(cell);
    if (cell.isArrayFormula) {
      const matrix = this.matrixOf(this.evaluateNode(tree));
      return matrix.rowCount === 1 && matrix.columnCount === 1 ? (matrix.values[0] ?? 0) : matrix;
    }
    this.takesOneValue = true;
    // A formula that refers to a blank cell shows 0.
    return this.scalarOf(this.evaluateNode(tree)) ?? 0;
  }

  /** A part of a cell's formula, ranges left as ranges. */
  partOf(cell: FormulaCell, node: FormulaNode): Value {
    this.enter(cell);
    return this.evaluateNode(node);
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

  // Cells and ranges, for the functions.

  scalarAt(area: Area, row: number, column: number): Scalar {
    return this.ranges.read(area.grid, row, column);
  }

  matrixOf(value: Value): Matrix {
    if (value instanceof Matrix) {
      return value;
    }
    if (value instanceof Reference) {
      if (value.areas.length > 1) {
        throw errorSignal(errorValue.value);
      }
      return this.ranges.matrixOf(value.areas[0]);
    }
    if (value instanceof Lambda) {
      throw errorSignal(errorValue.calculation);
    }
    return new Matrix(1, 1, [value]);
  }

  scalarOf(value: Value): Scalar {
    if (value instanceof Reference) {
      return value.isSingleCell
        ? this.ranges.read(value.areas[0].grid, value.areas[0].top, value.areas[0].left)
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
      return this.ranges.read(area.grid, this.row, area.left);
    }
    if (area.top === area.bottom && this.column >= area.left && this.column <= area.right) {
      return this.ranges.read(area.grid, area.top, this.column);
    }
    return errorValue.value;
  }

  forEachFilled(value: Value, visit: (value: Scalar, isCell: boolean) => void): void {
    if (value instanceof Reference) {
      for (const area of value.areas) {
        this.ranges.forEachFilled(area, (cell) => visit(cell, true));
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
            return this.ranges.read(this.home!, row, column);
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
      ? this.ranges.read(area.grid, area.top, area.left)
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
      return value.areas.some((area) => this.ranges.containsDependent(area));
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
