/**
 * A write plan sorted by what it touches: cells by sheet, widths, new sheets, names, the record. Writes to one cell
 * are drawn together in their order, so that each cell is changed once. Every adapter begins with this, so that all
 * refuse the same plans.
 */
import { cellKey, formatCellAddress, type CellAddress } from '../domain/sheet/cell-address';
import { cellLimits } from '../domain/sheet/cell-limits';
import type { CellValue } from '../domain/sheet/cell-value';
import type { NameRemoval, NameWrite, WorkbookWrite, WritePlan } from '../domain/results-to-sheet/write-plan';
import { WorkbookError } from './workbook';

export type ContentEdit =
  | { readonly kind: 'value'; readonly value: Exclude<CellValue, object> }
  | { readonly kind: 'storedValue'; readonly value: CellValue | undefined }
  /** `replacesValue`: an earlier write of the plan has emptied the cell. */
  | {
      readonly kind: 'formula';
      readonly formula: string;
      readonly value: CellValue | undefined;
      readonly replacesValue: boolean;
    };

export interface CellEdit {
  readonly cell: CellAddress;
  readonly content: ContentEdit;
  /** The cell whose number format is taken: one that this plan does not reformat itself. */
  readonly numberFormatOf: CellAddress | undefined;
  readonly wrapsText: boolean;
}

export interface SheetEdits {
  /** By cellKey. */
  readonly cells: Map<number, CellEdit>;
  /** By column, in characters. */
  readonly widths: Map<number, number>;
}

export interface PlannedEdits {
  /** By the sheet's name to the letter, sheets added by the plan among them. */
  readonly sheets: ReadonlyMap<string, SheetEdits>;
  readonly addedSheets: readonly string[];
  /** In their order: of several for one name, the last counts. */
  readonly names: readonly (NameWrite | NameRemoval)[];
  readonly record: string | undefined;
  readonly recalculatesOnOpening: boolean;
}

/**
 * @param sheetNames of the workbook before the plan
 * @throws WorkbookError write-failed or would-overwrite where a write cannot be done whatever the cells hold
 */
export function planEdits(plan: WritePlan, sheetNames: readonly string[], fileName: string): PlannedEdits {
  const planner = new EditPlanner(sheetNames, fileName);
  for (const write of plan) planner.add(write);
  return planner;
}

class EditPlanner implements PlannedEdits {
  readonly sheets = new Map<string, SheetEdits>();
  readonly addedSheets: string[] = [];
  readonly names: (NameWrite | NameRemoval)[] = [];
  record: string | undefined;
  recalculatesOnOpening = false;
  /** The names of all sheets to the letter, by their name in lower case. */
  private readonly exactNames: Map<string, string>;

  constructor(
    sheetNames: readonly string[],
    private readonly fileName: string,
  ) {
    this.exactNames = new Map(sheetNames.map((name) => [name.toLowerCase(), name]));
  }

  add(write: WorkbookWrite): void {
    switch (write.kind) {
      case 'value': {
        const before = this.editOf(write.cell);
        if (before !== undefined && before.content.kind !== 'value') throw this.overFormula(write.cell);
        this.refuseUnwritable(write.cell, write.value);
        this.setEdit(
          write,
          { kind: 'value', value: write.value },
          write.wrapsText ?? before?.wrapsText ?? false,
        );
        return;
      }
      case 'storedValue': {
        const before = this.editOf(write.cell)?.content;
        if (before?.kind === 'value') {
          throw this.notWritten(
            `${formatCellAddress(write.cell)} holds no formula whose value could be renewed`,
          );
        }
        this.refuseUnwritable(write.cell, write.value);
        this.setEdit(
          write,
          before?.kind === 'formula'
            ? { ...before, value: write.value }
            : { kind: 'storedValue', value: write.value },
          false,
        );
        return;
      }
      case 'formula': {
        const before = this.editOf(write.cell);
        if (before !== undefined && before.content.kind !== 'value') throw this.overFormula(write.cell);
        const replacesValue = before !== undefined;
        if (before?.content.kind === 'value' && before.content.value !== null) {
          throw this.wouldOverwrite(`${formatCellAddress(write.cell)} already holds a value`);
        }
        const formula = write.formula.replace(/^=/, '');
        if (formula === '' || formula.length > cellLimits.formulaLength || hasIllegalCharacter(formula)) {
          throw this.notWritten(`the formula for ${formatCellAddress(write.cell)} cannot stand in a cell`);
        }
        this.refuseUnwritable(write.cell, write.value);
        this.setEdit(
          write,
          { kind: 'formula', formula, value: write.value, replacesValue },
          before?.wrapsText ?? false,
        );
        return;
      }
      case 'columnWidth':
        if (!(write.width > 0 && write.width <= 255)) {
          throw this.notWritten(`a column cannot be ${write.width} characters wide`);
        }
        this.editsOf(write.sheet).widths.set(write.column, write.width);
        return;
      case 'addSheet':
        this.addSheet(write.name);
        return;
      case 'name':
        this.addName(write);
        return;
      case 'removeName':
        this.names.push(write);
        return;
      case 'record':
        this.record = write.json;
        return;
      case 'recalculateOnOpening':
        this.recalculatesOnOpening = true;
        return;
    }
  }

