/**
 * The plans of a workbook as their names state them: which part refers to which cells. Nothing is calculated, so that
 * it is quick enough to be done after every change of a name.
 */
import { resolveName } from '../formula/resolve-reference';
import {
  listPlans,
  namesOfPlan,
  statementRoles,
  type PlanListing,
  type RoleName,
  type StatementRole,
} from '../model-from-sheet/naming-convention';
import { readSense } from '../model-from-sheet/statement-words';
import { constraintResultRoles, decisionResultRoles } from '../results-to-sheet/result-roles';
import { planRecordKey, readWorkbookRecord } from '../results-to-sheet/written-cells';
import { cellCountOf, type CellRange } from '../sheet/cell-range';
import type { DefinedName } from '../sheet/defined-name';
import { storedValue, type WorkbookSnapshot } from '../sheet/sheet-snapshot';

/** What a part's name was read as. */
export type PartReading =
  | {
      readonly kind: 'cells';
      readonly ranges: readonly CellRange[];
      readonly cellCount: number;
      /** What the cell says, where it is a single one that holds a text. */
      readonly text: string | null;
    }
  | { readonly kind: 'constant'; readonly text: string }
  /** It refers to cells that a formula works out: which ones, the check tells. */
  | { readonly kind: 'computed' }
  /** It refers to nothing that can be read. */
  | { readonly kind: 'dead' };

export interface StatedPart {
  readonly role: StatementRole;
  /** 1 for a name without a number. */
  readonly number: number;
  /** As written: `Week.Lower2`. */
  readonly name: string;
  /** What the name refers to, without `=`. */
  readonly formula: string;
  readonly reading: PartReading;
}

export interface StatedPlan {
  readonly listing: PlanListing;
  /** Role by role in the order of a statement, each by number. */
  readonly parts: readonly StatedPart[];
  /** Sheets on which the plan's cells stand, those of the decision cells first. */
  readonly sheets: readonly string[];
  /** What the plan's sense says, where it says one of the two. */
  readonly sense: 'minimise' | 'maximise' | null;
  /** Cells that hold what a solve wrote can be put back. */
  readonly canPutBack: boolean;
}

export function describePlans(workbook: WorkbookSnapshot): StatedPlan[] {
  return listPlans(workbook).map((listing) => describePlan(workbook, listing));
}

/** Also for a plan that has no decision cells yet, and so is not listed. */
export function describePlan(workbook: WorkbookSnapshot, listing: PlanListing): StatedPlan {
  const parts = namesOfPlan(workbook, listing)
    .map((roleName) => partOf(workbook, roleName))
    .sort((a, b) => placeOfRole(a.role) - placeOfRole(b.role) || a.number - b.number);
  const sheets = new Set(
    parts.flatMap(({ reading }) => (reading.kind === 'cells' ? reading.ranges.map((r) => r.sheet) : [])),
  );
  const sensePart = parts.find(({ role }) => role === 'Sense');
  const record = readWorkbookRecord(workbook.record).get(planRecordKey(listing.name));
  return {
    listing,
    parts,
    sheets: [...sheets],
    sense: readSense(textOfReading(sensePart?.reading) ?? '') ?? null,
    canPutBack: (record?.decisions.length ?? 0) > 0,
  };
}

/** The text that a part says itself, or that its one cell holds. */
export function textOfReading(reading: PartReading | undefined): string | null {
  return reading?.kind === 'constant' || reading?.kind === 'cells' ? reading.text : null;
}

/** The plan's names that results brought, such as `Week.Optimum`. */
export function resultNamesOfPlan(workbook: WorkbookSnapshot, listing: PlanListing): DefinedName[] {
  const roles = [...decisionResultRoles, ...constraintResultRoles].map((role) => role.toLowerCase());
  const prefix = `${listing.prefix}${listing.separator}`.toLowerCase();
  return workbook.names.filter(({ name, scope }) => {
    const isOfPlan =
      name.toLowerCase().startsWith(prefix) &&
      (scope ?? '').toLowerCase() === (listing.scope ?? '').toLowerCase();
    return isOfPlan && roles.includes(name.slice(prefix.length).replace(/\d+$/, '').toLowerCase());
  });
}

function placeOfRole(role: StatementRole): number {
  return statementRoles.indexOf(role);
}

function partOf(workbook: WorkbookSnapshot, { definedName, role, number }: RoleName): StatedPart {
  const { name, formula } = definedName;
  return { role, number, name, formula, reading: readingOf(workbook, definedName) };
}

function readingOf(workbook: WorkbookSnapshot, definedName: DefinedName): PartReading {
  const resolution = resolveName(workbook, definedName);
  switch (resolution.kind) {
    case 'ranges': {
      const { ranges } = resolution;
      const cellCount = ranges.reduce((count, range) => count + cellCountOf(range), 0);
      return { kind: 'cells', ranges, cellCount, text: cellCount === 1 ? textIn(workbook, ranges[0]) : null };
    }
    case 'constant':
      return { kind: 'constant', text: String(resolution.value) };
    case 'computed':
      return { kind: 'computed' };
    case 'dead':
    case 'external':
    case 'unknown':
    case 'not-a-range':
      return { kind: 'dead' };
  }
}

function textIn(workbook: WorkbookSnapshot, { sheet, top, left }: CellRange): string | null {
  const value = storedValue(workbook, { sheet, row: top, column: left });
  return typeof value === 'string' ? value : null;
}
