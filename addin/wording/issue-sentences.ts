/**
 * The one place where an issue of a plan becomes a sentence: what is wrong, where, and what to do about it.
 */
import type { IssueCode, ModelIssue } from '../domain/model-from-sheet/model-issue';
import { formatCellAddress } from '../domain/sheet/cell-address';
import { formulaSentence } from './formula-sentences';
import { amountText, countText, listText, quoted } from './word-forms';

/** An issue of one code, with the facts of that code. */
type IssueWithCode<Code extends IssueCode> = Extract<ModelIssue, { code: Code }>;

/** The sentence for a planner: one, or two short ones. */
export function sentenceOfIssue(issue: ModelIssue): string {
  switch (issue.code) {
    case 'missing-decision':
    case 'missing-objective':
    case 'missing-sense':
    case 'missing-part':
    case 'numbering-gap':
    case 'duplicate-name':
    case 'name-without-block':
    case 'unknown-sense':
      return sentenceOfMissing(issue);
    case 'dead-name':
    case 'external-name':
    case 'unknown-name-target':
    case 'computed-name':
    case 'not-a-range':
    case 'repeated-cells':
      return sentenceOfReference(issue);
    case 'not-one-cell':
    case 'not-one-line':
    case 'unequal-lengths':
    case 'wrong-shape':
    case 'wrong-objective-shape':
    case 'wrong-label-count':
    case 'wrong-constraint-shape':
    case 'scattered-block':
      return sentenceOfShape(issue);
    case 'decision-holds-formula':
    case 'decision-holds-text':
    case 'duplicate-decision':
    case 'shared-decision':
      return sentenceOfDecision(issue);
    case 'text-for-number':
    case 'text-looks-like-number':
    case 'truth-value-for-number':
    case 'error-value-for-number':
    case 'date-for-amount':
    case 'coefficient-depends':
    case 'bound-depends':
    case 'merged-cells':
    case 'hidden-rows':
    case 'hidden-columns':
      return sentenceOfCells(issue);
    case 'blank-objective':
    case 'fixed-objective':
    case 'blank-left-side':
    case 'blank-right-side':
    case 'missing-relation':
    case 'strict-relation':
    case 'unknown-relation':
    case 'heading-in-block':
    case 'no-constraint-rows':
    case 'read-as-coefficient':
    case 'blank-coefficient':
    case 'fixed-row':
    case 'impossible-row':
      return sentenceOfRow(issue);
    case 'crossing-bounds':
    case 'lot-not-served':
    case 'lot-dropped':
    case 'least-run-not-served':
    case 'negative-lot':
    case 'lot-out-of-reach':
    case 'least-run-above-upper':
    case 'least-run-without-effect':
      return sentenceOfBounds(issue);
    case 'not-affine':
    case 'circular-reference':
    case 'unknown-function':
    case 'formula-syntax':
    case 'too-deep':
    case 'array-too-large':
    case 'external-reference':
    case 'several-sheets':
    case 'error-value':
    case 'stored-value-differs':
    case 'model-disagrees':
      return formulaSentence(issue);
  }
}

/** `Plan!B7`, or the name where the issue has no cell. */
function placeOf(issue: { readonly cell: ModelIssue['cell'] }, name: string): string {
  return issue.cell === null ? name : formatCellAddress(issue.cell);
}

function sentenceOfMissing(
  issue: IssueWithCode<
    | 'missing-decision'
    | 'missing-objective'
    | 'missing-sense'
    | 'missing-part'
    | 'numbering-gap'
    | 'duplicate-name'
    | 'name-without-block'
    | 'unknown-sense'
  >,
): string {
  switch (issue.code) {
    case 'missing-decision':
      return `The plan ${issue.facts.plan} has no decision cells. Define the name ${issue.facts.name} for the cells whose amounts are to be found.`;
    case 'missing-objective':
      return `The name ${issue.facts.name} is missing. Define it for the cell with the amount to make best, or for one coefficient a decision cell.`;
    case 'missing-sense': {
      const place =
        issue.cell === null ? `The name ${issue.facts.name} is missing` : `${placeOf(issue, '')} is blank`;
      return issue.cell === null
        ? `${place}. Define it for a cell that says maximise or minimise.`
        : `${place}, but ${issue.facts.name} refers to it. Type maximise or minimise there.`;
    }
    case 'missing-part':
      return `${issue.facts.present} has no ${issue.facts.name} to go with it. Constraint rows whose parts stand apart need a left side, a relation and a right side.`;
    case 'numbering-gap':
      return `There is ${issue.facts.present} but no ${issue.facts.name}. Number the names 2, 3, … without gaps; the first has no number.`;
    case 'duplicate-name':
      return `${listText(issue.facts.names)} say the same thing twice. Delete one of these names.`;
    case 'name-without-block':
      return `${issue.facts.name} belongs to ${issue.facts.block}, which does not exist. Define that name or delete this one.`;
    case 'unknown-sense':
      return `${placeOf(issue, issue.facts.name)} says ${quoted(issue.facts.text)} where maximise or minimise is needed. Type one of these two words.`;
  }
}

