/**
 * `planrow` on MPS files, on files that are no workbooks, and with words it does not know.
 */
import { gzipSync } from 'node:zlib';
import { WorkFolder } from '../../support/run-planrow';
import { tileWorksFile } from './tile-works-file';

const folder = new WorkFolder();
afterAll(() => folder.remove());

/** The tile works' week, by hand: slate 2, sand 6, objective 26 (maximised), dual values kiln 1, press 2. */
const mps = `NAME          TILES
OBJSENSE
    MAX
ROWS
 N  PROFIT
 L  KILN
 L  PRESS
 G  MIX
 N  SPARE
COLUMNS
    SLATE     PROFIT             4.0   KILN               2.0
    SLATE     PRESS              1.0   MIX                1.0
    SAND      PROFIT             3.0   KILN               1.0
    SAND      PRESS              1.0   SPARE              1.0
RHS
    RHS       KILN              10.0   PRESS              8.0
    RHS       MIX                1.0
RANGES
    RNG       MIX                9.0
BOUNDS
 UP BND       SLATE              6.0
ENDATA
`;

const integers = mps
  .replace(
    '    SLATE     PROFIT',
    "    MARKER                 'MARKER'                 'INTORG'\n    SLATE     PROFIT",
  )
  .replace(
    '    SAND      PROFIT',
    "    MARKER                 'MARKER'                 'INTEND'\n    SAND      PROFIT",
  );

describe('an MPS file', () => {
  it('is solved and reported by the names it gives; nothing is written', () => {
    folder.write('tiles.mps', mps);
    const before = folder.list();
    const { exitCode, json } = folder.runJson('solve', 'tiles.mps');
    expect(exitCode).toBe(0);
    expect(json).toMatchObject({
      status: 'optimal',
      plan: 'TILES',
      sense: 'maximise',
      objective: 26,
      written: null,
    });
    expect(json.decisions).toMatchObject([
      { name: 'SLATE', cell: null, value: 2, lower: 0, upper: 6 },
      { name: 'SAND', cell: null, value: 6, lower: 0, upper: null },
    ]);
    // MIX is slate between 1 and 10: slate 2 is 1 away from the nearer end.
    expect(json.constraints).toMatchObject([
      {
        name: 'KILN',
        cell: null,
        leftSide: 10,
        relation: '<=',
        rightSide: 10,
        lower: null,
        upper: 10,
        slack: 0,
      },
      { name: 'PRESS', leftSide: 8, relation: '<=', rightSide: 8, slack: 0 },
      {
        name: 'MIX',
        leftSide: 2,
        relation: 'range',
        rightSide: null,
        lower: 1,
        upper: 10,
        slack: 1,
        dualValue: 0,
      },
    ]);
    const duals = (json.constraints as { dualValue: number }[]).map(({ dualValue }) => dualValue);
    expect(duals[0]).toBeCloseTo(1, 12);
    expect(duals[1]).toBeCloseTo(2, 12);
    expect(json.checks).toMatchObject({ workbookObjective: null });
    expect(json.issues as { code: string; severity: string }[]).toMatchObject([
      { code: 'ignored-free-row', severity: 'warning' },
    ]);
    expect(folder.list()).toEqual(before);
  });

  it('may be packed', () => {
    folder.write('packed.mps.gz', gzipSync(mps));
    expect(folder.runJson('solve', 'packed.mps.gz').json).toMatchObject({ objective: 26 });
  });

  it('is told to people as well, with both limits of a ranged row', () => {
    folder.write('told.mps', mps);
    const { exitCode, stdout } = folder.run('solve', 'told.mps');
    expect(exitCode).toBe(0);
    expect(stdout).toMatch(/^TILES in told\.mps/);
    expect(stdout).toMatch(/MIX +2 +range +1 to 10 +1 +0\n/);
  });

  it('is checked for its size', () => {
    folder.write('size.mps', mps);
    expect(folder.runJson('check', 'size.mps')).toMatchObject({
      exitCode: 0,
      json: {
        status: 'valid',
        plan: 'TILES',
        size: { decisions: 2, constraints: 3, nonzeros: 5, definingRows: 0 },
      },
    });
  });

  it('with whole-number demands is refused, and solved without them with --relax', () => {
    folder.write('whole.mps', integers);
    const { exitCode, json } = folder.runJson('solve', 'whole.mps');
    expect([exitCode, json.status]).toEqual([3, 'invalid']);
    expect((json.issues as { code: string; message: string }[])[0]).toMatchObject({
      code: 'integers-not-supported',
    });
    expect((json.issues as { message: string }[])[0].message).toMatch(/--relax/);
    expect(folder.runJson('solve', 'whole.mps', '--relax').json).toMatchObject({
      status: 'optimal',
      objective: 26,
    });
    expect(folder.runJson('check', 'whole.mps').exitCode).toBe(3);
  });

  it.each([
    ['--plan', ['--plan', 'Week']],
    ['--out', ['--out', 'x.mps']],
    ['--in-place', ['--in-place']],
  ])('takes no %s', (_flag, words) => {
    folder.write('flags.mps', mps);
    expect(folder.runJson('solve', 'flags.mps', ...words).exitCode).toBe(2);
  });

  it.each([
    ['an unknown section', mps.replace('RANGES', 'RNAGES')],
    ['a number that is none', mps.replace('4.0', '4,0')],
    ['NaN', mps.replace('4.0', 'NaN')],
    ['a row twice', mps.replace(' L  PRESS', ' L  KILN')],
    ['no end', mps.replace('ENDATA\n', '')],
    ['nothing', ''],
  ])('with %s ends with 2 and a sentence that names the line', (_what, text) => {
    folder.write('bad.mps', text);
    const { exitCode, json } = folder.runJson('solve', 'bad.mps');
    expect([exitCode, json.status, json.written]).toEqual([2, 'invalid', null]);
    expect((json.issues as { message: string }[])[0].message).toMatch(/bad\.mps: Line \d+: .+\.$/);
  });

  it('with bounds that cross ends with 3', () => {
    folder.write(
      'crossed.mps',
      mps.replace(
        ' UP BND       SLATE              6.0',
        ' UP BND       SLATE              6.0\n LO BND       SLATE              7.0',
      ),
    );
    const { exitCode, json } = folder.runJson('solve', 'crossed.mps');
    expect([exitCode, (json.issues as { code: string }[])[0].code]).toEqual([3, 'crossing-bounds']);
  });

  it('that is not packed as its name says ends with 2', () => {
    folder.write('plain.mps.gz', mps);
    expect(folder.runJson('solve', 'plain.mps.gz').exitCode).toBe(2);
  });
});

