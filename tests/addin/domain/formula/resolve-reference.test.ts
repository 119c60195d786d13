import { MemoryWorkbook } from '../../../../addin/adapters/memory/memory-workbook';
import {
  forEachRangeReferredTo,
  referencesOfFormula,
} from '../../../../addin/domain/formula/formula-references';
import { resolveName, resolveReferenceText } from '../../../../addin/domain/formula/resolve-reference';
import { formatCellRange } from '../../../../addin/domain/sheet/cell-range';

const names = {
  Plain: 'Plan!$B$2:$B$9',
  Relative: 'Plan!B2:B9',
  Turned: 'Plan!$B$9:$A$2',
  Union: 'Plan!$A$1:$A$2,Plan!$C$1:$C$2',
  TwoSheets: 'Plan!$A$1,Costs!$A$1',
  Crossing: 'Plan!$A$1:$C$3 Plan!$B$2:$D$9',
  Apart: 'Plan!$A$1 Plan!$B$2',
  Column: 'Plan!$B:$B',
  Row: 'Plan!$2:$2',
  Table: 'Clays[Price]',
  TableColumns: 'Clays[[Tile]:[Price]]',
  TableAll: 'Clays[#All]',
  TableTotals: 'Clays[[#Totals],[Price]]',
  BareTable: 'Clays',
  GoneColumn: 'Clays[Weight]',
  Number: '0.25',
  Negative: '-3',
  Percent: '50%',
  Text: '"maximise"',
  Truth: 'TRUE',
  ByName: 'Plain',
  Circle: 'Circle2',
  Circle2: 'Circle',
  Dead: 'Plan!#REF!',
  HalfDead: 'Plan!$A$1,Plan!#REF!',
  External: '[1]Costs!$A$1',
  NoSheet: 'Gone!$A$1',
  NoName: 'Nowhere',
  Offset: 'OFFSET(Plan!$A$1,0,0,3,1)',
  Index: 'Plan!$A$1:INDEX(Plan!$A:$A,3)',
  Indirect: 'INDIRECT("Plan!A1")',
  Sum: 'SUM(Plan!$A$1:$A$3)',
  Array: '{1,2,3}',
  Months: 'Jan:Mar!$A$1',
  Broken: '1+',
  Joined: 'Plan!$A$1:Plan!$B$3',
  Spill: 'Plan!$H$1#',
  NoSpill: 'Plan!$A$1#',
};

const workbook = MemoryWorkbook.of({
  sheets: {
    Plan: { A1: 1, B9: 2, D4: 3, H1: { formula: 'SEQUENCE(3)', value: 1, fills: 'H1:H3' } },
    Costs: {
      A1: [
        ['Tile', 'Price'],
        ['Sea', 9],
        ['Moss', 11],
        ['Sum', 20],
      ],
      F1: '=SUM(Plan!A1:B2)*Plain',
    },
  },
  names,
  localNames: { Plan: { Mine: '$C$1:$C$4', Plain: 'Plan!$Z$1' } },
  tables: [{ name: 'Clays', sheet: 'Costs', ref: 'A1:B4', totalsRowCount: 1 }],
}).snapshot();

function resolved(name: string, scope: string | null = null): string {
  const found = workbook.names.find((each) => each.name === name && each.scope === scope)!;
  const resolution = resolveName(workbook, found);
  switch (resolution.kind) {
    case 'ranges':
      return resolution.ranges.map(formatCellRange).join(' & ');
    case 'constant':
      return `constant ${String(resolution.value)}`;
    case 'unknown':
      return `unknown ${resolution.what}`;
    case 'computed':
      return `computed ${resolution.functionName}`;
    default:
      return resolution.kind;
  }
}

