import { lp } from './lp-notation';

describe('the LP notation of the tests', () => {
  it('reads objective, rows, ranges, bounds, free and whole columns', () => {
    const problem = lp(`
      maximise 30 plates - 2.5 bowls + 7
      press:  2 plates + bowls <= 40
      kiln:   10 <= plates + 3 bowls - stock <= 60
      even:   plates - bowls = 1
      plates <= 12
      -5 <= bowls <= 5
      stock free
      whole plates, bowls`);
    expect(problem.sense).toBe('maximise');
    expect(problem.objectiveConstant).toBe(7);
    expect(problem.columnNames).toEqual(['plates', 'bowls', 'stock']);
    expect(Array.from(problem.cost)).toEqual([30, -2.5, 0]);
    expect(problem.rowNames).toEqual(['press', 'kiln', 'even']);
    expect(Array.from(problem.rowLower)).toEqual([-Infinity, 10, 1]);
    expect(Array.from(problem.rowUpper)).toEqual([40, 60, 1]);
    expect(Array.from(problem.columnLower)).toEqual([0, -5, -Infinity]);
    expect(Array.from(problem.columnUpper)).toEqual([12, 5, Infinity]);
    expect(Array.from(problem.isInteger)).toEqual([1, 1, 0]);
    expect(Array.from(problem.matrix.value)).toEqual([2, 1, 1, 1, 3, -1, -1]);
  });

  it('sums terms of one column and moves constants of a row to its right side', () => {
    const problem = lp('minimise a + 2 a\nkiln: a + b + 3 - a >= 5');
    expect(Array.from(problem.cost)).toEqual([3, 0]);
    expect(Array.from(problem.rowLower)).toEqual([2]);
    expect(Array.from(problem.matrix.value)).toEqual([1]);
  });

  it('refuses what it does not know', () => {
    for (const text of [
      'a <= 3',
      'minimise a\nkiln: a < 3',
      'minimise a\n2 a <= 3',
      'minimise a\nkiln: a * b <= 3',
    ]) {
      expect(() => lp(text)).toThrow();
    }
  });
});
