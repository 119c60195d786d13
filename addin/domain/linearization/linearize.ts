/**
 * Cells as affine forms of the decisions, worked out from the formulas themselves: no cell is ever nudged to watch the
 * change.
 *
 * One pass: the dependency graph of the targets, their formulas in that order over affine forms, long forms named on
 * the way (defining-rows.ts), and at the end model and formulas held against each other (check-at-random-points.ts).
 */
import type { CellAddress } from '../sheet/cell-address';
import { CellError, type CellValue } from '../sheet/cell-value';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import {
  ArrayPart,
  CalculationGrid,
  FormulaCell,
  InputCell,
  type GridEntry,
} from '../calculation/calculation-grid';
import { DependencyGraph } from '../calculation/dependency-graph';
import { errorValue, isDependent, Matrix, type Scalar } from '../calculation/evaluated-value';
import { Evaluator } from '../calculation/evaluator';
import { plainNumbers } from '../calculation/number-domain';
import { affineForms } from './affine-domain';
import { AffineForm } from './affine-form';
import { checkAtRandomPoints } from './check-at-random-points';
import { NamedForms, type DefiningRow } from './defining-rows';
import type { FormulaIssue } from './formula-issue';
import { errorValueIssue, issueOfRefusal } from './nonlinearity';
import { StoredValueCheck } from './stored-value-check';

export interface LinearizationRequest {
  readonly workbook: WorkbookSnapshot;
  /** The decision cells in the order of their variables, each once. */
  readonly decisions: readonly CellAddress[];
  /** The cells to read. */
  readonly targets: readonly CellAddress[];
  /** Date and time of TODAY and NOW, as a serial date of the workbook. */
  readonly now: number;
}

/** What a target cell is worth. */
export type CellLinearization =
  /** A number: constant where no decision is reached. */
  | { readonly kind: 'affine'; readonly form: AffineForm }
  /** A text, TRUE or FALSE, a blank, or an error value that no decision has part in. */
  | { readonly kind: 'value'; readonly value: CellValue }
  /** Cannot be read; why, at the cells where the reasons lie. The same reason is the same object in every reading. */
  | { readonly kind: 'refused'; readonly issues: readonly FormulaIssue[] };

export interface Linearization {
  /** As many as targets, in their order. */
  readonly readings: readonly CellLinearization[];
  /** The free variables that the forms use beyond the decisions; each row uses decisions and earlier rows only. */
  readonly definingRows: readonly DefiningRow[];
  /** Stored values that the formulas contradict, at the cells where it begins. */
  readonly warnings: readonly FormulaIssue[];
  /** Whether a cell's formula, directly or through others, refers to a decision; also where no coefficient is left. */
  readonly dependsOnDecisions: (cell: CellAddress) => boolean;
}

export function linearize(request: LinearizationRequest): Linearization {
  return new Linearizer(request).run();
}

class Linearizer {
  private readonly grid: CalculationGrid;
  private readonly graph: DependencyGraph;
  private readonly evaluator: Evaluator;
  private readonly named: NamedForms;
  private readonly stored: StoredValueCheck;
  private readonly issues = new Map<FormulaCell, FormulaIssue>();

  constructor(private readonly request: LinearizationRequest) {
    const { workbook, decisions, now } = request;
    this.grid = new CalculationGrid(workbook, decisions);
    const current = decisions.map((cell) => currentValue(this.grid, cell));
    const storedValues = new Evaluator(this.grid, {
      domain: plainNumbers,
      inputs: current.map((value) => value ?? 0),
      now,
      needsEvaluation: (cell) => cell.cell.value === undefined,
    });
    this.graph = new DependencyGraph(this.grid, (cell, node) => storedValues.resolveReference(cell, node));
    this.named = new NamedForms(decisions.length);
    this.stored = new StoredValueCheck(this.graph, current);
    this.evaluator = new Evaluator(this.grid, {
      domain: affineForms((form) => {
        const cell = this.evaluator.currentCell;
        return this.nameIfLong(form, () => cell);
      }),
      inputs: decisions.map((_cell, variable) => AffineForm.variable(variable)),
      now,
      needsEvaluation: (cell) => this.graph.needsEvaluation(cell),
      settle: (cell, value) => this.settle(cell, value),
    });
  }

