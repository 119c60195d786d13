import { isDeepStrictEqual } from 'node:util';
import fc from 'fast-check';
import { readMps } from '../../../solver-core/formats/mps-reader';
import { writeMps } from '../../../solver-core/formats/mps-writer';
import type { LinearProgram } from '../../../solver-core/linear-program/linear-program';
import { LinearProgramBuilder } from '../../../solver-core/linear-program/linear-program-builder';
import { loadHighsOnce, solveWithHighs } from '../../oracles/highs-reference';
import { lp } from '../../support/lp-notation';
import { itNeeds } from '../../support/needs';
import { randomKinds, randomLinearProgram } from '../../support/random-linear-program';
import { readReferenceText, referenceProblems, relativeDifference } from '../../support/reference-problems';
import { shareOf } from '../../support/share';

/** Finite doubles of all sizes below 1e30, which is where the format has infinity begin. */
const number = fc.double({ min: -9e29, max: 9e29, noNaN: true }).map((value) => (value === 0 ? 0 : value));

const bounds = fc.oneof(
  fc.constant({ lower: -Infinity, upper: Infinity }),
  fc.constant({ lower: 0, upper: Infinity }),
  number.map((value) => ({ lower: value, upper: value })),
  number.map((value) => ({ lower: -Infinity, upper: value })),
  number.map((value) => ({ lower: value, upper: Infinity })),
  fc.tuple(number, number).map(([a, b]) => ({ lower: Math.min(a, b), upper: Math.max(a, b) })),
);

const drawnProblems: fc.Arbitrary<LinearProgram> = fc
  .record({
    sense: fc.constantFrom('minimise' as const, 'maximise' as const),
    constant: number,
    columns: fc.array(fc.record({ cost: number, bounds, isInteger: fc.boolean() }), { maxLength: 6 }),
    rows: fc.array(bounds, { maxLength: 6 }),
    entries: fc.array(fc.tuple(fc.nat(5), fc.nat(5), number), { maxLength: 20 }),
  })
  .map(({ sense, constant, columns, rows, entries }) => {
    const builder = new LinearProgramBuilder({ name: 'drawn', sense });
    builder.objectiveConstant = constant;
    columns.forEach((column) =>
      builder.addColumn({ cost: column.cost, isInteger: column.isInteger, ...column.bounds }),
    );
    rows.forEach((row) => builder.addRow(row));
    const taken = new Set<number>();
    for (const [row, column, value] of entries) {
      if (row >= rows.length || column >= columns.length || taken.has(6 * row + column)) continue;
      taken.add(6 * row + column);
      builder.addEntry(row, column, value);
    }
    return builder.build();
  });

/** Ranged rows apart: their far end may come back one unit in the last place off. */
function withoutRanges(problem: LinearProgram): object {
  const isRanged = (row: number): boolean =>
    Number.isFinite(problem.rowLower[row]) &&
    Number.isFinite(problem.rowUpper[row]) &&
    problem.rowLower[row] !== problem.rowUpper[row];
  const plain = (values: LinearProgram['rowLower']): number[] =>
    Array.from(values, (value, row) => (isRanged(row) ? 0 : value));
  return { ...problem, rowLower: plain(problem.rowLower), rowUpper: plain(problem.rowUpper) };
}

