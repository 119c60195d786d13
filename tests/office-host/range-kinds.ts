/**
 * Ranges and areas of ranges, as the library sees them.
 */
import {
  cellText,
  columnLetters,
  columnOfLetters,
  maximumColumnCount,
  maximumRowCount,
  quotedSheetName,
} from '../../addin/domain/sheet/cell-address';
import type { CellRange } from '../../addin/domain/sheet/cell-range';
import { CellError, type CellValue } from '../../addin/domain/sheet/cell-value';
import { HostError } from './host-error';
import { standardColumnWidth, type HostSheet } from './host-sheet';
import { HostObject, type HostSession, type ObjectKind } from './object-kind';
import { worksheetKind } from './worksheet-kinds';

/** A rectangle of one sheet. Its reference id is set once the library has asked to keep it. */
export interface RangeTarget {
  readonly sheet: HostSheet;
  readonly top: number;
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
  referenceId?: string;
}

/** Reading more cells than this gives null instead of values. */
export const readCellLimit = 5_000_000;
const wrongSize =
  "The number of rows or columns in the input array doesn't match the size or dimensions of the range.";

export function rangeObject(sheet: HostSheet, range: Omit<CellRange, 'sheet'>): HostObject {
  const { top, left, bottom, right } = range;
  return HostObject.of<RangeTarget>(rangeKind, { sheet, top, left, bottom, right });
}

/** `A1`, `B2:C3`, `D:D`, `4:5`, `$` and a sheet before it allowed. @throws HostError InvalidArgument */
export function parseAddress(address: string, location: string): Omit<CellRange, 'sheet'> {
  const text = address.replace(/^.*!/s, '').replaceAll('$', '');
  const match = /^([A-Z]{1,3})?(\d{1,7})?(?::([A-Z]{1,3})?(\d{1,7})?)?$/i.exec(text);
  if (match === null || text === '') {
    throw new HostError('InvalidArgument', location);
  }
  const [, firstLetters, firstRow, lastLetters = firstLetters, lastRow = firstRow] = match;
  if ((firstLetters === undefined || firstRow === undefined) && !text.includes(':')) {
    throw new HostError('InvalidArgument', location);
  }
  const columns = [firstLetters, lastLetters].map((letters, end) =>
    letters === undefined ? end * (maximumColumnCount - 1) : columnOfLetters(letters),
  );
  const rows = [firstRow, lastRow].map((row, end) =>
    row === undefined ? end * (maximumRowCount - 1) : Number(row) - 1,
  );
  const range = {
    top: Math.min(...rows),
    bottom: Math.max(...rows),
    left: Math.min(...columns),
    right: Math.max(...columns),
  };
  if (range.top < 0 || range.bottom >= maximumRowCount || range.right >= maximumColumnCount) {
    throw new HostError('InvalidArgument', location);
  }
  return range;
}

export function addressOf({ sheet, top, left, bottom, right }: RangeTarget): string {
  const prefix = `${quotedSheetName(sheet.name)}!`;
  if (top === 0 && bottom === maximumRowCount - 1) {
    return `${prefix}${columnLetters(left)}:${columnLetters(right)}`;
  }
  const first = cellText(top, left);
  const last = cellText(bottom, right);
  return prefix + (first === last ? first : `${first}:${last}`);
}

const rowsOf = (range: RangeTarget): number => range.bottom - range.top + 1;
const columnsOf = (range: RangeTarget): number => range.right - range.left + 1;
const cellCount = (range: RangeTarget): number => rowsOf(range) * columnsOf(range);

function grid<T>(range: RangeTarget, cell: (row: number, column: number) => T): T[][] | null {
  if (cellCount(range) > readCellLimit) {
    return null;
  }
  return Array.from({ length: rowsOf(range) }, (_, down) =>
    Array.from({ length: columnsOf(range) }, (_, across) => cell(range.top + down, range.left + across)),
  );
}

function shown(value: CellValue | undefined): number | string | boolean {
  if (value === null || value === undefined) return '';
  return value instanceof CellError ? value.code : value;
}