  private editsOf(sheetName: string): SheetEdits {
    const exact = this.exactNames.get(sheetName.toLowerCase());
    if (exact === undefined) throw this.notWritten(`it has no sheet named ${sheetName}`);
    let edits = this.sheets.get(exact);
    if (edits === undefined) {
      edits = { cells: new Map(), widths: new Map() };
      this.sheets.set(exact, edits);
    }
    return edits;
  }

  private editOf(cell: CellAddress): CellEdit | undefined {
    return this.editsOf(cell.sheet).cells.get(cellKey(cell.row, cell.column));
  }

  private setEdit(
    write: { readonly cell: CellAddress; readonly numberFormatOf?: CellAddress | undefined },
    content: ContentEdit,
    wrapsText: boolean,
  ): void {
    const { cell } = write;
    let source = write.numberFormatOf;
    if (source !== undefined) {
      const sheet = this.exactNames.get(source.sheet.toLowerCase());
      if (sheet === undefined) throw this.notWritten(`it has no sheet named ${source.sheet}`);
      // A source that the plan has formatted itself stands for the cell from which it took its own format.
      source = this.editOf(source)?.numberFormatOf ?? { ...source, sheet };
    }
    this.editsOf(cell.sheet).cells.set(cellKey(cell.row, cell.column), {
      cell,
      content,
      numberFormatOf: source ?? this.editOf(cell)?.numberFormatOf,
      wrapsText,
    });
  }

  private addSheet(name: string): void {
    const isPossible =
      name.length >= 1 &&
      name.length <= 31 &&
      !/[\\/?*:[\]]|^'|'$/.test(name) &&
      name.toLowerCase() !== 'history' &&
      !hasIllegalCharacter(name);
    if (!isPossible) throw this.notWritten(`a sheet cannot be named ${name}`);
    if (this.exactNames.has(name.toLowerCase())) {
      throw this.wouldOverwrite(`it already has a sheet named ${name}`);
    }
    this.exactNames.set(name.toLowerCase(), name);
    this.addedSheets.push(name);
    this.editsOf(name);
  }

  private addName(write: NameWrite): void {
    const isPossible =
      /^[\p{L}_\\][\p{L}\p{M}\p{N}_.\\?]*$/u.test(write.name) &&
      write.name.length <= 255 &&
      !/^([A-Za-z]{1,3}[0-9]{1,7}|[Rr]([0-9]*([Cc][0-9]*)?)?|[Cc][0-9]*)$/.test(write.name);
    if (!isPossible) throw this.notWritten(`${write.name} cannot be a name in a workbook`);
    const formula = write.formula.replace(/^=/, '');
    if (formula === '' || formula.length > cellLimits.formulaLength || hasIllegalCharacter(formula)) {
      throw this.notWritten(`the name ${write.name} cannot refer to what was asked`);
    }
    if (write.scope !== null && !this.exactNames.has(write.scope.toLowerCase())) {
      throw this.notWritten(`it has no sheet named ${write.scope}`);
    }
    this.names.push({ ...write, formula });
  }

  private refuseUnwritable(cell: CellAddress, value: CellValue | undefined): void {
    if (typeof value === 'number' && !Number.isFinite(value)) {
      throw this.notWritten(`${formatCellAddress(cell)} cannot hold ${value}`);
    }
    if (typeof value === 'string' && value.length > cellLimits.textLength) {
      throw this.notWritten(`the text for ${formatCellAddress(cell)} is longer than a cell can hold`);
    }
  }

  private overFormula(cell: CellAddress): WorkbookError {
    return this.wouldOverwrite(`${formatCellAddress(cell)} holds a formula`);
  }

  private wouldOverwrite(why: string): WorkbookError {
    return new WorkbookError('would-overwrite', nothingWritten(this.fileName, why));
  }

  private notWritten(why: string): WorkbookError {
    return new WorkbookError('write-failed', nothingWritten(this.fileName, why));
  }
}

/** The sentence for a plan that is not carried out. */
export function nothingWritten(fileName: string, why: string): string {
  return `Nothing was written to ${fileName}, because ${why}.`;
}

/** Characters that XML cannot hold and that names and formulas have no escape for. */
function hasIllegalCharacter(text: string): boolean {
  return /[\p{Cs}\uFFFE\uFFFF]|(?![\t\n\r])[\p{Cc}]/u.test(text);
}
