import { tileModel, type Cells, type Changes } from './tile-works';

// What each cell should be called is read off the little sheets below.

function decisionLabels(changes: Changes): string[] {
  return tileModel({
    ...changes,
    names: {
      'Week.Lower': null,
      'Week.Upper': null,
      'Week.Constraint': null,
      'Week.Objective': 'Plan!$B$11',
      ...changes.names,
    },
  }).decisions.map(({ label }) => label);
}

function constraintLabels(changes: Changes): string[] {
  return tileModel(changes).constraintSets.flatMap((set) => set.rows.map(({ label }) => label));
}

describe('labels of decisions', () => {
  it('AD-40 are the nearest texts to the left, over numbers and blanks, on one line', () => {
    const cells = {
      K1: [
        ['Wall\n  tiles', 7, null, null],
        ['Steps', null, '<=', null],
        ['Edges', 'free', 3, null],
      ],
    } as Cells;
    expect(decisionLabels({ cells, names: { 'Week.Decision': 'Plan!$N$1:$N$3' } })).toEqual([
      'Wall tiles',
      'Steps',
      'Edges',
    ]);
  });

  it('AD-40 of a lying block stand above', () => {
    const cells = { K1: [[null, 'Monday', 'Tuesday'], ['Make']] } as Cells;
    expect(decisionLabels({ cells, names: { 'Week.Decision': 'Plan!$L$2:$M$2' } })).toEqual([
      'Monday',
      'Tuesday',
    ]);
  });

  it('AD-41 of a grid are row and column', () => {
    const cells = { K1: [[null, 'Press 1', 'Press 2'], ['Floor'], ['Wall']] } as Cells;
    expect(decisionLabels({ cells, names: { 'Week.Decision': 'Plan!$L$2:$M$3' } })).toEqual([
      'Floor · Press 1',
      'Floor · Press 2',
      'Wall · Press 1',
      'Wall · Press 2',
    ]);
  });

  it('AD-41 of two blocks with the same texts are told apart by their columns', () => {
    const cells = { K1: [[null, 'Make', 'Store'], ['Floor'], ['Wall']] } as Cells;
    const names = { 'Week.Decision': 'Plan!$L$2:$L$3', 'Week.Decision2': 'Plan!$M$2:$M$3' };
    expect(decisionLabels({ cells, names })).toEqual([
      'Floor · Make',
      'Wall · Make',
      'Floor · Store',
      'Wall · Store',
    ]);
  });

  it('AD-41 get their cell appended where they are equal', () => {
    const cells = { K2: [['Floor'], ['Wall'], ['Floor']] } as Cells;
    expect(decisionLabels({ cells, names: { 'Week.Decision': 'Plan!$L$2:$L$4' } })).toEqual([
      'Floor (Plan!L2)',
      'Wall',
      'Floor (Plan!L4)',
    ]);
  });

  it('AD-41 are the cell where there is no text', () => {
    const otherSheets = { 'Only numbers': { A1: [[1, 2]] } };
    expect(decisionLabels({ otherSheets, names: { 'Week.Decision': "'Only numbers'!$A$1:$B$1" } })).toEqual([
      "'Only numbers'!A1",
      "'Only numbers'!B1",
    ]);
  });

  it('AD-40 may be named, a blank one being found as before', () => {
    const cells = { T1: [['Matt'], [null], [42]] } as Cells;
    expect(decisionLabels({ cells, names: { 'Week.DecisionLabel': 'Plan!$T$1:$T$3' } })).toEqual([
      'Matt',
      'Wall gloss',
      '42',
    ]);
  });

  it('AD-40 a merged cell labels all of its rows', () => {
    const cells = {
      K1: [
        ['Floor', 'small'],
        [null, 'large'],
        ['Wall', 'small'],
        [null, 'large'],
      ],
    } as Cells;
    const merged = { Plan: ['K1:K2', 'K3:K4'] };
    const names = { 'Week.Decision': 'Plan!$P$1:$P$4', 'Week.DecisionLabel': 'Plan!$K$1:$K$4' };
    expect(decisionLabels({ cells, merged, names })).toEqual([
      'Floor (Plan!P1)',
      'Floor (Plan!P2)',
      'Wall (Plan!P3)',
      'Wall (Plan!P4)',
    ]);
  });

  it('AD-40 the sense is no label', () => {
    const cells = { K1: 'maximise', K2: null };
    const names = { 'Week.Decision': 'Plan!$K$2', 'Week.Sense': 'Plan!$K$1' };
    expect(decisionLabels({ cells: { ...cells, J2: null, A2: null, B2: null, C2: null }, names })).toEqual([
      'Plan!K2',
    ]);
  });

  it('of 20,000 cells in one column are found in one pass', () => {
    const cells = { K1: [['Amounts'], ...Array.from({ length: 20_000 }, (_, i) => [i])] } as Cells;
    const labels = decisionLabels({ cells, names: { 'Week.Decision': 'Plan!$K$20:$K$20001' } });
    expect(labels).toHaveLength(19_982);
    expect(new Set(labels).size).toBe(19_982);
  });
});

describe('labels of constraint rows', () => {
  it('AD-40 are the texts beside the rows', () => {
    expect(constraintLabels({})).toEqual(['Press hours', 'Kiln hours', 'Border order']);
  });

  it('AD-41 take the heading above in, where rows are called the same', () => {
    const cells = {
      K1: [
        [null, 'Kiln 1', null, null],
        ['Hours', '=B2', '<=', 5],
        [null, 'Kiln 2', null, null],
        ['Hours', '=B3', '<=', 5],
      ],
    } as Cells;
    expect(constraintLabels({ cells, names: { 'Week.Constraint': 'Plan!$L$1:$N$4' } })).toEqual([
      'Hours · Kiln 1',
      'Hours · Kiln 2',
    ]);
  });

  it('AD-40 may be named, a cell a line or a cell a row', () => {
    const cells = {
      K1: [
        [null, 'Hours', null, null],
        ['a', '=B2', '<=', 5],
        ['b', '=B3', '<=', 5],
        [null, null, null, null],
        ['c', '=B4', '<=', 5],
      ],
      T1: [['-'], ['P'], ['Q'], ['-'], ['R']],
      U1: [['p'], ['q'], ['r']],
    } as Cells;
    const constraint = { 'Week.Constraint': 'Plan!$L$1:$N$5' };
    const labelled = (ref: string) =>
      constraintLabels({ cells, names: { ...constraint, 'Week.ConstraintLabel': ref } });
    expect(labelled('Plan!$T$1:$T$5')).toEqual(['P', 'Q', 'R']);
    expect(labelled('Plan!$U$1:$U$3')).toEqual(['p', 'q', 'r']);
  });

  it('AD-41 of two blocks are told apart', () => {
    const names = {
      'Week.Constraint': 'Plan!$B$7:$D$8',
      'Week.Left': 'Plan!$B$7:$B$8',
      'Week.Relation': '=">="',
      'Week.Right': 'Plan!$D$8:$D$9',
    };
    expect(constraintLabels({ names })).toEqual([
      'Press hours · m² planned (Plan!C7)',
      'Kiln hours · m² planned (Plan!C8)',
      'Press hours · m² planned (Plan!B7)',
      'Kiln hours · m² planned (Plan!B8)',
    ]);
  });
});
