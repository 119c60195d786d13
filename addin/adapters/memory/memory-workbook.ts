/**
 * A workbook in plain maps: for tests, demos and the library's readers. It takes and refuses exactly what the file
 * adapter takes and refuses, so that a use-case tried here works there.
 *
 * Described as a planner would say it: cells by their A1 text, rows by the number shown beside them, columns by
 * their letters.
 */
import { columnOfLetters, formatCellAddress, type CellAddress } from '../../domain/sheet/cell-address';
import { containsCell, type CellRange } from '../../domain/sheet/cell-range';
import { CellError, type CellValue } from '../../domain/sheet/cell-value';
import type { DefinedName } from '../../domain/sheet/defined-name';
import type { SheetCell, TableSnapshot, WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import type { WorkbookWrite, WritePlan } from '../../domain/results-to-sheet/write-plan';
import { WorkbookError, type Workbook } from '../../ports/workbook';
import { MemorySheet } from './memory-sheet';

/** A cell in full. A formula may be given with or without `=`. */
export interface CellDescription {
  readonly value?: CellValue;
  readonly formula?: string;
  /** `C1:C5`: this cell holds an array formula, or one that spills, over these cells. */
  readonly fills?: string;
  readonly isDate?: boolean;
  readonly numberFormat?: string;
}

/**
 * What a key of a sheet's description stands for: a value, a text beginning with `=` (a formula with no value
 * stored), a cell in full, or rows of these, laid out from that cell on (null leaves a cell blank).
 */
export type CellContent = CellValue | CellDescription | readonly (readonly (CellValue | CellDescription)[])[];

export interface TableDescription {
  readonly name: string;
  readonly sheet: string;
  /** `A1:C5`: headings, data and totals. */
  readonly ref: string;
  /** Default 1 and 0. */
  readonly headerRowCount?: number;
  readonly totalsRowCount?: number;
  /** Default: the texts in the heading row. */
  readonly columnNames?: readonly string[];
}

type BySheet<T> = Readonly<Record<string, T>>;

export interface WorkbookDescription {
  /** Sheet by sheet in the order of the tabs; cells by their A1 text. */
  readonly sheets: BySheet<Readonly<Record<string, CellContent>>>;
  /** Defined names of the workbook, and of single sheets; `=` may be left out. */
  readonly names?: Readonly<Record<string, string>>;
  readonly localNames?: BySheet<Readonly<Record<string, string>>>;
  readonly hiddenNames?: readonly string[];
  readonly tables?: readonly TableDescription[];
  /** Row numbers as shown on the sheet, from 1. */
  readonly hiddenRows?: BySheet<readonly number[]>;
  /** Column letters. */
  readonly hiddenColumns?: BySheet<readonly string[]>;
  /** `A1:B1` each. */
  readonly merged?: BySheet<readonly string[]>;
  readonly pivots?: BySheet<readonly string[]>;
  /** `B2` each. */
  readonly noted?: BySheet<readonly string[]>;
  readonly hiddenSheets?: readonly string[];
  readonly protectedSheets?: readonly string[];
  readonly filteredSheets?: readonly string[];
  readonly usesDates1904?: boolean;
  readonly record?: string;
}

interface MemoryState {
  readonly sheets: readonly MemorySheet[];
  readonly names: readonly DefinedName[];
  readonly tables: readonly TableSnapshot[];
  readonly usesDates1904: boolean;
  readonly record: string | null;
  readonly recalculatesOnOpening: boolean;
}

export class MemoryWorkbook implements Workbook {
  private constructor(private state: MemoryState) {}

  /** @throws RangeError where a cell, range, row or column of the description cannot be */
  static of(description: WorkbookDescription): MemoryWorkbook {
    const sheets = Object.entries(description.sheets).map(([name, cells]) =>
      sheetOfDescription(name, cells, description),
    );
    const tables = (description.tables ?? []).map((table) => tableOfDescription(table, sheets));
    return new MemoryWorkbook({
      sheets,
      names: namesOfDescription(description),
      tables,
      usesDates1904: description.usesDates1904 ?? false,
      record: description.record ?? null,
      recalculatesOnOpening: false,
    });
  }

  /** What `read` gives, at once. It stays as it is when a plan is applied later. */
  snapshot(): WorkbookSnapshot {
    return this.state;
  }

  read(): Promise<WorkbookSnapshot> {
    return Promise.resolve(this.state);
  }

  apply(plan: WritePlan): Promise<void> {
    try {
      this.state = stateAfter(this.state, plan);
      return Promise.resolve();
    } catch (error) {
      return Promise.reject(error instanceof Error ? error : new Error(String(error)));
    }
  }

  /** Whether a plan asked for everything to be calculated anew. */
  get recalculatesOnOpening(): boolean {
    return this.state.recalculatesOnOpening;
  }

  /** The width a plan set, in characters; undefined where none did. */
  columnWidth(sheetName: string, column: number): number | undefined {
    return sheetNamed(this.state.sheets, sheetName)?.columnWidths.get(column);
  }
}

/** The workbook as it is once the whole plan is carried out. The given state stays untouched. */
function stateAfter(state: MemoryState, plan: WritePlan): MemoryState {
  const sheets = [...state.sheets];
  let names = state.names;
  let record = state.record;
  let recalculatesOnOpening = state.recalculatesOnOpening;
  const changeable = new Set<string>();

  /** The sheet's copy that this plan may change. */
  const sheetToChange = (name: string): MemorySheet => {
    const at = sheets.findIndex((sheet) => isSameText(sheet.name, name));
    if (at < 0) {
      throw new WorkbookError('write-failed', `The workbook has no sheet named ${name}.`);
    }
    if (!changeable.has(sheets[at].name)) {
      sheets[at] = sheets[at].copy();
      changeable.add(sheets[at].name);
    }
    return sheets[at];
  };
  const formatOf = (source: CellAddress | undefined): SheetCell | undefined =>
    source === undefined ? undefined : sheetNamed(sheets, source.sheet)?.cell(source.row, source.column);

  const perform = (write: WorkbookWrite): void => {
    switch (write.kind) {
      case 'value':
        writeValue(sheetToChange(write.cell.sheet), write.cell, write.value, formatOf(write.numberFormatOf));
        return;
      case 'storedValue':
        writeStoredValue(sheetToChange(write.cell.sheet), write.cell, write.value);
        return;
      case 'formula':
        writeFormula(
          sheetToChange(write.cell.sheet),
          write.cell,
          write.formula,
          write.value,
          formatOf(write.numberFormatOf),
        );
        return;
      case 'columnWidth':
        sheetToChange(write.sheet).columnWidths.set(write.column, write.width);
        return;
      case 'addSheet':
        if (sheetNamed(sheets, write.name) !== undefined) {
          throw new WorkbookError('would-overwrite', `The workbook already has a sheet named ${write.name}.`);
        }
        sheets.push(new MemorySheet(write.name, 'visible', false, [], [], [], false, new Set(), new Set()));
        changeable.add(write.name);
        return;
      case 'name': {
        const isThisName = (name: DefinedName): boolean =>
          isSameText(name.name, write.name) && isSameScope(name.scope, write.scope);
        const existing = names.find(isThisName);
        const renewed: DefinedName = {
          name: existing?.name ?? write.name,
          scope: existing === undefined ? write.scope : existing.scope,
          formula: write.formula,
          isHidden: existing?.isHidden ?? false,
        };
        names =
          existing === undefined ? [...names, renewed] : names.map((n) => (n === existing ? renewed : n));
        return;
      }
      case 'removeName':
        names = names.filter(
          (name) => !(isSameText(name.name, write.name) && isSameScope(name.scope, write.scope)),
        );
        return;
      case 'record':
        record = write.json;
        return;
      case 'recalculateOnOpening':
        recalculatesOnOpening = true;
        return;
    }
  };
  plan.forEach(perform);
  return {
    sheets,
    names,
    tables: state.tables,
    usesDates1904: state.usesDates1904,
    record,
    recalculatesOnOpening,
  };
}

function writeValue(
  sheet: MemorySheet,
  at: CellAddress,
  value: CellValue,
  format: SheetCell | undefined,
): void {
  refuseToOverwrite(sheet, at);
  refuseUnwritable(at, value);
  const before = sheet.cell(at.row, at.column);
  if (value === null) {
    sheet.removeCell(at.row, at.column);
    return;
  }
  sheet.setCell(at.row, at.column, {
    value: withoutNegativeZero(value),
    formula: undefined,
    arrayRange: undefined,
    isDate: (format ?? before)?.isDate ?? false,
    numberFormat: (format ?? before)?.numberFormat ?? 'General',
  });
}

function writeStoredValue(sheet: MemorySheet, at: CellAddress, value: CellValue | undefined): void {
  const before = sheet.cell(at.row, at.column);
  const isFilled = sheet.arrayOver(at) !== undefined;
  if (before?.formula === undefined && !isFilled) {
    throw new WorkbookError(
      'write-failed',
      `${formatCellAddress(at)} holds no formula whose value could be renewed.`,
    );
  }
  if (value !== undefined) {
    refuseUnwritable(at, value);
  }
  sheet.setCell(at.row, at.column, {
    value: value === undefined ? undefined : withoutNegativeZero(value),
    formula: before?.formula,
    arrayRange: before?.arrayRange,
    isDate: before?.isDate ?? false,
    numberFormat: before?.numberFormat ?? 'General',
  });
}

function writeFormula(
  sheet: MemorySheet,
  at: CellAddress,
  formula: string,
  value: CellValue,
  format: SheetCell | undefined,
): void {
  refuseToOverwrite(sheet, at);
  if ((sheet.cell(at.row, at.column)?.value ?? null) !== null) {
    throw new WorkbookError('would-overwrite', `${formatCellAddress(at)} already holds a value.`);
  }
  refuseUnwritable(at, value);
  sheet.setCell(at.row, at.column, {
    value: withoutNegativeZero(value),
    formula: formula.replace(/^=/, ''),
    arrayRange: undefined,
    isDate: format?.isDate ?? false,
    numberFormat: format?.numberFormat ?? 'General',
  });
}

/** @throws WorkbookError would-overwrite where a formula, a spill or a merged neighbour stands */
function refuseToOverwrite(sheet: MemorySheet, at: CellAddress): void {
  if (sheet.cell(at.row, at.column)?.formula !== undefined) {
    throw new WorkbookError('would-overwrite', `${formatCellAddress(at)} holds a formula.`);
  }
  if (sheet.arrayOver(at) !== undefined) {
    throw new WorkbookError('would-overwrite', `${formatCellAddress(at)} is filled by an array formula.`);
  }
  const merged = sheet.mergedRanges.find((range) => containsCell(range, { ...at, sheet: range.sheet }));
  if (merged !== undefined && (merged.top !== at.row || merged.left !== at.column)) {
    throw new WorkbookError('would-overwrite', `${formatCellAddress(at)} is covered by a merged cell.`);
  }
}

function refuseUnwritable(at: CellAddress, value: CellValue): void {
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new WorkbookError('write-failed', `${formatCellAddress(at)} cannot hold ${value}.`);
  }
}

