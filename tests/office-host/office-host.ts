/**
 * The far end of Office.js: takes the library's batches, carries them out on a workbook, and answers as Excel does,
 * with its limits, its moods and, on demand, its faults. How messages travel is for node-host and browser-host.
 */
import { cellText, columnOfLetters } from '../../addin/domain/sheet/cell-address';
import { formatCellRange, type CellRange } from '../../addin/domain/sheet/cell-range';
import { executeBatch } from './execute-batch';
import { HostError, type HostErrorCode } from './host-error';
import type { HostSheet } from './host-sheet';
import type { HostWorkbook } from './host-workbook';
import type { HostObject, HostSession } from './object-kind';
import {
  actionTypes,
  eventTypes,
  wholeWorkbookTarget,
  type BatchRequest,
  type BatchResponse,
  type EventMessage,
} from './wire-protocol';

/** Excel on the web takes and gives no more than this in one message. */
const messageLimit = 5 * 1024 * 1024;

/** Flag of a request that waits until no cell is being edited. */
const delayForCellEdit = 64;

export interface Fault {
  /** The batch that it hits, counted from 1 since `expectFault`. */
  readonly batch: number;
  /** `no-answer`: the batch is never answered. */
  readonly code: HostErrorCode | 'no-answer';
  /** Before anything of the batch is done, after half of it, or after all of it. */
  readonly when: 'before' | 'midway' | 'after';
  /** Every later batch fails too, before anything is done, until `clearFault`. */
  readonly isLasting: boolean;
}

export interface OfficeHostOptions {
  /** The ExcelApi requirement set that the host offers: `1.9`. */
  readonly requirementSet?: string;
  readonly arrayFormulasShow?: 'everywhere' | 'first';
  readonly messageLimit?: number;
}

/** What has gone over the wire since the last reset. */
export interface Traffic {
  /** Batches that the add-in waited for. */
  roundTrips: number;
  /** Batches in which the library gives references back, after a run. */
  cleanups: number;
  requestBytes: number;
  responseBytes: number;
  /** Of the largest message either way. */
  largestMessage: number;
}

export class OfficeHost implements HostSession {
  readonly references = new Map<string, HostObject>();
  readonly registeredEvents = new Set<string>();
  readonly arrayFormulasShow: 'everywhere' | 'first';
  readonly requirementSet: string;
  traffic: Traffic = newTraffic();
  /** Members of the object model that the add-in has used, as `Range.Values`. */
  readonly usedMembers = new Set<string>();

  /** A cell is being typed in: nothing else is done. */
  isEditingCell = false;
  /** Another workbook has come to the front. */
  isInBackground = false;
  isDialogOpen = false;
  /** As `Office.context.officeTheme` gives it, where the host tells its theme at all. */
  officeTheme: unknown = undefined;
  /** What an answer waits for: a slow host. Without it, answers come at once. */
  beforeAnswer: (() => Promise<void>) | undefined;
  /** Called before each batch that the add-in waits for, with its number since the last reset. */
  beforeBatch: ((number: number) => void) | undefined;
  /** How events reach the library; set by the transport. */
  deliver: (event: EventMessage) => void = () => undefined;

  private readonly limit: number;
  private fault: Fault | undefined;
  private batchesSinceFault = 0;
  private pendingEvents: EventMessage[] = [];

  constructor(
    readonly workbook: HostWorkbook,
    options: OfficeHostOptions = {},
  ) {
    this.requirementSet = options.requirementSet ?? '1.15';
    this.arrayFormulasShow = options.arrayFormulasShow ?? 'everywhere';
    this.limit = options.messageLimit ?? messageLimit;
  }

  /** Whether the host offers a requirement set, as the library asks before it uses a member. */
  supports(set: string, version = '1.1'): boolean {
    if (set !== 'ExcelApi') {
      return ['RichApiRuntimeFlag', 'RichApiRuntime', 'DelayForCellEdit', 'ExcelApiUndo'].includes(set);
    }
    const minor = (text: string): number => Number(text.split('.')[1] ?? 0);
    return minor(version) <= minor(this.requirementSet);
  }

  resetTraffic(): void {
    this.traffic = newTraffic();
  }

  expectFault(fault: Fault): void {
    this.fault = fault;
    this.batchesSinceFault = 0;
  }

  clearFault(): void {
    this.fault = undefined;
  }

  /**
   * @param text the request's body
   * @returns the answer's body; undefined where none ever comes
   */
  exchange(text: string, flags: number): string | undefined {
    const request = JSON.parse(text) as BatchRequest;
    if (isCleanup(request)) {
      this.traffic.cleanups++;
      return JSON.stringify(executeBatch(request, this));
    }
    this.traffic.roundTrips++;
    this.traffic.requestBytes += text.length;
    this.traffic.largestMessage = Math.max(this.traffic.largestMessage, text.length);
    this.beforeBatch?.(this.traffic.roundTrips);
    const response = this.respond(request, text.length, flags);
    if (response === undefined) return undefined;
    const answer = JSON.stringify(response);
    this.traffic.responseBytes += answer.length;
    if (answer.length > this.limit) {
      return JSON.stringify(failure(new HostError('ResponsePayloadSizeLimitExceeded')));
    }
    this.traffic.largestMessage = Math.max(this.traffic.largestMessage, answer.length);
    return answer;
  }

