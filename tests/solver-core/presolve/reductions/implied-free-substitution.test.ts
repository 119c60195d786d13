import { impliedFreeSubstitution } from '../../../../solver-core/presolve/reductions/implied-free-substitution';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofColumns: [impliedFreeSubstitution] });

reductionContract('implied-free-substitution', reductions, [
  {
    // stock = plates + bowls − 4: 3 plates + 4 bowls + 5 bought − 4 with plates + bowls + bought ≥ 7: plates 7.
    // Stock: 1 = −y₁ + y₂ with y₂ = 3.
    sentence: 'a free column of two entries is put into its other row',
    problem: `
      minimise 2 plates + 3 bowls + 5 bought + stock
      first: plates + bowls - stock = 4
      second: stock + bought >= 3
      stock free`,
    objective: 17,
    left: [1, 3],
    x: { plates: 7, bowls: 0, bought: 0, stock: 3 },
    rowDuals: { first: 2, second: 3 },
  },
  {
    sentence: 'a column that its rows keep within its bounds counts as free',
    problem: `
      minimise 2 plates + 3 bowls + 5 bought + stock
      first: plates + bowls - stock = 4
      second: stock + bought >= 3
      plates >= 4`,
    objective: 17,
    left: [1, 3],
    x: { plates: 7, bowls: 0, bought: 0, stock: 3 },
    rowDuals: { first: 2, second: 3 },
  },
]);
