/**
 * A plan read whole from a workbook: names to ranges, cells to amounts, amounts to a model. Everything that is wrong
 * is reported at once; there is a model only when nothing is.
 */
import { cellKey, type CellAddress } from '../sheet/cell-address';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { CellReader } from './cell-reader';
import { LabelFinder } from './find-labels';
import { findSharedDecisions } from './find-shared-decisions';
import { inspectBlocks } from './inspect-blocks';
import { labelChains } from './label-chains';
import { labelConstraints, labelDecisions } from './label-model';
import {
  cellCountOfArea,
  cellsOfArea,
  firstCellOf,
  isConstant,
  shapeText,
  type Declared,
  type ModelDeclaration,
  type NamedArea,
} from './model-declaration';
import { statementIssue, type ModelIssue } from './model-issue';
import { findPlan } from './naming-convention';
import { readBounds } from './read-bounds';
import { readConstraintSet, type UnlabelledSet } from './read-constraints';
import { readDecisions, type DecisionReading } from './read-decisions';
import { readDeclaration } from './read-declaration';
import { readObjective } from './read-objective';
import { holdsWithoutDecisions, rowDifference } from './row-difference';
import type { ConstraintSet, PlanSense, SheetModel } from './sheet-model';
import { sortIssues } from './sort-issues';
import { readSense } from './statement-words';

/** How large a model is as a linear program. */
export interface ModelSize {
  readonly decisions: number;
  readonly constraints: number;
  /** Entries of all rows, defining rows included. */
  readonly nonzeros: number;
  readonly definingRows: number;
}

export interface PlanReading {
  /** null when any issue is an error. */
  readonly model: SheetModel | null;
  /** Sorted by place: those without a cell, then sheet by sheet, row by row. */
  readonly issues: readonly ModelIssue[];
  /** null without a model. */
  readonly size: ModelSize | null;
}

export interface ReadingOptions {
  /** Date and time for TODAY and NOW, as a serial date of the workbook. */
  readonly now: number;
  /** Plan any amount where lots are asked for. Default: such a plan is refused as long as lots cannot be planned. */
  readonly dropsLots?: boolean;
}

/** @param planName as `listPlans` gives it; case does not count */
export function readPlan(workbook: WorkbookSnapshot, planName: string, options: ReadingOptions): PlanReading {
  const plan = findPlan(workbook, planName);
  if (plan === undefined) {
    const facts = { plan: planName, name: `${planName}.Decision` };
    return { model: null, issues: [statementIssue('missing-decision', null, facts)], size: null };
  }
  const { declaration, knowsDecisions, issues: declarationIssues } = readDeclaration(workbook, plan);
  const issues: ModelIssue[] = [...declarationIssues, ...inspectBlocks(workbook, amountAreas(declaration))];
  const decisions = readDecisions(workbook, declaration.decisions);
  issues.push(...decisions.issues, ...findSharedDecisions(workbook, plan, declaration.decisions));

  const { variables, uniqueCells } = numberVariables(decisions.cells);
  const reader = new CellReader(
    workbook,
    uniqueCells,
    knowsDecisions ? targetsOf(declaration) : senseCells(declaration.sense),
    options.now,
  );
  const sense = declaration.sense === null ? null : readSenseOf(declaration.sense, reader);
  const finder = new LabelFinder(workbook, senseCells(declaration.sense));
  const labels = knowsDecisions ? labelDecisions(declaration, decisions, finder, reader) : [];
  const rest = knowsDecisions
    ? readAmounts(declaration, decisions, labels, variables, finder, reader, options.dropsLots === true)
    : null;
  const labelled = labels.map((label, k) => ({ cell: decisions.cells[k], label }));
  issues.push(...labelChains(reader.issues, labelled, workbook, finder));

  const sorted = sortIssues(workbook, issues);
  if (sense === null || rest === null || sorted.some((issue) => issue.severity === 'error')) {
    return { model: null, issues: sorted, size: null };
  }
  const model: SheetModel = {
    planName: plan.name,
    prefix: plan.prefix,
    separator: plan.separator,
    scope: plan.scope,
    sense,
    ...rest,
  };
  return { model, issues: sorted, size: sizeOf(model) };
}

type ModelAmounts = Omit<SheetModel, 'planName' | 'prefix' | 'separator' | 'scope' | 'sense'>;

