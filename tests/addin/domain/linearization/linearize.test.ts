import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { worksheetFunctions } from '../../../../addin/domain/calculation/functions/worksheet-functions';
import { affineConditions, affineFunctions } from '../../../../addin/domain/linearization/affine-functions';
import type { FormulaIssue } from '../../../../addin/domain/linearization/formula-issue';
import { linearize, type Linearization } from '../../../../addin/domain/linearization/linearize';
import { columnOfLetters, type CellAddress } from '../../../../addin/domain/sheet/cell-address';
import { CellError } from '../../../../addin/domain/sheet/cell-value';

const now = 46_358.25;

function cell(text: string, sheet = 'Plan'): CellAddress {
  const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(text)!;
  return { sheet, row: Number(row) - 1, column: columnOfLetters(letters) };
}

/** Decisions: what is made of three tiles, A1 to A3. B1:B3 are constants 2, 3, 4; C1:C3 texts. */
const base = { A1: 10, A2: 20, A3: null, B1: 2, B2: 3, B3: 4, C1: 'wall', C2: 'floor', C3: 'wall' } as const;

function read(
  formulas: Readonly<Record<string, unknown>>,
  targets: readonly string[],
  rest: Partial<WorkbookDescription> = {},
): Linearization {
  const workbook = MemoryWorkbook.of({
    ...rest,
    sheets: { ...rest.sheets, Plan: { ...base, ...rest.sheets?.['Plan'], ...formulas } },
  }).snapshot();
  const decisions = ['A1', 'A2', 'A3'].map((text) => cell(text));
  return linearize({ workbook, decisions, targets: targets.map((text) => cell(text)), now });
}

/** `5 + 2 A1 − 1 A3`, as constant and coefficients of the three decisions. */
type Form = readonly [number, number, number, number];

function formOf(formula: string, rest: Partial<WorkbookDescription> = {}): Form | string {
  const { readings, definingRows } = read({ H9: { formula } }, ['H9'], rest);
  const [reading] = readings;
  expect(definingRows).toEqual([]);
  if (reading.kind !== 'affine') {
    return reading.kind === 'value' ? `value ${String(reading.value)}` : describeIssues(reading.issues);
  }
  const coefficients = [0, 0, 0];
  reading.form.variables.forEach((variable, at) => (coefficients[variable] = reading.form.coefficients[at]));
  return [reading.form.constant, coefficients[0], coefficients[1], coefficients[2]];
}

function describeIssues(issues: readonly FormulaIssue[]): string {
  return issues
    .map((issue) => [issue.code, issue.facts['operation'], issue.facts['by']].filter(Boolean).join(' '))
    .join('; ');
}

