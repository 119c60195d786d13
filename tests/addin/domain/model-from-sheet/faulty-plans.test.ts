/**
 * Every fault that a statement can have, one at a time in an otherwise sound plan: its code, its place, and the
 * sentence that the planner reads. What is expected is design by rule (addin/SPEC.md), not taken from the program.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readPlan } from '../../../../addin/domain/model-from-sheet/read-plan';
import { CellError } from '../../../../addin/domain/sheet/cell-value';
import { sentenceOfIssue } from '../../../../addin/wording/issue-sentences';
import { issueTexts, readTiles, tileWorkbook, type Changes } from './tile-works';

type Fault = readonly [title: string, changes: Changes, issues: readonly string[], sentence: string];

const noBounds = { 'Week.Lower': null, 'Week.Upper': null };
const parts = {
  'Week.Constraint': null,
  'Week.Left': 'Plan!$B$7:$B$9',
  'Week.Relation': 'Plan!$C$7:$C$9',
  'Week.Right': 'Plan!$D$7:$D$9',
};
const coefficientBlock = { 'Week.Constraint': 'Plan!$K$1:$O$1' };

const errors: readonly Fault[] = [
  // Names that are missing, double, or numbered wrongly.
  [
    'no first decision block',
    { names: { 'Week.Decision': null, 'Week.Decision2': 'Plan!$B$2:$B$4', ...noBounds } },
    ['missing-decision'],
    'The plan Week has no decision cells. Define the name Week.Decision for the cells whose amounts are to be found.',
  ],
  [
    'no objective',
    { names: { 'Week.Objective': null } },
    ['missing-objective'],
    'The name Week.Objective is missing. Define it for the cell with the amount to make best, or for one coefficient a decision cell.',
  ],
  [
    'no sense',
    { names: { 'Week.Sense': null } },
    ['missing-sense'],
    'The name Week.Sense is missing. Define it for a cell that says maximise or minimise.',
  ],
  [
    'a blank sense',
    { cells: { H1: null } },
    ['missing-sense at Plan!H1'],
    'Plan!H1 is blank, but Week.Sense refers to it. Type maximise or minimise there.',
  ],
  [
    'an unknown sense',
    { cells: { H1: 'best' } },
    ['unknown-sense at Plan!H1'],
    'Plan!H1 says “best” where maximise or minimise is needed. Type one of these two words.',
  ],
  [
    'an unknown sense in the name',
    { names: { 'Week.Sense': '=1' } },
    ['unknown-sense'],
    'Week.Sense says “1” where maximise or minimise is needed. Type one of these two words.',
  ],
  [
    'a sense of two cells',
    { names: { 'Week.Sense': 'Plan!$H$1:$H$2' } },
    ['not-one-cell at Plan!H1'],
    'Week.Sense refers to 2 × 1 cells. Point it at one cell.',
  ],
  [
    'a gap in the decision blocks',
    { names: { 'Week.Decision3': 'Plan!$L$1' } },
    ['numbering-gap'],
    'There is Week.Decision3 but no Week.Decision2. Number the names 2, 3, … without gaps; the first has no number.',
  ],
  [
    'a gap in the constraint blocks',
    { names: { 'Week.Constraint3': 'Plan!$B$7:$D$7' } },
    ['numbering-gap'],
    'There is Week.Constraint3 but no Week.Constraint2. Number the names 2, 3, … without gaps; the first has no number.',
  ],
  [
    'two names that say the same',
    { names: { Week_Lower: 'Plan!$D$2:$D$4' } },
    ['duplicate-name'],
    'Week.Lower and Week_Lower say the same thing twice. Delete one of these names.',
  ],
  [
    'bounds for a block that is not there',
    { names: { 'Week.Upper2': 'Plan!$E$2:$E$4' } },
    ['name-without-block'],
    'Week.Upper2 belongs to Week.Decision2, which does not exist. Define that name or delete this one.',
  ],
  [
    'labels for constraint rows that are not there',
    { names: { 'Week.ConstraintLabel2': 'Plan!$A$7:$A$9' } },
    ['name-without-block'],
    'Week.ConstraintLabel2 belongs to Week.Constraint2, which does not exist. Define that name or delete this one.',
  ],
  [
    'a left side without its relation and right side',
    { names: { 'Week.Left2': 'Plan!$B$7' } },
    ['missing-part', 'missing-part'],
    'Week.Left2 has no Week.Relation2 to go with it. Constraint rows whose parts stand apart need a left side, a relation and a right side.',
  ],

  // Names that refer to the wrong thing.
  [
    'a name whose cells were deleted',
    { names: { 'Week.Lower': 'Plan!#REF!' } },
    ['dead-name'],
    'Week.Lower refers to cells that were deleted (#REF!). Point the name at the right cells or delete it.',
  ],
  [
    'decision cells that were deleted',
    { names: { 'Week.Decision': '#REF!' } },
    ['dead-name'],
    'Week.Decision refers to cells that were deleted (#REF!). Point the name at the right cells or delete it.',
  ],
  [
    'a name that refers to another workbook',
    { names: { 'Week.Upper': '[1]Plan!$E$2:$E$4' } },
    ['external-name'],
    'Week.Upper refers to another workbook. Point it at cells of this one.',
  ],
  [
    'a name that refers to a sheet that is not there',
    { names: { 'Week.Upper': 'Limits!$E$2:$E$4' } },
    ['unknown-name-target'],
    'Week.Upper refers to “Limits”, which does not exist in this workbook. Point the name at the right cells.',
  ],
  [
    'a name that works its range out',
    { names: { 'Week.Upper': 'OFFSET(Plan!$E$1,1,0,3,1)' } },
    ['computed-name'],
    'Week.Upper works its range out with OFFSET, which is not read yet. Point the name straight at the cells.',
  ],
  [
    'a name that refers to no cells',
    { names: { 'Week.Upper': '=100' } },
    ['not-a-range'],
    'Week.Upper does not refer to cells of one sheet. Point it at a block of cells.',
  ],
  [
    'a constraint block that lists cells twice',
    { names: { 'Week.Constraint': 'Plan!$B$7:$D$8,Plan!$B$8:$D$9' } },
    ['repeated-cells at Plan!B7'],
    'Week.Constraint lists the same cells twice, from Plan!B7 on. Leave each cell in the name once.',
  ],

  // Wrong shapes.
  [
    'bounds of another length',
    { names: { 'Week.Lower': 'Plan!$D$2:$D$3' } },
    ['wrong-shape at Plan!D2'],
    'Week.Lower has 2 × 1 cells and Week.Decision has 3 × 1. Give it the same shape, or one cell for all of the block.',
  ],
  [
    'bounds the other way round',
    { names: { 'Week.Upper': 'Plan!$K$1:$M$1' } },
    ['wrong-shape at Plan!K1'],
    'Week.Upper has 1 × 3 cells and Week.Decision has 3 × 1. Give it the same shape, or one cell for all of the block.',
  ],
  [
    'an objective of another shape',
    { names: { 'Week.Objective': 'Plan!$C$2:$C$3' } },
    ['wrong-objective-shape at Plan!C2'],
    'Week.Objective has 2 × 1 cells and Week.Decision has 3 × 1. Give it one coefficient a decision cell in the same shape, or one cell with a formula for the whole plan.',
  ],
  [
    'labels of another length',
    { names: { 'Week.DecisionLabel': 'Plan!$A$2:$A$3' } },
    ['wrong-label-count at Plan!A2'],
    'Week.DecisionLabel has 2 cells where 3 labels are needed. Point it at one cell a label.',
  ],
  [
    'a constraint block of no form',
    { names: { 'Week.Constraint': 'Plan!$A$7:$D$8' } },
    ['wrong-constraint-shape at Plan!A7'],
    'Week.Constraint has 2 × 4 cells, which is no block of constraint rows. It needs 3 columns (left side, relation, right side) or 5 (3 coefficients, relation, right side).',
  ],
  [
    'a constraint block in pieces out of line',
    { names: { 'Week.Constraint': 'Plan!$B$7:$D$7,Plan!$K$8:$M$9' } },
    ['scattered-block at Plan!B7'],
    'The parts of Week.Constraint do not lie in line with each other. Give parts that stand elsewhere a name of their own, with the next number.',
  ],
  [
    'left sides that are no line',
    { names: { ...parts, 'Week.Left': 'Plan!$B$7:$C$9' } },
    ['not-one-line at Plan!B7'],
    'Week.Left refers to 3 × 2 cells. Point it at the cells of one row or one column.',
  ],
  [
    'parts of unequal length',
    { names: { ...parts, 'Week.Relation': 'Plan!$C$7:$C$8', 'Week.Right': 'Plan!$D$7:$D$9' } },
    ['unequal-lengths at Plan!B7'],
    'Week.Left, Week.Relation and Week.Right must be equally long, but have 3, 2 and 3 cells. Give each constraint row a cell in each.',
  ],

  // Decision cells.
  [
    'a decision cell that holds a formula',
    { cells: { B3: '=2+3' } },
    ['decision-holds-formula at Plan!B3'],
    'Plan!B3 in Week.Decision holds a formula, so its amount cannot be decided. Clear the cell, or leave it out of the name.',
  ],
  [
    'a decision cell that an array formula fills',
    { cells: { B2: { formula: '{1;2}', value: 1, fills: 'B2:B3' }, B3: 2 } },
    ['decision-holds-formula at Plan!B2', 'decision-holds-formula at Plan!B3'],
    'Plan!B2 in Week.Decision holds a formula, so its amount cannot be decided. Clear the cell, or leave it out of the name.',
  ],
  [
    'a decision cell that holds a text',
    { cells: { B3: 'open' } },
    ['decision-holds-text at Plan!B3'],
    'Plan!B3 in Week.Decision holds the text “open”. Clear the cell, or leave it out of the name.',
  ],
  [
    'a decision cell whose number is a text',
    { cells: { B3: '10' } },
    ['text-looks-like-number at Plan!B3'],
    'Plan!B3 in Week.Decision holds “10” as a text, not as a number. Give the cell a number format and type it again.',
  ],
  [
    'a decision cell that holds TRUE',
    { cells: { B3: true } },
    ['truth-value-for-number at Plan!B3'],
    'Plan!B3 in Week.Decision holds TRUE or FALSE where a number belongs. Type 1 or 0 if that is meant.',
  ],
  [
    'a decision cell that holds an error value',
    { cells: { B3: CellError.of('#N/A') } },
    ['error-value-for-number at Plan!B3'],
    'Plan!B3 in Week.Decision holds the error #N/A. Mend the formula there first.',
  ],
  [
    'decision cells in two blocks',
    { names: { 'Week.Decision2': 'Plan!$B$3:$B$4' } },
    ['duplicate-decision at Plan!B3'],
    'Plan!B3 and 1 more cell are named twice in Week.Decision and Week.Decision2. Leave each decision cell in one block once.',
  ],
  [
    'a decision cell twice in one block',
    { names: { 'Week.Decision': 'Plan!$B$2:$B$4,Plan!$B$4', ...noBounds } },
    ['duplicate-decision at Plan!B4'],
    'Plan!B4 is named twice in Week.Decision. Leave each decision cell in one block once.',
  ],

  // Values where an amount belongs.
  [
    'a text for a bound',
    { cells: { E2: 'plenty' } },
    ['text-for-number at Plan!E2'],
    'Plan!E2 in Week.Upper holds the text “plenty” where a number belongs. Type the number, or leave the cell out of the name.',
  ],
  [
    'the word free above',
    { cells: { E2: 'free' } },
    ['text-for-number at Plan!E2'],
    'Plan!E2 in Week.Upper holds the text “free” where a number belongs. Type the number, or leave the cell out of the name.',
  ],
  [
    'a right side whose number is a text',
    { cells: { D7: '80 ' } },
    ['text-looks-like-number at Plan!D7'],
    'Plan!D7 in Week.Constraint holds “80” as a text, not as a number. Give the cell a number format and type it again.',
  ],
  [
    'an error value for a right side',
    { cells: { D7: { formula: '1/0', value: CellError.of('#DIV/0!') } } },
    ['error-value-for-number at Plan!D7'],
    'Plan!D7 in Week.Constraint holds the error #DIV/0!. Mend the formula there first.',
  ],
  [
    'a coefficient that depends on a decision',
    { cells: { K1: [['=B2', 1, 1, '<=', 5]] }, names: coefficientBlock },
    ['coefficient-depends at Plan!K1'],
    'Plan!K1 in Week.Constraint is a coefficient, but its formula depends on a decision. Make it a number that no decision changes.',
  ],
  [
    'a bound that depends on a decision',
    { cells: { E3: '=B2+10' } },
    ['bound-depends at Plan!E3'],
    'Plan!E3 in Week.Upper depends on a decision, but a bound must not. Write this limit as a constraint row.',
  ],
  [
    'a merged cell over cells of a block',
    { merged: { Plan: ['D7:D8'] }, cells: { D8: null } },
    ['merged-cells at Plan!D7', 'blank-right-side at Plan!D8'],
    'The merged cell Plan!D7:D8 hides cells of Week.Constraint. Unmerge it.',
  ],
  [
    'a merged cell that begins before the block',
    { merged: { Plan: ['A2:B2'] }, cells: { B2: null } },
    ['merged-cells at Plan!B2'],
    'The merged cell Plan!A2:B2 hides cells of Week.Decision. Unmerge it.',
  ],

  // Objective and constraint rows.
  [
    'a blank objective',
    { cells: { B11: null } },
    ['blank-objective at Plan!B11'],
    'The objective Week.Objective is blank at Plan!B11. Put the formula there that the plan should make best.',
  ],
  [
    'a blank left side',
    { cells: { B8: null } },
    ['blank-left-side at Plan!B8'],
    'The left side Plan!B8 is blank although its row has content. Fill it in or clear the row.',
  ],
  [
    'a blank right side',
    { cells: { D8: null } },
    ['blank-right-side at Plan!D8'],
    'The right side Plan!D8 is blank although its row has content. Type the limit, 0 if none is left.',
  ],
  [
    'a relation that is missing',
    { cells: { C8: null } },
    ['missing-relation at Plan!C8'],
    "The relation at Plan!C8 is missing. Type <=, >= or = (with an apostrophe before it: '=), or at most, at least, exactly.",
  ],
  [
    'a strict relation',
    { cells: { C8: '<' } },
    ['strict-relation at Plan!C8'],
    'Plan!C8 says “<”, which no plan can keep apart from <=. Type <= there.',
  ],
  [
    'an unknown relation',
    { cells: { C8: 'below' } },
    ['unknown-relation at Plan!C8'],
    'Plan!C8 says “below” where a relation belongs. Type <=, >= or =, or at most, at least, exactly.',
  ],
  [
    'an unknown relation in a name',
    { names: { ...parts, 'Week.Relation': '="below"' } },
    ['unknown-relation'],
    'Week.Relation says “below” where a relation belongs. Type <=, >= or =, or at most, at least, exactly.',
  ],
  [
    'headings in a block',
    { cells: { B6: 'Used', C6: 'is', D6: 'Limit' }, names: { 'Week.Constraint': 'Plan!$B$6:$D$9' } },
    ['heading-in-block at Plan!B6'],
    'The line of Week.Constraint at Plan!B6 holds headings. Leave it out of the name, or keep a text in its first cell only.',
  ],
  [
    'a row without decisions that can never hold',
    { cells: { B8: '=G2-G2+130' } },
    ['impossible-row at Plan!C8'],
    'The row Kiln hours (Plan!C8) can never hold: no decision counts in it and it says 130 <= 120. Check its formula and its limit.',
  ],
  [
    'a row whose decisions cancel and that can never hold',
    { cells: { B8: '=0.1*B2+0.2*B2', C8: '>=', D8: '=0.3*B2+1' } },
    ['impossible-row at Plan!C8'],
    'The row Kiln hours (Plan!C8) can never hold: no decision counts in it and it says 0 >= 1. Check its formula and its limit.',
  ],

  // Bounds, lots, least runs.
  [
    'a lower bound above the upper one',
    { cells: { D2: 120 } },
    ['crossing-bounds at Plan!D2'],
    'Floor matt has the lower bound 120 above its upper bound 100 (Plan!D2). Correct one of them.',
  ],
  [
    'an upper bound below 0 without a lower one',
    { cells: { E3: -5 } },
    ['crossing-bounds at Plan!E3'],
    'Wall gloss has the upper bound -5 below its lower bound, which is 0 where none is given (Plan!E3). Give a lower bound too, or the word free.',
  ],
  [
    'a lot',
    { cells: { J2: 12, J3: 0, J4: 4 }, names: { 'Week.Lot': 'Plan!$J$2:$J$4' } },
    ['lot-not-served at Plan!J2'],
    'Week.Lot asks for whole lots (Plan!J2 and 1 more cell), which cannot be planned yet. Clear it to plan any amount.',
  ],
  [
    'a least run',
    { cells: { J2: 25 }, names: { 'Week.LeastRun': 'Plan!$J$2' } },
    ['least-run-not-served at Plan!J2'],
    'Week.LeastRun asks for least runs (Plan!J2), which cannot be planned yet. Clear it to plan any amount.',
  ],
  [
    'a lot below 0',
    { cells: { J2: -2 }, names: { 'Week.Lot': 'Plan!$J$2:$J$4' } },
    ['lot-not-served at Plan!J2', 'negative-lot at Plan!J2'],
    'The lot at Plan!J2 is -2, below 0. Type a lot above 0, or leave the cell blank for any amount.',
  ],
  [
    'a lot of which no multiple lies between the bounds',
    { cells: { J4: 50 }, names: { 'Week.Lot': 'Plan!$J$2:$J$4' } },
    ['lot-out-of-reach at Plan!J4', 'lot-not-served at Plan!J4'],
    'Border can hold no whole lot of 50 between 5 and 40 (Plan!J4). Change the lot or the bounds.',
  ],

  // Formulas (what each function keeps affine is tried in the tests of linearization).
  [
    'a formula that is not affine',
    { cells: { B7: '=ROUND(B2,0)' } },
    ['not-affine at Plan!B7'],
    'Plan!B7 applies ROUND to Floor matt (Plan!B2), which keeps no fixed rate. Leave the rounding out; whole amounts are asked for with a lot.',
  ],
  [
    'a formula that is not affine, behind others that many rows build on',
    { cells: { B7: '=B13', B8: '=B13+B3', A13: [['Hours made', '=B12*B12']], A12: [['Batches', '=B2/4']] } },
    ['not-affine at Plan!B13'],
    'Plan!B13 multiplies amounts that both depend on decisions (*), among them Floor matt (Plan!B2) by way of Batches (Plan!B12). Use only sums of decisions times fixed numbers.',
  ],
  [
    'a circular reference',
    { cells: { B7: '=B2+B13', B13: '=B14', B14: '=B13+B3' } },
    ['circular-reference at Plan!B14'],
    'Plan!B14 depends on itself by way of Plan!B13. Break the circle, so that every formula can be worked out.',
  ],
  [
    'a function that is not known',
    { cells: { B7: '=KILNTIME(B2)' } },
    ['unknown-function at Plan!B7'],
    'Plan!B7 uses KILNTIME, a function that is not known here on the way from Floor matt (Plan!B2). Write the formula with other functions.',
  ],
  [
    'a formula that cannot be read',
    { cells: { B7: '=B2+*' } },
    ['formula-syntax at Plan!B7'],
    'The formula in Plan!B7 cannot be read. Type it again, or mend it in your spreadsheet program.',
  ],
  [
    'a formula nested without end',
    { cells: { B7: `=${'('.repeat(5_000)}B2${')'.repeat(5_000)}` } },
    ['too-deep at Plan!B7'],
    'The formula in Plan!B7 is nested too deeply to be read. Split it over several cells.',
  ],
  [
    'a reference to another workbook',
    { cells: { B7: '=B2*[1]Costs!$B$2' } },
    ['external-reference at Plan!B7'],
    'Plan!B7 refers to another workbook ([1]Costs!$B$2), so its value cannot be worked out. Bring the numbers into this workbook.',
  ],
  [
    'an error value in a formula of the decisions',
    { cells: { B7: '=B2+1/0' } },
    ['error-value at Plan!B7'],
    'Plan!B7 gives the error #DIV/0! on the way from Floor matt (Plan!B2). Mend the formula, or the cell the error comes from.',
  ],
];

const warnings: readonly Fault[] = [
  [
    'decision cells that another plan decides too',
    { names: { 'Month.Decision': 'Plan!$B$4:$B$5' } },
    ['shared-decision at Plan!B4'],
    'Plan!B4 is decided by the plan Month too. Solving one of the two plans changes the other.',
  ],
  [
    'a date where an amount belongs',
    { cells: { D7: { value: 46_010, isDate: true } } },
    ['date-for-amount at Plan!D7'],
    'Plan!D7 in Week.Constraint holds a date, which counts as a large number of days. Check that an amount is meant.',
  ],
  [
    'hidden rows in blocks',
    { hiddenRows: { Plan: [2, 3, 8, 12] } },
    ['hidden-rows at Plan!B2', 'hidden-rows at Plan!B8'],
    'Rows 2 to 3 of the sheet Plan are hidden and count all the same in Week.Decision, Week.Lower and Week.Upper. Unhide them to see what counts.',
  ],
  [
    'a hidden column in a block',
    { hiddenColumns: { Plan: ['E', 'F'] } },
    ['hidden-columns at Plan!E2'],
    'Column E of the sheet Plan is hidden and counts all the same in Week.Upper. Unhide it to see what counts.',
  ],
  [
    'an objective that no decision changes',
    { cells: { B11: '=C2+1' } },
    ['fixed-objective at Plan!B11'],
    'No decision changes the objective at Plan!B11. Every feasible plan is as good as any other; check its formula.',
  ],
  [
    'a constraint block without rows',
    { names: { 'Week.Constraint2': 'Plan!$B$20:$D$25' } },
    ['no-constraint-rows at Plan!B20'],
    'Week.Constraint2 holds no constraint row: nothing is limited by it. Fill it in or delete the name.',
  ],
  [
    'a coefficient that could be a left side',
    {
      cells: { K1: [[5, '<=', '=B2']] },
      names: { 'Week.Decision': 'Plan!$B$2', 'Week.Constraint': 'Plan!$K$1:$M$1', ...noBounds },
    },
    ['read-as-coefficient at Plan!K1'],
    'With one decision cell, Plan!K1 counts as a coefficient of it and not as a left side. Turn the row round if a left side is meant, so that the decision stands on the left.',
  ],
  [
    'a blank coefficient in a row that is filled otherwise',
    { cells: { K1: [[1, null, 1, '<=', 5]] }, names: coefficientBlock },
    ['blank-coefficient at Plan!L1'],
    'The blank coefficient at Plan!L1 counts as 0. Type the 0 if that is right.',
  ],
  [
    'blank coefficients in a sparse block',
    { cells: { K1: [[1, null, null, '<=', 5]] }, names: coefficientBlock },
    ['blank-coefficient at Plan!L1'],
    '2 blank coefficients of Week.Constraint, the first at Plan!L1, count as 0. Check that none is forgotten.',
  ],
  [
    'a blank coefficient of the objective',
    { cells: { C3: null }, names: { 'Week.Objective': 'Plan!$C$2:$C$4' } },
    ['blank-coefficient at Plan!C3'],
    'The blank coefficient at Plan!C3 counts as 0. Type the 0 if that is right.',
  ],
  [
    'a row without decisions that always holds',
    { cells: { B8: '=G2-G2+100' } },
    ['fixed-row at Plan!C8'],
    'No decision counts in the row Kiln hours (Plan!C8), and it always holds. It limits nothing; check its formula.',
  ],
  [
    'a stored value that the formula contradicts',
    { cells: { B9: { formula: 'B2*2', value: 7 } } },
    ['stored-value-differs at Plan!B9'],
    'Plan!B9 shows 7, but its formula gives 20. Have the workbook calculated again and check the cell.',
  ],
];

/** Least runs and lots are errors as long as they cannot be planned, so these warnings come beside one. */
const warningsBesideErrors: readonly Fault[] = [
  [
    'a least run above the upper bound',
    { cells: { J2: 150 }, names: { 'Week.LeastRun': 'Plan!$J$2:$J$4' } },
    ['least-run-not-served at Plan!J2', 'least-run-above-upper at Plan!J2'],
    'The least run 150 of Floor matt (Plan!J2) is above its upper bound 100. Only nothing is possible.',
  ],
  [
    'a least run that the lower bound makes idle',
    { cells: { J4: 5 }, names: { 'Week.LeastRun': 'Plan!$J$2:$J$4' } },
    ['least-run-not-served at Plan!J4', 'least-run-without-effect at Plan!J4'],
    'The least run 5 of Border (Plan!J4) is not above its lower bound 5. It has no effect.',
  ],
];

