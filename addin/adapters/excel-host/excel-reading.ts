/// <reference types="office-js" />
/**
 * Reads the workbook in few round trips: names and sheets, then what each sheet uses, then the cells in messages of
 * 4 MB, and one more where a sheet holds array formulas.
 *
 * A name's formula is read as text and resolved by us: asking Excel for the range of a name that is computed, has
 * several areas or is dead throws, and has crashed older versions.
 *
 * All sheets are read as long as they are not very large. In a large workbook only those are read that some name or
 * formula leads to from the plans' names; the others are listed without cells, since nothing can refer to them.
 */
import { columnLetters, maximumColumnCount, maximumRowCount } from '../../domain/sheet/cell-address';
import { cellCountOf, type CellRange } from '../../domain/sheet/cell-range';
import type { DefinedName } from '../../domain/sheet/defined-name';
import type {
  SheetSnapshot,
  SheetVisibility,
  TableSnapshot,
  WorkbookSnapshot,
} from '../../domain/sheet/sheet-snapshot';
import { readRoleName } from '../../domain/model-from-sheet/naming-convention';
import { searchedLaneCount } from '../../domain/results-to-sheet/free-columns';
import { recordNamespace } from '../../domain/results-to-sheet/record-text';
import { WorkbookError } from '../../ports/workbook';
import { askForArrays, markArraysByText } from './excel-arrays';
import type { OpenBatch } from './excel-batch';
import { RangeQueue } from './excel-chunking';
import { isAnswerTooLarge } from './excel-errors';
import { cellRangeOf, placeOfRange, rangeOn, rangesOfAddress, type LoadedRange } from './excel-ranges';
import { recordOfXml } from './excel-record';
import type { ExcelAbilities } from './excel-requirements';
import { ExcelSheet } from './excel-sheet';

/** Up to here all sheets are read, whether or not a plan needs them. */
const cellsReadAnyway = 400_000;
/** More cells than this are not held at once. */
const cellLimit = 6_000_000;

/** What a sheet's own round trip asks for. */
interface SheetRequest {
  readonly name: string;
  readonly visibility: SheetVisibility;
  readonly used: LoadedRange;
  readonly names: Excel.NamedItemCollection;
  readonly protection: Excel.WorksheetProtection;
  readonly autoFilter: Excel.AutoFilter;
  readonly pivotTables: Excel.PivotTableCollection;
  readonly comments: Excel.CommentCollection | undefined;
  readonly notes: Excel.NoteCollection | undefined;
  readonly merged: Excel.RangeAreas | undefined;
}

interface TableRequest {
  readonly table: Excel.Table;
  readonly range: LoadedRange;
}

/** A sheet whose cells can be read: where it stands among the tabs, and whether it may hold array formulas. */
interface SheetAtWork {
  readonly sheet: ExcelSheet;
  readonly used: CellRange;
  readonly request: SheetRequest;
  readonly mayHoldArrays: boolean;
  isRead: boolean;
}

