/**
 * What the host answers when it cannot do as asked: a code and a sentence, as Excel's documentation lists them
 * (Microsoft, "Error handling with the application-specific JavaScript APIs").
 */

export const hostErrorMessages = {
  AccessDenied: 'You cannot perform the requested operation.',
  ActivityLimitReached: 'Activity limit has been reached.',
  ApiNotAvailable: 'The requested API is not available.',
  ApiNotFound: 'The API you are trying to use could not be found.',
  Conflict: 'Request could not be processed because of a conflict.',
  GeneralException: 'There was an internal error while processing the request.',
  InactiveWorkbook: 'The operation failed because multiple workbooks are open and this one is not active.',
  InsertDeleteConflict: 'The insert or delete operation attempted resulted in a conflict.',
  InvalidArgument: 'The argument is invalid or missing or has an incorrect format.',
  InvalidObjectPath: 'The object path is not working for what you are trying to do.',
  InvalidOperation: 'The operation attempted is invalid on the object.',
  InvalidOperationInCellEditMode: 'Excel is in cell-editing mode. Please exit the edit mode and try again.',
  InvalidReference: 'This reference is not valid for the current operation.',
  InvalidSelection: 'The current selection is invalid for this operation.',
  ItemAlreadyExists: 'The resource being created already exists.',
  ItemNotFound: "The requested resource doesn't exist.",
  MemoryLimitReached: 'The memory limit has been reached. Your action could not be completed.',
  MergedRangeConflict: 'Cannot complete the operation: a table cannot overlap merged cells.',
  NonBlankCellOffSheet: 'Nonblank cells would be pushed off the end of the sheet.',
  OperationCellsExceedLimit: 'The attempted operation affects more than the limit of 33554000 cells.',
  PivotTableRangeConflict: 'The attempted operation causes a conflict with a PivotTable range.',
  RangeExceedsLimit: 'The cell count in the range has exceeded the maximum supported number.',
  RequestAborted: 'The request was aborted during run time.',
  RequestPayloadSizeLimitExceeded: 'The request payload size has exceeded the limit.',
  ResponsePayloadSizeLimitExceeded: 'The response payload size has exceeded the limit.',
  ServiceNotAvailable: 'The service is unavailable.',
  UnsupportedOperation: 'The operation being attempted is not supported.',
  UnsupportedSheet: 'This sheet type does not support this operation.',
  WriteNotSupportedWhenModalDialogOpen: 'Writing is not supported while a dialog is open.',
} as const;

export type HostErrorCode = keyof typeof hostErrorMessages;

export const hostErrorCodes = Object.keys(hostErrorMessages) as HostErrorCode[];

export class HostError extends Error {
  override readonly name = 'HostError';
  constructor(
    readonly code: HostErrorCode,
    /** `Range.values`: the member that failed, as the library shows it. */
    readonly location?: string,
    message: string = hostErrorMessages[code],
  ) {
    super(message);
  }
}
