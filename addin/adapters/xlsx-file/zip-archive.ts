/**
 * The zip container of a package: opened under limits, parts unpacked one at a time when asked for, and written
 * again with every part that did not change copied as it was packed.
 *
 * zip.js reads and writes the container; what it leaves open is decided here: names, duplicates, limits.
 */
import {
  Uint8ArrayReader,
  Uint8ArrayWriter,
  ZipReader,
  ZipWriter,
  type Entry,
  type FileEntry,
} from '@zip.js/zip.js';
import { WorkbookError } from '../../ports/workbook';
import { damagedFile, excerpt, refusedContent, tooLarge, unreadableKind } from './file-faults';
import { refuseOtherKinds } from './recognise-file';
import { xlsxLimits } from './xlsx-limits';

/** What becomes of the archive: contents by the name of the part. */
export interface ArchiveChanges {
  /** New contents of parts that exist. They keep their place. */
  readonly replaced: ReadonlyMap<string, Uint8Array>;
  /** Parts that the archive has not got yet; they go behind the others. */
  readonly added: ReadonlyMap<string, Uint8Array>;
  readonly removed: ReadonlySet<string>;
}

export class ZipArchive {
  /** Parts by their name in lower case: names of parts are compared without regard to case (OPC §6.2.2.3). */
  private readonly byName: ReadonlyMap<string, FileEntry>;

  private constructor(
    readonly fileName: string,
    private readonly entries: readonly Entry[],
  ) {
    this.byName = new Map(entries.filter(isFile).map((entry) => [entry.filename.toLowerCase(), entry]));
  }

  /**
   * @param fileName as the planner knows it; every sentence begins with it
   * @throws WorkbookError when the bytes are no zip package, or one that is not taken on
   */
  static async open(bytes: Uint8Array, fileName: string): Promise<ZipArchive> {
    refuseOtherKinds(bytes, fileName);
    // Names are checked below, where each kind of fault has a sentence of its own.
    const reader = new ZipReader(new Uint8ArrayReader(bytes), {
      useWebWorkers: false,
      filenameValidation: 'tolerant',
    });
    const entries: Entry[] = [];
    try {
      for await (const entry of reader.getEntriesGenerator()) {
        entries.push(entry);
        if (entries.length > xlsxLimits.entryCount) {
          throw tooLarge(fileName, `has more than ${xlsxLimits.entryCount} parts inside`);
        }
      }
    } catch (error) {
      if (error instanceof WorkbookError) throw error;
      throw damagedFile(
        fileName,
        'its end is missing or does not fit the rest, as after a broken download',
        error,
      );
    }
    refuseBadNames(entries, fileName);
    refuseBadSizes(entries, bytes.length, fileName);
    return new ZipArchive(fileName, entries);
  }

  /** Names of the parts in their order, directories left out. */
  get names(): string[] {
    return this.entries.filter(isFile).map((entry) => entry.filename);
  }

  has(name: string): boolean {
    return this.byName.has(name.toLowerCase());
  }

  /** The part's name to the letter as it stands in the archive. */
  exactName(name: string): string | undefined {
    return this.byName.get(name.toLowerCase())?.filename;
  }

  /**
   * A part, unpacked.
   * @throws WorkbookError when it is missing, broken, or holds more than it says
   */
  async read(name: string): Promise<Uint8Array> {
    const entry = this.entryOf(name);
    const chunks: Uint8Array[] = [];
    let length = 0;
    const sink = new WritableStream<Uint8Array>({
      write: (chunk) => {
        length += chunk.length;
        chunks.push(chunk);
      },
    });
    try {
      // zip.js stops as soon as the part grows past the size it states, which was checked against the limits.
      await entry.getData(sink, { checkCrc32: true, useWebWorkers: false });
    } catch (error) {
      throw damagedFile(this.fileName, `its part ${excerpt(name)} cannot be unpacked`, error);
    }
    if (chunks.length === 1) return chunks[0];
    const content = new Uint8Array(length);
    let offset = 0;
    for (const chunk of chunks) {
      content.set(chunk, offset);
      offset += chunk.length;
    }
    return content;
  }

  /** A part as it is packed, to compare two archives byte for byte. */
  async readPacked(name: string): Promise<Uint8Array> {
    return packedContent(this.entryOf(name), this.fileName);
  }

