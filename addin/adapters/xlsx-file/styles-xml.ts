/**
 * The styles part, as far as reading needs it: the number format of each cell format (ECMA-376 Part 1, §18.8).
 */
import { isDateFormat } from '../../domain/sheet/date-format';
import { builtInFormat, generalFormat } from './number-formats';
import { attributeOf, mainNamespaces } from './xml-events';
import { childOf, childrenOf, type XmlNode } from './xml-tree';

/** How a cell shows its number. One object for all cells of a format. */
export interface CellFormat {
  readonly code: string;
  readonly isDate: boolean;
}

export const plainFormat: CellFormat = { code: generalFormat, isDate: false };

/** The formats by the number that cells carry. */
export function readCellFormats(root: XmlNode): CellFormat[] {
  const codes = new Map<number, string>();
  for (const node of childrenOf(childOf(root, 'numFmts', mainNamespaces), 'numFmt', mainNamespaces)) {
    codes.set(
      Number(attributeOf(node.tag, 'numFmtId')),
      attributeOf(node.tag, 'formatCode') ?? generalFormat,
    );
  }
  const known = new Map<string, CellFormat>();
  const formats = childrenOf(childOf(root, 'cellXfs', mainNamespaces), 'xf', mainNamespaces);
  return formats.map((node) => {
    const id = Number(attributeOf(node.tag, 'numFmtId') ?? 0);
    const code = codes.get(id) ?? builtInFormat(id) ?? generalFormat;
    let format = known.get(code);
    if (format === undefined) {
      format = { code, isDate: isDateFormat(code) };
      known.set(code, format);
    }
    return format;
  });
}
