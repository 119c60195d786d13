/**
 * What we last wrote, and what has become the planner's since. The record is JSON in a part of our own of the
 * workbook (snapshot.record, RecordWrite); a cell that no longer equals what stands there is the planner's.
 *
 * Cells are recorded by the name of their column and their place in it, not by address: names follow when rows are
 * inserted, columns moved and sheets renamed, addresses in a text do not.
 */
import type { CellValue } from '../sheet/cell-value';
import { isWithin, resultTolerances } from './result-tolerances';

/** A value that we wrote; null where we wrote nothing. */
export type WrittenValue = number | string | null;

export interface ColumnRecord {
  /** The column's defined name, in lower case. */
  readonly name: string;
  readonly heading: string | null;
  /** One a cell of the named range, along the block. */
  readonly values: readonly WrittenValue[];
}

/** What a decision block held before, and what was written: enough to put it back later. */
export interface DecisionRecord {
  /** 1 for `Decision`, 2 for `Decision2`, … */
  readonly block: number;
  /** One a decision cell, in the plan's order. */
  readonly before: readonly WrittenValue[];
  readonly written: readonly WrittenValue[];
}

export interface PlanRecord {
  readonly columns: readonly ColumnRecord[];
  readonly decisions: readonly DecisionRecord[];
}

/** The records of all plans of a workbook, by planRecordKey. */
export type WorkbookRecord = ReadonlyMap<string, PlanRecord>;

/** The version of the record's form. A later one is not understood and counts as no record. */
const recordVersion = 1;

/** Plans are told apart without regard to case. */
export function planRecordKey(planName: string): string {
  return planName.trim().toLowerCase();
}

/** Reads the record; anything that is not one of ours, whole and of this version, counts as none. */
export function readWorkbookRecord(json: string | null): WorkbookRecord {
  const record = new Map<string, PlanRecord>();
  if (json === null) {
    return record;
  }
  let parsed: unknown;
  try {
    parsed = JSON.parse(json);
  } catch {
    return record;
  }
  if (!isObject(parsed) || parsed.version !== recordVersion || !isObject(parsed.plans)) {
    return record;
  }
  for (const [key, plan] of Object.entries(parsed.plans)) {
    if (isPlanRecord(plan)) {
      record.set(key, plan);
    }
  }
  return record;
}

/** The record as JSON text, with one plan's part renewed and the other plans' kept. */
export function renewWorkbookRecord(record: WorkbookRecord, planName: string, plan: PlanRecord): string {
  return workbookRecordText(new Map([...record, [planRecordKey(planName), plan]]));
}

/** The record as JSON text. */
export function workbookRecordText(record: WorkbookRecord): string {
  return JSON.stringify({ version: recordVersion, plans: Object.fromEntries(record) });
}

/** Whether a cell still holds what was recorded. Nothing recorded equals only a blank cell. */
export function stillHolds(value: CellValue | undefined, recorded: WrittenValue): boolean {
  if (recorded === null || typeof recorded === 'string') {
    return (value ?? null) === recorded;
  }
  return (
    typeof value === 'number' &&
    isWithin(value, recorded, resultTolerances.sameStoredNumber, Math.abs(recorded))
  );
}

/**
 * Which cells of a column are ours to write: true for blank ones and for those that still hold what we wrote.
 *
 * Where the column is as long as recorded, cell stands against cell. Where rows were inserted or taken away, equal
 * beginnings and ends are matched, and between them each cell with the next recorded value that it equals; what finds
 * no partner counts as the planner's, which errs on the side of keeping.
 */
export function cellsStillOurs(
  values: readonly (CellValue | undefined)[],
  recorded: readonly WrittenValue[],
): boolean[] {
  const ours = values.map((value) => (value ?? null) === null);
  const matches = (position: number, entry: number): boolean => stillHolds(values[position], recorded[entry]);
  if (values.length === recorded.length) {
    return ours.map((isBlank, position) => isBlank || matches(position, position));
  }
  const shorter = Math.min(values.length, recorded.length);
  let start = 0;
  while (start < shorter && matches(start, start)) {
    ours[start] = true;
    start++;
  }
  let fromEnd = 0;
  while (fromEnd < shorter - start && matches(values.length - 1 - fromEnd, recorded.length - 1 - fromEnd)) {
    fromEnd++;
    ours[values.length - fromEnd] = true;
  }
  let entry = start;
  for (let position = start; position < values.length - fromEnd; position++) {
    for (let candidate = entry; candidate < recorded.length - fromEnd; candidate++) {
      if (recorded[candidate] !== null && matches(position, candidate)) {
        ours[position] = true;
        entry = candidate + 1;
        break;
      }
    }
  }
  return ours;
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function isPlanRecord(value: unknown): value is PlanRecord {
  return (
    isObject(value) &&
    Array.isArray(value.columns) &&
    value.columns.every(
      (column) =>
        isObject(column) &&
        typeof column.name === 'string' &&
        (column.heading === null || typeof column.heading === 'string') &&
        isWrittenValues(column.values),
    ) &&
    Array.isArray(value.decisions) &&
    value.decisions.every(
      (block) =>
        isObject(block) &&
        typeof block.block === 'number' &&
        isWrittenValues(block.before) &&
        isWrittenValues(block.written),
    )
  );
}

function isWrittenValues(value: unknown): value is WrittenValue[] {
  return (
    Array.isArray(value) &&
    value.every((entry) => entry === null || typeof entry === 'number' || typeof entry === 'string')
  );
}
