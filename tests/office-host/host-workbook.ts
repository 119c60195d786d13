/**
 * The workbook that the far end of Office.js keeps open: the same cells, names and tables that every other face reads,
 * made changeable, and calculated by the add-in's own evaluator, so that a value written comes back as new results.
 */
import { CalculationGrid, ArrayPart } from '../../addin/domain/calculation/calculation-grid';
import { forEachNode } from '../../addin/domain/calculation/dependency-graph';
import { Matrix } from '../../addin/domain/calculation/evaluated-value';
import { Evaluator } from '../../addin/domain/calculation/evaluator';
import { plainNumbers } from '../../addin/domain/calculation/number-domain';
import type { CellAddress } from '../../addin/domain/sheet/cell-address';
import type { CellRange } from '../../addin/domain/sheet/cell-range';
import { CellError, type CellValue } from '../../addin/domain/sheet/cell-value';
import type { DefinedName } from '../../addin/domain/sheet/defined-name';
import type { TableSnapshot, WorkbookSnapshot } from '../../addin/domain/sheet/sheet-snapshot';
import { recordNamespace } from '../../addin/domain/results-to-sheet/record-text';
import { HostError } from './host-error';
import { HostSheet } from './host-sheet';

export interface HostName {
  name: string;
  /** undefined: of the whole workbook. */
  readonly scope: HostSheet | undefined;
  /** Without `=`. */
  formula: string;
  isVisible: boolean;
  comment: string;
}

export interface HostXmlPart {
  readonly id: string;
  xml: string;
}

export interface HostTable extends TableSnapshot {
  readonly id: string;
  readonly sheet: HostSheet;
}

/** What is selected: rectangles of one sheet. */
export interface HostSelection {
  readonly sheet: HostSheet;
  readonly ranges: readonly CellRange[];
}

export type CalculationMode = 'Automatic' | 'AutomaticExceptTables' | 'Manual';

export class HostWorkbook {
  readonly sheets: HostSheet[] = [];
  readonly names: HostName[] = [];
  readonly tables: HostTable[] = [];
  readonly xmlParts: HostXmlPart[] = [];
  readonly settings = new Map<string, unknown>();
  readonly usesDates1904: boolean;
  /** Nobody may write anything. */
  isReadOnly = false;
  /** Sheets can be neither added nor deleted. */
  isStructureProtected = false;
  calculationMode: CalculationMode = 'Automatic';
  selection: HostSelection;
  /** Counts the times that everything was calculated. */
  calculationCount = 0;

  private nextId = 1;
  /** Some cell has changed since the last calculation. */
  private isStale = false;
  private view: WorkbookSnapshot | undefined;

  private constructor(
    source: WorkbookSnapshot,
    /** Date and time of TODAY and NOW, as a serial date. */
    private readonly now: number,
  ) {
    this.usesDates1904 = source.usesDates1904;
    for (const sheet of source.sheets) {
      this.sheets.push(HostSheet.of(sheet, this.newId()));
    }
    for (const { name, scope, formula, isHidden } of source.names) {
      this.names.push({
        name,
        scope: scope === null ? undefined : this.sheetNamed(scope),
        formula,
        isVisible: !isHidden,
        comment: '',
      });
    }
    for (const table of source.tables) {
      this.tables.push({ ...table, id: this.newId(), sheet: this.sheetNamed(table.range.sheet)! });
    }
    if (source.record !== null) {
      this.addXmlPart(`<record xmlns="${recordNamespace}">${escapeXml(source.record)}</record>`);
    }
    const [first] = this.sheets;
    this.selection = { sheet: first, ranges: [oneCell({ sheet: first.name, row: 0, column: 0 })] };
    this.calculate('missing');
  }

  /** A workbook opened with the content of a snapshot. Formulas without a stored value are calculated at once. */
  static of(source: WorkbookSnapshot, now = 46_000): HostWorkbook {
    return new HostWorkbook(source, now);
  }

  sheetNamed(name: string): HostSheet | undefined {
    const wanted = name.toLowerCase();
    return this.sheets.find((sheet) => sheet.name.toLowerCase() === wanted);
  }

  /** By name, or by the id that the library uses. */
  findSheet(key: string): HostSheet | undefined {
    return this.sheets.find(({ id }) => id === key) ?? this.sheetNamed(key);
  }

  addSheet(name: string): HostSheet {
    const sheet = HostSheet.empty(name, this.newId());
    this.sheets.push(sheet);
    this.structureChanged();
    return sheet;
  }

