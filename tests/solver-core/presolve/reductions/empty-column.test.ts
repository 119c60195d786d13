import { WorkMeter } from '../../../../solver-core/control/work-meter';
import { presolve } from '../../../../solver-core/presolve/presolve';
import { emptyColumn } from '../../../../solver-core/presolve/reductions/empty-column';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';
import { lp } from '../../../support/lp-notation';

const reductions = onlyThese({ ofColumns: [emptyColumn] });

reductionContract('empty-column', reductions, [
  {
    // 2 · 1 − 3 · 4 + 0 + 0 + 5 · 2
    sentence: 'a column without entries stands where its cost is least, or near 0 where it has none',
    problem: `
      minimise 2 rent - 3 scrap + 0 shift + 0 idle + 5 plates
      need: plates >= 2
      rent >= 1
      scrap <= 4
      -5 <= shift <= 3
      idle free`,
    objective: 0,
    left: [1, 1],
    x: { rent: 1, scrap: 4, shift: 3, idle: 0, plates: 2 },
  },
]);

describe('the reduction empty-column', () => {
  it('SC-63 says that an end without bound is to be looked for, and no more', () => {
    const problem = lp('maximise scrap + plates\n press: plates <= 4');
    expect(presolve(problem, new WorkMeter(Infinity), reductions).kind).toBe('unbounded');
  });
});
