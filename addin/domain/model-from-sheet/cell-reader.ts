/**
 * What a cell says within a plan: an amount (an affine form of the decisions), a text, or nothing. Faults of values
 * and formulas are reported here, once each, with the name of the block that needs the value.
 */
import { AffineForm } from '../linearization/affine-form';
import type { DefiningRow } from '../linearization/defining-rows';
import type { FormulaIssue } from '../linearization/formula-issue';
import { linearize, type Linearization } from '../linearization/linearize';
import { cellKey, type CellAddress } from '../sheet/cell-address';
import { CellError } from '../sheet/cell-value';
import { findSheet, type SheetSnapshot, type WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { severityOf, statementIssue, type FormulaModelIssue, type ModelIssue } from './model-issue';
import { isBlankText, looksLikeNumber } from './statement-words';

export type CellReading =
  /** Nothing that is seen: also a formula that gives an empty text. */
  | { readonly kind: 'blank' }
  | { readonly kind: 'amount'; readonly form: AffineForm; readonly dependsOnDecisions: boolean }
  | { readonly kind: 'text'; readonly text: string }
  | { readonly kind: 'truth-value' }
  | { readonly kind: 'error-value'; readonly code: string }
  /** A formula that is refused. */
  | {
      readonly kind: 'refused';
      readonly dependsOnDecisions: boolean;
      readonly issues: readonly FormulaIssue[];
    };

const blank: CellReading = { kind: 'blank' };

export class CellReader {
  readonly issues: ModelIssue[] = [];
  readonly definingRows: readonly DefiningRow[];

  private readonly sheets = new Map<string, SheetSnapshot | undefined>();
  private readonly readings = new Map<string, Map<number, CellReading>>();

  /**
   * @param decisions the plan's decision cells in their order, each once
   * @param targets every cell of the plan's other blocks; blank ones may be among them
   * @param now date and time of TODAY and NOW, as a serial date of the workbook
   */
  constructor(
    private readonly workbook: WorkbookSnapshot,
    decisions: readonly CellAddress[],
    targets: readonly CellAddress[],
    now: number,
  ) {
    const filled = this.filledOnce(targets, decisions);
    const linearization = linearize({ workbook, decisions, targets: filled, now });
    this.definingRows = linearization.definingRows;
    filled.forEach((cell, i) => {
      this.readingsOf(cell.sheet).set(cellKey(cell.row, cell.column), readingOf(cell, i, linearization));
    });
    for (const issue of linearization.warnings) {
      this.issues.push(formulaModelIssue(issue));
    }
  }

  read(cell: CellAddress): CellReading {
    return this.readingsOf(cell.sheet).get(cellKey(cell.row, cell.column)) ?? blank;
  }

  report(issue: ModelIssue): void {
    this.issues.push(issue);
  }

  /**
   * The amount in a cell; `blank` where it holds nothing, null where it holds something else, which is then reported.
   * @param name the block that needs the amount, as the planner named it
   */
  amount(cell: CellAddress, name: string): AffineForm | 'blank' | null {
    const reading = this.read(cell);
    switch (reading.kind) {
      case 'blank':
        return 'blank';
      case 'amount':
        if (this.cellAt(cell)?.isDate === true) {
          this.report(statementIssue('date-for-amount', cell, { name }));
        }
        return reading.form;
      case 'text': {
        const code = looksLikeNumber(reading.text) ? 'text-looks-like-number' : 'text-for-number';
        this.report(statementIssue(code, cell, { name, text: reading.text }));
        return null;
      }
      case 'truth-value':
        this.report(statementIssue('truth-value-for-number', cell, { name }));
        return null;
      case 'error-value':
        this.report(statementIssue('error-value-for-number', cell, { name, error: reading.code }));
        return null;
      case 'refused':
        this.issues.push(...reading.issues.map(formulaModelIssue));
        return null;
    }
  }

  /** A cell whose text matters (a relation, a sense): the text, an amount as a person would read it, or null. */
  text(cell: CellAddress): string | null {
    const reading = this.read(cell);
    switch (reading.kind) {
      case 'blank':
        return null;
      case 'text':
        return reading.text;
      case 'amount':
        return reading.dependsOnDecisions ? 'a formula of the decisions' : String(reading.form.constant);
      case 'truth-value':
        return 'TRUE or FALSE';
      case 'error-value':
        return reading.code;
      case 'refused':
        return 'a formula that cannot be read';
    }
  }

  private cellAt(cell: CellAddress): ReturnType<SheetSnapshot['cell']> {
    let sheet = this.sheets.get(cell.sheet);
    if (sheet === undefined && !this.sheets.has(cell.sheet)) {
      sheet = findSheet(this.workbook, cell.sheet);
      this.sheets.set(cell.sheet, sheet);
    }
    return sheet?.cell(cell.row, cell.column);
  }

  private readingsOf(sheet: string): Map<number, CellReading> {
    let readings = this.readings.get(sheet);
    if (readings === undefined) {
      readings = new Map<number, CellReading>();
      this.readings.set(sheet, readings);
    }
    return readings;
  }

  /** The targets that say anything, none twice: what a block's cell holds, or that it is a decision cell, blank or not. */
  private filledOnce(targets: readonly CellAddress[], decisions: readonly CellAddress[]): CellAddress[] {
    const areDecisions = new CellSet();
    decisions.forEach((cell) => areDecisions.add(cell));
    const seen = new CellSet();
    return targets.filter(
      (cell) => (this.cellAt(cell) !== undefined || areDecisions.has(cell)) && seen.add(cell),
    );
  }
}

/** A set of cells. */
class CellSet {
  private readonly bySheet = new Map<string, Set<number>>();

  /** @returns whether the cell is new */
  add(cell: CellAddress): boolean {
    const keys = this.bySheet.get(cell.sheet) ?? new Set<number>();
    this.bySheet.set(cell.sheet, keys);
    const size = keys.size;
    return keys.add(cellKey(cell.row, cell.column)).size > size;
  }

  has(cell: CellAddress): boolean {
    return this.bySheet.get(cell.sheet)?.has(cellKey(cell.row, cell.column)) === true;
  }
}

function readingOf(cell: CellAddress, position: number, linearization: Linearization): CellReading {
  const reading = linearization.readings[position];
  switch (reading.kind) {
    case 'affine':
      return {
        kind: 'amount',
        form: reading.form,
        dependsOnDecisions: !reading.form.isConstant || linearization.dependsOnDecisions(cell),
      };
    case 'refused':
      return {
        kind: 'refused',
        dependsOnDecisions: linearization.dependsOnDecisions(cell),
        issues: reading.issues,
      };
    case 'value': {
      const { value } = reading;
      if (typeof value === 'number') {
        return { kind: 'amount', form: AffineForm.constant(value), dependsOnDecisions: false };
      }
      if (typeof value === 'boolean') {
        return { kind: 'truth-value' };
      }
      if (value instanceof CellError) {
        return { kind: 'error-value', code: value.code };
      }
      return value === null || isBlankText(value) ? blank : { kind: 'text', text: value };
    }
  }
}

function formulaModelIssue(issue: FormulaIssue): FormulaModelIssue {
  return { code: issue.code, severity: severityOf(issue.code), cell: issue.cell, facts: issue.facts };
}