function valueType(value: CellValue | undefined): string {
  if (value === null || value === undefined) return 'Empty';
  if (value instanceof CellError) return 'Error';
  return { number: 'Double', string: 'String', boolean: 'Boolean' }[
    typeof value as 'number' | 'string' | 'boolean'
  ];
}

function formulaShown(range: RangeTarget, session: HostSession, row: number, column: number): unknown {
  const { sheet } = range;
  const array = sheet.arrayOver(row, column);
  if (array !== undefined && session.arrayFormulasShow === 'everywhere') {
    return `=${sheet.cell(array.top, array.left)?.formula ?? ''}`;
  }
  const content = sheet.contentAt(row, column);
  return content instanceof CellError ? content.code : (content ?? '');
}

/** true or false where it is so for all, null where the cells differ. */
function common<T>(values: Iterable<T>): T | null {
  let first: T | undefined;
  for (const value of values) {
    if (first === undefined) first = value;
    else if (first !== value) return null;
  }
  return first ?? null;
}

function* span(first: number, last: number): Generator<number> {
  for (let at = first; at <= last; at++) yield at;
}

function* cellsIn(range: RangeTarget): Generator<[row: number, column: number]> {
  for (const row of span(range.top, range.bottom)) {
    for (const column of span(range.left, range.right)) yield [row, column];
  }
}

/** One value for all cells, or one a cell; null leaves a cell alone. @throws HostError InvalidArgument on the size */
function eachCell(
  range: RangeTarget,
  input: unknown,
  location: string,
  visit: (row: number, column: number, value: unknown) => void,
): void {
  if (!Array.isArray(input)) {
    for (const [row, column] of cellsIn(range)) if (input !== null) visit(row, column, input);
    return;
  }
  const rows = input as readonly unknown[][];
  if (rows.length !== rowsOf(range) || rows.some((row) => row.length !== columnsOf(range))) {
    throw new HostError('InvalidArgument', location, wrongSize);
  }
  rows.forEach((row, down) =>
    row.forEach((value, across) => {
      if (value !== null) visit(range.top + down, range.left + across, value);
    }),
  );
}

/**
 * Values and formulas. Under a filter Excel counts only the rows that show: what is meant for a hidden row lands in
 * the next one that shows, and the rest is lost.
 */
function enterCells(range: RangeTarget, input: unknown, session: HostSession, location: string): void {
  const { sheet } = range;
  session.refuseWrite(sheet, location);
  const shownRows = sheet.hasActiveFilter
    ? [...span(range.top, range.bottom)].filter((row) => !sheet.filters.some((f) => f.hiddenRows.has(row)))
    : undefined;
  for (const [row, column] of cellsIn(range)) {
    const array = sheet.arrayOver(row, column);
    const isWhole = array !== undefined && array.top === row && array.left === column;
    if (array !== undefined && !isWhole && cellCount(range) === 1) {
      throw new HostError('InvalidOperation', location, 'You cannot change part of an array.');
    }
  }
  eachCell(range, input, location, (row, column, value) => {
    const target = shownRows === undefined ? row : shownRows[row - range.top];
    if (target !== undefined) sheet.enter(target, column, value);
  });
  session.workbook.cellsChanged();
  session.noteChange({ ...range, sheet: sheet.name }, sheet);
}

function derived(range: RangeTarget, change: Partial<Omit<CellRange, 'sheet'>>): HostObject {
  return rangeObject(range.sheet, { ...range, ...change });
}

