/**
 * What the command line needs of the machine it runs on. planrow.ts builds the real one; the commands name no adapter.
 */
import type { Solver } from '../ports/solver';
import type { Workbook } from '../ports/workbook';
import type { WritePlan } from '../domain/results-to-sheet/write-plan';
import type { SaveTarget } from './arguments';

/** A workbook's file, read into memory. */
export interface WorkbookFile {
  readonly workbook: Workbook;
  /** Digitally signed: any change ends the signature. */
  readonly isSigned: boolean;
  /**
   * Saves the workbook with the plan that was applied to it, after proving that nothing else changed.
   * @returns the path of the file written; a failed save leaves nothing behind
   * @throws WorkbookError
   */
  save(applied: WritePlan, target: SaveTarget): Promise<string>;
}

export interface CommandLineHost {
  /** @throws WorkbookError */
  openWorkbook(path: string): Promise<WorkbookFile>;
  readonly solver: Solver;
  /** Seconds since any fixed moment. */
  clock(): number;
  /** Date and time of the clock on the wall, as a serial date counted from 1900. */
  today(): number;
  /** Runs the action once after some seconds. @returns what calls it off */
  runAfter(seconds: number, action: () => void): () => void;
  /** Standard output and standard error. */
  print(text: string): void;
  printError(text: string): void;
}