function sentenceOfReference(
  issue: IssueWithCode<
    'dead-name' | 'external-name' | 'unknown-name-target' | 'computed-name' | 'not-a-range' | 'repeated-cells'
  >,
): string {
  const { name } = issue.facts;
  switch (issue.code) {
    case 'dead-name':
      return `${name} refers to cells that were deleted (#REF!). Point the name at the right cells or delete it.`;
    case 'external-name':
      return `${name} refers to another workbook. Point it at cells of this one.`;
    case 'unknown-name-target':
      return `${name} refers to ${quoted(issue.facts.what)}, which does not exist in this workbook. Point the name at the right cells.`;
    case 'computed-name':
      return `${name} works its range out with ${issue.facts.function}, which is not read yet. Point the name straight at the cells.`;
    case 'not-a-range':
      return `${name} does not refer to cells of one sheet. Point it at a block of cells.`;
    case 'repeated-cells':
      return `${name} lists the same cells twice, from ${placeOf(issue, name)} on. Leave each cell in the name once.`;
  }
}

function sentenceOfShape(
  issue: IssueWithCode<
    | 'not-one-cell'
    | 'not-one-line'
    | 'unequal-lengths'
    | 'wrong-shape'
    | 'wrong-objective-shape'
    | 'wrong-label-count'
    | 'wrong-constraint-shape'
    | 'scattered-block'
  >,
): string {
  switch (issue.code) {
    case 'not-one-cell':
      return `${issue.facts.name} refers to ${issue.facts.shape} cells. Point it at one cell.`;
    case 'not-one-line':
      return `${issue.facts.name} refers to ${issue.facts.shape} cells. Point it at the cells of one row or one column.`;
    case 'unequal-lengths':
      return `${listText(issue.facts.names)} must be equally long, but have ${listText(issue.facts.lengths)} cells. Give each constraint row a cell in each.`;
    case 'wrong-shape':
      return `${issue.facts.name} has ${issue.facts.shape} cells and ${issue.facts.block} has ${issue.facts.blockShape}. Give it the same shape, or one cell for all of the block.`;
    case 'wrong-objective-shape':
      return `${issue.facts.name} has ${issue.facts.shape} cells and ${issue.facts.block} has ${issue.facts.blockShape}. Give it one coefficient a decision cell in the same shape, or one cell with a formula for the whole plan.`;
    case 'wrong-label-count':
      return `${issue.facts.name} has ${countText(issue.facts.count, 'cell')} where ${issue.facts.expected} labels are needed. Point it at one cell a label.`;
    case 'wrong-constraint-shape': {
      const { name, shape, decisions } = issue.facts;
      const coefficients = countText(decisions, 'coefficient');
      return `${name} has ${shape} cells, which is no block of constraint rows. It needs 3 columns (left side, relation, right side) or ${decisions + 2} (${coefficients}, relation, right side).`;
    }
    case 'scattered-block':
      return `The parts of ${issue.facts.name} do not lie in line with each other. Give parts that stand elsewhere a name of their own, with the next number.`;
  }
}

