import { readPlan } from '../../../../addin/domain/model-from-sheet/read-plan';
import { formatCellAddress } from '../../../../addin/domain/sheet/cell-address';
import { issueTexts, readTiles, rowsOf, termsOf, tileModel, tileNames, tileWorkbook } from './tile-works';

// The expected models are read off the tables of tile-works.ts by hand.

const pressRow = ['Press hours', { 'Floor matt': 0.5, 'Wall gloss': 0.25, Border: 1 }, '<=', { '1': 80 }];
const kilnRow = ['Kiln hours', { 'Floor matt': 1, 'Wall gloss': 2, Border: 1.5 }, '<=', { '1': 120 }];
const orderRow = ['Border order', { Border: 1 }, '>=', { '1': 15 }];
const tileRows = [pressRow, kilnRow, orderRow];

describe('a sound plan', () => {
  it('is read whole, with an address on every part', () => {
    const { model, issues, size } = readTiles();
    expect(issues).toEqual([]);
    expect(size).toEqual({ decisions: 3, constraints: 3, nonzeros: 7, definingRows: 0 });
    expect(model).toMatchObject({
      planName: 'Week',
      prefix: 'Week',
      separator: '.',
      scope: null,
      sense: 'maximise',
    });
    expect(
      model!.decisions.map(({ cell, label, before, lower, upper }) => [
        formatCellAddress(cell),
        label,
        before,
        lower,
        upper,
      ]),
    ).toEqual([
      ['Plan!B2', 'Floor matt', 10, 0, 100],
      ['Plan!B3', 'Wall gloss', null, 0, Infinity],
      ['Plan!B4', 'Border', null, 5, 40],
    ]);
    expect(termsOf(model!.objective, model!)).toEqual({ 'Floor matt': 6.5, 'Wall gloss': 8, Border: 12 });
    expect(formatCellAddress(model!.objectiveCell!)).toBe('Plan!B11');
    expect(rowsOf(model!)).toEqual(tileRows);
    const [set] = model!.constraintSets;
    expect(set).toMatchObject({ number: 1, name: 'Week.Constraint', form: 'formula', isLying: false });
    expect(set.rows.map(({ cell, line }) => [formatCellAddress(cell), line])).toEqual([
      ['Plan!C7', 0],
      ['Plan!C8', 1],
      ['Plan!C9', 2],
    ]);
  });

  it('AD-1 may write its names with underscores and in any case', () => {
    const names = Object.fromEntries(
      Object.entries(tileNames).flatMap(([name, formula]) => [
        [name, null],
        [name.replace('Week.', 'WEEK_').toUpperCase(), formula],
      ]),
    );
    const model = tileModel({ names }, 'week');
    expect(model).toMatchObject({ planName: 'WEEK', prefix: 'WEEK', separator: '_' });
    expect(rowsOf(model)).toEqual(tileRows);
  });

  it('AD-4 may be made of a sheet’s own names', () => {
    const localNames = { Plan: tileNames };
    const names = Object.fromEntries(Object.keys(tileNames).map((name) => [name, null]));
    const model = tileModel({ names, localNames }, 'Week @ Plan');
    expect(model).toMatchObject({ planName: 'Week @ Plan', prefix: 'Week', scope: 'Plan' });
    expect(rowsOf(model)).toEqual(tileRows);
  });

  it('AD-4 a sheet-local plan lacks what only the workbook’s names say', () => {
    const local = Object.fromEntries(Object.entries(tileNames).filter(([name]) => name !== 'Week.Sense'));
    const { model, issues } = readTiles({ localNames: { Plan: local } }, 'Week @ Plan');
    expect(model).toBeNull();
    expect(issueTexts(issues)).toContain('missing-sense');
    expect(readTiles({ localNames: { Plan: local } }).model).not.toBeNull();
  });

  it('AD-14 may say its sense in the name itself', () => {
    expect(tileModel({ names: { 'Week.Sense': '="Min"' } }).sense).toBe('minimise');
  });

  it('AD-6 may name table columns, unions and names of names', () => {
    const model = tileModel({
      cells: {
        A20: [
          ['Product', 'Make'],
          ['Tile X', null],
          ['Tile Y', null],
        ],
      },
      tables: [{ name: 'Extra', sheet: 'Plan', ref: 'A20:B22' }],
      names: {
        'Week.Decision': 'Tiles',
        Tiles: 'Plan!$B$2:$B$3,Plan!$B$4',
        'Week.Decision2': 'Extra[Make]',
        'Week.Lower': 'Plan!$D$3',
        'Week.Upper': null,
      },
    });
    expect(model.decisions.map(({ label }) => label)).toEqual([
      'Floor matt',
      'Wall gloss',
      'Border',
      'Tile X',
      'Tile Y',
    ]);
    expect(
      model.decisionBlocks.map(({ number, first, end, ranges }) => [number, first, end, ranges.length]),
    ).toEqual([
      [1, 0, 3, 2],
      [2, 3, 5, 1],
    ]);
    expect(model.decisionBlocks[0].range).toEqual({ sheet: 'Plan', top: 1, left: 1, bottom: 3, right: 1 });
    expect(rowsOf(model)).toEqual(tileRows);
  });

  it('AD-10 counts the decisions of several blocks by number, each row by row', () => {
    const model = tileModel({
      cells: {
        J2: [
          [1, 2],
          [3, 4],
        ],
      },
      names: {
        'Week.Decision': 'Plan!$J$2:$K$3',
        'Week.Decision2': 'Plan!$B$2:$B$4',
        'Week.Lower': null,
        'Week.Upper': null,
      },
    });
    expect(model.decisions.map(({ cell }) => formatCellAddress(cell).slice(5))).toEqual([
      'J2',
      'K2',
      'J3',
      'K3',
      'B2',
      'B3',
      'B4',
    ]);
    expect(model.decisions.map(({ block, before }) => [block, before])).toEqual([
      [0, 1],
      [0, 2],
      [0, 3],
      [0, 4],
      [1, 10],
      [1, null],
      [1, null],
    ]);
  });

  it('AD-10 takes a decision cell that holds only blanks for a blank one', () => {
    const { issues, model } = readTiles({ cells: { B3: ' ' } });
    expect(issues).toEqual([]);
    expect(model!.decisions[1].before).toBeNull();
  });

  it('AD-53 follows formulas over other sheets, and takes stored values for what no decision changes', () => {
    const model = tileModel({
      cells: {
        B11: '=Money!B3',
        C2: { formula: 'Money!B1*2', value: 6.5 },
      },
      otherSheets: {
        Money: {
          A1: 'Price',
          B1: 999,
          A2: 'Fixed',
          B2: -50,
          A3: 'Result',
          B3: '=SUMPRODUCT(Plan!B2:B4,Plan!C2:C4)+B2',
        },
      },
    });
    expect(termsOf(model.objective, model)).toEqual({
      '1': -50,
      'Floor matt': 6.5,
      'Wall gloss': 8,
      Border: 12,
    });
  });
});

