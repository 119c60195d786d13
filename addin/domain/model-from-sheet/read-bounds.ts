/**
 * Bounds, lots and least runs of the decision cells.
 *
 * An area has its block's shape, or is one cell for all of the block; the unnumbered one cell serves every block that
 * has none of its own. Blank: 0 below, none above; `free` below: none.
 */
import type { AffineForm } from '../linearization/affine-form';
import type { CellAddress } from '../sheet/cell-address';
import type { CellReader } from './cell-reader';
import { endlessAbove, endlessBelow } from './endless-amounts';
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
import { saysFree } from './statement-words';

export interface BoundsReading {
  /** One a decision cell. */
  readonly lower: readonly number[];
  readonly upper: readonly number[];
}

/** An amount given for one decision cell, and where. */
interface GivenAmount {
  readonly cell: CellAddress;
  /** As long as the block, or one cell for all of it. */
  readonly isOwn: boolean;
  /** undefined: blank or faulty; `free`: the word. */
  readonly amount: number | 'free' | undefined;
}

/**
 * @param labels one a decision cell, for the issues' facts
 * @param dropsLots plan any amount where lots are asked for, with a warning
 */
export function readBounds(
  declaration: ModelDeclaration,
  labels: readonly string[],
  reader: CellReader,
  dropsLots: boolean,
): BoundsReading {
  const lower = readAmounts(declaration, declaration.lower, reader, true);
  const upper = readAmounts(declaration, declaration.upper, reader, false);
  const lots = readAmounts(declaration, declaration.lot, reader, false);
  const leastRuns = readAmounts(declaration, declaration.leastRun, reader, false);
  const lowerBounds = lower.map((given) =>
    given?.amount === 'free' ? -Infinity : endlessBelow(given?.amount ?? 0),
  );
  const upperBounds = upper.map((given) =>
    typeof given?.amount === 'number' ? endlessAbove(given.amount) : Infinity,
  );
  const reported = new Set<string>();
  labels.forEach((decision, k) => {
    const bounds = { lower: lowerBounds[k], upper: upperBounds[k] };
    if (bounds.lower > bounds.upper) {
      reportCrossing(decision, bounds, lower[k], upper[k], reader, reported);
      return;
    }
    if (!dropsLots) reportUnusableLot(decision, bounds, lots[k], reader);
    reportIdleLeastRun(decision, bounds, leastRuns[k], reader);
  });
  reportNotServed(declaration.lot, dropsLots ? 'lot-dropped' : 'lot-not-served', lots, reader);
  reportNotServed(declaration.leastRun, 'least-run-not-served', leastRuns, reader);
  return { lower: lowerBounds, upper: upperBounds };
}

/** The area that serves a block: its own, otherwise the unnumbered one cell. */
function areaServing(areas: readonly NamedArea[], number: number): NamedArea | undefined {
  return (
    areas.find((area) => area.number === number) ??
    areas.find((area) => area.number === 1 && !area.isNumbered && cellCountOfArea(area) === 1)
  );
}

/** One a decision cell; undefined where no area serves it. */
function readAmounts(
  { decisions }: ModelDeclaration,
  areas: readonly NamedArea[],
  reader: CellReader,
  mayBeFree: boolean,
): (GivenAmount | undefined)[] {
  const amountIn = cellsReadOnce(reader, mayBeFree);
  return decisions.flatMap((block): (GivenAmount | undefined)[] => {
    const area = areaServing(areas, block.number);
    const count = cellCountOfArea(block);
    if (area === undefined) {
      return new Array<undefined>(count).fill(undefined);
    }
    const isOwn = haveSameShape(area, block);
    if (!isOwn && cellCountOfArea(area) !== 1) {
      reader.report(
        statementIssue('wrong-shape', firstCellOf(area), {
          name: area.name,
          shape: shapeText(area),
          block: block.name,
          blockShape: shapeText(block),
        }),
      );
      return new Array<undefined>(count).fill(undefined);
    }
    const cells = cellsOfArea(area);
    return Array.from({ length: count }, (_, i) => {
      const cell = isOwn ? cells[i] : cells[0];
      return { cell, isOwn, amount: amountIn(cell, area.name) };
    });
  });
}

