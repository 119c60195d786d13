/**
 * Results onto a little tile works' sheet. The optimum is worked out by hand:
 *
 *   maximise 4 slate + 3 sand     kiln 2 slate + sand <= 10     press slate + sand <= 8     slate <= 6
 *   optimum slate 2, sand 6: objective 26; dual values kiln 1, press 2 (4 = 2·1 + 1·2, 3 = 1·1 + 1·2)
 */
import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { listPlans } from '../../../../addin/domain/model-from-sheet/naming-convention';
import { readPlan } from '../../../../addin/domain/model-from-sheet/read-plan';
import {
  planResultWrites,
  type ResultWrites,
} from '../../../../addin/domain/results-to-sheet/plan-result-writes';
import { planSolutionOf, type SolvedValues } from '../../../../addin/domain/results-to-sheet/plan-solution';
import type { ResultTexts } from '../../../../addin/domain/results-to-sheet/result-texts';
import { columnOfLetters } from '../../../../addin/domain/sheet/cell-address';
import { formatCellRange } from '../../../../addin/domain/sheet/cell-range';
import type { CellValue } from '../../../../addin/domain/sheet/cell-value';

const heading = (title: string) => ({ title, gloss: 'what it is' });
const texts: ResultTexts = {
  headings: {
    Before: heading('Before'),
    Optimum: heading('Optimum'),
    ReducedCost: heading('Reduced cost'),
    LeftSide: heading('Left side'),
    Slack: heading('Slack'),
    DualValue: heading('Dual value'),
  },
  resultsSheetName: (plan) => `${plan} results`,
  table: { decision: 'Decision', decisionCell: 'Now', constraintRow: 'Row', rightSide: 'Limit' },
};

const optimum: SolvedValues = { values: [2, 6], reducedCosts: [0, 0], dualValues: [1, 2] };
const other: SolvedValues = { values: [4, 2], reducedCosts: [0, 0], dualValues: [2, 0] };

/** Decisions C5:C6, objective C8, rows B11:D12; result columns may stand from E5 and F11 on. */
function tileWorks(changes: Partial<WorkbookDescription> = {}, cells: Record<string, unknown> = {}) {
  return MemoryWorkbook.of({
    sheets: {
      Plan: {
        B4: 'Tile',
        C4: 'm² made',
        B5: 'Slate',
        C5: { value: 1, numberFormat: '#,##0 "m²"' },
        B6: 'Sand',
        C6: { value: 1, numberFormat: '#,##0 "m²"' },
        B8: 'Contribution',
        C8: { formula: '4*C5+3*C6', value: 7, numberFormat: '€ 0.00' },
        A10: 'Limits',
        A11: 'Kiln',
        B11: { formula: '2*C5+C6', value: 3 },
        C11: '<=',
        D11: { value: 10, numberFormat: '0.0 "h"' },
        A12: 'Press',
        B12: { formula: 'SUM(C5:C6)', value: 2 },
        C12: '<=',
        D12: { value: 8, numberFormat: '0.0 "h"' },
        ...(cells as Record<string, CellValue>),
      },
      ...changes.sheets,
    },
    names: {
      'Week.Decision': 'Plan!$C$5:$C$6',
      'Week.Objective': 'Plan!$C$8',
      'Week.Sense': '"maximise"',
      'Week.Constraint': 'Plan!$B$11:$D$12',
      ...changes.names,
    },
    ...Object.fromEntries(Object.entries(changes).filter(([key]) => key !== 'sheets' && key !== 'names')),
  });
}

