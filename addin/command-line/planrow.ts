/**
 * Composition root of the command line: builds the adapters and hands them to the run.
 */
import path from 'node:path';
import { rm } from 'node:fs/promises';
import {
  plannedFileName,
  readWorkbookFile,
  replaceFile,
  saveNewFile,
} from '../adapters/xlsx-file/file-on-disk';
import { verifyPatched } from '../adapters/xlsx-file/verify-patched';
import { XlsxWorkbook } from '../adapters/xlsx-file/xlsx-workbook';
import { InlineSolver } from '../adapters/solver-thread/inline-solver';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import { WorkbookError } from '../ports/workbook';
import type { SaveTarget } from './arguments';
import type { CommandLineHost, WorkbookFile } from './command-line-host';
import { runCommandLine } from './run-command-line';

const millisecondsPerDay = 86_400_000;
/** 30 December 1899: day 0 of the count from 1900. */
const dayZero = Date.UTC(1899, 11, 30);

const host: CommandLineHost = {
  openWorkbook,
  solver: new InlineSolver({
    now: () => performance.now(),
    pause: () => new Promise((resolve) => setImmediate(resolve)),
  }),
  clock: () => performance.now() / 1000,
  today: () => {
    const now = new Date();
    return (now.getTime() - now.getTimezoneOffset() * 60_000 - dayZero) / millisecondsPerDay;
  },
  runAfter: (seconds, action) => {
    const timer = setTimeout(action, seconds * 1000);
    return () => clearTimeout(timer);
  },
  print: (text) => void process.stdout.write(text),
  printError: (text) => void process.stderr.write(text),
};

async function openWorkbook(filePath: string): Promise<WorkbookFile> {
  const original = await readWorkbookFile(filePath);
  const workbook = await XlsxWorkbook.open(original, path.basename(filePath));
  return {
    workbook,
    isSigned: workbook.isSigned,
    save: (applied, target) => save(filePath, original, workbook, applied, target),
  };
}

/** Nothing reaches the disk that was not proved first: only what the plan names has changed. */
async function save(
  filePath: string,
  original: Uint8Array,
  workbook: XlsxWorkbook,
  applied: WritePlan,
  target: SaveTarget,
): Promise<string> {
  const bytes = workbook.bytes();
  await verifyPatched(original, bytes, applied, workbook.fileName);
  const verifyCopy = (written: Uint8Array): Promise<void> =>
    Buffer.compare(written, bytes) === 0
      ? Promise.resolve()
      : Promise.reject(
          new WorkbookError('not-verified', `${filePath} was not written whole; check the disk.`),
        );
  switch (target.kind) {
    case 'in-place':
      await replaceFile(filePath, bytes, verifyCopy);
      return filePath;
    case 'new-file':
      await saveVerified(target.path, bytes, verifyCopy);
      return target.path;
    case 'beside':
      return saveBeside(filePath, bytes, verifyCopy);
  }
}

type Verify = (written: Uint8Array) => Promise<void>;

/** A file that comes up under the chosen name meanwhile is left alone, and the next name is taken. */
async function saveBeside(filePath: string, bytes: Uint8Array, verify: Verify): Promise<string> {
  const attempts = 5;
  for (let attempt = 1; ; attempt++) {
    const planned = await plannedFileName(filePath);
    try {
      await saveVerified(planned, bytes, verify);
      return planned;
    } catch (error) {
      const isTaken = error instanceof WorkbookError && error.code === 'would-overwrite';
      if (!isTaken || attempt === attempts) {
        throw error;
      }
    }
  }
}

async function saveVerified(filePath: string, bytes: Uint8Array, verify: Verify): Promise<void> {
  await saveNewFile(filePath, bytes);
  try {
    await verify(await readWorkbookFile(filePath));
  } catch (error) {
    await rm(filePath, { force: true });
    throw error;
  }
}

// A reader that closes the pipe early (`planrow … | head`) is no fault.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') {
    throw error;
  }
});
process.exitCode = await runCommandLine(process.argv.slice(2), host);
