/**
 * Workbooks for the pane's browser tests, all of the invented tile works.
 */
import { MemoryWorkbook, type CellContent } from '../../addin/adapters/memory/memory-workbook';
import { cellText } from '../../addin/domain/sheet/cell-address';

/** Three tiles, press and kiln hours, one order; see tile-works.ts for the same plan as a table. */
const tileCells: Record<string, CellContent> = {
  A1: [['Tile', 'm² planned', 'Margin', 'Least', 'Most', 'Press', 'Kiln']],
  A2: [
    ['Floor matt', 10, 6.5, null, 100, 0.5, 1],
    ['Wall gloss', null, 8, null, null, 0.25, 2],
    ['Border', null, 12, 5, 40, 1, 1.5],
  ],
  A7: [
    ['Press hours', '=SUMPRODUCT(B2:B4,F2:F4)', '<=', 80],
    ['Kiln hours', '=SUMPRODUCT(B2:B4,G2:G4)', '<=', 120],
    ['Border order', '=B4', '>=', 15],
  ],
  A11: [['Contribution', '=SUMPRODUCT(B2:B4,C2:C4)']],
};

const tileNames = {
  'Week.Decision': 'Plan!$B$2:$B$4',
  'Week.Objective': 'Plan!$B$11',
  'Week.Sense': '"maximise"',
  'Week.Constraint': 'Plan!$B$7:$D$9',
  'Week.Lower': 'Plan!$D$2:$D$4',
  'Week.Upper': 'Plan!$E$2:$E$4',
};

/** Kiln loads as many as asked for, each limit a SUMPRODUCT over 30 of them. Seed 7. */
function largeWorkbook(decisions: number, rows: number): MemoryWorkbook {
  const width = 30;
  let state = 7;
  const random = (): number => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
  const cells: Record<string, CellContent> = {};
  const perRow = 60;
  // Decisions stand in a grid of 60 columns, so that thirty neighbours are one range.
  const gridRows = decisions / perRow;
  for (let row = 0; row < gridRows; row++) {
    cells[cellText(row, 0)] = [[`Kiln load ${row + 1}`, ...new Array<number>(perRow).fill(0)]];
  }
  for (let row = 0; row < gridRows; row++) {
    cells[cellText(gridRows + 1 + row, 1)] = [
      Array.from({ length: perRow }, () => Math.round(random() * 100) + 1),
    ];
  }
  const firstRow = 2 * gridRows + 3;
  for (let row = 0; row < rows; row++) {
    const at = row % gridRows;
    const from = Math.floor(row / gridRows) % 2 === 0 ? 1 : 1 + width;
    const first = cellText(at, from);
    const last = cellText(at, from + width - 1);
    const rates = `${cellText(firstRow + row, 5)}:${cellText(firstRow + row, 4 + width)}`;
    cells[cellText(firstRow + row, 0)] = [
      [
        `Limit ${row + 1}`,
        `=SUMPRODUCT(${first}:${last},${rates})`,
        '<=',
        Math.round(500 + random() * 500),
        null,
        ...Array.from({ length: width }, () => Math.round(random() * 9) + 1),
      ],
    ];
  }
  const plan = (top: number, left: number, bottom: number, right: number): string =>
    `Plan!$${cellText(top, left).replace(/(\d+)/, '$$$1')}:$${cellText(bottom, right).replace(/(\d+)/, '$$$1')}`;
  const grid = plan(0, 1, gridRows - 1, perRow);
  const margins = plan(gridRows + 1, 1, 2 * gridRows, perRow);
  const objective = cellText(firstRow - 1, 1);
  cells[objective] = `=SUMPRODUCT(${grid},${margins})`;
  return MemoryWorkbook.of({
    sheets: { Plan: cells },
    names: {
      'Load.Decision': grid,
      'Load.Objective': `Plan!$${objective.replace(/(\d+)/, '$$$1')}`,
      'Load.Sense': '"maximise"',
      'Load.Constraint': plan(firstRow, 1, firstRow + rows - 1, 3),
    },
  });
}

export const paneWorkbooks = {
  tiles: () => MemoryWorkbook.of({ sheets: { Plan: tileCells }, names: tileNames }),
  unstated: () => MemoryWorkbook.of({ sheets: { Plan: tileCells, 'Cost data': { A1: 1 } } }),
  faulty: () =>
    MemoryWorkbook.of({
      sheets: { Plan: { ...tileCells, C7: 'under', C8: '<', D9: 'fifteen' } },
      names: tileNames,
    }),
  infeasible: () => MemoryWorkbook.of({ sheets: { Plan: { ...tileCells, D9: 200 } }, names: tileNames }),
  filtered: () =>
    MemoryWorkbook.of({
      sheets: { Plan: tileCells },
      names: tileNames,
      hiddenRows: { Plan: [3] },
      filteredSheets: ['Plan'],
    }),
  protected: () =>
    MemoryWorkbook.of({ sheets: { Plan: tileCells }, names: tileNames, protectedSheets: ['Plan'] }),
  large: () => largeWorkbook(3000, 1200),
} satisfies Record<string, () => MemoryWorkbook>;
