/**
 * Holds the values stored beside formulas against what the formulas give at the decisions as they stand. A difference
 * means that the workbook was not calculated after its last change, or that our evaluation is at fault; either way the
 * planner must know.
 */
import { CellError, type CellValue } from '../sheet/cell-value';
import type { FormulaCell } from '../calculation/calculation-grid';
import type { DependencyGraph, GraphNode } from '../calculation/dependency-graph';
import { isDependent, Matrix, type Scalar } from '../calculation/evaluated-value';
import { AffineForm } from './affine-form';
import type { FormulaIssue } from './formula-issue';

/**
 * Averages leave out a decision cell that is still blank; in the plan it holds a number and counts. There is no
 * contradiction in that.
 */
const averagingFunctions = new Set(['AVERAGE', 'AVERAGEIF', 'AVERAGEIFS', 'SUBTOTAL', 'AGGREGATE']);

/** Largest difference, relative to 1 + the largest term: two programs' rounding of one sum. */
const storedValueTolerance = 1e-9;

export class StoredValueCheck {
  readonly issues: FormulaIssue[] = [];
  /** Values of the variables: decisions as they stand, then named forms. */
  private readonly values: number[];
  private readonly differing = new Map<GraphNode, boolean>();

  private readonly hasBlankDecision: boolean;

  /** @param current what the decision cells hold; undefined for a blank one */
  constructor(
    private readonly graph: DependencyGraph,
    current: readonly (number | undefined)[],
  ) {
    this.values = current.map((value) => value ?? 0);
    this.hasBlankDecision = current.includes(undefined);
  }

  /** Tells the next variable's form. */
  addVariable(form: AffineForm): void {
    this.values.push(form.valueAt(this.values));
  }

  /** To be told cells in the order of calculation. Only where the difference begins is an issue made. */
  check(cell: FormulaCell, value: Scalar | Matrix): void {
    const node = this.graph.visit(cell);
    const stored = cell.cell.value;
    if (!node.dependsOnInputs || node.isVolatile || node.isUncertain || stored === undefined) {
      return;
    }
    const first = value instanceof Matrix ? value.values[0] : value;
    const evaluated = first instanceof AffineForm ? first.valueAt(this.values) : first;
    if (isDependent(evaluated) || this.isSame(stored, evaluated, first)) {
      return;
    }
    const isFirst = !node.precedents.some((precedent) => this.isDiffering(precedent));
    this.differing.set(node, true);
    if (isFirst && !(this.hasBlankDecision && averages(cell))) {
      this.issues.push({
        code: 'stored-value-differs',
        cell: cell.address,
        facts: {
          stored: factOf(stored),
          evaluated: factOf(evaluated),
          formula: `=${cell.cell.formula ?? ''}`,
        },
      });
    }
  }

  private isSame(stored: CellValue, evaluated: CellValue, value: Scalar): boolean {
    if (typeof stored !== 'number' || typeof evaluated !== 'number') {
      return stored === evaluated || (stored === null && evaluated === 0);
    }
    let size = Math.max(Math.abs(stored), Math.abs(evaluated));
    if (value instanceof AffineForm) {
      value.variables.forEach((variable, at) => {
        size = Math.max(size, Math.abs(value.coefficients[at] * this.values[variable]));
      });
    }
    return Math.abs(stored - evaluated) <= storedValueTolerance * (1 + size);
  }

  /** Whether a cell, or one in a range, is known to differ. Ranges that lengthen one another are walked, not called. */
  private isDiffering(node: GraphNode): boolean {
    const walked: GraphNode[] = [];
    let differs = false;
    for (let next: GraphNode | undefined = node; next !== undefined; next = next.before) {
      const known = this.differing.get(next);
      if (known !== undefined || next.cell !== undefined) {
        differs ||= known ?? false;
        break;
      }
      walked.push(next);
      if (
        next.precedents.some((member) => member.cell !== undefined && this.differing.get(member) === true)
      ) {
        differs = true;
        break;
      }
    }
    walked.forEach((range) => this.differing.set(range, differs));
    return differs;
  }
}

function averages(cell: FormulaCell): boolean {
  const { formula } = cell;
  return formula.kind === 'formula' && formula.functionNames.some((name) => averagingFunctions.has(name));
}

function factOf(value: CellValue): string | number {
  return value instanceof CellError ? value.code : typeof value === 'number' ? value : String(value ?? '');
}
