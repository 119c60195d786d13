/**
 * The constraint rows of a plan: each line of a block read, headings passed over, both sides as affine forms.
 */
import { AffineForm } from '../linearization/affine-form';
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import type { CellReader } from './cell-reader';
import {
  dependsOnDecisions,
  isShared,
  layOutConstraints,
  lineContent,
  type ConstraintLayout,
  type ConstraintLine,
  type SharedRelation,
} from './constraint-lines';
import type { BlockDeclaration, PartsDeclaration } from './model-declaration';
import { statementIssue } from './model-issue';
import type { ConstraintRow, ConstraintSet, Relation } from './sheet-model';
import { readRelation } from './statement-words';

/** A constraint row that has no label yet. */
export interface UnlabelledRow extends Omit<ConstraintRow, 'label' | 'set'> {
  /** Where the search for a label starts. */
  readonly firstCell: CellAddress;
  /** Position among all lines of the set, and among those that are constraint rows. */
  readonly linePosition: number;
  readonly rowPosition: number;
}

export interface UnlabelledSet extends Omit<ConstraintSet, 'rows'> {
  readonly rows: readonly UnlabelledRow[];
  /** How many lines the set has, and how many of them are constraint rows, faulty ones counted. */
  readonly lineCount: number;
  readonly rowCount: number;
}

/**
 * @param variables variable of each decision cell, block by block; coefficients stand in this order
 * @returns undefined where the set's shape fits no form, which is then reported
 */
export function readConstraintSet(
  declaration: BlockDeclaration | PartsDeclaration,
  variables: readonly number[],
  reader: CellReader,
): UnlabelledSet | undefined {
  const layout = layOutConstraints(declaration, variables.length, reader);
  if (layout === undefined) {
    return undefined;
  }
  const names = namesOfParts(declaration);
  reportSharedRelation(layout, reader);
  const blanks = new BlankCoefficients(names.left, reader);
  const rows: UnlabelledRow[] = [];
  let rowCount = 0;
  let hasHeadings = false;
  layout.lines.forEach((line, linePosition) => {
    const content = lineContent(line, reader);
    if (content === 'headings') {
      hasHeadings = true;
      reader.report(statementIssue('heading-in-block', line.lefts[0], { name: names.left }));
    }
    if (content === 'row') {
      const row = readLine(line, layout.form, names, variables, reader, blanks);
      if (row !== undefined) {
        rows.push({ ...row, linePosition, rowPosition: rowCount });
      }
      rowCount++;
    }
  });
  blanks.report();
  if (rowCount === 0 && !hasHeadings) {
    const [line] = layout.lines;
    reader.report(statementIssue('no-constraint-rows', line.lefts[0], { name: names.left }));
  }
  if (layout.isFormGuessed && layout.form === 'coefficient') {
    reportGuessedForm(layout, names.left, reader);
  }
  const { form, isLying, range, lines } = layout;
  return {
    number: declaration.number,
    name: names.left,
    form,
    isLying,
    range,
    rows,
    lineCount: lines.length,
    rowCount,
  };
}

interface PartNames {
  readonly left: string;
  readonly relation: string;
  readonly right: string;
}

function namesOfParts(declaration: BlockDeclaration | PartsDeclaration): PartNames {
  if (declaration.kind === 'block') {
    const { name } = declaration.block;
    return { left: name, relation: name, right: name };
  }
  return {
    left: declaration.left.name,
    relation: declaration.relation.name,
    right: declaration.right.name,
  };
}

function readLine(
  line: ConstraintLine,
  form: ConstraintLayout['form'],
  names: PartNames,
  variables: readonly number[],
  reader: CellReader,
  blanks: BlankCoefficients,
): Omit<UnlabelledRow, 'linePosition' | 'rowPosition'> | undefined {
  const left =
    form === 'coefficient'
      ? readCoefficients(line, variables, names.left, reader, blanks)
      : filledAmount(line.lefts[0], 'blank-left-side', names.left, reader);
  const relation = isShared(line.relation)
    ? relationIn(line.relation.text)
    : readRelationCell(line.relation, names.relation, reader);
  const right = filledAmount(line.right, 'blank-right-side', names.right, reader);
  if (left === null || relation === null || right === null) {
    return undefined;
  }
  return {
    cell: isShared(line.relation) ? line.lefts[0] : line.relation,
    line: line.line,
    relation,
    left,
    right,
    leftCell: form === 'coefficient' ? null : line.lefts[0],
    rightCell: line.right,
    firstCell: line.lefts[0],
  };
}

