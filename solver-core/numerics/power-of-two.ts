/**
 * Powers of two, exactly. Scaling by them changes no digit of any number.
 */
const bits = new DataView(new ArrayBuffer(8));

/** Exponent e with 2^e ≤ |value| < 2^(e + 1), for a finite value that is not 0 (subnormals count as 2^−1023). */
export function binaryExponent(value: number): number {
  bits.setFloat64(0, value);
  return ((bits.getUint16(0) >> 4) & 0x7ff) - 1023;
}

/** 2^exponent for −1022 ≤ exponent ≤ 1023. */
export function powerOfTwo(exponent: number): number {
  bits.setUint32(0, (exponent + 1023) << 20);
  bits.setUint32(4, 0);
  return bits.getFloat64(0);
}

/** The power of two nearest to a positive value on the logarithmic scale. */
export function nearestPowerOfTwo(value: number): number {
  const exponent = binaryExponent(value);
  const mantissa = value / powerOfTwo(exponent);
  return powerOfTwo(mantissa * mantissa >= 2 ? exponent + 1 : exponent);
}
