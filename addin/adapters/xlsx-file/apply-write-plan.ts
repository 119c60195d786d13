/**
 * A write plan carried out on a package: which parts change, which are added, and nothing else. The result is built
 * beside the original, so that a plan which cannot be carried out leaves nothing behind.
 */
import { cellKey, type CellAddress } from '../../domain/sheet/cell-address';
import type { WritePlan } from '../../domain/results-to-sheet/write-plan';
import { WorkbookError } from '../../ports/workbook';
import {
  newRelationships,
  patchContentTypes,
  patchRelationships,
  type NewContentType,
  type NewRelationship,
} from './package-listing';
import { absoluteTarget, contentTypesPart, relationshipsPartOf } from './package-parts';
import {
  nothingWritten,
  planEdits,
  type CellEdit,
  type PlannedEdits,
  type SheetEdits,
} from '../../ports/planned-edits';
import type { OpenPackage } from './read-workbook';
import { findRecord, newRecordParts, recordPropertiesType, recordText } from './record-part';
import { readSurroundings } from './sheet-marks';
import { emptyStyles, StylesPatch } from './styles-patch';
import { patchWorkbook, type AddedSheet } from './workbook-patch';
import { outlineWorksheet, type WorksheetOutline } from './worksheet-outline';
import { patchWorksheet } from './worksheet-patch';
import { encodeXml, type XmlText } from './xml-encoding';
import type { XmlSource } from './xml-events';

const worksheetType = 'application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml';
const stylesType = 'application/vnd.openxmlformats-officedocument.spreadsheetml.styles+xml';

/** The package's bytes with the plan carried out. @throws WorkbookError with nothing changed */
export async function applyWritePlan(opened: OpenPackage, plan: WritePlan): Promise<Uint8Array> {
  const { parts, workbook } = opened;
  const sheetNames = workbook.sheets.map(({ name }) => name);
  const edits = planEdits(plan, sheetNames, parts.fileName);
  return new PackagePatch(opened, edits).apply();
}

type PartText = XmlText & XmlSource;

/** A sheet at work: its text where it stands, and the plan's edits. */
interface SheetAtWork {
  readonly name: string;
  readonly part: string;
  readonly text: PartText;
  readonly isNew: boolean;
  readonly outline: WorksheetOutline;
  readonly edits: SheetEdits;
}

class PackagePatch {
  private readonly replaced = new Map<string, Uint8Array>();
  private readonly added = new Map<string, Uint8Array>();
  private readonly removed = new Set<string>();
  private readonly contentTypes: NewContentType[] = [];
  private readonly workbookRelationships: NewRelationship[] = [];
  private readonly removedRelationships = new Set<string>();
  /** Relationship ids of the workbook and names of parts that are taken, in lower case. */
  private readonly takenIds = new Set<string>();
  private readonly takenParts: Set<string>;
  /** What the types of relationships begin with: it differs between the two forms of the standard. */
  private relationshipBase = '';

  constructor(
    private readonly opened: OpenPackage,
    private readonly edits: PlannedEdits,
  ) {
    this.takenParts = new Set(opened.parts.archive.names.map((name) => name.toLowerCase()));
  }

  async apply(): Promise<Uint8Array> {
    const { parts, workbook } = this.opened;
    const [main] = (await parts.relationshipsOf('')).filter(({ kind }) => kind === 'officeDocument');
    this.relationshipBase = main.type.slice(0, main.type.lastIndexOf('/'));
    for (const { id } of await parts.relationshipsOf(workbook.part)) this.takenIds.add(id.toLowerCase());

    const workbookText = await parts.readText(workbook.part);
    const addedSheets = this.placeAddedSheets();
    await this.patchSheets(addedSheets);
    this.replaceIfChanged(
      workbookText,
      patchWorkbook(workbookText, {
        sheetNames: workbook.sheets.map(({ name }) => name),
        addedSheets,
        names: this.edits.names,
        recalculatesOnOpening: this.edits.recalculatesOnOpening,
      }),
    );
    await this.writeRecord();
    await this.dropCalculationOrder();
    await this.listParts();
    return parts.archive.rewrite({ replaced: this.replaced, added: this.added, removed: this.removed });
  }

  private placeAddedSheets(): (AddedSheet & { readonly part: string })[] {
    const folder = folderOf(this.opened.workbook.part);
    return this.edits.addedSheets.map((name) => {
      const part = this.freePart((number) => `${folder}worksheets/sheet${number}.xml`);
      this.contentTypes.push({ part, type: worksheetType });
      return { name, part, relationshipId: this.relateWorkbook('worksheet', part) };
    });
  }