function withoutNegativeZero<T extends CellValue>(value: T): T {
  return (Object.is(value, -0) ? 0 : value) as T;
}

function sheetNamed(sheets: readonly MemorySheet[], name: string): MemorySheet | undefined {
  return sheets.find((sheet) => isSameText(sheet.name, name));
}

function isSameText(a: string, b: string): boolean {
  return a.toLowerCase() === b.toLowerCase();
}

function isSameScope(a: string | null, b: string | null): boolean {
  return a === null || b === null ? a === b : isSameText(a, b);
}

// From descriptions to cells.

function sheetOfDescription(
  name: string,
  cells: Readonly<Record<string, CellContent>>,
  description: WorkbookDescription,
): MemorySheet {
  const ranges = (texts: readonly string[] | undefined): CellRange[] =>
    (texts ?? []).map((text) => rangeOfText(name, text));
  const sheet = new MemorySheet(
    name,
    description.hiddenSheets?.includes(name) === true ? 'hidden' : 'visible',
    description.protectedSheets?.includes(name) ?? false,
    ranges(description.merged?.[name]),
    ranges(description.noted?.[name]).map((range) => ({ sheet: name, row: range.top, column: range.left })),
    ranges(description.pivots?.[name]),
    description.filteredSheets?.includes(name) ?? false,
    new Set((description.hiddenRows?.[name] ?? []).map((row) => row - 1)),
    new Set((description.hiddenColumns?.[name] ?? []).map(columnOfLetters)),
  );
  for (const [text, content] of Object.entries(cells)) {
    const first = rangeOfText(name, text);
    const rows = isRows(content) ? content : [[content]];
    rows.forEach((row, down) =>
      row.forEach((entry, across) => setDescribedCell(sheet, first.top + down, first.left + across, entry)),
    );
  }
  return sheet;
}