describe('formulas that stay affine (coefficients by hand)', () => {
  const tables: Partial<WorkbookDescription> = {
    sheets: {
      Costs: {
        A1: [
          ['Tile', 'Price', 'Made'],
          ['Sea', 9, '=Plan!A1'],
          ['Moss', 11, '=Plan!A2*2'],
        ],
      },
    },
    names: { Made: 'Plan!$A$1:$A$3', Waste: '0.05', Half: 'Plan!$A$1/2', Twice: 'LAMBDA(x,x*2)' },
    tables: [{ name: 'Tiles', sheet: 'Costs', ref: 'A1:C3' }],
  };
  const cases: readonly (readonly [string, Form])[] = [
    ['A1', [0, 1, 0, 0]],
    ['A3', [0, 0, 0, 1]],
    ['A1+A2-3', [-3, 1, 1, 0]],
    ['5-A1', [5, -1, 0, 0]],
    ['2*A1+A2*3', [0, 2, 3, 0]],
    ['(A1+1)*(B1+1)', [3, 3, 0, 0]],
    ['A1/4', [0, 0.25, 0, 0]],
    ['-A1%', [0, -0.01, 0, 0]],
    ['A1*(1-Waste)', [0, 0.95, 0, 0]],
    ['A1-A1+A2', [0, 0, 1, 0]],
    ['A1*0+7', [7, 0, 0, 0]],
    ['0*(A1*1)*A2', [0, 0, 0, 0]],
    ['A1*(A2-A2+3)', [0, 3, 0, 0]],
    ['A1/(A2*0+2)', [0, 0.5, 0, 0]],
    ['SUM(A1:A3)', [0, 1, 1, 1]],
    ['SUM(A1:A3,B1:B3,1)', [10, 1, 1, 1]],
    ['SUM(Made)', [0, 1, 1, 1]],
    ['SUM(A:A)', [0, 1, 1, 1]],
    ['SUM((A1:A2,A2:A3))', [0, 1, 2, 1]],
    ['SUM(A1:A3 A2:B2)', [0, 0, 1, 0]],
    ['Half+Half', [0, 1, 0, 0]],
    ['Twice(A2)', [0, 0, 2, 0]],
    ['SUMPRODUCT(A1:A3,B1:B3)', [0, 2, 3, 4]],
    ['SUMPRODUCT((C1:C3="wall")*A1:A3)', [0, 1, 0, 1]],
    ['SUMPRODUCT(--(C1:C3="wall"),A1:A3,B1:B3)', [0, 2, 0, 4]],
    ['SUMPRODUCT(A1:A3,A1:A3,{0;0;0})', [0, 0, 0, 0]],
    ['SUM(A1:A3*B1:B3)', [0, 2, 3, 4]],
    ['PRODUCT(A1,B1,B2)', [0, 6, 0, 0]],
    ['AVERAGE(A1:A3)', [0, 1 / 3, 1 / 3, 1 / 3]],
    ['AVERAGE(A1:A2,6)', [2, 1 / 3, 1 / 3, 0]],
    ['SUMIF(C1:C3,"wall",A1:A3)', [0, 1, 0, 1]],
    ['SUMIFS(A1:A3,B1:B3,">2",C1:C3,"floor")', [0, 0, 1, 0]],
    ['AVERAGEIF(C1:C3,"wall",A1:A3)', [0, 0.5, 0, 0.5]],
    ['AVERAGEIFS(A1:A3,C1:C3,"wall")', [0, 0.5, 0, 0.5]],
    ['SUBTOTAL(9,A1:A3)', [0, 1, 1, 1]],
    ['SUBTOTAL(101,A1:A3)', [0, 1 / 3, 1 / 3, 1 / 3]],
    ['AGGREGATE(9,6,A1:A3)', [0, 1, 1, 1]],
    ['NPV(100%,A1:A2)', [0, 0.5, 0.25, 0]],
    ['SUM(MMULT({1,2,3},A1:A3))', [0, 1, 2, 3]],
    ['SUM(MMULT(TRANSPOSE(B1:B3),A1:A3))', [0, 2, 3, 4]],
    ['SUM(TRANSPOSE(A1:A3)*{1,2,3})', [0, 1, 2, 3]],
    ['INDEX(A1:A3,2)', [0, 0, 1, 0]],
    ['INDEX(A1:B3,MATCH(3,B1:B3,0),1)', [0, 0, 1, 0]],
    ['XLOOKUP(4,B1:B3,A1:A3)', [0, 0, 0, 1]],
    ['XLOOKUP(9,B1:B3,A1:A3,A2)', [0, 0, 1, 0]],
    ['VLOOKUP("Moss",Tiles,3,FALSE)', [0, 0, 2, 0]],
    ['HLOOKUP("Made",Tiles[#All],2,FALSE)', [0, 1, 0, 0]],
    ['LOOKUP(3,B1:B3,A1:A3)', [0, 0, 1, 0]],
    ['SUMPRODUCT(Tiles[Price],Tiles[Made])', [0, 9, 22, 0]],
    ['IF(B1>1,A1,A1*A2)', [0, 1, 0, 0]],
    ['IF(B1>1,5,A1)', [5, 0, 0, 0]],
    ['SUM(IF(C1:C3="wall",A1:A3))', [0, 1, 0, 1]],
    ['IFS(B1>9,A1,TRUE,A2)', [0, 0, 1, 0]],
    ['CHOOSE(B1,A1,A2,A3)', [0, 0, 1, 0]],
    ['SWITCH(C1,"floor",A1,"wall",A2)', [0, 0, 1, 0]],
    ['IFERROR(A1/B1,0)', [0, 0.5, 0, 0]],
    ['IFERROR(1/0,A1)', [0, 1, 0, 0]],
    ['IFNA(MATCH("x",C1:C3,0),A2)', [0, 0, 1, 0]],
    ['N(A1)', [0, 1, 0, 0]],
    ['LET(made,SUM(A1:A3),2*made-A1)', [0, 1, 2, 2]],
    ['SUM(OFFSET(A1,1,0,2,1))', [0, 0, 1, 1]],
    ['OFFSET(A1,B1,0)', [0, 0, 0, 1]],
    ['INDIRECT("A"&B1)', [0, 0, 1, 0]],
    ['SUM(A1:INDEX(A1:A3,B1))', [0, 1, 1, 0]],
    ['A1*ROWS(A1:A3)', [0, 3, 0, 0]],
    ['A1*MAX(B1:B3)+ROUND(B1/3,1)+ABS(-1)', [1.7, 4, 0, 0]],
    ['SUM(FILTER(A1:A3,C1:C3="wall"))', [0, 1, 0, 1]],
    ['SUM(HSTACK(A1:A2,B1:B2))', [5, 1, 1, 0]],
    ['SUM(BYROW(A1:B3,LAMBDA(r,SUM(r))))', [9, 1, 1, 1]],
    ['REDUCE(0,A1:A3,LAMBDA(total,made,total+2*made))', [0, 2, 2, 2]],
    ['A1*(TODAY()-46350)', [0, 8, 0, 0]],
    ['SUM(A1 , B1)', [2, 1, 0, 0]],
  ];

  it.each(cases)('%s', (formula, expected) => {
    const form = formOf(formula, tables);
    expect(typeof form).toBe('object');
    (form as Form).forEach((value, at) => expect(value).toBeCloseTo(expected[at], 14));
  });

  it('array formulas give each of their cells its own form', () => {
    const { readings } = read(
      { E1: { formula: 'A1:A3*B1:B3', fills: 'E1:E3' }, F1: '=E3+E2', E2: 0, E3: 0 },
      ['E1', 'E2', 'E3', 'F1'],
    );
    expect(readings.map((reading) => reading.kind === 'affine' && reading.form.coefficients)).toEqual([
      [2],
      [3],
      [4],
      [3, 4],
    ]);
  });

  it('a formula in a table takes the values of its own row', () => {
    const { readings } = read({ H2: '=Goods[[#This Row],[Made]]*Goods[[#This Row],[Price]]' }, ['H2'], {
      tables: [
        { name: 'Goods', sheet: 'Plan', ref: 'A1:B3', headerRowCount: 0, columnNames: ['Made', 'Price'] },
      ],
    });
    expect(readings[0]).toMatchObject({ form: { variables: [1], coefficients: [3] } });
  });

  it('a formula of one cell takes from a range the value of its own row', () => {
    const { readings } = read({ E2: '=A1:A3*2' }, ['E2']);
    expect(readings[0]).toMatchObject({ form: { variables: [1], coefficients: [2] } });
  });
});

