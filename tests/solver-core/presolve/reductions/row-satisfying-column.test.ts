import { rowSatisfyingColumn } from '../../../../solver-core/presolve/reductions/row-satisfying-column';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofColumns: [rowSatisfyingColumn] });

reductionContract('row-satisfying-column', reductions, [
  {
    // Stock satisfies `short` and `late` for nothing: 10 of it. Bowls are the cheaper way to 4.
    sentence: 'a costless column without end satisfies its rows, and one of them binds',
    problem: `
      minimise 3 plates + 2 bowls + 0 stock
      need: plates + bowls >= 4
      short: plates + stock >= 10
      late: bowls + 2 stock >= 6`,
    objective: 8,
    left: [1, 2],
    x: { plates: 0, bowls: 4, stock: 10 },
    rowDuals: { need: 2, short: 0, late: 0 },
  },
  {
    sentence: 'where its own bound asks for more than the rows, it stands there',
    problem: `
      minimise 3 plates + 2 bowls + 0 stock
      need: plates + bowls >= 4
      short: plates + stock >= 10
      stock >= 12`,
    objective: 8,
    left: [1, 2],
    x: { stock: 12 },
  },
  {
    // Falls to 3 − 6 for `cap`, and to (4 − 2) / −1 … for `gap`: stock ≤ −3 and stock ≤ −2.
    sentence: 'a free column falls as far as its rows ask',
    problem: `
      maximise plates + bowls + 0 stock
      press: plates + 3 bowls <= 6
      cap: plates + stock <= 3
      gap: 4 bowls - stock >= 2
      stock free`,
    objective: 6,
    left: [1, 2],
    x: { plates: 6, bowls: 0, stock: -3 },
  },
]);