function setDescribedCell(
  sheet: MemorySheet,
  row: number,
  column: number,
  content: CellValue | CellDescription,
): void {
  const full = isDescription(content) ? content : describedPlainly(content);
  const formula = full.formula?.replace(/^=/, '');
  if (formula === undefined && (full.value ?? null) === null) {
    return;
  }
  sheet.setCell(row, column, {
    value: full.value,
    formula,
    arrayRange: full.fills === undefined ? undefined : rangeOfText(sheet.name, full.fills),
    isDate: full.isDate ?? false,
    numberFormat: full.numberFormat ?? (full.isDate === true ? 'yyyy-mm-dd' : 'General'),
  });
}

function isRows(content: CellContent): content is readonly (readonly (CellValue | CellDescription)[])[] {
  return Array.isArray(content);
}

function isDescription(content: CellValue | CellDescription): content is CellDescription {
  return typeof content === 'object' && content !== null && !(content instanceof CellError);
}

function describedPlainly(value: CellValue): CellDescription {
  return typeof value === 'string' && value.startsWith('=') ? { formula: value } : { value };
}

function tableOfDescription(table: TableDescription, sheets: readonly MemorySheet[]): TableSnapshot {
  const range = rangeOfText(table.sheet, table.ref);
  const sheet = sheetNamed(sheets, table.sheet);
  const headings: string[] = [];
  for (let column = range.left; column <= range.right; column++) {
    headings.push(String(sheet?.cell(range.top, column)?.value ?? `Column${column - range.left + 1}`));
  }
  return {
    name: table.name,
    range,
    headerRowCount: table.headerRowCount ?? 1,
    totalsRowCount: table.totalsRowCount ?? 0,
    columnNames: table.columnNames ?? headings,
  };
}

