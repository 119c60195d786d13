import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { recalculate, type Recalculation } from '../../../../addin/domain/calculation/recalculate';
import { formatCellAddress } from '../../../../addin/domain/sheet/cell-address';
import { CellError } from '../../../../addin/domain/sheet/cell-value';

const now = 46_358.25;

function recalculated(
  description: WorkbookDescription,
  changes: Readonly<Record<string, number>>,
): { readonly values: Record<string, unknown>; readonly not: Record<string, string> } {
  const result: Recalculation = recalculate(
    MemoryWorkbook.of(description).snapshot(),
    new Map(Object.entries(changes)),
    now,
  );
  return {
    values: Object.fromEntries(result.values.map(({ cell, value }) => [formatCellAddress(cell), value])),
    not: Object.fromEntries(
      result.notRecalculated.map(({ cell, reason }) => [formatCellAddress(cell), reason]),
    ),
  };
}

it('formulas that depend on a change get new values, through any number of cells and sheets; others are left', () => {
  const { values, not } = recalculated(
    {
      sheets: {
        Plan: { A1: 1, A2: 2, B1: '=A1*10', B2: '=B1+A2', B3: { formula: 'A2+1', value: 3 } },
        "Costs '26": { A1: '=Plan!B2*2', B1: '=MAX(A1,50)' },
      },
    },
    { 'Plan!A1': 5 },
  );
  expect(values).toEqual({ 'Plan!B1': 50, 'Plan!B2': 52, "'Costs ''26'!A1": 104, "'Costs ''26'!B1": 104 });
  expect(not).toEqual({});
});

it('names, tables, references worked out and formulas that are not affine are recalculated', () => {
  const { values } = recalculated(
    {
      sheets: {
        Plan: {
          A1: [['Made'], [1], [2], [3]],
          C1: '=SUM(Tiles[Made])',
          C2: '=SUM(Made)',
          C3: '=SUM(OFFSET(A1,1,0,2,1))',
          C4: '=A2*A3*A4',
          C5: '=IF(A2>5,"much","little")',
          C6: '=COUNTIF(A2:A4,">2")',
          C7: '=TEXT(A2,"0.0")&" m²"',
          C8: '=1/(A2-10)',
        },
      },
      names: { Made: 'Plan!$A$2:$A$4' },
      tables: [{ name: 'Tiles', sheet: 'Plan', ref: 'A1:A4' }],
    },
    { 'Plan!A2': 10 },
  );
  expect(values).toEqual({
    'Plan!C1': 15,
    'Plan!C2': 15,
    'Plan!C3': 12,
    'Plan!C4': 60,
    'Plan!C5': 'much',
    'Plan!C6': 2,
    'Plan!C7': '10.0 m²',
    'Plan!C8': CellError.of('#DIV/0!'),
  });
});

it('an array formula gives all its cells their values, and what builds on them follows', () => {
  const { values } = recalculated(
    {
      sheets: {
        Plan: {
          A1: 1,
          A2: 2,
          B1: { formula: 'A1:A2*10', value: 10, fills: 'B1:B3' },
          B2: 20,
          B3: CellError.of('#N/A'),
          C1: '=B2+1',
        },
      },
    },
    { 'Plan!A2': 7 },
  );
  expect(values).toEqual({
    'Plan!B1': 10,
    'Plan!B2': 70,
    'Plan!B3': CellError.of('#N/A'),
    'Plan!C1': 71,
  });
});

it('cells that do not depend on the change count with their stored values', () => {
  const { values } = recalculated(
    { sheets: { Plan: { A1: 1, B1: { formula: 'NOSUCH(9)', value: 7 }, C1: '=A1+B1' } } },
    { 'Plan!A1': 2 },
  );
  expect(values).toEqual({ 'Plan!C1': 9 });
});

it('what cannot be worked out is named with its reason, and so is all that builds on it', () => {
  const { values, not } = recalculated(
    {
      sheets: {
        Plan: {
          A1: 1,
          B1: '=NOSUCH(A1)',
          B2: '=B1+1',
          B3: '=A1+B4',
          B4: '=B3',
          B5: '=A1+[1]Costs!$A$1',
          B6: '=A1*',
          B7: '=A1*2',
          B8: '=IFERROR(B1,0)',
        },
      },
    },
    { 'Plan!A1': 2 },
  );
  expect(values).toEqual({ 'Plan!B7': 4 });
  expect(not).toEqual({
    'Plan!B1': 'unknown-function',
    'Plan!B2': 'builds-on-such-a-cell',
    'Plan!B3': 'circular-reference',
    'Plan!B4': 'circular-reference',
    'Plan!B5': 'external-reference',
    'Plan!B6': 'formula-syntax',
    'Plan!B8': 'builds-on-such-a-cell',
  });
});

it('a changed cell that held a formula counts with the given number', () => {
  const { values } = recalculated({ sheets: { Plan: { A1: '=1+1', B1: '=A1*3' } } }, { 'Plan!A1': 5 });
  expect(values).toEqual({ 'Plan!B1': 15 });
});

it('a change to a blank cell, or beyond what the sheet uses, counts', () => {
  const { values } = recalculated(
    { sheets: { Plan: { B1: '=SUM(D1:D9)+Z99' } } },
    { 'Plan!D5': 2, 'Plan!Z99': 3 },
  );
  expect(values).toEqual({ 'Plan!B1': 5 });
});

it('a change on a sheet that is not there changes nothing; a text that is no cell is a mistake of the caller', () => {
  expect(recalculated({ sheets: { Plan: { B1: '=A1' } } }, { 'Gone!A1': 2 }).values).toEqual({});
  expect(() => recalculated({ sheets: { Plan: {} } }, { A1: 2 })).toThrow(RangeError);
});

it('TODAY and NOW take the clock given, in every cell that the change reaches', () => {
  const { values } = recalculated(
    { sheets: { Plan: { A1: 1, B1: { formula: 'TODAY()', value: 1 }, C1: '=A1+B1' } } },
    { 'Plan!A1': 2 },
  );
  expect(values).toEqual({ 'Plan!C1': 46_360 });
});

it('100,000 chained formulas are recalculated', () => {
  const count = 100_000;
  const cells: Record<string, string | number> = { A1: 1, B1: '=A1' };
  for (let row = 2; row <= count; row++) {
    cells[`B${row}`] = `=B${row - 1}+1`;
  }
  const { values } = recalculated({ sheets: { Plan: cells } }, { 'Plan!A1': 5 });
  expect(values[`Plan!B${count}`]).toBe(count + 4);
});
