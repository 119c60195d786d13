/**
 * Every text of the task pane in one catalogue. Sentences about issues, notices and ends of a solve stand beside this
 * file; the pane takes them from there.
 */
import type { StatementRole } from '../domain/model-from-sheet/naming-convention';
import type { PlanSense, Relation } from '../domain/model-from-sheet/sheet-model';
import type { PartReading } from '../domain/statement-to-sheet/describe-plans';
import type { PlanNameFault } from '../domain/statement-to-sheet/statement-edits';
import { formatCellAddress, type CellAddress } from '../domain/sheet/cell-address';
import { formatCellRange, type CellRange } from '../domain/sheet/cell-range';
import { glossOf } from './glosses';
import { amountText, countText, listText, quoted } from './word-forms';

/** What a part of a statement is called, and what stands beside the word. */
export const partLabels: Readonly<Record<StatementRole, { readonly label: string; readonly gloss: string }>> =
  {
    Decision: { label: 'Decision cells', gloss: glossOf('decision cell') },
    Objective: { label: 'Objective', gloss: glossOf('objective') },
    Sense: { label: 'Sense', gloss: 'most or least of it' },
    Constraint: { label: 'Constraint rows', gloss: 'left side, relation, right side' },
    Left: { label: 'Left sides', gloss: glossOf('left side') },
    Relation: { label: 'Relations', gloss: 'at most, at least, exactly' },
    Right: { label: 'Right sides', gloss: glossOf('right side') },
    Lower: { label: 'Lower bounds', gloss: glossOf('lower bound') },
    Upper: { label: 'Upper bounds', gloss: glossOf('upper bound') },
    Lot: { label: 'Lots', gloss: glossOf('lot') },
    LeastRun: { label: 'Least runs', gloss: glossOf('least run') },
    DecisionLabel: { label: 'Labels of decisions', gloss: 'otherwise the nearest texts' },
    ConstraintLabel: { label: 'Labels of rows', gloss: 'otherwise the nearest texts' },
  };

/** `Decision cells`, `Decision cells 2`. */
export function partLabel(role: StatementRole, number: number): string {
  return `${partLabels[role].label}${number === 1 ? '' : ` ${number}`}`;
}

const cellNouns: Readonly<Record<StatementRole, string>> = {
  Decision: 'decision cell',
  Objective: 'objective cell',
  Sense: 'cell',
  Constraint: 'cell',
  Left: 'left side',
  Relation: 'relation',
  Right: 'right side',
  Lower: 'lower bound',
  Upper: 'upper bound',
  Lot: 'lot',
  LeastRun: 'least run',
  DecisionLabel: 'label',
  ConstraintLabel: 'label',
};

export function rangesText(ranges: readonly CellRange[]): string {
  return ranges.map(formatCellRange).join(', ');
}

/** What a field says of its part: what was read, and by which name. */
export function fieldHint(
  role: StatementRole,
  part: { name: string; reading: PartReading } | undefined,
): string {
  if (part !== undefined) {
    return `${readingText(role, part.reading)} (${part.name})`;
  }
  return role === 'Lower' || role === 'Upper' ? paneTexts.optional : paneTexts.notStated;
}

/** What a part's name was read as: `12 decision cells, Plan!F5:F16`. */
export function readingText(role: StatementRole, reading: PartReading): string {
  switch (reading.kind) {
    case 'cells': {
      const said =
        reading.text !== null && (role === 'Sense' || role === 'Relation') ? `: ${reading.text}` : '';
      return `${countText(reading.cellCount, cellNouns[role])}, ${rangesText(reading.ranges)}${said}`;
    }
    case 'constant':
      return `${quoted(reading.text)}, in the name itself`;
    case 'computed':
      return 'Cells that a formula works out';
    case 'dead':
      return 'Refers to nothing that can be read. Point it at cells again.';
  }
}

export function selectionText(ranges: readonly CellRange[]): string {
  if (ranges.length === 0) {
    return 'No cells are selected.';
  }
  const count = ranges.reduce((sum, r) => sum + (r.bottom - r.top + 1) * (r.right - r.left + 1), 0);
  return `Selected now: ${rangesText(ranges)} (${countText(count, 'cell')})`;
}

export function nameFaultText(fault: PlanNameFault): string {
  switch (fault) {
    case 'blank':
      return 'Type a name for the plan.';
    case 'characters':
      return 'Use letters, digits, periods and underscores only, and begin with a letter.';
    case 'like-a-cell':
      return 'This would be taken for a cell. Add a letter or an underscore.';
    case 'ends-in-part':
      return 'This ends like the name of a plan’s part. Leave the ending out.';
    case 'too-long':
      return 'Use at most 200 characters.';
    case 'taken':
      return 'Another plan of this workbook has this name.';
  }
}