/** Reads the plan, takes the given values as solved, and writes them. */
async function write(
  workbook: MemoryWorkbook,
  solved: SolvedValues,
  options: { keepDecisions?: boolean; planName?: string } = {},
): Promise<ResultWrites> {
  const snapshot = workbook.snapshot();
  const planName = options.planName ?? listPlans(snapshot)[0].name;
  const { model, issues } = readPlan(snapshot, planName, { now: 46_000 });
  if (model === null) {
    throw new Error(JSON.stringify(issues));
  }
  const writes = planResultWrites({
    workbook: snapshot,
    model,
    solution: planSolutionOf(model, solved),
    keepDecisions: options.keepDecisions ?? false,
    texts,
    now: 46_000,
  });
  await workbook.apply(writes.plan);
  return writes;
}

/** What a cell such as `E5` of a sheet holds. */
function held(workbook: MemoryWorkbook, text: string, sheet = 'Plan'): CellValue | undefined {
  return cellOf(workbook, text, sheet)?.value ?? null;
}

function cellOf(workbook: MemoryWorkbook, text: string, sheet = 'Plan') {
  const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(text)!;
  return workbook
    .snapshot()
    .sheets.find(({ name }) => name === sheet)
    ?.cell(Number(row) - 1, columnOfLetters(letters));
}

function rowOf(workbook: MemoryWorkbook, first: string, count: number, sheet = 'Plan') {
  const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(first)!;
  const column = columnOfLetters(letters);
  return Array.from({ length: count }, (_, k) => {
    const snapshot = workbook.snapshot().sheets.find(({ name }) => name === sheet);
    return snapshot?.cell(Number(row) - 1, column + k)?.value ?? null;
  });
}

function nameOf(workbook: MemoryWorkbook, name: string): string | undefined {
  return workbook.snapshot().names.find((candidate) => candidate.name === name)?.formula;
}

const codes = (writes: ResultWrites): string[] => writes.notices.map((notice) => notice.code);

/** The workbook as if a planner had typed into it. */
function typed(workbook: MemoryWorkbook, values: Record<string, number | string | null>): Promise<void> {
  return workbook.apply(
    Object.entries(values).map(([text, value]) => {
      const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(text)!;
      const cell = { sheet: 'Plan', row: Number(row) - 1, column: columnOfLetters(letters) };
      return { kind: 'value', cell, value } as const;
    }),
  );
}