describe('a file that is no workbook', () => {
  it.each([
    ['missing.xlsx', undefined],
    ['text.xlsx', 'just a text'],
    ['empty.xlsx', ''],
    ['cut.xlsx', 'cut'],
    ['notes.txt', 'just a text'],
  ])('%s ends with 2, with JSON and a sentence', (name, content) => {
    if (content !== undefined) {
      folder.write(name, content === 'cut' ? tileWorksFile().slice(0, 400) : content);
    }
    const before = folder.list();
    const { exitCode, json, stderr } = folder.runJson('solve', name);
    expect([exitCode, stderr, json.status]).toEqual([2, '', 'invalid']);
    expect((json.issues as { severity: string; cell: null; message: string }[])[0]).toMatchObject({
      severity: 'error',
      cell: null,
      message: expect.stringMatching(/^[^{}]{20,}[.?!]$/) as string,
    });
    expect(folder.list()).toEqual(before);
    const forPeople = folder.run('solve', name);
    expect([forPeople.exitCode, forPeople.stdout]).toEqual([2, '']);
    expect(forPeople.stderr).toMatch(/^planrow: .+\n$/);
  });
});

describe('words', () => {
  it('that are not known end with 2, also with JSON', () => {
    const { exitCode, json } = folder.runJson('solve', 'week.xlsx', '--fast');
    expect([exitCode, json.status]).toEqual([2, 'invalid']);
    expect((json.issues as { code: string; message: string }[])[0]).toMatchObject({ code: 'usage' });
    expect(folder.run().exitCode).toBe(2);
    expect(folder.run('optimise').stderr).toMatch(/^planrow: /);
  });

  it('--help and --version end with 0', () => {
    const help = folder.run('solve', '--help');
    expect([help.exitCode, help.stderr]).toEqual([0, '']);
    expect(help.stdout).toMatch(/--keep-decisions/);
    expect(folder.run('--version').stdout).toMatch(/^\d+\.\d+\.\d+\n$/);
  });
});
