/// <reference types="office-js" />
/**
 * One round trip before a write: what the cells, names and widths hold that are to be changed, whether Excel will let
 * us, and whether the workbook is still what the plan was made from. Nothing is touched; what comes out is the journal
 * of the write.
 */
import type { WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import { recordNamespace } from '../../domain/results-to-sheet/record-text';
import type { PlannedEdits } from '../../ports/planned-edits';
import { WorkbookError } from '../../ports/workbook';
import type { OpenBatch } from './excel-batch';
import { firstGuess, messageTarget } from './excel-chunking';
import { isAnswerTooLarge } from './excel-errors';
import { Fingerprint } from './excel-fingerprint';
import type { Journal, NameChange, WidthChange } from './excel-journal';
import { xmlOfRecord } from './excel-record';
import type { ExcelAbilities } from './excel-requirements';
import { pointsOfCharacters } from './excel-widths';
import { refusal, WriteTargets } from './write-targets';

export interface Examined {
  readonly journal: Journal;
  /** The part that holds the record; undefined where there is none. */
  readonly recordPartId: string | undefined;
}

/** How much more room cells are given after an answer that was too large, and how often. */
const moreRoom = 8;
const largestGuess = 100_000;

/** @throws WorkbookError where the plan cannot be carried out; nothing has been touched then */
export async function examine(
  batch: OpenBatch,
  edits: PlannedEdits,
  abilities: ExcelAbilities,
  basis: WorkbookSnapshot | undefined,
): Promise<Examined> {
  for (let bytesPerCell = firstGuess; ; bytesPerCell *= moreRoom) {
    try {
      const examination = new Examination(batch.context, edits, abilities, basis, bytesPerCell);
      await batch.pause();
      const fingerprint = basis === undefined ? undefined : new Fingerprint(batch.context, basis);
      let isDone: boolean;
      do {
        const room = messageTarget - examination.targets.request();
        fingerprint?.request(room);
        await batch.sync();
        await batch.pause();
        examination.refuseImpossible();
        await batch.pause();
        fingerprint?.compare();
        await batch.pause();
        isDone = examination.targets.isDone && fingerprint?.isDone !== false;
      } while (!isDone);
      return { journal: examination.journal(), recordPartId: examination.recordPartId };
    } catch (error) {
      if (!isAnswerTooLarge(error) || bytesPerCell > largestGuess) throw error;
    }
  }
}

interface TargetSheet {
  readonly name: string;
  readonly worksheet: Excel.Worksheet;
  readonly tables: Excel.TableCollection;
}

interface TargetName {
  readonly name: string;
  readonly scope: string | null;
  /** undefined on a sheet that is still to be added. */
  readonly item: Excel.NamedItem | undefined;
}

class Examination {
  private readonly application: Excel.Application;
  private readonly protection: Excel.WorkbookProtection;
  private readonly sheets: readonly TargetSheet[];
  private readonly addedSheets: readonly Excel.Worksheet[];
  readonly targets: WriteTargets;
  private readonly widths: readonly {
    readonly sheet: string;
    readonly column: number;
    readonly format: Excel.RangeFormat;
  }[];
  private readonly names: readonly TargetName[];
  private readonly recordXml: OfficeExtension.ClientResult<string> | undefined;
  private readonly recordPart: Excel.CustomXmlPart | undefined;

  /** Everything is asked for here, and read after the round trip. */
  constructor(
    context: Excel.RequestContext,
    private readonly edits: PlannedEdits,
    abilities: ExcelAbilities,
    basis: WorkbookSnapshot | undefined,
    bytesPerCell: number,
  ) {
    const { workbook } = context;
    this.application = workbook.application.load('calculationMode');
    this.protection = workbook.protection.load('protected');
    const isAdded = (name: string): boolean => edits.addedSheets.includes(name);
    const present = [...edits.sheets].filter(([name]) => !isAdded(name));
    this.sheets = present.map(([name]) => {
      const worksheet = workbook.worksheets.getItemOrNullObject(name).load('name');
      worksheet.protection.load('protected');
      worksheet.autoFilter.load('isDataFiltered');
      return {
        name,
        worksheet,
        tables: worksheet.tables.load('items/name,items/autoFilter/isDataFiltered'),
      };
    });
    this.addedSheets = edits.addedSheets.map((name) =>
      workbook.worksheets.getItemOrNullObject(name).load('name'),
    );
    this.targets = new WriteTargets(context, edits, abilities, basis, bytesPerCell);
    this.widths = present.flatMap(([sheet, { widths }]) =>
      [...widths.keys()].map((column) => {
        const inColumn = workbook.worksheets.getItemOrNullObject(sheet).getRangeByIndexes(0, column, 1, 1);
        return { sheet, column, format: inColumn.format.load('columnWidth') };
      }),
    );
    const seen = new Set<string>();
    this.names = edits.names.flatMap(({ name, scope }): TargetName[] => {
      const key = `${name.toLowerCase()}\n${(scope ?? '').toLowerCase()}`;
      if (seen.has(key)) return [];
      seen.add(key);
      if (scope !== null && edits.addedSheets.some((added) => added.toLowerCase() === scope.toLowerCase())) {
        return [{ name, scope, item: undefined }];
      }
      const collection =
        scope === null ? workbook.names : workbook.worksheets.getItemOrNullObject(scope).names;
      return [{ name, scope, item: collection.getItemOrNullObject(name).load('name,formula,visible') }];
    });
    if (edits.record !== undefined) {
      this.recordPart = workbook.customXmlParts
        .getByNamespace(recordNamespace)
        .getOnlyItemOrNullObject()
        .load('id');
      this.recordXml = this.recordPart.getXml();
    }
  }

  /** @throws WorkbookError for what Excel would not do, or what must not be done */
  refuseImpossible(): void {
    for (const { name, worksheet } of this.sheets) {
      if (worksheet.isNullObject) throw refusal('write-failed', `it has no sheet named ${name}`);
    }
    for (const added of this.addedSheets) {
      if (!added.isNullObject) {
        throw refusal('would-overwrite', `it already has a sheet named ${added.name}`);
      }
    }
    const isLocked = this.sheets.filter(({ worksheet }) => worksheet.protection.protected);
    if (isLocked.length > 0) {
      const sheets = isLocked.map(({ name }) => name);
      throw new WorkbookError(
        'protected-sheet',
        `The sheet ${sheets.join(', ')} is protected, so nothing was written. Lift the protection and write again.`,
        { sheets, canRetry: true },
      );
    }
    if (this.addedSheets.length > 0 && this.protection.protected) {
      throw new WorkbookError(
        'protected-structure',
        `The workbook's structure is protected, so the sheet ${this.edits.addedSheets[0]} cannot be added and nothing was written. Lift the protection and write again.`,
        { sheets: this.edits.addedSheets, canRetry: true },
      );
    }
    this.refuseFiltered();
    this.targets.refuseChanged();
    this.targets.refuseOverwriting();
    this.targets.refuseWithoutFormula();
  }

  journal(): Journal {
    return {
      cells: this.targets.changes(),
      widths: this.widthChanges(),
      names: this.nameChanges(),
      record: this.edits.record === undefined ? undefined : this.recordChange(this.edits.record),
      addedSheets: this.edits.addedSheets,
      calculatesByHand: this.application.calculationMode === 'Manual',
    };
  }

  get recordPartId(): string | undefined {
    return this.recordPart?.isNullObject === false ? this.recordPart.id : undefined;
  }

  private widthChanges(): WidthChange[] {
    const changes = this.widths.map(({ sheet, column, format }): WidthChange => ({
      sheet,
      column,
      before: format.columnWidth,
      after: pointsOfCharacters(this.edits.sheets.get(sheet)!.widths.get(column)!),
    }));
    for (const sheet of this.edits.addedSheets) {
      for (const [column, width] of this.edits.sheets.get(sheet)!.widths) {
        changes.push({ sheet, column, before: pointsOfCharacters(8.43), after: pointsOfCharacters(width) });
      }
    }
    return changes;
  }

  private nameChanges(): NameChange[] {
    return this.names.flatMap(({ name, scope, item }): NameChange[] => {
      const isThis = (write: { name: string; scope: string | null }): boolean =>
        write.name.toLowerCase() === name.toLowerCase() &&
        (write.scope ?? '').toLowerCase() === (scope ?? '').toLowerCase();
      const last = this.edits.names.filter(isThis).pop()!;
      const isThere = item !== undefined && !item.isNullObject;
      const after = last.kind === 'name' ? last.formula : null;
      if (!isThere && after === null) return [];
      const formula: unknown = isThere ? item.formula : undefined;
      return [
        {
          name: isThere ? item.name : name,
          scope,
          before: isThere ? String(formula).replace(/^=/, '') : null,
          after,
          wasVisible: isThere ? item.visible : true,
        },
      ];
    });
  }

  /** Values written under a filter land in other rows than they are meant for. */
  private refuseFiltered(): void {
    const filtered = this.sheets
      .filter(
        ({ worksheet, tables }) =>
          worksheet.autoFilter.isDataFiltered ||
          tables.items.some((table) => table.autoFilter.isDataFiltered),
      )
      .map(({ name }) => name);
    const hidden = this.targets.hiddenOn(filtered);
    if (hidden.length > 0) {
      const sheets = filtered.filter((name) => hidden.some(({ sheet }) => sheet === name));
      throw new WorkbookError(
        'filtered',
        `A filter on the sheet ${sheets.join(', ')} hides rows in which results stand, so nothing was written. Clear the filter and write again.`,
        { sheets, ranges: hidden, canRetry: true },
      );
    }
  }

  private recordChange(json: string): { before: string | null; after: string } {
    const isThere = this.recordPart?.isNullObject === false;
    return { before: isThere ? this.recordXml!.value : null, after: xmlOfRecord(json) };
  }
}
