/**
 * Workbook files on disk: read, saved as a new file, replaced under a backup. The only file here that needs Node.
 */
import { randomBytes } from 'node:crypto';
import { constants } from 'node:fs';
import { access, chmod, copyFile, link, open, readFile, realpath, rename, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { WorkbookError } from '../../ports/workbook';
import { unreadableKind } from './file-faults';
import { xlsxLimits } from './xlsx-limits';

/** @throws WorkbookError not-found, not-readable or too-large, with a sentence */
export async function readWorkbookFile(filePath: string): Promise<Uint8Array> {
  const name = path.basename(filePath);
  try {
    const facts = await stat(filePath);
    if (facts.isDirectory()) {
      throw unreadableKind('not-readable', name, 'is a folder; name the workbook inside it');
    }
    if (facts.size > xlsxLimits.fileBytes) {
      const megabytes = Math.round(xlsxLimits.fileBytes / 1024 / 1024);
      throw unreadableKind('too-large', name, `is larger than ${megabytes} MB, more than is read`);
    }
    return new Uint8Array(await readFile(filePath));
  } catch (error) {
    if (error instanceof WorkbookError) throw error;
    if (codeOf(error) === 'ENOENT') {
      throw new WorkbookError('not-found', `There is no file ${filePath}; check the folder and the name.`, {
        cause: error,
      });
    }
    throw new WorkbookError(
      'not-readable',
      `${filePath} cannot be read (${codeOf(error)}); check that you may open it and that no program holds it.`,
      { cause: error },
    );
  }
}

/**
 * A name for the planned workbook beside the original that no file has yet: `week-planned.xlsx`,
 * `week-planned-2.xlsx`, …
 */
export async function plannedFileName(filePath: string): Promise<string> {
  const { dir, name, ext } = path.parse(filePath);
  const candidate = (number: number): string =>
    path.join(dir, `${name}-planned${number === 1 ? '' : `-${number}`}${ext === '' ? '.xlsx' : ext}`);
  let number = 1;
  while (await exists(candidate(number))) number++;
  return candidate(number);
}

/**
 * Saves a file that does not exist yet. It appears under its name only when it is whole.
 * @throws WorkbookError would-overwrite where a file of that name exists, write-failed otherwise; nothing stays behind
 */
export async function saveNewFile(filePath: string, bytes: Uint8Array): Promise<void> {
  const temporary = temporaryName(filePath);
  try {
    await writeWhole(temporary, bytes);
    // A link, unlike a rename, never takes the place of a file that has come up meanwhile.
    await link(temporary, filePath).catch(async (error: unknown) => {
      if (codeOf(error) === 'EEXIST') throw error;
      // Some file systems know no links: the file is then written under its own name, still never over another.
      await writeWhole(filePath, bytes);
    });
  } catch (error) {
    if (codeOf(error) === 'EEXIST') {
      throw new WorkbookError(
        'would-overwrite',
        `${filePath} already exists and was left as it is; give another name.`,
        { cause: error },
      );
    }
    throw writeFailed(filePath, error);
  } finally {
    await rm(temporary, { force: true });
  }
}

/**
 * Puts new bytes in place of a file. The original is kept beside it until the new file has been read again from disk
 * and found good; otherwise it is put back.
 * @param verify is given the bytes as they were read from disk; what it throws is thrown on
 * @throws WorkbookError write-failed, with the original in its place
 */
export async function replaceFile(
  filePath: string,
  bytes: Uint8Array,
  verify: (written: Uint8Array) => Promise<void>,
): Promise<void> {
  // Where the name is a link to the workbook, the workbook itself is replaced and the link stays.
  const target = await realpath(filePath).catch((error: unknown) => {
    throw writeFailed(filePath, error);
  });
  const temporary = temporaryName(target);
  const backup = `${temporary}.backup`;
  let isReplaced = false;
  try {
    const { mode } = await stat(target);
    await writeWhole(temporary, bytes);
    await chmod(temporary, mode);
    await copyFile(target, backup, constants.COPYFILE_EXCL);
    await rename(temporary, target);
    isReplaced = true;
    await verify(new Uint8Array(await readFile(target)));
  } catch (error) {
    if (isReplaced) await putBack(backup, target, filePath);
    else await rm(backup, { force: true });
    throw error instanceof WorkbookError ? error : writeFailed(filePath, error);
  } finally {
    await rm(temporary, { force: true });
  }
  await rm(backup, { force: true });
}

/** Where even this fails, the backup stays, and the planner is told where it is. */
async function putBack(backup: string, target: string, filePath: string): Promise<void> {
  await rename(backup, target).catch((cause: unknown) => {
    throw new WorkbookError(
      'write-failed',
      `${filePath} could not be put back as it was (${codeOf(cause)}); your original stands beside it as ${path.basename(backup)}.`,
      { cause },
    );
  });
}

/** A new file, written and handed to the disk. What breaks off half-way is removed; a file of others never is. */
async function writeWhole(filePath: string, bytes: Uint8Array): Promise<void> {
  const file = await open(filePath, 'wx');
  try {
    await file.writeFile(bytes);
    await file.sync();
  } catch (error) {
    await rm(filePath, { force: true });
    throw error;
  } finally {
    await file.close();
  }
}

/** In the same folder, so that it can be renamed; hidden, and of a name that nobody else has. */
function temporaryName(filePath: string): string {
  const { dir, base } = path.parse(filePath);
  return path.join(dir, `.${base}.${randomBytes(6).toString('hex')}.tmp`);
}

async function exists(filePath: string): Promise<boolean> {
  return access(filePath).then(
    () => true,
    () => false,
  );
}

/** The system's code for what went wrong, such as ENOSPC. */
function codeOf(error: unknown): string {
  return typeof error === 'object' && error !== null && 'code' in error ? String(error.code) : 'unknown';
}

function writeFailed(filePath: string, cause: unknown): WorkbookError {
  return new WorkbookError(
    'write-failed',
    `${filePath} could not be written (${codeOf(cause)}); check the folder, the space on the disk, and that no program holds the file.`,
    { cause },
  );
}
