import { columnSingletonSlack } from '../../../../solver-core/presolve/reductions/column-singleton-slack';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [columnSingletonSlack] });

reductionContract('column-singleton-slack', reductions, [
  {
    // spare = 20 − 2 plates − bowls between 0 and 6, so 14 ≤ 2 plates + bowls ≤ 20 and the worth is 7 plates + 5 bowls
    // − 20. Both rows bind: plates 6, bowls 8. Dual values u, v after: 2u + v = 7, u + 3v = 5; before: u − 1.
    sentence:
      'a column with one entry in an equation becomes the room of its row, and the others pay its cost',
    problem: `
      maximise 5 plates + 4 bowls - spare
      hours: 2 plates + bowls + spare = 20
      kiln: plates + 3 bowls <= 30
      spare <= 6`,
    objective: 62,
    left: [2, 2],
    x: { plates: 6, bowls: 8, spare: 0 },
    rowDuals: { hours: 2.2, kiln: 0.6 },
  },
  {
    // plates + bowls ≥ 6 − 2 · 2. The row binds at 6 with spare at its most.
    sentence:
      'a column without cost widens a row; where the row binds, the column stands at the bound that did it',
    problem: `
      minimise plates + 2 bowls + 0 spare
      need: 6 <= plates + bowls + 2 spare <= 9
      cap: plates + 3 bowls <= 50
      1 <= spare <= 2`,
    objective: 2,
    left: [2, 2],
    x: { plates: 2, bowls: 0, spare: 2 },
    rowDuals: { need: 1, cap: 0 },
  },
  {
    sentence: 'where the row does not bind, the column rests at a bound that the row can bear',
    problem: `
      minimise plates + 2 bowls + 0 spare
      need: 6 <= plates + bowls + 2 spare <= 9
      order: plates + bowls >= 5
      1 <= spare <= 2`,
    objective: 5,
    left: [2, 2],
    x: { plates: 5, bowls: 0, spare: 1 },
    rowDuals: { need: 0, order: 1 },
  },
  {
    // 20 + 2 spare must come to at least 6: (6 − 20) / 2.
    sentence: 'where the row can bear neither bound, the column takes what brings the row to its own',
    problem: `
      minimise plates + 2 bowls + 0 spare
      need: 6 <= plates + bowls + 2 spare <= 9
      order: plates + bowls >= 20
      -100 <= spare <= 100`,
    objective: 20,
    left: [2, 2],
    x: { plates: 20, bowls: 0, spare: -7 },
  },
  {
    // plates = 8 + over − spare: at most 11, worth 2 each. One more of goal is one plate more.
    sentence: 'two such columns of one equation are taken together',
    problem: `
      maximise 2 plates - bowls + 0 over + 0 spare
      goal: plates - over + spare = 8
      kiln: plates + bowls <= 20
      over <= 3
      spare <= 2`,
    objective: 22,
    left: [2, 2],
    x: { plates: 11, bowls: 0, over: 3, spare: 0 },
    rowDuals: { goal: 2, kiln: 0 },
  },
]);
