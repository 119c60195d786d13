/**
 * The reductions in the order in which they are tried at one place: the cheap and certain before those that build on
 * what they leave.
 */
import type { ColumnReduction, ProblemReduction, RowReduction } from '../reduction';
import { columnSingletonSlack } from './column-singleton-slack';
import { dominatedColumn } from './dominated-column';
import { doubletonEquation } from './doubleton-equation';
import { dualFixing } from './dual-fixing';
import { duplicateColumns } from './duplicate-columns';
import { duplicateRows } from './duplicate-rows';
import { emptyColumn } from './empty-column';
import { emptyRow } from './empty-row';
import { fixedColumn } from './fixed-column';
import { forcingRow } from './forcing-row';
import { freeColumnSingleton } from './free-column-singleton';
import { impliedFreeSubstitution } from './implied-free-substitution';
import { redundantRow } from './redundant-row';
import { rowSatisfyingColumn } from './row-satisfying-column';
import { singletonRow } from './singleton-row';

/** A reduction as the driver sees it; the kind of its records is its own affair. */
type WithoutRecord<R> = Omit<R, 'undo'>;

export interface ReductionSet {
  readonly ofRows: readonly WithoutRecord<RowReduction<never>>[];
  readonly ofColumns: readonly WithoutRecord<ColumnReduction<never>>[];
  readonly ofProblem: readonly WithoutRecord<ProblemReduction<never>>[];
}

export const allReductions: ReductionSet = {
  ofRows: [
    emptyRow,
    singletonRow,
    forcingRow,
    redundantRow,
    freeColumnSingleton,
    columnSingletonSlack,
    doubletonEquation,
  ],
  ofColumns: [fixedColumn, emptyColumn, dualFixing, rowSatisfyingColumn, impliedFreeSubstitution],
  ofProblem: [dominatedColumn, duplicateRows, duplicateColumns],
};