it.each([
  ['Plain', 'Plan!B2:B9'],
  ['Relative', 'Plan!B2:B9'],
  ['Turned', 'Plan!A2:B9'],
  ['Union', 'Plan!A1:A2 & Plan!C1:C2'],
  ['TwoSheets', 'not-a-range'],
  ['Crossing', 'Plan!B2:C3'],
  ['Apart', 'not-a-range'],
  ['Column', 'Plan!B1:B9'],
  ['Row', 'Plan!A2:H2'],
  ['Table', 'Costs!B2:B3'],
  ['TableColumns', 'Costs!A2:B3'],
  ['TableAll', 'Costs!A1:B4'],
  ['TableTotals', 'Costs!B4'],
  ['BareTable', 'Costs!A2:B3'],
  ['GoneColumn', 'unknown Clays[Weight]'],
  ['Number', 'constant 0.25'],
  ['Negative', 'constant -3'],
  ['Percent', 'constant 0.5'],
  ['Text', 'constant maximise'],
  ['Truth', 'constant true'],
  ['ByName', 'Plan!B2:B9'],
  ['Circle', 'not-a-range'],
  ['Dead', 'dead'],
  ['HalfDead', 'dead'],
  ['External', 'external'],
  ['NoSheet', 'unknown Gone'],
  ['NoName', 'unknown Nowhere'],
  ['Offset', 'computed OFFSET'],
  ['Index', 'computed INDEX'],
  ['Indirect', 'computed INDIRECT'],
  ['Sum', 'not-a-range'],
  ['Array', 'not-a-range'],
  ['Months', 'not-a-range'],
  ['Broken', 'not-a-range'],
  ['Joined', 'Plan!A1:B3'],
  ['Spill', 'Plan!H1:H3'],
  ['NoSpill', 'dead'],
])('the name %s refers to %s', (name, expected) => {
  expect(resolved(name)).toBe(expected);
});

it('a name of one sheet takes references without a sheet as its own', () => {
  expect(resolved('Mine', 'Plan')).toBe('Plan!C1:C4');
  expect(resolved('Plain', 'Plan')).toBe('Plan!Z1');
});

it('typed references are resolved from the sheet they are typed on', () => {
  expect(resolveReferenceText(workbook, '=B2:B3', 'costs')).toEqual({
    kind: 'ranges',
    ranges: [{ sheet: 'Costs', top: 1, left: 1, bottom: 2, right: 1 }],
  });
  expect(resolveReferenceText(workbook, 'B2', null).kind).toBe('not-a-range');
  expect(resolveReferenceText(workbook, 'Plain', 'Plan')).toMatchObject({ ranges: [{ left: 25 }] });
});

it('names that each mention another twice are given up', () => {
  const doubling = Object.fromEntries(
    Array.from({ length: 60 }, (_name, at) => [
      `Step${at}x`,
      at === 0 ? 'Plan!$A$1' : `Step${at - 1}x,Step${at - 1}x`,
    ]),
  );
  const bomb = MemoryWorkbook.of({
    sheets: { Plan: { A1: 1 } },
    names: doubling,
  }).snapshot();

  expect(resolveName(bomb, bomb.names[59]).kind).toBe('not-a-range');
  expect(referencesOfFormula(bomb, 'Step59x', { sheet: 'Plan', row: 0, column: 1 }).ranges).toHaveLength(1);
});

describe('references of formulas', () => {
  const home = { sheet: 'Costs', row: 1, column: 3 };

  it('include those behind names and tables, once per mention', () => {
    const { ranges, hasComputedRanges } = referencesOfFormula(
      workbook,
      'SUM(A1:B2,Plain)+Clays[@Price]+LET(x,C1,x)',
      home,
    );
    expect(ranges.map(formatCellRange)).toEqual(['Costs!A1:B2', 'Plan!B2:B9', 'Costs!B2', 'Costs!C1']);
    expect(hasComputedRanges).toBe(false);
  });

  it('say where a part is known only by calculation', () => {
    for (const text of [
      'SUM(OFFSET(A1,1,0))',
      'SUM(A1:INDEX(B:B,2))',
      'INDIRECT("A1")',
      'SUM(A1#)',
      'Offset',
    ]) {
      expect(referencesOfFormula(workbook, text, home).hasComputedRanges).toBe(true);
    }
  });

  it('of the whole workbook are those of its formulas and names', () => {
    const seen = new Set<string>();
    forEachRangeReferredTo(workbook, (range) => seen.add(formatCellRange(range)));
    expect(seen).toContain('Plan!A1:B2');
    expect(seen).toContain('Plan!C1:C4');
    expect(seen).toContain('Costs!B4');
  });
});
