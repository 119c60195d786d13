/**
 * A part's XML as events with their places in the text. Everything that reads or changes a part goes through here,
 * so that a DOCTYPE is refused and broken XML is named in one place.
 */
import { SaxesParser, type SaxesTagNS } from 'saxes';
import { WorkbookError } from '../../ports/workbook';
import { damagedFile, excerpt, refusedContent } from './file-faults';
import { xlsxLimits } from './xlsx-limits';

export type XmlTag = SaxesTagNS;

/** A part and where it comes from, for sentences. */
export interface XmlSource {
  readonly text: string;
  readonly part: string;
  readonly fileName: string;
}

export interface XmlHandlers {
  /** `end` is the place just behind the start tag. */
  open(tag: XmlTag, end: number): void;
  /** `end` is the place just behind the end tag, or behind the only tag of an empty element. */
  close(tag: XmlTag, end: number): void;
  /** Text and CDATA, entities resolved; in pieces. */
  text(text: string): void;
}

/** Both forms of the standard's namespaces: transitional and strict. */
export const mainNamespaces: ReadonlySet<string> = new Set([
  'http://schemas.openxmlformats.org/spreadsheetml/2006/main',
  'http://purl.oclc.org/ooxml/spreadsheetml/main',
]);
export const relationshipNamespaces: ReadonlySet<string> = new Set([
  'http://schemas.openxmlformats.org/officeDocument/2006/relationships',
  'http://purl.oclc.org/ooxml/officeDocument/relationships',
]);

/** @throws WorkbookError damaged where the XML is not well-formed, refused-content where it has a DOCTYPE */
export function readXml(source: XmlSource, handlers: XmlHandlers): void {
  const parser = new SaxesParser({ xmlns: true, position: true });
  let depth = 0;
  parser.on('doctype', () => {
    throw refusedContent(source.fileName, `its part ${excerpt(source.part)} has a document type declaration`);
  });
  parser.on('error', (error) => {
    // The parser puts line and column before its message.
    const reason = excerpt(error.message.replace(/^.*?\d+:\d+: |\.$/g, ''));
    throw damagedFile(
      source.fileName,
      `its part ${excerpt(source.part)} is not well-formed (${reason})`,
      error,
    );
  });
  parser.on('opentag', (tag) => {
    if (++depth > xlsxLimits.elementDepth) {
      throw refusedContent(source.fileName, `its part ${excerpt(source.part)} is nested too deeply`);
    }
    handlers.open(tag, parser.position);
  });
  parser.on('closetag', (tag) => {
    depth--;
    handlers.close(tag, parser.position);
  });
  parser.on('text', (text) => handlers.text(text));
  parser.on('cdata', (text) => handlers.text(text));
  try {
    parser.write(source.text).close();
  } catch (error) {
    if (error instanceof WorkbookError) throw error;
    throw damagedFile(source.fileName, `its part ${excerpt(source.part)} cannot be read`, error);
  }
}

/** The value of an attribute without prefix, or undefined. */
export function attributeOf(tag: XmlTag, name: string): string | undefined {
  return tag.attributes[name]?.value;
}

/** The value of an attribute from the relationships namespace (`r:id`), whatever its prefix. */
export function relationshipAttributeOf(tag: XmlTag, local: string): string | undefined {
  return Object.values(tag.attributes).find(
    (attribute) => attribute.local === local && relationshipNamespaces.has(attribute.uri),
  )?.value;
}

/** `1`, `true` and `on` are true (ECMA-376 Part 1, §22.9.2.7 ST_OnOff, and XML Schema's boolean). */
export function isOn(value: string | undefined): boolean {
  return value === '1' || value === 'true' || value === 'on';
}