function sentenceOfDecision(
  issue: IssueWithCode<
    'decision-holds-formula' | 'decision-holds-text' | 'duplicate-decision' | 'shared-decision'
  >,
): string {
  const place = placeOf(issue, '');
  switch (issue.code) {
    case 'decision-holds-formula':
      return `${place} in ${issue.facts.name} holds a formula, so its amount cannot be decided. Clear the cell, or leave it out of the name.`;
    case 'decision-holds-text':
      return `${place} in ${issue.facts.name} holds the text ${quoted(issue.facts.text)}. Clear the cell, or leave it out of the name.`;
    case 'duplicate-decision': {
      const { names, count } = issue.facts;
      const cells = count === 1 ? place : `${place} and ${countText(count - 1, 'more cell')}`;
      return `${cells} ${count === 1 ? 'is' : 'are'} named twice in ${listText(names)}. Leave each decision cell in one block once.`;
    }
    case 'shared-decision': {
      const { plan, count } = issue.facts;
      const cells = count === 1 ? `${place} is` : `${place} and ${countText(count - 1, 'more cell')} are`;
      return `${cells} decided by the plan ${plan} too. Solving one of the two plans changes the other.`;
    }
  }
}

function sentenceOfCells(
  issue: IssueWithCode<
    | 'text-for-number'
    | 'text-looks-like-number'
    | 'truth-value-for-number'
    | 'error-value-for-number'
    | 'date-for-amount'
    | 'coefficient-depends'
    | 'bound-depends'
    | 'merged-cells'
    | 'hidden-rows'
    | 'hidden-columns'
  >,
): string {
  const place = placeOf(issue, '');
  switch (issue.code) {
    case 'text-for-number':
      return `${place} in ${issue.facts.name} holds the text ${quoted(issue.facts.text)} where a number belongs. Type the number, or leave the cell out of the name.`;
    case 'text-looks-like-number':
      return `${place} in ${issue.facts.name} holds ${quoted(issue.facts.text)} as a text, not as a number. Give the cell a number format and type it again.`;
    case 'truth-value-for-number':
      return `${place} in ${issue.facts.name} holds TRUE or FALSE where a number belongs. Type 1 or 0 if that is meant.`;
    case 'error-value-for-number':
      return `${place} in ${issue.facts.name} holds the error ${issue.facts.error}. Mend the formula there first.`;
    case 'date-for-amount':
      return `${place} in ${issue.facts.name} holds a date, which counts as a large number of days. Check that an amount is meant.`;
    case 'coefficient-depends':
      return `${place} in ${issue.facts.name} is a coefficient, but its formula depends on a decision. Make it a number that no decision changes.`;
    case 'bound-depends':
      return `${place} in ${issue.facts.name} depends on a decision, but a bound must not. Write this limit as a constraint row.`;
    case 'merged-cells':
      return `The merged cell ${issue.facts.merged} hides cells of ${issue.facts.name}. Unmerge it.`;
    case 'hidden-rows':
    case 'hidden-columns': {
      const { names, lines, count } = issue.facts;
      const kind = issue.code === 'hidden-rows' ? 'Row' : 'Column';
      const sheet = issue.cell === null ? '' : ` of the sheet ${issue.cell.sheet}`;
      return count === 1
        ? `${kind} ${lines}${sheet} is hidden and counts all the same in ${listText(names)}. Unhide it to see what counts.`
        : `${kind}s ${lines}${sheet} are hidden and count all the same in ${listText(names)}. Unhide them to see what counts.`;
    }
  }
}

