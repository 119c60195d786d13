import { fixedColumn } from '../../../../solver-core/presolve/reductions/fixed-column';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

reductionContract('fixed-column', onlyThese({ ofColumns: [fixedColumn] }), [
  {
    // 40 − 2 · 6 = 28 left for bowls; they are worth 5 each, so a fixed plate costs 2 · 5 and brings 3.
    sentence: 'a column with one value goes into the right sides, and comes back with its reduced cost',
    problem: `
      maximise 3 plates + 5 bowls
      press: 2 plates + bowls <= 40
      plates = 6`,
    objective: 158,
    left: [1, 1],
    x: { plates: 6, bowls: 28 },
    rowDuals: { press: 5 },
  },
  {
    sentence: 'a column fixed at 0 goes without a trace in the right sides',
    problem: `
      minimise 2 plates + bowls + 4
      need: plates + bowls >= 7
      plates = 0`,
    objective: 11,
    left: [1, 1],
    x: { plates: 0, bowls: 7 },
  },
]);
