/**
 * `planrow solve`: a plan of a workbook, or a problem in an MPS file, solved and reported.
 */
import { access } from 'node:fs/promises';
import path from 'node:path';
import type { Progress, SolveOptions } from '#solver-core';
import { formatCellAddress } from '../domain/sheet/cell-address';
import type { RunningSolve } from '../ports/solver';
import { WorkbookError } from '../ports/workbook';
import { solveModel, type InvalidModel, type SolvedModel } from '../use-cases/solve-model';
import {
  resultTexts,
  sentenceOfExistingFile,
  sentenceOfNoSuchPlan,
  signatureSentence,
} from '../wording/report-wording';
import type { SolveArguments } from './arguments';
import type { CommandLineHost, WorkbookFile } from './command-line-host';
import { exitCodes, type ExitCode } from './exit-codes';
import { isMpsFileName, nameOfProblem, readMpsFile, refusalOfIntegers, reportOfProblem } from './mps-problem';
import { issueEntry, reportOfPlan } from './plan-report';
import { ProgressLog } from './progress-log';
import type { ReportContext } from './report';
import { errorEntry, reportOfIssues, type SecondsEntry, type SolveReport } from './solve-report';
import { UsageError } from './usage-error';

export interface SolveEnd {
  readonly exitCode: ExitCode;
  readonly report: SolveReport;
  readonly context: ReportContext;
}

/** @throws UsageError, WorkbookError; InvalidProblemError for an MPS file that cannot be solved as stated */
export async function solveCommand(words: SolveArguments, host: CommandLineHost): Promise<SolveEnd> {
  return isMpsFileName(words.file) ? solveMpsFile(words, host) : solveWorkbook(words, host);
}

async function solveWorkbook(words: SolveArguments, host: CommandLineHost): Promise<SolveEnd> {
  const startedAt = host.clock();
  await refuseTarget(words);
  const file = await host.openWorkbook(words.file);
  const opening = host.clock() - startedAt;
  const control = new SolveControl(words, host);
  const outcome = await solveModel({
    workbook: file.workbook,
    solver: host.solver,
    planName: words.planName,
    options: optionsOf(words),
    keepDecisions: words.keepDecisions,
    texts: resultTexts,
    today: host.today(),
    clock: () => host.clock(),
    onProgress: (progress) => control.progress(progress),
    onStart: (running) => control.started(running),
  }).finally(() => control.ended());

  switch (outcome.kind) {
    case 'no-such-plan':
      throw new UsageError(
        'no-such-plan',
        sentenceOfNoSuchPlan(outcome.reason, outcome.wanted, outcome.planNames),
      );
    case 'invalid':
      return endOfInvalidPlan(words, outcome, secondsOf(outcome, opening, 0, host.clock() - startedAt));
    case 'solved': {
      control.log(outcome.result);
      const savingAt = host.clock();
      const saved = await save(file, outcome, words);
      const finishedAt = host.clock();
      const seconds = secondsOf(outcome, opening, finishedAt - savingAt, finishedAt - startedAt);
      return endOfSolvedPlan(words, file, outcome, saved, seconds);
    }
  }
}

/** The file written, null where there was nothing to write, or why it could not be written. */
type Saved = { readonly file: string | null } | { readonly failure: WorkbookError };

async function save(file: WorkbookFile, solved: SolvedModel, words: SolveArguments): Promise<Saved> {
  if (solved.writes === null) {
    return { file: null };
  }
  try {
    return { file: await file.save(solved.writes.plan, words.target) };
  } catch (error) {
    if (error instanceof WorkbookError) {
      return { failure: error };
    }
    throw error;
  }
}

function endOfSolvedPlan(
  words: SolveArguments,
  file: WorkbookFile,
  solved: SolvedModel,
  saved: Saved,
  seconds: SecondsEntry,
): SolveEnd {
  const isSaved = 'file' in saved;
  const report = reportOfPlan(solved, isSaved ? saved.file : null);
  const issues = [...report.issues];
  if (!isSaved) {
    issues.push(errorEntry(saved.failure.code, saved.failure.message));
  } else if (saved.file !== null && file.isSigned) {
    issues.push({ code: 'signature-lost', severity: 'warning', cell: null, message: signatureSentence });
  }
  const { model, writes } = solved;
  return {
    exitCode: isSaved ? exitCodes[solved.status] : exitCodes.usage,
    report: { ...report, seconds, issues },
    context: {
      file: path.basename(words.file),
      before: model.decisions.map((decision) => decision.before),
      objectiveCell: model.objectiveCell === null ? null : formatCellAddress(model.objectiveCell),
      writtenDecisionCount: writes?.decisionCount ?? 0,
      recalculatedCount: writes?.recalculatedCount ?? 0,
    },
  };
}

