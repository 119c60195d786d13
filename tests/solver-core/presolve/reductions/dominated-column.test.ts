import { dominatedColumn } from '../../../../solver-core/presolve/reductions/dominated-column';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

reductionContract('dominated-column', onlyThese({ ofProblem: [dominatedColumn] }), [
  {
    // One more of demand is worth at most 3, since it can be bought for that; plates cost 5: none.
    sentence: 'a column that costs more than its rows can ever be worth stands at its lower bound',
    problem: `
      minimise 5 plates + 2 bowls + 3 bought
      demand: plates + bowls + bought >= 10
      kiln: plates + bowls <= 30`,
    objective: 20,
    left: [2, 2],
    x: { plates: 0, bowls: 10, bought: 0 },
    rowDuals: { demand: 2, kiln: 0 },
  },
  {
    // An hour of press is worth at least 4, since it can be sold for that; bowls bring 3 an hour: as few as may be.
    sentence: 'a column that brings less than its rows are worth for certain stands at its lower bound',
    problem: `
      maximise 3 bowls + 6 plates + 4 sold
      press: bowls + plates + sold <= 12
      kiln: bowls + 2 plates <= 20
      1 <= bowls <= 9`,
    objective: 66,
    left: [2, 2],
    x: { bowls: 1, plates: 9.5, sold: 1.5 },
    rowDuals: { press: 4, kiln: 1 },
  },
]);
