/**
 * `planrow solve` on workbooks, run as a planner's shell runs it. Figures by hand: see tile-works-file.ts.
 */
import { XlsxWorkbook } from '../../../addin/adapters/xlsx-file/xlsx-workbook';
import { storedValue, type WorkbookSnapshot } from '../../../addin/domain/sheet/sheet-snapshot';
import { columnOfLetters } from '../../../addin/domain/sheet/cell-address';
import { WorkFolder } from '../../support/run-planrow';
import { tileWorksFile } from './tile-works-file';

const folder = new WorkFolder();
afterAll(() => folder.remove());

const read = async (name: string): Promise<WorkbookSnapshot> =>
  (await XlsxWorkbook.open(new Uint8Array(folder.read(name)), name)).read();

function held(workbook: WorkbookSnapshot, ...texts: string[]) {
  return texts.map((text) => {
    const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(text)!;
    return storedValue(workbook, { sheet: 'Plan', row: Number(row) - 1, column: columnOfLetters(letters) });
  });
}

const fields = {
  report: [
    'status',
    'plan',
    'sense',
    'objective',
    'bound',
    'gap',
    'iterations',
    'nodes',
    'seconds',
    'decisions',
    'constraints',
    'dualsOf',
    'conflict',
    'relaxation',
    'checks',
    'written',
    'issues',
  ],
  seconds: ['read', 'build', 'solve', 'write', 'total'],
  decision: ['name', 'cell', 'value', 'lower', 'upper', 'reducedCost', 'costFrom', 'costTo'],
  constraint: [
    'name',
    'cell',
    'leftSide',
    'relation',
    'rightSide',
    'lower',
    'upper',
    'slack',
    'dualValue',
    'dualMore',
    'dualLess',
    'validFrom',
    'validTo',
  ],
  checks: ['primal', 'dual', 'complementarity', 'workbookObjective'],
};

