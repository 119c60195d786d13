/**
 * What can be wrong with a file, as the one sentence the planner reads: which file, what is wrong, what to do.
 */
import { WorkbookError, type WorkbookErrorCode } from '../../ports/workbook';

const saveAgain = 'open it in your spreadsheet program, save it again as .xlsx, and use that copy';

/** The file breaks the rules of its format. `what` continues "… is damaged: ". */
export function damagedFile(fileName: string, what: string, cause?: unknown): WorkbookError {
  return new WorkbookError('damaged', `${fileName} is damaged: ${what}; ${saveAgain}.`, { cause });
}

/** The file is another kind of file, or a kind that is not read. `what` continues the file's name. */
export function unreadableKind(code: WorkbookErrorCode, fileName: string, what: string): WorkbookError {
  return new WorkbookError(code, `${fileName} ${what}.`);
}

/** The file holds more than is taken on. `what` continues the file's name. */
export function tooLarge(fileName: string, what: string): WorkbookError {
  return new WorkbookError(
    'too-large',
    `${fileName} ${what}; if you trust it, remove what the plan does not need and save it again.`,
  );
}

/** The file holds what no workbook needs and only a hostile one would have. */
export function refusedContent(fileName: string, what: string): WorkbookError {
  return new WorkbookError('refused-content', `${fileName} is not opened, because ${what}; ${saveAgain}.`);
}

/** Text from a file, fit for a sentence: short, on one line, no control characters. */
export function excerpt(text: string): string {
  const plain = text.replace(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]+/gu, ' ').trim();
  const characters = [...plain];
  return characters.length > 40 ? `${characters.slice(0, 40).join('')}…` : plain;
}
