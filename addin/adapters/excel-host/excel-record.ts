/**
 * Planrow's record as the text of a custom XML part: one element in our namespace with JSON inside.
 */
import { jsonForXml, recordNamespace } from '../../domain/results-to-sheet/record-text';

export function xmlOfRecord(json: string): string {
  const text = jsonForXml(json).replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');
  return `<record xmlns="${recordNamespace}">${text}</record>`;
}

/** The JSON text of a part in our namespace; null where it is not of the form that we write. */
export function recordOfXml(xml: string): string | null {
  const match =
    /^(?:\uFEFF)?(?:<\?xml[^>]*\?>)?\s*<((?:[\w-]+:)?record)(?:\s[^>]*)?(?:\/>|>([^<]*)<\/\1\s*>)\s*$/.exec(
      xml,
    );
  if (match === null) {
    return null;
  }
  return (match[2] ?? '').replace(
    /&(?:#x([0-9a-f]+)|#(\d+)|(amp|lt|gt|quot|apos));/gi,
    (_all, hex, decimal, name) =>
      typeof name === 'string'
        ? entities[name.toLowerCase()]
        : String.fromCodePoint(typeof hex === 'string' ? parseInt(hex, 16) : Number(decimal)),
  );
}

const entities: Readonly<Record<string, string>> = { amp: '&', lt: '<', gt: '>', quot: '"', apos: "'" };
