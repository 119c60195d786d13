import { issueTexts, readTiles, rowsOf, tileModel, type Cells, type Changes } from './tile-works';

// Each form states the same three rows; what is expected is written out by hand.
const pressRow = [{ 'Floor matt': 0.5, 'Wall gloss': 0.25, Border: 1 }, '<=', { '1': 80 }];
const kilnRow = [{ 'Floor matt': 1, 'Wall gloss': 2, Border: 1.5 }, '<=', { '1': 120 }];
const orderRow = [{ Border: 1 }, '>=', { '1': 15 }];

function statedRows(changes: Changes) {
  return rowsOf(tileModel(changes)).map(([, left, relation, right]) => [left, relation, right]);
}

function setsOf(changes: Changes) {
  return tileModel(changes).constraintSets;
}

describe('formula form', () => {
  it('AD-20 may lie on its side', () => {
    const changes = {
      cells: {
        J1: [
          ['=SUMPRODUCT(B2:B4,F2:F4)', '=SUMPRODUCT(B2:B4,G2:G4)', '=B4'],
          ['<=', 'at most', '≥'],
          [80, 120, 15],
        ],
      } as Cells,
      names: { 'Week.Constraint': 'Plan!$J$1:$L$3' },
    };
    expect(statedRows(changes)).toEqual([pressRow, kilnRow, orderRow]);
    expect(setsOf(changes)).toMatchObject([{ form: 'formula', isLying: true }]);
    expect(setsOf(changes)[0].rows.map(({ cell, line }) => [cell.row, cell.column, line])).toEqual([
      [1, 9, 0],
      [1, 10, 1],
      [1, 11, 2],
    ]);
  });

  it('AD-20 may hold decisions on either side, and numbers on the left', () => {
    const cells = {
      J1: [
        ['=B2+B3', { value: '=' }, '=2*B4+1'],
        [15, { value: '=<' }, '=B4'],
      ],
    } as Cells;
    expect(statedRows({ cells, names: { 'Week.Constraint': 'Plan!$J$1:$L$2' } })).toEqual([
      [{ 'Floor matt': 1, 'Wall gloss': 1 }, '=', { '1': 1, Border: 2 }],
      [{ '1': 15 }, '<=', { Border: 1 }],
    ]);
  });

  it('AD-24 blanks and headings are passed over, and formulas that give an empty text count as nothing', () => {
    const cells = {
      J1: [
        ['Machines', null, null],
        ['=SUMPRODUCT(B2:B4,F2:F4)', '<=', 80],
        [null, null, null],
        ['', ' ', null],
        [
          { formula: 'IF(1=1,"",0)', value: '' },
          { formula: '""', value: '' },
          { formula: '""', value: '' },
        ],
        ['Orders', null, null],
        ['=B4', '>=', 15],
      ],
    } as Cells;
    const changes = { cells, names: { 'Week.Constraint': 'Plan!$J$1:$L$7' } };
    expect(statedRows(changes)).toEqual([pressRow, orderRow]);
    expect(setsOf(changes)[0].rows.map(({ line }) => line)).toEqual([1, 6]);
  });

  it('AD-20 may be a union of rectangles in line', () => {
    const changes = { names: { 'Week.Constraint': 'Plan!$B$9:$D$9,Plan!$B$7:$D$7' } };
    expect(statedRows(changes)).toEqual([orderRow, pressRow]);
    expect(setsOf(changes)[0].rows.map(({ line }) => line)).toEqual([2, 0]);
  });

  it('AD-5 may stand in several blocks by number', () => {
    const changes = {
      names: { 'Week.Constraint': 'Plan!$B$9:$D$9', 'Week.Constraint2': 'Plan!$B$7:$D$8' },
    };
    expect(statedRows(changes)).toEqual([orderRow, pressRow, kilnRow]);
    expect(setsOf(changes).map(({ number, rows }) => [number, rows.map(({ set }) => set)])).toEqual([
      [1, [0]],
      [2, [1, 1]],
    ]);
  });
});

