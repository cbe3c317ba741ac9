/**
 * The simplest number within a tolerance: a fraction with few digits, else a decimal with few digits.
 * The fraction of smallest denominator in an interval comes from walking the continued fraction of its ends (Stern–Brocot).
 */

export interface Ratio {
  readonly numerator: number;
  readonly denominator: number;
}

export interface SimpleNumber {
  readonly value: number;
  /** The value as a fraction in lowest terms, or null when only a decimal or the number itself would do. */
  readonly ratio: Ratio | null;
}

/** Fractions with longer parts than this read worse than a decimal. */
const LARGEST_PART = 1e6;

/** Simplest number in [value − tolerance, value + tolerance]; 0 when it is in there. Worked value: 0.0833333 ± 1e-6 is 1/12. */
export function simplestNumber(value: number, tolerance: number): SimpleNumber {
  if (Math.abs(value) <= tolerance) return { value: 0, ratio: { numerator: 0, denominator: 1 } };
  const size = Math.abs(value);
  const sign = Math.sign(value);
  const decimal = shortestDecimal(size, tolerance);
  const fraction = simplestFraction(size - tolerance, size + tolerance);
  const decimalLength = decimal === null ? Number.POSITIVE_INFINITY : significantDigits(decimal);
  if (fraction !== null && digits(fraction.numerator) + digits(fraction.denominator) <= decimalLength + 4) {
    return {
      value: (sign * fraction.numerator) / fraction.denominator,
      ratio: { ...fraction, numerator: sign * fraction.numerator },
    };
  }
  if (decimal !== null) return { value: sign * decimal, ratio: ratioOfDecimal(sign * decimal) };
  return { value, ratio: null };
}

/** The fraction of smallest denominator in [low, high], 0 < low ≤ high; null when its parts grow past a million. */
export function simplestFraction(low: number, high: number): Ratio | null {
  const whole = Math.floor(low);
  if (whole === low || whole + 1 <= high) {
    const numerator = whole === low ? whole : whole + 1;
    return numerator > 0 && numerator <= LARGEST_PART * 1e3 ? { numerator, denominator: 1 } : null;
  }
  if (whole > LARGEST_PART) return null;
  const rest = simplestFraction(1 / (high - whole), 1 / (low - whole));
  if (rest === null) return null;
  const numerator = whole * rest.numerator + rest.denominator;
  const denominator = rest.numerator;
  return numerator <= LARGEST_PART && denominator <= LARGEST_PART ? { numerator, denominator } : null;
}

/** The decimal with fewest significant digits (at most 12) within the tolerance. */
function shortestDecimal(size: number, tolerance: number): number | null {
  for (let count = 1; count <= 12; count++) {
    const decimal = Number(size.toPrecision(count));
    if (Math.abs(decimal - size) <= tolerance) return decimal;
  }
  return null;
}

function significantDigits(value: number): number {
  return value.toExponential().replace(/e.*$/, "").replace(".", "").length;
}

function digits(whole: number): number {
  return String(whole).length;
}

function ratioOfDecimal(decimal: number): Ratio | null {
  for (let power = 1; power <= LARGEST_PART; power *= 10) {
    const numerator = Math.round(decimal * power);
    if (numerator / power !== decimal) continue;
    const divisor = commonDivisor(Math.abs(numerator), power);
    return { numerator: numerator / divisor, denominator: power / divisor };
  }
  return null;
}

function commonDivisor(a: number, b: number): number {
  return b === 0 ? a : commonDivisor(b, a % b);
}
