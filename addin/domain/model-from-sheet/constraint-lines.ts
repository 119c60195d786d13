/**
 * How constraint rows stand on the sheet: the lines of a block, upright or lying, in formula or coefficient form, and
 * the lines that parts apart make. The forms are told apart by shape; where shapes are ambiguous, relations in a
 * column win over relations in a row, and a left cell that depends on a decision makes formula form.
 */
import type { CellAddress } from '../sheet/cell-address';
import { cellsOf, columnCountOf, rowCountOf } from '../sheet/cell-range';
import type { CellReader } from './cell-reader';
import {
  cellCountOfArea,
  cellsOfArea,
  firstCellOf,
  hullOf,
  isConstant,
  shapeText,
  type BlockDeclaration,
  type Declared,
  type NamedArea,
  type PartsDeclaration,
} from './model-declaration';
import { statementIssue } from './model-issue';
import { readRelation } from './statement-words';
import type { CellRange } from '../sheet/cell-range';
import type { ConstraintSet } from './sheet-model';

/** The cells of one possible constraint row. */
export interface ConstraintLine {
  /** Row (upright) or column (lying) within the set, from 0. */
  readonly line: number;
  /** One cell in formula form and with parts apart, otherwise one a decision. */
  readonly lefts: readonly CellAddress[];
  /** The relation's own cell, or what one cell or constant says for all rows. */
  readonly relation: CellAddress | SharedRelation;
  readonly right: CellAddress;
}

/** A relation that many rows share. */
export interface SharedRelation {
  readonly name: string;
  /** null where the name itself holds it. */
  readonly cell: CellAddress | null;
  readonly text: string | null;
}

export function isShared(relation: CellAddress | SharedRelation): relation is SharedRelation {
  return 'text' in relation;
}

export interface ConstraintLayout {
  readonly form: ConstraintSet['form'];
  readonly isLying: boolean;
  readonly range: CellRange;
  readonly lines: readonly ConstraintLine[];
  /** One decision cell, and nothing but the left cells told formula and coefficient form apart. */
  readonly isFormGuessed: boolean;
}

/** @returns undefined where the shape fits no form, which is then reported */
export function layOutConstraints(
  declaration: BlockDeclaration | PartsDeclaration,
  decisionCount: number,
  reader: CellReader,
): ConstraintLayout | undefined {
  return declaration.kind === 'block'
    ? layOutBlock(declaration.block, decisionCount, reader)
    : layOutParts(declaration, reader);
}

function layOutBlock(
  block: NamedArea,
  decisionCount: number,
  reader: CellReader,
): ConstraintLayout | undefined {
  const { name } = block;
  const fits = (lengthOf: (range: CellRange) => number): boolean =>
    [3, decisionCount + 2].some((length) => block.ranges.every((range) => lengthOf(range) === length));
  const fitsUpright = fits(columnCountOf);
  const fitsLying = fits(rowCountOf);
  if (!fitsUpright && !fitsLying) {
    const facts = { name, shape: shapeText(block), decisions: decisionCount };
    reader.report(statementIssue('wrong-constraint-shape', firstCellOf(block), facts));
    return undefined;
  }
  const range = hullOf(block);
  const upright = fitsUpright && isAligned(block, false) ? linesOf(block, range, false) : undefined;
  const lying = fitsLying && isAligned(block, true) ? linesOf(block, range, true) : undefined;
  if (upright === undefined && lying === undefined) {
    reader.report(statementIssue('scattered-block', firstCellOf(block), { name }));
    return undefined;
  }
  const isLying = upright === undefined || (lying !== undefined && relationsLie(upright, lying, reader));
  const lines = isLying ? lying! : upright;
  const length = lines[0].lefts.length + 2;
  const isFormGuessed = length === 3 && decisionCount === 1;
  const isFormula = isFormGuessed
    ? lines.some((line) => dependsOnDecisions(line.lefts[0], reader))
    : length === 3;
  return { form: isFormula ? 'formula' : 'coefficient', isLying, range, lines, isFormGuessed };
}

/** Whether a union's rectangles lie one under the other (upright) or side by side (lying). */
function isAligned({ ranges }: NamedArea, isLying: boolean): boolean {
  return ranges.every((range) =>
    isLying
      ? range.top === ranges[0].top && range.bottom === ranges[0].bottom
      : range.left === ranges[0].left && range.right === ranges[0].right,
  );
}

function linesOf({ ranges }: NamedArea, hull: CellRange, isLying: boolean): ConstraintLine[] {
  return ranges.flatMap((range) => {
    const count = isLying ? columnCountOf(range) : rowCountOf(range);
    return Array.from({ length: count }, (_, i): ConstraintLine => {
      const at = isLying
        ? { left: range.left + i, right: range.left + i }
        : { top: range.top + i, bottom: range.top + i };
      const cells = cellsOf({ ...range, ...at });
      return {
        line: isLying ? range.left + i - hull.left : range.top + i - hull.top,
        lefts: cells.slice(0, -2),
        relation: cells[cells.length - 2],
        right: cells[cells.length - 1],
      };
    });
  });
}

