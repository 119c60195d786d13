import { MemoryWorkbook, type CellContent } from '../../../../addin/adapters/memory/memory-workbook';
import type { AffineForm } from '../../../../addin/domain/linearization/affine-form';
import { linearize, type Linearization } from '../../../../addin/domain/linearization/linearize';
import type { CellAddress } from '../../../../addin/domain/sheet/cell-address';

function column(letterColumn: number, count: number): CellAddress[] {
  return Array.from({ length: count }, (_cell, row) => ({ sheet: 'Plan', row, column: letterColumn }));
}

function read(
  cells: Readonly<Record<string, CellContent>>,
  decisions: readonly CellAddress[],
  targets: readonly CellAddress[],
): Linearization {
  const workbook = MemoryWorkbook.of({ sheets: { Plan: cells } }).snapshot();
  return linearize({ workbook, decisions, targets, now: 46_358 });
}

function formsOf({ readings }: Linearization): AffineForm[] {
  return readings.map((reading) => {
    if (reading.kind !== 'affine') {
      throw new Error(JSON.stringify(reading));
    }
    return reading.form;
  });
}

/** A form in decisions alone: constant, then a coefficient a decision. */
function writtenOut(form: AffineForm, { definingRows }: Linearization, decisionCount: number): number[] {
  const rows = new Map(definingRows.map((row) => [row.variable, row.form]));
  const dense = new Array<number>(decisionCount + 1).fill(0);
  const add = (part: AffineForm, factor: number): void => {
    dense[0] += factor * part.constant;
    part.variables.forEach((variable, at) => {
      const coefficient = factor * part.coefficients[at];
      if (variable < decisionCount) {
        dense[variable + 1] += coefficient;
      } else {
        add(rows.get(variable)!, coefficient);
      }
    });
  };
  add(form, 1);
  return dense;
}

function termCount(linearization: Linearization): number {
  const rows = linearization.definingRows.map((row) => row.form);
  return [...formsOf(linearization), ...rows].reduce((count, form) => count + form.variables.length, 0);
}

/** Tiles in stock at the end of each week: last week's + made − sold, from 100 at the start. Made in A, sold in B. */
function stockPlan(weeks: number): Record<string, CellContent> {
  const cells: Record<string, CellContent> = {};
  for (let week = 1; week <= weeks; week++) {
    cells[`A${week}`] = 0;
    cells[`B${week}`] = 10;
    cells[`C${week}`] = week === 1 ? '=100+A1-B1' : `=C${week - 1}+A${week}-B${week}`;
  }
  return cells;
}

describe('a chain of stocks', () => {
  it('of a few weeks is written out in decisions', () => {
    const linearization = read(stockPlan(8), column(0, 8), column(2, 8));
    expect(linearization.definingRows).toEqual([]);
    expect(formsOf(linearization)[7]).toMatchObject({
      constant: 20,
      variables: [0, 1, 2, 3, 4, 5, 6, 7],
      coefficients: [1, 1, 1, 1, 1, 1, 1, 1],
    });
  });

  it('of 60 weeks means what it says once its rows are put in', () => {
    const weeks = 60;
    const linearization = read(stockPlan(weeks), column(0, weeks), column(2, weeks));
    expect(linearization.definingRows.length).toBeGreaterThan(0);
    formsOf(linearization).forEach((form, week) => {
      const expected = [
        100 - 10 * (week + 1),
        ...column(0, weeks).map((_cell, made) => (made <= week ? 1 : 0)),
      ];
      expect(writtenOut(form, linearization, weeks)).toEqual(expected);
    });
  });

  it('of 5,000 weeks stays linear in size', () => {
    const weeks = 5000;
    const linearization = read(stockPlan(weeks), column(0, weeks), column(2, weeks));
    expect(termCount(linearization)).toBeLessThan(10 * weeks);
  });

  it('variables are numbered on from the decisions, and rows use only what stands before them', () => {
    const { definingRows } = read(stockPlan(100), column(0, 100), column(2, 100));
    definingRows.forEach((row, at) => {
      expect(row.variable).toBe(100 + at);
      expect(row.form.variables.every((variable) => variable < row.variable)).toBe(true);
    });
  });
});

