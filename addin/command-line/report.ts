/**
 * The report for people: status in words, objective, decisions, constraint rows with slack and dual value, what was
 * written where, issues. Long lists are cut with a count; --json has them whole.
 */
import { termWithGloss } from '../wording/glosses';
import { caution } from '../wording/report-wording';
import { statusSentence } from '../wording/status-sentences';
import { columnTexts, countedNoun, numberText, secondsText } from './number-texts';
import type { CheckReport, ConstraintEntry, DecisionEntry, IssueEntry, SolveReport } from './solve-report';
import { tableLines } from './text-table';

/** Rows of a list that a screen can carry. */
const longestList = 40;

/** What the report knows besides the fields that JSON has. */
export interface ReportContext {
  /** Name of the file read. */
  readonly file: string;
  /** What each decision cell held before; null for a problem without cells. */
  readonly before: readonly (number | null)[] | null;
  /** The cell of the objective, where it has one. */
  readonly objectiveCell: string | null;
  /** Decision cells that received their optimum. */
  readonly writtenDecisionCount: number;
  /** Formulas whose stored value was renewed. */
  readonly recalculatedCount: number;
}

export function solveReportText(report: SolveReport, context: ReportContext): string {
  const hasPlan = report.objective !== null;
  const title = report.plan === null ? context.file : `${report.plan} in ${context.file}`;
  const lines = [title, ''];
  if (report.status !== null) {
    lines.push(statusSentence(report.status, hasPlan), '');
  }
  const figures = figureLines(report, context);
  if (figures.length > 0) {
    lines.push(...figures, '');
  }
  if (hasPlan) {
    lines.push(...decisionLines(report.decisions, context.before), '');
    if (report.constraints.length > 0) {
      lines.push(...constraintLines(report.constraints), '');
    }
  }
  lines.push(...writtenLines(report, context), ...issueLines(report.issues));
  if (hasPlan) {
    lines.push(caution);
  }
  return `${lines.join('\n').trimEnd()}\n`;
}

export function checkReportText(report: CheckReport, file: string): string {
  const lines = [report.plan === null ? file : `${report.plan} in ${file}`, ''];
  const errorCount = report.issues.filter((issue) => issue.severity === 'error').length;
  const warningCount = report.issues.length - errorCount;
  const found = [
    ...(errorCount > 0 ? [countedNoun(errorCount, 'error')] : []),
    ...(warningCount > 0 ? [countedNoun(warningCount, 'warning')] : []),
  ].join(' and ');
  if (report.status === 'valid') {
    lines.push(`The plan can be solved${found === '' ? '' : ` (${found})`}.`, '');
  } else {
    lines.push(`The plan cannot be solved: ${found}.`, '');
  }
  if (report.size !== null) {
    const { decisions, constraints, nonzeros, definingRows } = report.size;
    const further = definingRows === 0 ? '' : `, ${countedNoun(definingRows, 'defining row')}`;
    lines.push(
      `  Size   ${countedNoun(decisions, 'decision')}, ${countedNoun(constraints, 'constraint row')}, ` +
        `${countedNoun(nonzeros, 'coefficient')} other than 0${further}`,
      '',
    );
  }
  lines.push(...issueLines(report.issues));
  return `${lines.join('\n').trimEnd()}\n`;
}

/** Errors and warnings, one a paragraph. */
export function issueLines(issues: readonly IssueEntry[]): string[] {
  if (issues.length === 0) {
    return [];
  }
  const lines = issues.slice(0, longestList).map(({ severity, message }) => {
    return `  ${severity === 'error' ? 'Error' : 'Warning'}: ${message}`;
  });
  return [...lines, ...cutLine(issues.length), ''];
}

function figureLines(report: SolveReport, context: ReportContext): string[] {
  const figures: [string, string][] = [];
  if (report.objective !== null) {
    const of = [report.sense ?? '', context.objectiveCell ?? ''].filter((text) => text !== '').join(', ');
    figures.push(['Objective', `${numberText(report.objective)}   (${of})`]);
  }
  if (report.status === 'stopped' && report.bound !== null) {
    const gap = report.gap === null ? '' : `   (gap ${numberText(report.gap * 100)} %)`;
    figures.push(['Bound', `${numberText(report.bound)}${gap}`]);
  }
  if (report.decisions.length > 0) {
    const rows = countedNoun(report.constraints.length, 'constraint row');
    figures.push(['Size', `${countedNoun(report.decisions.length, 'decision')}, ${rows}`]);
  }
  if (report.iterations !== null && report.seconds.solve !== null) {
    const whole = report.seconds.total === null ? '' : ` (${secondsText(report.seconds.total)} in all)`;
    figures.push([
      'Solved in',
      `${secondsText(report.seconds.solve)}, ${countedNoun(report.iterations, 'iteration')}${whole}`,
    ]);
  }
  const width = Math.max(0, ...figures.map(([name]) => name.length));
  return figures.map(([name, text]) => `  ${name.padEnd(width)}   ${text}`);
}

