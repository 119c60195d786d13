/**
 * Works out single formulas on a small workbook, every formula of it anew.
 */
import { MemoryWorkbook, type WorkbookDescription } from '../../../../addin/adapters/memory/memory-workbook';
import { CalculationGrid } from '../../../../addin/domain/calculation/calculation-grid';
import { Matrix, type Scalar } from '../../../../addin/domain/calculation/evaluated-value';
import { Evaluator } from '../../../../addin/domain/calculation/evaluator';
import { plainNumbers } from '../../../../addin/domain/calculation/number-domain';
import { CellError } from '../../../../addin/domain/sheet/cell-value';

/** A value as a test states it: error values by their code, refusals as `refused: code`. */
export type StatedValue = number | string | boolean | null;

/** Serial date and time of TODAY and NOW in these tests: 2 December 2026, 6 in the morning. */
export const testNow = 46_358.25;

/**
 * @param sheetOfFormula default `Work`; the formula stands in row 40, column J, unless `at` says otherwise
 */
export function evaluateFormula(
  formula: string,
  description: WorkbookDescription = { sheets: {} },
  at = 'J40',
): StatedValue {
  const workbook = MemoryWorkbook.of({
    ...description,
    sheets: { ...description.sheets, Work: { ...description.sheets['Work'], [at]: { formula } } },
  }).snapshot();
  const grid = new CalculationGrid(workbook, []);
  const evaluator = new Evaluator(grid, {
    domain: plainNumbers,
    inputs: [],
    now: testNow,
    needsEvaluation: (cell) => cell.cell.value === undefined,
  });
  const [, letters, row] = /^([A-Z]+)(\d+)$/.exec(at)!;
  const entry = grid.sheetGrid('Work')!.at(Number(row) - 1, letters.charCodeAt(0) - 65);
  const outcome = evaluator.entryOutcome(entry);
  switch (outcome.kind) {
    case 'value':
      return stated(outcome.value);
    case 'refused':
      return `refused: ${outcome.refusal.reason.code}`;
    case 'blocked':
      return 'blocked';
  }
}

function stated(value: Scalar | Matrix): StatedValue {
  const scalar = value instanceof Matrix ? value.values[0] : value;
  return scalar instanceof CellError ? scalar.code : (scalar as StatedValue);
}

/** Numbers to 12 digits, everything else exactly. */
export function expectValue(actual: StatedValue, expected: StatedValue): void {
  if (typeof expected === 'number' && typeof actual === 'number') {
    expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-12 * Math.max(1, Math.abs(expected)));
  } else {
    expect(actual).toBe(expected);
  }
}
