/**
 * Every error of Excel, at every round trip of reading, writing and putting back, once and lasting: what becomes of the
 * workbook, and what the planner is told. Each end is looked at in the workbook itself, not in what the adapter says.
 */
import { ExcelBatches, type ExcelTiming } from '../../addin/adapters/excel-host/excel-batch';
import { ExcelWorkbook } from '../../addin/adapters/excel-host/excel-workbook';
import { MemoryWorkbook } from '../../addin/adapters/memory/memory-workbook';
import type { WritePlan } from '../../addin/domain/results-to-sheet/write-plan';
import type { WorkbookSnapshot } from '../../addin/domain/sheet/sheet-snapshot';
import { WorkbookError, type WorkbookErrorCode } from '../../addin/ports/workbook';
import { hostErrorCodes } from './host-error';
import { stateOf } from './host-state';
import { startOfficeHost } from './node-host';
import type { Fault, OfficeHost } from './office-host';

export type Operation = 'read' | 'write' | 'put back' | 'finish';

/** Round trips of each, as long as nothing goes wrong. */
export const roundTripsOf: Readonly<Record<Operation, number>> = {
  read: 3,
  write: 2,
  'put back': 2,
  finish: 2,
};

export const faultCodes: readonly Fault['code'][] = [...hostErrorCodes, 'no-answer'];

/**
 * - `done`: the work was done in spite of the fault;
 * - `refused`: nothing was touched;
 * - `taken back`: the write had begun, and the workbook is as it was;
 * - `kept`: some cells may be between; the journal is kept, and both ways out of it work once Excel answers again.
 */
export type FaultEnd = 'done' | 'refused' | 'taken back' | 'kept';

export interface FaultCase {
  readonly operation: Operation;
  readonly roundTrip: number;
  readonly code: Fault['code'];
  readonly isLasting: boolean;
}

export interface FaultOutcome extends FaultCase {
  readonly end: FaultEnd;
  /** Of the error; null where the work was done. */
  readonly errorCode: WorkbookErrorCode | null;
  readonly canRetry: boolean;
  readonly sentence: string;
}

const moments: readonly Fault['when'][] = ['before', 'midway', 'after'];

/** A plan's workbook, small, with something of everything that a write can meet. */
const workbook = MemoryWorkbook.of({
  sheets: {
    Plan: {
      A5: [['Wall tile'], ['Floor tile']],
      B5: { value: 2, numberFormat: '0.00' },
      B8: '=B5+2*B6',
      B10: '=SUM(B5:B6)',
      C10: '<=',
      D10: 4,
      G5: 'old',
    },
    Costs: { A1: 3 },
  },
  names: {
    'Week.Decision': 'Plan!$B$5:$B$6',
    'Week.Objective': 'Plan!$B$8',
    'Week.Sense': '"max"',
    'Week.Constraint': 'Plan!$B$10:$D$10',
    'Week.Slack': 'Plan!$H$1',
    'Week.Before': 'Plan!$H$2',
  },
  hiddenNames: ['Week.Before'],
  record: '{"version":0}',
}).snapshot();

const cell = (sheet: string, row: number, column: number) => ({ sheet, row, column });

const plan: WritePlan = [
  { kind: 'addSheet', name: 'Week results' },
  { kind: 'value', cell: cell('Week results', 0, 0), value: 'Wall tile' },
  { kind: 'formula', cell: cell('Week results', 0, 1), formula: 'Plan!B5', value: 1 },
  { kind: 'value', cell: cell('Plan', 4, 1), value: 1 },
  { kind: 'value', cell: cell('Plan', 5, 1), value: 1.5 },
  { kind: 'value', cell: cell('Plan', 3, 5), value: 'Optimum\n(best amount)', wrapsText: true },
  { kind: 'value', cell: cell('Plan', 4, 5), value: 1, numberFormatOf: cell('Plan', 4, 1) },
  { kind: 'value', cell: cell('Plan', 5, 5), value: 1.5, numberFormatOf: cell('Plan', 4, 1) },
  { kind: 'value', cell: cell('Plan', 4, 6), value: null },
  { kind: 'columnWidth', sheet: 'Plan', column: 5, width: 14 },
  { kind: 'name', name: 'Week.Optimum', scope: null, formula: 'Plan!$F$5:$F$6' },
  { kind: 'name', name: 'Week.Slack', scope: null, formula: 'Plan!$H$10' },
  { kind: 'removeName', name: 'Week.Before', scope: null },
  { kind: 'record', json: '{"version":1}' },
  { kind: 'recalculateOnOpening' },
];

/** Whatever has not been answered after a turn of the loop never is: the far end answers at once. */
const timing: ExcelTiming = {
  secondsToWait: 60,
  pause: () => Promise.resolve(),
  startTimer: (_seconds, callback) => {
    const timer = setImmediate(() => setImmediate(callback));
    return () => clearImmediate(timer);
  },
};

interface Opened {
  readonly host: OfficeHost;
  readonly excel: ExcelWorkbook;
  readonly basis: WorkbookSnapshot;
}

async function open(): Promise<Opened> {
  const host = startOfficeHost(workbook);
  const excel = new ExcelWorkbook(new ExcelBatches(timing));
  return { host, excel, basis: await excel.read() };
}

