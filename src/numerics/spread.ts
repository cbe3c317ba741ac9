// The size of a column's deviations, and the power of two next to it, which numbers are divided by without rounding.

/** √(Σ (x − m)²/n), first divided by the largest deviation so that nothing overflows. */
export function rootMeanSquare(column: Float64Array, centreHi: number, centreLo: number): number {
  let largest = 0;
  for (let i = 0; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i]! - centreHi - centreLo));
  if (largest === 0) return 0;
  let total = 0;
  for (let i = 0; i < column.length; i++) {
    const z = (column[i]! - centreHi - centreLo) / largest;
    total += z * z;
  }
  return largest * Math.sqrt(total / column.length);
}

const double = new DataView(new ArrayBuffer(8));

/**
 * The power of two next to a size on the logarithmic scale (exact to divide by), between 2^−1000 and 2^1000; 1 for 0 and for
 * what is not finite. Read from the digits of the double, so that every machine gives the same.
 */
export function powerOfTwoNear(size: number): number {
  if (!(size > 0 && size < Number.POSITIVE_INFINITY)) return 1;
  double.setFloat64(0, size);
  const high = double.getUint32(0);
  double.setUint32(0, (high & 0xfffff) | (1023 << 20));
  const exponent = (high >>> 20) - 1023 + (double.getFloat64(0) < Math.SQRT2 ? 0 : 1);
  double.setUint32(0, (Math.max(-1000, Math.min(1000, exponent)) + 1023) << 20);
  double.setUint32(4, 0);
  return double.getFloat64(0);
}