function namesOfDescription(description: WorkbookDescription): DefinedName[] {
  const isHidden = (name: string): boolean => description.hiddenNames?.includes(name) ?? false;
  const listed = (names: Readonly<Record<string, string>>, scope: string | null): DefinedName[] =>
    Object.entries(names).map(([name, formula]) => ({
      name,
      scope,
      formula: formula.replace(/^=/, ''),
      isHidden: isHidden(name),
    }));
  return [
    ...listed(description.names ?? {}, null),
    ...Object.entries(description.localNames ?? {}).flatMap(([sheet, names]) => listed(names, sheet)),
  ];
}

/** @throws RangeError for anything but `A1` or `A1:B2`, `$` allowed */
function rangeOfText(sheet: string, text: string): CellRange {
  const match = /^\$?([A-Za-z]{1,3})\$?(\d+)(?::\$?([A-Za-z]{1,3})\$?(\d+))?$/.exec(text);
  if (match === null) {
    throw new RangeError(`"${text}" is no cell or range of cells.`);
  }
  const [, firstLetters, firstRow, lastLetters, lastRow] = match;
  const left = columnOfLetters(firstLetters);
  const top = Number(firstRow) - 1;
  return {
    sheet,
    top,
    left,
    bottom: lastRow === undefined ? top : Number(lastRow) - 1,
    right: lastLetters === undefined ? left : columnOfLetters(lastLetters),
  };
}
