import { isAnswerTooLarge, workbookErrorOf } from '../../../../addin/adapters/excel-host/excel-errors';
import { WorkbookError } from '../../../../addin/ports/workbook';
import { hostErrorCodes } from '../../../office-host/host-error';

/** As the library throws them. */
function libraryError(code: string, message = 'Something happened.'): Error {
  return Object.assign(new Error(message), { code, debugInfo: { errorLocation: 'Range.values' } });
}

it.each(hostErrorCodes)('%s becomes a sentence that says what to do', (code) => {
  const error = workbookErrorOf(libraryError(code)) as WorkbookError;
  expect(error).toBeInstanceOf(WorkbookError);
  expect(error.message).toMatch(/^[A-Z][^.]*[.:].*\.$/s);
  expect((error.cause as { code: string }).code).toBe(code);
});

it('a code that nobody foresaw is told in the words of Excel, and may be tried again', () => {
  const error = workbookErrorOf(libraryError('SomethingNew', 'The moon is full.')) as WorkbookError;
  expect(error).toMatchObject({ code: 'host-fault', canRetry: true });
  expect(error.message).toContain('SomethingNew: The moon is full)');
});

it('our own errors and bugs pass through as they are', () => {
  const own = new WorkbookError('filtered', 'A filter hides rows.', { cause: libraryError('Conflict') });
  const bug = new TypeError('x is undefined');
  expect(workbookErrorOf(own)).toBe(own);
  expect(workbookErrorOf(bug)).toBe(bug);
  expect(workbookErrorOf('text')).toBe('text');
});

it('only an answer that is too large may be asked for in smaller pieces', () => {
  expect(isAnswerTooLarge(libraryError('ResponsePayloadSizeLimitExceeded'))).toBe(true);
  expect(isAnswerTooLarge(libraryError('RequestPayloadSizeLimitExceeded'))).toBe(false);
  expect(isAnswerTooLarge(new Error('ResponsePayloadSizeLimitExceeded'))).toBe(false);
});
