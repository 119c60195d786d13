/**
 * Sheets, and what stands on them beside cells: names, tables, filters, PivotTables, comments, protection.
 */
import { maximumColumnCount, maximumRowCount } from '../../addin/domain/sheet/cell-address';
import { containsCell, type CellRange } from '../../addin/domain/sheet/cell-range';
import type { CellAddress } from '../../addin/domain/sheet/cell-address';
import { HostError } from './host-error';
import type { HostFilter, HostSheet } from './host-sheet';
import { oneCell, type HostTable } from './host-workbook';
import { namedItemCollectionKind } from './name-kinds';
import { HostObject, type ObjectKind } from './object-kind';
import { areasObject, parseAddress, rangeObject } from './range-kinds';
import { eventTypes } from './wire-protocol';

const wholeSheet = { top: 0, left: 0, bottom: maximumRowCount - 1, right: maximumColumnCount - 1 };

/** Members that register or drop an event, for one sheet or for all. */
export function eventMethods<T>(targetOf: (target: T) => string): NonNullable<ObjectKind<T>['methods']> {
  const members = Object.entries({
    DataChanged: eventTypes.dataChanged,
    Activated: eventTypes.sheetActivated,
    Added: eventTypes.sheetAdded,
    Deleted: eventTypes.sheetDeleted,
    SelectionChanged: eventTypes.selectionChanged,
  });
  return Object.fromEntries(
    members.flatMap(([name, type]): [string, NonNullable<ObjectKind<T>['methods']>[string]][] => [
      [
        `_Register${name}Event`,
        (target, session) => {
          session.registeredEvents.add(`${type}:${targetOf(target)}`);
          return null;
        },
      ],
      [
        `_Unregister${name}Event`,
        (target, session) => {
          session.registeredEvents.delete(`${type}:${targetOf(target)}`);
          return null;
        },
      ],
    ]),
  );
}

export const worksheetKind: ObjectKind<HostSheet> = {
  name: 'Worksheet',
  identity: (sheet) => ({ Id: sheet.id }),
  get: {
    Id: (sheet) => sheet.id,
    Name: (sheet) => sheet.name,
    Position: (sheet, { workbook }) => workbook.sheets.indexOf(sheet),
    Visibility: ({ visibility }) =>
      ({ visible: 'Visible', hidden: 'Hidden', veryHidden: 'VeryHidden' })[visibility],
    StandardWidth: () => 8.43,
  },
  set: {
    Name: (sheet, name, session) => {
      session.refuseWrite(undefined, 'Worksheet.name');
      sheet.name = String(name);
      session.workbook.structureChanged();
    },
  },
  objects: {
    Names: (sheet) => HostObject.of(namedItemCollectionKind, { scope: sheet }),
    Tables: (sheet) => HostObject.of(tableCollectionKind, { sheet }),
    Protection: (sheet) => HostObject.of(worksheetProtectionKind, sheet),
    AutoFilter: (sheet) => HostObject.of(autoFilterKind, { sheet, of: 'sheet', range: undefined }),
    PivotTables: (sheet) => HostObject.of(pivotTableCollectionKind, sheet),
    Comments: (sheet) => HostObject.of(commentCollectionKind, { sheet }),
  },
  methods: {
    GetRange: (sheet, _session, address) =>
      rangeObject(
        sheet,
        typeof address === 'string' ? parseAddress(address, 'Worksheet.getRange') : wholeSheet,
      ),
    GetRangeByIndexes: (sheet, _session, row, column, rows, columns) =>
      rangeObject(sheet, {
        top: row as number,
        left: column as number,
        bottom: (row as number) + (rows as number) - 1,
        right: (column as number) + (columns as number) - 1,
      }),
    GetRanges: (sheet, _session, address) =>
      areasObject(
        sheet,
        String(address)
          .split(',')
          .map((part) => parseAddress(part.trim(), 'Worksheet.getRanges')),
      ),
    GetCell: (sheet, _session, row, column) =>
      rangeObject(sheet, oneCell({ sheet: sheet.name, row: row as number, column: column as number })),
    GetUsedRange: (sheet) =>
      rangeObject(sheet, sheet.usedRange() ?? { top: 0, left: 0, bottom: 0, right: 0 }),
    GetUsedRangeOrNullObject: (sheet) => {
      const used = sheet.usedRange();
      return used === undefined ? null : rangeObject(sheet, used);
    },
    Activate: (sheet, { workbook }) => {
      workbook.selection = {
        sheet,
        ranges: [oneCell({ sheet: sheet.name, row: 0, column: 0 })],
      };
      return null;
    },
    Delete: (sheet, session) => {
      session.refuseWrite(undefined, 'Worksheet.delete');
      if (session.workbook.isStructureProtected) throw new HostError('AccessDenied', 'Worksheet.delete');
      session.workbook.deleteSheet(sheet);
      return null;
    },
    ...eventMethods<HostSheet>((sheet) => sheet.id),
  },
};

