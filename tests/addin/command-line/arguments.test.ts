/** The words of the command line taken apart. */
import packageDescription from '../../../package.json';
import { readArguments } from '../../../addin/command-line/arguments';
import { UsageError } from '../../../addin/command-line/usage-error';
import { version } from '../../../addin/command-line/version';

const read = (...words: string[]) => readArguments(words, version);

it('solve without flags takes the only plan and saves beside the file', () => {
  expect(read('solve', 'week.xlsx')).toEqual({
    command: 'solve',
    file: 'week.xlsx',
    planName: null,
    target: { kind: 'beside' },
    keepDecisions: false,
    json: false,
    log: false,
    timeLimit: null,
    presolve: true,
    relax: false,
  });
});

it('solve takes every flag, before or after the file', () => {
  expect(
    read(
      'solve',
      '--plan',
      'Night shift',
      '--json',
      'a.xlsx',
      '--out',
      'b.xlsx',
      '--keep-decisions',
      '--log',
      '--time-limit',
      '1.5',
      '--no-presolve',
      '--relax',
    ),
  ).toEqual({
    command: 'solve',
    file: 'a.xlsx',
    planName: 'Night shift',
    target: { kind: 'new-file', path: 'b.xlsx' },
    keepDecisions: true,
    json: true,
    log: true,
    timeLimit: 1.5,
    presolve: false,
    relax: true,
  });
  expect(read('solve', 'a.xlsx', '--in-place')).toMatchObject({ target: { kind: 'in-place' } });
});

it('check takes a plan and --json', () => {
  expect(read('check', 'a.xlsm', '--plan', 'Week', '--json')).toEqual({
    command: 'check',
    file: 'a.xlsm',
    planName: 'Week',
    json: true,
  });
});

it.each([
  ['no words at all', [], /planrow solve week\.xlsx/],
  ['an unknown command', ['optimise', 'a.xlsx'], /[Uu]nknown command 'optimise'/],
  ['no file', ['solve'], /file/],
  ['two files', ['solve', 'a.xlsx', 'b.xlsx'], /[Tt]oo many arguments/],
  ['an unknown flag', ['solve', 'a.xlsx', '--fast'], /--fast/],
  ['a time limit that is no number', ['solve', 'a.xlsx', '--time-limit', 'soon'], /number of seconds/],
  ['a negative time limit', ['solve', 'a.xlsx', '--time-limit', '-1'], /number of seconds/],
  ['--out and --in-place', ['solve', 'a.xlsx', '--out', 'b.xlsx', '--in-place'], /not both/],
  ['a flag of solve given to check', ['check', 'a.xlsx', '--in-place'], /--in-place/],
])('%s is a usage error that says so', (_what, words, sentence) => {
  expect(() => read(...words)).toThrow(UsageError);
  expect(() => read(...words)).toThrow(sentence);
});

it('--help shows both commands and examples, solve --help every flag and exit code', () => {
  const help = read('--help');
  expect(help).toMatchObject({ command: 'show' });
  const text = (help as { text: string }).text;
  expect(text).toMatch(/solve/);
  expect(text).toMatch(/planrow check week\.xlsx/);
  const solveHelp = (read('solve', '--help') as { text: string }).text;
  for (const flag of [
    '--plan',
    '--out',
    '--in-place',
    '--keep-decisions',
    '--json',
    '--log',
    '--time-limit',
    '--no-presolve',
    '--relax',
  ]) {
    expect(solveHelp).toContain(flag);
  }
  expect(solveHelp).toMatch(/7 imprecise/);
});

it('--version shows the version of package.json', () => {
  expect(read('--version')).toEqual({ command: 'show', text: `${packageDescription.version}\n` });
});