  private async patchSheets(addedSheets: readonly (AddedSheet & { readonly part: string })[]): Promise<void> {
    const { parts, workbook } = this.opened;
    const wanted = wantedCells(this.edits);
    const atWork = new Map<string, SheetAtWork>();
    for (const [name, cells] of wanted) {
      const addition = addedSheets.find((sheet) => sheet.name === name);
      const text =
        addition === undefined
          ? await this.sheetText(name)
          : newSheetText(addition.part, workbook.namespace, parts.fileName);
      atWork.set(name, {
        name,
        part: text.part,
        text,
        isNew: addition !== undefined,
        outline: outlineWorksheet(text, name, cells),
        edits: this.edits.sheets.get(name) ?? { cells: new Map(), widths: new Map() },
      });
    }
    const styles = await this.openStyles();
    const formatFor = (edit: CellEdit, base: number): number =>
      styles === undefined || (edit.numberFormatOf === undefined && !edit.wrapsText)
        ? base
        : styles.patch.formatLike(base, {
            numbersLike: edit.numberFormatOf && styleAt(atWork, edit.numberFormatOf),
            wrapsText: edit.wrapsText,
          });
    for (const { name, part, text, isNew, outline, edits } of atWork.values()) {
      const around = isNew ? { tables: [], pivotRanges: [] } : await readSurroundings(parts, part, name);
      const patched = patchWorksheet(outline, edits, {
        fileName: parts.fileName,
        tables: around.tables,
        pivotRanges: around.pivotRanges,
        formatFor,
      });
      if (isNew) this.added.set(part, encodeXml(patched, text));
      else this.replaceIfChanged(text, patched);
    }
    if (styles?.patch.isChanged === true) this.writeStyles(styles);
  }

  private async sheetText(name: string): Promise<PartText> {
    const { parts, workbook } = this.opened;
    const entry = workbook.sheets.find((sheet) => sheet.name === name)!;
    if (!entry.isWorksheet) {
      throw new WorkbookError(
        'write-failed',
        nothingWritten(parts.fileName, `${name} is a chart and has no cells`),
      );
    }
    return parts.readText(entry.part);
  }

  /** Undefined where the plan changes no format. */
  private async openStyles(): Promise<{ patch: StylesPatch; source: PartText; isNew: boolean } | undefined> {
    const changesFormats = [...this.edits.sheets.values()].some(({ cells }) =>
      [...cells.values()].some((edit) => edit.numberFormatOf !== undefined || edit.wrapsText),
    );
    if (!changesFormats) return undefined;
    const { parts, workbook } = this.opened;
    const existing = (await parts.relationshipsOf(workbook.part)).find(
      ({ kind }) => kind === 'styles',
    )?.target;
    const source =
      existing === undefined
        ? newPartText(
            this.freePart((number) => `${folderOf(workbook.part)}styles${number === 1 ? '' : number}.xml`),
            emptyStyles(workbook.namespace),
            parts.fileName,
          )
        : await parts.readText(existing);
    return { patch: new StylesPatch(source), source, isNew: existing === undefined };
  }

  private writeStyles(styles: { patch: StylesPatch; source: PartText; isNew: boolean }): void {
    if (!styles.isNew) {
      this.replaceIfChanged(styles.source, styles.patch.text());
      return;
    }
    this.added.set(styles.source.part, encodeXml(styles.patch.text(), styles.source));
    this.contentTypes.push({ part: styles.source.part, type: stylesType });
    this.relateWorkbook('styles', styles.source.part);
  }

  private async writeRecord(): Promise<void> {
    const json = this.edits.record;
    if (json === undefined) return;
    const { parts, workbook } = this.opened;
    const existing = await findRecord(parts, workbook.part);
    if (existing !== undefined) {
      const source = await parts.readText(existing.part);
      this.replaceIfChanged(source, recordText(source, json));
      return;
    }
    const itemPart = this.freePart((number) => `customXml/item${number}.xml`);
    const propertiesPart = this.freePart((number) => `customXml/itemProps${number}.xml`);
    const { item, properties } = newRecordParts(json);
    const encoder = new TextEncoder();
    this.added.set(itemPart, encoder.encode(item));
    this.added.set(propertiesPart, encoder.encode(properties));
    this.added.set(
      relationshipsPartOf(itemPart),
      encoder.encode(
        newRelationships([
          {
            id: 'rId1',
            type: `${this.relationshipBase}/customXmlProps`,
            target: absoluteTarget(propertiesPart),
          },
        ]),
      ),
    );
    this.contentTypes.push({ part: propertiesPart, type: recordPropertiesType });
    if (parts.contentTypeOf(itemPart) === '')
      this.contentTypes.push({ part: itemPart, type: 'application/xml' });
    this.relateWorkbook('customXml', itemPart);
  }

