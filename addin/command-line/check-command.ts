/**
 * `planrow check`: what is wrong with a plan, and how large it is. Solves nothing, writes nothing.
 */
import { nonzeroCount } from '#solver-core';
import { checkModel } from '../use-cases/check-model';
import { sentenceOfNoSuchPlan } from '../wording/report-wording';
import type { CheckArguments } from './arguments';
import type { CommandLineHost } from './command-line-host';
import { exitCodes, type ExitCode } from './exit-codes';
import { isMpsFileName, nameOfProblem, readMpsFile, refusalOfIntegers } from './mps-problem';
import { issueEntry } from './plan-report';
import type { CheckReport } from './solve-report';
import { UsageError } from './usage-error';

export interface CheckEnd {
  readonly exitCode: ExitCode;
  readonly report: CheckReport;
}

/** @throws UsageError, WorkbookError; InvalidProblemError for an MPS file that cannot be solved as stated */
export async function checkCommand(words: CheckArguments, host: CommandLineHost): Promise<CheckEnd> {
  return isMpsFileName(words.file) ? checkMpsFile(words) : checkWorkbook(words, host);
}

async function checkWorkbook(words: CheckArguments, host: CommandLineHost): Promise<CheckEnd> {
  const { workbook } = await host.openWorkbook(words.file);
  const checked = await checkModel({ workbook, planName: words.planName, today: host.today() });
  if (checked.kind === 'no-such-plan') {
    throw new UsageError(
      'no-such-plan',
      sentenceOfNoSuchPlan(checked.reason, checked.wanted, checked.planNames),
    );
  }
  const { isValid, planName, size, issues } = checked;
  return {
    exitCode: isValid ? exitCodes.optimal : exitCodes.invalid,
    report: {
      status: isValid ? 'valid' : 'invalid',
      plan: planName,
      size,
      issues: issues.map(issueEntry),
    },
  };
}

async function checkMpsFile(words: CheckArguments): Promise<CheckEnd> {
  if (words.planName !== null) {
    throw new UsageError('usage', 'An MPS file holds one problem: leave out --plan.');
  }
  const { problem, warnings } = await readMpsFile(words.file);
  const refusal = refusalOfIntegers(problem);
  return {
    exitCode: refusal.length === 0 ? exitCodes.optimal : exitCodes.invalid,
    report: {
      status: refusal.length === 0 ? 'valid' : 'invalid',
      plan: nameOfProblem(problem),
      size: {
        decisions: problem.columnCount,
        constraints: problem.rowCount,
        nonzeros: nonzeroCount(problem.matrix),
        definingRows: 0,
      },
      issues: [...refusal, ...warnings],
    },
  };
}
