import type { FormulaModelIssue } from '../../../addin/domain/model-from-sheet/model-issue';
import { severityOf } from '../../../addin/domain/model-from-sheet/model-issue';
import { sentenceOfIssue } from '../../../addin/wording/issue-sentences';

type Case = readonly [code: FormulaModelIssue['code'], facts: FormulaModelIssue['facts'], sentence: string];

const direct = ['Floor matt (Plan!B2)', 'Press hours (Plan!B7)'];
const chain = ['Floor matt (Plan!B2)', 'Plan!F2', 'Press hours (Plan!B7)'];

// The facts are those that linearization/formula-issue.ts promises for each code.
const cases: readonly Case[] = [
  [
    'not-affine',
    { operation: 'product', by: '*', remedy: 'none', chain, formula: 'F2*B3' },
    'Plan!B7 multiplies amounts that both depend on decisions (*), among them Floor matt (Plan!B2) by way of Plan!F2. Use only sums of decisions times fixed numbers.',
  ],
  [
    'not-affine',
    { operation: 'division', by: '/', remedy: 'ratio', chain: direct, formula: '5/B2' },
    'Plan!B7 divides by an amount that depends on Floor matt (Plan!B2). Multiply the ratio out: instead of A/B <= k write A <= k*B.',
  ],
  [
    'not-affine',
    { operation: 'power', by: '^', remedy: 'none', chain: [], formula: 'B2^2' },
    'Plan!B7 takes a power (^) of a decision. Use only sums of decisions times fixed numbers.',
  ],
  [
    'not-affine',
    { operation: 'condition', by: 'IF', remedy: 'yes-no', chain: [], formula: 'IF(B2>0,5,0)' },
    'Plan!B7 makes a condition (IF) depend on a decision. Replace the condition by a yes/no decision cell, or write the cases as constraint rows.',
  ],
  [
    'not-affine',
    { operation: 'comparison', by: '>', remedy: 'yes-no', chain: [], formula: 'B2>0' },
    'Plan!B7 compares (>) a decision. Replace the condition by a yes/no decision cell, or write the cases as constraint rows.',
  ],
  [
    'not-affine',
    { operation: 'concatenation', by: '&', remedy: 'none', chain: direct, formula: 'B2&"h"' },
    'Plan!B7 joins Floor matt (Plan!B2) into a text (&). Use only sums of decisions times fixed numbers.',
  ],
  [
    'not-affine',
    { operation: 'reference', by: 'INDEX', remedy: 'none', chain: [], formula: 'INDEX(C2:C4,B2)' },
    'Plan!B7 lets a decision choose which cell is looked at (INDEX). Use only sums of decisions times fixed numbers.',
  ],
  [
    'not-affine',
    { operation: 'function', by: 'MAX', remedy: 'row-each', chain: [], formula: 'MAX(B2,B3)' },
    'Plan!B7 applies MAX to a decision, which keeps no fixed rate. Write one constraint row for each of the amounts instead.',
  ],
  [
    'not-affine',
    { operation: 'function', by: 'ROUND', remedy: 'lot', chain: ['a', 'b', 'c', 'd', 'e'], formula: '' },
    'Plan!B7 applies ROUND to a by way of b, …, d, which keeps no fixed rate. Leave the rounding out; whole amounts are asked for with a lot.',
  ],
  [
    'circular-reference',
    { cells: ['Plan!B7', 'Plan!C7', 'Plan!D7'], formula: 'C7' },
    'Plan!B7 depends on itself by way of Plan!C7, Plan!D7. Break the circle, so that every formula can be worked out.',
  ],
  [
    'circular-reference',
    { cells: ['Plan!B7'], formula: 'B7' },
    'Plan!B7 depends on itself. Break the circle, so that every formula can be worked out.',
  ],
  [
    'unknown-function',
    { function: 'KILNTIME', chain, formula: 'KILNTIME(F2)' },
    'Plan!B7 uses KILNTIME, a function that is not known here on the way from Floor matt (Plan!B2) by way of Plan!F2. Write the formula with other functions.',
  ],
  [
    'formula-syntax',
    { position: 3, formula: 'B2+' },
    'The formula in Plan!B7 cannot be read. Type it again, or mend it in your spreadsheet program.',
  ],
  [
    'too-deep',
    { formula: '' },
    'The formula in Plan!B7 is nested too deeply to be read. Split it over several cells.',
  ],
  [
    'array-too-large',
    { formula: '' },
    'The formula in Plan!B7 works out more cells at once than can be read. Make its ranges smaller.',
  ],
  [
    'external-reference',
    { reference: '[1]Costs!B2', formula: '' },
    'Plan!B7 refers to another workbook ([1]Costs!B2), so its value cannot be worked out. Bring the numbers into this workbook.',
  ],
  [
    'several-sheets',
    { reference: 'Jan:Mar!B2', formula: '' },
    'Plan!B7 refers to several sheets at once (Jan:Mar!B2), which is not read. Add the sheets up one by one.',
  ],
  [
    'error-value',
    { error: '#N/A', chain: [], formula: '' },
    'Plan!B7 gives the error #N/A. Mend the formula, or the cell the error comes from.',
  ],
  [
    'stored-value-differs',
    { stored: 5, evaluated: 6, formula: '' },
    'Plan!B7 shows 5, but its formula gives 6. Have the workbook calculated again and check the cell.',
  ],
  [
    'model-disagrees',
    { model: 5, evaluated: 6 },
    'The plan read from Plan!B7 gives 5 where the workbook’s own formulas give 6. The plan is not solved, because it may have been misread; please report this formula.',
  ],
];

it.each(cases)('%s %j is put into words', (code, facts, sentence) => {
  const cell = { sheet: 'Plan', row: 6, column: 1 };
  expect(sentenceOfIssue({ code, severity: severityOf(code), cell, facts })).toBe(sentence);
});