export const rangeKind: ObjectKind<RangeTarget> = {
  name: 'Range',
  identity: (range) => ({ _ReferenceId: range.referenceId ?? '' }),
  get: {
    Values: (range, { workbook }) => {
      workbook.refresh();
      return grid(range, (row, column) => shown(range.sheet.cell(row, column)?.value));
    },
    ValueTypes: (range, { workbook }) => {
      workbook.refresh();
      return grid(range, (row, column) => valueType(range.sheet.cell(row, column)?.value));
    },
    Text: (range, { workbook }) => {
      workbook.refresh();
      return grid(range, (row, column) => String(shown(range.sheet.cell(row, column)?.value)));
    },
    Formulas: (range, session) => grid(range, (row, column) => formulaShown(range, session, row, column)),
    NumberFormat: (range) => grid(range, (row, column) => range.sheet.numberFormatAt(row, column)),
    Address: addressOf,
    RowIndex: (range) => range.top,
    ColumnIndex: (range) => range.left,
    RowCount: rowsOf,
    ColumnCount: columnsOf,
    CellCount: (range) => (cellCount(range) > 2 ** 31 - 1 ? -1 : cellCount(range)),
    RowHidden: (range) =>
      common([...span(range.top, range.bottom)].map((row) => range.sheet.isRowHidden(row))),
    ColumnHidden: (range) =>
      common([...span(range.left, range.right)].map((column) => range.sheet.isColumnHidden(column))),
    HasSpill: (range) => common(arrayMarks(range)),
    SavedAsArray: (range) => common(arrayMarks(range)),
    _ReferenceId: (range) => range.referenceId ?? '',
  },
  set: {
    Values: (range, input, session) => enterCells(range, input, session, 'Range.values'),
    Formulas: (range, input, session) => enterCells(range, input, session, 'Range.formulas'),
    NumberFormat: (range, input, session) => {
      session.refuseWrite(range.sheet, 'Range.numberFormat');
      eachCell(range, input, 'Range.numberFormat', (row, column, format) =>
        range.sheet.setNumberFormat(row, column, String(format)),
      );
    },
  },
  objects: {
    Worksheet: ({ sheet }) => HostObject.of(worksheetKind, sheet),
    Format: (range) => HostObject.of(rangeFormatKind, range),
  },
  methods: {
    GetCell: (range, _session, row, column) => {
      const [top, left] = [range.top + (row as number), range.left + (column as number)];
      return derived(range, { top, left, bottom: top, right: left });
    },
    GetRow: (range, _session, row) => {
      const top = range.top + (row as number);
      return derived(range, { top, bottom: top });
    },
    GetColumn: (range, _session, column) => {
      const left = range.left + (column as number);
      return derived(range, { left, right: left });
    },
    GetBoundingRect: (range, _session, other) => {
      const more =
        other instanceof HostObject
          ? (other.target as RangeTarget)
          : parseAddress(String(other), 'Range.getBoundingRect');
      return derived(range, {
        top: Math.min(range.top, more.top),
        left: Math.min(range.left, more.left),
        bottom: Math.max(range.bottom, more.bottom),
        right: Math.max(range.right, more.right),
      });
    },
    GetRowProperties: (range) =>
      [...span(range.top, range.bottom)].map((row) => ({ rowHidden: range.sheet.isRowHidden(row) })),
    GetColumnProperties: (range) =>
      [...span(range.left, range.right)].map((column) => ({
        columnHidden: range.sheet.isColumnHidden(column),
      })),
    GetMergedAreasOrNullObject: (range) => {
      const merged = range.sheet.mergedRanges.filter((area) => overlaps(area, range));
      return merged.length === 0 ? null : areasObject(range.sheet, merged);
    },
    GetSpillingToRangeOrNullObject: (range) => {
      const array = range.sheet.arrayOver(range.top, range.left);
      const isFirst = array?.top === range.top && array.left === range.left;
      return array !== undefined && isFirst ? rangeObject(range.sheet, array) : null;
    },
    Select: (range, { workbook }) => {
      const { sheet, top, left, bottom, right } = range;
      workbook.selection = { sheet, ranges: [{ sheet: sheet.name, top, left, bottom, right }] };
      return null;
    },
    Clear: (range, session, applyTo) => {
      session.refuseWrite(range.sheet, 'Range.clear');
      if (applyTo !== 'Formats') enterCells(range, '', session, 'Range.clear');
      return null;
    },
    _ValidateArraySize: (range, _session, rows, columns) => {
      if (rows !== rowsOf(range) || columns !== columnsOf(range)) {
        throw new HostError('InvalidArgument', 'Range.values', wrongSize);
      }
      return null;
    },
    _KeepReference: (range, session) => {
      if (range.referenceId === undefined) {
        range.referenceId = session.workbook.newId();
        session.references.set(range.referenceId, HostObject.of(rangeKind, range));
      }
      return null;
    },
  },
};