describe('formulas that do not stay affine are refused by what makes them so', () => {
  it.each([
    ['A1*A2', 'not-affine product *'],
    ['A1^2', 'not-affine power ^'],
    ['2^A1', 'not-affine power ^'],
    ['1/A1', 'not-affine division /'],
    ['A1/SUM(A1:A3)', 'not-affine division /'],
    ['A1>3', 'not-affine comparison >'],
    ['IF(A1>3,1,2)', 'not-affine comparison >'],
    ['IF(A1,1,2)', 'not-affine condition IF'],
    ['SUMPRODUCT(--(A1:A3>0))', 'not-affine comparison >'],
    ['"made "&A1', 'not-affine concatenation &'],
    ['SUMPRODUCT(A1:A3,A1:A3)', 'not-affine product SUMPRODUCT'],
    ['SUM(MMULT(TRANSPOSE(A1:A3),A1:A3))', 'not-affine product MMULT'],
    ['PRODUCT(A1:A2)', 'not-affine product PRODUCT'],
    ['MAX(A1:A3)', 'not-affine function MAX'],
    ['MAX(0,A1)', 'not-affine function MAX'],
    ['ROUND(A1,0)', 'not-affine function ROUND'],
    ['INT(A1*0)', 'not-affine function INT'],
    ['COUNT(A1:A3)', 'not-affine function COUNT'],
    ['COUNTIF(A1:A3,">0")', 'not-affine function COUNTIF'],
    ['SUMIF(A1:A3,">0")', 'not-affine function SUMIF'],
    ['SUMIF(C1:C3,A1,B1:B3)', 'not-affine function SUMIF'],
    ['SUMIFS(B1:B3,A1:A3,">0")', 'not-affine function SUMIFS'],
    ['INDEX(B1:B3,A1)', 'not-affine function INDEX'],
    ['VLOOKUP(2,A1:B3,2,FALSE)', 'not-affine function VLOOKUP'],
    ['VLOOKUP(A1,B1:C3,2)', 'not-affine function VLOOKUP'],
    ['LOOKUP(3,A1:A3)', 'not-affine function LOOKUP'],
    ['XLOOKUP(3,A1:A3,B1:B3)', 'not-affine function XLOOKUP'],
    ['CHOOSE(A1,1,2)', 'not-affine function CHOOSE'],
    ['SWITCH(A1,1,2)', 'not-affine function SWITCH'],
    ['IFS(A1,2)', 'not-affine condition IFS'],
    ['AND(A1>1,TRUE)', 'not-affine comparison >'],
    ['OFFSET(B1,A1,0)', 'not-affine function OFFSET'],
    ['INDIRECT("B"&A1)', 'not-affine concatenation &'],
    ['SUBTOTAL(4,A1:A3)', 'not-affine function SUBTOTAL'],
    ['SUBTOTAL(A1,B1:B3)', 'not-affine function SUBTOTAL'],
    ['AGGREGATE(14,6,A1:A3)', 'error-value'],
    ['NPV(A1,B1:B3)', 'not-affine function NPV'],
    ['ISBLANK(A3)', 'not-affine function ISBLANK'],
    ['SUM(FILTER(B1:B3,A1:A3))', 'not-affine function FILTER'],
    ['SUM(MAP(A1:A3,LAMBDA(v,v*v)))', 'not-affine product *'],
    ['LET(x,A1,x*x)', 'not-affine product *'],
    ['NOSUCH(A1)', 'unknown-function'],
    ['RAND()*A1', 'unknown-function'],
    ['A1/0', 'error-value'],
    ['A1+"x"', 'error-value'],
    ['SUM(A1:A3)+Gone', 'error-value'],
    ['A1+[1]Costs!$A$1', 'external-reference'],
    ['SUM(Plan:Costs!A1)', 'several-sheets'],
    ['A1*1E308*10', 'error-value'],
  ])('%s: %s', (formula, expected) => {
    const described = formOf(formula, { sheets: { Costs: { A1: 1 } } });
    // RAND is called before the product can be refused, unknown functions have no `by`.
    expect(described).toBe(expected);
  });

  it('the chain runs from the decision to the cell, and the remedy is that of the trade', () => {
    const { readings } = read({ D1: '=A1+A2', D2: '=D1*2', D3: '=ROUND(D2,0)', D4: '=D3+1' }, ['D4']);
    expect(readings[0]).toEqual({
      kind: 'refused',
      issues: [
        {
          code: 'not-affine',
          cell: cell('D3'),
          facts: {
            operation: 'function',
            by: 'ROUND',
            remedy: 'lot',
            chain: ['Plan!A1', 'Plan!D1', 'Plan!D2', 'Plan!D3'],
            formula: '=ROUND(D2,0)',
          },
        },
      ],
    });
  });

  it.each([
    ['A1/A2', 'ratio'],
    ['IF(A1>5,1,0)', 'yes-no'],
    ['COUNTIF(A1:A3,">0")', 'yes-no'],
    ['MAX(A1,A2)', 'row-each'],
    ['ABS(A1)', 'row-each'],
    ['CEILING(A1,5)', 'lot'],
    ['A1*A2', 'none'],
  ])('%s has the remedy %s', (formula, remedy) => {
    const [reading] = read({ D1: { formula } }, ['D1']).readings;
    expect(reading).toMatchObject({ issues: [{ facts: { remedy } }] });
  });

  it('every reason on the way is told, each once, and all cells they block share them', () => {
    const { readings } = read({ D1: '=A1*A2', D2: '=ROUND(A3,0)', D3: '=D1+D2', D4: '=D3*2', D5: '=A1' }, [
      'D3',
      'D4',
      'D5',
    ]);
    const issuesAt = (at: number): readonly FormulaIssue[] => {
      const reading = readings[at];
      return reading.kind === 'refused' ? reading.issues : [];
    };
    expect(issuesAt(0).map((issue) => issue.cell)).toEqual([cell('D1'), cell('D2')]);
    expect(issuesAt(1)).toEqual(issuesAt(0));
    expect(issuesAt(1)[0]).toBe(issuesAt(0)[0]);
    expect(readings[2].kind).toBe('affine');
  });
});

