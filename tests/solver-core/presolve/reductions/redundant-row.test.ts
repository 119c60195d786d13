import { WorkMeter } from '../../../../solver-core/control/work-meter';
import { presolve } from '../../../../solver-core/presolve/presolve';
import { redundantRow } from '../../../../solver-core/presolve/reductions/redundant-row';
import {
  contradictionContract,
  expectReduced,
  onlyThese,
  reductionContract,
} from '../../../contracts/reduction-contract';
import { lp } from '../../../support/lp-notation';

const reductions = onlyThese({ ofRows: [redundantRow] });

reductionContract('redundant-row', reductions, [
  {
    // 6 + 2 · 7 = 20 is the most that `loose` can come to. Plates first: 6, then 4 bowls.
    sentence: 'a row that its columns cannot violate goes, and comes back with dual value 0',
    problem: `
      maximise 3 plates + 2 bowls
      cap: plates + bowls <= 10
      loose: plates + 2 bowls <= 20
      plates <= 6
      bowls <= 7`,
    objective: 26,
    left: [1, 2],
    rowDuals: { cap: 2, loose: 0 },
  },
]);

describe('the reduction redundant-row', () => {
  it('takes away the side of a row that cannot be reached, without a record', () => {
    // The second row cannot reach 99 and goes; the first cannot fall to −5, and keeps its other side.
    const problem = lp(`
      maximise plates + bowls
      cap: -5 <= plates + bowls <= 10
      loose: plates - bowls <= 99
      plates <= 6
      bowls <= 7`);
    const reduced = expectReduced(presolve(problem, new WorkMeter(Infinity), reductions));
    expect([...reduced.counts]).toEqual([['redundant-row', 1]]);
    expect([reduced.problem.rowLower[0], reduced.problem.rowUpper[0]]).toEqual([-Infinity, 10]);
  });
});

contradictionContract('redundant-row', reductions, [
  {
    sentence: 'the columns cannot reach the row',
    problem: 'minimise plates\n need: 2 plates - bowls >= 9\n plates <= 4',
  },
  {
    sentence: 'the columns cannot stay below the row',
    problem: 'minimise plates\n cap: plates + bowls <= 2\n plates >= 1\n 3 <= bowls <= 8',
  },
]);