function filledAmount(
  cell: CellAddress,
  blankCode: 'blank-left-side' | 'blank-right-side',
  name: string,
  reader: CellReader,
): AffineForm | null {
  const amount = reader.amount(cell, name);
  if (amount === 'blank') {
    reader.report(statementIssue(blankCode, cell, { name }));
    return null;
  }
  return amount;
}

function relationIn(text: string | null): Relation | null {
  const relation = text === null ? undefined : readRelation(text);
  return relation === undefined || relation === 'strict' ? null : relation;
}

function readRelationCell(cell: CellAddress, name: string, reader: CellReader): Relation | null {
  const text = reader.text(cell);
  reportRelation(text, cell, name, reader);
  return relationIn(text);
}

function reportRelation(
  text: string | null,
  cell: CellAddress | null,
  name: string,
  reader: CellReader,
): void {
  if (text === null) {
    reader.report(statementIssue('missing-relation', cell, { name }));
  } else if (readRelation(text) === 'strict') {
    reader.report(statementIssue('strict-relation', cell, { name, text: text.trim() }));
  } else if (readRelation(text) === undefined) {
    reader.report(statementIssue('unknown-relation', cell, { name, text: text.trim() }));
  }
}

/** A relation for all rows is judged once. */
function reportSharedRelation(layout: ConstraintLayout, reader: CellReader): void {
  const shared = layout.lines.map((line) => line.relation).find(isShared);
  if (shared !== undefined) {
    const { text, cell, name }: SharedRelation = shared;
    reportRelation(text, cell, name, reader);
  }
}

/** Σ coefficient × decision; null where a coefficient is faulty. */
function readCoefficients(
  line: ConstraintLine,
  variables: readonly number[],
  name: string,
  reader: CellReader,
  blanks: BlankCoefficients,
): AffineForm | null {
  const terms = new Map<number, number>();
  const blankCells: CellAddress[] = [];
  let isWhole = true;
  line.lefts.forEach((cell, k) => {
    const amount = readCoefficient(cell, name, reader);
    if (amount === 'blank') {
      blankCells.push(cell);
    } else if (amount === null) {
      isWhole = false;
    } else {
      terms.set(variables[k], (terms.get(variables[k]) ?? 0) + amount);
    }
  });
  if (blankCells.length < line.lefts.length) {
    blanks.add(blankCells);
  }
  return isWhole ? AffineForm.fromTerms(0, terms) : null;
}

/** A coefficient: a number that no decision changes; null where it is something else, which is then reported. */
export function readCoefficient(
  cell: CellAddress,
  name: string,
  reader: CellReader,
): number | 'blank' | null {
  if (dependsOnDecisions(cell, reader)) {
    reader.report(statementIssue('coefficient-depends', cell, { name }));
    return null;
  }
  const amount = reader.amount(cell, name);
  return amount === null || amount === 'blank' ? amount : amount.constant;
}

/** How many cells a warning lists by address. */
const listedCells = 10;

/**
 * Blank coefficients read as 0. A single blank in a row that is filled otherwise is likely forgotten and gets a
 * warning of its own; in a block where most are blank on purpose, one warning counts them all.
 */
export class BlankCoefficients {
  private readonly scattered: CellAddress[] = [];

  constructor(
    private readonly name: string,
    private readonly reader: CellReader,
  ) {}

  /** @param cells the blank coefficients of one row that has others filled */
  add(cells: readonly CellAddress[]): void {
    if (cells.length === 1) {
      this.warn(cells);
    } else {
      this.scattered.push(...cells);
    }
  }

  report(): void {
    if (this.scattered.length > 0) {
      this.warn(this.scattered);
    }
  }

  private warn(cells: readonly CellAddress[]): void {
    const facts = {
      name: this.name,
      count: cells.length,
      cells: cells.slice(0, listedCells).map(formatCellAddress),
    };
    this.reader.report(statementIssue('blank-coefficient', cells[0], facts));
  }
}

/** With one decision cell, `5 <= its cell` is read as 5 times the decision: say so where the right side depends on it. */
function reportGuessedForm(layout: ConstraintLayout, name: string, reader: CellReader): void {
  const line = layout.lines.find(({ right }) => dependsOnDecisions(right, reader));
  if (line !== undefined) {
    reader.report(statementIssue('read-as-coefficient', line.lefts[0], { name }));
  }
}