describe('the first solve', () => {
  it('writes decisions, result columns and headings, and calls each column by its name', async () => {
    const workbook = tileWorks();
    const writes = await write(workbook, optimum);
    expect(rowOf(workbook, 'E4', 3)).toEqual([
      'Before\nwhat it is',
      'Optimum\nwhat it is',
      'Reduced cost\nwhat it is',
    ]);
    expect(rowOf(workbook, 'C5', 5)).toEqual([2, null, 1, 2, 0]);
    expect(rowOf(workbook, 'C6', 5)).toEqual([6, null, 1, 6, 0]);
    expect(rowOf(workbook, 'F10', 3)).toEqual([
      'Left side\nwhat it is',
      'Slack\nwhat it is',
      'Dual value\nwhat it is',
    ]);
    expect(rowOf(workbook, 'F11', 3)).toEqual([10, 0, 1]);
    expect(rowOf(workbook, 'F12', 3)).toEqual([8, 0, 2]);
    expect(writes.columns.map(({ name, range }) => [name, formatCellRange(range)])).toEqual([
      ['Week.Before', 'Plan!E5:E6'],
      ['Week.Optimum', 'Plan!F5:F6'],
      ['Week.ReducedCost', 'Plan!G5:G6'],
      ['Week.LeftSide', 'Plan!F11:F12'],
      ['Week.Slack', 'Plan!G11:G12'],
      ['Week.DualValue', 'Plan!H11:H12'],
    ]);
    expect(nameOf(workbook, 'Week.DualValue')).toBe('Plan!$H$11:$H$12');
    expect(writes.notices).toEqual([]);
  });

  it('renews the stored values of formulas that depend on the plan and leaves the formulas', async () => {
    const workbook = tileWorks();
    const writes = await write(workbook, optimum);
    expect(cellOf(workbook, 'C8')).toMatchObject({ formula: '4*C5+3*C6', value: 26 });
    expect(cellOf(workbook, 'B11')).toMatchObject({ formula: '2*C5+C6', value: 10 });
    expect(writes.recalculatedCount).toBe(3);
    expect(writes.workbookObjective).toBe(26);
    expect(writes.workbookAgrees).toBe(true);
  });

  it('takes number formats from the neighbours and sets widths and line breaks', async () => {
    const workbook = tileWorks();
    const { plan } = await write(workbook, optimum);
    expect(cellOf(workbook, 'F5')?.numberFormat).toBe('#,##0 "m²"');
    expect(cellOf(workbook, 'G5')?.numberFormat).toBe('€ 0.00');
    expect(cellOf(workbook, 'F11')?.numberFormat).toBe('0.0 "h"');
    expect(cellOf(workbook, 'H11')?.numberFormat).toBe('€ 0.00');
    expect(workbook.columnWidth('Plan', columnOfLetters('G'))).toBeGreaterThanOrEqual(12);
    expect(workbook.columnWidth('Plan', columnOfLetters('D'))).toBeUndefined();
    expect(plan.filter((item) => item.kind === 'value' && item.wrapsText === true)).toHaveLength(6);
  });

  it('with decisions kept leaves them and their formulas, and compares with the workbook all the same', async () => {
    const workbook = tileWorks();
    const writes = await write(workbook, optimum, { keepDecisions: true });
    expect(rowOf(workbook, 'C5', 4)).toEqual([1, null, 1, 2]);
    expect(held(workbook, 'C8')).toBe(7);
    expect(writes.decisionCount).toBe(0);
    expect(writes.workbookObjective).toBe(26);
  });

  it('leaves Before blank where a decision cell was blank', async () => {
    const workbook = tileWorks({}, { C5: null });
    await write(workbook, optimum);
    expect(rowOf(workbook, 'E5', 2)).toEqual([null, 2]);
  });

  it('recalculates formulas that use a result name', async () => {
    const workbook = tileWorks({}, { A20: { formula: 'SUM(Week.Optimum)' } });
    await write(workbook, optimum);
    expect(held(workbook, 'A20')).toBe(8);
    await write(workbook, other);
    expect(held(workbook, 'A20')).toBe(6);
  });

  it('drops the stored value of a formula that cannot be recalculated, asks for it on opening, and says so', async () => {
    const workbook = tileWorks({}, { A20: { formula: 'CUBEVALUE("works",C5)', value: 3 } });
    const writes = await write(workbook, optimum);
    expect(cellOf(workbook, 'A20')).toMatchObject({ formula: 'CUBEVALUE("works",C5)', value: undefined });
    expect(workbook.recalculatesOnOpening).toBe(true);
    expect(codes(writes)).toEqual(['not-recalculated']);
  });
});

