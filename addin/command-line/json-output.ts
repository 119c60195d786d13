/**
 * A report as one line of JSON on standard output. Infinite numbers and NaN, which JSON has no word for, become null.
 */
import type { CheckReport, SolveReport } from './solve-report';

export function jsonText(report: SolveReport | CheckReport): string {
  return `${JSON.stringify(report, (_key, value: unknown) =>
    typeof value === 'number' && !Number.isFinite(value) ? null : value,
  )}\n`;
}
