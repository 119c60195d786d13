/**
 * A plan as read from its sheet: the model with an address on every part.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellRange } from '../sheet/cell-range';
import type { AffineForm } from '../linearization/affine-form';
import type { DefiningRow } from '../linearization/defining-rows';

export type { DefiningRow };

export type PlanSense = 'minimise' | 'maximise';
export type Relation = '<=' | '>=' | '=';

export interface DecisionCell {
  readonly cell: CellAddress;
  /** Found or named; unique within the plan. */
  readonly label: string;
  /** Which decision block, from 0. */
  readonly block: number;
  /** What the cell holds now; null when blank. */
  readonly before: number | null;
  /** −Infinity and Infinity where there is none. */
  readonly lower: number;
  readonly upper: number;
}

export interface DecisionBlock {
  /** 1 for `Decision`, 2 for `Decision2`, … */
  readonly number: number;
  /** The smallest rectangle that holds the block. */
  readonly range: CellRange;
  /** The block's rectangles in the order written: one, unless the name is a union. */
  readonly ranges: readonly CellRange[];
  /** Positions in SheetModel.decisions of its first cell and one past its last; row by row. */
  readonly first: number;
  readonly end: number;
}

export interface ConstraintRow {
  /** The relation's cell; the left cell where Relation is one constant. */
  readonly cell: CellAddress;
  readonly label: string;
  /** Which set of constraint rows, from 0. */
  readonly set: number;
  /** Row (upright) or column (lying on its side) of the sheet within the set, from 0: blanks and headings count. */
  readonly line: number;
  readonly relation: Relation;
  /** Both sides as affine forms of the decisions. */
  readonly left: AffineForm;
  readonly right: AffineForm;
  /** The cells of the two sides; in coefficient form leftCell is null. */
  readonly leftCell: CellAddress | null;
  readonly rightCell: CellAddress;
}

export interface ConstraintSet {
  /**
   * 1 for `Constraint` or `Left`, 2 for `Constraint2` or `Left2`, …; unique. Where a block and parts have the same
   * number in their names, the parts take the next free one. Labels and result names go by it.
   */
  readonly number: number;
  /** The defined name of the block or of its left sides, as written: `Week.Constraint`, `Week.Left2`. */
  readonly name: string;
  /** How the rows stand in that block; `parts`: left sides, relations and right sides apart. */
  readonly form: 'formula' | 'coefficient' | 'parts';
  /** Upright: one line a sheet row. Lying: one line a sheet column. */
  readonly isLying: boolean;
  /** The smallest rectangle holding the block, or the left sides (parts apart). */
  readonly range: CellRange;
  readonly rows: readonly ConstraintRow[];
}

export interface SheetModel {
  /** The plan's name: `Week`, or `Week @ Sheet name` for a sheet-local plan. */
  readonly planName: string;
  /** The prefix of its names as written, and the separator: `Week` and `.`. */
  readonly prefix: string;
  readonly separator: '.' | '_';
  /** Sheet of a sheet-local plan; null for workbook scope. */
  readonly scope: string | null;
  readonly sense: PlanSense;
  readonly decisions: readonly DecisionCell[];
  readonly decisionBlocks: readonly DecisionBlock[];
  readonly objective: AffineForm;
  /** null where the objective is given by coefficients. */
  readonly objectiveCell: CellAddress | null;
  readonly constraintSets: readonly ConstraintSet[];
  readonly definingRows: readonly DefiningRow[];
}