describe('long forms', () => {
  const twenty = Array.from({ length: 20 }, (_value, at) => at + 1);
  const cells: Record<string, CellContent> = {
    A1: twenty.map(() => [0]),
    B1: twenty.map((value) => [value]),
    D1: '=SUMPRODUCT(A1:A20,B1:B20)',
    D2: '=D1+1',
    D3: '=2*D1',
  };

  it('used in one place are written out there', () => {
    const linearization = read(cells, column(0, 20), [{ sheet: 'Plan', row: 1, column: 3 }]);
    expect(linearization.definingRows).toEqual([]);
    expect(formsOf(linearization)[0].coefficients).toEqual(twenty);
  });

  it('used in two places get one row', () => {
    const targets = [1, 2].map((row) => ({ sheet: 'Plan', row, column: 3 }));
    const linearization = read(cells, column(0, 20), targets);
    expect(linearization.definingRows).toMatchObject([
      { variable: 20, cell: { sheet: 'Plan', row: 0, column: 3 }, form: { coefficients: twenty } },
    ]);
    expect(formsOf(linearization)).toMatchObject([
      { constant: 1, variables: [20], coefficients: [1] },
      { constant: 0, variables: [20], coefficients: [2] },
    ]);
  });

  it('that nothing asked for uses get none', () => {
    const unused = { ...cells, E1: '=A1+0*A2', E2: '=D1+D2+D3' };
    const linearization = read(unused, column(0, 20), [{ sheet: 'Plan', row: 0, column: 4 }]);
    expect(linearization.definingRows).toEqual([]);
  });

  it('of array formulas are named cell by cell', () => {
    const arrays: Record<string, CellContent> = {
      ...cells,
      F1: { formula: 'MMULT(TRANSPOSE(A1:A20),HSTACK(B1:B20,2*B1:B20))', fills: 'F1:G1' },
      H1: '=G1+1',
      H2: '=G1+2',
    };
    const targets = [0, 1].map((row) => ({ sheet: 'Plan', row, column: 7 }));
    const { definingRows } = read(arrays, column(0, 20), targets);
    expect(definingRows).toMatchObject([{ cell: { row: 0, column: 6 }, form: { constant: 0 } }]);
  });
});

describe('depth and size', () => {
  it('a chain of 100,000 cells does not run out of stack, from its end or from the middle of nowhere', () => {
    const count = 100_000;
    const cells: Record<string, CellContent> = { A1: 1, B1: '=A1' };
    for (let row = 2; row <= count; row++) {
      cells[`B${row}`] = `=B${row - 1}*1`;
    }
    const linearization = read(cells, column(0, 1), [{ sheet: 'Plan', row: count - 1, column: 1 }]);
    expect(formsOf(linearization)[0]).toMatchObject({ constant: 0, variables: [0], coefficients: [1] });
  });

  it('a circle of 20,000 cells is found', () => {
    const count = 20_000;
    const cells: Record<string, CellContent> = { A1: 1, B1: `=A1+B${count}` };
    for (let row = 2; row <= count; row++) {
      cells[`B${row}`] = `=B${row - 1}`;
    }
    const { readings } = read(cells, column(0, 1), [{ sheet: 'Plan', row: 5, column: 1 }]);
    expect(readings[0]).toMatchObject({ issues: [{ code: 'circular-reference' }] });
  });

  it('running totals over one lengthening range stay linear in size', () => {
    const count = 3000;
    const cells: Record<string, CellContent> = {};
    for (let row = 1; row <= count; row++) {
      cells[`A${row}`] = 0;
      cells[`B${row}`] = `=SUM(A$1:A${row})`;
    }
    const linearization = read(cells, column(0, count), column(1, count));
    expect(termCount(linearization)).toBeLessThan(12 * count);
    expect(writtenOut(formsOf(linearization)[39], linearization, count).slice(0, 42)).toEqual([
      0,
      ...new Array<number>(40).fill(1),
      0,
    ]);
  });

  it('brackets nested without end are told as too deep', () => {
    const formula = `=${'('.repeat(20_000)}A1${')'.repeat(20_000)}`;
    const { readings } = read({ A1: 1, B1: formula }, column(0, 1), [{ sheet: 'Plan', row: 0, column: 1 }]);
    expect(readings[0]).toMatchObject({ issues: [{ code: 'too-deep' }] });
  });

  it('a sum of 2,700 terms typed out is read', () => {
    const terms = Array.from({ length: 2700 }, (_term, at) => `A${at + 1}`);
    const cells = { A1: terms.map(() => [0]), B1: `=${terms.join('+')}` };
    const linearization = read(cells, column(0, 2700), [{ sheet: 'Plan', row: 0, column: 1 }]);
    expect(formsOf(linearization)[0].variables).toHaveLength(2700);
  });
});
