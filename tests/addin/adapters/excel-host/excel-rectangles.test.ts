import { rectanglesOf } from '../../../../addin/adapters/excel-host/excel-rectangles';
import { formatCellAddress, type CellAddress } from '../../../../addin/domain/sheet/cell-address';
import { cellsOf, formatCellRange } from '../../../../addin/domain/sheet/cell-range';

const cell = (row: number, column: number, sheet = 'Plan'): CellAddress => ({ sheet, row, column });
const texts = (cells: readonly CellAddress[]): string[] => rectanglesOf(cells).map(formatCellRange).sort();

it('columns, rows and blocks are drawn together', () => {
  expect(texts([cell(2, 1), cell(0, 1), cell(1, 1)])).toEqual(['Plan!B1:B3']);
  expect(texts([cell(4, 1), cell(4, 2), cell(4, 3)])).toEqual(['Plan!B5:D5']);
  expect(texts([cell(0, 0), cell(1, 0), cell(0, 1), cell(1, 1)])).toEqual(['Plan!A1:B2']);
  expect(texts([cell(0, 0), cell(1, 0), cell(0, 1), cell(1, 1), cell(2, 1)])).toEqual([
    'Plan!A1:A2',
    'Plan!B1:B3',
  ]);
  expect(texts([cell(0, 0), cell(0, 0, 'Costs')])).toEqual(['Costs!A1', 'Plan!A1']);
  expect(texts([cell(0, 0), cell(0, 2), cell(0, 4)])).toEqual(['Plan!A1', 'Plan!C1', 'Plan!E1']);
  expect(texts([])).toEqual([]);
});

it.each([1, 2, 3, 4])('each cell stands in one rectangle, and no other cell does (seed %i)', (seed) => {
  let state = seed;
  const random = (below: number): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
  };
  for (let round = 0; round < 40; round++) {
    const wanted = new Map<string, CellAddress>();
    for (let count = 0; count < 60; count++) {
      const picked = cell(random(9), random(9), ['Plan', 'Costs'][random(2)]);
      wanted.set(formatCellAddress(picked), picked);
    }
    const covered = rectanglesOf([...wanted.values()])
      .flatMap(cellsOf)
      .map(formatCellAddress);
    expect(covered.sort()).toEqual([...wanted.keys()].sort());
  }
});
