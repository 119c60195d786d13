/**
 * Plans that cannot be solved as they are stated: each ends with 3, names its fault by code, cell and sentence, and
 * writes nothing. `check` says the same.
 */
import { WorkFolder } from '../../support/run-planrow';
import { tileWorksFile, type TileWorksChanges } from './tile-works-file';

const folder = new WorkFolder();
afterAll(() => folder.remove());

interface Fault {
  readonly what: string;
  readonly changes: TileWorksChanges;
  /** Code and cell of the first error. */
  readonly code: string;
  readonly cell: string | null;
}

const faults: readonly Fault[] = [
  { what: 'no sense', changes: { names: { 'Week.Sense': undefined } }, code: 'missing-sense', cell: null },
  {
    what: 'a sense nobody knows',
    changes: { names: { 'Week.Sense': '"best"' } },
    code: 'unknown-sense',
    cell: null,
  },
  {
    what: 'no objective',
    changes: { names: { 'Week.Objective': undefined } },
    code: 'missing-objective',
    cell: null,
  },
  {
    what: 'a gap in numbering',
    changes: { names: { 'Week.Decision3': 'Plan!$B$20' } },
    code: 'numbering-gap',
    cell: null,
  },
  {
    what: 'a name whose cells are gone',
    changes: { names: { 'Week.Constraint': 'Plan!#REF!' } },
    code: 'dead-name',
    cell: null,
  },
  {
    what: 'a name of another workbook',
    changes: { names: { 'Week.Upper': '[1]Plan!$A$1' } },
    code: 'external-name',
    cell: null,
  },
  {
    what: 'a decision cell with a formula',
    changes: { cells: { C5: '=1+1' } },
    code: 'decision-holds-formula',
    cell: 'Plan!C5',
  },
  {
    what: 'a decision cell with a text',
    changes: { cells: { C6: 'much' } },
    code: 'decision-holds-text',
    cell: 'Plan!C6',
  },
  {
    what: 'a text as right side',
    changes: { cells: { D11: 'ten' } },
    code: 'text-for-number',
    cell: 'Plan!D11',
  },
  {
    what: 'a number typed as text',
    changes: { cells: { D11: '10' } },
    code: 'text-looks-like-number',
    cell: 'Plan!D11',
  },
  {
    what: 'TRUE as right side',
    changes: { cells: { D11: true } },
    code: 'truth-value-for-number',
    cell: 'Plan!D11',
  },
  {
    what: 'an error value as right side',
    changes: { cells: { D11: { error: '#N/A' } } },
    code: 'error-value-for-number',
    cell: 'Plan!D11',
  },
  {
    what: 'a blank right side',
    changes: { cells: { D12: null } },
    code: 'blank-right-side',
    cell: 'Plan!D12',
  },
  { what: 'no relation', changes: { cells: { C12: null } }, code: 'missing-relation', cell: 'Plan!C12' },
  {
    what: 'a relation nobody knows',
    changes: { cells: { C12: 'about' } },
    code: 'unknown-relation',
    cell: 'Plan!C12',
  },
  { what: 'a bare <', changes: { cells: { C12: '<' } }, code: 'strict-relation', cell: 'Plan!C12' },
  {
    what: 'merged cells in a block',
    changes: { sheet: { merges: ['C5:C6'] } },
    code: 'merged-cells',
    cell: 'Plan!C5',
  },
  {
    what: 'a lower bound above the upper',
    changes: { cells: { E1: 5, E2: 4 }, names: { 'Week.Lower': 'Plan!$E$1', 'Week.Upper': 'Plan!$E$2' } },
    code: 'crossing-bounds',
    cell: 'Plan!E1',
  },
  {
    what: 'a product of decisions',
    changes: { cells: { C8: '=C5*C6' } },
    code: 'not-affine',
    cell: 'Plan!C8',
  },
  {
    what: 'a rounded decision',
    changes: { cells: { C8: '=ROUND(C5,0)+C6' } },
    code: 'not-affine',
    cell: 'Plan!C8',
  },
  {
    what: 'a circular reference',
    changes: { cells: { C8: '=C5+B8', B8: '=C8' } },
    code: 'circular-reference',
    cell: 'Plan!B8',
  },
  {
    what: 'an unknown function of a decision',
    changes: { cells: { C8: '=GLAZE(C5)+C6' } },
    code: 'unknown-function',
    cell: 'Plan!C8',
  },
  {
    what: 'a row that can never hold',
    changes: { cells: { B13: 0 } },
    code: 'impossible-row',
    cell: 'Plan!C13',
  },
  {
    what: 'a lot, as long as there are none',
    changes: { cells: { E1: 5 }, names: { 'Week.Lot': 'Plan!$E$1' } },
    code: 'lot-not-served',
    cell: 'Plan!E1',
  },
];