describe('an optimal plan', () => {
  it('ends with 0, prints every field of the JSON object, and stands in a new file beside the old one', async () => {
    const original = tileWorksFile();
    folder.write('week.xlsx', original);
    const { exitCode, json, stderr } = folder.runJson('solve', 'week.xlsx');
    expect([exitCode, stderr]).toEqual([0, '']);
    expect(Object.keys(json)).toEqual(fields.report);
    expect(Object.keys(json.seconds as object)).toEqual(fields.seconds);
    expect(json).toMatchObject({
      status: 'optimal',
      plan: 'Week',
      sense: 'maximise',
      objective: 26,
      bound: 26,
      gap: 0,
      nodes: null,
      dualsOf: 'plan',
      conflict: null,
      relaxation: null,
      issues: [],
    });
    const decisions = json.decisions as Record<string, unknown>[];
    expect(Object.keys(decisions[0])).toEqual(fields.decision);
    expect(decisions).toEqual([
      {
        name: 'Slate',
        cell: 'Plan!C5',
        value: 2,
        lower: 0,
        upper: null,
        reducedCost: 0,
        costFrom: null,
        costTo: null,
      },
      {
        name: 'Sand',
        cell: 'Plan!C6',
        value: 6,
        lower: 0,
        upper: null,
        reducedCost: 0,
        costFrom: null,
        costTo: null,
      },
    ]);
    const constraints = json.constraints as Record<string, unknown>[];
    expect(Object.keys(constraints[0])).toEqual(fields.constraint);
    expect(
      constraints.map(({ name, cell, leftSide, relation, rightSide, lower, upper }) => [
        name,
        cell,
        leftSide,
        relation,
        rightSide,
        lower,
        upper,
      ]),
    ).toEqual([
      ['Kiln hours', 'Plan!C11', 10, '<=', 10, null, 10],
      ['Press hours', 'Plan!C12', 8, '<=', 8, null, 8],
      ['Slate order', 'Plan!C13', 2, '>=', 1, 1, null],
    ]);
    expect(constraints.map(({ slack }) => slack)).toEqual([0, 0, 1]);
    (constraints.map(({ dualValue }) => dualValue) as number[]).forEach((dualValue, row) =>
      expect(dualValue).toBeCloseTo([1, 2, 0][row], 12),
    );
    const checks = json.checks as Record<string, number>;
    expect(Object.keys(checks)).toEqual(fields.checks);
    expect(checks.workbookObjective).toBe(26);
    expect(Math.max(checks.primal, checks.dual, checks.complementarity)).toBeLessThan(1e-9);
    expect(json.written).toEqual({
      file: 'week-planned.xlsx',
      blocks: [
        { name: 'Week.Before', cell: 'Plan!E5' },
        { name: 'Week.Optimum', cell: 'Plan!F5' },
        { name: 'Week.ReducedCost', cell: 'Plan!G5' },
        { name: 'Week.LeftSide', cell: 'Plan!F11' },
        { name: 'Week.Slack', cell: 'Plan!G11' },
        { name: 'Week.DualValue', cell: 'Plan!H11' },
      ],
    });
    expect(Buffer.compare(folder.read('week.xlsx'), original)).toBe(0);
    const planned = await read('week-planned.xlsx');
    expect(held(planned, 'C5', 'C6', 'C8', 'B11', 'E5', 'F5', 'F6', 'G13')).toEqual([
      2, 6, 26, 10, 1, 2, 6, 1,
    ]);
    expect(held(planned, 'F4', 'H10')).toEqual(['Optimum\nbest amount', 'Dual value\nworth of one more']);
  });

  it('takes the next number where the planned file exists', () => {
    folder.write('twice.xlsx', tileWorksFile());
    folder.write('twice-planned.xlsx', 'mine');
    const { json } = folder.runJson('solve', 'twice.xlsx');
    expect(json.written).toMatchObject({ file: 'twice-planned-2.xlsx' });
    expect(folder.runJson('solve', 'twice.xlsx').json.written).toMatchObject({
      file: 'twice-planned-3.xlsx',
    });
    expect(folder.read('twice-planned.xlsx').toString()).toBe('mine');
  });

  it('keeps the ending .xlsm', () => {
    folder.write('macro.xlsm', tileWorksFile());
    expect(folder.runJson('solve', 'macro.xlsm').json.written).toMatchObject({ file: 'macro-planned.xlsm' });
  });

  it('is told to people in a short report with status, figures, what was written and the caution', () => {
    folder.write('told.xlsx', tileWorksFile());
    const { exitCode, stdout, stderr } = folder.run('solve', 'told.xlsx');
    expect([exitCode, stderr]).toEqual([0, '']);
    expect(stdout).toMatch(/^Week in told\.xlsx\n/);
    expect(stdout).toMatch(/Optimal: /);
    expect(stdout).toMatch(/Objective +26 +\(maximise, Plan!C8\)/);
    expect(stdout).toMatch(/Slate +1 +2 +0\n/);
    expect(stdout).toMatch(/Kiln hours +10 +<= +10 +0 +1 +binding\n/);
    expect(stdout).toMatch(/Slate order +2 +>= +1 +1 +0\n/);
    expect(stdout).toMatch(/Slack \(left over\)/);
    expect(stdout).toMatch(/Written to told-planned\.xlsx/);
    expect(stdout).toMatch(/Plan!F5 +Week\.Optimum/);
    expect(stdout).toMatch(/A plan is advice/);
  });

  it('with --keep-decisions leaves the decision cells and what depends on them', async () => {
    folder.write('kept.xlsx', tileWorksFile());
    const { exitCode, json } = folder.runJson('solve', 'kept.xlsx', '--keep-decisions');
    expect([exitCode, json.objective]).toEqual([0, 26]);
    expect(json.checks).toMatchObject({ workbookObjective: 26 });
    const planned = await read('kept-planned.xlsx');
    expect(held(planned, 'C5', 'C6', 'C8', 'F5', 'F6')).toEqual([1, 1, 7, 2, 6]);
  });

  it('minimises where the sheet says so, with dual values of the sense stated', () => {
    // minimise 4 slate + 3 sand with sand + slate >= 3 and slate >= 1: 1 and 2, dual values 3 and 1.
    folder.write(
      'least.xlsx',
      tileWorksFile({ cells: { C12: '>=', D12: 3 }, names: { 'Week.Sense': '" Min "' } }),
    );
    const { json } = folder.runJson('solve', 'least.xlsx');
    expect(json).toMatchObject({ sense: 'minimise', objective: 10 });
    expect((json.constraints as { dualValue: number }[]).map(({ dualValue }) => dualValue)).toEqual([
      0, 3, 1,
    ]);
  });

  it('says the same without presolve', () => {
    folder.write('plain.xlsx', tileWorksFile());
    expect(folder.runJson('solve', 'plain.xlsx', '--no-presolve').json).toMatchObject({ objective: 26 });
  });

  it('with --log tells its progress on standard error and nothing more on standard output', () => {
    folder.write('log.xlsx', tileWorksFile());
    const { json, stderr } = folder.runJson('solve', 'log.xlsx', '--log');
    expect(json.status).toBe('optimal');
    expect(stderr).toMatch(/^[\d.]+ s {2}optimal {2}\d+ iterations?\n$/);
  });
});

