import { forcingRow } from '../../../../solver-core/presolve/reductions/forcing-row';
import { onlyThese, reductionContract } from '../../../contracts/reduction-contract';

const reductions = onlyThese({ ofRows: [forcingRow] });

reductionContract('forcing-row', reductions, [
  {
    // need: 4 + 5 = 9 exactly, so kiln ≤ 10 leaves 6 for tiles: 5 · 4 + 4 · 5 − 2 · 6.
    sentence: 'a row that is met only with all columns at their bounds fixes them; one becomes basic again',
    problem: `
      minimise 5 plates + 4 bowls - 2 tiles
      need: plates + bowls >= 9
      kiln: plates + tiles <= 10
      plates <= 4
      bowls <= 5`,
    objective: 28,
    left: [1, 1],
    x: { plates: 4, bowls: 5, tiles: 6 },
    rowDuals: { kiln: -2 },
  },
  {
    // The columns would stand there anyway: 0 and 5.
    sentence: 'where the costs agree with the row, its logical stays basic',
    problem: `
      maximise -2 plates + 3 bowls + tiles
      gap: plates - bowls <= -5
      kiln: bowls + tiles <= 11
      bowls <= 5`,
    objective: 21,
    left: [1, 1],
    x: { plates: 0, bowls: 5, tiles: 6 },
    rowDuals: { gap: 0, kiln: 1 },
  },
  {
    // plates is fixed at 2 beforehand: its reduced cost may have either sign, only that of bowls counts.
    sentence: 'columns that were fixed before do not decide on the dual value',
    problem: `
      minimise plates + 7 bowls
      need: plates + bowls = 6
      plates = 2
      bowls <= 4`,
    objective: 30,
    left: [0, 0],
    x: { plates: 2, bowls: 4 },
  },
]);
