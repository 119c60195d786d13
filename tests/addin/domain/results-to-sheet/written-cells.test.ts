/** What is ours and what has become the planner's. Expected answers by hand. */
import {
  cellsStillOurs,
  readWorkbookRecord,
  renewWorkbookRecord,
  stillHolds,
} from '../../../../addin/domain/results-to-sheet/written-cells';

const plan = {
  columns: [{ name: 'week.optimum', heading: 'Optimum', values: [1.5, null, 0] }],
  decisions: [{ block: 1, before: [null, 2], written: [1.5, 0] }],
};

describe('the record', () => {
  it('is read back as it was written, plan names without regard to case', () => {
    const json = renewWorkbookRecord(new Map(), 'Week', plan);
    expect(readWorkbookRecord(json).get('week')).toEqual(plan);
  });

  it('keeps the parts of other plans when one is renewed', () => {
    const first = readWorkbookRecord(renewWorkbookRecord(new Map(), 'Night', plan));
    const both = readWorkbookRecord(renewWorkbookRecord(first, 'WEEK', { columns: [], decisions: [] }));
    expect([...both.keys()]).toEqual(['night', 'week']);
    expect(both.get('night')).toEqual(plan);
  });

  it.each([
    ['nothing', null],
    ['no JSON', 'hello'],
    ['a list', '[]'],
    ['another version', '{"version":99,"plans":{}}'],
    ['columns that are none', '{"version":1,"plans":{"week":{"columns":[{"name":1}],"decisions":[]}}}'],
    [
      'values of another kind',
      '{"version":1,"plans":{"week":{"columns":[{"name":"a","heading":null,"values":[{}]}],"decisions":[]}}}',
    ],
  ])('counts as none where it holds %s', (_what, json) => {
    expect(readWorkbookRecord(json).size).toBe(0);
  });
});

describe('a cell', () => {
  it('still holds a number that another program stored with 15 digits', () => {
    expect(stillHolds(0.333333333333333, 1 / 3)).toBe(true);
    expect(stillHolds(0.33333333333, 1 / 3)).toBe(false);
  });

  it('does not hold 0 where nothing was written, nor nothing where 0 was', () => {
    expect(stillHolds(0, null)).toBe(false);
    expect(stillHolds(null, 0)).toBe(false);
    expect(stillHolds('0', 0)).toBe(false);
  });
});

describe('a column', () => {
  it('is ours but for the cells that were changed, and blank ones are free to fill', () => {
    expect(cellsStillOurs([10, 21, null, 40], [10, 20, 30, 40])).toEqual([true, false, true, true]);
  });

  it('with a row inserted in its middle is ours on both sides of it', () => {
    expect(cellsStillOurs([10, 20, null, 30], [10, 20, 30])).toEqual([true, true, true, true]);
    expect(cellsStillOurs([10, 20, 99, 30], [10, 20, 30])).toEqual([true, true, false, true]);
  });

  it('with a row deleted is ours', () => {
    expect(cellsStillOurs([10, 30, 40], [10, 20, 30, 40])).toEqual([true, true, true]);
  });

  it('with a row inserted and a cell changed keeps only the changed one', () => {
    expect(cellsStillOurs([10, 77, 30, null, 40, 50], [10, 20, 30, 40, 50])).toEqual([
      true,
      false,
      true,
      true,
      true,
      true,
    ]);
  });

  it('of which nothing is recorded is the planner’s wherever it holds something', () => {
    expect(cellsStillOurs([1, null, 'x'], [])).toEqual([false, true, false]);
  });
});
