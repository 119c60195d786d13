/**
 * New cell formats behind the ones that a workbook has: a copy of a cell's own format with another number format,
 * or with its text broken at line feeds. Everything else in the styles part stays.
 */
import { attributeOf, mainNamespaces, type XmlSource } from './xml-events';
import { asOpenTag, withAttribute, withAttributes } from './start-tag';
import { TextSplices } from './text-splices';
import { childOf, childrenOf, parseXmlTree, type XmlNode } from './xml-tree';

/** What follows the list of cell formats (ECMA-376 Part 1, §18.8.39). */
const afterCellFormats: ReadonlySet<string> = new Set([
  'cellStyles',
  'dxfs',
  'tableStyles',
  'colors',
  'extLst',
]);

/** A styles part with one plain format: for a workbook that has none. */
export function emptyStyles(mainNamespace: string): string {
  return (
    `<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n<styleSheet xmlns="${mainNamespace}">` +
    '<fonts count="1"><font><sz val="11"/><name val="Calibri"/></font></fonts>' +
    '<fills count="2"><fill><patternFill patternType="none"/></fill><fill><patternFill patternType="gray125"/></fill></fills>' +
    '<borders count="1"><border><left/><right/><top/><bottom/><diagonal/></border></borders>' +
    '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>' +
    '<cellXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0" xfId="0"/></cellXfs>' +
    '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles></styleSheet>'
  );
}

export class StylesPatch {
  private readonly root: XmlNode;
  private readonly list: XmlNode | undefined;
  /** The formats as they are written, ours behind the others. */
  private readonly formats: string[];
  private readonly numberFormats: (string | undefined)[];
  private readonly existingCount: number;

  constructor(private readonly source: XmlSource) {
    this.root = parseXmlTree(source);
    this.list = childOf(this.root, 'cellXfs', mainNamespaces);
    const nodes = childrenOf(this.list, 'xf', mainNamespaces);
    this.formats = nodes.map((node) => source.text.slice(node.start, node.end));
    this.numberFormats = nodes.map((node) => attributeOf(node.tag, 'numFmtId'));
    this.existingCount = this.formats.length;
  }

  /**
   * The number of a format like `base`, with the number format of the format `numbersLike` and with text that
   * breaks, where asked. An equal one that exists is taken.
   */
  formatLike(base: number, change: { numbersLike?: number | undefined; wrapsText?: boolean }): number {
    const plain = `<${this.root.prefix}xf numFmtId="0"/>`;
    const baseFormat = this.formats[base] ?? this.formats[0] ?? plain;
    let wanted = baseFormat;
    if (change.numbersLike !== undefined) {
      const numberFormat = this.numberFormats[change.numbersLike] ?? '0';
      if (numberFormat !== (this.numberFormats[base] ?? '0')) {
        wanted = withStartTag(wanted, { numFmtId: numberFormat, applyNumberFormat: '1' });
      }
    }
    if (change.wrapsText === true) wanted = withWrappedText(wanted, this.root.prefix);
    if (wanted === baseFormat) return base;
    // A cell without a format has the first one: a new one must not become that.
    if (this.formats.length === 0) this.append(plain, '0');
    const known = this.formats.indexOf(wanted);
    if (known >= 0) return known;
    return this.append(wanted, numberFormatIn(wanted));
  }

  get isChanged(): boolean {
    return this.formats.length > this.existingCount;
  }

  /** The part's text with the new formats. */
  text(): string {
    const splices = new TextSplices(this.source.text);
    const added = this.formats.slice(this.existingCount).join('');
    const count = String(this.formats.length);
    const { list, root } = this;
    if (list === undefined) {
      const next = root.children.find((child) => afterCellFormats.has(child.local));
      splices.insert(
        next?.start ?? root.contentEnd,
        `<${root.prefix}cellXfs count="${count}">${added}</${root.prefix}cellXfs>`,
      );
    } else {
      const tag = withAttribute(this.source.text.slice(list.start, list.contentStart), 'count', count);
      const isEmpty = list.tag.isSelfClosing;
      splices.replace(
        list.start,
        list.contentStart,
        isEmpty ? `${asOpenTag(tag)}${added}</${list.tag.name}>` : tag,
      );
      if (!isEmpty) splices.insert(list.contentEnd, added);
    }
    return splices.apply();
  }

  private append(format: string, numberFormat: string | undefined): number {
    this.formats.push(format);
    this.numberFormats.push(numberFormat);
    return this.formats.length - 1;
  }
}

function numberFormatIn(format: string): string | undefined {
  return /\snumFmtId\s*=\s*["']([0-9]+)["']/.exec(startTagOf(format))?.[1];
}

function startTagOf(element: string): string {
  // A ">" may stand in an attribute's value, so quoted parts are passed over.
  return /^<(?:[^>"']|"[^"]*"|'[^']*')*>/.exec(element)![0];
}

function withStartTag(element: string, attributes: Readonly<Record<string, string>>): string {
  const tag = startTagOf(element);
  return withAttributes(tag, attributes) + element.slice(tag.length);
}

/** The alignment is the first child of a format, where it has one. */
function withWrappedText(format: string, prefix: string): string {
  const changed = withStartTag(format, { applyAlignment: '1' });
  const tag = startTagOf(changed);
  if (tag.endsWith('/>')) {
    return `${asOpenTag(tag)}<${prefix}alignment wrapText="1"/></${prefix}xf>`;
  }
  const inside = changed.slice(tag.length);
  const alignment = new RegExp(`^\\s*(?=<${prefix}alignment[\\s/>])`).exec(inside);
  if (alignment === null) return `${tag}<${prefix}alignment wrapText="1"/>${inside}`;
  const before = tag + alignment[0];
  const alignmentTag = startTagOf(changed.slice(before.length));
  return (
    before + withAttribute(alignmentTag, 'wrapText', '1') + changed.slice(before.length + alignmentTag.length)
  );
}
