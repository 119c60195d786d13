import { InvalidProblemError } from '../../../solver-core/control/solver-errors';
import { LinearProgramBuilder } from '../../../solver-core/linear-program/linear-program-builder';
import { nonzeroCount } from '../../../solver-core/sparse/sparse-matrix';

describe('LinearProgramBuilder', () => {
  it('SC-3 freezes columns, rows and entries into compressed columns with ascending rows', () => {
    const builder = new LinearProgramBuilder({ name: 'week', sense: 'maximise' });
    const tiles = builder.addColumn({ name: 'tiles', cost: 3 });
    const bowls = builder.addColumn({ name: 'bowls', cost: 5, lower: 1, upper: 9, isInteger: true });
    const kiln = builder.addRow({ name: 'kiln', lower: -Infinity, upper: 40 });
    const press = builder.addRow({ name: 'press', lower: 2, upper: 2 });
    builder.addEntry(press, tiles, 7);
    builder.addEntry(press, bowls, 8);
    builder.addEntry(kiln, tiles, 6);
    builder.objectiveConstant = 11;
    builder.objectiveName = 'profit';
    expect(builder.build()).toEqual({
      name: 'week',
      sense: 'maximise',
      rowCount: 2,
      columnCount: 2,
      matrix: {
        rowCount: 2,
        columnCount: 2,
        columnStart: Int32Array.of(0, 2, 3),
        rowIndex: Int32Array.of(0, 1, 1),
        value: Float64Array.of(6, 7, 8),
      },
      cost: Float64Array.of(3, 5),
      objectiveConstant: 11,
      rowLower: Float64Array.of(-Infinity, 2),
      rowUpper: Float64Array.of(40, 2),
      columnLower: Float64Array.of(0, 1),
      columnUpper: Float64Array.of(Infinity, 9),
      isInteger: Uint8Array.of(0, 1),
      rowNames: ['kiln', 'press'],
      columnNames: ['tiles', 'bowls'],
      objectiveName: 'profit',
    });
  });

  it('sums entries at one place and drops a sum of exactly 0', () => {
    const builder = new LinearProgramBuilder({ sense: 'minimise' });
    builder.addColumn();
    builder.addColumn();
    builder.addRow({ lower: 0, upper: 1 });
    builder.addEntry(0, 0, 2);
    builder.addEntry(0, 1, 4);
    builder.addEntry(0, 0, 3);
    builder.addEntry(0, 1, -4);
    const { matrix } = builder.build();
    expect(nonzeroCount(matrix)).toBe(1);
    expect(Array.from(matrix.value)).toEqual([5]);
  });

  it('gives unnamed rows and columns names that nobody else has', () => {
    const builder = new LinearProgramBuilder({ sense: 'minimise' });
    builder.addColumn();
    builder.addColumn({ name: 'column1' });
    builder.addRow({ lower: 0, upper: 1 });
    const problem = builder.build();
    expect(problem.columnNames).toEqual(['column1_', 'column1']);
    expect(problem.rowNames).toEqual(['row1']);
  });

  it('does not change what it gave out when it goes on', () => {
    const builder = new LinearProgramBuilder({ sense: 'minimise' });
    builder.addColumn({ name: 'a' });
    const first = builder.build();
    builder.addColumn({ name: 'b' });
    expect(first.columnNames).toEqual(['a']);
    expect(builder.build().columnNames).toEqual(['a', 'b']);
  });

  it('refuses two rows of one name', () => {
    const builder = new LinearProgramBuilder({ sense: 'minimise' });
    builder.addRow({ name: 'kiln', lower: 0, upper: 1 });
    builder.addRow({ name: 'kiln', lower: 0, upper: 1 });
    expect(() => builder.build()).toThrow(
      new InvalidProblemError('duplicate-name', 'Two rows are named "kiln".'),
    );
  });
});