const elapsedFormat = new Intl.NumberFormat('en-US', { minimumIntegerDigits: 2 });

/** `0:07`, `12:40`. */
export function elapsedText(seconds: number): string {
  const whole = Math.max(0, Math.floor(seconds));
  return `${Math.floor(whole / 60)}:${elapsedFormat.format(whole % 60)}`;
}

const shortAmountFormat = new Intl.NumberFormat('en-US', { maximumSignificantDigits: 6 });

/** As much of an amount as a narrow column holds; an amount that is not there is a dash. */
export function shortAmountText(amount: number | null): string {
  if (amount === null) {
    return '–';
  }
  return Number.isFinite(amount) ? shortAmountFormat.format(amount === 0 ? 0 : amount) : 'no limit';
}

export const relationTexts: Readonly<Record<Relation, string>> = {
  '<=': 'at most (<=)',
  '>=': 'at least (>=)',
  '=': 'exactly (=)',
};

export const senseTexts: Readonly<Record<PlanSense, string>> = {
  minimise: 'Minimise',
  maximise: 'Maximise',
};

export const paneTexts = {
  title: 'Planrow',
  starting: 'Reading the workbook …',
  outsideHost: 'This page is the pane of an add-in. Open it from the Home tab of your spreadsheet program.',
  purpose: 'Finds the best plan in the workbook you already keep.',
  plan: 'Plan',
  noPlanYet: 'This workbook holds no plan yet. Start one, then point at the cells that make it up.',
  newPlan: 'New plan',
  duplicate: 'Duplicate',
  rename: 'Rename',
  remove: 'Delete',
  planActions: 'What to do with the plan',
  nameOfNewPlan: 'Name of the new plan',
  nameOfCopy: 'Name of the copy',
  newName: 'New name',
  suggestedName: 'Week',
  create: 'Start plan',
  makeCopy: 'Make copy',
  cancel: 'Cancel',
  parts: 'Parts of the pane',
  statement: 'Statement',
  result: 'Result',
  useSelection: 'Use selection',
  /** For screen readers: which field the button belongs to. */
  useSelectionFor: (label: string): string => `Use selection for ${label}`,
  show: 'Show',
  showFor: (label: string): string => `Show ${label} on the sheet`,
  takeAway: 'Remove',
  takeAwayFor: (label: string): string => `Remove ${label} from the plan`,
  addAnother: (label: string): string => `Add ${label}`,
  typedReferenceFault: 'These are no cells of this workbook. Type them like Plan!B2:B9.',
  set: 'Set',
  notStated: 'Not stated yet',
  optional: 'Optional. Blank: 0 below, none above.',
  commonRelation: 'One relation for all rows',
  relationFromCells: 'from cells',
  constraintsTogether: 'rows in one block',
  constraintsApart: 'rows in parts',
  addedRows: (block: string, range: CellRange): string => {
    const count = range.bottom - range.top + 1;
    return `${countText(count, 'row')} under ${block} look${count === 1 ? 's' : ''} like the rows above: ${formatCellRange(range)}.`;
  },
  extendNames: (names: readonly string[]): string => `Extend ${listText(names)}`,
  pointElsewhere: 'Point it at other cells?',
  pointFrom: (text: string): string => `Now: ${text}`,
  pointTo: (text: string): string => `Then: ${text}`,
  pointThere: 'Point there',
  keepAsIs: 'Keep as it is',
  nothingSelected: 'Select the cells on one sheet first, then press this again.',
  check: 'Check',
  checking: 'Checking the plan …',
  solve: 'Solve',
  stop: 'Stop',
  stopping: 'Stopping …',
  keepDecisions: 'Leave the decision cells as they are',
  stages: {
    'reading-workbook': 'Reading the workbook …',
    reading: 'Reading the plan …',
    solving: 'Solving …',
    preparing: 'Working out what to write …',
    writing: 'Writing the results …',
  },
  elapsed: (seconds: number): string => `${elapsedText(seconds)} elapsed`,
  iterations: (count: number): string => countText(count, 'iteration'),
  issues: 'What to mend',
  noIssues: (decisions: number, rows: number): string =>
    `Nothing is wrong: ${countText(decisions, 'decision cell')} and ${countText(rows, 'constraint row')} were read.`,
  issueCounts: (errors: number, warnings: number): string =>
    listText([
      ...(errors > 0 ? [countText(errors, 'error')] : []),
      ...(warnings > 0 ? [countText(warnings, 'warning')] : []),
    ]),
  error: 'Error',
  warning: 'Warning',
  showCell: (cell: CellAddress): string => `Show ${formatCellAddress(cell)}`,
  pickRelation: (cell: CellAddress): string => `Relation for ${formatCellAddress(cell)}`,
  pickOne: 'Pick a relation',
  pickSense: 'Pick one',
  noResultYet: 'Not solved yet. Press Solve when the statement is complete.',
  objective: 'Objective',
  objectiveBefore: (before: number, after: number): string => {
    const change = after - before;
    const sign = change > 0 ? '+' : change < 0 ? '−' : '';
    return `${amountText(before)} before, ${sign}${shortAmountText(Math.abs(change))} since`;
  },
  decisions: 'Decision cells',
  constraintRows: 'Constraint rows',
  filterDecisions: 'Find a decision',
  filterRows: 'Find a row',
  bindingOnly: 'Binding rows only',
  binding: 'Binding',
  columns: {
    decision: 'Decision',
    optimum: 'Optimum',
    reducedCost: 'Reduced cost',
    row: 'Row',
    slack: 'Slack',
    dualValue: 'Dual value',
  },
  beforeAmount: (before: number | null): string =>
    before === null ? 'blank before' : `${shortAmountText(before)} before`,
  sides: (left: number | null, relation: Relation, right: number | null): string =>
    `${shortAmountText(left)} ${relation} ${shortAmountText(right)}`,
  sortBy: (column: string): string => `Sort by ${column}`,
  rowsShown: (shown: number, all: number): string =>
    shown === all ? countText(all, 'line') : `${shown.toLocaleString('en-US')} of ${countText(all, 'line')}`,
  tableHint: 'Arrow keys move, Enter shows the cell.',
  written: 'Where results stand',
  writtenDecisions: (count: number): string =>
    count === 0
      ? 'The decision cells were left as they are.'
      : `${countText(count, 'decision cell')} received the optimum.`,
  notWritten: 'Nothing has been written into the workbook.',
  notices: 'Worth knowing',
  putBack: 'Put back',
  puttingBack: 'Putting back what the decision cells held …',
  putBackDone: (restored: number): string =>
    restored === 0
      ? 'Every decision cell holds what it held before.'
      : `${countText(restored, 'decision cell')} hold${restored === 1 ? 's' : ''} again what ${restored === 1 ? 'it' : 'they'} held before.`,
  putBackLeft: (cells: readonly CellAddress[]): string => {
    const shown = cells.slice(0, 5).map(formatCellAddress);
    const more = cells.length - shown.length;
    return `Changed since the solve, and left as ${cells.length === 1 ? 'it is' : 'they are'}: ${listText(more > 0 ? [...shown, `${countText(more, 'more cell')}`] : shown)}.`;
  },
  nothingToPutBack: 'Nothing was written that could be put back.',
  outdated: 'The workbook has changed since this plan was found.',
  solveAgain: 'Solve again to bring it up to date.',
  retry: 'Try again',
  dismiss: 'Close',
  clearFilterAndWrite: 'Clear the filter and write',
  writeNow: 'Write now',
  finishWriting: 'Finish writing',
  restoreCells: 'Restore the cells',
  cellsBetween: (ranges: readonly CellRange[]): string => `Cells between old and new: ${rangesText(ranges)}`,
  journalFinished: 'The results are written whole now.',
  journalPutBack: 'The cells hold again what they held before.',
  stopped: 'Stopped. Nothing was written.',
  crashed: (message: string): string =>
    `Something went wrong that is our fault and not that of your workbook (${message}).`,
  threadLost: 'The working thread ended unexpectedly. Try again.',
  deletePlan: (plan: string): string => `Delete the plan ${quoted(plan)}?`,
  deleteMeans: 'Its names go; cells and results on the sheets stay as they are.',
  nameUsers: (users: readonly string[]): string =>
    users.length === 0
      ? ''
      : `${countText(users.length, 'formula')} use${users.length === 1 ? 's' : ''} its names and will show #NAME?: ${listText(users.slice(0, 5))}${users.length > 5 ? ', …' : ''}.`,
  statementSaved: (label: string): string => `${label} set.`,
  choosePlanFirst: 'Several plans stand on this sheet. Choose one, then press Solve.',
  pages: 'About Planrow',
  support: 'Help',
  privacy: 'Privacy',
} as const;

/** How many rows are binding, in words. */
export function bindingText(count: number, all: number): string {
  return `${count.toLocaleString('en-US')} of ${countText(all, 'constraint row')} ${count === 1 ? 'is' : 'are'} binding.`;
}
