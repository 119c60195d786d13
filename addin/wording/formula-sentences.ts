/**
 * Sentences for what is wrong with the formulas of a plan, with the remedy the trade knows.
 */
import type { FormulaModelIssue } from '../domain/model-from-sheet/model-issue';
import type { Remedy } from '../domain/linearization/formula-issue';
import { formatCellAddress } from '../domain/sheet/cell-address';

export function formulaSentence(issue: FormulaModelIssue): string {
  const place = issue.cell === null ? 'A formula' : formatCellAddress(issue.cell);
  const text = (fact: string): string => factText(issue, fact);
  switch (issue.code) {
    case 'not-affine':
      return `${place} ${whatIsDone(text('operation'), text('by'), decisionText(issue))}. ${remedyText(text('remedy') as Remedy)}`;
    case 'circular-reference':
      return `${place} depends on itself${aroundText(issue, place)}. Break the circle, so that every formula can be worked out.`;
    case 'unknown-function':
      return `${place} uses ${text('function')}, a function that is not known here${onTheWay(issue)}. Write the formula with other functions.`;
    case 'formula-syntax':
      return `The formula in ${place} cannot be read. Type it again, or mend it in your spreadsheet program.`;
    case 'too-deep':
      return `The formula in ${place} is nested too deeply to be read. Split it over several cells.`;
    case 'array-too-large':
      return `The formula in ${place} works out more cells at once than can be read. Make its ranges smaller.`;
    case 'external-reference':
      return `${place} refers to another workbook (${text('reference')}), so its value cannot be worked out. Bring the numbers into this workbook.`;
    case 'several-sheets':
      return `${place} refers to several sheets at once (${text('reference')}), which is not read. Add the sheets up one by one.`;
    case 'error-value':
      return `${place} gives the error ${text('error')}${onTheWay(issue)}. Mend the formula, or the cell the error comes from.`;
    case 'stored-value-differs':
      return `${place} shows ${text('stored')}, but its formula gives ${text('evaluated')}. Have the workbook calculated again and check the cell.`;
    case 'model-disagrees':
      return `The plan read from ${place} gives ${text('model')} where the workbook’s own formulas give ${text('evaluated')}. The plan is not solved, because it may have been misread; please report this formula.`;
  }
}

function factText(issue: FormulaModelIssue, fact: string): string {
  const value = issue.facts[fact];
  return value === undefined ? '' : String(value);
}

function factList(issue: FormulaModelIssue, fact: string): readonly string[] {
  const value = issue.facts[fact];
  return Array.isArray(value) ? (value as readonly string[]) : [];
}

/** What a formula does to a decision that no linear plan can follow. */
function whatIsDone(operation: string, by: string, decision: string): string {
  switch (operation) {
    case 'product':
      return `multiplies amounts that both depend on decisions (${by}), among them ${decision}`;
    case 'division':
      return `divides by an amount that depends on ${decision}`;
    case 'power':
      return `takes a power (${by}) of ${decision}`;
    case 'comparison':
      return `compares (${by}) ${decision}`;
    case 'concatenation':
      return `joins ${decision} into a text (${by})`;
    case 'condition':
      return `makes a condition (${by}) depend on ${decision}`;
    case 'reference':
      return `lets ${decision} choose which cell is looked at (${by})`;
    default:
      return `applies ${by} to ${decision}, which keeps no fixed rate`;
  }
}

function remedyText(remedy: Remedy): string {
  switch (remedy) {
    case 'lot':
      return 'Leave the rounding out; whole amounts are asked for with a lot.';
    case 'yes-no':
      return 'Replace the condition by a yes/no decision cell, or write the cases as constraint rows.';
    case 'ratio':
      return 'Multiply the ratio out: instead of A/B <= k write A <= k*B.';
    case 'row-each':
      return 'Write one constraint row for each of the amounts instead.';
    case 'none':
      return 'Use only sums of decisions times fixed numbers.';
  }
}

/** How many cells between a decision and a formula a sentence names. */
const namedBetween = 2;

/** `Floor matt (Plan!B2)`, `Floor matt (Plan!B2) by way of Plan!F2`: the decision, and the cells it comes through. */
function decisionText(issue: FormulaModelIssue): string {
  const [decision, ...rest] = factList(issue, 'chain');
  if (decision === undefined || rest.length === 0) {
    return 'a decision';
  }
  const between = rest.slice(0, -1);
  const shown = between.length <= namedBetween ? between : [between[0], '…', between[between.length - 1]];
  return shown.length === 0 ? decision : `${decision} by way of ${shown.join(', ')}`;
}

/** Names the decision where the fault lies on the way from one. */
function onTheWay(issue: FormulaModelIssue): string {
  return factList(issue, 'chain').length < 2 ? '' : ` on the way from ${decisionText(issue)}`;
}

/** How many cells of a circle a sentence names. */
const namedAround = 4;

/** The cells of a circle but the one the sentence begins with. */
function aroundText(issue: FormulaModelIssue, place: string): string {
  const others = factList(issue, 'cells').filter((cell) => cell !== place);
  const shown = others.length <= namedAround ? others : [...others.slice(0, namedAround), '…'];
  return shown.length === 0 ? '' : ` by way of ${shown.join(', ')}`;
}