/** @throws WorkbookError */
export async function readExcelWorkbook(
  batch: OpenBatch,
  abilities: ExcelAbilities,
): Promise<WorkbookSnapshot> {
  const { context } = batch;
  const { workbook } = context;

  // First round trip: what there is.
  const names = workbook.names.load('items/name,items/formula,items/visible,items/scope');
  const worksheets = workbook.worksheets.load('items/id,items/name,items/visibility');
  const tables = workbook.tables.load('items/id,items/name,items/showHeaders,items/showTotals');
  const records = workbook.customXmlParts.getByNamespace(recordNamespace).load('items/id');
  // Day 1 of the count from 1904 is the second of January 1904, which counts 1,463 from 1900.
  const secondOfJanuary1904 = workbook.functions.date(1904, 1, 2).load('value');
  await batch.sync();

  // Second round trip: what stands on each sheet, cells apart.
  const requests = worksheets.items.map((worksheet) => requestSheet(worksheet, abilities));
  const tableRequests = tables.items.map((table): TableRequest => {
    table.columns.load('items/name');
    table.worksheet.load('name');
    table.autoFilter.load('isDataFiltered');
    return { table, range: table.getRange().load(placeOfRange) };
  });
  const recordXml = records.items[0]?.getXml();
  await batch.sync();

  const tableSnapshots = tableRequests.map(tableOf);
  const filteredSheets = new Set(
    tableRequests
      .filter(({ table }) => table.autoFilter.isDataFiltered)
      .map(({ table }) => table.worksheet.name),
  );
  const definedNames = [
    ...workbookNamesOf(names),
    ...requests.flatMap(({ name, names: local }) => local.items.map((item) => definedNameOf(item, name))),
  ];
  const sheets: SheetSnapshot[] = [];
  const atWork: SheetAtWork[] = [];
  for (const request of requests) {
    const { name, visibility, protection, autoFilter } = request;
    const used = request.used.isNullObject ? undefined : cellRangeOf(name, request.used);
    const hasActiveFilter = autoFilter.isDataFiltered || filteredSheets.has(name);
    const sheet = new ExcelSheet(name, visibility, protection.protected, hasActiveFilter, used);
    sheets.push(sheet);
    if (used !== undefined) {
      const mayHoldArrays =
        !abilities.findsArrays || request.used.hasSpill !== false || request.used.savedAsArray !== false;
      atWork.push({ sheet, used, request, mayHoldArrays, isRead: false });
    }
  }

  // Third and later: the cells.
  const reader = new CellReader(batch, abilities);
  for (;;) {
    const wanted = sheetsToRead(atWork, definedNames, tableSnapshots);
    if (wanted.length === 0) break;
    await reader.read(wanted);
  }
  const readSheets = new Set<SheetSnapshot>(atWork.filter(({ isRead }) => isRead).map(({ sheet }) => sheet));
  return {
    sheets: sheets.map((sheet) => (readSheets.has(sheet) ? sheet : withoutCells(sheet))),
    names: definedNames,
    tables: tableSnapshots,
    usesDates1904: Number(secondOfJanuary1904.value) < 1000,
    record: recordXml === undefined ? null : recordOfXml(recordXml.value),
  };
}

function requestSheet(worksheet: Excel.Worksheet, abilities: ExcelAbilities): SheetRequest {
  const used = worksheet.getUsedRangeOrNullObject(true);
  if (abilities.findsArrays) used.load('rowIndex,columnIndex,rowCount,columnCount,hasSpill,savedAsArray');
  else used.load('rowIndex,columnIndex,rowCount,columnCount');
  return {
    name: worksheet.name,
    visibility: visibilityOf(worksheet.visibility),
    used,
    names: worksheet.names.load('items/name,items/formula,items/visible'),
    protection: worksheet.protection.load('protected'),
    autoFilter: worksheet.autoFilter.load('isDataFiltered'),
    pivotTables: worksheet.pivotTables.load('items/id'),
    comments: abilities.findsComments ? worksheet.comments.load('items/id') : undefined,
    notes: abilities.findsNotes ? worksheet.notes.load('items/authorName') : undefined,
    // Merged cells that hold nothing count too, so it is the rectangle with formats that is asked.
    merged: abilities.findsMergedCells
      ? worksheet.getUsedRangeOrNullObject(false).getMergedAreasOrNullObject().load('address,areaCount')
      : undefined,
  };
}

function visibilityOf(visibility: string): SheetVisibility {
  return visibility === 'Visible' ? 'visible' : visibility === 'Hidden' ? 'hidden' : 'veryHidden';
}

/** Names of workbook scope; a host that lists those of sheets among them is corrected. */
export function workbookNamesOf(names: Excel.NamedItemCollection): DefinedName[] {
  return names.items
    .filter(({ scope }) => scope === Excel.NamedItemScope.workbook)
    .map((item) => definedNameOf(item, null));
}

/** Excel shows its own names without the prefix that they have in files. */
const builtInNames = /^(Print_Area|Print_Titles|_FilterDatabase|Criteria|Extract)$/i;

export function definedNameOf(item: Excel.NamedItem, scope: string | null): DefinedName {
  const formula: unknown = item.formula;
  return {
    name: scope !== null && builtInNames.test(item.name) ? `_xlnm.${item.name}` : item.name,
    scope,
    formula: String(formula).replace(/^=/, ''),
    isHidden: !item.visible,
  };
}

function tableOf({ table, range }: TableRequest): TableSnapshot {
  return {
    name: table.name,
    range: cellRangeOf(table.worksheet.name, range),
    headerRowCount: table.showHeaders ? 1 : 0,
    totalsRowCount: table.showTotals ? 1 : 0,
    columnNames: table.columns.items.map(({ name }) => name),
  };
}

