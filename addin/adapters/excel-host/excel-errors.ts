/**
 * What Excel answers when it cannot do as asked, in words for the planner, and whether trying again makes sense.
 *
 * Codes: Microsoft, "Error handling with the application-specific JavaScript APIs"; those without a code of their own
 * here are faults of a kind that nobody can foresee, and are told as such with Excel's own words.
 */
import { WorkbookError, type WorkbookErrorCode } from '../../ports/workbook';

interface Meaning {
  readonly code: WorkbookErrorCode;
  readonly sentence: string;
  readonly canRetry: boolean;
}

const retry = (code: WorkbookErrorCode, sentence: string): Meaning => ({ code, sentence, canRetry: true });
const noRetry = (code: WorkbookErrorCode, sentence: string): Meaning => ({ code, sentence, canRetry: false });

const tooLarge = noRetry(
  'too-large',
  'The workbook is larger than Excel hands out to an add-in. Move the plan and its data into a workbook of their own.',
);
const vanished = retry(
  'changed-meanwhile',
  'Something that the plan needs was moved, renamed or deleted at this moment. Try again.',
);
const tooOld = noRetry(
  'host-too-old',
  'This version of Excel cannot do what Planrow asked of it. Update Excel, or use Excel on the web.',
);
const connectionLost = retry(
  'host-busy',
  'Excel broke off, as it does when its connection is lost. Try again.',
);
const inTheWay = (what: string): Meaning =>
  noRetry(
    'write-failed',
    `${what} is in the way of the results. Move it, or point the plan's results elsewhere.`,
  );

const meanings: Readonly<Record<string, Meaning>> = {
  AccessDenied: noRetry(
    'not-permitted',
    'Excel does not allow this change: the workbook is opened for reading only, or a part of it is protected.',
  ),
  ActivityLimitReached: retry(
    'host-busy',
    'Excel has too much to do at the moment. Wait a little and try again.',
  ),
  ApiNotAvailable: tooOld,
  ApiNotFound: tooOld,
  Conflict: retry('changed-meanwhile', 'Somebody else changed the workbook at the same moment. Try again.'),
  ConnectionFailure: connectionLost,
  InactiveWorkbook: retry(
    'other-workbook',
    'Another workbook has come to the front. Bring the one with the plan to the front and try again.',
  ),
  InsertDeleteConflict: inTheWay('A table or an array formula'),
  InvalidObjectPath: vanished,
  InvalidOperationInCellEditMode: retry(
    'editing-cell',
    'A cell is being edited. Press Enter or Esc in the sheet, then try again.',
  ),
  InvalidOrTimedOutSession: connectionLost,
  InvalidReference: vanished,
  InvalidSelection: retry(
    'other-workbook',
    'Something other than cells of this workbook is selected. Select a cell of it and try again.',
  ),
  ItemAlreadyExists: retry(
    'changed-meanwhile',
    'A name or sheet that the results need was made by somebody else at this moment. Try again.',
  ),
  ItemNotFound: vanished,
  MemoryLimitReached: retry('host-busy', 'Excel has run out of memory. Close other workbooks and try again.'),
  MergedRangeConflict: inTheWay('A merged cell'),
  NonBlankCellOffSheet: inTheWay('The edge of the sheet'),
  OperationCellsExceedLimit: tooLarge,
  PivotTableRangeConflict: inTheWay('A PivotTable'),
  RangeExceedsLimit: tooLarge,
  RequestAborted: connectionLost,
  RequestPayloadSizeLimitExceeded: tooLarge,
  ResponsePayloadSizeLimitExceeded: tooLarge,
  ServiceNotAvailable: retry(
    'host-busy',
    'Excel is not available at the moment. Wait a little and try again.',
  ),
  Timeout: connectionLost,
  UnsupportedOperation: tooOld,
  UnsupportedSheet: noRetry(
    'not-readable',
    'One of the sheets is of a kind that holds no cells for an add-in, such as a macro sheet. Move it to another workbook.',
  ),
  WriteNotSupportedWhenModalDialogOpen: retry(
    'dialog-open',
    'A dialog is open in Excel. Close it and try again.',
  ),
};

/** Excel's code for a message over its limit, on the way out: a smaller piece may pass. */
export function isAnswerTooLarge(error: unknown): boolean {
  return hostCodeOf(error) === 'ResponsePayloadSizeLimitExceeded';
}

/** The library's error, or one of ours, as a WorkbookError. Anything else is a bug and is handed on as it is. */
export function workbookErrorOf(error: unknown): unknown {
  const code = hostCodeOf(error);
  if (code === undefined) {
    return error;
  }
  const meaning = meanings[code];
  if (meaning !== undefined) {
    const { canRetry, sentence } = meaning;
    return new WorkbookError(meaning.code, sentence, { canRetry, cause: error });
  }
  const words = (error as Error).message.trim().replace(/\.$/, '');
  const sentence = `Excel reports an error of its own (${code}: ${words}). Try again; if it stays, save and reopen the workbook.`;
  return new WorkbookError('host-fault', sentence, { canRetry: true, cause: error });
}

/** The code of an error that came from Excel or its library; undefined for any other. */
function hostCodeOf(error: unknown): string | undefined {
  const isTheirs =
    error instanceof Error && !(error instanceof WorkbookError) && 'code' in error && 'debugInfo' in error;
  return isTheirs && typeof error.code === 'string' ? error.code : undefined;
}
