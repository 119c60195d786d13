/**
 * The defined names that declare a plan: prefix, separator, role, number. `Week.Decision2` is the second block of
 * decision cells of the plan `Week`. Case never counts.
 */
import type { DefinedName } from '../sheet/defined-name';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';

/** The roles of the statement, spelt as a plan's names are written. (Those of results: results-to-sheet.) */
export const statementRoles = [
  'Decision',
  'Objective',
  'Sense',
  'Constraint',
  'Left',
  'Relation',
  'Right',
  'Lower',
  'Upper',
  'Lot',
  'LeastRun',
  'DecisionLabel',
  'ConstraintLabel',
] as const;

export type StatementRole = (typeof statementRoles)[number];

export type Separator = '.' | '_';

/** One plan of a workbook, as found by its names. */
export interface PlanListing {
  /** `Week`, or `Week @ Sheet name` for a plan of sheet-local names. */
  readonly name: string;
  /** As written in the name of its first decision block. */
  readonly prefix: string;
  readonly separator: Separator;
  /** Sheet whose local names make the plan; null for names of the whole workbook. */
  readonly scope: string | null;
}

/** A defined name taken apart. */
export interface RoleName {
  readonly definedName: DefinedName;
  readonly prefix: string;
  readonly separator: Separator;
  readonly role: StatementRole;
  /** 1 for a name without a number. */
  readonly number: number;
  /** Whether the number is written: `Lower1` serves the first block alone, `Lower` may serve every block. */
  readonly isNumbered: boolean;
}

const roleSpellings = new Map<string, StatementRole>(
  statementRoles.map((role) => [role.toLowerCase(), role]),
);

/** The name taken apart, or undefined where it ends in no role: such names are none of ours. */
export function readRoleName(definedName: DefinedName): RoleName | undefined {
  const parts = /^(.+)([._])([a-z]+)(\d*)$/i.exec(definedName.name);
  const role = parts === null ? undefined : roleSpellings.get(parts[3].toLowerCase());
  const number = parts === null || parts[4] === '' ? 1 : Number(parts[4]);
  if (parts === null || role === undefined || number === 0) {
    return undefined;
  }
  return {
    definedName,
    prefix: parts[1],
    separator: parts[2] as Separator,
    role,
    number,
    isNumbered: parts[4] !== '',
  };
}

/** `Week.Lower2`: the name that a role and number have in a plan. */
export function nameOfRole(
  plan: Pick<PlanListing, 'prefix' | 'separator'>,
  role: StatementRole,
  number = 1,
): string {
  return `${plan.prefix}${plan.separator}${role}${number === 1 ? '' : String(number)}`;
}

function sameText(a: string, b: string): boolean {
  return a.toLowerCase() === b.toLowerCase();
}

function sameScope(a: string | null, b: string | null): boolean {
  return a === null || b === null ? a === b : sameText(a, b);
}

/**
 * The workbook's plans: those of workbook scope first, then the sheet-local ones in the order of the tabs, by name.
 * A prefix without decision cells is no plan.
 */
export function listPlans(workbook: WorkbookSnapshot): readonly PlanListing[] {
  const firstBlocks = new Map<string, RoleName>();
  for (const definedName of workbook.names) {
    const roleName = readRoleName(definedName);
    if (roleName?.role !== 'Decision') {
      continue;
    }
    const key = `${(definedName.scope ?? '').toLowerCase()}\n${roleName.prefix.toLowerCase()}`;
    const known = firstBlocks.get(key);
    if (known === undefined || roleName.number < known.number) {
      firstBlocks.set(key, roleName);
    }
  }
  const placeOf = (scope: string | null): number =>
    scope === null ? -1 : workbook.sheets.findIndex((sheet) => sameText(sheet.name, scope));
  return [...firstBlocks.values()]
    .map(({ prefix, separator, definedName }) => ({
      name: definedName.scope === null ? prefix : `${prefix} @ ${definedName.scope}`,
      prefix,
      separator,
      scope: definedName.scope,
    }))
    .sort((a, b) => placeOf(a.scope) - placeOf(b.scope) || compareText(a.name, b.name));
}

function compareText(a: string, b: string): number {
  const [lowerA, lowerB] = [a.toLowerCase(), b.toLowerCase()];
  return lowerA < lowerB ? -1 : lowerA > lowerB ? 1 : 0;
}

/** The plan of that name, case and outer blanks aside. */
export function findPlan(workbook: WorkbookSnapshot, planName: string): PlanListing | undefined {
  return listPlans(workbook).find((plan) => sameText(plan.name, planName.trim()));
}

/**
 * The plan's own names of the statement, by number. A sheet-local plan has only the names of its sheet: it never
 * borrows one of workbook scope, so that a copied sheet cannot mix two plans unnoticed.
 */
export function namesOfPlan(workbook: WorkbookSnapshot, plan: PlanListing): readonly RoleName[] {
  return workbook.names
    .filter((definedName) => sameScope(definedName.scope, plan.scope))
    .map(readRoleName)
    .filter((roleName): roleName is RoleName => roleName !== undefined)
    .filter(({ prefix }) => sameText(prefix, plan.prefix))
    .sort((a, b) => a.number - b.number);
}
