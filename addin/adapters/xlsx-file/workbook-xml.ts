/**
 * The workbook part: its sheets in the order of their tabs, defined names, the date system (ECMA-376 Part 1, §18.2).
 */
import type { DefinedName } from '../../domain/sheet/defined-name';
import type { SheetVisibility } from '../../domain/sheet/sheet-snapshot';
import { damagedFile, excerpt, unreadableKind } from './file-faults';
import type { PackageParts } from './package-parts';
import { attributeOf, isOn, mainNamespaces, relationshipAttributeOf } from './xml-events';
import { childOf, childrenOf, type XmlNode } from './xml-tree';

export interface SheetEntry {
  readonly name: string;
  readonly visibility: SheetVisibility;
  /** The sheet's part. */
  readonly part: string;
  /** False for chart sheets and their like, which have no cells. */
  readonly isWorksheet: boolean;
}

export interface WorkbookPart {
  readonly part: string;
  /** The form of the standard that it is written in: the namespace of its elements. */
  readonly namespace: string;
  readonly sheets: readonly SheetEntry[];
  readonly names: readonly DefinedName[];
  readonly usesDates1904: boolean;
}

const macroSheets = 'application/vnd.ms-excel.sheet.binary';

/** The part that holds the workbook. @throws WorkbookError where the package holds none */
export async function findWorkbookPart(parts: PackageParts): Promise<string> {
  const main = (await parts.relationshipsOf('')).find(
    (relationship) => relationship.kind === 'officeDocument',
  );
  if (main?.target === undefined) throw damagedFile(parts.fileName, 'it names no workbook part');
  if (!parts.has(main.target)) {
    throw damagedFile(parts.fileName, `its part ${excerpt(main.target)} is missing`);
  }
  const type = parts.contentTypeOf(main.target);
  if (type.startsWith(macroSheets) || main.target.toLowerCase().endsWith('.bin')) {
    throw unreadableKind(
      'binary-format',
      parts.fileName,
      'is in the binary .xlsb format; open it in your spreadsheet program and save it as .xlsx',
    );
  }
  if (/wordprocessingml|presentationml|ms-word|ms-powerpoint|visio/.test(type))
    throw otherDocument(parts.fileName);
  return main.target;
}

/** @throws WorkbookError where the workbook part is broken or names a sheet that is not there */
export async function readWorkbookPart(parts: PackageParts, part: string): Promise<WorkbookPart> {
  const root = await parts.readTree(part);
  if (root.local !== 'workbook' || !mainNamespaces.has(root.tag.uri)) {
    throw damagedFile(parts.fileName, `its part ${excerpt(part)} is no workbook`);
  }
  const sheets = await readSheetEntries(parts, part, root);
  const properties = childOf(root, 'workbookPr', mainNamespaces);
  return {
    part,
    namespace: root.tag.uri,
    sheets,
    names: readNames(parts.fileName, root, sheets),
    usesDates1904: properties !== undefined && isOn(attributeOf(properties.tag, 'date1904')),
  };
}

async function readSheetEntries(parts: PackageParts, part: string, root: XmlNode): Promise<SheetEntry[]> {
  const relationships = new Map((await parts.relationshipsOf(part)).map((entry) => [entry.id, entry]));
  const nodes = childrenOf(childOf(root, 'sheets', mainNamespaces), 'sheet', mainNamespaces);
  if (nodes.length === 0) throw damagedFile(parts.fileName, 'it has no sheets');
  const seen = new Set<string>();
  return nodes.map((node) => {
    const name = attributeOf(node.tag, 'name') ?? '';
    if (name === '' || seen.has(name.toLowerCase())) {
      throw damagedFile(parts.fileName, `a sheet's name is missing or stands twice (${excerpt(name)})`);
    }
    seen.add(name.toLowerCase());
    const relationship = relationships.get(relationshipAttributeOf(node.tag, 'id') ?? '');
    if (relationship?.target === undefined || !parts.has(relationship.target)) {
      throw damagedFile(parts.fileName, `the part with the sheet ${excerpt(name)} is missing`);
    }
    const state = attributeOf(node.tag, 'state');
    return {
      name,
      visibility: state === 'hidden' || state === 'veryHidden' ? state : 'visible',
      part: relationship.target,
      isWorksheet: relationship.kind === 'worksheet',
    };
  });
}

function readNames(fileName: string, root: XmlNode, sheets: readonly SheetEntry[]): DefinedName[] {
  const nodes = childrenOf(childOf(root, 'definedNames', mainNamespaces), 'definedName', mainNamespaces);
  return nodes.map((node) => {
    const name = attributeOf(node.tag, 'name') ?? '';
    const localSheet = attributeOf(node.tag, 'localSheetId');
    const scope = localSheet === undefined ? null : sheets[Number(localSheet)]?.name;
    if (name === '' || scope === undefined) {
      throw damagedFile(fileName, `the defined name ${excerpt(name)} belongs to no sheet of it`);
    }
    return {
      name,
      scope,
      formula: node.text.trim().replace(/^=/, ''),
      isHidden: isOn(attributeOf(node.tag, 'hidden')),
    };
  });
}

/** A package of another program, or a mere archive. */
export function otherDocument(fileName: string): Error {
  return unreadableKind(
    'not-a-workbook',
    fileName,
    'is another kind of document and no Excel workbook; open it in your spreadsheet program and save it as .xlsx',
  );
}