describe('coefficient form', () => {
  const upright = [
    ['Press', 0.5, 0.25, 1, '<=', 80],
    ['Kiln', 1, 2, 1.5, 'at most', 120],
    ['Order', 0, 0, 1, 'at least', 15],
  ] as const;

  it('AD-20 has one coefficient a decision cell', () => {
    const cells = { J1: upright.map((line) => [...line]) };
    const changes = { cells, names: { 'Week.Constraint': 'Plan!$K$1:$O$3' } };
    expect(statedRows(changes)).toEqual([pressRow, kilnRow, orderRow]);
    expect(setsOf(changes)).toMatchObject([{ form: 'coefficient', isLying: false }]);
    expect(setsOf(changes)[0].rows.map(({ label, leftCell }) => [label, leftCell])).toEqual([
      ['Press', null],
      ['Kiln', null],
      ['Order', null],
    ]);
  });

  it('AD-20 may lie on its side', () => {
    const cells = { J1: [0, 1, 2, 3, 4, 5].map((part) => upright.map((line) => line[part])) };
    const changes = { cells, names: { 'Week.Constraint': 'Plan!$J$2:$L$6' } };
    expect(statedRows(changes)).toEqual([pressRow, kilnRow, orderRow]);
    expect(setsOf(changes)).toMatchObject([{ form: 'coefficient', isLying: true }]);
    expect(setsOf(changes)[0].rows.map(({ label }) => label)).toEqual(['Press', 'Kiln', 'Order']);
  });

  it('AD-20 counts all decision cells, blocks by number, each row by row', () => {
    const cells = { J1: [[1, 2, 3, 4, 5, '<=', 6]], T1: [['a', 'b']] } as Cells;
    const names = {
      'Week.Decision2': 'Plan!$T$2:$U$2',
      'Week.Constraint': 'Plan!$J$1:$P$1',
      'Week.Lower': null,
      'Week.Upper': null,
    };
    expect(statedRows({ cells, names })).toEqual([
      [{ 'Floor matt': 1, 'Wall gloss': 2, Border: 3, a: 4, b: 5 }, '<=', { '1': 6 }],
    ]);
  });

  it('AD-26 a single blank in a row is warned of by itself, the blanks of a sparse block once', () => {
    const cells = {
      K1: [
        [0.5, null, 1, '<=', 80],
        [1, null, null, '<=', 120],
        [null, null, 1, '>=', 15],
        [null, 1, 1, '>=', 2],
      ],
    } as Cells;
    const { model, issues } = readTiles({ cells, names: { 'Week.Constraint': 'Plan!$K$1:$O$4' } });
    expect(rowsOf(model!).map(([, left]) => left)).toEqual([
      { 'Floor matt': 0.5, Border: 1 },
      { 'Floor matt': 1 },
      { Border: 1 },
      { 'Wall gloss': 1, Border: 1 },
    ]);
    expect(issueTexts(issues)).toEqual([
      'blank-coefficient at Plan!L1',
      'blank-coefficient at Plan!L2',
      'blank-coefficient at Plan!K4',
    ]);
    expect(issues[1].facts).toEqual({
      name: 'Week.Constraint',
      count: 4,
      cells: ['Plan!L2', 'Plan!M2', 'Plan!K3', 'Plan!L3'],
    });
  });

  it('AD-20 may have a right side that holds decisions', () => {
    const cells = { K1: [[0.5, 0, 1, '<=', '=B3+3']] } as Cells;
    expect(statedRows({ cells, names: { 'Week.Constraint': 'Plan!$K$1:$O$1' } })).toEqual([
      [{ 'Floor matt': 0.5, Border: 1 }, '<=', { '1': 3, 'Wall gloss': 1 }],
    ]);
  });
});

describe('ambiguous shapes', () => {
  it('AD-21 a 3 × 3 block is read by where its relations stand', () => {
    const lying = {
      J1: [
        ['=B2', '=B3', '=B4'],
        ['<=', '>=', { value: '=' }],
        [7, 8, 9],
      ],
    } as Cells;
    const names = { 'Week.Constraint': 'Plan!$J$1:$L$3' };
    const expected = [
      [{ 'Floor matt': 1 }, '<=', { '1': 7 }],
      [{ 'Wall gloss': 1 }, '>=', { '1': 8 }],
      [{ Border: 1 }, '=', { '1': 9 }],
    ];
    expect(statedRows({ cells: lying, names })).toEqual(expected);
    const upright = {
      J1: [
        ['=B2', '<=', 7],
        ['=B3', '>=', 8],
        ['=B4', { value: '=' }, 9],
      ],
    } as Cells;
    expect(statedRows({ cells: upright, names })).toEqual(expected);
  });

  it('AD-21 three lying rows of five decisions are told from upright formula rows', () => {
    // 3 × 5 fits three upright coefficient rows of the three decisions and five lying formula rows.
    const lying = {
      J1: [
        ['=B2', '=B3', '=B4', '=B2+B3', '=B3+B4'],
        ['<=', '<=', '<=', '>=', '>='],
        [1, 2, 3, 4, 5],
      ],
    } as Cells;
    const names = { 'Week.Constraint': 'Plan!$J$1:$N$3' };
    expect(setsOf({ cells: lying, names })).toMatchObject([{ form: 'formula', isLying: true }]);
    const upright = {
      J1: [
        [1, 2, 3, '<=', 4],
        [1, 2, 3, '>=', 4],
        [1, 2, 3, { value: '=' }, 4],
      ],
    } as Cells;
    expect(setsOf({ cells: upright, names })).toMatchObject([{ form: 'coefficient', isLying: false }]);
  });

  it('AD-21 with faults, the way with more relations counts and the faults are told', () => {
    const cells = {
      J1: [
        ['=B2', '=B3', '=B4'],
        ['<=', '<', null],
        [7, 8, 9],
      ],
    } as Cells;
    const { issues } = readTiles({ cells, names: { 'Week.Constraint': 'Plan!$J$1:$L$3' } });
    expect(issueTexts(issues)).toEqual(['strict-relation at Plan!K2', 'missing-relation at Plan!L2']);
  });

  const oneDecision = {
    'Week.Decision': 'Plan!$B$2',
    'Week.Objective': 'Plan!$C$2',
    'Week.Lower': null,
    'Week.Upper': null,
    'Week.Constraint': 'Plan!$J$1:$L$2',
  };

  it('AD-22 with one decision, a left cell that depends on it makes formula form', () => {
    const cells = {
      J1: [
        ['=2*B2', '<=', 7],
        [1, '<=', '=B2'],
      ],
    } as Cells;
    expect(statedRows({ cells, names: oneDecision })).toEqual([
      [{ 'Floor matt': 2 }, '<=', { '1': 7 }],
      [{ '1': 1 }, '<=', { 'Floor matt': 1 }],
    ]);
  });

  it('AD-22 with one decision, plain numbers are coefficients', () => {
    const cells = {
      J1: [
        [2, '<=', 7],
        [1, '>=', 3],
      ],
    } as Cells;
    const { model, issues } = readTiles({ cells, names: oneDecision });
    expect(rowsOf(model!).map(([, left]) => left)).toEqual([{ 'Floor matt': 2 }, { 'Floor matt': 1 }]);
    expect(issues).toEqual([]);
  });

  it('AD-22 a coefficient that could be a left side is pointed out', () => {
    const cells = {
      J1: [
        [2, '<=', '=B2'],
        [1, '>=', 3],
      ],
    } as Cells;
    const { model, issues } = readTiles({ cells, names: oneDecision });
    expect(rowsOf(model!)[0].slice(1)).toEqual([{ 'Floor matt': 2 }, '<=', { 'Floor matt': 1 }]);
    expect(issueTexts(issues)).toEqual(['read-as-coefficient at Plan!J1']);
  });
});

