/**
 * Notes on cells: the part with their texts, and the old drawing part without which spreadsheet programs show none.
 * Source: ECMA-376 Part 1, §18.7 (comments); Part 4, §19.1 (VML).
 */
import { escapeXml } from './xml-text';

export interface Note {
  /** A1 text. */
  readonly cell: string;
  readonly row: number;
  readonly column: number;
  readonly text: string;
}

export function notesXml(notes: readonly Note[]): string {
  const comments = notes.map(
    (note) =>
      `<comment ref="${note.cell}" authorId="0"><text><r><rPr><sz val="9"/><rFont val="Calibri"/></rPr>` +
      `<t xml:space="preserve">${escapeXml(note.text)}</t></r></text></comment>`,
  );
  return [
    '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n',
    '<comments xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">',
    `<authors><author>Planning</author></authors><commentList>${comments.join('')}</commentList></comments>`,
  ].join('');
}

export function noteDrawingXml(notes: readonly Note[]): string {
  const shapes = notes.map((note, position) => {
    const { row, column } = note;
    return [
      `<v:shape id="_x0000_s${1025 + position}" type="#_x0000_t202"`,
      ' style="position:absolute;margin-left:0;margin-top:0;width:150pt;height:60pt;z-index:1;visibility:hidden"',
      ' fillcolor="#ffffe1" o:insetmode="auto"><v:fill color2="#ffffe1"/><v:path o:connecttype="none"/>',
      '<v:textbox style="mso-direction-alt:auto"/><x:ClientData ObjectType="Note"><x:MoveWithCells/>',
      `<x:SizeWithCells/><x:Anchor>${column + 1}, 15, ${row}, 10, ${column + 4}, 15, ${row + 4}, 4</x:Anchor>`,
      `<x:AutoFill>False</x:AutoFill><x:Row>${row}</x:Row><x:Column>${column}</x:Column></x:ClientData></v:shape>`,
    ].join('');
  });
  return [
    '<xml xmlns:v="urn:schemas-microsoft-com:vml" xmlns:o="urn:schemas-microsoft-com:office:office"',
    ' xmlns:x="urn:schemas-microsoft-com:office:excel">',
    '<o:shapelayout v:ext="edit"><o:idmap v:ext="edit" data="1"/></o:shapelayout>',
    '<v:shapetype id="_x0000_t202" coordsize="21600,21600" o:spt="202" path="m,l,21600r21600,l21600,xe">',
    '<v:stroke joinstyle="miter"/><v:path gradientshapeok="t" o:connecttype="rect"/></v:shapetype>',
    `${shapes.join('')}</xml>`,
  ].join('');
}
