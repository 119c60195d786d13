/** A snapshot that went to another thread says the same as before: compared cell by cell with the original. */
import path from 'node:path';
import { readFileSync } from 'node:fs';
import { MemoryWorkbook } from '../../../addin/adapters/memory/memory-workbook';
import { XlsxWorkbook } from '../../../addin/adapters/xlsx-file/xlsx-workbook';
import { CellError } from '../../../addin/domain/sheet/cell-value';
import type { SheetCell, WorkbookSnapshot } from '../../../addin/domain/sheet/sheet-snapshot';
import { buffersOf, packWorkbook, unpackWorkbook } from '../../../addin/worker/workbook-transfer';
import { packWritePlan, unpackWritePlan } from '../../../addin/worker/worker-protocol';
import { checkoutFolder } from '../../support/needs';

async function sentAndReceived(workbook: WorkbookSnapshot): Promise<WorkbookSnapshot> {
  const packed = await packWorkbook(workbook, () => Promise.resolve());
  return unpackWorkbook(structuredClone(packed, { transfer: buffersOf(packed) }));
}

function describeAll(workbook: WorkbookSnapshot): unknown {
  const { names, tables, usesDates1904, record } = workbook;
  const sheets = workbook.sheets.map((sheet) => {
    const cells = new Map<string, SheetCell>();
    sheet.forEachCell((row, column, cell) => {
      const { value, formula, arrayRange, isDate, numberFormat } = cell;
      cells.set(`${row},${column}`, { value, formula, arrayRange, isDate, numberFormat });
      expect(sheet.cell(row, column)).toEqual(cell);
    });
    const lines = Array.from({ length: 200 }, (_, line) => line);
    return {
      name: sheet.name,
      visibility: sheet.visibility,
      marks: [sheet.isProtected, sheet.hasActiveFilter, sheet.rowCount, sheet.columnCount],
      ranges: [sheet.mergedRanges, sheet.notedCells, sheet.pivotRanges],
      hidden: [lines.filter((l) => sheet.isRowHidden(l)), lines.filter((l) => sheet.isColumnHidden(l))],
      cells: Object.fromEntries([...cells].sort(([a], [b]) => (a < b ? -1 : 1))),
    };
  });
  return { sheets, names, tables, usesDates1904, record };
}

it('every kind of cell and mark comes through', async () => {
  const workbook = MemoryWorkbook.of({
    sheets: {
      Plan: {
        A1: [
          [1.5, -0.25, 'Wall tile', '', true, false, null],
          [CellError.of('#N/A'), '=A1*2', { formula: 'B1', value: 'text' }, { value: 45000, isDate: true }],
          ['ümlaut', '', { formula: 'A1:A3*2', value: 3, fills: 'C3:C5', numberFormat: '0.00' }, 1e300],
        ],
      },
      'Cost data': { B7: { formula: 'NA()', value: CellError.of('#N/A') } },
      Nothing: {},
    },
    names: { 'Week.Decision': 'Plan!$A$1' },
    tables: [{ name: 'Rates', sheet: 'Plan', ref: 'A1:C3' }],
    hiddenRows: { Plan: [2, 3] },
    hiddenColumns: { Plan: ['B'] },
    merged: { Plan: ['F1:G1'] },
    noted: { Plan: ['A1'] },
    pivots: { 'Cost data': ['A1:B2'] },
    hiddenSheets: ['Nothing'],
    protectedSheets: ['Plan'],
    filteredSheets: ['Cost data'],
    usesDates1904: true,
    record: '{}',
  }).snapshot();
  expect(describeAll(await sentAndReceived(workbook))).toEqual(describeAll(workbook));
});

it('the sample workbook comes through whole', async () => {
  const file = path.join(checkoutFolder, 'addin', 'samples', 'week-plan.xlsx');
  const workbook = await (await XlsxWorkbook.open(readFileSync(file), 'week-plan.xlsx')).read();
  expect(describeAll(await sentAndReceived(workbook))).toEqual(describeAll(workbook));
});

it('error values in a write plan are one object a code again, as comparison needs it', () => {
  const cell = { sheet: 'Plan', row: 0, column: 0 };
  const plan = [
    { kind: 'storedValue', cell, value: CellError.of('#DIV/0!') },
    { kind: 'value', cell, value: null },
    { kind: 'storedValue', cell, value: undefined },
    { kind: 'recalculateOnOpening' },
  ] as const;
  const received = unpackWritePlan(structuredClone(packWritePlan(plan)));
  expect(received).toEqual(plan);
  expect((received[0] as { value: unknown }).value).toBe(CellError.of('#DIV/0!'));
});