describe('where it is written', () => {
  it('--out gives the name; an existing file is refused before anything is solved', () => {
    folder.write('out.xlsx', tileWorksFile());
    expect(folder.runJson('solve', 'out.xlsx', '--out', 'chosen.xlsx').json.written).toMatchObject({
      file: 'chosen.xlsx',
    });
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'out.xlsx', '--out', 'chosen.xlsx');
    expect(exitCode).toBe(2);
    expect(json).toMatchObject({ status: 'invalid', objective: null, written: null });
    expect((json.issues as { message: string }[])[0].message).toMatch(/chosen\.xlsx exists already/);
    expect(folder.list()).toEqual(before);
  });

  it('--out must keep the kind of file, so that it can be opened', () => {
    folder.write('kind.xlsx', tileWorksFile());
    expect(folder.runJson('solve', 'kind.xlsx', '--out', 'kind.csv').exitCode).toBe(2);
    expect(folder.list()).not.toContain('kind.csv');
  });

  it('--in-place writes into the file itself and leaves no backup behind', async () => {
    folder.write('same.xlsx', tileWorksFile());
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'same.xlsx', '--in-place');
    expect(exitCode).toBe(0);
    expect(json.written).toMatchObject({ file: 'same.xlsx' });
    expect(folder.list()).toEqual(before);
    expect(held(await read('same.xlsx'), 'C5', 'F6')).toEqual([2, 6]);
  });

  it('a folder that is not there ends with 2, tells the plan all the same, and leaves nothing behind', () => {
    folder.write('lost.xlsx', tileWorksFile());
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'lost.xlsx', '--out', 'nowhere/plan.xlsx');
    expect(exitCode).toBe(2);
    expect(json).toMatchObject({ status: 'optimal', objective: 26, written: null });
    expect((json.issues as { code: string }[])[0].code).toBe('write-failed');
    expect(folder.list()).toEqual(before);
  });
});

describe('a second solve of the written file', () => {
  it('refreshes the same columns and keeps what the planner typed over a result', async () => {
    folder.write('again.xlsx', tileWorksFile());
    folder.runJson('solve', 'again.xlsx', '--in-place');
    const workbook = await XlsxWorkbook.open(new Uint8Array(folder.read('again.xlsx')), 'again.xlsx');
    const cell = (text: string) => {
      const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(text)!;
      return { sheet: 'Plan', row: Number(row) - 1, column: columnOfLetters(letters) };
    };
    await workbook.apply([
      { kind: 'value', cell: cell('D12'), value: 9 },
      { kind: 'value', cell: cell('F6'), value: 4.5 },
    ]);
    folder.write('again.xlsx', workbook.bytes());
    // Press hours 9: slate 1, sand 8, objective 28.
    const { json } = folder.runJson('solve', 'again.xlsx', '--in-place');
    expect(json.objective).toBe(28);
    expect((json.issues as { code: string; cell: string }[]).map(({ code, cell: at }) => [code, at])).toEqual(
      [['kept-cell', 'Plan!F6']],
    );
    const again = await read('again.xlsx');
    expect(held(again, 'C5', 'C6', 'E5', 'E6', 'F5', 'F6', 'I5')).toEqual([1, 8, 2, 6, 1, 4.5, null]);
    expect(again.names.filter(({ name }) => name === 'Week.Optimum')).toHaveLength(1);
  });
});

