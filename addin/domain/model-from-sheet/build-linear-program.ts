/**
 * The model of a sheet as a linear program, and the map between its rows and columns and the parts of the model.
 *
 * Columns: the decision cells in their order, then one free column for every cell with a defining row. Rows: the
 * constraint rows, set by set in their order, then the defining rows. A constraint row is left − right with the
 * constants moved to the right, so its dual value is per unit added to the right side as a constant.
 */
import { LinearProgramBuilder, type LinearProgram } from '#solver-core';
import { formatCellAddress } from '../sheet/cell-address';
import { endlessAbove, endlessBelow } from './endless-amounts';
import { holdsWithoutDecisions, rowDifference, type RowDifference } from './row-difference';
import type { Relation, SheetModel } from './sheet-model';

export interface BuiltProgram {
  readonly problem: LinearProgram;
  /** Column of decision k; as many as the model has decisions. */
  readonly decisionColumns: readonly number[];
  /** Row of constraintSets[s].rows[i], by s and i. */
  readonly constraintRows: readonly (readonly number[])[];
  /** Row and column of definingRows[d]. */
  readonly definingRows: readonly number[];
  readonly definingColumns: readonly number[];
}

/**
 * @throws InvalidProblemError when the model holds what `readPlan` reports as an error, such as bounds that cross
 */
export function buildLinearProgram(model: SheetModel): BuiltProgram {
  const builder = new LinearProgramBuilder({ name: model.planName, sense: model.sense });
  const columnNames = new UniqueNames();
  const rowNames = new UniqueNames();
  builder.objectiveConstant = model.objective.constant;

  const costs = new Map(
    model.objective.variables.map((variable, i) => [variable, model.objective.coefficients[i]]),
  );
  const columnOfVariable = new Map<number, number>();
  const decisionColumns = model.decisions.map((decision, variable) => {
    const column = builder.addColumn({
      name: columnNames.take(decision.label),
      cost: costs.get(variable) ?? 0,
      lower: decision.lower,
      upper: decision.upper,
    });
    columnOfVariable.set(variable, column);
    return column;
  });
  const definingColumns = model.definingRows.map(({ variable, cell }) => {
    const column = builder.addColumn({
      name: columnNames.take(formatCellAddress(cell)),
      cost: costs.get(variable) ?? 0,
      lower: -Infinity,
      upper: Infinity,
    });
    columnOfVariable.set(variable, column);
    return column;
  });
  const addTerms = (row: number, variables: readonly number[], coefficients: readonly number[]): void => {
    variables.forEach((variable, i) => builder.addEntry(row, columnOf(variable), coefficients[i]));
  };
  const columnOf = (variable: number): number => {
    const column = columnOfVariable.get(variable);
    if (column === undefined) {
      throw new RangeError(`The model uses variable ${variable}, which it does not define.`);
    }
    return column;
  };

  const constraintRows = model.constraintSets.map((set) =>
    set.rows.map(({ label, left, relation, right }) => {
      const difference = rowDifference(left, right);
      const row = builder.addRow({ name: rowNames.take(label), ...rowBounds(difference, relation) });
      addTerms(row, difference.variables, difference.coefficients);
      return row;
    }),
  );
  const definingRows = model.definingRows.map(({ cell, form }, i) => {
    // form − variable = −constant
    const row = builder.addRow({
      name: rowNames.take(formatCellAddress(cell)),
      lower: 0 - form.constant,
      upper: 0 - form.constant,
    });
    addTerms(row, form.variables, form.coefficients);
    builder.addEntry(row, definingColumns[i], -1);
    return row;
  });
  return { problem: builder.build(), decisionColumns, constraintRows, definingRows, definingColumns };
}

/** A row in which no decision counts and which is true keeps its place and binds nothing. */
function rowBounds(difference: RowDifference, relation: Relation): { lower: number; upper: number } {
  const isFixed = difference.variables.length === 0;
  if (isFixed && holdsWithoutDecisions(difference, relation)) {
    return { lower: -Infinity, upper: Infinity };
  }
  const bound = difference.constant;
  switch (relation) {
    case '<=':
      return { lower: -Infinity, upper: endlessAbove(bound) };
    case '>=':
      return { lower: endlessBelow(bound), upper: Infinity };
    case '=':
      return { lower: bound, upper: bound };
  }
}

/** Labels are unique among themselves, but a cell's text may equal one of them. */
class UniqueNames {
  private readonly taken = new Set<string>();

  take(wanted: string): string {
    let name = wanted;
    for (let copy = 2; this.taken.has(name); copy++) {
      name = `${wanted} (${copy})`;
    }
    this.taken.add(name);
    return name;
  }
}