function sentenceOfRow(
  issue: IssueWithCode<
    | 'blank-objective'
    | 'fixed-objective'
    | 'blank-left-side'
    | 'blank-right-side'
    | 'missing-relation'
    | 'strict-relation'
    | 'unknown-relation'
    | 'heading-in-block'
    | 'no-constraint-rows'
    | 'read-as-coefficient'
    | 'blank-coefficient'
    | 'fixed-row'
    | 'impossible-row'
  >,
): string {
  const place = placeOf(issue, issue.facts.name);
  switch (issue.code) {
    case 'blank-objective':
      return `The objective ${issue.facts.name} is blank at ${place}. Put the formula there that the plan should make best.`;
    case 'fixed-objective':
      return `No decision changes the objective at ${place}. Every feasible plan is as good as any other; check its formula.`;
    case 'blank-left-side':
      return `The left side ${place} is blank although its row has content. Fill it in or clear the row.`;
    case 'blank-right-side':
      return `The right side ${place} is blank although its row has content. Type the limit, 0 if none is left.`;
    case 'missing-relation':
      return `The relation at ${place} is missing. Type <=, >= or = (with an apostrophe before it: '=), or at most, at least, exactly.`;
    case 'strict-relation':
      return `${place} says ${quoted(issue.facts.text)}, which no plan can keep apart from ${issue.facts.text}=. Type ${issue.facts.text}= there.`;
    case 'unknown-relation':
      return `${place} says ${quoted(issue.facts.text)} where a relation belongs. Type <=, >= or =, or at most, at least, exactly.`;
    case 'heading-in-block':
      return `The line of ${issue.facts.name} at ${place} holds headings. Leave it out of the name, or keep a text in its first cell only.`;
    case 'no-constraint-rows':
      return `${issue.facts.name} holds no constraint row: nothing is limited by it. Fill it in or delete the name.`;
    case 'read-as-coefficient':
      return `With one decision cell, ${place} counts as a coefficient of it and not as a left side. Turn the row round if a left side is meant, so that the decision stands on the left.`;
    case 'blank-coefficient': {
      const { count } = issue.facts;
      return count === 1
        ? `The blank coefficient at ${place} counts as 0. Type the 0 if that is right.`
        : `${countText(count, 'blank coefficient')} of ${issue.facts.name}, the first at ${place}, count as 0. Check that none is forgotten.`;
    }
    case 'fixed-row':
      return `No decision counts in the row ${issue.facts.row} (${place}), and it always holds. It limits nothing; check its formula.`;
    case 'impossible-row': {
      const { row, left, relation, right } = issue.facts;
      return `The row ${row} (${place}) can never hold: no decision counts in it and it says ${amountText(left)} ${relation} ${amountText(right)}. Check its formula and its limit.`;
    }
  }
}

function sentenceOfBounds(
  issue: IssueWithCode<
    | 'crossing-bounds'
    | 'lot-not-served'
    | 'lot-dropped'
    | 'least-run-not-served'
    | 'negative-lot'
    | 'lot-out-of-reach'
    | 'least-run-above-upper'
    | 'least-run-without-effect'
  >,
): string {
  const place = placeOf(issue, '');
  switch (issue.code) {
    case 'crossing-bounds': {
      const { decision, lower, upper, isLowerGiven } = issue.facts;
      return isLowerGiven === 'yes'
        ? `${decision} has the lower bound ${amountText(lower)} above its upper bound ${amountText(upper)} (${place}). Correct one of them.`
        : `${decision} has the upper bound ${amountText(upper)} below its lower bound, which is ${amountText(lower)} where none is given (${place}). Give a lower bound too, or the word free.`;
    }
    case 'lot-not-served':
      return `${issue.facts.name} asks for whole lots (${cellsText(place, issue.facts.count)}), which cannot be planned yet. Clear it to plan any amount.`;
    case 'lot-dropped':
      return `${issue.facts.name} asks for whole lots (${cellsText(place, issue.facts.count)}). The plan takes any amount instead, as asked.`;
    case 'least-run-not-served':
      return `${issue.facts.name} asks for least runs (${cellsText(place, issue.facts.count)}), which cannot be planned yet. Clear it to plan any amount.`;
    case 'negative-lot':
      return `The lot at ${place} is ${amountText(issue.facts.lot)}, below 0. Type a lot above 0, or leave the cell blank for any amount.`;
    case 'lot-out-of-reach': {
      const { decision, lot, lower, upper } = issue.facts;
      return `${decision} can hold no whole lot of ${amountText(lot)} between ${amountText(lower)} and ${amountText(upper)} (${place}). Change the lot or the bounds.`;
    }
    case 'least-run-above-upper': {
      const { decision, leastRun, upper } = issue.facts;
      return `The least run ${amountText(leastRun)} of ${decision} (${place}) is above its upper bound ${amountText(upper)}. Only nothing is possible.`;
    }
    case 'least-run-without-effect': {
      const { decision, leastRun, lower } = issue.facts;
      return `The least run ${amountText(leastRun)} of ${decision} (${place}) is not above its lower bound ${amountText(lower)}. It has no effect.`;
    }
  }
}

/** `Plan!B7`, `Plan!B7 and 3 more cells`. */
function cellsText(place: string, count: number): string {
  return count === 1 ? place : `${place} and ${countText(count - 1, 'more cell')}`;
}