describe('other ends', () => {
  it('4: infeasible, with names and cells but no values, and no file', () => {
    folder.write('tight.xlsx', tileWorksFile({ cells: { D13: 7 } }));
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'tight.xlsx');
    expect(exitCode).toBe(4);
    expect(Object.keys(json)).toEqual(fields.report);
    expect(json).toMatchObject({
      status: 'infeasible',
      objective: null,
      bound: null,
      gap: null,
      dualsOf: null,
      written: null,
    });
    expect((json.decisions as unknown[])[0]).toMatchObject({ name: 'Slate', cell: 'Plan!C5', value: null });
    expect((json.constraints as unknown[])[0]).toMatchObject({
      leftSide: null,
      slack: null,
      dualValue: null,
    });
    expect(folder.list()).toEqual(before);
    const { stdout } = folder.run('solve', 'tight.xlsx');
    expect(stdout).toMatch(/Infeasible/);
    expect(stdout).not.toMatch(/A plan is advice/);
  });

  it('5: unbounded, and no file', () => {
    folder.write('open.xlsx', tileWorksFile({ cells: { C11: '>=', C12: '>=' } }));
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'open.xlsx');
    expect([exitCode, json.status, json.objective]).toEqual([5, 'unbounded', null]);
    expect(folder.list()).toEqual(before);
  });

  it('6: stopped at once by a time limit of 0, and no file without a plan', () => {
    folder.write('late.xlsx', tileWorksFile());
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'late.xlsx', '--time-limit', '0');
    expect([exitCode, json.status, json.objective]).toEqual([6, 'stopped', null]);
    expect(folder.list()).toEqual(before);
    expect(folder.run('solve', 'late.xlsx', '--time-limit', '0').stdout).toMatch(/Stopped/);
  });

  it('7: imprecise where the workbook’s own arithmetic does not agree, with a warning, and written', () => {
    // The press hours count the results themselves: 8 before they stand there, 10 after.
    folder.write(
      'self.xlsx',
      tileWorksFile({
        cells: { D12: { formula: '8+COUNT(Week.Optimum)', value: 8 } },
        names: { 'Week.Optimum': 'Plan!$K$5:$K$6' },
      }),
    );
    const { exitCode, json } = folder.runJson('solve', 'self.xlsx');
    expect([exitCode, json.status]).toEqual([7, 'imprecise']);
    expect(json.written).toMatchObject({ file: 'self-planned.xlsx' });
    expect(json.issues as unknown[]).toMatchObject([
      { code: 'workbook-disagrees', severity: 'warning', cell: 'Plan!D12' },
    ]);
  });
});

describe('which plan', () => {
  const two = () =>
    tileWorksFile({
      names: {
        'Night.Decision': 'Plan!$C$5:$C$6',
        'Night.Objective': 'Plan!$C$8',
        'Night.Sense': '"minimise"',
        'Night.Constraint': 'Plan!$B$13:$D$13',
      },
    });

  it('must be said where there are several, and is found without regard to case', () => {
    folder.write('two.xlsx', two());
    const unsaid = folder.runJson('solve', 'two.xlsx');
    expect(unsaid.exitCode).toBe(2);
    expect(unsaid.json).toMatchObject({ status: 'invalid', plan: null });
    expect((unsaid.json.issues as { message: string }[])[0].message).toMatch(/Night.*Week/);
    const { json } = folder.runJson('solve', 'two.xlsx', '--plan', 'night');
    expect(json).toMatchObject({ plan: 'Night', objective: 4 });
  });

  it('must exist: an unknown one and none at all end with 2 and the names there are', () => {
    folder.write('one.xlsx', tileWorksFile());
    const unknown = folder.runJson('solve', 'one.xlsx', '--plan', 'Day');
    expect(unknown.exitCode).toBe(2);
    expect((unknown.json.issues as { message: string }[])[0].message).toMatch(/Day.*Week/);
    folder.write('none.xlsx', tileWorksFile({ names: { 'Week.Decision': undefined } }));
    const none = folder.runJson('solve', 'none.xlsx');
    expect(none.exitCode).toBe(2);
    expect((none.json.issues as { code: string }[])[0].code).toBe('no-such-plan');
  });
});