/** Every case, each at all three moments of its batch. @throws Error where a case ends in a way that has no name */
export async function runFaultMatrix(visit?: (outcome: FaultOutcome) => void): Promise<FaultOutcome[]> {
  const { host, excel, basis } = await open();
  const untouched = stateOf(host.workbook);
  await excel.apply(plan, basis);
  const written = stateOf(host.workbook);
  const ends = { untouched, written };

  const outcomes: FaultOutcome[] = [];
  for (const operation of Object.keys(roundTripsOf) as Operation[]) {
    for (const code of faultCodes) {
      for (const isLasting of [false, true]) {
        for (let roundTrip = 1; roundTrip <= roundTripsOf[operation]; roundTrip++) {
          const faultCase = { operation, roundTrip, code, isLasting };
          const atMoments: FaultOutcome[] = [];
          for (const when of moments) atMoments.push(await runCase(faultCase, when, ends));
          const outcome = sameOutcome(faultCase, atMoments);
          visit?.(outcome);
          outcomes.push(outcome);
        }
      }
    }
  }
  return outcomes;
}

interface KnownStates {
  readonly untouched: unknown;
  readonly written: unknown;
}

async function runCase(
  faultCase: FaultCase,
  when: Fault['when'],
  states: KnownStates,
): Promise<FaultOutcome> {
  const { operation, roundTrip, code, isLasting } = faultCase;
  const opened = await open();
  const { host, excel, basis } = opened;
  const state = (): string => nameOfState(stateOf(host.workbook), states);
  const outcome = (end: FaultEnd, error: WorkbookError | null): FaultOutcome => ({
    ...faultCase,
    end,
    errorCode: error?.code ?? null,
    canRetry: error?.canRetry ?? false,
    sentence: error?.message ?? '',
  });
  if (operation === 'put back' || operation === 'finish') await breakOff(opened);
  host.expectFault({ batch: roundTrip, code, when, isLasting });
  const error = await errorOf(workOf(operation, opened));
  const isOpen = excel.unfinished().length > 0;
  const direct = state();
  host.clearFault();
  switch (operation) {
    case 'read':
      expectState(faultCase, direct, 'untouched');
      await excel.read();
      return outcome(error === null ? 'done' : 'refused', error);
    case 'write':
      if (error === null) {
        expectState(faultCase, direct, 'written');
        return outcome('done', null);
      }
      if (!isOpen) {
        expectState(faultCase, direct, 'untouched');
        // The same plan can be written at once, now that Excel answers.
        await excel.apply(plan, basis);
        expectState(faultCase, state(), 'written');
        return outcome(roundTrip === 1 ? 'refused' : 'taken back', error);
      }
      await excel.putBack();
      expectState(faultCase, state(), 'untouched');
      return outcome('kept', error);
    case 'put back':
    case 'finish': {
      const wanted = operation === 'finish' ? 'written' : 'untouched';
      if (error !== null) await (operation === 'finish' ? excel.finish() : excel.putBack());
      expectState(faultCase, state(), wanted);
      if (excel.unfinished().length > 0) throw caseError(faultCase, 'the journal is still open');
      return outcome(error === null ? 'done' : 'kept', error);
    }
  }
}

function workOf(operation: Operation, { excel, basis }: Opened): Promise<unknown> {
  switch (operation) {
    case 'read':
      return excel.read();
    case 'write':
      return excel.apply(plan, basis);
    case 'put back':
      return excel.putBack();
    case 'finish':
      return excel.finish();
  }
}

/** Leaves a journal open: a write broke off midway, and Excel went on failing. */
async function breakOff({ host, excel, basis }: Opened): Promise<void> {
  host.expectFault({ batch: 2, code: 'GeneralException', when: 'midway', isLasting: true });
  await errorOf(excel.apply(plan, basis));
  host.clearFault();
  if (excel.unfinished().length === 0) throw new Error('No journal was left open.');
}

async function errorOf(work: Promise<unknown>): Promise<WorkbookError | null> {
  try {
    await work;
    return null;
  } catch (error) {
    if (error instanceof WorkbookError) return error;
    throw error;
  }
}

function nameOfState(state: unknown, { untouched, written }: KnownStates): string {
  const text = JSON.stringify(state);
  if (text === JSON.stringify(untouched)) return 'untouched';
  return text === JSON.stringify(written) ? 'written' : text;
}

function expectState(faultCase: FaultCase, state: string, wanted: string): void {
  if (state !== wanted) throw caseError(faultCase, `the workbook is ${state}, and not ${wanted}`);
}

/** A case ends in one way, at whichever moment its batch breaks. */
function sameOutcome(faultCase: FaultCase, outcomes: readonly FaultOutcome[]): FaultOutcome {
  const [first] = outcomes;
  const other = outcomes.find(({ end, errorCode }) => end !== first.end || errorCode !== first.errorCode);
  if (other !== undefined) {
    const [a, b] = [first, other].map(({ end, errorCode }) => `${end} (${errorCode})`);
    throw caseError(faultCase, `it ends as ${a} or as ${b}, by the moment`);
  }
  return first;
}

function caseError({ operation, roundTrip, code, isLasting }: FaultCase, what: string): Error {
  const times = isLasting ? 'lasting' : 'once';
  return new Error(`${code}, ${times}, at round trip ${roundTrip} of ${operation}: ${what}.`);
}