describe('formulas of a plan', () => {
  it('AD-53 may be array formulas that fill the left sides, and may use tables', () => {
    const model = tileModel({
      cells: {
        A1: [['Tile', 'Make', 'Margin', 'Least', 'Most', 'Press', 'Kiln']],
        B7: { formula: 'MMULT(TRANSPOSE(Tiles[[Press]:[Kiln]]),Tiles[Make])', value: 5, fills: 'B7:B8' },
        B8: 10,
        B11: '=SUMPRODUCT(Tiles[Make],Tiles[Margin])',
      },
      tables: [{ name: 'Tiles', sheet: 'Plan', ref: 'A1:G4' }],
      names: { 'Week.Decision': 'Tiles[Make]', 'Week.Lower': 'Tiles[Least]', 'Week.Upper': 'Tiles[Most]' },
    });
    expect(rowsOf(model)).toEqual(tileRows);
    expect(termsOf(model.objective, model)).toEqual({ 'Floor matt': 6.5, 'Wall gloss': 8, Border: 12 });
    expect(model.decisions.map(({ lower, upper }) => [lower, upper])).toEqual([
      [0, 100],
      [0, Infinity],
      [5, 40],
    ]);
  });

  it('AD-53 are not touched by faults elsewhere on the sheet', () => {
    const { issues } = readTiles({
      cells: { N1: '=N2', N2: '=N1', N3: '=KILNTIME(B2)', N4: '=ROUND(B2,0)', N5: '=1/0', N6: '=B2*B3' },
    });
    expect(issues).toEqual([]);
  });

  it('AD-27 a coefficient that a decision reaches with the factor 0 is refused all the same', () => {
    const { issues } = readTiles({
      cells: { K1: [['=0*B2+3', 1, 1, '<=', 5]] },
      names: { 'Week.Constraint': 'Plan!$K$1:$O$1' },
    });
    expect(issueTexts(issues)).toEqual(['coefficient-depends at Plan!K1']);
  });

  it('AD-54 a running stock of 600 weeks stays linear in size', () => {
    const weeks = 600;
    const lines = Array.from({ length: weeks }, (_, week) => [
      `Week ${week + 1}`,
      null,
      5,
      week === 0 ? '=20+L2-M2' : `=N${week + 1}+L${week + 2}-M${week + 2}`,
      '>=',
      0,
    ]);
    const { size, model } = readTiles({
      cells: { K1: [['Week', 'Make', 'Sold', 'Stock']], K2: lines, B11: `=SUM(L2:L${weeks + 1})` },
      names: {
        'Week.Decision': `Plan!$L$2:$L$${weeks + 1}`,
        'Week.Constraint': `Plan!$N$2:$P$${weeks + 1}`,
        'Week.Lower': null,
        'Week.Upper': null,
      },
    });
    // Written out in decisions the rows have 600 · 601 / 2 = 180,300 entries.
    expect(size!.nonzeros).toBeLessThan(20 * weeks);
    expect(size!.definingRows).toBeGreaterThan(0);
    expect(size).toMatchObject({ decisions: weeks, constraints: weeks });
    expect(model!.constraintSets[0].rows[599].label).toBe('Week 600');
  });
});

