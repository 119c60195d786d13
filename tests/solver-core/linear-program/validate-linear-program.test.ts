import { InvalidProblemError, type InvalidProblemCode } from '../../../solver-core/control/solver-errors';
import type { LinearProgram } from '../../../solver-core/linear-program/linear-program';
import { validateLinearProgram } from '../../../solver-core/linear-program/validate-linear-program';
import { lp } from '../../support/lp-notation';

const sound = lp(`
  maximise tiles + bowls
  kiln: tiles + 2 bowls <= 40
  press: 3 tiles + bowls <= 30`);

function withArray(field: keyof LinearProgram, index: number, value: number): LinearProgram {
  const changed = Float64Array.from(sound[field] as Float64Array);
  changed[index] = value;
  return { ...sound, [field]: changed };
}

function withMatrix(change: Partial<LinearProgram['matrix']>): LinearProgram {
  return { ...sound, matrix: { ...sound.matrix, ...change } };
}

describe('SC-12 validateLinearProgram', () => {
  it('lets a sound problem pass', () => {
    expect(() => validateLinearProgram(sound)).not.toThrow();
  });

  const faults: readonly [what: string, problem: LinearProgram, code: InvalidProblemCode, names: string][] = [
    ['a cost that is not a number', withArray('cost', 1, NaN), 'not-a-number', 'bowls'],
    ['an infinite cost', withArray('cost', 0, -Infinity), 'infinite-cost', 'tiles'],
    ['a bound that is not a number', withArray('rowUpper', 1, NaN), 'not-a-number', 'press'],
    ['a lower bound of Infinity', withArray('columnLower', 0, Infinity), 'impossible-bound', 'tiles'],
    ['an upper bound of −Infinity', withArray('rowUpper', 0, -Infinity), 'impossible-bound', 'kiln'],
    ['a lower bound above the upper', withArray('columnUpper', 1, -1), 'crossing-bounds', 'bowls'],
    ['a constant that is not finite', { ...sound, objectiveConstant: NaN }, 'not-a-number', 'constant'],
    [
      'a coefficient that is not a number',
      withMatrix({ value: Float64Array.of(1, NaN, 2, 1) }),
      'not-a-number',
      'press',
    ],
    [
      'an infinite coefficient',
      withMatrix({ value: Float64Array.of(1, 3, Infinity, 1) }),
      'infinite-coefficient',
      'bowls',
    ],
    ['a stored zero', withMatrix({ value: Float64Array.of(1, 3, 0, 1) }), 'malformed-matrix', 'bowls'],
    ['rows out of order', withMatrix({ rowIndex: Int32Array.of(1, 0, 0, 1) }), 'malformed-matrix', 'tiles'],
    [
      'a row outside the matrix',
      withMatrix({ rowIndex: Int32Array.of(0, 1, 0, 2) }),
      'malformed-matrix',
      'bowls',
    ],
    ['entries that are missing', withMatrix({ value: Float64Array.of(1, 3) }), 'malformed-matrix', 'matrix'],
    ['an array of the wrong length', { ...sound, rowLower: Float64Array.of(0) }, 'wrong-length', 'rowLower'],
    ['too few names', { ...sound, columnNames: ['tiles'] }, 'wrong-length', 'columnNames'],
  ];
  it.each(faults)('refuses %s, by name', (_, problem, code, names) => {
    let refusal: unknown;
    try {
      validateLinearProgram(problem);
    } catch (fault) {
      refusal = fault;
    }
    expect(refusal).toBeInstanceOf(InvalidProblemError);
    expect((refusal as InvalidProblemError).code).toBe(code);
    expect((refusal as InvalidProblemError).message).toContain(names);
  });
});
