/**
 * The messages in which the Office.js library speaks to its host: a batch of actions on objects, each object given by
 * the path that leads to it. The names are as they stand on the wire, found by watching the unmodified library.
 */

export const actionTypes = {
  instantiate: 1,
  query: 2,
  method: 3,
  setProperty: 4,
  trace: 5,
  ensureUnchanged: 8,
  update: 9,
} as const;

export const pathTypes = {
  global: 1,
  newObject: 2,
  method: 3,
  property: 4,
  indexer: 5,
  referenceId: 6,
  nullObject: 7,
} as const;

export interface ArgumentInfo {
  readonly Arguments?: readonly unknown[];
  /** For arguments that are objects themselves: the path of each, 0 or null for plain values. */
  readonly ReferencedObjectPathIds?: readonly (number | null)[];
}

export interface ObjectPath {
  readonly Id: number;
  readonly ObjectPathType: number;
  /** Of the member or the type, in the host's spelling; for a reference, its id. */
  readonly Name: string;
  readonly ParentObjectPathId?: number;
  readonly ArgumentInfo?: ArgumentInfo;
}

export interface QueryInfo {
  readonly Select?: readonly string[];
  readonly Expand?: readonly string[];
  readonly Top?: number;
  readonly Skip?: number;
}

export interface Action {
  readonly Id: number;
  readonly ActionType: number;
  readonly Name: string;
  readonly ObjectPathId: number;
  readonly ArgumentInfo?: ArgumentInfo;
  readonly QueryInfo?: QueryInfo;
}

export interface BatchRequest {
  readonly Actions: readonly Action[];
  readonly ObjectPaths: Readonly<Record<string, ObjectPath>>;
}

export interface BatchError {
  readonly Code: string;
  readonly Message: string;
  readonly Location?: string | undefined;
  readonly ActionIndex?: number;
  readonly HttpStatusCode?: number;
}

export interface BatchResponse {
  /** One an action that was done, in order. */
  readonly Results: readonly { readonly ActionId: number; readonly Value: unknown }[];
  readonly Error?: BatchError;
}

/** The target of events that were registered for all sheets. */
export const wholeWorkbookTarget = 'Workbook';

/** An event as the library takes it. */
export interface EventMessage {
  readonly messageType: number;
  /** The sheet's id, or wholeWorkbookTarget. */
  readonly targetId: string;
  readonly content: Readonly<Record<string, unknown>>;
}

export const eventTypes = {
  dataChanged: 10,
  sheetActivated: 11,
  sheetAdded: 13,
  selectionChanged: 14,
  sheetDeleted: 15,
} as const;