describe('objectives', () => {
  const coefficients = { 'Week.Objective': 'Plan!$C$2:$C$4' };

  it('AD-12 may be coefficients in the shape of the decisions', () => {
    const model = tileModel({ names: coefficients });
    expect(termsOf(model.objective, model)).toEqual({ 'Floor matt': 6.5, 'Wall gloss': 8, Border: 12 });
    expect(model.objectiveCell).toBeNull();
  });

  it('AD-12 one name a block', () => {
    const changes = {
      cells: { J1: [['Rush', 2.5]] },
      names: { ...coefficients, 'Week.Decision2': 'Plan!$L$1', 'Week.Objective2': 'Plan!$K$1' },
    };
    const model = tileModel(changes);
    expect(termsOf(model.objective, model)).toEqual({
      'Floor matt': 6.5,
      'Wall gloss': 8,
      Border: 12,
      Rush: 2.5,
    });
    const { issues } = readTiles({ ...changes, names: { ...changes.names, 'Week.Objective2': null } });
    expect(issueTexts(issues)).toEqual(['missing-objective']);
    expect(issues[0].facts).toEqual({ name: 'Week.Objective2' });
  });

  // One decision cell B2: the objective's one cell may be a formula of it or its coefficient.
  const oneDecision = {
    'Week.Decision': 'Plan!$B$2',
    'Week.Lower': null,
    'Week.Upper': null,
    'Week.Constraint': null,
  };
  it('AD-12 one cell for one decision is a formula where it depends on it', () => {
    const model = tileModel({
      cells: { J1: '=3*B2+1' },
      names: { ...oneDecision, 'Week.Objective': 'Plan!$J$1' },
    });
    expect(termsOf(model.objective, model)).toEqual({ '1': 1, 'Floor matt': 3 });
    expect(model.objectiveCell).not.toBeNull();
  });

  it('AD-12 one cell for one decision is its coefficient otherwise', () => {
    const model = tileModel({
      cells: { J1: '=3+1' },
      names: { ...oneDecision, 'Week.Objective': 'Plan!$J$1' },
    });
    expect(termsOf(model.objective, model)).toEqual({ 'Floor matt': 4 });
    expect(model.objectiveCell).toBeNull();
  });
});