describe('parts apart', () => {
  const parts = {
    'Week.Constraint': null,
    'Week.Left': 'Plan!$B$7:$B$9',
    'Week.Relation': 'Plan!$C$7:$C$9',
    'Week.Right': 'Plan!$D$7:$D$9',
  };

  it('AD-23 are three lines of equal length', () => {
    expect(statedRows({ names: parts })).toEqual([pressRow, kilnRow, orderRow]);
    expect(setsOf({ names: parts })).toMatchObject([{ form: 'parts', isLying: false, name: 'Week.Left' }]);
  });

  it('AD-23 may stand anywhere, upright or lying', () => {
    const cells = { J1: [['<=', '<=', '>=']] };
    const otherSheets = { Limits: { C3: [[80], [120], [15]] } };
    const names = { ...parts, 'Week.Relation': 'Plan!$J$1:$L$1', 'Week.Right': 'Limits!$C$3:$C$5' };
    expect(statedRows({ cells, otherSheets, names })).toEqual([pressRow, kilnRow, orderRow]);
  });

  it('AD-23 may share one relation, in a cell or in the name', () => {
    const rows = [pressRow, kilnRow, [{ Border: 1 }, '<=', { '1': 15 }]];
    expect(statedRows({ names: { ...parts, 'Week.Relation': 'Plan!$C$7' } })).toEqual(rows);
    const names = { ...parts, 'Week.Relation': '="at most"' };
    expect(statedRows({ names })).toEqual(rows);
    // Where the relation is shared, a row's own cell is its left side.
    expect(setsOf({ names })[0].rows.map(({ cell }) => [cell.row, cell.column])).toEqual([
      [6, 1],
      [7, 1],
      [8, 1],
    ]);
  });

  it('AD-23 may be decision cells themselves, blank as they are', () => {
    const names = { ...parts, 'Week.Left': 'plan!$B$2:$B$4' };
    expect(statedRows({ names })).toEqual([
      [{ 'Floor matt': 1 }, '<=', { '1': 80 }],
      [{ 'Wall gloss': 1 }, '<=', { '1': 120 }],
      [{ Border: 1 }, '>=', { '1': 15 }],
    ]);
  });

  it('AD-24 pass over blanks and headings', () => {
    const cells = { B8: 'Orders', C8: null, D8: null };
    expect(statedRows({ cells, names: parts })).toEqual([pressRow, orderRow]);
    const shared = { ...parts, 'Week.Relation': '=">="' };
    expect(statedRows({ cells, names: shared }).map(([, relation]) => relation)).toEqual(['>=', '>=']);
  });

  it('AD-5 share their numbers with blocks: equal numbers make two sets, the parts taking the next number', () => {
    const names = {
      ...parts,
      'Week.Constraint': 'Plan!$B$7:$D$8',
      'Week.Left': 'Plan!$B$9',
      'Week.Relation': 'Plan!$C$9',
      'Week.Right': 'Plan!$D$9',
    };
    expect(statedRows({ names })).toEqual([pressRow, kilnRow, orderRow]);
    expect(setsOf({ names }).map(({ number, name }) => [number, name])).toEqual([
      [1, 'Week.Constraint'],
      [2, 'Week.Left'],
    ]);
  });
});
