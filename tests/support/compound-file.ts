/**
 * Files in the compound file format (old .xls files, encrypted workbooks), as far as their directory: for tests of
 * how they are told apart. Written from Microsoft's [MS-CFB], §2.2 and §2.6.
 */

const sectorLength = 512;
const endOfChain = 0xfffffffe;
const tableSector = 0xfffffffd;
const freeSector = 0xffffffff;

/** @param streams names of the streams, four a sector; the directory is as long as it takes, its sectors apart */
export function compoundFile(streams: readonly string[]): Uint8Array {
  const names = ['Root Entry', ...streams];
  const directoryLength = Math.ceil(names.length / 4);
  // Sector 0: allocation table. Then directory sectors, each followed by one that is free.
  const directorySectors = Array.from({ length: directoryLength }, (_, index) => 1 + 2 * index);
  const bytes = Buffer.alloc(sectorLength * (2 + 2 * directoryLength));
  Buffer.from('D0CF11E0A1B11AE1', 'hex').copy(bytes);
  bytes.writeUInt16LE(0x3e, 24);
  bytes.writeUInt16LE(3, 26);
  bytes.writeUInt16LE(0xfffe, 28);
  bytes.writeUInt16LE(9, 30);
  bytes.writeUInt16LE(6, 32);
  bytes.writeUInt32LE(1, 44);
  bytes.writeUInt32LE(directorySectors[0], 48);
  bytes.writeUInt32LE(4096, 56);
  bytes.writeUInt32LE(endOfChain, 60);
  bytes.writeUInt32LE(endOfChain, 68);
  for (let index = 0; index < 109; index++) bytes.writeUInt32LE(index === 0 ? 0 : freeSector, 76 + 4 * index);

  const table = sectorLength;
  for (let index = 0; index < sectorLength / 4; index++) bytes.writeUInt32LE(freeSector, table + 4 * index);
  bytes.writeUInt32LE(tableSector, table);
  directorySectors.forEach((sector, index) => {
    bytes.writeUInt32LE(directorySectors[index + 1] ?? endOfChain, table + 4 * sector);
  });
  names.forEach((name, index) => {
    const entry = sectorLength * (1 + directorySectors[Math.floor(index / 4)]) + 128 * (index % 4);
    bytes.write(name, entry, 'utf16le');
    bytes.writeUInt16LE(2 * name.length + 2, entry + 64);
    bytes.writeUInt8(index === 0 ? 5 : 2, entry + 66);
  });
  return new Uint8Array(bytes);
}
