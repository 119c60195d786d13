import { doubletonEquation } from '../../../../solver-core/presolve/reductions/doubleton-equation';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [doubletonEquation] });

reductionContract('doubleton-equation', reductions, [
  {
    // clay = 2 glaze, so glaze ≤ 2.5 and 8 glaze + 4 bought with 3 glaze + bought ≥ 12: glaze 2.5, bought 4.5. The
    // bound is clay's: reduced cost 3 − 1 − 4 = −2, where 2 + 2 y − 4 = 0 gives y = 1.
    sentence: 'SC-62 an eliminated column stands at its bound where that bound holds the other',
    problem: `
      minimise 3 clay + 2 glaze + 4 bought
      ratio: clay - 2 glaze = 0
      need: clay + glaze + bought >= 12
      clay <= 5`,
    objective: 38,
    left: [1, 2],
    x: { clay: 5, glaze: 2.5, bought: 4.5 },
    rowDuals: { ratio: 1, need: 4 },
  },
  {
    // Without the bound: 3 glaze = 12 at 8 / 3 each way: 32.
    sentence: 'an eliminated column without a bound in the way is basic',
    problem: `
      minimise 3 clay + 2 glaze + 4 bought
      ratio: clay - 2 glaze = 0
      need: clay + glaze + bought >= 12`,
    objective: 32,
    left: [1, 2],
    x: { clay: 8, glaze: 4, bought: 0 },
  },
  {
    // made + left = 9: profit 5 made − 1 left = 6 made − 9, made ≤ 6 by its own bound, left ≥ 2 by its own.
    sentence: 'coefficients of one sign turn a lower bound into an upper one',
    problem: `
      maximise 5 made - left
      split: made + left = 9
      kiln: 2 made + left <= 30
      made <= 8
      left >= 2`,
    objective: 33,
    left: [1, 1],
    x: { made: 7, left: 2 },
    rowDuals: { split: 5, kiln: 0 },
  },
  {
    // a = 2 c + 1, b = 2 c − 3, d = 6 − c: costs 4 c + 25, and a + d = c + 7 ≥ 10.
    sentence: 'a chain of equations is eliminated link by link',
    problem: `
      minimise a + 2 b + 3 c + 5 d
      one: a - b = 4
      two: b - 2 c = -3
      three: c + d = 6
      four: a + d >= 10`,
    objective: 37,
    left: [1, 1],
    x: { a: 7, b: 3, c: 3, d: 3 },
  },
]);
