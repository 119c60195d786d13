/** Rows typed under a block of the tile works' small plan; which of them continue it was judged by eye. */
import { describePlans } from '../../../../addin/domain/statement-to-sheet/describe-plans';
import { findAddedRows } from '../../../../addin/domain/statement-to-sheet/find-added-rows';
import { formatCellRange } from '../../../../addin/domain/sheet/cell-range';
import { tileWorkbook, type Changes } from '../model-from-sheet/tile-works';

const added = (changes: Changes) => {
  const workbook = tileWorkbook(changes).snapshot();
  return findAddedRows(workbook, describePlans(workbook)[0]).map(({ range, names }) => ({
    range: formatCellRange(range),
    names,
  }));
};

const skirting: Changes['cells'] = { A5: [['Skirting', null, 7, null, 60, 0.4, 1.1]] };

it('a product below the last one is pointed out, with the bounds beside it', () => {
  expect(added({ cells: skirting })).toEqual([
    { range: 'Plan!B5', names: ['Week.Decision', 'Week.Lower', 'Week.Upper'] },
  ]);
});

it('extends all names of the block together', async () => {
  const workbook = tileWorkbook({ cells: skirting });
  const [plan] = describePlans(workbook.snapshot());
  await workbook.apply(findAddedRows(workbook.snapshot(), plan)[0].writes);
  const formulas = Object.fromEntries(workbook.snapshot().names.map((n) => [n.name, n.formula]));
  expect(formulas).toMatchObject({
    'Week.Decision': 'Plan!$B$2:$B$5',
    'Week.Lower': 'Plan!$D$2:$D$5',
    'Week.Upper': 'Plan!$E$2:$E$5',
    'Week.Constraint': 'Plan!$B$7:$D$9',
  });
  expect(findAddedRows(workbook.snapshot(), describePlans(workbook.snapshot())[0])).toEqual([]);
});

it('a limit below the last one is pointed out', () => {
  expect(added({ cells: { A10: [['Glaze', '=B3*2', '<=', 50]] } })).toEqual([
    { range: 'Plan!B10:D10', names: ['Week.Constraint'] },
  ]);
});

it.each<[string, Changes]>([
  ['a blank row', {}],
  ['a heading', { cells: { A5: 'Next week' } }],
  ['a row of totals', { cells: { A5: [['All', '=SUM(B2:B4)', 7, null, 60, 1, 1]] } }],
  ['a note in one cell', { cells: { C5: 'in euro' } }],
  ['a limit without a relation', { cells: { A10: [['Glaze', 12, null, 50]] } }],
  [
    'a block that a table’s column makes, which grows by itself',
    {
      cells: skirting,
      names: { 'Week.Decision': 'Tiles[m² planned]' },
      tables: [{ name: 'Tiles', sheet: 'Plan', ref: 'A1:G4' }],
    },
  ],
])('%s is not', (_what, changes) => {
  expect(added(changes)).toEqual([]);
});

it('result columns, which a new row has not got, do not count', () => {
  expect(
    added({
      cells: { ...skirting, I2: [[10], [0], [5]] },
      names: { 'Week.Optimum': 'Plan!$I$2:$I$4' },
    }),
  ).toHaveLength(1);
});
