import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { AffineForm } from '../../../../addin/domain/linearization/affine-form';
import { checkAtRandomPoints } from '../../../../addin/domain/linearization/check-at-random-points';
import { linearize } from '../../../../addin/domain/linearization/linearize';

/** 5 + 2 x₀ − x₂, over three decisions. */
const form = AffineForm.fromSorted(5, [0, 2], [2, -1]);
const cell = { sheet: 'Plan', row: 0, column: 0 };

it('a form that says what the formula says passes', () => {
  expect(checkAtRandomPoints(3, [form], [], (x) => [5 + 2 * x[0] - x[2]])).toEqual([]);
});

it.each<readonly [string, (x: readonly number[]) => unknown]>([
  ['a decision that was dropped', (x) => 5 + 2 * x[0] - x[2] + x[1]],
  ['a coefficient that is off in its seventh digit', (x) => 5 + 2.000001 * x[0] - x[2]],
  ['a constant that was dropped', (x) => 5.001 + 2 * x[0] - x[2]],
  ['a curve', (x) => 5 + 2 * x[0] ** 1.01 - x[2]],
  ['a rounded value', (x) => Math.round(5 + 2 * x[0] - x[2])],
  ['a condition', (x) => (x[0] > 5 ? 5 + 2 * x[0] - x[2] : 0)],
  ['a formula that cannot be worked out', () => 'blocked'],
])('%s is seen', (_what, formula) => {
  expect(checkAtRandomPoints(3, [form], [], (x) => [formula(x)])).toMatchObject([{ target: 0 }]);
});

it('variables with defining rows take their values from the rows', () => {
  const rows = [
    { variable: 3, cell, form: AffineForm.fromSorted(1, [0, 1], [1, 1]) },
    { variable: 4, cell, form: AffineForm.fromSorted(0, [2, 3], [1, 2]) },
  ];
  const total = AffineForm.fromSorted(0, [4], [10]);
  const formula = (x: readonly number[]): readonly number[] => [10 * (x[2] + 2 * (1 + x[0] + x[1]))];
  expect(checkAtRandomPoints(3, [total], rows, formula)).toEqual([]);
});

it('what large constants leave behind when they cancel is no disagreement', () => {
  const workbook = MemoryWorkbook.of({
    sheets: { Plan: { A1: 1, B1: '=(A1/3+1E9)-1E9', B2: '=SUM(B1,1E8,-1E8)' } },
  }).snapshot();
  const { readings } = linearize({
    workbook,
    decisions: [cell],
    targets: [0, 1].map((row) => ({ sheet: 'Plan', row, column: 1 })),
    now: 0,
  });
  expect(readings.map((reading) => reading.kind)).toEqual(['affine', 'affine']);
});

it('the points are the same each time', () => {
  const seen: number[][] = [];
  for (let time = 0; time < 2; time++) {
    checkAtRandomPoints(3, [form], [], (x) => {
      seen.push([...x]);
      return [form.valueAt(x)];
    });
  }
  expect(seen[2]).toEqual(seen[0]);
  expect(seen[3]).toEqual(seen[1]);
  expect(seen[1]).not.toEqual(seen[0]);
});