/**
 * The sheets that are to be read next: all of a workbook that is not very large; otherwise those that the plans' names
 * lead to, and then those that a formula read so far mentions.
 * @throws WorkbookError too-large
 */
function sheetsToRead(
  sheets: readonly SheetAtWork[],
  names: readonly DefinedName[],
  tables: readonly TableSnapshot[],
): SheetAtWork[] {
  const unread = sheets.filter(({ isRead }) => !isRead);
  const total = sheets.reduce((sum, { used }) => sum + cellCountOf(used), 0);
  const mention = new Mentions(names, tables);
  if (total > cellsReadAnyway) {
    for (const name of names) {
      if (readRoleName(name) !== undefined) mention.add(name.formula, name.scope);
    }
    for (const { sheet } of sheets.filter(({ isRead }) => isRead)) mention.addFormulasOf(sheet);
  }
  const wanted =
    total <= cellsReadAnyway || mention.mayLeadAnywhere
      ? unread
      : unread.filter(({ sheet }) => mention.includes(sheet.name));
  const cells = [...sheets.filter(({ isRead }) => isRead), ...wanted].reduce(
    (sum, { used }) => sum + cellCountOf(used),
    0,
  );
  if (cells > cellLimit) {
    const largest = wanted.reduce((a, b) => (cellCountOf(a.used) >= cellCountOf(b.used) ? a : b));
    throw new WorkbookError(
      'too-large',
      `The plan's sheets use ${cells.toLocaleString('en-US')} cells, more than can be read; ${largest.sheet.name} reaches to ${columnLetters(largest.used.right)}${largest.used.bottom + 1}. Delete what stands far off its data.`,
    );
  }
  return wanted;
}

/** Which sheets formulas mention, by sheet, name or table. */
class Mentions {
  /** Some formula finds its cells by a text that is put together. */
  mayLeadAnywhere = false;
  private readonly texts = new Set<string>();
  private readonly scopes = new Set<string>();

  constructor(
    private readonly names: readonly DefinedName[],
    private readonly tables: readonly TableSnapshot[],
  ) {}

  add(formula: string, scope: string | null): void {
    const text = formula.toLowerCase();
    if (scope !== null) this.scopes.add(scope.toLowerCase());
    if (this.texts.has(text)) return;
    this.texts.add(text);
    if (/\bindirect\(/.test(text)) this.mayLeadAnywhere = true;
    for (const name of this.names) {
      if (!this.texts.has(name.formula.toLowerCase()) && text.includes(name.name.toLowerCase())) {
        this.add(name.formula, name.scope);
      }
    }
    for (const table of this.tables) {
      if (text.includes(table.name.toLowerCase())) this.scopes.add(table.range.sheet.toLowerCase());
    }
  }

  addFormulasOf(sheet: SheetSnapshot): void {
    const seen = new Set<string>();
    sheet.forEachCell((_row, _column, { formula }) => {
      if (formula === undefined) return;
      // Formulas filled down differ in their numbers only, and mention the same sheets.
      const shape = formula.replace(/\d+/g, '0');
      if (!seen.has(shape)) {
        seen.add(shape);
        this.add(formula, null);
      }
    });
  }

  includes(sheetName: string): boolean {
    const spelling = sheetName.replaceAll("'", "''").toLowerCase();
    return (
      this.scopes.has(sheetName.toLowerCase()) || [...this.texts].some((text) => text.includes(spelling))
    );
  }
}

/** Reads cells and what goes with them: hidden rows and columns, comments, PivotTables, merged cells, arrays. */
class CellReader {
  constructor(
    private readonly batch: OpenBatch,
    private readonly abilities: ExcelAbilities,
  ) {}