  /**
   * The list of formulas in their order of calculation must name every formula that is there and no other, or the
   * spreadsheet program calls the file damaged. It may be absent and is then made anew on opening; so where a
   * formula is added, it is dropped whole, which cannot go wrong.
   */
  private async dropCalculationOrder(): Promise<void> {
    const addsFormula = [...this.edits.sheets.values()].some(({ cells }) =>
      [...cells.values()].some(({ content }) => content.kind === 'formula'),
    );
    if (!addsFormula) return;
    const { parts, workbook } = this.opened;
    for (const { id, kind, target } of await parts.relationshipsOf(workbook.part)) {
      if (kind !== 'calcChain') continue;
      this.removedRelationships.add(id);
      if (target !== undefined && parts.has(target)) this.removed.add(target);
    }
  }

  private async listParts(): Promise<void> {
    const { parts, workbook } = this.opened;
    if (this.workbookRelationships.length > 0 || this.removedRelationships.size > 0) {
      const source = await parts.readText(relationshipsPartOf(workbook.part));
      this.replaceIfChanged(
        source,
        patchRelationships(source, this.workbookRelationships, this.removedRelationships),
      );
    }
    if (this.contentTypes.length > 0 || this.removed.size > 0) {
      const source = await parts.readText(contentTypesPart);
      this.replaceIfChanged(source, patchContentTypes(source, this.contentTypes, this.removed));
    }
  }

  private replaceIfChanged(source: PartText, text: string): void {
    if (text !== source.text) this.replaced.set(source.part, encodeXml(text, source));
  }

  /** Adds a relationship from the workbook and returns its id. */
  private relateWorkbook(kind: string, part: string): string {
    let number = this.takenIds.size + 1;
    while (this.takenIds.has(`rid${number}`)) number++;
    const id = `rId${number}`;
    this.takenIds.add(id.toLowerCase());
    this.workbookRelationships.push({
      id,
      type: `${this.relationshipBase}/${kind}`,
      target: absoluteTarget(part),
    });
    return id;
  }

  /** The first name of this form that no part has. */
  private freePart(nameOf: (number: number) => string): string {
    let number = 1;
    while (this.takenParts.has(nameOf(number).toLowerCase())) number++;
    this.takenParts.add(nameOf(number).toLowerCase());
    return nameOf(number);
  }
}

/** Columns by row by sheet: what the plan writes, and the cells whose formats it takes. */
function wantedCells(edits: PlannedEdits): Map<string, Map<number, Set<number>>> {
  const wanted = new Map<string, Map<number, Set<number>>>();
  const ofSheet = (name: string): Map<number, Set<number>> => {
    let rows = wanted.get(name);
    if (rows === undefined) {
      rows = new Map<number, Set<number>>();
      wanted.set(name, rows);
    }
    return rows;
  };
  const want = (sheet: string, row: number, column: number): void => {
    const rows = ofSheet(sheet);
    const columns = rows.get(row);
    if (columns === undefined) rows.set(row, new Set([column]));
    else columns.add(column);
  };
  for (const [name, { cells }] of edits.sheets) {
    ofSheet(name);
    for (const { cell, numberFormatOf: source } of cells.values()) {
      want(name, cell.row, cell.column);
      if (source !== undefined) want(source.sheet, source.row, source.column);
    }
  }
  return wanted;
}

/** The number of the format that a cell shows itself in: its own, or its row's or column's. */
function styleAt(sheets: ReadonlyMap<string, SheetAtWork>, cell: CellAddress): number {
  const outline = sheets.get(cell.sheet)!.outline;
  return (
    outline.cells.get(cellKey(cell.row, cell.column))?.style ??
    outline.rows.get(cell.row)?.style ??
    outline.columns.find(({ first, last }) => cell.column >= first && cell.column <= last)?.style ??
    0
  );
}

function newSheetText(part: string, namespace: string, fileName: string): PartText {
  const xml =
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n' +
    `<worksheet xmlns="${namespace}"><sheetData/></worksheet>`;
  return newPartText(part, xml, fileName);
}

function newPartText(part: string, text: string, fileName: string): PartText {
  return { part, text, fileName, encoding: 'utf-8', hasByteOrderMark: false };
}

function folderOf(part: string): string {
  return part.slice(0, part.lastIndexOf('/') + 1);
}