  run(): Linearization {
    const entries = this.request.targets.map((cell) =>
      this.grid.sheetGrid(cell.sheet)?.at(cell.row, cell.column),
    );
    entries.forEach((entry) => {
      const cell = formulaBehind(entry);
      if (cell !== undefined) {
        this.graph.visit(cell);
      }
    });
    evaluateInOrder(this.graph, this.evaluator);
    const raw = entries.map((entry) => this.readingOf(entry));
    const settled = this.named.settle(
      raw.flatMap((reading) => (reading.kind === 'affine' ? [reading.form] : [])),
    );
    let next = 0;
    const readings = raw.map((reading) =>
      reading.kind === 'affine' ? { kind: reading.kind, form: settled.forms[next++] } : reading,
    );
    this.checkReadings(entries, readings, settled.rows);
    return {
      readings,
      definingRows: settled.rows,
      warnings: this.stored.issues,
      dependsOnDecisions: (cell) =>
        this.dependsOnDecisions(this.grid.sheetGrid(cell.sheet)?.at(cell.row, cell.column)),
    };
  }

  /** Names long forms, so that what builds on the cell stays short; numbers beyond range become an error value. */
  private settle(cell: FormulaCell, value: Scalar | Matrix): Scalar | Matrix {
    const settled =
      value instanceof Matrix && value.values.some(isDependent)
        ? new Matrix(
            value.rowCount,
            value.columnCount,
            value.values.map((element, at) =>
              this.settleScalar(element, () => ({
                sheet: cell.grid.name,
                row: cell.row + Math.floor(at / value.columnCount),
                column: cell.column + (at % value.columnCount),
              })),
            ),
          )
        : value instanceof Matrix
          ? value
          : this.settleScalar(value, () => cell.address);
    this.stored.check(cell, settled);
    return settled;
  }

  private settleScalar(value: Scalar, cell: () => CellAddress): Scalar {
    if (!(value instanceof AffineForm)) {
      return value;
    }
    return Number.isFinite(value.constant) && value.coefficients.every(Number.isFinite)
      ? this.nameIfLong(value, cell)
      : errorValue.number;
  }

  private nameIfLong(form: AffineForm, cell: () => CellAddress): AffineForm {
    const named = this.named.nameIfLong(form, cell);
    if (named !== form) {
      this.stored.addVariable(form);
    }
    return named;
  }

  private readingOf(entry: GridEntry | undefined): CellLinearization {
    const outcome = this.evaluator.entryOutcome(entry);
    const cell = formulaBehind(entry);
    if (outcome.kind !== 'value') {
      return { kind: 'refused', issues: this.issuesBehind(cell!) };
    }
    const value = outcome.value as Scalar;
    if (value instanceof AffineForm) {
      return { kind: 'affine', form: value };
    }
    if (typeof value === 'number') {
      return { kind: 'affine', form: AffineForm.constant(value) };
    }
    if (value instanceof CellError && cell !== undefined && this.graph.visit(cell).dependsOnInputs) {
      return { kind: 'refused', issues: [this.issueOfError(cell, value)] };
    }
    return { kind: 'value', value: value as CellValue };
  }

  /** The refused cells from which a cell is blocked, itself if it is refused. */
  private issuesBehind(from: FormulaCell): readonly FormulaIssue[] {
    const issues: FormulaIssue[] = [];
    const seen = new Set([this.graph.visit(from)]);
    for (const node of seen) {
      if (node.cell !== undefined) {
        const outcome = this.evaluator.outcomeOf(node.cell);
        if (outcome.kind === 'refused') {
          const issue = this.issueAt(node.cell, () =>
            issueOfRefusal(node.cell!, outcome.refusal.reason, this.graph),
          );
          if (!issues.includes(issue)) {
            issues.push(issue);
          }
        }
        if (outcome.kind !== 'blocked') {
          continue;
        }
      }
      // A set gives what is added to it while it is walked.
      node.precedents.forEach((precedent) => {
        const isRead = precedent.cell === undefined || this.graph.needsEvaluation(precedent.cell);
        if (isRead) {
          seen.add(precedent);
        }
      });
    }
    return issues;
  }

