/**
 * Changes to what a plan states, as write plans: parts set and taken away, plans duplicated, renamed, deleted. Only
 * names are touched, never a cell's contents; the one exception is a relation picked for its cell.
 */
import {
  listPlans,
  nameOfRole,
  namesOfPlan,
  readRoleName,
  type PlanListing,
  type StatementRole,
} from '../model-from-sheet/naming-convention';
import type { PlanSense, Relation } from '../model-from-sheet/sheet-model';
import type { WorkbookWrite, WritePlan } from '../results-to-sheet/write-plan';
import { planRecordKey, readWorkbookRecord, workbookRecordText } from '../results-to-sheet/written-cells';
import { formatCellAddress, type CellAddress } from '../sheet/cell-address';
import type { DefinedName } from '../sheet/defined-name';
import type { WorkbookSnapshot } from '../sheet/sheet-snapshot';
import { resultNamesOfPlan } from './describe-plans';

/** Why a plan cannot have a name. */
export type PlanNameFault = 'blank' | 'characters' | 'like-a-cell' | 'ends-in-part' | 'too-long' | 'taken';

/** Excel allows 255 characters for a name; the longest role with a number must find room behind it. */
const longestPrefix = 200;

/** A plan of workbook scope that does not exist yet. */
export function newPlanListing(prefix: string): PlanListing {
  return { name: prefix, prefix, separator: '.', scope: null };
}

/** null where the name will do. @param own the plan that is to be renamed: its own name is not taken */
export function findPlanNameFault(
  workbook: WorkbookSnapshot,
  wanted: string,
  own: PlanListing | null = null,
): PlanNameFault | null {
  const prefix = wanted.trim();
  if (prefix === '') {
    return 'blank';
  }
  if (prefix.length > longestPrefix) {
    return 'too-long';
  }
  if (!/^[\p{L}_][\p{L}\p{M}\p{N}_.]*$/u.test(prefix) || prefix.endsWith('.')) {
    return 'characters';
  }
  if (/^([a-z]{1,3}\d+|r\d*(c\d*)?|c\d*|true|false)$/i.test(prefix)) {
    return 'like-a-cell';
  }
  const asName: DefinedName = { name: prefix, scope: null, formula: '', isHidden: false };
  if (readRoleName(asName) !== undefined) {
    return 'ends-in-part';
  }
  const key = prefix.toLowerCase();
  const scope = own?.scope ?? null;
  const isTaken = workbook.names
    .filter((name) => isSameScope(name.scope, scope))
    .map(readRoleName)
    .some((role) => role?.prefix.toLowerCase() === key && key !== own?.prefix.toLowerCase());
  return isTaken ? 'taken' : null;
}

/** `Week2`, `Week3`: a name near the given one that no plan has; `Mix_2` where `Mix2` would be a cell. */
export function freePlanName(workbook: WorkbookSnapshot, wanted: string): string {
  const bare = wanted.replace(/[_\d]+$/, '') || 'Plan';
  const stem = /^[a-z]{1,3}$/i.test(bare) ? `${bare}_` : bare;
  for (let number = 2; ; number++) {
    const name = `${stem}${number}`;
    if (findPlanNameFault(workbook, name) === null) {
      return name;
    }
  }
}

/** Points a part at what it should refer to; creates its name where there is none. */
export function setPart(plan: PlanListing, role: StatementRole, number: number, formula: string): WritePlan {
  return [{ kind: 'name', name: nameOfRole(plan, role, number), scope: plan.scope, formula }];
}

/** Takes a part's name away, in whichever spelling it is written. */
export function removePart(
  workbook: WorkbookSnapshot,
  plan: PlanListing,
  role: StatementRole,
  number: number,
): WritePlan {
  return namesOfPlan(workbook, plan)
    .filter((name) => name.role === role && name.number === number)
    .map(({ definedName }) => removalOf(definedName));
}

/** The sense stands in the name itself, and needs no cell. */
export function setSense(plan: PlanListing, sense: PlanSense): WritePlan {
  return setPart(plan, 'Sense', 1, `"${sense}"`);
}

/** One relation for all rows of a set whose parts stand apart, in the name itself. */
export function setCommonRelation(plan: PlanListing, number: number, relation: Relation): WritePlan {
  return setPart(plan, 'Relation', number, `"${relation}"`);
}

/** A relation picked for its cell: typed there, `=>` and `=` would be taken for formulas. */
export function writeRelation(cell: CellAddress, relation: Relation): WritePlan {
  return [{ kind: 'value', cell, value: relation }];
}

/** A plan with the same statement under another name, of the same scope. Results are not copied. */
export function duplicatePlan(workbook: WorkbookSnapshot, plan: PlanListing, prefix: string): WritePlan {
  const copy: PlanListing = { ...plan, prefix, name: prefix };
  return namesOfPlan(workbook, plan).map((name) => ({
    kind: 'name',
    name: nameUnder(copy, plan, name.definedName),
    scope: plan.scope,
    formula: name.definedName.formula,
  }));
}

