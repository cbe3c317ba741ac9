/**
 * Does the model drift with time? Sums W_r of recursive residuals over s, in the order sold, against the lines
 * ±a(√m + 2r/√m), r = 1 … m, m = n − p (Brown, Durbin & Evans 1975). The statistic is the least a that the sums stay within,
 * and its p = 2(Q(3a) + e^(−4a²)(1 − Q(a))), Q the normal upper tail (their equation; 5 % at a = 0.948).
 */
import { normalUpperTail } from "../../numerics/normal.ts";
import { type Diagnostic, verdictOf } from "./diagnostic.ts";
import { recursiveResiduals } from "./recursiveResiduals.ts";

export const drift: Diagnostic = {
  code: "drift",
  label: "Drift",
  needs: 3,
  underWeights: false,
  run: (fit) => {
    const residuals = recursiveResiduals(fit);
    const m = residuals.length;
    const unit = fit.solution.residualStandardError! * Math.sqrt(m);
    let sum = 0;
    let statistic = 0;
    let last = 0;
    residuals.forEach((w, r) => {
      sum += w / unit;
      const a = Math.abs(sum) / (1 + (2 * (r + 1)) / m);
      if (a > statistic) [statistic, last] = [a, sum];
    });
    const p = driftTail(statistic);
    return {
      statistic,
      df: [],
      p,
      verdict: verdictOf(p),
      sentence:
        p < 0.05
          ? `Each sale priced by those before it, prices come out ${last > 0 ? "higher" : "lower"} than priced for long stretches: the model drifts.`
          : "Each sale priced by those before it, prices come out higher and lower in turn.",
      whatToDo: p < 0.05 ? "Give the market movement more freedom, or start the evidence later." : "Nothing.",
      source: "Brown, Durbin & Evans 1975",
    };
  },
};

export function driftTail(a: number): number {
  return Math.min(1, 2 * (normalUpperTail(3 * a) + Math.exp(-4 * a * a) * normalUpperTail(-a)));
}
