/**
 * Texts around a result: headings that stand on the sheet, what was written where, files and plans that cannot be
 * had, and the caution under every plan.
 */
import type { NotRecalculatedReason } from '../domain/calculation/recalculate';
import { formatCellAddress } from '../domain/sheet/cell-address';
import type { ResultNotice } from '../domain/results-to-sheet/result-notice';
import type { ResultTexts } from '../domain/results-to-sheet/result-texts';
import { glossOf } from './glosses';
import { amountText, listText, quoted } from './word-forms';

/** What results bring onto a sheet. */
export const resultTexts: ResultTexts = {
  headings: {
    Before: { title: 'Before', gloss: glossOf('before') },
    Optimum: { title: 'Optimum', gloss: glossOf('optimum') },
    ReducedCost: { title: 'Reduced cost', gloss: glossOf('reduced cost') },
    LeftSide: { title: 'Left side', gloss: glossOf('left side') },
    Slack: { title: 'Slack', gloss: glossOf('slack') },
    DualValue: { title: 'Dual value', gloss: glossOf('dual value') },
  },
  resultsSheetName: (planName) => `${planName} results`,
  table: {
    decision: 'Decision',
    decisionCell: 'In the plan now',
    constraintRow: 'Constraint row',
    rightSide: 'Right side now',
  },
};

/** Stands under every plan that is shown. */
export const caution =
  'A plan is advice from the numbers given. Local codes, labour rules and licensed practice decide.';

/** Why a formula has no new value, within a sentence. */
const hindrances: Readonly<Record<NotRecalculatedReason, string>> = {
  'not-affine': 'it was asked for an affine form',
  'unknown-function': 'it uses a function that is not known here',
  'formula-syntax': 'its formula cannot be read',
  'too-deep': 'its formula has too many brackets within one another',
  'array-too-large': 'it works out too many cells at once',
  'external-reference': 'it refers to another workbook',
  'several-sheets': 'it refers to several sheets at once',
  'circular-reference': 'it waits for itself',
  'builds-on-such-a-cell': 'it builds on a cell of which the same is true',
};

/** What the planner must hear about the writing of results. */
export function sentenceOfNotice(notice: ResultNotice): string {
  const at = notice.cell === null ? '' : formatCellAddress(notice.cell);
  switch (notice.code) {
    case 'kept-cell':
      return `${at} no longer holds what was last written, so it was left as it is; the new value for ${notice.facts.name} there is ${amountText(notice.facts.value)}. Clear the cell to have it filled again.`;
    case 'results-moved':
      return `${listText(notice.facts.names)} now stand in ${listText(notice.facts.ranges)}, because their block changed its size or place.`;
    case 'results-left':
      return `Not every cell of ${listText(notice.facts.ranges)} is known to be an earlier result, so what is there was left as it is. Delete it if you no longer need it.`;
    case 'results-on-own-sheet':
      return `${listText(notice.facts.names)} stand on the sheet ${quoted(notice.facts.sheet)}, one row for each, because there is no room for them beside their block.`;
    case 'not-recalculated':
      return `${at} depends on the plan but could not be recalculated here: ${hindrances[notice.facts.reason]}. It shows its value once the workbook is opened in a spreadsheet program.`;
    case 'workbook-disagrees': {
      const { what, workbook, model } = notice.facts;
      const held = typeof workbook === 'number' ? amountText(workbook) : workbook;
      return `${at} (${what}) comes to ${held} in the workbook but to ${amountText(model)} in the model. Do not rely on this plan; check the formula in that cell.`;
    }
  }
}

/** A workbook that does not say which plan is meant. */
export function sentenceOfNoSuchPlan(
  reason: 'none' | 'several' | 'unknown',
  wanted: string | null,
  planNames: readonly string[],
): string {
  const names = listText(planNames.map(quoted));
  switch (reason) {
    case 'none':
      return 'The workbook holds no plan. Name its decision cells, for example Week.Decision, and the other parts likewise.';
    case 'several':
      return `The workbook holds ${planNames.length} plans: ${names}. Say which one with --plan.`;
    case 'unknown':
      return `The workbook holds no plan ${quoted(wanted ?? '')}. It holds ${names}.`;
  }
}

/** @param fault the system's error code, or one of ours */
export function sentenceOfFileFault(path: string, fault: string | undefined): string {
  switch (fault) {
    case 'ENOENT':
      return `${path} does not exist. Check the name and the folder.`;
    case 'EACCES':
    case 'EPERM':
      return `${path} may not be read or written. Close it elsewhere, or ask for permission.`;
    case 'EISDIR':
      return `${path} is a folder. Give the name of a file.`;
    case 'not-gzip':
      return `${path} is not packed as its name says. Give it the ending .mps if it is plain text.`;
    case 'too-large':
      return `${path} is too large to be unpacked here.`;
    default:
      return `${path} could not be read${fault === undefined ? '' : ` (${fault})`}.`;
  }
}

export function sentenceOfExistingFile(path: string): string {
  return `${path} exists already and is not written over. Give another name with --out, or --in-place to change the workbook itself.`;
}

export const signatureSentence =
  'The workbook was digitally signed; the written file no longer matches the signature, so have it signed again.';

export const bugSentence = 'Something went wrong that is our fault and not that of your workbook.';

/** A whole-number demand, as long as there are no integers; with the flag that helps. */
export function sentenceOfIntegerColumn(column: string): string {
  return `Column ${quoted(column)} must be a whole number, which cannot be solved yet. Give --relax to solve without that demand.`;
}
