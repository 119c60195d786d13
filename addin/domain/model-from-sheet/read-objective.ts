/**
 * The objective: one cell with a formula of the decisions, or coefficients in the shape of the decision blocks.
 */
import { AffineForm } from '../linearization/affine-form';
import type { CellAddress } from '../sheet/cell-address';
import type { CellReader } from './cell-reader';
import { dependsOnDecisions } from './constraint-lines';
import {
  cellCountOfArea,
  cellsOfArea,
  firstCellOf,
  haveSameShape,
  shapeText,
  type ModelDeclaration,
  type NamedArea,
} from './model-declaration';
import { statementIssue } from './model-issue';
import { nameOfRole } from './naming-convention';
import { BlankCoefficients, readCoefficient } from './read-constraints';

export interface ObjectiveReading {
  readonly form: AffineForm;
  /** null where the objective is given by coefficients. */
  readonly cell: CellAddress | null;
}

/**
 * @param variables variable of each decision cell, block by block
 * @returns null where the objective is missing or faulty, which is then reported
 */
export function readObjective(
  declaration: ModelDeclaration,
  variables: readonly number[],
  reader: CellReader,
): ObjectiveReading | null {
  if (!declaration.knowsObjective || declaration.objective[0].number !== 1) {
    return null;
  }
  const objective = isFormulaForm(declaration, reader)
    ? readObjectiveCell(declaration.objective[0], reader)
    : readObjectiveCoefficients(declaration, variables, reader);
  if (objective?.form.isConstant === true) {
    const [area] = declaration.objective;
    reader.report(statementIssue('fixed-objective', firstCellOf(area), { name: area.name }));
  }
  return objective;
}

/**
 * One cell is a formula, unless it can be the coefficient of a first block of one cell: then a cell that depends on a
 * decision is a formula, and any other a coefficient, as in constraint blocks.
 */
function isFormulaForm({ objective, decisions }: ModelDeclaration, reader: CellReader): boolean {
  if (objective.length > 1 || cellCountOfArea(objective[0]) !== 1) {
    return false;
  }
  return !haveSameShape(objective[0], decisions[0]) || dependsOnDecisions(firstCellOf(objective[0]), reader);
}

function readObjectiveCell(area: NamedArea, reader: CellReader): ObjectiveReading | null {
  const cell = firstCellOf(area);
  const form = reader.amount(cell, area.name);
  if (form === 'blank') {
    reader.report(statementIssue('blank-objective', cell, { name: area.name }));
    return null;
  }
  return form === null ? null : { form, cell };
}

function readObjectiveCoefficients(
  { plan, objective, decisions }: ModelDeclaration,
  variables: readonly number[],
  reader: CellReader,
): ObjectiveReading | null {
  const terms = new Map<number, number>();
  let isWhole = true;
  let first = 0;
  for (const block of decisions) {
    const count = cellCountOfArea(block);
    const area = objective.find((candidate) => candidate.number === block.number);
    if (area === undefined) {
      const name = nameOfRole(plan, 'Objective', block.number);
      reader.report(statementIssue('missing-objective', null, { name }));
      isWhole = false;
    } else {
      const coefficients = readBlockCoefficients(area, block, reader);
      isWhole &&= coefficients !== null;
      coefficients?.forEach((coefficient, k) => {
        const variable = variables[first + k];
        terms.set(variable, (terms.get(variable) ?? 0) + coefficient);
      });
    }
    first += count;
  }
  return isWhole ? { form: AffineForm.fromTerms(0, terms), cell: null } : null;
}

function readBlockCoefficients(area: NamedArea, block: NamedArea, reader: CellReader): number[] | null {
  const { name } = area;
  if (!haveSameShape(area, block)) {
    reader.report(
      statementIssue('wrong-objective-shape', firstCellOf(area), {
        name,
        shape: shapeText(area),
        block: block.name,
        blockShape: shapeText(block),
      }),
    );
    return null;
  }
  const cells = cellsOfArea(area);
  const amounts = cells.map((cell) => readCoefficient(cell, name, reader));
  const blankCells = cells.filter((_, k) => amounts[k] === 'blank');
  if (blankCells.length === cells.length) {
    reader.report(statementIssue('blank-objective', cells[0], { name }));
    return null;
  }
  const blanks = new BlankCoefficients(name, reader);
  blanks.add(blankCells);
  blanks.report();
  return amounts.includes(null) ? null : amounts.map((amount) => (amount === 'blank' ? 0 : amount!));
}
