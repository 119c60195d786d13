/**
 * A workbook in the bytes of an .xlsx or .xlsm file. Nothing is written to disk here (see file-on-disk).
 */
import type { WritePlan } from '../../domain/results-to-sheet/write-plan';
import type { WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import type { Workbook } from '../../ports/workbook';
import { applyWritePlan } from './apply-write-plan';
import { openPackage, readWorkbook, type OpenPackage } from './read-workbook';

export class XlsxWorkbook implements Workbook {
  private constructor(
    readonly fileName: string,
    private content: Uint8Array,
    private opened: OpenPackage,
  ) {}

  /**
   * @param fileName as the planner knows it: every sentence about the file begins with it
   * @throws WorkbookError where the bytes are no workbook that can be read
   */
  static async open(bytes: Uint8Array, fileName: string): Promise<XlsxWorkbook> {
    return new XlsxWorkbook(fileName, bytes, await openPackage(bytes, fileName));
  }

  /** The workbook as it stands now: as it was opened, with every plan applied since. */
  bytes(): Uint8Array {
    return this.content;
  }

  /** It is digitally signed: any change, ours too, ends the signature. */
  get isSigned(): boolean {
    return this.opened.parts.archive.names.some((name) => /^_xmlsignatures\//i.test(name));
  }

  read(): Promise<WorkbookSnapshot> {
    return readWorkbook(this.opened);
  }

  /** Whole or not at all: until everything is done, the workbook stays as it is. */
  async apply(plan: WritePlan): Promise<void> {
    const content = await applyWritePlan(this.opened, plan);
    this.opened = await openPackage(content, this.fileName);
    this.content = content;
  }
}