describe('bounds', () => {
  function boundsOf(changes: Parameters<typeof tileModel>[0]) {
    return tileModel(changes).decisions.map(({ lower, upper }) => [lower, upper]);
  }

  it('AD-30 one cell serves all of its block', () => {
    expect(boundsOf({ cells: { J1: 2 }, names: { 'Week.Lower': 'Plan!$J$1', 'Week.Upper': null } })).toEqual([
      [2, Infinity],
      [2, Infinity],
      [2, Infinity],
    ]);
  });

  const second = { 'Week.Decision2': 'Plan!$L$1:$L$2' };
  it('AD-30 the unnumbered one cell serves every block that has none of its own', () => {
    const cells = { J1: 2, J2: 7 };
    const unnumbered = { ...second, 'Week.Lower': 'Plan!$J$1', 'Week.Upper': null };
    expect(boundsOf({ cells, names: unnumbered })).toEqual(Array.from({ length: 5 }, () => [2, Infinity]));
    const own = { ...unnumbered, 'Week.Lower2': 'Plan!$J$2' };
    expect(boundsOf({ cells, names: own }).map(([lower]) => lower)).toEqual([2, 2, 2, 7, 7]);
  });

  it('AD-30 a numbered one cell, and a block in shape, serve their own block only', () => {
    const names = { ...second, 'Week.Lower': null, 'Week.Lower1': 'Plan!$J$1' };
    expect(boundsOf({ cells: { J1: 2 }, names })).toEqual([
      [2, 100],
      [2, Infinity],
      [2, 40],
      [0, Infinity],
      [0, Infinity],
    ]);
  });

  it('AD-31 free below means none, blank 0 below and none above, and huge amounts none', () => {
    const cells = { D2: 'Free', D3: -1e30, D4: null, E2: null, E3: 9.99e307, E4: 0 };
    expect(boundsOf({ cells })).toEqual([
      [-Infinity, Infinity],
      [-Infinity, Infinity],
      [0, 0],
    ]);
  });
});

describe('a plan beside others', () => {
  it('AD-7 is not touched by faults of other plans nor by dead names of other kinds', () => {
    const { model, issues } = readTiles({
      names: {
        'Month.Decision': '#REF!',
        'Month.Sense': '[1]Costs!$A$1',
        'Autumn.Decision': 'Plan!$Z$9',
        'Autumn.Decision3': 'Nowhere!$A$1',
        Rate: '#REF!',
        'Week.Rate': 'Gone!#REF!',
        'Week.Optimum': '#REF!',
      },
    });
    expect(issues).toEqual([]);
    expect(model).not.toBeNull();
  });

  it('AD-11 is warned of decision cells that another plan decides too', () => {
    const { model, issues } = readTiles({
      names: { 'Month.Decision': 'Plan!$B$3:$B$8', 'Month.Decision2': '#REF!' },
    });
    expect(model).not.toBeNull();
    expect(issues).toMatchObject([
      { code: 'shared-decision', severity: 'warning', facts: { plan: 'Month', count: 2 } },
    ]);
    expect(issueTexts(issues)).toEqual(['shared-decision at Plan!B3']);
  });
});

describe('issues', () => {
  it('AD-70 come all at once, by place, those without a cell first', () => {
    const { model, issues, size } = readTiles({
      cells: { C2: 'x', C7: '<', D8: null, E3: true, B4: 'nil', D2: '5' },
      names: { 'Week.Sense': null, 'Week.Lower3': 'Plan!$D$2' },
    });
    expect([model, size]).toEqual([null, null]);
    expect(issueTexts(issues)).toEqual([
      'missing-sense',
      'name-without-block',
      'text-looks-like-number at Plan!D2',
      'truth-value-for-number at Plan!E3',
      'decision-holds-text at Plan!B4',
      'strict-relation at Plan!C7',
      'blank-right-side at Plan!D8',
    ]);
  });

  it('AD-3 a plan that does not exist has no decision cells', () => {
    const { model, issues } = readPlan(tileWorkbook().snapshot(), 'Month', { now: 0 });
    expect(model).toBeNull();
    expect(issues).toMatchObject([{ code: 'missing-decision', cell: null, facts: { plan: 'Month' } }]);
  });
});