  /** The archive with these changes. All other parts keep their packed bytes, their order and their dates. */
  async rewrite(changes: ArchiveChanges): Promise<Uint8Array> {
    const target = new Uint8ArrayWriter();
    const writer = new ZipWriter(target, { useWebWorkers: false, extendedTimestamp: false });
    for (const entry of this.entries) {
      if (changes.removed.has(entry.filename)) continue;
      const kept = {
        lastModDate: entry.lastModDate,
        comment: entry.comment,
        versionMadeBy: entry.versionMadeBy,
        externalFileAttributes: entry.externalFileAttributes,
      };
      const replacement = changes.replaced.get(entry.filename);
      if (!isFile(entry)) {
        await writer.add(entry.filename, undefined, { ...kept, directory: true });
      } else if (replacement !== undefined) {
        await writer.add(entry.filename, new Uint8ArrayReader(replacement), kept);
      } else {
        const packed = await packedContent(entry, this.fileName);
        await writer.add(entry.filename, new Uint8ArrayReader(packed), {
          ...kept,
          passThrough: true,
          uncompressedSize: entry.uncompressedSize,
          ...(entry.crc32 === undefined ? {} : { crc32: entry.crc32 }),
          compressionMethod: entry.compressionMethod,
        });
      }
    }
    // New parts take the date of the first one: the result then depends on nothing but the file and the changes.
    const lastModDate = this.entries[0].lastModDate;
    for (const [name, content] of changes.added) {
      await writer.add(name, new Uint8ArrayReader(content), { lastModDate });
    }
    await writer.close();
    return target.getData();
  }

  private entryOf(name: string): FileEntry {
    const entry = this.byName.get(name.toLowerCase());
    if (entry === undefined) throw damagedFile(this.fileName, `its part ${excerpt(name)} is missing`);
    return entry;
  }
}

function isFile(entry: Entry): entry is FileEntry {
  return !entry.directory;
}

async function packedContent(entry: FileEntry, fileName: string): Promise<Uint8Array> {
  try {
    return await entry.getData(new Uint8ArrayWriter(), { passThrough: true, useWebWorkers: false });
  } catch (error) {
    throw damagedFile(fileName, `its part ${excerpt(entry.filename)} cannot be read`, error);
  }
}

function refuseBadNames(entries: readonly Entry[], fileName: string): void {
  const seen = new Set<string>();
  for (const { filename } of entries) {
    const segments = filename.replace(/\/$/, '').split('/');
    const isPlain =
      !/[\\\p{Cc}]/u.test(filename) &&
      !/^[A-Za-z]:/.test(filename) &&
      segments.every((segment) => segment !== '' && segment !== '.' && segment !== '..');
    if (!isPlain) {
      throw refusedContent(fileName, `the name of a part inside it (${excerpt(filename)}) leads elsewhere`);
    }
    const key = filename.toLowerCase();
    if (seen.has(key)) {
      throw refusedContent(fileName, `two parts inside it have the same name (${excerpt(filename)})`);
    }
    seen.add(key);
  }
}

function refuseBadSizes(entries: readonly Entry[], fileLength: number, fileName: string): void {
  let packedTotal = 0;
  let total = 0;
  for (const entry of entries) {
    const name = excerpt(entry.filename);
    if (entry.encrypted) {
      throw unreadableKind(
        'encrypted',
        fileName,
        'is protected by a password; remove that password and save it again as .xlsx',
      );
    }
    packedTotal += entry.compressedSize;
    total += entry.uncompressedSize;
    if (entry.uncompressedSize > xlsxLimits.entryBytes) {
      throw tooLarge(fileName, `would unpack to more than can be held in memory (${name})`);
    }
    if (
      entry.uncompressedSize > xlsxLimits.bytesWithoutRatio &&
      entry.uncompressedSize > entry.compressedSize * xlsxLimits.packingRatio
    ) {
      throw tooLarge(fileName, `is packed more densely than any workbook is (${name}) and is not unpacked`);
    }
  }
  if (total > xlsxLimits.totalBytes) {
    throw tooLarge(fileName, 'would unpack to more than can be held in memory');
  }
  // Parts that share the same packed bytes would let a small file unpack to a huge one.
  if (packedTotal > fileLength) {
    throw refusedContent(fileName, 'the parts inside it overlap');
  }
}
