/**
 * Zip archives for tests, written byte by byte with node:zlib and nothing of the code under test: sound ones, and
 * ones with each kind of fault that a damaged or hostile file can have.
 * Layout after the published .ZIP file format specification (APPNOTE 6.3, §4.3).
 */
import { crc32, deflateRawSync } from 'node:zlib';

export interface ZipEntry {
  readonly name: string;
  readonly content: string | Uint8Array;
  /** Stored as it is and not deflated. */
  readonly isStored?: boolean | undefined;
  /** What the headers claim, where they are to lie. */
  readonly claimedSize?: number | undefined;
  readonly claimedChecksum?: number | undefined;
  /** General purpose flags to set; 1 says that the entry is encrypted. */
  readonly flags?: number | undefined;
  /** Checksum and sizes stand behind the content (as streaming writers do), not before it. */
  readonly hasDataDescriptor?: boolean | undefined;
}

const utf8Names = 0x0800;
const descriptorFollows = 0x0008;
/** 2024-01-01 00:00 in the form of MS-DOS: the same bytes on every day. */
const dosDate = ((2024 - 1980) << 9) | (1 << 5) | 1;

function bytesOf(content: string | Uint8Array): Uint8Array {
  return typeof content === 'string' ? Buffer.from(content, 'utf8') : content;
}

/** The archive's bytes, entries in the order given. */
export function buildZip(entries: readonly ZipEntry[]): Uint8Array {
  const body: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let offset = 0;
  for (const entry of entries) {
    const content = bytesOf(entry.content);
    const packed = entry.isStored ? content : deflateRawSync(content);
    const name = Buffer.from(entry.name, 'utf8');
    const checksum = entry.claimedChecksum ?? crc32(content);
    const size = entry.claimedSize ?? content.length;
    const flags = utf8Names | (entry.flags ?? 0) | (entry.hasDataDescriptor ? descriptorFollows : 0);

    // The part that the local and the central header share.
    const shared = Buffer.alloc(26);
    shared.writeUInt16LE(20, 0);
    shared.writeUInt16LE(flags, 2);
    shared.writeUInt16LE(entry.isStored ? 0 : 8, 4);
    shared.writeUInt16LE(0, 6);
    shared.writeUInt16LE(dosDate, 8);
    shared.writeUInt32LE(checksum, 10);
    shared.writeUInt32LE(packed.length, 14);
    shared.writeUInt32LE(size, 18);
    shared.writeUInt16LE(name.length, 22);
    const local = Buffer.from(shared);
    if (entry.hasDataDescriptor) local.fill(0, 10, 22);

    const descriptor = Buffer.alloc(entry.hasDataDescriptor ? 16 : 0);
    if (entry.hasDataDescriptor) {
      descriptor.writeUInt32LE(0x08074b50, 0);
      descriptor.writeUInt32LE(checksum, 4);
      descriptor.writeUInt32LE(packed.length, 8);
      descriptor.writeUInt32LE(size, 12);
    }
    const place = Buffer.alloc(14);
    place.writeUInt32LE(offset, 10);
    directory.push(Buffer.from('PK\x01\x02\x14\x00', 'latin1'), shared, place, name);
    const parts = [Buffer.from('PK\x03\x04', 'latin1'), local, name, packed, descriptor];
    body.push(...parts);
    offset += parts.reduce((sum, part) => sum + part.length, 0);
  }
  const directorySize = directory.reduce((sum, part) => sum + part.length, 0);
  const end = Buffer.alloc(22);
  end.write('PK\x05\x06', 0, 'latin1');
  end.writeUInt16LE(entries.length, 8);
  end.writeUInt16LE(entries.length, 10);
  end.writeUInt32LE(directorySize, 12);
  end.writeUInt32LE(offset, 16);
  return new Uint8Array(Buffer.concat([...body, ...directory, end]));
}