const worksheetProtectionKind: ObjectKind<HostSheet> = {
  name: 'WorksheetProtection',
  get: { Protected: (sheet) => sheet.isProtected },
};

interface FilterTarget {
  readonly sheet: HostSheet;
  /** `sheet`, or the name of a table. */
  readonly of: string;
  /** Where the filter's buttons stand, set or not; undefined where that is the filter's own range. */
  readonly range: CellRange | undefined;
}

function filterOf({ sheet, of }: FilterTarget): HostFilter | undefined {
  return sheet.filters.find((filter) => filter.of === of);
}

const autoFilterKind: ObjectKind<FilterTarget> = {
  name: 'AutoFilter',
  get: {
    Enabled: (target) => target.range !== undefined || filterOf(target) !== undefined,
    IsDataFiltered: (target) => filterOf(target) !== undefined,
  },
  methods: {
    GetRangeOrNullObject: (target) => {
      const range = target.range ?? filterOf(target)?.range;
      return range === undefined ? null : rangeObject(target.sheet, range);
    },
    ClearCriteria: (target, session) => {
      session.refuseWrite(target.sheet, 'AutoFilter.clearCriteria');
      clearFilter(target);
      return null;
    },
  },
};

function clearFilter(target: FilterTarget): void {
  const filter = filterOf(target);
  if (filter !== undefined) target.sheet.filters.splice(target.sheet.filters.indexOf(filter), 1);
}

/** All tables, or those of one sheet. */
export interface TablesTarget {
  readonly sheet: HostSheet | undefined;
}

export const tableCollectionKind: ObjectKind<TablesTarget> = {
  name: 'TableCollection',
  items: ({ sheet }, { workbook }) =>
    workbook.tables
      .filter((table) => sheet === undefined || table.sheet === sheet)
      .map((table) => HostObject.of(tableKind, table)),
  methods: {
    GetItem: (_target, { workbook }, key) => tableObject(workbook.tables, key),
    GetItemOrNullObject: (_target, { workbook }, key) => {
      const table = findTable(workbook.tables, key);
      return table === undefined ? null : HostObject.of(tableKind, table);
    },
  },
};

function findTable(tables: readonly HostTable[], key: unknown): HostTable | undefined {
  return tables.find(({ id, name }) => id === key || name.toLowerCase() === String(key).toLowerCase());
}

function tableObject(tables: readonly HostTable[], key: unknown): HostObject {
  const table = findTable(tables, key);
  if (table === undefined) throw new HostError('ItemNotFound', 'TableCollection.getItem');
  return HostObject.of(tableKind, table);
}

const tableKind: ObjectKind<HostTable> = {
  name: 'Table',
  identity: ({ id }) => ({ Id: id }),
  get: {
    Id: ({ id }) => id,
    Name: ({ name }) => name,
    ShowHeaders: ({ headerRowCount }) => headerRowCount > 0,
    ShowTotals: ({ totalsRowCount }) => totalsRowCount > 0,
  },
  objects: {
    Columns: (table) => HostObject.of(tableColumnCollectionKind, table),
    Worksheet: ({ sheet }) => HostObject.of(worksheetKind, sheet),
    AutoFilter: ({ sheet, name, range }) => HostObject.of(autoFilterKind, { sheet, of: name, range }),
  },
  methods: {
    GetRange: ({ sheet, range }) => rangeObject(sheet, range),
    ClearFilters: ({ sheet, name, range }, session) => {
      session.refuseWrite(sheet, 'Table.clearFilters');
      clearFilter({ sheet, of: name, range });
      return null;
    },
  },
};

