/**
 * New values of all formulas that depend on changed cells.
 */
import { columnOfLetters, type CellAddress } from '../sheet/cell-address';
import type { CellValue } from '../sheet/cell-value';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { ArrayPart, CalculationGrid, type FormulaCell } from './calculation-grid';
import { DependencyGraph, forEachNode } from './dependency-graph';
import { Matrix } from './evaluated-value';
import type { RefusalReason } from './evaluation-refusal';
import { Evaluator } from './evaluator';
import { plainNumbers } from './number-domain';

export interface RecalculatedCell {
  readonly cell: CellAddress;
  readonly value: CellValue;
}

/** Why a formula has no new value: a reason of its own, or a cell it builds on has none. */
export type NotRecalculatedReason = RefusalReason['code'] | 'builds-on-such-a-cell';

export interface Recalculation {
  /**
   * Every formula cell, and every cell filled by an array formula, that depends on a changed cell, or of which that
   * cannot be told without working it out.
   */
  readonly values: readonly RecalculatedCell[];
  /** A formula that cannot be read at all is among these: it may depend on anything. */
  readonly notRecalculated: readonly { readonly cell: CellAddress; readonly reason: NotRecalculatedReason }[];
}

/**
 * Formulas count as depending through others, names, tables and array formulas. Cells that do not depend on a change
 * count with the value stored in the workbook; where none is stored, they are worked out.
 *
 * @param changes new numbers by formatCellAddress
 * @param now date and time of TODAY and NOW, as a serial date of the workbook
 */
export function recalculate(
  workbook: WorkbookSnapshot,
  changes: ReadonlyMap<string, number>,
  now: number,
): Recalculation {
  const grid = new CalculationGrid(workbook, [...changes.keys()].map(addressOfText));
  const inputs = [...changes.values()];
  grid.readAllSheets();
  const storedValues = new Evaluator(grid, {
    domain: plainNumbers,
    inputs,
    now,
    needsEvaluation: (cell) => cell.cell.value === undefined,
  });
  const graph = new DependencyGraph(grid, (cell, node) => storedValues.resolveReference(cell, node));
  const evaluator = new Evaluator(grid, {
    domain: plainNumbers,
    inputs,
    now,
    needsEvaluation: (cell) => graph.needsEvaluation(cell),
  });
  grid.formulaCells.forEach((cell) => graph.visit(cell));

  const values: RecalculatedCell[] = [];
  const notRecalculated: { cell: CellAddress; reason: NotRecalculatedReason }[] = [];
  for (const cell of graph.order) {
    // A changed cell that held a formula is given, not calculated.
    const isGiven = cell.grid.at(cell.row, cell.column) !== cell;
    const node = graph.visit(cell);
    if (isGiven || !(node.dependsOnInputs || node.isUncertain)) {
      continue;
    }
    const outcome = evaluator.outcomeOf(cell);
    for (const filled of cellsFilledBy(cell)) {
      if (outcome.kind === 'value') {
        const { value } = outcome;
        const part =
          value instanceof Matrix ? value.at(filled.row - cell.row, filled.column - cell.column) : value;
        values.push({ cell: filled, value: (part ?? 0) as CellValue });
      } else {
        const reason = outcome.kind === 'refused' ? outcome.refusal.reason.code : 'builds-on-such-a-cell';
        notRecalculated.push({ cell: filled, reason });
      }
    }
  }
  return { values, notRecalculated };
}

/** The cell itself, and for an array formula the other cells that it fills. */
function cellsFilledBy(cell: FormulaCell): CellAddress[] {
  const filled = [cell.address];
  if (cell.cell.arrayRange !== undefined) {
    forEachNode(cell.grid, cell.cell.arrayRange, (node) => {
      if (node instanceof ArrayPart && node.anchor === cell) {
        filled.push({ sheet: cell.grid.name, row: node.row, column: node.column });
      }
    });
  }
  return filled;
}

/** @throws RangeError where the text is no cell as formatCellAddress writes it */
function addressOfText(text: string): CellAddress {
  const match = /^(.+)!([A-Za-z]{1,3})(\d+)$/s.exec(text);
  if (match === null) {
    throw new RangeError(`"${text}" is no cell of a sheet, such as Plan!B7.`);
  }
  const [, sheet, letters, row] = match;
  const name = sheet.startsWith("'") ? sheet.slice(1, -1).replaceAll("''", "'") : sheet;
  return { sheet: name, row: Number(row) - 1, column: columnOfLetters(letters) };
}