  /** Sends the events of what has happened since; the transport calls it after each answer. */
  flushEvents(): void {
    const events = this.pendingEvents;
    this.pendingEvents = [];
    events.forEach((event) => this.deliver(event));
  }

  refuseWrite(sheet: HostSheet | undefined, location: string): void {
    if (this.isDialogOpen) throw new HostError('WriteNotSupportedWhenModalDialogOpen', location);
    if (this.workbook.isReadOnly || sheet?.isProtected === true)
      throw new HostError('AccessDenied', location);
  }

  noteChange(range: CellRange, sheet: HostSheet): void {
    this.raise(eventTypes.dataChanged, sheet, {
      address: localAddress(range),
      changeType: 'RangeEdited',
      source: 'Local',
      type: 'WorksheetChanged',
    });
  }

  // What a person does meanwhile.

  /** Types into a cell: `Plan!B5`. */
  type(address: string, input: number | string | boolean): void {
    const { sheet, row, column } = this.place(address);
    sheet.enter(row, column, input);
    this.workbook.cellsChanged();
    this.noteChange({ sheet: sheet.name, top: row, left: column, bottom: row, right: column }, sheet);
    this.flushEvents();
  }

  select(sheetName: string, ...ranges: Omit<CellRange, 'sheet'>[]): void {
    const sheet = this.workbook.sheetNamed(sheetName)!;
    if (sheet !== this.workbook.selection.sheet) {
      this.raise(eventTypes.sheetActivated, sheet, { type: 'WorksheetActivated' });
    }
    this.workbook.selection = { sheet, ranges: ranges.map((range) => ({ ...range, sheet: sheet.name })) };
    this.raise(eventTypes.selectionChanged, sheet, {
      address: ranges.map((range) => localAddress({ ...range, sheet: sheetName })).join(','),
      type: 'WorksheetSelectionChanged',
    });
    this.flushEvents();
  }

  addSheet(name: string): void {
    const sheet = this.workbook.addSheet(name);
    this.raise(eventTypes.sheetAdded, sheet, { source: 'Local', type: 'WorksheetAdded' });
    this.flushEvents();
  }

  /** What a cell shows: `Plan!B5`. */
  value(address: string): unknown {
    const { sheet, row, column } = this.place(address);
    this.workbook.refresh();
    return sheet.cell(row, column)?.value ?? null;
  }

  private place(address: string): { sheet: HostSheet; row: number; column: number } {
    const [, name, letters, row] = /^(.+)!([A-Z]+)(\d+)$/.exec(address)!;
    return { sheet: this.workbook.sheetNamed(name)!, row: Number(row) - 1, column: columnOfLetters(letters) };
  }

  private raise(type: number, sheet: HostSheet, content: Readonly<Record<string, unknown>>): void {
    for (const targetId of [sheet.id, wholeWorkbookTarget]) {
      if (this.registeredEvents.has(`${type}:${targetId}`)) {
        this.pendingEvents.push({
          messageType: type,
          targetId,
          content: { worksheetId: sheet.id, ...content },
        });
      }
    }
  }

  private respond(request: BatchRequest, length: number, flags: number): BatchResponse | undefined {
    if (length > this.limit) return failure(new HostError('RequestPayloadSizeLimitExceeded'));
    if (this.isInBackground) return failure(new HostError('InactiveWorkbook'));
    if (this.isEditingCell) {
      return (flags & delayForCellEdit) !== 0
        ? undefined
        : failure(new HostError('InvalidOperationInCellEditMode'));
    }
    const fault = this.takeFault();
    if (fault === undefined) return executeBatch(request, this);
    const error = fault.code === 'no-answer' ? new HostError('RequestAborted') : new HostError(fault.code);
    const { length: actionCount } = request.Actions;
    const position = { before: 0, midway: actionCount >> 1, after: actionCount }[fault.when];
    const response = executeBatch(request, this, { position, error });
    return fault.code === 'no-answer' ? undefined : response;
  }

  /** The fault that hits this batch, or undefined. */
  private takeFault(): Fault | undefined {
    const { fault } = this;
    if (fault === undefined) return undefined;
    this.batchesSinceFault++;
    if (this.batchesSinceFault === fault.batch) return fault;
    return fault.isLasting && this.batchesSinceFault > fault.batch ? { ...fault, when: 'before' } : undefined;
  }
}

function newTraffic(): Traffic {
  return { roundTrips: 0, cleanups: 0, requestBytes: 0, responseBytes: 0, largestMessage: 0 };
}

/** Only references are given back: the library does that by itself, and nobody waits for it. */
function isCleanup({ Actions: actions }: BatchRequest): boolean {
  const removals = actions.filter(({ Name: name }) => name === '_RemoveReference');
  const others = actions.filter(({ ActionType: type }) => type === actionTypes.instantiate);
  return removals.length > 0 && removals.length + others.length === actions.length;
}

function failure(error: HostError): BatchResponse {
  return { Results: [], Error: { Code: error.code, Message: error.message, HttpStatusCode: 400 } };
}

function localAddress(range: CellRange): string {
  return formatCellRange(range).replace(/^.*!/s, '') || cellText(range.top, range.left);
}
