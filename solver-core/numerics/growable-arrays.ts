/**
 * Growing typed arrays: a longer copy, with at least the wanted length and at least half as much again.
 */

export function grownInt32(array: Int32Array<ArrayBuffer>, wanted: number): Int32Array<ArrayBuffer> {
  if (array.length >= wanted) return array;
  const longer = new Int32Array(Math.max(wanted, Math.ceil(array.length * 1.5) + 16));
  longer.set(array);
  return longer;
}

export function grownFloat64(array: Float64Array<ArrayBuffer>, wanted: number): Float64Array<ArrayBuffer> {
  if (array.length >= wanted) return array;
  const longer = new Float64Array(Math.max(wanted, Math.ceil(array.length * 1.5) + 16));
  longer.set(array);
  return longer;
}
