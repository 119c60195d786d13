/**
 * Single attributes of a start tag changed in its source text; the others keep their order, quotes and spaces.
 */
import { escapeXml } from './xml-escapes';

/**
 * The tag with the attribute set, or removed for undefined.
 * @param tag source text from `<` to `>`, of a well-formed element
 */
export function withAttribute(tag: string, name: string, value: string | undefined): string {
  const attribute = /\s+([^\s=<>/]+)\s*=\s*("[^"]*"|'[^']*')/gy;
  attribute.lastIndex = /^<[^\s/>]+/.exec(tag)![0].length;
  let end = attribute.lastIndex;
  for (let match = attribute.exec(tag); match !== null; match = attribute.exec(tag)) {
    if (match[1] === name) {
      const set = value === undefined ? '' : ` ${name}="${escapeXml(value)}"`;
      return tag.slice(0, match.index) + set + tag.slice(attribute.lastIndex);
    }
    end = attribute.lastIndex;
  }
  return value === undefined ? tag : `${tag.slice(0, end)} ${name}="${escapeXml(value)}"${tag.slice(end)}`;
}

/** The tag with several attributes set or removed. */
export function withAttributes(tag: string, values: Readonly<Record<string, string | undefined>>): string {
  return Object.entries(values).reduce((changed, [name, value]) => withAttribute(changed, name, value), tag);
}

/** `<x a="1">` for `<x a="1"/>`; an open tag stays as it is. */
export function asOpenTag(tag: string): string {
  return tag.replace(/\s*\/>$/, '>');
}
