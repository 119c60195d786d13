/**
 * Tells by its first bytes what kind of file this is, and refuses every kind but a zip package with the sentence
 * that fits it. The compound file format, in which .xls files and encrypted workbooks come, is read as far as its
 * directory. Source: Microsoft, [MS-CFB] "Compound File Binary File Format", §2.2 header, §2.3 FAT, §2.6 directory.
 */
import { damagedFile, tooLarge, unreadableKind } from './file-faults';
import { xlsxLimits } from './xlsx-limits';

/**
 * Returns when the bytes begin like a zip package.
 * @throws WorkbookError with the sentence for the kind of file that it is
 */
export function refuseOtherKinds(bytes: Uint8Array, fileName: string): void {
  if (bytes.length === 0) {
    throw unreadableKind('not-a-workbook', fileName, 'is empty; choose the workbook that holds the plan');
  }
  if (bytes.length > xlsxLimits.fileBytes) {
    throw tooLarge(fileName, `is larger than ${Math.round(xlsxLimits.fileBytes / 1024 / 1024)} MB`);
  }
  if (beginsWith(bytes, [0xd0, 0xcf, 0x11, 0xe0])) {
    throw compoundFileFault(bytes, fileName);
  }
  if (beginsWith(bytes, [0x50, 0x4b, 0x03, 0x04]) || beginsWith(bytes, [0x50, 0x4b, 0x05, 0x06])) {
    return;
  }
  if (beginsWith(bytes, [0x50, 0x4b])) {
    throw damagedFile(fileName, 'its beginning is not that of a workbook');
  }
  throw unreadableKind(
    'not-a-workbook',
    fileName,
    'is not an Excel workbook; open it in your spreadsheet program and save it as .xlsx',
  );
}

function beginsWith(bytes: Uint8Array, signature: readonly number[]): boolean {
  return signature.every((byte, index) => bytes[index] === byte);
}

function compoundFileFault(bytes: Uint8Array, fileName: string): Error {
  const streams = compoundFileStreams(bytes);
  if (streams.includes('EncryptedPackage')) {
    return unreadableKind(
      'encrypted',
      fileName,
      'is protected by a password for opening; remove that password in your spreadsheet program and save it again',
    );
  }
  if (
    streams.some((name) => name === 'Workbook' || name === 'Book') ||
    fileName.toLowerCase().endsWith('.xls')
  ) {
    return unreadableKind(
      'old-format',
      fileName,
      'is in the old .xls format; open it in your spreadsheet program and save it as .xlsx',
    );
  }
  return unreadableKind(
    'not-a-workbook',
    fileName,
    'is in an old Office format and no workbook of today; open it in your spreadsheet program and save it as .xlsx',
  );
}

/** Names of the streams and storages in a compound file, as far as its directory can be followed. */
function compoundFileStreams(bytes: Uint8Array): string[] {
  const headerLength = 512;
  const header = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  if (bytes.length < headerLength) return [];
  const sectorShift = header.getUint16(30, true);
  if (sectorShift !== 9 && sectorShift !== 12) return [];
  const sectorLength = 1 << sectorShift;
  const sectorAt = (sector: number): number | undefined => {
    const offset = (sector + 1) * sectorLength;
    return offset + sectorLength <= bytes.length ? offset : undefined;
  };
  // The first 109 sectors of the allocation table are listed in the header: enough for the directory of any file
  // whose directory stands near its beginning, and a file beyond that is told by its name.
  const nextSector = (sector: number): number => {
    const entriesPerSector = sectorLength / 4;
    const tableIndex = Math.floor(sector / entriesPerSector);
    if (tableIndex >= 109) return endOfChain;
    const tableOffset = sectorAt(header.getUint32(76 + 4 * tableIndex, true));
    return tableOffset === undefined
      ? endOfChain
      : header.getUint32(tableOffset + 4 * (sector % entriesPerSector), true);
  };
  const names: string[] = [];
  const seen = new Set<number>();
  for (let sector = header.getUint32(48, true); !seen.has(sector); sector = nextSector(sector)) {
    seen.add(sector);
    const offset = sectorAt(sector);
    if (offset === undefined) break;
    for (let entry = offset; entry < offset + sectorLength; entry += 128) {
      const nameBytes = header.getUint16(entry + 64, true);
      if (nameBytes < 2 || nameBytes > 64) continue;
      names.push(new TextDecoder('utf-16le').decode(bytes.subarray(entry, entry + nameBytes - 2)));
    }
  }
  return names;
}

const endOfChain = 0xfffffffe;