/** Both ways round fit the shape: do the relations stand in a row? Those in a column win where both could be meant. */
function relationsLie(
  upright: readonly ConstraintLine[],
  lying: readonly ConstraintLine[],
  reader: CellReader,
): boolean {
  const ofUpright = relationFit(upright, reader);
  const ofLying = relationFit(lying, reader);
  if (ofUpright.isWhole || ofLying.isWhole) {
    return !ofUpright.isWhole;
  }
  return ofLying.count > ofUpright.count;
}

interface RelationFit {
  readonly count: number;
  /** Every line with content has its relation, and no relation stands elsewhere. */
  readonly isWhole: boolean;
}

function relationFit(lines: readonly ConstraintLine[], reader: CellReader): RelationFit {
  const isRelation = (cell: CellAddress): boolean => {
    const reading = reader.read(cell);
    return reading.kind === 'text' && readRelation(reading.text) !== undefined;
  };
  let count = 0;
  let isWhole = true;
  for (const line of lines) {
    if (lineContent(line, reader) !== 'row') {
      continue;
    }
    const hasRelation = !isShared(line.relation) && isRelation(line.relation);
    count += hasRelation ? 1 : 0;
    isWhole &&= hasRelation && ![...line.lefts, line.right].some(isRelation);
  }
  return { count, isWhole: isWhole && count > 0 };
}

export function dependsOnDecisions(cell: CellAddress, reader: CellReader): boolean {
  const reading = reader.read(cell);
  return (reading.kind === 'amount' || reading.kind === 'refused') && reading.dependsOnDecisions;
}

/**
 * What a line is: blank, a heading (only a text, and that in its first cell), several headings (texts and nothing
 * else, which no form allows), or a constraint row.
 */
export function lineContent(
  line: ConstraintLine,
  reader: CellReader,
): 'blank' | 'heading' | 'headings' | 'row' {
  const own = isShared(line.relation) ? [] : [line.relation];
  const readings = [...line.lefts, ...own, line.right].map((cell) => reader.read(cell));
  const filled = readings.filter((reading) => reading.kind !== 'blank');
  if (filled.length === 0) {
    return 'blank';
  }
  if (filled.length === 1 && readings[0].kind === 'text') {
    return 'heading';
  }
  const areHeadings = filled.every(
    (reading) =>
      reading.kind === 'text' && /\p{L}/u.test(reading.text) && readRelation(reading.text) === undefined,
  );
  return areHeadings ? 'headings' : 'row';
}

/** Parts apart: three lines of equal length, each upright or lying; the relation may be one for all. */
function layOutParts(
  { left, relation, right }: PartsDeclaration,
  reader: CellReader,
): ConstraintLayout | undefined {
  const areas = [left, relation, right].filter((part): part is NamedArea => !isConstant(part));
  const notLines = areas.filter((area) => !isLine(area));
  for (const area of notLines) {
    const facts = { name: area.name, shape: shapeText(area) };
    reader.report(statementIssue('not-one-line', firstCellOf(area), facts));
  }
  if (notLines.length > 0) {
    return undefined;
  }
  const isOneRelation = isConstant(relation) || cellCountOfArea(relation) === 1;
  const mustAgree = isOneRelation ? [left, right] : areas;
  const lengths = mustAgree.map(cellCountOfArea);
  if (lengths.some((length) => length !== lengths[0])) {
    const facts = { names: mustAgree.map((area) => area.name), lengths: lengths.map(String) };
    reader.report(statementIssue('unequal-lengths', firstCellOf(left), facts));
    return undefined;
  }
  const range = hullOf(left);
  const isLying = range.top === range.bottom && range.left !== range.right;
  const shared = isOneRelation && lengths[0] > 1 ? sharedRelation(relation, reader) : undefined;
  const relationCells = isConstant(relation) ? [] : cellsOfArea(relation);
  const rightCells = cellsOfArea(right);
  const lines = cellsOfArea(left).map((cell, i): ConstraintLine => {
    const line = isLying ? cell.column - range.left : cell.row - range.top;
    const own = relationCells.at(i) ?? sharedRelation(relation, reader);
    return { line, lefts: [cell], relation: shared ?? own, right: rightCells[i] };
  });
  return { form: 'parts', isLying, range, lines, isFormGuessed: false };
}

/** Whether an area is one row or one column, also as a union. */
function isLine(area: NamedArea): boolean {
  const { top, bottom, left, right } = hullOf(area);
  return top === bottom || left === right;
}

function sharedRelation(relation: Declared, reader: CellReader): SharedRelation {
  if (isConstant(relation)) {
    return { name: relation.name, cell: null, text: relation.text };
  }
  const cell = firstCellOf(relation);
  return { name: relation.name, cell, text: reader.text(cell) };
}
