import { PresolveWorkspace } from '../../../solver-core/presolve/presolve-workspace';
import { parallelColumns, parallelRows } from '../../../solver-core/presolve/parallel-lines';
import { lp } from '../../support/lp-notation';

describe('parallel rows and columns', () => {
  it('are found with their ratios, whatever their sign and size', () => {
    // Rows 0, 2, 4 are multiples: 1 : −3 : 0.1, the last by a rounded decimal. Row 3 fills the same places.
    const workspace = new PresolveWorkspace(
      lp(`
        minimise x + y + z
        a: x + 2 y - 4 z <= 9
        b: x + 2 y <= 9
        c: -3 x - 6 y + 12 z >= 1
        d: x + 2 y + 4 z <= 9
        e: 0.1 x + 0.2 y - 0.4 z <= 5`),
    );
    const groups = parallelRows(workspace);
    expect(groups).toHaveLength(1);
    const [{ leader, others }] = groups;
    const lines = [leader, ...others.map(({ line }) => line)].sort();
    expect(lines).toEqual([0, 2, 4]);
    const size: Readonly<Record<number, number>> = { 0: 1, 2: -3, 4: 0.1 };
    others.forEach(({ line, ratio }) => expect(ratio).toBeCloseTo(size[line] / size[leader], 14));
  });

  it('are not found where one entry differs in its tenth digit', () => {
    const workspace = new PresolveWorkspace(lp('minimise x\n a: x + 2 y <= 9\n b: 2 x + 4.000000001 y <= 9'));
    expect(parallelRows(workspace)).toEqual([]);
    expect(parallelColumns(workspace)).toEqual([]);
  });

  it('may be columns of one entry, rows only of two: one entry makes a bound', () => {
    const workspace = new PresolveWorkspace(
      lp('minimise x + y + z\n a: 2 x + y + z <= 9\n b: 3 z <= 9\n c: 6 z >= 1'),
    );
    expect(parallelColumns(workspace)).toEqual([{ leader: 0, others: [{ line: 1, ratio: 0.5 }] }]);
    expect(parallelRows(workspace)).toEqual([]);
  });
});
