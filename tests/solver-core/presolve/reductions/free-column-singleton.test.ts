import { freeColumnSingleton } from '../../../../solver-core/presolve/reductions/free-column-singleton';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [freeColumnSingleton] });

reductionContract('free-column-singleton', reductions, [
  {
    // stock = plates + 2 bowls − 4, so the rest is worth 4 plates + 1 bowls + 8: ten plates. One more on the right
    // side of balance is one less in stock: worth 2.
    sentence: 'a free column with one entry goes with its equation',
    problem: `
      maximise 6 plates + 5 bowls - 2 stock
      balance: plates + 2 bowls - stock = 4
      kiln: plates + bowls <= 10
      stock free`,
    objective: 48,
    left: [1, 2],
    x: { plates: 10, bowls: 0, stock: 6 },
    rowDuals: { balance: 2, kiln: 4 },
  },
  {
    // bought = 12 − plates − bowls is never below 3: its own bound does not count.
    sentence:
      'a column that its row keeps off its bound counts as free, and its cost says where the row stands',
    problem: `
      minimise 3 bought + 2 plates + bowls
      cover: plates + bowls + bought >= 12
      plates <= 4
      bowls <= 5`,
    objective: 22,
    left: [0, 2],
    x: { plates: 4, bowls: 5, bought: 3 },
    rowDuals: { cover: 3 },
  },
  {
    // Profit wants late as large as the row lets it: the row stands at its upper bound 8, late = 8 − plates + bowls.
    sentence: 'a column that brings something takes its row to the upper bound',
    problem: `
      maximise 2 late + plates + bowls
      gap: 2 <= plates - bowls + late <= 8
      kiln: plates + 2 bowls <= 6
      late free`,
    objective: 25,
    left: [1, 2],
    x: { plates: 0, bowls: 3, late: 11 },
    rowDuals: { gap: 2, kiln: 1.5 },
  },
]);
