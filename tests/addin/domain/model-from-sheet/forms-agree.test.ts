/**
 * The same rows stated in every form must be the same model: random rows, written out in formula and coefficient form
 * and as parts apart, upright and lying, must all give the rows they were written from.
 */
import fc from 'fast-check';
import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import { readPlan } from '../../../../addin/domain/model-from-sheet/read-plan';
import { columnLetters } from '../../../../addin/domain/sheet/cell-address';

type Line = readonly (number | { readonly value: string } | string)[];

interface StatedRow {
  readonly coefficients: readonly number[];
  readonly relation: '<=' | '>=' | '=';
  readonly right: number;
}

const seed = 20261201;
const amount = fc.integer({ min: -40, max: 40 }).map((quarters) => quarters / 4);

/** One decision to six, one row to seven; every row has a decision that counts. */
const statedRows = fc.integer({ min: 1, max: 6 }).chain((decisionCount) =>
  fc.array(
    fc
      .record({
        coefficients: fc.array(amount, { minLength: decisionCount, maxLength: decisionCount }),
        relation: fc.constantFrom('<=' as const, '>=' as const, '=' as const),
        right: amount,
      })
      .filter(({ coefficients }) => coefficients.some((coefficient) => coefficient !== 0)),
    { minLength: 1, maxLength: 7 },
  ),
);

/** The decisions stand in A1, A2 … of a sheet of their own. */
function formulaOf({ coefficients }: StatedRow): string {
  return `=${coefficients.map((coefficient, k) => `(${coefficient})*Decisions!A${k + 1}`).join('+')}`;
}

function linesInForm(rows: readonly StatedRow[], form: 'formula' | 'coefficient'): Line[] {
  return rows.map((row) => [
    ...(form === 'formula' ? [formulaOf(row)] : row.coefficients),
    { value: row.relation },
    row.right,
  ]);
}

function transposed(lines: readonly Line[]): Line[] {
  return lines[0].map((_, part) => lines.map((line) => line[part]));
}

function readRows(
  rows: readonly StatedRow[],
  grid: readonly Line[],
  names: Record<string, string>,
): StatedRow[] {
  const decisionCount = rows[0].coefficients.length;
  const workbook = MemoryWorkbook.of({
    sheets: { Decisions: { B1: 1 }, Rows: { A1: grid } },
    names: {
      'Week.Decision': `Decisions!$A$1:$A$${decisionCount}`,
      'Week.Objective': `Decisions!$B$1:$B$${decisionCount}`,
      'Week.Sense': '="min"',
      ...names,
    },
  });
  const { model, issues } = readPlan(workbook.snapshot(), 'Week', { now: 0 });
  if (model === null) {
    throw new Error(JSON.stringify(issues));
  }
  return model.constraintSets.flatMap((set) =>
    set.rows.map(({ left, relation, right }) => {
      const coefficients = new Array<number>(decisionCount).fill(0);
      left.variables.forEach((variable, i) => (coefficients[variable] = left.coefficients[i]));
      return { coefficients, relation, right: right.constant };
    }),
  );
}

function blockRef(height: number, width: number): string {
  return `Rows!$A$1:$${columnLetters(width - 1)}$${height}`;
}

it.each(['formula', 'coefficient'] as const)(
  `AD-20 random rows in %s form are read as they were meant, upright and lying (seed ${seed})`,
  (form) => {
    fc.assert(
      fc.property(statedRows, (rows) => {
        const upright = linesInForm(rows, form);
        for (const grid of [upright, transposed(upright)]) {
          const names = { 'Week.Constraint': blockRef(grid.length, grid[0].length) };
          expect(readRows(rows, grid, names)).toEqual(rows);
        }
      }),
      { seed, numRuns: 150 },
    );
  },
);

it(`AD-23 random rows with their parts apart are read as they were meant (seed ${seed})`, () => {
  fc.assert(
    fc.property(statedRows, (rows) => {
      const upright = linesInForm(rows, 'formula');
      const end = rows.length;
      const last = columnLetters(end - 1);
      const uprightNames = {
        'Week.Left': `Rows!$A$1:$A$${end}`,
        'Week.Relation': `Rows!$B$1:$B$${end}`,
        'Week.Right': `Rows!$C$1:$C$${end}`,
      };
      expect(readRows(rows, upright, uprightNames)).toEqual(rows);
      const lyingNames = {
        'Week.Left': `Rows!$A$1:$${last}$1`,
        'Week.Relation': `Rows!$A$2:$${last}$2`,
        'Week.Right': `Rows!$A$3:$${last}$3`,
      };
      expect(readRows(rows, transposed(upright), lyingNames)).toEqual(rows);
    }),
    { seed, numRuns: 150 },
  );
});