/** Whether cells are filled by an array formula: one mark a cell, or one for all where there is no such formula. */
function arrayMarks(range: RangeTarget): Iterable<boolean> {
  const { sheet } = range;
  if (!sheet.arrays.some((array) => overlaps(array, range))) return [false];
  return [...cellsIn(range)].map(([row, column]) => sheet.arrayOver(row, column) !== undefined);
}

function overlaps(a: Omit<CellRange, 'sheet'>, b: Omit<CellRange, 'sheet'>): boolean {
  return a.top <= b.bottom && b.top <= a.bottom && a.left <= b.right && b.left <= a.right;
}

const rangeFormatKind: ObjectKind<RangeTarget> = {
  name: 'RangeFormat',
  get: {
    WrapText: (range) =>
      common([...cellsIn(range)].map(([row, column]) => range.sheet.wrapsTextAt(row, column))),
    ColumnWidth: (range) =>
      common(
        [...span(range.left, range.right)].map(
          (column) => range.sheet.columnWidths.get(column) ?? standardColumnWidth,
        ),
      ),
  },
  set: {
    WrapText: (range, wraps, session) => {
      session.refuseWrite(range.sheet, 'RangeFormat.wrapText');
      for (const [row, column] of cellsIn(range)) range.sheet.setWrapsText(row, column, wraps === true);
    },
    ColumnWidth: (range, width, session) => {
      session.refuseWrite(range.sheet, 'RangeFormat.columnWidth');
      for (const column of span(range.left, range.right)) {
        range.sheet.columnWidths.set(column, width as number);
      }
    },
  },
};

interface AreasTarget {
  readonly sheet: HostSheet;
  readonly areas: readonly Omit<CellRange, 'sheet'>[];
  referenceId?: string;
}

/** The address of several areas is cut off after this many characters. */
const addressLimit = 8192;

export function areasObject(sheet: HostSheet, areas: readonly Omit<CellRange, 'sheet'>[]): HostObject {
  return HostObject.of<AreasTarget>(rangeAreasKind, { sheet, areas });
}

const rangeAreasKind: ObjectKind<AreasTarget> = {
  name: 'RangeAreas',
  identity: (areas) => ({ _ReferenceId: areas.referenceId ?? '' }),
  get: {
    Address: ({ sheet, areas }) =>
      areas
        .map((area) => addressOf({ sheet, ...area }))
        .join(',')
        .slice(0, addressLimit),
    AreaCount: ({ areas }) => areas.length,
    CellCount: ({ sheet, areas }) => areas.reduce((sum, area) => sum + cellCount({ sheet, ...area }), 0),
    _ReferenceId: (areas) => areas.referenceId ?? '',
  },
  objects: {
    Areas: (target) => HostObject.of(rangeCollectionKind, target),
    Worksheet: ({ sheet }) => HostObject.of(worksheetKind, sheet),
  },
  methods: {
    Select: ({ sheet, areas }, { workbook }) => {
      workbook.selection = { sheet, ranges: areas.map((area) => ({ ...area, sheet: sheet.name })) };
      return null;
    },
    _KeepReference: (areas, session) => {
      if (areas.referenceId === undefined) {
        areas.referenceId = session.workbook.newId();
        session.references.set(areas.referenceId, HostObject.of(rangeAreasKind, areas));
      }
      return null;
    },
  },
};

const rangeCollectionKind: ObjectKind<AreasTarget> = {
  name: 'RangeCollection',
  items: ({ sheet, areas }) => areas.map((area) => rangeObject(sheet, area)),
  methods: {
    GetCount: ({ areas }) => areas.length,
    GetItemAt: ({ sheet, areas }, _session, position) => rangeObject(sheet, areas[position as number]),
  },
};
