/**
 * The styles part of a sample workbook: collects the looks that cells ask for and numbers them.
 * Source: ECMA-376 Part 1, §18.8 (styles).
 */
import type { CellLook } from './sample-workbook';
import { escapeXml } from './xml-text';

const fontName = 'Calibri';
const usualFontSize = 10;
/** Numbers below 164 are kept for formats that every reader knows without their code. */
const firstCustomFormat = 164;

export class LookTable {
  private readonly fonts: string[] = [];
  private readonly fills: string[] = [
    '<fill><patternFill patternType="none"/></fill>',
    '<fill><patternFill patternType="gray125"/></fill>',
  ];
  private readonly borders: string[] = [];
  private readonly numberFormats: string[] = [];
  private readonly formats: string[] = [];

  constructor() {
    this.numberOf({});
  }

  /** The number by which a cell names its look. */
  numberOf(look: CellLook): number {
    const font = positionIn(this.fonts, fontXml(look));
    const fill = look.fillColor === undefined ? 0 : positionIn(this.fills, fillXml(look.fillColor));
    const border = positionIn(this.borders, borderXml(look));
    const numberFormat =
      look.numberFormat === undefined
        ? 0
        : firstCustomFormat + positionIn(this.numberFormats, look.numberFormat);
    const alignment = alignmentXml(look);
    const applies = [
      numberFormat === 0 ? '' : ' applyNumberFormat="1"',
      font === 0 ? '' : ' applyFont="1"',
      fill === 0 ? '' : ' applyFill="1"',
      border === 0 ? '' : ' applyBorder="1"',
      alignment === '' ? '' : ' applyAlignment="1"',
    ].join('');
    const start = `<xf numFmtId="${numberFormat}" fontId="${font}" fillId="${fill}" borderId="${border}" xfId="0"${applies}`;
    return positionIn(this.formats, alignment === '' ? `${start}/>` : `${start}>${alignment}</xf>`);
  }

  /** The whole part; `highlightColors` become the looks that conditional formats name by their position. */
  toXml(highlightColors: readonly string[]): string {
    const counted = (tag: string, items: readonly string[]): string =>
      items.length === 0 ? '' : `<${tag} count="${items.length}">${items.join('')}</${tag}>`;
    const numberFormats = this.numberFormats.map(
      (code, position) =>
        `<numFmt numFmtId="${firstCustomFormat + position}" formatCode="${escapeXml(code)}"/>`,
    );
    const highlights = highlightColors.map(
      (color) => `<dxf><font><b/><color rgb="FF${color}"/></font></dxf>`,
    );
    return [
      '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
      '<styleSheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">',
      counted('numFmts', numberFormats),
      counted('fonts', this.fonts),
      counted('fills', this.fills),
      counted('borders', this.borders),
      '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>',
      counted('cellXfs', this.formats),
      '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles>',
      counted('dxfs', highlights),
      '<tableStyles count="0" defaultTableStyle="TableStyleLight1"/>',
      '</styleSheet>',
    ].join('');
  }
}

/** Where the item stands; put at the end when it is new. */
function positionIn(items: string[], item: string): number {
  const position = items.indexOf(item);
  return position >= 0 ? position : items.push(item) - 1;
}

function fontXml(look: CellLook): string {
  return [
    '<font>',
    look.isBold === true ? '<b/>' : '',
    look.isItalic === true ? '<i/>' : '',
    `<sz val="${look.fontSize ?? usualFontSize}"/>`,
    `<color rgb="FF${look.textColor ?? '000000'}"/>`,
    `<name val="${fontName}"/><family val="2"/></font>`,
  ].join('');
}

function fillXml(color: string): string {
  return `<fill><patternFill patternType="solid"><fgColor rgb="FF${color}"/><bgColor indexed="64"/></patternFill></fill>`;
}

function borderXml(look: CellLook): string {
  const line = (tag: string, isDrawn: boolean | undefined): string =>
    isDrawn === true ? `<${tag} style="thin"><color rgb="FF808080"/></${tag}>` : `<${tag}/>`;
  return `<border><left/><right/>${line('top', look.hasLineAbove)}${line('bottom', look.hasLineBelow)}<diagonal/></border>`;
}

function alignmentXml(look: CellLook): string {
  const horizontal =
    look.isCentred === true
      ? 'center'
      : look.isRightAligned === true
        ? 'right'
        : look.indent === undefined
          ? ''
          : 'left';
  const attributes = [
    horizontal === '' ? '' : ` horizontal="${horizontal}"`,
    look.wrapsText === true ? ' vertical="top" wrapText="1"' : '',
    look.indent === undefined ? '' : ` indent="${look.indent}"`,
  ].join('');
  return attributes === '' ? '' : `<alignment${attributes}/>`;
}
