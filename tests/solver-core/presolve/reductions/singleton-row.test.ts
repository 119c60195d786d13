import { singletonRow } from '../../../../solver-core/presolve/reductions/singleton-row';
import { contradictionContract, onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [singletonRow] });

reductionContract('singleton-row', reductions, [
  {
    // A plate brings 30 an hour of press, a bowl 25: plates 15, and (40 − 15) / 2 bowls. An hour is worth 25, so the
    // 15th plate brings 5 more than its hour, and one more of 4 plates 5 / 4.
    sentence: 'SC-62 a row with one entry becomes a bound, and its dual value is restored',
    problem: `
      maximise 30 plates + 50 bowls
      press: plates + 2 bowls <= 40
      demand: 4 plates <= 60
      least: -2 bowls <= -6`,
    objective: 1075,
    left: [1, 2],
    x: { plates: 15, bowls: 12.5 },
    rowDuals: { press: 25, demand: 1.25, least: 0 },
  },
  {
    sentence: 'SC-62 where the column has the same bound by itself, the row is worth nothing',
    problem: `
      maximise 30 plates + 50 bowls
      press: plates + 2 bowls <= 40
      demand: 4 plates <= 60
      plates <= 15`,
    objective: 1075,
    left: [1, 2],
    rowDuals: { press: 25, demand: 0 },
  },
  {
    sentence: 'an equation of one column fixes it, and takes the dual value from the side that binds',
    problem: `
      maximise 30 plates + 50 bowls
      press: plates + 2 bowls <= 40
      order: 4 plates = 60`,
    objective: 1075,
    left: [1, 2],
    rowDuals: { press: 25, order: 1.25 },
  },
  {
    // Least cost is at the lower end: 3 · 2 + 1 · 1; of two rows for one bound the tighter binds.
    sentence: 'of several rows the one that binds has the dual value',
    problem: `
      minimise 3 plates + bowls
      first: plates >= 1
      second: -3 plates <= -6
      third: 2 <= 2 bowls <= 8
      mix: plates - bowls <= 5`,
    objective: 7,
    left: [1, 2],
    rowDuals: { first: 0, second: -1, third: 0.5, mix: 0 },
  },
  {
    sentence: 'one row leaves a column no choice between its own bound and the row’s',
    problem: `
      maximise plates - bowls
      most: 2 plates <= 6
      mix: plates + bowls >= 4
      3 <= plates <= 9`,
    objective: 2,
    left: [1, 2],
    x: { plates: 3, bowls: 1 },
    rowDuals: { most: 1, mix: -1 },
  },
]);

contradictionContract('singleton-row', reductions, [
  {
    sentence: 'the row is below the column',
    problem: 'minimise plates + bowls\n most: 4 plates <= 60\n mix: plates + bowls >= 1\n plates >= 20',
  },
  { sentence: 'two rows part', problem: 'maximise plates\n a: 2 plates >= 9\n b: -plates >= -4' },
]);
