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

/** The power of two next to a size (exact to divide by); 1 for 0. */
export function powerOfTwoNear(size: number): number {
  return size > 0 && Number.isFinite(size) ? 2 ** Math.max(-1000, Math.min(1000, Math.round(Math.log2(size)))) : 1;
}
