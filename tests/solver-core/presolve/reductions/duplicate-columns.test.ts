import { duplicateColumns } from '../../../../solver-core/presolve/reductions/duplicate-columns';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofProblem: [duplicateColumns] });

reductionContract('duplicate-columns', reductions, [
  {
    // plates + 2 pairs is at most 3 + 4 and is the cheaper way: 7, then (12 − 7) / 3 crates at 9.
    sentence: 'columns that do the same at the same price act as one, and share its bound',
    problem: `
      minimise 2 plates + 4 pairs + 9 crates
      need: plates + 2 pairs + 3 crates >= 12
      kiln: 2 plates + 4 pairs + crates <= 30
      plates <= 3
      pairs <= 2`,
    objective: 29,
    left: [2, 2],
    x: { plates: 3, pairs: 2 },
    rowDuals: { need: 3, kiln: 0 },
  },
  {
    sentence: 'between its bounds the sum is split so that one of the two rests at a bound',
    problem: `
      minimise 2 plates + 4 pairs + 9 crates
      need: plates + 2 pairs + 3 crates >= 12
      kiln: 2 plates + 4 pairs + crates <= 30
      plates <= 3
      pairs <= 20`,
    objective: 24,
    left: [2, 2],
    rowDuals: { need: 2, kiln: 0 },
  },
  {
    // returns = −2 × plates; net = plates − 2 returns ≤ 5, worth 3 each, and 1 each crate after (12 − 5) of need.
    sentence: 'columns of opposite sign are merged, too',
    problem: `
      maximise 3 plates - 6 returns + crates
      need: plates - 2 returns + crates <= 12
      kiln: 2 plates - 4 returns - crates <= 40
      plates <= 5
      1 <= returns <= 4`,
    objective: 18,
    left: [2, 2],
    x: { plates: 5, returns: 1 },
  },
  {
    // Two plates cost 4, a pair 5.
    sentence: 'the dearer of two stands at its lower bound where the other has no end',
    problem: `
      minimise 2 plates + 5 pairs + 9 crates
      need: plates + 2 pairs + 3 crates >= 12
      kiln: plates + 2 pairs + crates <= 30
      pairs >= 1`,
    objective: 25,
    left: [2, 2],
    x: { plates: 10, pairs: 1, crates: 0 },
    rowDuals: { need: 2, kiln: 0 },
  },
]);
