/**
 * The workbook part with sheets and names added or changed, and with the request to calculate on opening. New
 * children go where the schema has them (ECMA-376 Part 1, §18.2.27).
 */
import type { NameRemoval, NameWrite } from '../../domain/results-to-sheet/write-plan';
import { damagedFile } from './file-faults';
import { asOpenTag, withAttribute } from './start-tag';
import { TextSplices } from './text-splices';
import { attributeOf, mainNamespaces, relationshipNamespaces, type XmlSource } from './xml-events';
import { escapeXml, escapeXmlText } from './xml-escapes';
import { childOf, childrenOf, parseXmlTree, type XmlNode } from './xml-tree';

export interface AddedSheet {
  readonly name: string;
  readonly relationshipId: string;
}

export interface WorkbookChange {
  /** Sheets before the change, in the order of their tabs. */
  readonly sheetNames: readonly string[];
  readonly addedSheets: readonly AddedSheet[];
  readonly names: readonly (NameWrite | NameRemoval)[];
  readonly recalculatesOnOpening: boolean;
}

/** Children in their order, as far as something is put behind them. */
const childOrder = [
  'fileVersion',
  'fileSharing',
  'workbookPr',
  'workbookProtection',
  'bookViews',
  'sheets',
  'functionGroups',
  'externalReferences',
  'definedNames',
  'calcPr',
];

export function patchWorkbook(source: XmlSource, change: WorkbookChange): string {
  const root = parseXmlTree(source);
  const splices = new TextSplices(source.text);
  addSheets(source, root, change.addedSheets, splices);
  writeNames(source, root, change, splices);
  if (change.recalculatesOnOpening) requestCalculation(source, root, splices);
  return splices.apply();
}

function addSheets(
  source: XmlSource,
  root: XmlNode,
  added: readonly AddedSheet[],
  splices: TextSplices,
): void {
  if (added.length === 0) return;
  const list = childOf(root, 'sheets', mainNamespaces)!;
  const sheets = childrenOf(list, 'sheet', mainNamespaces);
  // The prefix that this part has for relationships stands at every sheet that it has.
  const id = Object.values(sheets[0].tag.attributes).find(
    ({ local, uri }) => local === 'id' && relationshipNamespaces.has(uri),
  );
  if (id === undefined) throw damagedFile(source.fileName, 'its sheets have no parts');
  let sheetId = sheets.reduce(
    (most, sheet) => Math.max(most, Number(attributeOf(sheet.tag, 'sheetId')) || 0),
    0,
  );
  for (const { name, relationshipId } of added) {
    sheetId++;
    splices.insert(
      list.contentEnd,
      `<${list.prefix}sheet name="${escapeXml(name)}" sheetId="${sheetId}" ${id.name}="${relationshipId}"/>`,
    );
  }
}

function writeNames(source: XmlSource, root: XmlNode, change: WorkbookChange, splices: TextSplices): void {
  if (change.names.length === 0) return;
  const allSheets = [...change.sheetNames, ...change.addedSheets.map(({ name }) => name)];
  const sheetIndex = (scope: string | null): string | undefined =>
    scope === null
      ? undefined
      : String(allSheets.findIndex((name) => name.toLowerCase() === scope.toLowerCase()));
  const list = childOf(root, 'definedNames', mainNamespaces);
  const existing = childrenOf(list, 'definedName', mainNamespaces);
  const added = new Map<string, string>();
  const removed: XmlNode[] = [];
  // Of several writes to one name, the last counts.
  const last = new Map(
    change.names.map((name) => [`${name.name.toLowerCase()}|${sheetIndex(name.scope)}`, name]),
  );
  for (const write of last.values()) {
    const index = sheetIndex(write.scope);
    const node = existing.find(
      ({ tag }) =>
        attributeOf(tag, 'name')?.toLowerCase() === write.name.toLowerCase() &&
        attributeOf(tag, 'localSheetId') === index,
    );
    if (write.kind === 'removeName') {
      if (node !== undefined) removed.push(node);
      continue;
    }
    const formula = escapeXmlText(write.formula);
    if (node === undefined) {
      const local = index === undefined ? '' : ` localSheetId="${index}"`;
      const element = `${root.prefix}definedName`;
      added.set(
        `${write.name}|${index}`,
        `<${element} name="${escapeXml(write.name)}"${local}>${formula}</${element}>`,
      );
    } else if (node.tag.isSelfClosing) {
      const tag = asOpenTag(source.text.slice(node.start, node.end));
      splices.replace(node.start, node.end, `${tag}${formula}</${node.tag.name}>`);
    } else {
      splices.replace(node.contentStart, node.contentEnd, formula);
    }
  }
  if (list !== undefined && added.size === 0 && removed.length > 0 && removed.length === existing.length) {
    // A list without names is left out, as the spreadsheet program does.
    splices.replace(list.start, list.end, '');
    return;
  }
  for (const { start, end } of removed) splices.replace(start, end, '');
  if (added.size === 0) return;
  // Lists are kept in the order of the alphabet, as the spreadsheet program writes them.
  const ordered = [...added].sort(([a], [b]) => compareNames(a, b));
  if (list === undefined || list.tag.isSelfClosing) {
    const element = `${root.prefix}definedNames`;
    const xml = `<${element}>${ordered.map(([, name]) => name).join('')}</${element}>`;
    if (list === undefined) splices.insert(placeOfChild(root, 'definedNames'), xml);
    else splices.replace(list.start, list.end, xml);
    return;
  }
  for (const [name, xml] of ordered) {
    const next = existing.find(({ tag }) => compareNames(attributeOf(tag, 'name') ?? '', name) > 0);
    splices.insert(next?.start ?? list.contentEnd, xml);
  }
}

function compareNames(a: string, b: string): number {
  const [first, second] = [a.toLowerCase(), b.toLowerCase()];
  return first < second ? -1 : first > second ? 1 : 0;
}

function requestCalculation(source: XmlSource, root: XmlNode, splices: TextSplices): void {
  const node = childOf(root, 'calcPr', mainNamespaces);
  if (node === undefined) {
    splices.insert(placeOfChild(root, 'calcPr'), `<${root.prefix}calcPr fullCalcOnLoad="1"/>`);
    return;
  }
  const tag = source.text.slice(node.start, node.contentStart);
  const changed = withAttribute(tag, 'fullCalcOnLoad', '1');
  if (changed !== tag) splices.replace(node.start, node.contentStart, changed);
}

/** Behind the last child that the schema has before this one. */
function placeOfChild(root: XmlNode, local: string): number {
  const before = new Set(childOrder.slice(0, childOrder.indexOf(local)));
  const last = root.children
    .filter((child) => before.has(child.local) && mainNamespaces.has(child.tag.uri))
    .at(-1);
  return last?.end ?? root.contentStart;
}
