/**
 * A package's bytes as a workbook snapshot: the parts put together.
 */
import type { DefinedName } from '../../domain/sheet/defined-name';
import type { TableSnapshot, WorkbookSnapshot } from '../../domain/sheet/sheet-snapshot';
import { contentTypesPart, PackageParts } from './package-parts';
import { findRecord } from './record-part';
import { readSharedStrings } from './shared-strings-xml';
import { emptySheetContent, ReadSheet } from './sheet-cells';
import { readSurroundings } from './sheet-marks';
import { readCellFormats, type CellFormat } from './styles-xml';
import { findWorkbookPart, otherDocument, readWorkbookPart, type WorkbookPart } from './workbook-xml';
import { readWorksheet } from './worksheet-xml';
import { ZipArchive } from './zip-archive';

/** A snapshot whose sheets are the ones read here. */
export interface ReadWorkbook extends WorkbookSnapshot {
  readonly sheets: readonly ReadSheet[];
  readonly names: readonly DefinedName[];
}

/** The package and its workbook part: what reading and patching both start from. */
export interface OpenPackage {
  readonly parts: PackageParts;
  readonly workbook: WorkbookPart;
}

/** @throws WorkbookError with one sentence for each kind of fault */
export async function openPackage(bytes: Uint8Array, fileName: string): Promise<OpenPackage> {
  const archive = await ZipArchive.open(bytes, fileName);
  // OpenDocument files and plain archives are zips too. Where there is anything of a workbook, it is a damaged one.
  const hasWorkbookParts = archive.names.some((name) => /^(_rels|xl)\//i.test(name));
  if (!archive.has(contentTypesPart) && !hasWorkbookParts) throw otherDocument(fileName);
  const parts = await PackageParts.open(archive);
  return { parts, workbook: await readWorkbookPart(parts, await findWorkbookPart(parts)) };
}

/** @throws WorkbookError with one sentence for each kind of fault */
export async function readWorkbook({ parts, workbook }: OpenPackage): Promise<ReadWorkbook> {
  const relationships = await parts.relationshipsOf(workbook.part);
  const partOf = (kind: string): string | undefined =>
    relationships.find((relationship) => relationship.kind === kind)?.target;

  const stringsPart = partOf('sharedStrings');
  const sharedStrings = stringsPart === undefined ? [] : readSharedStrings(await parts.readText(stringsPart));
  const stylesPart = partOf('styles');
  const formats: readonly CellFormat[] =
    stylesPart === undefined ? [] : readCellFormats(await parts.readTree(stylesPart));

  const sheets: ReadSheet[] = [];
  const tables: TableSnapshot[] = [];
  for (const { name, visibility, part, isWorksheet } of workbook.sheets) {
    const content = isWorksheet
      ? readWorksheet(await parts.readText(part), {
          sheetName: name,
          sharedStrings,
          formats,
          usesDates1904: workbook.usesDates1904,
        })
      : emptySheetContent;
    const surroundings = await readSurroundings(parts, part, name);
    sheets.push(new ReadSheet(name, visibility, content, surroundings));
    tables.push(...surroundings.tables);
  }
  const record = await findRecord(parts, workbook.part);
  return {
    sheets,
    names: workbook.names,
    tables,
    usesDates1904: workbook.usesDates1904,
    record: record?.json ?? null,
  };
}
