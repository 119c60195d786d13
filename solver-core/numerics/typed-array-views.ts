/**
 * Read-only views of typed arrays. The owner of an array holds the writable type and hands these out.
 */

/** A Float64Array that its reader may not write. */
export interface ReadonlyFloat64Array extends Iterable<number> {
  readonly length: number;
  readonly [index: number]: number;
  slice(start?: number, end?: number): Float64Array;
}

/** An Int32Array that its reader may not write. */
export interface ReadonlyInt32Array extends Iterable<number> {
  readonly length: number;
  readonly [index: number]: number;
  slice(start?: number, end?: number): Int32Array;
}

/** A Uint8Array that its reader may not write. */
export interface ReadonlyUint8Array extends Iterable<number> {
  readonly length: number;
  readonly [index: number]: number;
  slice(start?: number, end?: number): Uint8Array;
}
