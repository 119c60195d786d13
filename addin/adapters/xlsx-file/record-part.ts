/**
 * Planrow's own part of a workbook: a custom XML part whose root is in our namespace, found through the workbook's
 * relationships, so that a copy saved by another program still has it (ECMA-376 Part 1, §15.2.4).
 */
import type { PackageParts } from './package-parts';
import type { XmlNode } from './xml-tree';

export const recordNamespace = 'urn:planrow:record:1';

/** The record's part, with the JSON text that it holds; undefined where the workbook has none. */
export async function findRecord(
  parts: PackageParts,
  workbookPart: string,
): Promise<{ part: string; json: string } | undefined> {
  for (const { kind, target } of await parts.relationshipsOf(workbookPart)) {
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
