import {
  chmodSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import {
  plannedFileName,
  readWorkbookFile,
  replaceFile,
  saveNewFile,
} from '../../../../addin/adapters/xlsx-file/file-on-disk';
import { WorkbookError } from '../../../../addin/ports/workbook';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'tile-works-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true });
});

const bytes = (text: string): Uint8Array => new Uint8Array(Buffer.from(text));
const inFolder = (name: string): string => path.join(folder, name);
const noCheck = (): Promise<void> => Promise.resolve();

async function errorOf(work: Promise<unknown>): Promise<WorkbookError> {
  const error: unknown = await work.catch((reason: unknown) => reason);
  expect(error).toBeInstanceOf(WorkbookError);
  return error as WorkbookError;
}

describe('reading', () => {
  it('gives the bytes of a file', async () => {
    writeFileSync(inFolder('week.xlsx'), 'tiles');
    expect(await readWorkbookFile(inFolder('week.xlsx'))).toEqual(bytes('tiles'));
  });

  it('says so when there is no such file, when it is a folder, and when it is too large', async () => {
    const missing = await errorOf(readWorkbookFile(inFolder('week.xlsx')));
    expect(missing.code).toBe('not-found');
    expect(missing.message).toBe(`There is no file ${inFolder('week.xlsx')}; check the folder and the name.`);
    const directory = await errorOf(readWorkbookFile(folder));
    expect(directory.code).toBe('not-readable');
    expect(directory.message).toBe(`${path.basename(folder)} is a folder; name the workbook inside it.`);
    writeFileSync(inFolder('huge.xlsx'), '');
    truncateSync(inFolder('huge.xlsx'), 300 * 1024 * 1024);
    const huge = await errorOf(readWorkbookFile(inFolder('huge.xlsx')));
    expect(huge.code).toBe('too-large');
    expect(huge.message).toBe('huge.xlsx is larger than 256 MB, more than is read.');
    const through = await errorOf(readWorkbookFile(path.join(inFolder('huge.xlsx'), 'x.xlsx')));
    expect(through.code).toBe('not-readable');
  });
});

describe('the name of the planned workbook', () => {
  it('stands beside the original, numbered where there is one already, and keeps .xlsm', async () => {
    expect(await plannedFileName(inFolder('week.xlsx'))).toBe(inFolder('week-planned.xlsx'));
    writeFileSync(inFolder('week-planned.xlsx'), '');
    expect(await plannedFileName(inFolder('week.xlsx'))).toBe(inFolder('week-planned-2.xlsx'));
    writeFileSync(inFolder('week-planned-2.xlsx'), '');
    expect(await plannedFileName(inFolder('week.xlsx'))).toBe(inFolder('week-planned-3.xlsx'));
    expect(await plannedFileName(inFolder('week.v2.xlsm'))).toBe(inFolder('week.v2-planned.xlsm'));
  });
});

describe('saving a new file', () => {
  it('writes it whole and leaves nothing else behind', async () => {
    await saveNewFile(inFolder('week-planned.xlsx'), bytes('plan'));
    expect(readFileSync(inFolder('week-planned.xlsx'), 'utf8')).toBe('plan');
    expect(readdirSync(folder)).toEqual(['week-planned.xlsx']);
  });

  it('never writes over a file that is there', async () => {
    writeFileSync(inFolder('week.xlsx'), 'mine');
    const error = await errorOf(saveNewFile(inFolder('week.xlsx'), bytes('plan')));
    expect(error.code).toBe('would-overwrite');
    expect(error.message).toBe(
      `${inFolder('week.xlsx')} already exists and was left as it is; give another name.`,
    );
    expect(readFileSync(inFolder('week.xlsx'), 'utf8')).toBe('mine');
    expect(readdirSync(folder)).toEqual(['week.xlsx']);
  });

  it('says so when the folder is not there', async () => {
    const error = await errorOf(saveNewFile(inFolder('nowhere/week.xlsx'), bytes('plan')));
    expect(error.code).toBe('write-failed');
    expect(error.message).toContain('could not be written (ENOENT)');
    expect(readdirSync(folder)).toEqual([]);
  });

  it('of two that save under one name at once, one wins and the other is told', async () => {
    const results = await Promise.allSettled(
      ['a', 'b', 'c'].map((text) => saveNewFile(inFolder('week.xlsx'), bytes(text))),
    );
    expect(results.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
    expect(readdirSync(folder)).toEqual(['week.xlsx']);
  });
});

describe('replacing a file', () => {
  it('puts the new bytes in its place once they have been read again and found good', async () => {
    writeFileSync(inFolder('week.xlsx'), 'before');
    chmodSync(inFolder('week.xlsx'), 0o640);
    let seen: Uint8Array | undefined;
    await replaceFile(inFolder('week.xlsx'), bytes('after'), (written) => {
      seen = written;
      // While it is being checked, the original is still there beside it.
      const backup = readdirSync(folder).find((name) => name.endsWith('.backup'))!;
      expect(readFileSync(inFolder(backup), 'utf8')).toBe('before');
      return Promise.resolve();
    });
    expect(seen).toEqual(bytes('after'));
    expect(readFileSync(inFolder('week.xlsx'), 'utf8')).toBe('after');
    expect(statSync(inFolder('week.xlsx')).mode & 0o777).toBe(0o640);
    expect(readdirSync(folder)).toEqual(['week.xlsx']);
  });

  it('puts the original back when the check fails, and hands the reason on', async () => {
    writeFileSync(inFolder('week.xlsx'), 'before');
    const reason = new WorkbookError('not-verified', 'week.xlsx was not saved.');
    const error = await errorOf(
      replaceFile(inFolder('week.xlsx'), bytes('after'), () => Promise.reject(reason)),
    );
    expect(error).toBe(reason);
    expect(readFileSync(inFolder('week.xlsx'), 'utf8')).toBe('before');
    expect(readdirSync(folder)).toEqual(['week.xlsx']);
  });

  it('keeps the backup and says where it is when the original cannot even be put back', async () => {
    writeFileSync(inFolder('week.xlsx'), 'before');
    const error = await errorOf(
      replaceFile(inFolder('week.xlsx'), bytes('after'), () => {
        // A folder that is not empty has come to stand under the name: nothing can be renamed to it.
        rmSync(inFolder('week.xlsx'));
        mkdirSync(inFolder('week.xlsx/full'), { recursive: true });
        return Promise.reject(new Error('not good'));
      }),
    );
    const backup = readdirSync(folder).find((name) => name.endsWith('.backup'))!;
    expect(readFileSync(inFolder(backup), 'utf8')).toBe('before');
    expect(error.message).toContain(`your original stands beside it as ${backup}.`);
  });

  it('says so when there is no file to replace', async () => {
    const error = await errorOf(replaceFile(inFolder('week.xlsx'), bytes('after'), noCheck));
    expect(error.code).toBe('write-failed');
    expect(readdirSync(folder)).toEqual([]);
  });

  it('follows a link to the workbook and leaves the link as it is', async () => {
    mkdirSync(inFolder('plans'));
    writeFileSync(inFolder('plans/week.xlsx'), 'before');
    symlinkSync(inFolder('plans/week.xlsx'), inFolder('link.xlsx'));
    await replaceFile(inFolder('link.xlsx'), bytes('after'), noCheck);
    expect(readFileSync(inFolder('plans/week.xlsx'), 'utf8')).toBe('after');
    expect(readdirSync(folder).sort()).toEqual(['link.xlsx', 'plans']);
    expect(readdirSync(inFolder('plans'))).toEqual(['week.xlsx']);
  });
});