describe('fail closed: no function lets a decision through unless it is listed', () => {
  const listed = new Set([...Object.keys(affineFunctions), ...Object.keys(affineConditions)]);
  const others = [...worksheetFunctions].filter(([name, { maximum }]) => !listed.has(name) && maximum > 0);

  it.each(others.map(([name]) => name))('%s', (name) => {
    const { minimum, maximum } = worksheetFunctions.get(name)!;
    for (let count = Math.max(1, minimum); count <= Math.min(maximum, minimum + 3); count++) {
      for (let position = 0; position < count; position++) {
        for (const depending of ['A1', 'A1:A3', '(A1*2)']) {
          const given = Array.from({ length: count }, (_argument, at) => (at === position ? depending : '1'));
          const [reading] = read({ D1: { formula: `${name}(${given.join(',')})` } }, ['D1']).readings;
          // Where the arguments cannot be right, an error value may come first; a number never does.
          expect(reading.kind).toBe('refused');
        }
      }
    }
  });

  it.each(Object.keys(affineFunctions))('%s: an argument that must be constant is refused', (name) => {
    const { mayDepend } = affineFunctions[name];
    const { minimum, maximum } = worksheetFunctions.get(name)!;
    const count = Math.max(minimum, Math.min(maximum, 3));
    for (let position = 0; position < count; position++) {
      if (mayDepend === 'all' || mayDepend(position)) {
        continue;
      }
      const given = Array.from({ length: count }, (_argument, at) => (at === position ? 'A1:A3' : 'B1:B3'));
      const described = formOf(`SUM(${name}(${given.join(',')}))`);
      expect(described).toBe(`not-affine function ${name}`);
    }
  });

  it('every listed function is known', () => {
    for (const name of [...Object.keys(affineFunctions), ...Object.keys(affineConditions)]) {
      expect(worksheetFunctions.has(name) || name === 'LET').toBe(true);
    }
  });
});

