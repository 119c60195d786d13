import { listEnd } from '../../../solver-core/presolve/linked-entries';
import { PresolveWorkspace } from '../../../solver-core/presolve/presolve-workspace';
import { lp } from '../../support/lp-notation';

/** The active entries by row, as text. */
function rowsOf(workspace: PresolveWorkspace): string[] {
  return Array.from({ length: workspace.rowCount }, (_, row) => row)
    .filter((row) => workspace.isRowActive(row))
    .map((row) => {
      const terms: string[] = [];
      for (let e = workspace.firstInRow[row]; e !== listEnd; e = workspace.nextInRow[e]) {
        terms.push(`${workspace.entryValue[e]} x${workspace.entryColumn[e]}`);
      }
      return `${workspace.rowLower[row]} <= ${terms.sort().join(' + ')} <= ${workspace.rowUpper[row]}`;
    });
}

const text = `
  maximise 3 a + b - 2 c + 10
  first: 2 a + b + c = 8
  second: a + 3 c <= 20
  third: -4 a - 2 b - 2 c >= -30
  b >= 1`;

describe('the workspace of presolve', () => {
  it('minimises: costs and constant of a maximised problem are negated', () => {
    const workspace = new PresolveWorkspace(lp(text));
    expect([Array.from(workspace.cost), workspace.constant]).toEqual([[-3, -1, 2], -10]);
  });

  it('puts a value into right sides and constant', () => {
    const workspace = new PresolveWorkspace(lp(text));
    workspace.substituteValue(2, 3);
    expect(rowsOf(workspace)).toEqual([
      '5 <= 1 x1 + 2 x0 <= 5',
      '-Infinity <= 1 x0 <= 11',
      '-24 <= -2 x1 + -4 x0 <= Infinity',
    ]);
    expect(workspace.constant).toBe(-4);
    expect([workspace.columnLength[2], workspace.isColumnActive(2)]).toEqual([0, false]);
  });

  it('eliminates a column by an equation; entries appear, change, and cancel', () => {
    // a = 4 − b / 2 − c / 2: second becomes −b/2 + 2.5 c ≤ 16; third has nothing left, and −16 ≥ −30 stays.
    const workspace = new PresolveWorkspace(lp(text));
    workspace.eliminate(0, 0, 2);
    expect(rowsOf(workspace)).toEqual(['-Infinity <= -0.5 x1 + 2.5 x2 <= 16', '-14 <=  <= Infinity']);
    expect([Array.from(workspace.cost).slice(1), workspace.constant]).toEqual([[0.5, 3.5], -22]);
  });

  it('counts the columns of each row that have no other', () => {
    const workspace = new PresolveWorkspace(lp('minimise x\n a: x + y + z <= 1\n b: x + z <= 1\n c: z <= 1'));
    expect(Array.from(workspace.singletonCount)).toEqual([1, 0, 0]);
    workspace.removeRow(1);
    expect(Array.from(workspace.singletonCount).slice(0, 1)).toEqual([2]);
    workspace.removeColumn(1);
    workspace.removeRow(2);
    expect(workspace.singletonCount[0]).toBe(2);
  });

  it('sums a row’s activities afresh after a change, and leaves out a column’s own term', () => {
    const workspace = new PresolveWorkspace(
      lp('minimise x\n a: 2 x - y + z <= 1\n 1 <= x <= 3\n -1 <= y <= 5'),
    );
    const { activities } = workspace;
    expect([activities.least(0), activities.greatest(0)]).toEqual([-3, Infinity]);
    expect([activities.greatestWithout(0, Infinity), activities.leastWithout(0, 2)]).toEqual([7, -5]);
    workspace.setColumnBounds(2, 4, 6);
    expect([activities.least(0), activities.greatest(0)]).toEqual([1, 13]);
  });

  it('queues what a change may concern, each once', () => {
    const workspace = new PresolveWorkspace(lp(text));
    while (workspace.changedRows.take() !== undefined);
    while (workspace.changedColumns.take() !== undefined);
    workspace.setColumnBounds(1, 1, 7);
    workspace.setCost(0, 5);
    workspace.setCost(0, 6);
    expect([0, 1, 2].map(() => workspace.changedRows.take())).toEqual([0, 2, undefined]);
    expect([0, 1, 2].map(() => workspace.changedColumns.take())).toEqual([1, 0, undefined]);
  });
});
