/**
 * Triangular work on small symmetric matrices, k × k row-major: C = R′R, T = R⁻¹, C⁻¹ = TT′, and the condition of T.
 */

/** R upper triangular with C = R′R, or the number of the first column whose pivot is not above `smallest`·C_jj. */
export function choleskyFactor(c: Float64Array, k: number, smallest: number): Float64Array | number {
  const r = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    for (let i = 0; i <= j; i++) {
      let s = c[i * k + j]!;
      for (let l = 0; l < i; l++) s -= r[l * k + i]! * r[l * k + j]!;
      if (i < j) r[i * k + j] = s / r[i * k + i]!;
      else if (!(s > smallest * c[j * k + j]!)) return j;
      else r[j * k + j] = Math.sqrt(s);
    }
  }
  return r;
}

/** R⁻¹ of an upper triangular R with a non-zero diagonal. */
export function invertUpper(r: Float64Array, k: number): Float64Array {
  const t = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    t[j * k + j] = 1 / r[j * k + j]!;
    for (let i = j - 1; i >= 0; i--) {
      let s = 0;
      for (let l = i + 1; l <= j; l++) s += r[i * k + l]! * t[l * k + j]!;
      t[i * k + j] = -s / r[i * k + i]!;
    }
  }
  return t;
}

/** TT′. */
export function timesOwnTranspose(t: Float64Array, k: number): Float64Array {
  const product = new Float64Array(k * k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j <= i; j++) {
      let s = 0;
      for (let l = 0; l < k; l++) s += t[i * k + l]! * t[j * k + l]!;
      product[i * k + j] = s;
      product[j * k + i] = s;
    }
  }
  return product;
}

/** C⁻¹g = T(T′g). */
export function solveByRoot(t: Float64Array, g: Float64Array): Float64Array {
  const k = g.length;
  const inner = new Float64Array(k);
  for (let i = 0; i < k; i++) for (let j = 0; j < k; j++) inner[j] = inner[j]! + t[i * k + j]! * g[i]!;
  return multiplyMatrix(t, inner);
}

/** Ax for a square A. */
export function multiplyMatrix(a: Float64Array, x: Float64Array): Float64Array {
  const k = x.length;
  const y = new Float64Array(k);
  for (let i = 0; i < k; i++) {
    let s = 0;
    for (let j = 0; j < k; j++) s += a[i * k + j]! * x[j]!;
    y[i] = s;
  }
  return y;
}

/** Largest eigenvalue of a symmetric positive matrix, by power steps from a fixed start (an estimate from below). */
export function largestEigenvalue(a: Float64Array, k: number): number {
  let x = Float64Array.from({ length: k }, (_, j) => 1 + ((j * 7) % 11) / 23);
  let value = 0;
  for (let step = 0; step < 24; step++) {
    const y = multiplyMatrix(a, x);
    const size = Math.hypot(...y);
    if (!(size > 0) || !Number.isFinite(size)) return size > 0 ? Number.POSITIVE_INFINITY : 0;
    value = size / Math.hypot(...x);
    x = y.map((v) => v / size);
  }
  return value;
}

/**
 * Condition number of the columns after centring and scaling each to length 1: √(λmax(Ĉ)·λmax(Ĉ⁻¹)), from C (or R′R)
 * and its inverse; 1 for no columns. An estimate good to a few per cent, enough to choose a path by.
 */
export function scaledCondition(c: Float64Array, inverse: Float64Array, k: number): number {
  if (k === 0) return 1;
  const size = Float64Array.from({ length: k }, (_, j) => Math.sqrt(c[j * k + j]!));
  const unit = c.map((v, at) => v / (size[Math.floor(at / k)]! * size[at % k]!));
  const unitInverse = inverse.map((v, at) => v * size[Math.floor(at / k)]! * size[at % k]!);
  return Math.max(1, Math.sqrt(largestEigenvalue(unit, k) * largestEigenvalue(unitInverse, k)));
}