function sentencesOf(changes: Changes): string[] {
  return readTiles(changes).issues.map(sentenceOfIssue);
}

it.each(errors)('%s is an error', (_title, changes, expected, sentence) => {
  const { model, size, issues } = readTiles(changes);
  expect(issueTexts(issues)).toEqual(expected);
  expect(issues.map(({ severity }) => severity)).toEqual(expected.map(() => 'error'));
  expect([model, size]).toEqual([null, null]);
  expect(sentencesOf(changes)).toContain(sentence);
});

it.each(warnings)('%s is a warning, and the plan is read', (_title, changes, expected, sentence) => {
  const { model, issues } = readTiles(changes);
  expect(issueTexts(issues)).toEqual(expected);
  expect(issues.map(({ severity }) => severity)).toEqual(expected.map(() => 'warning'));
  expect(model).not.toBeNull();
  expect(sentencesOf(changes)).toContain(sentence);
});

it.each(warningsBesideErrors)('%s is a warning beside the error', (_title, changes, expected, sentence) => {
  const { issues } = readTiles(changes);
  expect(issueTexts(issues)).toEqual(expected);
  expect(issues.map(({ severity }) => severity)).toEqual(['error', 'warning']);
  expect(sentencesOf(changes)).toContain(sentence);
});

it('AD-33 a filled Lot is a warning where whole-number demands are dropped, and its bounds need hold no whole lot', () => {
  const changes = { cells: { J2: 12, J4: 50 }, names: { 'Week.Lot': 'Plan!$J$2:$J$4' } };
  const { model, issues } = readPlan(tileWorkbook(changes).snapshot(), 'Week', { now: 0, dropsLots: true });
  expect(issueTexts(issues)).toEqual(['lot-dropped at Plan!J2']);
  expect(issues.map(({ severity }) => severity)).toEqual(['warning']);
  expect(model).not.toBeNull();
  expect(issues.map(sentenceOfIssue)).toEqual([
    'Week.Lot asks for whole lots (Plan!J2 and 1 more cell). The plan takes any amount instead, as asked.',
  ]);
});

it('AD-71 every code of the statement that the rules list is tried above', () => {
  const tried = new Set(
    [...errors, ...warnings, ...warningsBesideErrors].flatMap(([, , issues]) =>
      issues.map((issue) => issue.split(' ')[0]),
    ),
  );
  const rules = readFileSync(join(__dirname, '../../../../addin/SPEC.md'), 'utf8');
  const [ofStatement] = rules.split('| code of a result |');
  const listed = [...ofStatement.matchAll(/^\| (`.*?) \| (?:error|warning) \|/gm)].flatMap(([, codes]) =>
    [...codes.matchAll(/`([a-z-]+)`/g)].map(([, code]) => code),
  );
  // Tried with the formulas themselves: a workbook that gives them would be large, or would need a fault of ours.
  const triedElsewhere = new Set(['array-too-large', 'several-sheets', 'model-disagrees', 'lot-dropped']);
  expect(listed.filter((code) => !triedElsewhere.has(code)).sort()).toEqual([...tried].sort());
});
