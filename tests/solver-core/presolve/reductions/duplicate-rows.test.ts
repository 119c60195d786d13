import { duplicateRows } from '../../../../solver-core/presolve/reductions/duplicate-rows';
import { contradictionContract, onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofProblem: [duplicateRows] });

reductionContract('duplicate-rows', reductions, [
  {
    // hours: plates + bowls ≤ 8 is the tightest of three; plates 5, bowls 3. One more of 2 plates + 2 bowls is worth 1.
    sentence: 'SC-62 of rows that are multiples of each other the tightest keeps the dual value',
    problem: `
      maximise 3 plates + 2 bowls
      kiln: plates + bowls <= 10
      hours: 2 plates + 2 bowls <= 16
      drying: -plates - bowls >= -9
      plates <= 5`,
    objective: 21,
    left: [1, 2],
    x: { plates: 5, bowls: 3 },
    rowDuals: { kiln: 0, hours: 1, drying: 0 },
  },
  {
    // Twice the row is an equation: −4 plates − 4 bowls = −24. The dearer way costs 1 more: bowls at 0.
    sentence: 'an equation takes in an inequality along the same row',
    problem: `
      minimise 2 plates + 3 bowls
      atleast: plates + bowls >= 1
      order: -4 plates - 4 bowls = -24`,
    objective: 12,
    left: [1, 2],
    x: { plates: 6, bowls: 0 },
    rowDuals: { atleast: 0, order: -0.5 },
  },
]);

contradictionContract('duplicate-rows', reductions, [
  {
    sentence: 'one row is above the other',
    problem: 'minimise plates\n cap: plates + bowls <= 3\n need: 2 plates + 2 bowls >= 8',
  },
  {
    sentence: 'one equation denies the other, turned around',
    problem:
      'minimise plates\n a: plates - bowls = 3\n b: 2 bowls - 2 plates = -4\n plates free\n bowls free',
  },
]);