  async read(sheets: readonly SheetAtWork[]): Promise<void> {
    const { context } = this.batch;
    const queue = new RangeQueue(sheets.map(({ used }) => used));
    let areSurroundingsKnown = false;
    while (!queue.isEmpty) {
      const answers = areSurroundingsKnown ? [] : sheets.map((atWork) => this.requestSurroundings(atWork));
      const parts = queue.take();
      const ranges = parts.map((part) =>
        rangeOn(context, part).load('values,formulas,valueTypes,numberFormat'),
      );
      try {
        await this.batch.sync();
      } catch (error) {
        if (!isAnswerTooLarge(error) || parts.length * cellCountOf(parts[0]) <= 1) throw error;
        queue.putBack(parts);
        continue;
      }
      answers.forEach((take) => take());
      areSurroundingsKnown = true;
      parts.forEach((part, position) => {
        const { values, formulas, valueTypes, numberFormat } = ranges[position];
        const { sheet } = sheets.find(({ used }) => used.sheet === part.sheet)!;
        sheet.fill(part, { values, formulas, valueTypes, numberFormats: numberFormat });
      });
      queue.learn(
        ranges.map(({ values, formulas, valueTypes, numberFormat }) => [
          values,
          formulas,
          valueTypes,
          numberFormat,
        ]),
      );
      ranges.forEach((range) => range.untrack());
    }
    await this.readArrays(sheets);
    sheets.forEach((atWork) => (atWork.isRead = true));
  }

  /** Asks for what goes with a sheet's cells; the returned function takes the answer in. */
  private requestSurroundings({ sheet, used, request }: SheetAtWork): () => void {
    const { context } = this.batch;
    const worksheet = context.workbook.worksheets.getItem(sheet.name);
    // Results may be placed beyond what is used, so hidden rows and columns are looked for there too.
    const rows = Math.min(maximumRowCount, used.bottom + 2 + searchedLaneCount);
    const columns = Math.min(maximumColumnCount, used.right + 2 + searchedLaneCount);
    const rowProperties = worksheet.getRangeByIndexes(0, 0, rows, 1).getRowProperties({ rowHidden: true });
    const columnProperties = worksheet
      .getRangeByIndexes(0, 0, 1, columns)
      .getColumnProperties({ columnHidden: true });
    const pivots = request.pivotTables.items.map((pivot) => ({
      range: pivot.layout.getRange().load(placeOfRange),
      filterCount: pivot.filterHierarchies.getCount(),
    }));
    const remarks = [...(request.comments?.items ?? []), ...(request.notes?.items ?? [])];
    const remarked = remarks.map((remark) => remark.getLocation().load('rowIndex,columnIndex'));
    const merged =
      request.merged === undefined || request.merged.isNullObject
        ? []
        : rangesOfAddress(sheet.name, request.merged.address);
    // Excel cuts a long address off; then the areas are asked for one by one.
    const areas =
      request.merged !== undefined && !request.merged.isNullObject && merged.length < request.merged.areaCount
        ? request.merged.areas.load('items/rowIndex,items/columnIndex,items/rowCount,items/columnCount')
        : undefined;
    return () => {
      rowProperties.value.forEach(({ rowHidden }, row) => {
        if (rowHidden === true) sheet.hideRow(row);
      });
      columnProperties.value.forEach(({ columnHidden }, column) => {
        if (columnHidden === true) sheet.hideColumn(column);
      });
      sheet.pivotRanges = pivots.map(({ range, filterCount }) => {
        const body = cellRangeOf(sheet.name, range);
        // The filters of a PivotTable stand above it, with one row between.
        return {
          ...body,
          top: Math.max(0, body.top - (filterCount.value === 0 ? 0 : filterCount.value + 1)),
        };
      });
      sheet.notedCells = remarked.map(({ rowIndex, columnIndex }) => ({
        sheet: sheet.name,
        row: rowIndex,
        column: columnIndex,
      }));
      sheet.mergedRanges =
        areas === undefined ? merged : areas.items.map((area) => cellRangeOf(sheet.name, area));
    };
  }

  private async readArrays(sheets: readonly SheetAtWork[]): Promise<void> {
    const possible = sheets.filter(({ mayHoldArrays }) => mayHoldArrays);
    if (!this.abilities.findsArrays) {
      possible.forEach(({ sheet }) => markArraysByText(sheet));
      return;
    }
    const marks = possible.map(({ sheet }) => askForArrays(this.batch.context, sheet));
    if (marks.length > 0) {
      await this.batch.sync();
      marks.forEach((mark) => mark());
    }
  }
}

/** A sheet that was not read: its name is taken, and nothing refers to its cells. */
function withoutCells({ name, visibility, isProtected, hasActiveFilter }: SheetSnapshot): SheetSnapshot {
  return new ExcelSheet(name, visibility, isProtected, hasActiveFilter, undefined);
}