describe('the next solve', () => {
  it('refreshes exactly the same cells and keeps what a planner typed over a result', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { F6: 5.5, G12: 'ask Kim' });
    const writes = await write(workbook, other);
    expect(rowOf(workbook, 'E5', 3)).toEqual([2, 4, 0]);
    expect(rowOf(workbook, 'E6', 3)).toEqual([6, 5.5, 0]);
    expect(rowOf(workbook, 'F12', 3)).toEqual([6, 'ask Kim', 0]);
    expect(codes(writes)).toEqual(['kept-cell', 'kept-cell']);
    expect(writes.plan.some((item) => item.kind === 'name')).toBe(false);
    expect(workbook.snapshot().names).toHaveLength(10);
    // Once the planner's, a cell stays the planner's.
    const third = await write(workbook, optimum);
    expect(held(workbook, 'F6')).toBe(5.5);
    expect(codes(third)).toEqual(['kept-cell', 'kept-cell']);
  });

  it('fills a result cell again that a planner cleared', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { F6: null });
    const writes = await write(workbook, other);
    expect(held(workbook, 'F6')).toBe(2);
    expect(writes.notices).toEqual([]);
  });

  it('keeps a heading that a planner reworded', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { F4: 'Best' });
    await write(workbook, other);
    expect(rowOf(workbook, 'E4', 2)).toEqual(['Before\nwhat it is', 'Best']);
  });

  it('keeps a formula that a planner put into a result cell, even where it gives the same value', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { F6: null });
    const cell = { sheet: 'Plan', row: 5, column: columnOfLetters('F') };
    await workbook.apply([{ kind: 'formula', cell, formula: 'C6', value: 6 }]);
    const writes = await write(workbook, other);
    expect(cellOf(workbook, 'F6')).toMatchObject({ formula: 'C6', value: 2 });
    expect(codes(writes)).toEqual(['kept-cell']);
  });

  it('with nothing recorded leaves old values alone and stands beside them', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await workbook.apply([{ kind: 'record', json: '' }]);
    const writes = await write(workbook, other);
    expect(rowOf(workbook, 'E5', 8)).toEqual([1, 2, 0, null, 2, 4, 0, null]);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$J$5:$J$6');
    expect(new Set(codes(writes))).toEqual(new Set(['results-left']));
  });

  it('of a block that has grown takes the same columns where they are free', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { B7: 'Ochre', C7: 0 });
    await workbook.apply([{ kind: 'name', name: 'Week.Decision', scope: null, formula: 'Plan!$C$5:$C$7' }]);
    await write(workbook, { values: [2, 6, 0], reducedCosts: [0, 0, -1], dualValues: [1, 2] });
    expect(rowOf(workbook, 'E7', 3)).toEqual([0, 0, -1]);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$F$5:$F$7');
    expect(rowOf(workbook, 'I5', 3)).toEqual([null, null, null]);
  });

  it('of a block that has grown moves where a planner typed below the old columns, and clears what was ours', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { B7: 'Ochre', C7: 0, F7: 'sum' });
    await workbook.apply([{ kind: 'name', name: 'Week.Decision', scope: null, formula: 'Plan!$C$5:$C$7' }]);
    const writes = await write(workbook, { values: [2, 6, 0], reducedCosts: [0, 0, -1], dualValues: [1, 2] });
    expect(rowOf(workbook, 'E4', 3)).toEqual([null, null, null]);
    expect(rowOf(workbook, 'E5', 3)).toEqual([null, null, null]);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$I$5:$I$7');
    expect(codes(writes)).toEqual(['results-moved']);
  });

  it('of a block with a row inserted in its middle refreshes the columns that have grown with it', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    // As a spreadsheet program leaves it: Sand moved down a row, every name over both rows has grown.
    await typed(workbook, { B6: 'Ochre', C6: 0, B7: 'Sand', C7: 6 });
    await typed(workbook, { E6: null, F6: null, G6: null, E7: 1, F7: 6, G7: 0 });
    const grown = { Decision: 'C', Before: 'E', Optimum: 'F', ReducedCost: 'G' };
    await workbook.apply(
      Object.entries(grown).map(([role, column]) => {
        const formula = `Plan!$${column}$5:$${column}$7`;
        return { kind: 'name', name: `Week.${role}`, scope: null, formula } as const;
      }),
    );
    const writes = await write(workbook, { values: [2, 1, 5], reducedCosts: [0, 0, 0], dualValues: [1, 2] });
    expect(rowOf(workbook, 'E5', 3)).toEqual([2, 2, 0]);
    expect(rowOf(workbook, 'E6', 3)).toEqual([0, 1, 0]);
    expect(rowOf(workbook, 'E7', 3)).toEqual([6, 5, 0]);
    expect(cellOf(workbook, 'G6')?.numberFormat).toBe('€ 0.00');
    expect(writes.notices).toEqual([]);
  });

  it('brings back a column that a planner deleted, and leaves the others where they are', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await typed(workbook, { G4: null, G5: null, G6: null });
    await workbook.apply([{ kind: 'name', name: 'Week.ReducedCost', scope: null, formula: '#REF!' }]);
    await write(workbook, other);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$F$5:$F$6');
    expect(nameOf(workbook, 'Week.ReducedCost')).toBe('Plan!$H$5:$H$6');
  });

  it('never clears or overwrites decision cells to which a result name was pointed', async () => {
    const workbook = tileWorks();
    await write(workbook, optimum);
    await workbook.apply([{ kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$C$5:$C$6' }]);
    await write(workbook, other);
    expect(rowOf(workbook, 'C5', 1)).toEqual([4]);
    expect(nameOf(workbook, 'Week.Optimum')).not.toBe('Plan!$C$5:$C$6');
  });
});

describe('a name prepared by the planner', () => {
  it('for blank cells is where the results go', async () => {
    const workbook = tileWorks({ names: { 'week.optimum': 'Plan!$K$5:$K$6' } });
    await write(workbook, optimum);
    expect(rowOf(workbook, 'K4', 1)).toEqual(['Optimum\nwhat it is']);
    expect(rowOf(workbook, 'K5', 1)).toEqual([2]);
    expect(rowOf(workbook, 'E5', 3)).toEqual([1, 0, null]);
  });
});

describe('a sheet-local plan', () => {
  it('has result names of its own sheet, and a copied sheet is refreshed in its own columns', async () => {
    const cells = {
      C5: 1,
      C6: 1,
      C8: '=4*C5+3*C6',
      B11: '=2*C5+C6',
      C11: '<=',
      D11: 10,
      B12: '=SUM(C5:C6)',
      C12: '<=',
      D12: 8,
    };
    const names = {
      'Week.Decision': '$C$5:$C$6',
      'Week.Objective': '$C$8',
      'Week.Sense': '"maximise"',
      'Week.Constraint': '$B$11:$D$12',
    };
    const onSheet = (sheet: string) =>
      Object.fromEntries(
        Object.entries(names).map(([name, text]) => [name, text.startsWith('$') ? `${sheet}!${text}` : text]),
      );
    const workbook = MemoryWorkbook.of({
      sheets: { North: cells, South: cells },
      localNames: { North: onSheet('North'), South: onSheet('South') },
    });
    await write(workbook, optimum, { planName: 'Week @ South' });
    expect(rowOf(workbook, 'E5', 2, 'South')).toEqual([1, 2]);
    expect(rowOf(workbook, 'E5', 2, 'North')).toEqual([null, null]);
    const optimumName = workbook.snapshot().names.find(({ name }) => name === 'Week.Optimum');
    expect(optimumName).toMatchObject({ scope: 'South', formula: 'South!$F$5:$F$6' });
  });
});

describe('results that find no room', () => {
  const grid = {
    sheets: {
      Plan: {
        B4: 'Kiln 1',
        C4: 'Kiln 2',
        A5: 'Slate',
        B5: { value: 0, numberFormat: '0.0' },
        C5: 0,
        A6: 'Sand',
        B6: 0,
        C6: 0,
        A8: 'Made',
        B8: '=B5+C5+B6+C6',
        B10: '=B5+B6',
        C10: '<=',
        D10: 5,
        B11: '=C5+C6',
        C11: '<=',
        D11: 4,
      },
    },
    names: {
      'Week.Decision': 'Plan!$B$5:$C$6',
      'Week.Objective': 'Plan!$B$8',
      'Week.Sense': '"maximise"',
      'Week.Constraint': 'Plan!$B$10:$D$11',
    },
  };
  const solved: SolvedValues = { values: [5, 1, 0, 3], reducedCosts: [0, 0, 0, 0], dualValues: [1, 1] };

  it('of a grid of decisions stand in a table on a sheet of their own, one row a decision', async () => {
    const workbook = MemoryWorkbook.of(grid);
    const writes = await write(workbook, solved);
    const sheet = 'Week results';
    expect(workbook.snapshot().sheets.map(({ name }) => name)).toEqual(['Plan', sheet]);
    expect(rowOf(workbook, 'A1', 3, sheet)).toEqual(['Decision', 'Now', 'Before\nwhat it is']);
    expect(rowOf(workbook, 'A2', 5, sheet)).toEqual(['Slate · Kiln 1', 5, 0, 5, 0]);
    expect(rowOf(workbook, 'A5', 5, sheet)).toEqual(['Sand · Kiln 2', 3, 0, 3, 0]);
    expect(cellOf(workbook, 'B2', sheet)?.formula).toBe('Plan!B5');
    expect(cellOf(workbook, 'D2', sheet)?.numberFormat).toBe('0.0');
    expect(nameOf(workbook, 'Week.Optimum')).toBe("'Week results'!$D$2:$D$5");
    expect(codes(writes)).toEqual(['results-on-own-sheet']);
  });

  it('are refreshed in that table by the next solve, also when its sheet was renamed', async () => {
    const workbook = MemoryWorkbook.of(grid);
    await write(workbook, solved);
    const next = await write(workbook, { ...solved, values: [2, 4, 3, 0] });
    expect(workbook.snapshot().sheets).toHaveLength(2);
    expect(rowOf(workbook, 'A2', 5, 'Week results')).toEqual(['Slate · Kiln 1', 2, 5, 2, 0]);
    expect(next.notices).toEqual([]);
  });

  it('stand in a new table beside the old one once the grid has another shape, and the old values are cleared', async () => {
    const workbook = MemoryWorkbook.of(grid);
    await write(workbook, solved);
    await typed(workbook, { A7: 'Ochre', B7: 0, C7: 0 });
    await workbook.apply([{ kind: 'name', name: 'Week.Decision', scope: null, formula: 'Plan!$B$5:$C$7' }]);
    const six: SolvedValues = {
      values: [5, 1, 0, 3, 0, 0],
      reducedCosts: [0, 0, 0, 0, -1, -1],
      dualValues: [1, 1],
    };
    const writes = await write(workbook, six);
    expect(workbook.snapshot().sheets).toHaveLength(2);
    expect(rowOf(workbook, 'C2', 3, 'Week results')).toEqual([null, null, null]);
    expect(rowOf(workbook, 'G7', 5, 'Week results')).toEqual(['Ochre · Kiln 2', 0, 0, 0, -1]);
    expect(codes(writes)).toContain('results-left');
  });

  it('of an upright block whose neighbourhood is full stand in a table too', async () => {
    const fence = Object.fromEntries(
      Array.from({ length: 30 }, (_, k) => [
        String.fromCharCode(...(k < 23 ? [68 + k] : [65, 65 + k - 23])) + '5',
        k,
      ]),
    );
    const workbook = tileWorks({}, fence);
    await write(workbook, optimum);
    expect(rowOf(workbook, 'A2', 5, 'Week results')).toEqual(['Slate', 2, 1, 2, 0]);
    expect(rowOf(workbook, 'F11', 3)).toEqual([10, 0, 1]);
  });

  it('on a sheet of their own take a name that no sheet has', async () => {
    const workbook = MemoryWorkbook.of({
      ...grid,
      sheets: { ...grid.sheets, 'Week results': { A1: 'mine' } },
    });
    await write(workbook, solved);
    expect(workbook.snapshot().sheets.map(({ name }) => name)).toEqual([
      'Plan',
      'Week results',
      'Week results 2',
    ]);
    expect(held(workbook, 'A1', 'Week results')).toBe('mine');
  });
});

describe('other forms of the statement', () => {
  it('coefficients: the objective has no cell, dual values take no format, and nothing is compared with it', async () => {
    const workbook = MemoryWorkbook.of({
      sheets: {
        Plan: {
          B3: 'Slate',
          C3: 'Sand',
          A4: 'Made',
          B4: 0,
          C4: 0,
          A5: 'Price',
          B5: 4,
          C5: 3,
          A8: 'Kiln',
          B8: 2,
          C8: 1,
          D8: '<=',
          E8: 10,
          A9: 'Press',
          B9: 1,
          C9: 1,
          D9: '<=',
          E9: 8,
        },
      },
      names: {
        Week_Decision: 'Plan!$B$4:$C$4',
        Week_Objective: 'Plan!$B$5:$C$5',
        Week_Sense: '"max"',
        Week_Constraint: 'Plan!$B$8:$E$9',
      },
    });
    const writes = await write(workbook, optimum);
    expect(writes.workbookObjective).toBeNull();
    expect(writes.workbookAgrees).toBe(true);
    expect(rowOf(workbook, 'G7', 1)).toEqual(['Left side\nwhat it is']);
    expect(rowOf(workbook, 'G8', 3)).toEqual([10, 0, 1]);
    expect(nameOf(workbook, 'Week_DualValue')).toBe('Plan!$I$8:$I$9');
    // The decisions lie on their side: rows 6 and further are blank, but 8 and 9 hold the constraint rows.
    expect(nameOf(workbook, 'Week_Optimum')).toBe('Plan!$B$12:$C$12');
  });

  it('parts apart: results stand beside the left sides, past relations and right sides', async () => {
    const workbook = MemoryWorkbook.of({
      sheets: {
        Plan: {
          C5: 1,
          C6: 1,
          C8: '=4*C5+3*C6',
          B11: '=2*C5+C6',
          B12: '=C5+C6',
          D11: 10,
          D12: 8,
          E11: 'hours',
        },
      },
      names: {
        'Week.Decision': 'Plan!$C$5:$C$6',
        'Week.Objective': 'Plan!$C$8',
        'Week.Sense': '"maximise"',
        'Week.Left': 'Plan!$B$11:$B$12',
        'Week.Relation': '"<="',
        'Week.Right': 'Plan!$D$11:$D$12',
      },
    });
    const writes = await write(workbook, optimum);
    expect(writes.columns.slice(3).map(({ range }) => formatCellRange(range))).toEqual([
      'Plan!G11:G12',
      'Plan!H11:H12',
      'Plan!I11:I12',
    ]);
    expect(rowOf(workbook, 'G11', 3)).toEqual([10, 0, 1]);
  });

  it('a union of cells below each other: the lines between stay blank', async () => {
    const workbook = tileWorks(
      { names: { 'Week.Decision': 'Plan!$C$5,Plan!$C$7' } },
      {
        B6: 'Price',
        C6: 12,
        B7: 'Sand',
        C7: 1,
        C8: { formula: '4*C5+3*C7', value: 7 },
        B11: { formula: '2*C5+C7', value: 3 },
        B12: { formula: 'C5+C7', value: 2 },
      },
    );
    await write(workbook, optimum);
    expect(rowOf(workbook, 'C5', 5)).toEqual([2, null, 1, 2, 0]);
    expect(rowOf(workbook, 'C6', 5)).toEqual([12, null, null, null, null]);
    expect(rowOf(workbook, 'C7', 5)).toEqual([6, null, 1, 6, 0]);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$F$5:$F$7');
    await write(workbook, other);
    expect(rowOf(workbook, 'F5', 1)).toEqual([4]);
    expect(rowOf(workbook, 'F7', 1)).toEqual([2]);
  });

  it('two plans for the same decision cells have their results beside each other', async () => {
    const workbook = tileWorks({
      names: {
        'Day.Decision': 'Plan!$C$5:$C$6',
        'Day.Objective': 'Plan!$C$8',
        'Day.Sense': '"minimise"',
        'Day.Constraint': 'Plan!$B$11:$D$12',
      },
    });
    await write(workbook, optimum, { planName: 'Week' });
    await write(workbook, other, { planName: 'Day' });
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$F$5:$F$6');
    expect(nameOf(workbook, 'Day.Optimum')).toBe('Plan!$J$5:$J$6');
    const again = await write(workbook, optimum, { planName: 'Week' });
    expect(again.notices).toEqual([]);
    expect(rowOf(workbook, 'J5', 1)).toEqual([4]);
  });
});

describe('a block lying on its side', () => {
  it('has its results in rows below, with headings before them and the planner’s widths untouched', async () => {
    const workbook = MemoryWorkbook.of({
      sheets: {
        Plan: {
          C4: 'Slate',
          D4: 'Sand',
          B5: 'm² made',
          C5: 1,
          D5: 1,
          B12: '=4*C5+3*D5',
          C14: '=2*C5+D5',
          D14: '=C5+D5',
          C15: '<=',
          D15: '<=',
          C16: 10,
          D16: 8,
        },
      },
      names: {
        'Week.Decision': 'Plan!$C$5:$D$5',
        'Week.Objective': 'Plan!$B$12',
        'Week.Sense': '"maximise"',
        'Week.Constraint': 'Plan!$C$14:$D$16',
      },
    });
    const writes = await write(workbook, optimum);
    expect(rowOf(workbook, 'B7', 3)).toEqual(['Before\nwhat it is', 1, 1]);
    expect(rowOf(workbook, 'B8', 3)).toEqual(['Optimum\nwhat it is', 2, 6]);
    expect(rowOf(workbook, 'B18', 3)).toEqual(['Left side\nwhat it is', 10, 8]);
    expect(rowOf(workbook, 'B20', 3)).toEqual(['Dual value\nwhat it is', 1, 2]);
    expect(nameOf(workbook, 'Week.Optimum')).toBe('Plan!$C$8:$D$8');
    expect(writes.plan.some((item) => item.kind === 'columnWidth')).toBe(false);
    await write(workbook, other);
    expect(rowOf(workbook, 'B8', 3)).toEqual(['Optimum\nwhat it is', 4, 2]);
  });
});

describe('headings and blank rows within a block of constraint rows', () => {
  it('keep their lines empty in the results, and the result’s heading stands above the block', async () => {
    const workbook = tileWorks(
      { names: { 'Week.Constraint': 'Plan!$B$10:$D$14' } },
      { A10: null, B10: 'Hours', B13: 'Further', B14: '=C5', C14: '<=', D14: 6 },
    );
    const writes = await write(workbook, { ...optimum, dualValues: [1, 2, 0] });
    expect(rowOf(workbook, 'F9', 3)).toEqual([
      'Left side\nwhat it is',
      'Slack\nwhat it is',
      'Dual value\nwhat it is',
    ]);
    expect(rowOf(workbook, 'F10', 3)).toEqual([null, null, null]);
    expect(rowOf(workbook, 'F13', 3)).toEqual([null, null, null]);
    expect(rowOf(workbook, 'F14', 3)).toEqual([2, 4, 0]);
    expect(nameOf(workbook, 'Week.Slack')).toBe('Plan!$G$10:$G$14');
    expect(writes.notices).toEqual([]);
  });
});

describe('the workbook’s own arithmetic', () => {
  it('that disagrees with the solution is reported with both values', () => {
    const workbook = tileWorks();
    const snapshot = workbook.snapshot();
    const { model } = readPlan(snapshot, 'Week', { now: 46_000 });
    const solution = planSolutionOf(model!, optimum);
    const writes = planResultWrites({
      workbook: snapshot,
      model: model!,
      solution: { ...solution, objective: 26.5 },
      keepDecisions: false,
      texts,
      now: 46_000,
    });
    expect(writes.workbookAgrees).toBe(false);
    expect(writes.notices).toEqual([
      {
        code: 'workbook-disagrees',
        severity: 'warning',
        cell: { sheet: 'Plan', row: 7, column: 2 },
        facts: { what: 'objective', workbook: 26, model: 26.5 },
      },
    ]);
  });
});
