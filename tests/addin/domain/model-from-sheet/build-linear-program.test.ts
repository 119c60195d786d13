import { buildLinearProgram } from '../../../../addin/domain/model-from-sheet/build-linear-program';
import type { SheetModel } from '../../../../addin/domain/model-from-sheet/sheet-model';
import { AffineForm } from '../../../../addin/domain/linearization/affine-form';
import type { LinearProgram } from '#solver-core';
import { solve } from '#solver-core';
import { tileModel, type Cells } from './tile-works';

/** Row i as a list over all columns. */
function denseRow({ matrix, columnCount }: LinearProgram, row: number): number[] {
  return Array.from({ length: columnCount }, (_, column) => {
    for (let k = matrix.columnStart[column]; k < matrix.columnStart[column + 1]; k++) {
      if (matrix.rowIndex[k] === row) {
        return matrix.value[k];
      }
    }
    return 0;
  });
}

describe('a linear program of a sheet', () => {
  it('AD-60 has the decisions as columns and left − right as rows, constants on the right', () => {
    const cells = {
      J1: [
        ['=2*B2+B3+3', '<=', '=B3+10'],
        ['=B4', '>=', '=5-B2'],
        ['=B3', { value: '=' }, 4],
      ],
      B11: '=SUMPRODUCT(B2:B4,C2:C4)-100',
    } as Cells;
    const { problem, decisionColumns, constraintRows } = buildLinearProgram(
      tileModel({ cells, names: { 'Week.Constraint': 'Plan!$J$1:$L$3' } }),
    );
    expect(problem.sense).toBe('maximise');
    expect([...problem.cost]).toEqual([6.5, 8, 12]);
    expect(problem.objectiveConstant).toBe(-100);
    expect([...problem.columnLower]).toEqual([0, 0, 5]);
    expect([...problem.columnUpper]).toEqual([100, Infinity, 40]);
    expect(problem.columnNames).toEqual(['Floor matt', 'Wall gloss', 'Border']);
    expect(constraintRows).toEqual([[0, 1, 2]]);
    expect(decisionColumns).toEqual([0, 1, 2]);
    // 2x + y + 3 <= y + 10, z >= 5 − x, y = 4
    expect(constraintRows[0].map((row) => denseRow(problem, row))).toEqual([
      [2, 0, 0],
      [1, 0, 1],
      [0, 1, 0],
    ]);
    expect([...problem.rowLower]).toEqual([-Infinity, 5, 4]);
    expect([...problem.rowUpper]).toEqual([7, Infinity, 4]);
  });

  it('AD-60 is the plan: its optimum is the one worked out by hand', () => {
    // Margin a kiln hour: 6.5, 4, 8; a press hour is never short. So: Border to its bound 40 (60 kiln hours), the
    // other 60 hours to Floor matt: 60 · 6.5 + 40 · 12 = 870; press hours 30 + 40 = 70 of 80. One more kiln hour: 6.5.
    const { problem, constraintRows } = buildLinearProgram(tileModel());
    const result = solve(problem, {});
    if (result.status !== 'optimal') {
      throw new Error(result.status);
    }
    expect(result.objective).toBeCloseTo(870, 9);
    expect([...result.x].map((value) => Math.round(value * 1e9) / 1e9)).toEqual([60, 0, 40]);
    expect(result.rowDuals[constraintRows[0][1]]).toBeCloseTo(6.5, 9);
  });

  it('AD-61 keeps a row without decisions that always holds, as a row that binds nothing', () => {
    const { problem, constraintRows } = buildLinearProgram(
      tileModel({ cells: { B8: '=B2-B2+119.9999999' } }),
    );
    const [, kilnRow] = constraintRows[0];
    expect(denseRow(problem, kilnRow)).toEqual([0, 0, 0]);
    expect([problem.rowLower[kilnRow], problem.rowUpper[kilnRow]]).toEqual([-Infinity, Infinity]);
    expect(problem.rowCount).toBe(3);
  });

  it('AD-31 takes a right side of 1e30 and more for none', () => {
    const { problem } = buildLinearProgram(tileModel({ cells: { D7: 1e30, D9: -9e307 } }));
    expect(problem.rowUpper[0]).toBe(Infinity);
    expect(problem.rowLower[2]).toBe(-Infinity);
  });

  it('AD-54 turns cells with defining rows into free columns and equations', () => {
    // Variable 3 is a cell that holds x0 + 2·x1 + 5; the first row and the objective build on it.
    const plain = tileModel();
    const shared = AffineForm.variable(3);
    const [set] = plain.constraintSets;
    const model: SheetModel = {
      ...plain,
      objective: AffineForm.fromTerms(
        1,
        new Map([
          [2, 12],
          [3, 4],
        ]),
      ),
      constraintSets: [{ ...set, rows: [{ ...set.rows[0], left: shared }] }],
      definingRows: [
        {
          variable: 3,
          cell: { sheet: 'Plan', row: 30, column: 1 },
          form: AffineForm.fromTerms(
            5,
            new Map([
              [0, 1],
              [1, 2],
            ]),
          ),
        },
      ],
    };
    const { problem, definingRows, definingColumns, constraintRows } = buildLinearProgram(model);
    expect([definingRows, definingColumns, constraintRows]).toEqual([[1], [3], [[0]]]);
    expect(problem.columnNames[3]).toBe('Plan!B31');
    expect([...problem.cost]).toEqual([0, 0, 12, 4]);
    expect([problem.columnLower[3], problem.columnUpper[3]]).toEqual([-Infinity, Infinity]);
    expect(denseRow(problem, 0)).toEqual([0, 0, 0, 1]);
    expect(denseRow(problem, 1)).toEqual([1, 2, 0, -1]);
    expect([problem.rowLower[1], problem.rowUpper[1]]).toEqual([-5, -5]);
  });
});