/** The plan's statement, results and record under another name. */
export function renamePlan(workbook: WorkbookSnapshot, plan: PlanListing, prefix: string): WritePlan {
  const renamed: PlanListing = { ...plan, prefix, name: nameUnderScope(prefix, plan.scope) };
  const names = allNamesOf(workbook, plan);
  return [
    ...names.map(removalOf),
    ...names.map((name): WorkbookWrite => ({
      kind: 'name',
      name: nameUnder(renamed, plan, name),
      scope: plan.scope,
      formula: name.formula,
    })),
    ...recordWithout(workbook, plan, renamed),
  ];
}

/** The plan's names and record go; the cells that they referred to, results among them, stay as they are. */
export function deletePlan(workbook: WorkbookSnapshot, plan: PlanListing): WritePlan {
  return [...allNamesOf(workbook, plan).map(removalOf), ...recordWithout(workbook, plan, null)];
}

/** Formulas of cells and names that use one of the plan's names, and would no longer find it. */
export function usersOfPlanNames(workbook: WorkbookSnapshot, plan: PlanListing): string[] {
  const own = allNamesOf(workbook, plan);
  const wanted = new Set(own.map(({ name }) => name.toLowerCase()));
  const uses = (formula: string): boolean => wordsOf(formula).some((word) => wanted.has(word));
  const users: string[] = [];
  for (const sheet of workbook.sheets) {
    sheet.forEachCell((row, column, { formula }) => {
      if (formula !== undefined && uses(formula)) {
        users.push(formatCellAddress({ sheet: sheet.name, row, column }));
      }
    });
  }
  return [...users, ...workbook.names.filter((n) => !own.includes(n) && uses(n.formula)).map((n) => n.name)];
}

/** The words of a formula that may be names, in lower case; texts in quotation marks do not count. */
function wordsOf(formula: string): string[] {
  return (
    formula
      .replace(/"[^"]*"/g, '')
      .toLowerCase()
      .match(/[\p{L}_][\p{L}\p{M}\p{N}_.]*/gu) ?? []
  );
}

function allNamesOf(workbook: WorkbookSnapshot, plan: PlanListing): DefinedName[] {
  return [
    ...namesOfPlan(workbook, plan).map(({ definedName }) => definedName),
    ...resultNamesOfPlan(workbook, plan),
  ];
}

/** What stands behind the prefix keeps its spelling, separator and number included. */
function nameUnder(target: PlanListing, source: PlanListing, { name }: DefinedName): string {
  return target.prefix + name.slice(source.prefix.length);
}

function nameUnderScope(prefix: string, scope: string | null): string {
  return scope === null ? prefix : `${prefix} @ ${scope}`;
}

function removalOf({ name, scope }: DefinedName): WorkbookWrite {
  return { kind: 'removeName', name, scope };
}

/** The record with this plan's part moved to another name, or left out. */
function recordWithout(
  workbook: WorkbookSnapshot,
  plan: PlanListing,
  target: PlanListing | null,
): WorkbookWrite[] {
  const record = new Map(readWorkbookRecord(workbook.record));
  const key = planRecordKey(plan.name);
  const own = record.get(key);
  if (own === undefined) {
    return [];
  }
  record.delete(key);
  if (target !== null) {
    const prefix = plan.prefix.toLowerCase();
    const columns = own.columns.map((column) => ({
      ...column,
      name: target.prefix.toLowerCase() + column.name.slice(prefix.length),
    }));
    record.set(planRecordKey(target.name), { ...own, columns });
  }
  return [{ kind: 'record', json: workbookRecordText(record) }];
}

function isSameScope(a: string | null, b: string | null): boolean {
  return (a ?? '').toLowerCase() === (b ?? '').toLowerCase();
}

/** The plans as they will be listed once these names are there: for a face that keeps a snapshot. */
export function withStatementWrites(workbook: WorkbookSnapshot, writes: WritePlan): WorkbookSnapshot {
  let names = workbook.names;
  let record = workbook.record;
  for (const write of writes) {
    if (write.kind === 'name' || write.kind === 'removeName') {
      const isOther = (name: DefinedName): boolean =>
        name.name.toLowerCase() !== write.name.toLowerCase() || !isSameScope(name.scope, write.scope);
      const others = names.filter(isOther);
      names =
        write.kind === 'removeName'
          ? others
          : [...others, { name: write.name, scope: write.scope, formula: write.formula, isHidden: false }];
    } else if (write.kind === 'record') {
      record = write.json;
    }
  }
  const { sheets, tables, usesDates1904 } = workbook;
  return { sheets, names, tables, usesDates1904, record };
}

/** A first name for a plan in a workbook that may have others. */
export function suggestedPlanName(workbook: WorkbookSnapshot, wanted: string): string {
  const isFree = !listPlans(workbook).some((plan) => plan.prefix.toLowerCase() === wanted.toLowerCase());
  return isFree && findPlanNameFault(workbook, wanted) === null ? wanted : freePlanName(workbook, wanted);
}
