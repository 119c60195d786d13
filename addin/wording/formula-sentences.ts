/**
 * Sentences for what is wrong with the formulas of a plan, with the remedy the trade knows.
 */
import type { FormulaModelIssue } from '../domain/model-from-sheet/model-issue';
import type { Remedy } from '../domain/linearization/formula-issue';
import { formatCellAddress } from '../domain/sheet/cell-address';
import { listText } from './word-forms';

export function formulaSentence(issue: FormulaModelIssue): string {
  const place = issue.cell === null ? 'A formula' : formatCellAddress(issue.cell);
  const text = (fact: string): string => factText(issue, fact);
  switch (issue.code) {
    case 'not-affine':
      return `${place} ${whatIsDone(text('operation'), text('by'))}${chainText(issue)}. ${remedyText(text('remedy') as Remedy)}`;
    case 'circular-reference':
      return `${place} depends on itself${aroundText(issue)}. Break the circle, so that every formula can be worked out.`;
    case 'unknown-function':
      return `${place} uses ${text('function')}, a function that is not known here${chainText(issue)}. Write the formula with other functions.`;
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
      return `${place} gives the error ${text('error')}${chainText(issue)}. Mend the formula, or the cell the error comes from.`;
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
function whatIsDone(operation: string, by: string): string {
  switch (operation) {
    case 'product':
      return `multiplies decisions with each other (${by})`;
    case 'division':
      return 'divides by an amount that depends on a decision';
    case 'power':
      return `takes a power of a decision (${by})`;
    case 'comparison':
      return `compares a decision (${by})`;
    case 'concatenation':
      return 'joins a decision into a text (&)';
    case 'condition':
      return `makes a condition depend on a decision (${by})`;
    case 'reference':
      return `lets a decision choose which cell is looked at (${by})`;
    default:
      return `applies ${by} to a decision, which keeps no fixed rate`;
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

/** How many cells of a chain a sentence names: the decision, the cells next to it, and the end. */
const namedCells = 4;

/** Where the decision comes in, when it is not the formula's own reference. */
function chainText(issue: FormulaModelIssue): string {
  const chain = factList(issue, 'chain');
  if (chain.length < 2) {
    return '';
  }
  const shown = chain.length <= namedCells ? chain : [...chain.slice(0, 2), '…', ...chain.slice(-1)];
  return ` (${shown.join(' → ')})`;
}

function aroundText(issue: FormulaModelIssue): string {
  const cells = factList(issue, 'cells');
  return cells.length < 2
    ? ''
    : ` by way of ${listText(cells.slice(0, namedCells))}${cells.length > namedCells ? ' …' : ''}`;
}
