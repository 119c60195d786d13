/**
 * Labels for the decision cells and constraint rows of a plan: from the planner's label blocks where there are such,
 * otherwise found beside the cells.
 */
import type { CellAddress } from '../sheet/cell-address';
import type { CellReader } from './cell-reader';
import type { LabelFinder, LabelGroup } from './find-labels';
import {
  cellCountOfArea,
  cellsOfArea,
  firstCellOf,
  type ModelDeclaration,
  type NamedArea,
} from './model-declaration';
import { statementIssue } from './model-issue';
import type { UnlabelledSet } from './read-constraints';
import type { DecisionReading } from './read-decisions';
import type { ConstraintSet } from './sheet-model';

/** One label a decision cell. */
export function labelDecisions(
  declaration: ModelDeclaration,
  { cells, blocks }: DecisionReading,
  finder: LabelFinder,
  reader: CellReader,
): string[] {
  const groups = blocks.map((block): LabelGroup => {
    const count = block.end - block.first;
    const labelCells = labelCellsFor(declaration.decisionLabels, block.number, [count], reader);
    return {
      subjects: cells.slice(block.first, block.end).map((cell, k) => ({
        cell,
        ownCell: cell,
        labelCell: labelCells?.[k],
      })),
      isLying: block.range.top === block.range.bottom && block.range.left !== block.range.right,
    };
  });
  return finder.labelsOf(groups).flat();
}

/** The sets with a label on every row. A label block has one cell a line of its set, or one a constraint row. */
export function labelConstraints(
  declaration: ModelDeclaration,
  sets: readonly UnlabelledSet[],
  finder: LabelFinder,
  reader: CellReader,
): ConstraintSet[] {
  const groups = sets.map((set): LabelGroup => {
    const counts = [set.lineCount, set.rowCount];
    const labelCells = labelCellsFor(declaration.constraintLabels, set.number, counts, reader);
    const goesByLine = labelCells?.length === set.lineCount;
    return {
      subjects: set.rows.map(({ firstCell, cell, linePosition, rowPosition }) => ({
        cell: firstCell,
        ownCell: cell,
        labelCell: labelCells?.[goesByLine ? linePosition : rowPosition],
      })),
      isLying: set.isLying,
    };
  });
  const labels = finder.labelsOf(groups);
  return sets.map(({ number, name, form, isLying, range, rows }, s) => ({
    number,
    name,
    form,
    isLying,
    range,
    rows: rows.map(({ cell, line, relation, left, right, leftCell, rightCell }, i) => ({
      cell,
      label: labels[s][i],
      set: s,
      line,
      relation,
      left,
      right,
      leftCell,
      rightCell,
    })),
  }));
}

/** @param counts the numbers of cells that a label block may have */
function labelCellsFor(
  areas: readonly NamedArea[],
  number: number,
  counts: readonly number[],
  reader: CellReader,
): CellAddress[] | undefined {
  const area = areas.find((candidate) => candidate.number === number);
  if (area === undefined) {
    return undefined;
  }
  const count = cellCountOfArea(area);
  if (!counts.includes(count)) {
    const facts = { name: area.name, count, expected: counts[0] };
    reader.report(statementIssue('wrong-label-count', firstCellOf(area), facts));
    return undefined;
  }
  return cellsOfArea(area);
}
