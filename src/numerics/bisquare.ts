/**
 * Tukey's bisquare: sales beyond c·s do not count at all (Beaton & Tukey 1974); and the M scale that goes with it.
 * ρ(u) = 1 − (1 − (u/c)²)³ up to |u| = c, then 1; ψ(u)/u ∝ (1 − (u/c)²)²; ψ′ ∝ (1 − (u/c)²)(1 − 5(u/c)²).
 */
import type { Psi } from "./huber.ts";

/** Half of the sales may be wrong before the S estimate breaks down (Rousseeuw & Yohai 1984). */
export const BREAKDOWN_C = 1.54764;
/** 95 % efficiency when residuals are normal (Yohai 1987). */
export const EFFICIENT_C = 4.685061;

export function bisquare(c: number): Psi {
  return {
    weight(u) {
      const v = (u / c) ** 2;
      return v < 1 ? (1 - v) ** 2 : 0;
    },
    slope(u) {
      const v = (u / c) ** 2;
      return v < 1 ? (1 - v) * (1 - 5 * v) : 0;
    },
  };
}

/** ρ, from 0 to 1. */
export function bisquareLoss(u: number, c: number): number {
  const v = (u / c) ** 2;
  return v < 1 ? 1 - (1 - v) ** 3 : 1;
}

/**
 * The s with Σ a·ρ(e/s) = ½·(n − p)·ā (a weights, ā their mean): Newton on ln s, halved into a bracket where it would leave it.
 * 0 when fewer than half of the residuals differ from zero. `start` > 0 is where to look first.
 */
export function mScale(residuals: Float64Array, weights: Float64Array | null, p: number, start: number): number {
  const n = residuals.length;
  const total = weights === null ? n : weights.reduce((sum, a) => sum + a, 0);
  const target = (0.5 * total * (n - p)) / n;
  let low = Number.NEGATIVE_INFINITY;
  let high = Number.POSITIVE_INFINITY;
  let at = Math.log(start);
  for (let steps = 0; steps < 200; steps++) {
    const { loss, slope } = lossAt(residuals, weights, Math.exp(at));
    if (loss > target) low = at;
    else high = at;
    const newton = slope > 0 ? at + (loss - target) / slope : Number.NaN;
    const isInside = newton > low && newton < high && Math.abs(newton - at) < 3;
    const next = isInside ? newton : high === Number.POSITIVE_INFINITY ? at + 1 : Math.max((low + high) / 2, at - 2);
    if (Math.abs(next - at) <= 4e-16 * Math.max(1, Math.abs(at))) return Math.exp(next);
    if (next < Math.log(start) - 80) return 0;
    at = next;
  }
  return Math.exp(at);
}

/** Σ a·ρ(e/s) and minus its slope in ln s. */
function lossAt(residuals: Float64Array, weights: Float64Array | null, scale: number): { loss: number; slope: number } {
  let loss = 0;
  let slope = 0;
  for (let i = 0; i < residuals.length; i++) {
    const a = weights === null ? 1 : weights[i]!;
    const v = (residuals[i]! / (scale * BREAKDOWN_C)) ** 2;
    const left = v < 1 ? 1 - v : 0;
    loss += a * (1 - left ** 3);
    slope += a * 6 * v * left * left;
  }
  return { loss, slope };
}
