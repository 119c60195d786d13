/**
 * One run of the command line: words in, text out, an exit code. Whatever happens, `--json` prints one object.
 */
import { InvalidProblemError } from '#solver-core';
import { WorkbookError } from '../ports/workbook';
import { bugSentence } from '../wording/report-wording';
import { readArguments, type CommandLineArguments } from './arguments';
import { checkCommand } from './check-command';
import type { CommandLineHost } from './command-line-host';
import { exitCodes, type ExitCode } from './exit-codes';
import { checkReportJson, solveReportJson } from './json-output';
import { checkReportText, solveReportText } from './report';
import { solveCommand } from './solve-command';
import { errorEntry, reportOfIssues, type CheckReport, type ReportStatus } from './solve-report';
import { UsageError } from './usage-error';
import { version } from './version';

export async function runCommandLine(words: readonly string[], host: CommandLineHost): Promise<ExitCode> {
  try {
    return await carryOut(readArguments(words, version), host);
  } catch (error) {
    return reportFailure(words, error, host);
  }
}

async function carryOut(command: CommandLineArguments, host: CommandLineHost): Promise<ExitCode> {
  switch (command.command) {
    case 'show':
      host.print(command.text);
      return exitCodes.optimal;
    case 'solve': {
      const { exitCode, report, context } = await solveCommand(command, host);
      host.print(command.json ? solveReportJson(report) : solveReportText(report, context));
      return exitCode;
    }
    case 'check': {
      const { exitCode, report } = await checkCommand(command, host);
      host.print(command.json ? checkReportJson(report) : checkReportText(report, command.file));
      return exitCode;
    }
  }
}

/** What ended a run before there was anything to report: exit 2, 3 or, for a bug of ours, 1. */
function reportFailure(words: readonly string[], error: unknown, host: CommandLineHost): ExitCode {
  const failure = describeFailure(error);
  if (words.includes('--json')) {
    const entry = errorEntry(failure.code, failure.message);
    const checkReport: CheckReport = {
      status: failure.status === null ? null : 'invalid',
      plan: null,
      size: null,
      issues: [entry],
    };
    host.print(
      words[0] === 'check'
        ? checkReportJson(checkReport)
        : solveReportJson(reportOfIssues(failure.status, [entry])),
    );
  }
  if (!words.includes('--json') || failure.exitCode === exitCodes.bug) {
    host.printError(`planrow: ${failure.text}\n`);
  }
  return failure.exitCode;
}

interface Failure {
  readonly exitCode: ExitCode;
  readonly status: ReportStatus | null;
  readonly code: string;
  readonly message: string;
  /** For standard error. */
  readonly text: string;
}

function describeFailure(error: unknown): Failure {
  if (error instanceof UsageError || error instanceof WorkbookError) {
    const { code, message } = error;
    return { exitCode: exitCodes.usage, status: 'invalid', code, message, text: message };
  }
  if (error instanceof InvalidProblemError) {
    const { code, message } = error;
    return { exitCode: exitCodes.invalid, status: 'invalid', code, message, text: message };
  }
  const detail = error instanceof Error ? (error.stack ?? error.message) : String(error);
  return {
    exitCode: exitCodes.bug,
    status: null,
    code: 'bug',
    message: `${bugSentence} ${error instanceof Error ? error.message : String(error)}`,
    text: `${bugSentence}\n${detail}`,
  };
}
