/**
 * Where result columns may stand (design: the first adjacent columns within 30, after one empty column). Expected
 * places are read off the little sheets by eye.
 */
import {
  searchFreeLanes,
  takeLanes,
  type SearchRequest,
} from '../../../../addin/domain/results-to-sheet/free-columns';
import { columnLetters } from '../../../../addin/domain/sheet/cell-address';
import type { CellRange } from '../../../../addin/domain/sheet/cell-range';
import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';

/** C5:C8, headings in row 4. */
const block: CellRange = { sheet: 'Plan', top: 4, left: 2, bottom: 7, right: 2 };
const headings = { B4: 'Tile', C4: 'm² made', B5: 'Slate', B6: 'Sand', B7: 'Ochre', B8: 'Chalk' };

function requestFor(range: CellRange, isLying: boolean): SearchRequest {
  return { range, isLying, ownRanges: [], isOurs: () => false };
}

function search(description: WorkbookDescription, range = block, isLying = false, count = 3) {
  const workbook = MemoryWorkbook.of(description).snapshot();
  const [window] = searchFreeLanes(workbook, [requestFor(range, isLying)]);
  return window.find(count);
}

/** Letters of the first column found beside C5:C8, `none` where there is no room. */
function firstColumn(
  cells: WorkbookDescription['sheets'][string],
  rest: Partial<WorkbookDescription> = {},
): string {
  const lanes = search({ sheets: { Plan: { ...headings, ...cells } }, ...rest });
  return lanes === undefined ? 'none' : columnLetters(lanes.firstLane);
}

describe('columns beside a block that stands upright', () => {
  it('are the third, fourth and fifth to the right of nothing else: one column stays empty between', () => {
    expect(firstColumn({})).toBe('E');
  });

  it.each([
    ['a value', { F6: 3 }, 'H'],
    ['a text', { F6: 'hard clay' }, 'H'],
    ['a formula', { F6: '=C6*2' }, 'H'],
    ['a value in the heading row', { E4: 'Price' }, 'G'],
    ['a value in the column that would stay empty', { D6: 1 }, 'F'],
  ])('pass over %s', (_what, cells, expected) => {
    expect(firstColumn(cells)).toBe(expected);
  });

  it.each([
    ['above the heading', { E3: 1, F2: 'x' }],
    ['below the last row', { E9: 1, F9: 'x' }],
  ])('do not mind what stands %s', (_where, cells) => {
    expect(firstColumn(cells)).toBe('E');
  });

  it('pass over cells that an array formula fills', () => {
    expect(firstColumn({ E2: { formula: 'TRANSPOSE(C5:C8)', fills: 'E2:H5', value: 0 } })).toBe('J');
  });

  it.each([
    ['merged cells', { merged: { Plan: ['G3:H4'] } }, 'J'],
    ['notes', { noted: { Plan: ['E5'] } }, 'G'],
    ['PivotTables', { pivots: { Plan: ['G8:K20'] } }, 'M'],
    ['hidden columns', { hiddenColumns: { Plan: ['F'] } }, 'G'],
    ['named blocks', { names: { Spare: 'Plan!$F$5:$F$8' } }, 'G'],
    ['blocks named for one sheet only', { localNames: { Plan: { Spare: '$F$5:$F$8' } } }, 'G'],
  ])('pass over %s', (_what, rest, expected) => {
    expect(firstColumn({}, rest)).toBe(expected);
  });

  it('pass over a table, also over its blank cells', () => {
    const tables = [{ name: 'Costs', sheet: 'Plan', ref: 'E4:G9' }];
    expect(firstColumn({ E4: 'Clay', F4: 'Glaze', G4: 'Gas' }, { tables })).toBe('I');
  });

  it('pass over blank cells that a formula anywhere in the workbook refers to', () => {
    const rest = { sheets: { Plan: headings, Sums: { A1: '=SUM(Plan!F5:F8)' } } };
    expect(firstColumn({}, rest)).toBe('G');
  });

  it('pass over blank cells that a formula refers to through a name', () => {
    expect(firstColumn({ A1: '=SUM(Spare)' }, { names: { Spare: 'Plan!$E$5:$E$6' } })).toBe('F');
  });

  it('may stand in the print area and under repeated rows, which are no blocks of cells', () => {
    const names = { '_xlnm.Print_Area': 'Plan!$A$1:$K$40', '_xlnm.Print_Titles': 'Plan!$4:$5' };
    expect(firstColumn({}, { names })).toBe('E');
  });

  it('are not looked for beyond the thirtieth column', () => {
    const filled = Object.fromEntries(
      Array.from({ length: 28 }, (_, k) => [`${columnLetters(3 + k)}5`, k] as const),
    );
    // Columns 1 to 28 to the right of C are filled; 29 stays empty between, and only 30 is left.
    expect(firstColumn(filled)).toBe('none');
    const lessFilled = Object.fromEntries(Object.entries(filled).slice(0, 26));
    expect(firstColumn(lessFilled)).toBe('AE');
  });

  it('are not found where the sheet ends', () => {
    const last = { ...block, left: 16_380, right: 16_380 };
    expect(search({ sheets: { Plan: { A1: 1 } } }, last)).toBeUndefined();
  });

  it('are not found where no row is left for the heading', () => {
    expect(search({ sheets: { Plan: { A1: 1 } } }, { ...block, top: 0 })).toBeUndefined();
  });
});

describe('rows below a block that lies on its side', () => {
  /** C5:F5, headings in row 4, label in B5. */
  const lying: CellRange = { sheet: 'Plan', top: 4, left: 2, bottom: 4, right: 5 };

  it('stand after one empty row, with their headings in the column before the block', () => {
    const lanes = search({ sheets: { Plan: { B5: 'm² made', C4: 'Mon' } } }, lying, true);
    expect(lanes).toEqual({ sheet: 'Plan', isLying: true, firstLane: 6, headingAt: 1, from: 2, to: 5 });
  });

  it('pass over hidden rows and over rows with a text where the heading would stand', () => {
    const description = { sheets: { Plan: { B5: 'm² made', B7: 'Note' } }, hiddenRows: { Plan: [9] } };
    expect(search(description, lying, true)?.firstLane).toBe(9);
  });
});

it('Two blocks below each other do not get the same cells, and each takes the lanes nearest to it', () => {
  const workbook = MemoryWorkbook.of({ sheets: { Plan: headings } }).snapshot();
  const wide: CellRange = { ...block, right: 3 };
  const requests = [block, wide].map((range) => requestFor(range, false));
  const windows = searchFreeLanes(workbook, requests);
  const first = windows[0].find(2)!;
  expect(first.firstLane).toBe(5);
  takeLanes(windows, first, 2);
  expect(windows[1].find(2)?.firstLane).toBe(8);
});