function endOfInvalidPlan(words: SolveArguments, outcome: InvalidModel, seconds: SecondsEntry): SolveEnd {
  const report = reportOfIssues('invalid', outcome.issues.map(issueEntry));
  return {
    exitCode: exitCodes.invalid,
    report: { ...report, plan: outcome.planName, seconds },
    context: contextWithoutCells(words),
  };
}

async function solveMpsFile(words: SolveArguments, host: CommandLineHost): Promise<SolveEnd> {
  if (words.planName !== null || words.target.kind !== 'beside') {
    throw new UsageError(
      'usage',
      'An MPS file holds one problem and nothing is written into it: leave out --plan, --out and --in-place.',
    );
  }
  const startedAt = host.clock();
  const { problem, warnings } = await readMpsFile(words.file);
  const readAt = host.clock();
  const refusal = words.relax ? [] : refusalOfIntegers(problem);
  if (refusal.length > 0) {
    const seconds = { read: readAt - startedAt, build: 0, solve: 0, write: null, total: readAt - startedAt };
    return {
      exitCode: exitCodes.invalid,
      report: {
        ...reportOfIssues('invalid', [...refusal, ...warnings]),
        plan: nameOfProblem(problem),
        seconds,
      },
      context: contextWithoutCells(words),
    };
  }
  const control = new SolveControl(words, host);
  const running = host.solver.start(problem, optionsOf(words), (progress) => control.progress(progress));
  control.started(running);
  const result = await running.result.finally(() => control.ended());
  control.log(result);
  const solvedAt = host.clock();
  const report = reportOfProblem(problem, result, warnings);
  const seconds = { read: readAt - startedAt, build: 0, solve: solvedAt - readAt, write: null };
  return {
    exitCode: exitCodes[result.status],
    report: { ...report, seconds: { ...seconds, total: host.clock() - startedAt } },
    context: contextWithoutCells(words),
  };
}

/** Refuses before any work what would be refused after it: a file that is there, or of another kind. */
async function refuseTarget(words: SolveArguments): Promise<void> {
  if (words.target.kind !== 'new-file') {
    return;
  }
  const { path: target } = words.target;
  const ending = path.extname(words.file).toLowerCase();
  if (path.extname(target).toLowerCase() !== ending) {
    throw new UsageError('usage', `${target} must end in ${ending}, as ${words.file} does.`);
  }
  const exists = await access(target).then(
    () => true,
    () => false,
  );
  if (exists) {
    throw new UsageError('file-exists', sentenceOfExistingFile(target));
  }
}

function optionsOf(words: SolveArguments): SolveOptions {
  return { presolve: words.presolve, relax: words.relax };
}

function secondsOf(
  outcome: SolvedModel | InvalidModel,
  opening: number,
  saving: number,
  total: number,
): SecondsEntry {
  const { read, build, solve, write } = outcome.times;
  return { read: opening + read, build, solve, write: write + saving, total };
}

function contextWithoutCells(words: SolveArguments): ReportContext {
  return {
    file: path.basename(words.file),
    before: null,
    objectiveCell: null,
    writtenDecisionCount: 0,
    recalculatedCount: 0,
  };
}

/** Time limit and progress lines of one solve. */
class SolveControl {
  private readonly lines: ProgressLog | undefined;
  private callOff: () => void = () => undefined;

  constructor(
    private readonly words: SolveArguments,
    private readonly host: CommandLineHost,
  ) {
    this.lines = words.log
      ? new ProgressLog(
          () => host.clock(),
          (line) => host.printError(line),
        )
      : undefined;
  }

  started(running: RunningSolve): void {
    const { timeLimit } = this.words;
    if (timeLimit === 0) {
      running.stop();
    } else if (timeLimit !== null) {
      this.callOff = this.host.runAfter(timeLimit, () => running.stop());
    }
    this.lines?.started();
  }

  progress(progress: Progress): void {
    this.lines?.progress(progress);
  }

  ended(): void {
    this.callOff();
  }

  log(result: { readonly status: string; readonly iterations: number }): void {
    this.lines?.ended(result.status, result.iterations);
  }
}
