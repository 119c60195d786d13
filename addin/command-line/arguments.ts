/**
 * The words of the command line, taken apart: which command, which file, which flags.
 */
import { Command, CommanderError, InvalidArgumentError } from 'commander';
import { UsageError } from './usage-error';

/** Where a solved workbook goes. */
export type SaveTarget =
  /** `NAME-planned.xlsx` beside the file, numbered if it exists. */
  | { readonly kind: 'beside' }
  /** A new file of this name. */
  | { readonly kind: 'new-file'; readonly path: string }
  /** The file itself. */
  | { readonly kind: 'in-place' };

export interface SolveArguments {
  readonly command: 'solve';
  readonly file: string;
  /** null: the workbook's only plan. */
  readonly planName: string | null;
  readonly target: SaveTarget;
  readonly keepDecisions: boolean;
  readonly json: boolean;
  readonly log: boolean;
  /** Seconds; null for no limit. */
  readonly timeLimit: number | null;
  readonly presolve: boolean;
  readonly relax: boolean;
}

export interface CheckArguments {
  readonly command: 'check';
  readonly file: string;
  readonly planName: string | null;
  readonly json: boolean;
}

/** Help or the version was asked for: the text to print. */
export interface ShownText {
  readonly command: 'show';
  readonly text: string;
}

export type CommandLineArguments = SolveArguments | CheckArguments | ShownText;

interface SolveFlags {
  readonly plan?: string;
  readonly out?: string;
  readonly inPlace?: boolean;
  readonly keepDecisions?: boolean;
  readonly json?: boolean;
  readonly log?: boolean;
  readonly timeLimit?: number;
  readonly presolve: boolean;
  readonly relax?: boolean;
}

/**
 * @param words without the program's own name
 * @throws UsageError
 */
export function readArguments(words: readonly string[], version: string): CommandLineArguments {
  let shown = '';
  let read: CommandLineArguments | undefined;
  const program = describeCommands(version, (result) => (read = result));
  for (const command of [program, ...program.commands]) {
    command.exitOverride().configureOutput({
      writeOut: (text) => (shown += text),
      // Usage errors are thrown, and reported once, by whoever called.
      writeErr: () => undefined,
    });
  }
  if (words.length === 0) {
    throw new UsageError(
      'usage',
      `Say what to do, for example: planrow solve week.xlsx\n\n${program.helpInformation()}`,
    );
  }
  try {
    program.parse(words, { from: 'user' });
  } catch (error) {
    if (!(error instanceof CommanderError)) {
      throw error;
    }
    if (error.exitCode !== 0) {
      throw new UsageError('usage', `${sentence(error.message)} See planrow --help.`);
    }
  }
  return read ?? { command: 'show', text: `${shown.trimEnd()}\n` };
}

function describeCommands(version: string, give: (result: CommandLineArguments) => void): Command {
  const program = new Command('planrow')
    .description('Finds the best plan in the workbook you already keep, and writes it beside your numbers.')
    .version(version, '--version', 'print the version')
    .helpOption('--help', 'print this help')
    .helpCommand(false)
    .addHelpText(
      'after',
      `
Examples:
  planrow check week.xlsx                      what is wrong with the plan, if anything
  planrow solve week.xlsx                      best plan, written to week-planned.xlsx
  planrow solve week.xlsx --plan Night         one plan of several
  planrow solve week.xlsx --in-place --json    the file itself, result as JSON
  planrow solve afiro.mps                      a problem in an MPS file

Run planrow solve --help for every flag and exit code.`,
    );

  program
    .command('solve')
    .description('Find the best plan and write optimum, slack and dual values into new columns.')
    .argument('<file>', '.xlsx or .xlsm workbook, or .mps or .mps.gz problem')
    .option('--plan <name>', 'which plan, where the workbook holds several')
    .option('--out <file>', 'name of the new workbook (default: NAME-planned.xlsx beside it)')
    .option('--in-place', 'write into the workbook itself')
    .option('--keep-decisions', 'leave the decision cells as they are')
    .option('--json', 'print one JSON object instead of the report')
    .option('--log', 'print progress to standard error, a short line a second')
    .option('--time-limit <seconds>', 'stop after this time with the best plan so far', readSeconds)
    .option('--no-presolve', 'solve the problem as stated, without reducing it first')
    .option('--relax', 'drop whole-number demands')
    .helpOption('--help', 'print this help')
    .addHelpText(
      'after',
      `
Nothing is ever written over without --in-place.

Exit codes:
  0 optimal        1 a bug           2 usage, unreadable file, no such plan
  3 plan has errors                  4 infeasible      5 unbounded
  6 stopped at a limit               7 imprecise

Examples:
  planrow solve week.xlsx
  planrow solve week.xlsx --plan Night --out night.xlsx
  planrow solve week.xlsx --time-limit 60 --log
  planrow solve afiro.mps.gz --json`,
    )
    .action((file: string, flags: SolveFlags) => give(solveArguments(file, flags)));

  program
    .command('check')
    .description('Report what is wrong with a plan and how large it is. Solves nothing, writes nothing.')
    .argument('<file>', '.xlsx or .xlsm workbook, or .mps or .mps.gz problem')
    .option('--plan <name>', 'which plan, where the workbook holds several')
    .option('--json', 'print one JSON object instead of the report')
    .helpOption('--help', 'print this help')
    .addHelpText(
      'after',
      `
Exit codes: 0 can be solved (warnings allowed), 2 usage or unreadable file, 3 plan has errors.

Example:
  planrow check week.xlsx --plan Night`,
    )
    .action((file: string, flags: { plan?: string; json?: boolean }) =>
      give({ command: 'check', file, planName: flags.plan ?? null, json: flags.json ?? false }),
    );
  return program;
}

function solveArguments(file: string, flags: SolveFlags): SolveArguments {
  if (flags.out !== undefined && flags.inPlace === true) {
    throw new UsageError('usage', 'Give --out or --in-place, not both.');
  }
  return {
    command: 'solve',
    file,
    planName: flags.plan ?? null,
    target:
      flags.inPlace === true
        ? { kind: 'in-place' }
        : flags.out === undefined
          ? { kind: 'beside' }
          : { kind: 'new-file', path: flags.out },
    keepDecisions: flags.keepDecisions ?? false,
    json: flags.json ?? false,
    log: flags.log ?? false,
    timeLimit: flags.timeLimit ?? null,
    presolve: flags.presolve,
    relax: flags.relax ?? false,
  };
}

function readSeconds(text: string): number {
  const seconds = Number(text);
  if (text.trim() === '' || !Number.isFinite(seconds) || seconds < 0) {
    throw new InvalidArgumentError('It must be a number of seconds, such as 60.');
  }
  return seconds;
}

/** commander's own message as a sentence: no `error:` before it, a capital, a full stop. */
function sentence(message: string): string {
  const bare = message
    .replace(/^error: /, '')
    .replace(/\s+/g, ' ')
    .trim();
  const start = bare.charAt(0).toUpperCase() + bare.slice(1);
  return /[.?!)]$/.test(start) ? start : `${start}.`;
}
