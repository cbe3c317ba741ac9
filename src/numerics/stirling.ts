/**
 * Pieces that keep the power terms of the incomplete gamma and beta functions exact to the last digits: the remainder of
 * Stirling's series and ln r − (r − 1), so that no two large logarithms are ever subtracted (Loader 2000).
 */

/** Coefficients B₂ₖ / (2k(2k − 1)) of a^(1−2k) in Stirling's series (Abramowitz & Stegun 6.1.41). */
const SERIES = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];

/** ln Γ(a) − (a − ½) ln a + a − ½ ln 2π, a > 0; below 15 by climbing with Γ(a + 1) = a Γ(a). */
export function stirlingRemainder(a: number): number {
  let climbed = 0;
  let at = a;
  for (; at < 15; at++) climbed += (at + 0.5) * Math.log1p(1 / at) - 1;
  const inverseSquare = 1 / (at * at);
  return climbed + SERIES.reduceRight((sum, term) => sum * inverseSquare + term, 0) / at;
}

/**
 * ln r − u for r = 1 + u > 0; both are asked, since each alone loses digits somewhere. Near u = 0 by ln(1 + u) = 2 artanh(s), s = u / (2 + u), whose first term gives
 * 2s − u = −u s without cancellation.
 */
export function logLessExcess(r: number, u: number): number {
  if (Math.abs(u) > 0.4) return Math.log(r) - u;
  const s = u / (2 + u);
  const square = s * s;
  let sum = 0;
  let power = s * square;
  for (let odd = 3; Math.abs(power) > 1e-18 * Math.abs(sum); odd += 2) {
    sum += power / odd;
    power *= square;
  }
  return 2 * sum - u * s;
}
