/**
 * What is in a zip archive, read with node:zlib and nothing of the code under test (APPNOTE 6.3, §4.3.12, §4.3.16).
 */
import { inflateRawSync } from 'node:zlib';

export interface InspectedEntry {
  readonly name: string;
  /** As it stands in the archive. */
  readonly packed: Buffer;
  readonly content: Buffer;
}

/** The entries in the order of the archive. Archives of more than 65,535 entries or 4 GB are not for tests. */
export function inspectZip(archive: Uint8Array): InspectedEntry[] {
  const bytes = Buffer.from(archive);
  const end = bytes.lastIndexOf('PK\x05\x06', undefined, 'latin1');
  const count = bytes.readUInt16LE(end + 10);
  const entries: InspectedEntry[] = [];
  let at = bytes.readUInt32LE(end + 16);
  for (let index = 0; index < count; index++) {
    const method = bytes.readUInt16LE(at + 10);
    const packedLength = bytes.readUInt32LE(at + 20);
    const nameLength = bytes.readUInt16LE(at + 28);
    const name = bytes.toString('utf8', at + 46, at + 46 + nameLength);
    const local = bytes.readUInt32LE(at + 42);
    const start = local + 30 + bytes.readUInt16LE(local + 26) + bytes.readUInt16LE(local + 28);
    const packed = bytes.subarray(start, start + packedLength);
    entries.push({ name, packed, content: method === 0 ? packed : inflateRawSync(packed) });
    at += 46 + nameLength + bytes.readUInt16LE(at + 30) + bytes.readUInt16LE(at + 32);
  }
  return entries;
}

/** The text of one entry. */
export function textInZip(archive: Uint8Array, name: string): string {
  const entry = inspectZip(archive).find((candidate) => candidate.name === name);
  if (entry === undefined) throw new Error(`The archive has no ${name}.`);
  return entry.content.toString('utf8');
}
