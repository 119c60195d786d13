/**
 * Planrow's own part of a workbook: a custom XML part whose root is in our namespace, found through the workbook's
 * relationships, so that a copy saved by another program still has it (ECMA-376 Part 1, §15.2.4).
 */
import { jsonForXml, recordNamespace } from '../../domain/results-to-sheet/record-text';
import type { PackageParts } from './package-parts';
import { asOpenTag } from './start-tag';
import { TextSplices } from './text-splices';
import type { XmlSource } from './xml-events';
import { escapeXmlText } from './xml-escapes';
import { parseXmlTree, type XmlNode } from './xml-tree';

/** The record's part, with the JSON text that it holds; undefined where the workbook has none. */
export async function findRecord(
  parts: PackageParts,
  workbookPart: string,
): Promise<{ part: string; json: string } | undefined> {
  // Some programs hang custom parts on the package itself when they save a workbook anew.
  const relationships = [
    ...(await parts.relationshipsOf(workbookPart)),
    ...(await parts.relationshipsOf('')),
  ];
  for (const { kind, target } of relationships) {
    if (kind !== 'customXml' || target === undefined || !parts.has(target)) continue;
    const root = await customXmlRoot(parts, target);
    if (root?.local === 'record' && root.tag.uri === recordNamespace)
      return { part: target, json: root.text };
  }
  return undefined;
}

/** Other programs' custom parts are none of our business: one that cannot be read is passed over. */
async function customXmlRoot(parts: PackageParts, part: string): Promise<XmlNode | undefined> {
  try {
    return await parts.readTree(part);
  } catch {
    return undefined;
  }
}

/** The record's part with another JSON text in it. */
export function recordText(source: XmlSource, json: string): string {
  const root = parseXmlTree(source);
  const splices = new TextSplices(source.text);
  const content = escapeXmlText(jsonForXml(json));
  if (root.tag.isSelfClosing) {
    const tag = asOpenTag(source.text.slice(root.start, root.end));
    splices.replace(root.start, root.end, `${tag}${content}</${root.tag.name}>`);
  } else {
    splices.replace(root.contentStart, root.contentEnd, content);
  }
  return splices.apply();
}

/** The parts of a record that a workbook has not got yet: the item itself, and the one that names its namespace. */
export function newRecordParts(json: string): { item: string; properties: string } {
  const declaration = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
  const content = escapeXmlText(jsonForXml(json));
  return {
    item: `${declaration}<record xmlns="${recordNamespace}">${content}</record>`,
    properties:
      `${declaration}<ds:datastoreItem ds:itemID="${recordItemId}" xmlns:ds="${customXmlNamespace}">` +
      `<ds:schemaRefs><ds:schemaRef ds:uri="${recordNamespace}"/></ds:schemaRefs></ds:datastoreItem>`,
  };
}

export const recordPropertiesType = 'application/vnd.openxmlformats-officedocument.customXmlProperties+xml';

/** One record a workbook, so that one number serves them all; it must only differ from other programs' numbers. */
const recordItemId = '{6C1F0B52-9E4D-4A37-8B66-2D90A7E3C514}';
const customXmlNamespace = 'http://schemas.openxmlformats.org/officeDocument/2006/customXml';
