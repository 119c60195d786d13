/**
 * The table of shared strings (ECMA-376 Part 1, §18.4): texts by their number. Rich text counts as its characters,
 * without the phonetic hints that stand beside them.
 */
import { mainNamespaces, readXml, type XmlSource } from './xml-events';
import { unescapeCellText } from './xml-escapes';

/** @throws WorkbookError where the part is not well-formed */
export function readSharedStrings(source: XmlSource): string[] {
  const strings: string[] = [];
  let item = '';
  let piece = '';
  let phoneticDepth = 0;
  readXml(source, {
    open(tag) {
      piece = '';
      if (!mainNamespaces.has(tag.uri)) return;
      if (tag.local === 'si') item = '';
      else if (tag.local === 'rPh') phoneticDepth++;
    },
    close(tag) {
      if (!mainNamespaces.has(tag.uri)) return;
      if (tag.local === 't' && phoneticDepth === 0) item += piece;
      else if (tag.local === 'rPh') phoneticDepth--;
      else if (tag.local === 'si') strings.push(unescapeCellText(item));
    },
    text(text) {
      piece += text;
    },
  });
  return strings;
}
