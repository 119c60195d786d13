/**
 * What is to stand beside each block of the plan: for a decision block Before, Optimum and Reduced cost, for a set of
 * constraint rows Left side, Slack and Dual value. Values only; where they stand is free-columns.ts.
 *
 * A block's *lines* run along it: the rows of a block that stands upright, the columns of one lying on its side.
 * Lines that hold no decision or constraint row (blanks, headings) stay empty in the results.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { ConstraintRow, SheetModel } from '../model-from-sheet/sheet-model';
import type { PlanSolution } from './plan-solution';
import { constraintResultRoles, decisionResultRoles, resultNameOf, type ResultRole } from './result-roles';

/** How a block lies on its sheet. A grid (several rows and several columns) has no side to stand beside. */
export type BlockOrientation = 'upright' | 'lying' | 'grid';

/** One line of results. */
export interface ResultLine {
  /** Position along the block from 0: its row within an upright block, its column within a lying one. */
  readonly line: number;
  readonly label: string;
  /** The cell that these results are about, referred to where results stand on a sheet of their own. */
  readonly about: CellAddress;
  /** What that cell holds once the plan is written. */
  readonly aboutValue: number;
}

export interface ResultColumn {
  readonly role: ResultRole;
  /** The column's defined name. */
  readonly name: string;
  /** One a ResultLine; null where nothing is known (a decision cell that was blank before). */
  readonly values: readonly (number | null)[];
  /** The cell whose number format each value takes, one a ResultLine; undefined: the cell keeps its own. */
  readonly formatOf: readonly (CellAddress | undefined)[];
}

export interface ResultBlock {
  readonly kind: 'decisions' | 'constraints';
  /** 1 for `Decision` or `Constraint`, 2 for the next, … */
  readonly number: number;
  readonly orientation: BlockOrientation;
  /** The planner's block: results stand beside it and never in it. */
  readonly range: CellRange;
  /** Lines of the block, blank ones and headings included; in a grid one a decision. */
  readonly lineCount: number;
  readonly lines: readonly ResultLine[];
  readonly columns: readonly ResultColumn[];
}

/** The results of every block of the plan: decision blocks first, then sets of constraint rows. */
export function resultBlocksOf(model: SheetModel, solution: PlanSolution): ResultBlock[] {
  return [...decisionResults(model, solution), ...constraintResults(model, solution)];
}

function decisionResults(model: SheetModel, solution: PlanSolution): ResultBlock[] {
  return model.decisionBlocks.map((block) => {
    const decisions = model.decisions.slice(block.first, block.end);
    const solved = solution.decisions.slice(block.first, block.end);
    const range = smallestRangeOf(decisions.map((decision) => decision.cell));
    const orientation = orientationOf(range);
    const own = decisions.map((decision) => decision.cell);
    const objective = decisions.map(() => model.objectiveCell ?? undefined);
    const contents: Record<
      (typeof decisionResultRoles)[number],
      Pick<ResultColumn, 'values' | 'formatOf'>
    > = {
      Before: { values: decisions.map((decision) => decision.before), formatOf: own },
      Optimum: { values: solved.map((decision) => decision.value), formatOf: own },
      ReducedCost: { values: solved.map((decision) => decision.reducedCost), formatOf: objective },
    };
    return {
      kind: 'decisions',
      number: block.number,
      orientation,
      range,
      lineCount: orientation === 'grid' ? decisions.length : lineCountOf(range, orientation),
      lines: decisions.map((decision, position) => ({
        line: orientation === 'grid' ? position : lineOf(decision.cell, range, orientation),
        label: decision.label,
        about: decision.cell,
        aboutValue: solved[position].value,
      })),
      columns: decisionResultRoles.map((role) => ({
        role,
        name: resultNameOf(model, role, block.number),
        ...contents[role],
      })),
    };
  });
}

function constraintResults(model: SheetModel, solution: PlanSolution): ResultBlock[] {
  const blocks: ResultBlock[] = [];
  let first = 0;
  for (const set of model.constraintSets) {
    const solved = solution.constraints.slice(first, first + set.rows.length);
    first += set.rows.length;
    const orientation = set.isLying ? 'lying' : 'upright';
    const right = set.rows.map((row) => row.rightCell);
    const objective = set.rows.map(() => model.objectiveCell ?? undefined);
    const contents: Record<
      (typeof constraintResultRoles)[number],
      Pick<ResultColumn, 'values' | 'formatOf'>
    > = {
      LeftSide: { values: solved.map((row) => row.leftSide), formatOf: right },
      Slack: { values: solved.map((row) => row.slack), formatOf: right },
      DualValue: { values: solved.map((row) => row.dualValue), formatOf: objective },
    };
    blocks.push({
      kind: 'constraints',
      number: set.number,
      orientation,
      range: set.range,
      lineCount: lineCountOf(set.range, orientation),
      lines: set.rows.map((row, position) => ({
        line: lineOf(placeOfRow(row), set.range, orientation),
        label: row.label,
        about: row.rightCell,
        aboutValue: solved[position].rightSide,
      })),
      columns: constraintResultRoles.map((role) => ({
        role,
        name: resultNameOf(model, role, set.number),
        ...contents[role],
      })),
    });
  }
  return blocks;
}

/** Where a constraint row stands within its set's range: its left cell, or in coefficient form its relation. */
function placeOfRow(row: ConstraintRow): CellAddress {
  return row.leftCell ?? row.cell;
}

function orientationOf(range: CellRange): BlockOrientation {
  if (range.left === range.right) {
    return 'upright';
  }
  return range.top === range.bottom ? 'lying' : 'grid';
}

function lineCountOf(range: CellRange, orientation: BlockOrientation): number {
  return orientation === 'lying' ? range.right - range.left + 1 : range.bottom - range.top + 1;
}

function lineOf(cell: CellAddress, range: CellRange, orientation: BlockOrientation): number {
  return orientation === 'lying' ? cell.column - range.left : cell.row - range.top;
}

function smallestRangeOf(cells: readonly CellAddress[]): CellRange {
  let { row: top, column: left } = cells[0];
  let { row: bottom, column: right } = cells[0];
  for (const { row, column } of cells) {
    top = Math.min(top, row);
    bottom = Math.max(bottom, row);
    left = Math.min(left, column);
    right = Math.max(right, column);
  }
  return { sheet: cells[0].sheet, top, left, bottom, right };
}