describe('cells that do not depend on decisions', () => {
  it('count with the value stored, whatever our own evaluation would be', () => {
    const { readings, warnings } = read(
      {
        D1: { formula: 'NOSUCH(B1)', value: 7 },
        D2: '=A1*D1',
        D3: { formula: 'B1+B2', value: 99 },
        D4: '=A1+D3',
      },
      ['D2', 'D4', 'D1'],
    );
    expect(readings[0]).toMatchObject({ form: { coefficients: [7] } });
    expect(readings[1]).toMatchObject({ form: { constant: 99 } });
    expect(readings[2]).toMatchObject({ kind: 'affine', form: { constant: 7, variables: [] } });
    expect(warnings).toEqual([]);
  });

  it('are worked out where nothing is stored', () => {
    const { readings } = read({ D1: '=B1+B2', D2: '=D1*A1' }, ['D2']);
    expect(readings[0]).toMatchObject({ form: { coefficients: [5] } });
  });

  it('are worked out anew where the clock is in them', () => {
    const { readings } = read(
      { D1: { formula: 'TODAY()', value: 1 }, D2: { formula: 'D1+1', value: 2 }, D3: '=A1+D2' },
      ['D3'],
    );
    expect(readings[0]).toMatchObject({ form: { constant: 46_359 } });
  });

  it('give texts, truth values, blanks and errors as they are', () => {
    const { readings } = read(
      {
        D1: 'at most',
        D2: true,
        D3: CellError.of('#N/A'),
        D4: { formula: '"a"&"b"' },
        D5: { formula: '1/0' },
      },
      ['D1', 'D2', 'D3', 'D4', 'D5', 'Z9'],
    );
    expect(readings).toEqual(
      ['at most', true, CellError.of('#N/A'), 'ab', CellError.of('#DIV/0!'), null].map((value) => ({
        kind: 'value',
        value,
      })),
    );
  });

  it('a text made of texts only is a value even where the formula mentions a decision', () => {
    const { readings, dependsOnDecisions } = read({ D1: { formula: 'IF(B1>1,"on",A1)' } }, ['D1']);
    expect(readings[0]).toEqual({ kind: 'value', value: 'on' });
    expect(dependsOnDecisions(cell('D1'))).toBe(true);
  });
});