it('a lot is planned as any amount with --relax, and the report says so', () => {
  folder.write('relaxed.xlsx', tileWorksFile({ cells: { E1: 5 }, names: { 'Week.Lot': 'Plan!$E$1' } }));
  const { exitCode, json } = folder.runJson('solve', 'relaxed.xlsx', '--relax', '--out', 'relaxed-plan.xlsx');
  expect([exitCode, json.status]).toEqual([0, 'optimal']);
  expect(json.issues).toMatchObject([{ code: 'lot-dropped', severity: 'warning', cell: 'Plan!E1' }]);
});

describe.each(faults)('$what', ({ what, changes, code, cell }) => {
  const name = `${what.replace(/\W+/g, '-')}.xlsx`;

  it('ends with 3, is named by code, cell and sentence, and writes nothing', () => {
    folder.write(name, tileWorksFile(changes));
    const before = folder.list();
    const { exitCode, json, stderr } = folder.runJson('solve', name);
    const issues = json.issues as { code: string; severity: string; cell: string | null; message: string }[];
    const errors = issues.filter(({ severity }) => severity === 'error');
    expect([exitCode, stderr, json.status, json.plan]).toEqual([3, '', 'invalid', 'Week']);
    expect(errors[0]).toMatchObject({ code, cell });
    expect(errors[0].message).toMatch(/^[^{}]{20,400}[.?!]$/);
    expect([json.objective, json.written]).toEqual([null, null]);
    expect(folder.list()).toEqual(before);
  });
});

describe('planrow check', () => {
  it('says that a sound plan can be solved, and how large it is, and writes nothing', () => {
    folder.write('sound.xlsx', tileWorksFile());
    const before = folder.list();
    const { exitCode, json } = folder.runJson('check', 'sound.xlsx');
    expect(exitCode).toBe(0);
    expect(json).toEqual({
      status: 'valid',
      plan: 'Week',
      size: { decisions: 2, constraints: 3, nonzeros: 5, definingRows: 0 },
      issues: [],
    });
    expect(folder.run('check', 'sound.xlsx').stdout).toMatch(/can be solved/);
    expect(folder.list()).toEqual(before);
  });

  it('ends with 3 and all faults at once, for people too', () => {
    folder.write('faulty.xlsx', tileWorksFile({ cells: { C12: 'about', D13: null, C5: 'x' } }));
    const { exitCode, json } = folder.runJson('check', 'faulty.xlsx');
    expect([exitCode, json.status, json.size]).toEqual([3, 'invalid', null]);
    const errors = (json.issues as { severity: string; cell: string }[]).filter(
      ({ severity }) => severity === 'error',
    );
    expect(errors.map(({ cell }) => cell)).toEqual(['Plan!C5', 'Plan!C12', 'Plan!D13']);
    const { stdout, exitCode: forPeople } = folder.run('check', 'faulty.xlsx');
    expect(forPeople).toBe(3);
    expect(stdout).toMatch(/cannot be solved: 3 errors/);
    expect(stdout.match(/Error: /g)).toHaveLength(3);
  });

  it('allows warnings', () => {
    folder.write('warned.xlsx', tileWorksFile({ sheet: { hiddenRows: [12] } }));
    const { exitCode, json } = folder.runJson('check', 'warned.xlsx');
    expect([exitCode, json.status]).toEqual([0, 'valid']);
    expect((json.issues as { severity: string }[]).map(({ severity }) => severity)).toEqual(['warning']);
  });

  it('ends with 2 where there is no such plan or no such file', () => {
    folder.write('named.xlsx', tileWorksFile());
    const unknown = folder.runJson('check', 'named.xlsx', '--plan', 'Day');
    expect([unknown.exitCode, Object.keys(unknown.json)]).toEqual([2, ['status', 'plan', 'size', 'issues']]);
    expect(folder.runJson('check', 'gone.xlsx').exitCode).toBe(2);
  });
});
