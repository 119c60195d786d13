import { WorkMeter } from '../../../../solver-core/control/work-meter';
import { presolve } from '../../../../solver-core/presolve/presolve';
import { dualFixing } from '../../../../solver-core/presolve/reductions/dual-fixing';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';
import { lp } from '../../../support/lp-notation';

const reductions = onlyThese({ ofColumns: [dualFixing] });

reductionContract('dual-fixing', reductions, [
  {
    // Scrap costs and helps no row: 1. Plates are the cheaper way to 5: 2 · 1 + 3 · 5.
    sentence: 'a column that costs and helps no row stands at its lower bound',
    problem: `
      minimise 2 scrap + 3 plates + 4 bowls
      need: plates + bowls >= 5
      kiln: scrap + plates + bowls <= 20
      scrap >= 1`,
    objective: 17,
    left: [2, 2],
    x: { scrap: 1, plates: 5, bowls: 0 },
    rowDuals: { need: 3, kiln: 0 },
  },
  {
    sentence: 'a column that brings something and is in no row’s way stands at its upper bound',
    problem: `
      maximise 2 extra + plates
      press: plates <= 4
      gap: extra - plates >= -8
      extra <= 6`,
    objective: 16,
    left: [2, 1],
    x: { extra: 6, plates: 4 },
  },
  {
    sentence: 'a column without cost that is in the way stands at its bound, too: no optimum is better',
    problem: `
      minimise plates + 0 idle
      need: plates - idle >= 2
      1 <= idle <= 9`,
    objective: 3,
    left: [1, 1],
    x: { plates: 3, idle: 1 },
    rowDuals: { need: 1 },
  },
]);

describe('the reduction dual-fixing', () => {
  it('SC-63 says that an end without bound is to be looked for where the bound is not there', () => {
    const problem = lp('maximise extra - plates\n gap: extra - plates >= -8\n need: plates >= 1');
    expect(presolve(problem, new WorkMeter(Infinity), reductions).kind).toBe('unbounded');
  });
});