describe('dependence on decisions', () => {
  it('is told by the formulas and not by today’s coefficients', () => {
    const { dependsOnDecisions } = read(
      { D1: '=A1*0', D2: '=D1', D3: '=B1', D4: '=SUMPRODUCT(A1:A3,{0;0;0})', D5: '=SUM(OFFSET(A1,1,0))' },
      [],
      { names: { Made: 'Plan!$A$1' } },
    );
    expect(
      ['A1', 'B1', 'D1', 'D2', 'D3', 'D4', 'D5', 'Z9'].map((text) => dependsOnDecisions(cell(text))),
    ).toEqual([true, false, true, true, false, true, true, false]);
  });

  it('holds through ranges that only calculation tells, tables, names and array formulas', () => {
    const { dependsOnDecisions } = read(
      {
        D1: { formula: 'OFFSET(C1,0,-2)' },
        D2: { formula: 'INDIRECT("A"&B1)' },
        D3: '=Made',
        E1: { formula: 'TRANSPOSE(A1:A3)', fills: 'E1:G1' },
        D5: '=G1',
        D6: { formula: 'LET(n,B1,INDIRECT("A"&n))' },
      },
      [],
      { names: { Made: 'Plan!$A$1' } },
    );
    expect(['D1', 'D2', 'D3', 'D5', 'D6'].map((text) => dependsOnDecisions(cell(text)))).toEqual([
      true,
      true,
      true,
      true,
      true,
    ]);
  });
});

describe('what refers to decisions in a roundabout way is not taken by its stored value', () => {
  it.each([
    ['a lambda called by its name', 'Priced(2)', [0, 2, 0, 0]],
    ['a lambda within a lambda', 'Doubled(3)', [0, 6, 0, 0]],
    ['a reference from a text within LET', 'LET(n,2,INDIRECT("A"&n))', [0, 0, 1, 0]],
    ['a range that is moved', 'SUM(OFFSET(C1,0,-2,2,1))', [0, 1, 1, 0]],
    ['a range between two found cells', 'SUM(INDEX(A:A,1):INDEX(A:A,2))', [0, 1, 1, 0]],
  ] as const)('%s', (_what, formula, expected) => {
    const { readings } = read({ D1: { formula, value: 12345 }, D2: '=D1' }, ['D2'], {
      names: { Priced: 'LAMBDA(x,x*Plan!$A$1)', Doubled: 'LAMBDA(y,2*Priced(y))' },
    });
    const [reading] = readings;
    expect(reading.kind).toBe('affine');
    const { form } = reading as Extract<typeof reading, { kind: 'affine' }>;
    const dense = [form.constant, 0, 0, 0];
    form.variables.forEach((variable, at) => (dense[variable + 1] = form.coefficients[at]));
    expect(dense).toEqual(expected);
  });

  it('a formula that cannot be read is refused though a value is stored beside it', () => {
    const { readings } = read({ D1: { formula: 'A1*', value: 5 }, D2: '=D1+1' }, ['D2']);
    expect(readings[0]).toMatchObject({
      kind: 'refused',
      issues: [{ code: 'formula-syntax', cell: cell('D1') }],
    });
  });
});