function readAmounts(
  declaration: ModelDeclaration,
  decisions: DecisionReading,
  labels: readonly string[],
  variables: readonly number[],
  finder: LabelFinder,
  reader: CellReader,
  dropsLots: boolean,
): ModelAmounts | null {
  const objective = readObjective(declaration, variables, reader);
  const sets = declaration.constraints
    .map((set) => readConstraintSet(set, variables, reader))
    .filter((set): set is UnlabelledSet => set !== undefined);
  const constraintSets = labelConstraints(declaration, sets, finder, reader);
  reportFixedRows(constraintSets, reader);
  const bounds = readBounds(declaration, labels, reader, dropsLots);
  if (objective === null) {
    return null;
  }
  return {
    decisions: decisions.cells.map((cell, k) => ({
      cell,
      label: labels[k],
      block: decisions.blocks.findIndex(({ first, end }) => first <= k && k < end),
      before: decisions.before[k],
      lower: bounds.lower[k],
      upper: bounds.upper[k],
    })),
    decisionBlocks: decisions.blocks,
    objective: objective.form,
    objectiveCell: objective.cell,
    constraintSets,
    definingRows: reader.definingRows,
  };
}

/** One variable a decision cell; a cell that stands in two blocks (an error) keeps the first. */
function numberVariables(cells: readonly CellAddress[]): {
  variables: readonly number[];
  uniqueCells: readonly CellAddress[];
} {
  const known = new Map<string, Map<number, number>>();
  const uniqueCells: CellAddress[] = [];
  const variables = cells.map((cell) => {
    const ofSheet = known.get(cell.sheet) ?? new Map<number, number>();
    known.set(cell.sheet, ofSheet);
    const key = cellKey(cell.row, cell.column);
    const variable = ofSheet.get(key) ?? uniqueCells.push(cell) - 1;
    ofSheet.set(key, variable);
    return variable;
  });
  return { variables, uniqueCells };
}

function areasIn(declared: readonly Declared[]): NamedArea[] {
  return declared.filter((one): one is NamedArea => !isConstant(one));
}

/** The blocks that hold decisions and amounts, relations among them; neither sense nor labels. */
function amountAreas(declaration: ModelDeclaration): NamedArea[] {
  const ofConstraints = declaration.constraints.flatMap((set) =>
    set.kind === 'block' ? [set.block] : areasIn([set.left, set.relation, set.right]),
  );
  const { decisions, objective, lower, upper, lot, leastRun } = declaration;
  return [...decisions, ...objective, ...ofConstraints, ...lower, ...upper, ...lot, ...leastRun];
}

function senseCells(sense: Declared | null): CellAddress[] {
  return sense === null || isConstant(sense) ? [] : [firstCellOf(sense)];
}

/** Every cell that is read: the decision cells are given apart. */
function targetsOf(declaration: ModelDeclaration): CellAddress[] {
  const areas = amountAreas(declaration).filter((area) => !declaration.decisions.includes(area));
  return [...senseCells(declaration.sense), ...areas.flatMap(cellsOfArea)];
}

function readSenseOf(declared: Declared, reader: CellReader): PlanSense | null {
  const { name } = declared;
  if (!isConstant(declared) && cellCountOfArea(declared) !== 1) {
    const facts = { name, shape: shapeText(declared) };
    reader.report(statementIssue('not-one-cell', firstCellOf(declared), facts));
    return null;
  }
  const cell = isConstant(declared) ? null : firstCellOf(declared);
  const text = isConstant(declared) ? declared.text : reader.text(firstCellOf(declared));
  if (text === null) {
    reader.report(statementIssue('missing-sense', cell, { name }));
    return null;
  }
  const sense = readSense(text);
  if (sense === undefined) {
    reader.report(statementIssue('unknown-sense', cell, { name, text: text.trim() }));
    return null;
  }
  return sense;
}

/** Rows in which no decision counts: true ones bind nothing, a false one can never hold. */
function reportFixedRows(sets: readonly ConstraintSet[], reader: CellReader): void {
  for (const row of sets.flatMap((set) => set.rows)) {
    const difference = rowDifference(row.left, row.right);
    if (difference.variables.length > 0) {
      continue;
    }
    const { name } = sets[row.set];
    if (holdsWithoutDecisions(difference, row.relation)) {
      reader.report(statementIssue('fixed-row', row.cell, { name, row: row.label }));
    } else {
      reader.report(
        statementIssue('impossible-row', row.cell, {
          name,
          row: row.label,
          left: row.left.constant,
          relation: row.relation,
          right: row.right.constant,
        }),
      );
    }
  }
}

function sizeOf(model: SheetModel): ModelSize {
  const rows = model.constraintSets.flatMap((set) => set.rows);
  const ofRows = rows.reduce((sum, row) => sum + rowDifference(row.left, row.right).variables.length, 0);
  const ofDefinitions = model.definingRows.reduce((sum, { form }) => sum + form.variables.length + 1, 0);
  return {
    decisions: model.decisions.length,
    constraints: rows.length,
    nonzeros: ofRows + ofDefinitions,
    definingRows: model.definingRows.length,
  };
}