  /** The cell in which the error value arises. */
  private issueOfError(from: FormulaCell, error: CellError): FormulaIssue {
    let origin = from;
    const seen = new Set([this.graph.visit(from)]);
    for (const node of seen) {
      if (node.cell !== undefined) {
        const outcome = this.evaluator.outcomeOf(node.cell);
        if (outcome.kind !== 'value' || outcome.value !== error) {
          continue;
        }
        origin = node.cell;
      }
      node.precedents
        .filter((precedent) => precedent.dependsOnInputs)
        .forEach((precedent) => seen.add(precedent));
    }
    return this.issueAt(origin, () => errorValueIssue(origin, error.code, this.graph));
  }

  private issueAt(cell: FormulaCell, state: () => FormulaIssue): FormulaIssue {
    const outcome = this.evaluator.outcomeOf(cell);
    // A circle is one issue, whichever of its cells it is met at.
    const isCircle = outcome.kind === 'refused' && outcome.refusal.reason.code === 'circular-reference';
    const place =
      isCircle && outcome.refusal.reason.code === 'circular-reference'
        ? outcome.refusal.reason.cells[0]
        : cell;
    let issue = this.issues.get(place);
    if (issue === undefined) {
      issue = state();
      this.issues.set(place, issue);
    }
    return issue;
  }

  private dependsOnDecisions(entry: GridEntry | undefined): boolean {
    if (entry instanceof InputCell) {
      return true;
    }
    const cell = formulaBehind(entry);
    if (cell === undefined) {
      return false;
    }
    const node = this.graph.visit(cell);
    if (node.dependsOnInputs || !node.isUncertain) {
      return node.dependsOnInputs;
    }
    // References that could not be told beforehand: what came of the formula tells.
    const outcome = this.evaluator.entryOutcome(entry);
    return outcome.kind === 'value' ? isDependent(outcome.value) : true;
  }

  /** Readings on which model and formulas differ become refusals. */
  private checkReadings(
    entries: readonly (GridEntry | undefined)[],
    readings: CellLinearization[],
    rows: readonly DefiningRow[],
  ): void {
    const checked = entries.flatMap((entry, at) => {
      const reading = readings[at];
      return reading.kind === 'affine' && formulaBehind(entry) !== undefined && this.dependsOnDecisions(entry)
        ? [{ at, entry, form: reading.form }]
        : [];
    });
    if (checked.length === 0) {
      return;
    }
    const disagreements = checkAtRandomPoints(
      this.request.decisions.length,
      checked.map(({ form }) => form),
      rows,
      (point) => {
        const evaluator = new Evaluator(this.grid, {
          domain: plainNumbers,
          inputs: point,
          now: this.request.now,
          needsEvaluation: (cell) => this.graph.needsEvaluation(cell),
        });
        evaluateInOrder(this.graph, evaluator);
        return checked.map(({ entry }) => {
          const outcome = evaluator.entryOutcome(entry);
          return outcome.kind === 'value' ? outcome.value : outcome.kind;
        });
      },
    );
    for (const { target, model, evaluated } of disagreements) {
      const { at } = checked[target];
      const issue: FormulaIssue = {
        code: 'model-disagrees',
        cell: this.request.targets[at],
        facts: { model, evaluated: typeof evaluated === 'number' ? evaluated : String(evaluated) },
      };
      readings[at] = { kind: 'refused', issues: [issue] };
    }
  }
}

/** Works out every cell that the graph has visited and whose stored value does not do, precedents first. */
export function evaluateInOrder(graph: DependencyGraph, evaluator: Evaluator): void {
  for (const cell of graph.order) {
    if (graph.needsEvaluation(cell)) {
      evaluator.outcomeOf(cell);
    }
  }
}

function formulaBehind(entry: GridEntry | undefined): FormulaCell | undefined {
  return entry instanceof FormulaCell ? entry : entry instanceof ArrayPart ? entry.anchor : undefined;
}

/** What a decision cell holds now; undefined where it is no number. */
function currentValue(grid: CalculationGrid, cell: CellAddress): number | undefined {
  const value = grid.index.sheet(cell.sheet)?.cell(cell.row, cell.column)?.value;
  return typeof value === 'number' ? value : undefined;
}