  /** Formulas and names that led to the sheet lead nowhere afterwards. */
  deleteSheet(sheet: HostSheet): void {
    if (this.sheets.length === 1) {
      throw new HostError('InvalidOperation', 'Worksheet.delete');
    }
    this.sheets.splice(this.sheets.indexOf(sheet), 1);
    const left = this.names.filter((name) => name.scope !== sheet);
    this.names.splice(0, this.names.length, ...left);
    const gone = this.tables.filter((table) => table.sheet !== sheet);
    this.tables.splice(0, this.tables.length, ...gone);
    if (this.selection.sheet === sheet) {
      const [first] = this.sheets;
      this.selection = { sheet: first, ranges: [oneCell({ sheet: first.name, row: 0, column: 0 })] };
    }
    this.structureChanged();
  }

  /** Names of the workbook only, or of one sheet only. */
  namesOf(scope: HostSheet | undefined): HostName[] {
    return this.names.filter((name) => name.scope === scope);
  }

  findName(name: string, scope: HostSheet | undefined): HostName | undefined {
    const wanted = name.toLowerCase();
    return this.namesOf(scope).find((candidate) => candidate.name.toLowerCase() === wanted);
  }

  addName(name: string, scope: HostSheet | undefined, formula: string, comment: string): HostName {
    const added = { name, scope, formula, isVisible: true, comment };
    this.names.push(added);
    this.structureChanged();
    return added;
  }

  deleteName(name: HostName): void {
    this.names.splice(this.names.indexOf(name), 1);
    this.structureChanged();
  }

  addXmlPart(xml: string): HostXmlPart {
    const part = { id: this.newId(), xml };
    this.xmlParts.push(part);
    return part;
  }

  /** Names, sheets or tables have changed: formulas are looked up anew. */
  structureChanged(): void {
    this.view = undefined;
    this.cellsChanged();
  }

  cellsChanged(): void {
    this.isStale = true;
  }

  /** Brings all values up to date, unless the planner calculates by hand. */
  refresh(): void {
    if (this.isStale && this.calculationMode !== 'Manual') {
      this.calculate('all');
    }
  }

  /** Everything as other faces read it. A formula's value is up to date where the workbook calculates by itself. */
  snapshot(): WorkbookSnapshot {
    this.refresh();
    return (this.view ??= {
      sheets: [...this.sheets],
      names: this.names.map(({ name, scope, formula, isVisible }): DefinedName => ({
        name,
        scope: scope?.name ?? null,
        formula,
        isHidden: !isVisible,
      })),
      tables: this.tables.map((table) => ({ ...table, range: { ...table.range, sheet: table.sheet.name } })),
      usesDates1904: this.usesDates1904,
      record: null,
    });
  }

  calculate(which: 'all' | 'missing'): void {
    this.isStale = false;
    this.calculationCount++;
    const grid = new CalculationGrid(this.snapshot(), []);
    grid.readAllSheets();
    const evaluator = new Evaluator(grid, {
      domain: plainNumbers,
      inputs: [],
      now: this.now,
      needsEvaluation: (cell) => which === 'all' || cell.cell.value === undefined,
    });
    for (const formulaCell of grid.formulaCells) {
      if (which === 'missing' && formulaCell.cell.value !== undefined) {
        continue;
      }
      const outcome = evaluator.outcomeOf(formulaCell);
      const sheet = this.sheetNamed(formulaCell.grid.name)!;
      const { row, column } = formulaCell;
      const isCircle = outcome.kind === 'refused' && outcome.refusal.reason.code === 'circular-reference';
      if (outcome.kind !== 'value') {
        // A formula that our evaluator does not know keeps the value it was opened with; a circle shows 0.
        sheet.setResult(row, column, isCircle ? 0 : (formulaCell.cell.value ?? CellError.of('#NAME?')));
        continue;
      }
      const { value } = outcome;
      const part = (atRow: number, atColumn: number): CellValue => {
        const found = value instanceof Matrix ? value.at(atRow - row, atColumn - column) : value;
        return (found ?? 0) as CellValue;
      };
      sheet.setResult(row, column, part(row, column));
      if (formulaCell.cell.arrayRange !== undefined) {
        forEachNode(formulaCell.grid, formulaCell.cell.arrayRange, (node) => {
          if (node instanceof ArrayPart && node.anchor === formulaCell) {
            sheet.setFilled(node.row, node.column, part(node.row, node.column));
          }
        });
      }
    }
  }

  newId(): string {
    return `{00000000-0000-0000-0000-${String(this.nextId++).padStart(12, '0')}}`;
  }
}

export function oneCell(cell: CellAddress): CellRange {
  return { sheet: cell.sheet, top: cell.row, left: cell.column, bottom: cell.row, right: cell.column };
}

function escapeXml(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
}