const tableColumnCollectionKind: ObjectKind<HostTable> = {
  name: 'TableColumnCollection',
  items: (table) =>
    table.columnNames.map((name, position) => HostObject.of(tableColumnKind, { name, position })),
  methods: { GetCount: ({ columnNames }) => columnNames.length },
};

const tableColumnKind: ObjectKind<{ readonly name: string; readonly position: number }> = {
  name: 'TableColumn',
  identity: ({ position }) => ({ Id: position + 1 }),
  get: {
    Id: ({ position }) => position + 1,
    Index: ({ position }) => position,
    Name: ({ name }) => name,
  },
};

interface PivotTarget {
  readonly sheet: HostSheet;
  readonly range: CellRange;
  readonly position: number;
}

const pivotTableCollectionKind: ObjectKind<HostSheet> = {
  name: 'PivotTableCollection',
  items: (sheet) =>
    sheet.pivotRanges.map((range, position) => HostObject.of(pivotTableKind, { sheet, range, position })),
  methods: {
    GetItem: (sheet, _session, key) => {
      const position = sheet.pivotRanges.findIndex((_, at) => pivotName(at) === key);
      if (position < 0) throw new HostError('ItemNotFound', 'PivotTableCollection.getItem');
      return HostObject.of(pivotTableKind, { sheet, range: sheet.pivotRanges[position], position });
    },
  },
};

const pivotName = (position: number): string => `PivotTable${position + 1}`;

const pivotTableKind: ObjectKind<PivotTarget> = {
  name: 'PivotTable',
  identity: ({ position }) => ({ Id: pivotName(position) }),
  get: { Id: ({ position }) => pivotName(position), Name: ({ position }) => pivotName(position) },
  objects: {
    Layout: (pivot) => HostObject.of(pivotLayoutKind, pivot),
    FilterHierarchies: (pivot) => HostObject.of(filterHierarchyCollectionKind, pivot),
  },
};

const pivotLayoutKind: ObjectKind<PivotTarget> = {
  name: 'PivotLayout',
  methods: { GetRange: ({ sheet, range }) => rangeObject(sheet, range) },
};

/** PivotTables of the far end have no filters of their own above them. */
const filterHierarchyCollectionKind: ObjectKind<PivotTarget> = {
  name: 'FilterPivotHierarchyCollection',
  methods: { GetCount: () => 0 },
};

interface CommentTarget {
  readonly sheet: HostSheet;
  readonly cell: CellAddress;
}

const commentCollectionKind: ObjectKind<{ readonly sheet: HostSheet }> = {
  name: 'CommentCollection',
  items: ({ sheet }) => sheet.notedCells.map((cell) => HostObject.of(commentKind, { sheet, cell })),
  methods: {
    GetItem: ({ sheet }, _session, id) => {
      const cell = sheet.notedCells.find((noted) => commentId(noted) === id);
      if (cell === undefined) throw new HostError('ItemNotFound', 'CommentCollection.getItem');
      return HostObject.of(commentKind, { sheet, cell });
    },
    GetItemByCell: ({ sheet }, _session, address) => {
      const range = {
        sheet: sheet.name,
        ...parseAddress(String(address), 'CommentCollection.getItemByCell'),
      };
      const cell = sheet.notedCells.find((noted) => containsCell(range, { ...noted, sheet: sheet.name }));
      if (cell === undefined) throw new HostError('ItemNotFound', 'CommentCollection.getItemByCell');
      return HostObject.of(commentKind, { sheet, cell });
    },
  },
};

const commentId = ({ row, column }: CellAddress): string => `comment ${row},${column}`;

const commentKind: ObjectKind<CommentTarget> = {
  name: 'Comment',
  identity: ({ cell }) => ({ Id: commentId(cell) }),
  get: { Id: ({ cell }) => commentId(cell) },
  methods: { GetLocation: ({ sheet, cell }) => rangeObject(sheet, oneCell(cell)) },
};
