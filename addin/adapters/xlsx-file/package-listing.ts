/**
 * Changes to how parts are listed: relationships and content types. New entries go behind the others.
 */
import { contentTypesNamespace, relationshipsNamespace } from './package-parts';
import { TextSplices } from './text-splices';
import { attributeOf, type XmlSource } from './xml-events';
import { escapeXml } from './xml-escapes';
import { childrenOf, parseXmlTree } from './xml-tree';

export interface NewRelationship {
  readonly id: string;
  /** In full. */
  readonly type: string;
  readonly target: string;
}

export interface NewContentType {
  readonly part: string;
  readonly type: string;
}

/** A part of relationships with some added, and those to the removed parts taken out. */
export function patchRelationships(
  source: XmlSource,
  added: readonly NewRelationship[],
  removedIds: ReadonlySet<string>,
): string {
  const root = parseXmlTree(source);
  const splices = new TextSplices(source.text);
  for (const node of childrenOf(root, 'Relationship', relationshipsNamespace)) {
    if (removedIds.has(attributeOf(node.tag, 'Id') ?? '')) splices.replace(node.start, node.end, '');
  }
  for (const { id, type, target } of added) {
    splices.insert(
      root.contentEnd,
      `<${root.prefix}Relationship Id="${id}" Type="${escapeXml(type)}" Target="${escapeXml(target)}"/>`,
    );
  }
  return splices.apply();
}

/** A part of relationships with these alone. */
export function newRelationships(added: readonly NewRelationship[]): string {
  const entries = added.map(
    ({ id, type, target }) =>
      `<Relationship Id="${id}" Type="${escapeXml(type)}" Target="${escapeXml(target)}"/>`,
  );
  return (
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n' +
    `<Relationships xmlns="${[...relationshipsNamespace][0]}">${entries.join('')}</Relationships>`
  );
}

/** The content types with those of new parts added, and those of removed parts taken out. */
export function patchContentTypes(
  source: XmlSource,
  added: readonly NewContentType[],
  removedParts: ReadonlySet<string>,
): string {
  const root = parseXmlTree(source);
  const splices = new TextSplices(source.text);
  const removed = new Set([...removedParts].map((part) => `/${part}`.toLowerCase()));
  for (const node of childrenOf(root, 'Override', contentTypesNamespace)) {
    const part = attributeOf(node.tag, 'PartName')?.toLowerCase() ?? '';
    if (removed.has(part)) splices.replace(node.start, node.end, '');
  }
  for (const { part, type } of added) {
    splices.insert(
      root.contentEnd,
      `<${root.prefix}Override PartName="/${escapeXml(part)}" ContentType="${escapeXml(type)}"/>`,
    );
  }
  return splices.apply();
}
