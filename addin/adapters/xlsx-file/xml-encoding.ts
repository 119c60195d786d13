/**
 * XML parts as text and back. Packages hold UTF-8 or UTF-16 (ECMA-376 Part 2, §7.3.2); a part that is written again
 * keeps its encoding and its byte order mark.
 */
import { damagedFile, excerpt } from './file-faults';

export type XmlEncoding = 'utf-8' | 'utf-16le' | 'utf-16be';

export interface XmlText {
  readonly text: string;
  readonly encoding: XmlEncoding;
  readonly hasByteOrderMark: boolean;
}

/** @throws WorkbookError where the bytes are no text in UTF-8 or UTF-16 */
export function decodeXml(bytes: Uint8Array, part: string, fileName: string): XmlText {
  const hasByteOrderMark =
    (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) ||
    (bytes[0] === 0xff && bytes[1] === 0xfe) ||
    (bytes[0] === 0xfe && bytes[1] === 0xff);
  // "<" in either order of its two bytes.
  const encoding: XmlEncoding =
    (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0x3c && bytes[1] === 0)
      ? 'utf-16le'
      : (bytes[0] === 0xfe && bytes[1] === 0xff) || (bytes[0] === 0 && bytes[1] === 0x3c)
        ? 'utf-16be'
        : 'utf-8';
  let text: string;
  try {
    // The decoder drops the byte order mark.
    text = new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch (error) {
    throw damagedFile(fileName, `its part ${excerpt(part)} is not valid text`, error);
  }
  const declared = /^<\?xml[^>]*?\sencoding\s*=\s*["']([^"']*)["']/.exec(text)?.[1].toLowerCase();
  if (
    declared !== undefined &&
    !['utf-8', 'utf8', 'us-ascii', 'utf-16', 'utf-16le', 'utf-16be'].includes(declared)
  ) {
    throw damagedFile(
      fileName,
      `its part ${excerpt(part)} is in the encoding ${excerpt(declared)}, not UTF-8`,
    );
  }
  return { text, encoding, hasByteOrderMark };
}

/** The bytes of a part whose text has changed, in the encoding of its original. */
export function encodeXml(text: string, like: Pick<XmlText, 'encoding' | 'hasByteOrderMark'>): Uint8Array {
  const marked = like.hasByteOrderMark ? `\uFEFF${text}` : text;
  if (like.encoding === 'utf-8') return new TextEncoder().encode(marked);
  const bytes = new Uint8Array(marked.length * 2);
  const view = new DataView(bytes.buffer);
  for (let index = 0; index < marked.length; index++) {
    view.setUint16(index * 2, marked.charCodeAt(index), like.encoding === 'utf-16le');
  }
  return bytes;
}