describe('writeMps', () => {
  it('SC-53 writes what reads as the same problem, seed 53', () => {
    fc.assert(
      fc.property(drawnProblems, (problem) => {
        const again = readMps(writeMps(problem));
        expect(withoutRanges(again)).toEqual(withoutRanges(problem));
        problem.rowLower.slice().forEach((lower, row) => {
          const upper = problem.rowUpper[row];
          if (!Number.isFinite(lower) || !Number.isFinite(upper)) return;
          const unit = 2 * Number.EPSILON * Math.max(Math.abs(lower), Math.abs(upper));
          expect(Math.abs(again.rowLower[row] - lower)).toBeLessThanOrEqual(unit);
          expect(Math.abs(again.rowUpper[row] - upper)).toBeLessThanOrEqual(unit);
        });
      }),
      { seed: 53, numRuns: 500 },
    );
  });

  it('gives ranged rows back exactly where decimals of few digits are their ends', () => {
    const problem = lp(`
      minimise a
      kiln: 0.1 <= a <= 0.3
      glaze: -2.7 <= a <= 1000.1
      press: 3 <= a <= 1e9`);
    const again = readMps(writeMps(problem));
    expect(again.rowLower).toEqual(problem.rowLower);
    expect(again.rowUpper).toEqual(problem.rowUpper);
  });

  it('makes names fit and keeps them apart', () => {
    const builder = new LinearProgramBuilder({ name: 'Woche 12, Plan B', sense: 'minimise' });
    builder.objectiveName = 'cost per week';
    for (const name of [
      'Tile · Monday',
      'Tile · Tuesday',
      'Tile_ _Monday',
      '',
      'RHS',
      "'MARKER'",
      '12',
      'Größe',
      'Gr_~e',
      '$x',
      '*y',
    ]) {
      builder.addColumn({ name, cost: 1 });
    }
    builder.addRow({ name: 'kiln hours', lower: 0, upper: 1 });
    builder.addRow({ name: 'kiln_hours', lower: 0, upper: 1 });
    builder.addRow({ name: 'cost per week', lower: 0, upper: 1 });
    builder.addEntry(0, 3, 1);
    const problem = builder.build();
    const text = writeMps(problem);
    const again = readMps(text);
    expect(text).toMatch(/^[\n -~]*$/);
    expect(again.columnNames).toHaveLength(11);
    expect(again.columnNames[0]).toBe('Tile___Monday');
    expect(new Set(again.columnNames).size).toBe(11);
    expect(again.rowNames).toEqual(['kiln_hours', 'kiln_hours_2', 'cost_per_week_2']);
    expect(again.matrix).toEqual(problem.matrix);
  });

  it('SC-53 writes what HiGHS reads as the same problem, seeds 5000 to 5099', async () => {
    const highs = await loadHighsOnce();
    for (let seed = 5000; seed < 5100; seed++) {
      const problem = randomLinearProgram(seed, randomKinds[seed % randomKinds.length]);
      const reference = solveWithHighs(highs, problem);
      const model = highs.createModel({ format: 'mps', data: new TextEncoder().encode(writeMps(problem)) });
      model.options.set({ output_flag: false, presolve: 'off', solver: 'simplex' });
      model.run();
      const isOptimal = model.getModelStatus() === highs.constants.modelStatus.optimal;
      const objective = model.getObjectiveValue();
      model.dispose();
      expect({ seed, isOptimal }).toEqual({ seed, isOptimal: reference.status === 'optimal' });
      if (isOptimal) {
        const isClose = relativeDifference(objective, reference.objective) < 1e-9;
        expect({ seed, isClose }).toEqual({ seed, isClose: true });
      }
    }
  });

  itNeeds(
    'lpFolder',
    'writes every shared problem so that it reads as the same, bit by bit',
    () => {
      for (const set of ['netlib', 'kennington', 'infeas', 'misc', 'mip'] as const) {
        const problems = referenceProblems(set);
        for (const { name } of problems.slice(0, shareOf(problems.length, 12))) {
          const {
            name: title,
            rowNames,
            columnNames,
            objectiveName,
            ...problem
          } = readMps(readReferenceText(set, name));
          const all = { name: title, rowNames, columnNames, objectiveName, ...problem };
          const again: LinearProgram = readMps(writeMps(all));
          for (const [field, value] of Object.entries(problem)) {
            const isSame = isDeepStrictEqual(again[field as keyof LinearProgram], value);
            expect({ set, name, field, isSame }).toEqual({ set, name, field, isSame: true });
          }
        }
      }
    },
    60_000,
  );
});