function decisionLines(
  decisions: readonly DecisionEntry[],
  before: readonly (number | null)[] | null,
): string[] {
  const shown = decisions.slice(0, longestList);
  const numbers = (heading: string, values: readonly (number | null)[]) => ({
    heading,
    cells: columnTexts(values),
    isNumber: true,
  });
  return [
    ...tableLines([
      { heading: 'Decisions', cells: shown.map(({ name }) => name), isNumber: false },
      ...(before === null ? [] : [numbers('Before', before.slice(0, longestList))]),
      numbers(
        'Optimum',
        shown.map(({ value }) => value),
      ),
      numbers(
        'Reduced cost',
        shown.map(({ reducedCost }) => reducedCost),
      ),
      { heading: '', cells: shown.map(boundWords), isNumber: false },
    ]),
    ...cutLine(decisions.length),
    '',
    `  ${termWithGloss('reduced cost')}`,
  ];
}

function constraintLines(constraints: readonly ConstraintEntry[]): string[] {
  const shown = constraints.slice(0, longestList);
  return [
    ...tableLines([
      { heading: 'Constraint rows', cells: shown.map(({ name }) => name), isNumber: false },
      { heading: 'Left side', cells: columnTexts(shown.map(({ leftSide }) => leftSide)), isNumber: true },
      { heading: '', cells: shown.map(({ relation }) => relation), isNumber: false },
      { heading: 'Right side', cells: rightSideTexts(shown), isNumber: true },
      { heading: 'Slack', cells: columnTexts(shown.map(({ slack }) => slack)), isNumber: true },
      { heading: 'Dual value', cells: columnTexts(shown.map(({ dualValue }) => dualValue)), isNumber: true },
      { heading: '', cells: shown.map(bindingWords), isNumber: false },
    ]),
    ...cutLine(constraints.length),
    '',
    `  ${termWithGloss('slack')} · ${termWithGloss('dual value')}`,
  ];
}

/** A ranged row has two limits. */
function rightSideTexts(constraints: readonly ConstraintEntry[]): string[] {
  const single = columnTexts(constraints.map(({ rightSide }) => rightSide));
  return constraints.map(({ relation, lower, upper }, position) =>
    relation === 'range' ? `${numberText(lower)} to ${numberText(upper)}` : single[position],
  );
}

function bindingWords({ slack, relation }: ConstraintEntry): string {
  return slack === 0 && relation !== 'free' ? 'binding' : '';
}

function boundWords({ value, lower, upper }: DecisionEntry): string {
  if (value === lower && value === upper) {
    return 'fixed';
  }
  // At zero with nothing below it says nothing that the number does not.
  return value === upper ? 'at its upper bound' : value === lower && lower !== 0 ? 'at its lower bound' : '';
}

function writtenLines(report: SolveReport, context: ReportContext): string[] {
  if (report.written === null) {
    return [];
  }
  const { file, blocks } = report.written;
  const decisions = report.decisions.map(({ cell }) => cell);
  const rows: [string, string][] = [
    ...(context.writtenDecisionCount === 0
      ? []
      : [
          [decisions[0] ?? '', countedNoun(context.writtenDecisionCount, 'decision cell')] as [
            string,
            string,
          ],
        ]),
    ...blocks.map(({ name, cell }) => [cell, name] as [string, string]),
  ];
  const width = Math.max(0, ...rows.map(([cell]) => cell.length));
  return [
    `Written to ${file}`,
    ...rows.map(([cell, name]) => `  ${cell.padEnd(width)}   ${name}`),
    ...(context.recalculatedCount === 0
      ? []
      : [`  ${countedNoun(context.recalculatedCount, 'formula')} recalculated`]),
    '',
  ];
}

function cutLine(count: number): string[] {
  return count > longestList
    ? [`  … and ${(count - longestList).toLocaleString('en-US')} more (all with --json)`]
    : [];
}
