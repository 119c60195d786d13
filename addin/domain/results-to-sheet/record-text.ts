/**
 * How the record stands in a workbook: JSON as the text of one XML element in a namespace of our own, in a custom XML
 * part. Every adapter keeps it so, and each finds what the others wrote.
 */

export const recordNamespace = 'urn:planrow:record:1';

/**
 * The same JSON without characters that XML cannot hold: in JSON they stand only inside strings, where an escape
 * means the same.
 */
export function jsonForXml(json: string): string {
  return json.replace(
    /[\uFFFE\uFFFF]|[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g,
    (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
}
