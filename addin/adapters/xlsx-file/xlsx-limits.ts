/**
 * How much of a file is taken on, in one place and with the reason. They keep a hostile file from filling the
 * memory, and stand far above what a planner's workbook needs.
 */

const mebibyte = 1024 * 1024;

export const xlsxLimits = {
  /** The file itself. It is held in memory whole, and once more while a changed copy is built. */
  fileBytes: 256 * mebibyte,
  /** Parts in the package. A large workbook has some hundreds (sheets, drawings, pictures). */
  entryCount: 20_000,
  /** One part, unpacked. As text it takes twice that; longer texts than 2^29 characters cannot be held at all. */
  entryBytes: 384 * mebibyte,
  /** All parts together, as the package states them, unpacked. */
  totalBytes: 1024 * mebibyte,
  /**
   * Unpacked by packed size of one part. Sheets of equal rows reach 60; deflate cannot pass 1,032, and files made to
   * fill the memory come close to it.
   */
  packingRatio: 300,
  /** Parts up to this size may be packed as densely as they like: they can do no harm. */
  bytesWithoutRatio: 8 * mebibyte,
  /** Elements inside one another. Real parts stay below 40. */
  elementDepth: 1_000,
} as const;
