/**
 * Text in XML, both ways: entities, and the `_xHHHH_` form in which cells keep characters that XML cannot hold
 * (ECMA-376 Part 1, §22.9.2.19 ST_Xstring).
 */

/** For text and for attribute values in double quotes. Line ends in attributes are kept by character references. */
export function escapeXml(text: string): string {
  return text.replace(/[&<>"\r\n\t]/g, (character) => {
    switch (character) {
      case '&':
        return '&amp;';
      case '<':
        return '&lt;';
      case '>':
        return '&gt;';
      case '"':
        return '&quot;';
      default:
        return `&#${character.charCodeAt(0)};`;
    }
  });
}

/** For the text of an element: line feeds and tabs may stand as they are; a carriage return would be lost. */
export function escapeXmlText(text: string): string {
  return text.replace(/[&<>\r]/g, (character) =>
    character === '&' ? '&amp;' : character === '<' ? '&lt;' : character === '>' ? '&gt;' : '&#13;',
  );
}

/** `_x000D_` and its like, back to the characters that they stand for. */
export function unescapeCellText(text: string): string {
  return text.includes('_x')
    ? text.replace(/_x([0-9A-Fa-f]{4})_/g, (_, digits: string) => String.fromCharCode(parseInt(digits, 16)))
    : text;
}

/**
 * A text as a cell keeps it, before XML escaping: characters that XML cannot hold become `_xHHHH_`, and a text that
 * looks like such an escape is kept from being read as one.
 */
export function escapeCellText(text: string): string {
  const guarded = text.replace(/_(?=x[0-9A-Fa-f]{4}_)/g, '_x005F_');
  // Half a surrogate pair counts as a character that XML cannot hold.
  return guarded.replace(
    /[\u0000-\u0008\u000B\u000C\u000D\u000E-\u001F\uFFFE\uFFFF]|[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g,
    (character) => `_x${character.charCodeAt(0).toString(16).toUpperCase().padStart(4, '0')}_`,
  );
}
