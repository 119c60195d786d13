/**
 * A report as one line of JSON on standard output. Infinite numbers and NaN, which JSON has no word for, become null.
 */
import { reportOfIssues, type CheckReport, type SolveReport } from './solve-report';

export function solveReportJson(report: SolveReport): string {
  // The fields stand in the order of their description, whoever put them together.
  return jsonLine({ ...reportOfIssues(null, []), ...report });
}

export function checkReportJson(report: CheckReport): string {
  return jsonLine(report);
}

function jsonLine(report: SolveReport | CheckReport): string {
  return `${JSON.stringify(report, (_key, value: unknown) =>
    typeof value === 'number' && !Number.isFinite(value) ? null : value,
  )}\n`;
}
