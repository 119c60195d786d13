/**
 * From a solver's values to what stands on the sheet. Expected numbers by hand, from design §4's signs.
 */
import { AffineForm } from '../../../../addin/domain/linearization/affine-form';
import type {
  ConstraintRow,
  Relation,
  SheetModel,
} from '../../../../addin/domain/model-from-sheet/sheet-model';
import {
  evaluateForm,
  planSolutionOf,
  snapToBounds,
  variableValuesAt,
} from '../../../../addin/domain/results-to-sheet/plan-solution';

const at = (row: number, column: number) => ({ sheet: 'Plan', row, column });
const form = (constant: number, ...coefficients: number[]): AffineForm =>
  AffineForm.fromTerms(constant, new Map(coefficients.map((coefficient, k) => [k, coefficient])));

function row(left: AffineForm, relation: Relation, right: AffineForm): ConstraintRow {
  return {
    cell: at(9, 3),
    label: 'Kiln',
    set: 0,
    line: 0,
    relation,
    left,
    right,
    leftCell: at(9, 2),
    rightCell: at(9, 4),
  };
}

/** Two decisions, at least 0; objective 3 a + 2 b + 7. */
function modelOf(rows: ConstraintRow[], rest: Partial<SheetModel> = {}): SheetModel {
  const range = { sheet: 'Plan', top: 4, left: 2, bottom: 5, right: 2 };
  return {
    planName: 'Week',
    prefix: 'Week',
    separator: '.',
    scope: null,
    sense: 'maximise',
    decisions: [0, 1].map((k) => ({
      cell: at(4 + k, 2),
      label: `Tile ${k}`,
      block: 0,
      before: null,
      lower: 0,
      upper: 100,
    })),
    decisionBlocks: [{ number: 1, range, ranges: [range], first: 0, end: 2 }],
    objective: form(7, 3, 2),
    objectiveCell: at(20, 2),
    constraintSets: [{ number: 1, name: 'Week.Constraint', form: 'formula', isLying: false, range, rows }],
    definingRows: [],
    ...rest,
  };
}

function solve(rows: ConstraintRow[], values: number[]) {
  return planSolutionOf(modelOf(rows), {
    values,
    reducedCosts: [0, -0],
    dualValues: rows.map((_, k) => k + 0.5),
  });
}

describe('slack', () => {
  it.each([
    ['<=', 10, 12, 2],
    ['>=', 12, 10, 2],
    ['=', 10, 10, 0],
  ] as const)(
    'of left %s right is never negative: %d against %d leaves %d',
    (relation, left, right, slack) => {
      const { constraints } = solve([row(form(left), relation, form(right))], [0, 0]);
      expect(constraints[0].slack).toBe(slack);
      expect(constraints[0].isBinding).toBe(slack === 0);
    },
  );

  it('is 0 where only rounding is left, on either side', () => {
    // 0.1 + 0.2 is 0.30000000000000004 in doubles.
    const { constraints } = solve(
      [row(form(0.1, 0.2), '<=', form(0.3)), row(form(0.1, 0.2), '>=', form(0.3))],
      [1, 0],
    );
    expect(constraints.map(({ slack }) => slack)).toEqual([0, 0]);
  });

  it('shows a violation that is more than a solver may leave', () => {
    const { constraints } = solve([row(form(10.5), '<=', form(10))], [0, 0]);
    expect(constraints[0].slack).toBe(-0.5);
  });

  it('counts decisions on the right side at the plan', () => {
    const { constraints } = solve([row(form(0, 1), '<=', form(3, 0, 2))], [5, 4]);
    expect(constraints[0]).toMatchObject({ leftSide: 5, rightSide: 11, slack: 6, dualValue: 0.5 });
  });
});

describe('decision values', () => {
  it('are drawn onto a bound within rounding, and never stand outside', () => {
    expect(snapToBounds(1e-12, 0, 5)).toBe(0);
    expect(snapToBounds(-3e-8, 0, 5)).toBe(0);
    expect(snapToBounds(5 + 1e-8, 0, 5)).toBe(5);
    expect(snapToBounds(4.9999999999, 0, 5)).toBe(5);
    expect(snapToBounds(1234567.0000001, 0, 1234567)).toBe(1234567);
  });

  it('keep their full precision away from bounds', () => {
    expect(snapToBounds(10 / 3, 0, 5)).toBe(10 / 3);
    expect(snapToBounds(1e-6, 0, 5)).toBe(1e-6);
    expect(snapToBounds(-7.25, -Infinity, Infinity)).toBe(-7.25);
  });

  it('never read minus zero', () => {
    expect(Object.is(snapToBounds(-0, -Infinity, Infinity), 0)).toBe(true);
    expect(Object.is(solve([], [-0, 1]).decisions[1].reducedCost, 0)).toBe(true);
  });
});

it('The objective counts its constant and the values as they will stand in the cells', () => {
  expect(solve([], [2, 1e-13]).objective).toBe(13);
});

it('Sums are compensated: great terms that cancel leave the small one', () => {
  expect(evaluateForm(form(1e16, 1, 1), [1, -1e16]).value).toBe(1);
  expect(evaluateForm(form(-4, 1, 1), [1, 3]).largestTerm).toBe(4);
});

it('Cells with a defining row are worked out from those before them', () => {
  // stock 1 = 5 + a; stock 2 = stock 1 + b − 4
  const model = modelOf([], {
    definingRows: [
      { variable: 2, cell: at(30, 1), form: form(5, 1) },
      { variable: 3, cell: at(31, 1), form: form(-4, 0, 1, 1) },
    ],
  });
  expect([...variableValuesAt(model, [10, 3])]).toEqual([10, 3, 15, 14]);
});
