/** Put back, on the tile works' small plan: before 10, blank, blank (tile-works.ts); the written amounts are ours. */
import type { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { findPlan } from '../../../../addin/domain/model-from-sheet/naming-convention';
import { planPutBack, type PutBack } from '../../../../addin/domain/results-to-sheet/plan-put-back';
import { formatCellAddress } from '../../../../addin/domain/sheet/cell-address';
import { tileWorkbook, type Changes } from '../model-from-sheet/tile-works';

const now = 46_000;
const record = JSON.stringify({
  version: 1,
  plans: {
    week: {
      columns: [{ name: 'week.optimum', heading: 'Optimum', values: [100, 0, 15] }],
      decisions: [{ block: 1, before: [10, null, null], written: [100, 0, 15] }],
    },
  },
});

const solved = (changes: Changes = {}): MemoryWorkbook =>
  tileWorkbook({ record, ...changes, cells: { B2: 100, B3: 0, B4: 15, ...changes.cells } });
const putBackOf = (workbook: MemoryWorkbook): PutBack | null =>
  planPutBack(workbook.snapshot(), findPlan(workbook.snapshot(), 'week')!, now);
const held = (workbook: MemoryWorkbook): unknown[] =>
  [1, 2, 3].map((row) => workbook.snapshot().sheets[0].cell(row, 1)?.value ?? null);

it('gives the cells what they held, blanks included, and works out the formulas that depend on them', async () => {
  const workbook = solved();
  const putBack = putBackOf(workbook)!;
  await workbook.apply(putBack.plan);
  expect(held(workbook)).toEqual([10, null, null]);
  expect(putBack).toMatchObject({ restoredCount: 3, left: [] });
  // Press hours 10 × 0.5, contribution 10 × 6.5.
  expect(workbook.snapshot().sheets[0].cell(6, 1)?.value).toBe(5);
  expect(workbook.snapshot().sheets[0].cell(10, 1)?.value).toBe(65);
});

it('leaves what the planner has changed since, and says so', async () => {
  const workbook = solved({ cells: { B3: 7 } });
  const putBack = putBackOf(workbook)!;
  await workbook.apply(putBack.plan);
  expect(held(workbook)).toEqual([10, 7, null]);
  expect(putBack.left.map(formatCellAddress)).toEqual(['Plan!B3']);
});

it('can be done once: afterwards there is nothing to put back, and the result columns are still known', async () => {
  const workbook = solved();
  await workbook.apply(putBackOf(workbook)!.plan);
  expect(putBackOf(workbook)).toBeNull();
  expect(JSON.parse(workbook.snapshot().record!)).toMatchObject({
    plans: { week: { columns: [{ name: 'week.optimum' }] } },
  });
});

it('finds its cells again where a row was inserted in between', async () => {
  const workbook = solved({
    cells: { B2: 100, B3: null, B4: 0, B5: 15 },
    names: { 'Week.Decision': 'Plan!$B$2:$B$5' },
  });
  const putBack = putBackOf(workbook)!;
  await workbook.apply(putBack.plan);
  expect(workbook.snapshot().sheets[0].cell(1, 1)?.value).toBe(10);
  expect(workbook.snapshot().sheets[0].cell(4, 1)).toBeUndefined();
  expect(putBack.left.map(formatCellAddress)).toEqual(['Plan!B3']);
});

it('touches no formula, even one that gives what was written', () => {
  const putBack = putBackOf(solved({ cells: { B2: { formula: '50*2', value: 100 } } }))!;
  expect(putBack.left.map(formatCellAddress)).toEqual(['Plan!B2']);
});

it('knows nothing of plans that were never written', () => {
  expect(putBackOf(tileWorkbook())).toBeNull();
});