describe('circles', () => {
  it('are told with their cells, once, wherever they are met', () => {
    const { readings } = read({ D1: '=D3+A1', D2: '=D1*2', D3: '=D2-1', D4: '=D3' }, [
      'D1',
      'D2',
      'D3',
      'D4',
    ]);
    const issues = readings.flatMap((reading) => (reading.kind === 'refused' ? reading.issues : []));
    expect(new Set(issues).size).toBe(1);
    expect(issues[0].code).toBe('circular-reference');
    expect([...(issues[0].facts['cells'] as readonly string[])].sort()).toEqual([
      'Plan!D1',
      'Plan!D2',
      'Plan!D3',
    ]);
  });

  it('a cell that refers to itself is a circle of one', () => {
    const { readings } = read({ D1: '=SUM(D1:D3)+A1' }, ['D1']);
    expect(readings[0]).toMatchObject({
      issues: [{ code: 'circular-reference', facts: { cells: ['Plan!D1'] } }],
    });
  });

  it('a branch that is not taken makes no circle', () => {
    const { readings } = read({ D1: '=IF(B1>1,A1,D2)', D2: '=D1+1' }, ['D2', 'D1']);
    expect(readings[0]).toMatchObject({ kind: 'affine', form: { constant: 1, variables: [0] } });
  });

  it('names that lead to themselves end', () => {
    const { readings } = read({ D1: '=A1+Loop' }, ['D1'], { names: { Loop: 'Loop+1' } });
    expect(readings[0]).toMatchObject({ issues: [{ code: 'too-deep' }] });
  });

  it('names that each mention another twice end', () => {
    const names = Object.fromEntries(
      Array.from({ length: 60 }, (_name, at) => [
        `Step${at}x`,
        at === 0 ? '1' : `Step${at - 1}x+Step${at - 1}x`,
      ]),
    );
    const { readings } = read({ D1: '=A1+Step59x' }, ['D1'], { names });
    expect(readings[0]).toMatchObject({ issues: [{ code: 'too-deep' }] });
  });

  it('lambdas that call themselves end', () => {
    const { readings } = read({ D1: '=Loop(A1)' }, ['D1'], { names: { Loop: 'LAMBDA(x,Loop(x+1))' } });
    expect(readings[0]).toMatchObject({ issues: [{ code: 'too-deep' }] });
  });
});

describe('stored values against our own evaluation', () => {
  it('a value that the formula contradicts is told where it begins', () => {
    const { warnings } = read(
      {
        D1: { formula: 'A1+A2', value: 30 },
        D2: { formula: 'D1*2', value: 61 },
        D3: { formula: 'D2+1', value: 62 },
        D4: { formula: 'SUM(D1:D3)', value: 153 },
      },
      ['D4'],
    );
    expect(
      warnings.map(({ code, cell: at, facts }) => [code, at, facts['stored'], facts['evaluated']]),
    ).toEqual([['stored-value-differs', cell('D2'), 61, 60]]);
  });

  it('an average that leaves out a decision cell still blank is no contradiction, nor is what builds on it', () => {
    const { warnings } = read(
      { D1: { formula: 'AVERAGE(A1:A3)', value: 15 }, D2: { formula: 'D1+1', value: 16 } },
      ['D2'],
    );
    expect(warnings).toEqual([]);
  });

  it('rounding of another program is no contradiction', () => {
    const { warnings } = read({ D1: { formula: 'A1*0.1+A2*0.2', value: 5.000000000000002 } }, ['D1']);
    expect(warnings).toEqual([]);
  });
});
