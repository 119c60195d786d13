/**
 * A small part as a tree of elements that know where they stand in the text. Sheets and string tables are large and
 * go through xml-events instead.
 */
import { readXml, type XmlSource, type XmlTag } from './xml-events';

export interface XmlNode {
  readonly tag: XmlTag;
  /** The name without prefix. */
  readonly local: string;
  /** The prefix with its colon, or an empty text: what a sibling's name begins with. */
  readonly prefix: string;
  readonly children: readonly XmlNode[];
  /** Text directly inside, entities resolved. */
  readonly text: string;
  /** The element in the text: [start, end); its start tag ends at contentStart, its end tag begins at contentEnd. */
  readonly start: number;
  readonly contentStart: number;
  readonly contentEnd: number;
  readonly end: number;
}

type GrowingNode = { -readonly [Key in keyof XmlNode]: XmlNode[Key] } & { children: XmlNode[] };

/** The root element. @throws WorkbookError as readXml does */
export function parseXmlTree(source: XmlSource): XmlNode {
  const open: GrowingNode[] = [];
  let root: XmlNode | undefined;
  readXml(source, {
    open(tag, end) {
      const node: GrowingNode = {
        tag,
        local: tag.local,
        prefix: tag.prefix === '' ? '' : `${tag.prefix}:`,
        children: [],
        text: '',
        // A "<" cannot stand inside a tag, so the last one before its end begins it.
        start: source.text.lastIndexOf('<', end - 1),
        contentStart: end,
        contentEnd: end,
        end,
      };
      open.at(-1)?.children.push(node);
      open.push(node);
      root ??= node;
    },
    close(tag, end) {
      const node = open.pop()!;
      node.end = end;
      if (!tag.isSelfClosing) node.contentEnd = source.text.lastIndexOf('<', end - 1);
    },
    text(text) {
      const node = open.at(-1);
      if (node !== undefined) node.text += text;
    },
  });
  // A text without a root element is not well-formed and has been refused.
  return root!;
}

/** The first child of that name in the given namespaces. */
export function childOf(
  node: XmlNode | undefined,
  local: string,
  namespaces: ReadonlySet<string>,
): XmlNode | undefined {
  return node?.children.find((child) => child.local === local && namespaces.has(child.tag.uri));
}

/** All children of that name in the given namespaces. */
export function childrenOf(
  node: XmlNode | undefined,
  local: string,
  namespaces: ReadonlySet<string>,
): XmlNode[] {
  return (node?.children ?? []).filter((child) => child.local === local && namespaces.has(child.tag.uri));
}
