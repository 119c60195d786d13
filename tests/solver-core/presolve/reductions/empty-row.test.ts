import { emptyRow } from '../../../../solver-core/presolve/reductions/empty-row';
import { contradictionContract, onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [emptyRow] });

reductionContract('empty-row', reductions, [
  {
    // press: plates = 5; the others say 0 ≥ −1 and 0 = 0.
    sentence: 'a row without entries goes, and comes back with dual value 0',
    problem: `
      maximise 3 plates
      press: 2 plates <= 10
      idle: 0 plates >= -1
      none: 0 plates = 0`,
    objective: 15,
    left: [1, 1],
    rowDuals: { press: 1.5, idle: 0, none: 0 },
  },
]);

contradictionContract('empty-row', reductions, [
  { sentence: 'nothing is to be at least 1', problem: 'minimise plates\n idle: 0 plates >= 1' },
  { sentence: 'nothing is to be at most −2', problem: 'maximise plates\n idle: 0 plates <= -2' },
]);