/** Reads each cell once, so that one cell for many decisions is reported once. */
function cellsReadOnce(
  reader: CellReader,
  mayBeFree: boolean,
): (cell: CellAddress, name: string) => GivenAmount['amount'] {
  const known = new Map<string, GivenAmount['amount']>();
  return (cell, name) => {
    const key = keyOf(cell);
    if (!known.has(key)) {
      known.set(key, readAmount(cell, name, reader, mayBeFree));
    }
    return known.get(key);
  };
}

function readAmount(
  cell: CellAddress,
  name: string,
  reader: CellReader,
  mayBeFree: boolean,
): GivenAmount['amount'] {
  const reading = reader.read(cell);
  if (mayBeFree && reading.kind === 'text' && saysFree(reading.text)) {
    return 'free';
  }
  if ((reading.kind === 'amount' || reading.kind === 'refused') && reading.dependsOnDecisions) {
    reader.report(statementIssue('bound-depends', cell, { name }));
    return undefined;
  }
  const form: AffineForm | 'blank' | null = reader.amount(cell, name);
  return form === 'blank' || form === null ? undefined : form.constant;
}

/** At the cell that is the decision's own: its lower bound, or its upper one where only that is; otherwise once. */
function reportCrossing(
  decision: string,
  bounds: { lower: number; upper: number },
  lower: GivenAmount | undefined,
  upper: GivenAmount | undefined,
  reader: CellReader,
  reported: Set<string>,
): void {
  const isLowerGiven = lower?.amount !== undefined;
  const given = [isLowerGiven ? lower : undefined, upper].filter((one) => one !== undefined);
  const place = given.find((one) => one.isOwn) ?? given[0];
  const key = keyOf(place.cell);
  if (place.isOwn || !reported.has(key)) {
    reported.add(key);
    const facts = { decision, ...bounds, isLowerGiven: isLowerGiven ? ('yes' as const) : ('no' as const) };
    reader.report(statementIssue('crossing-bounds', place.cell, facts));
  }
}

/** How far from a whole number of lots may a bound lie and still count as one? Relative to the number of lots. */
const wholeLotTolerance = 1e-9;

function reportUnusableLot(
  decision: string,
  { lower, upper }: { lower: number; upper: number },
  given: GivenAmount | undefined,
  reader: CellReader,
): void {
  if (typeof given?.amount !== 'number' || given.amount <= 0) {
    return;
  }
  const lot = given.amount;
  const least = lower / lot;
  const most = upper / lot;
  const firstLot = Math.ceil(least - wholeLotTolerance * (1 + Math.abs(least)));
  if (Number.isFinite(firstLot) && firstLot > most + wholeLotTolerance * (1 + Math.abs(most))) {
    reader.report(statementIssue('lot-out-of-reach', given.cell, { decision, lot, lower, upper }));
  }
}

function reportIdleLeastRun(
  decision: string,
  { lower, upper }: { lower: number; upper: number },
  given: GivenAmount | undefined,
  reader: CellReader,
): void {
  if (typeof given?.amount !== 'number' || given.amount === 0) {
    return;
  }
  const leastRun = given.amount;
  if (leastRun > upper) {
    reader.report(statementIssue('least-run-above-upper', given.cell, { decision, leastRun, upper }));
  } else if (leastRun <= lower) {
    reader.report(statementIssue('least-run-without-effect', given.cell, { decision, leastRun, lower }));
  }
}

/** Lots and least runs need whole-number choices: a plan that asks for them is solved without only when told so. */
function reportNotServed(
  areas: readonly NamedArea[],
  code: 'lot-not-served' | 'lot-dropped' | 'least-run-not-served',
  givens: readonly (GivenAmount | undefined)[],
  reader: CellReader,
): void {
  const amounts = new Map<string, number>();
  for (const given of givens) {
    if (typeof given?.amount === 'number' && given.amount !== 0) {
      amounts.set(keyOf(given.cell), given.amount);
    }
  }
  for (const area of areas) {
    const filled = cellsOfArea(area).filter((cell) => amounts.has(keyOf(cell)));
    if (filled.length > 0) {
      reader.report(statementIssue(code, filled[0], { name: area.name, count: filled.length }));
    }
    for (const cell of filled) {
      const lot = amounts.get(keyOf(cell))!;
      if (code !== 'least-run-not-served' && lot < 0) {
        reader.report(statementIssue('negative-lot', cell, { name: area.name, lot }));
      }
    }
  }
}

function keyOf({ sheet, row, column }: CellAddress): string {
  return `${sheet}\n${row}\n${column}`;
}
