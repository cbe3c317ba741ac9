/** Money and values along an axis: linear scales and round ticks of the form 1, 2 or 5 × 10^k. */
export interface Scale {
  (value: number): number;
  readonly from: number;
  readonly to: number;
}

export function scaleOf(from: number, to: number, left: number, right: number): Scale {
  const span = to - from || 1;
  return Object.assign((value: number) => left + ((value - from) / span) * (right - left), { from, to });
}

/** Step of the form 1, 2 or 5 × 10^k that is nearest below or at `target`; also below 1. */
export function tickStep(target: number): number {
  if (!(target > 0) || !Number.isFinite(target)) return 1;
  const power = 10 ** Math.floor(Math.log10(target));
  const head = target / power;
  return (head >= 5 ? 5 : head >= 2 ? 2 : 1) * power;
}

/**
 * Round ticks of a scale whose labels do not touch: about `wanted` of them, fewer where a label (as wide as `widthOf` says, mm)
 * would run into the next.
 */
export function roomyTicks(scale: Scale, wanted: number, widthOf: (value: number) => number): number[] {
  let step = tickStep((scale.to - scale.from) / wanted);
  for (let k = 0; k < 12; k++) {
    const ticks = ticksBetween(scale.from, scale.to, step);
    const widest = Math.max(0, ...ticks.map(widthOf));
    if (Math.abs(scale(step) - scale(0)) >= widest + 1.2) return ticks;
    step = tickStep(step * 2.5);
  }
  return [];
}

/** Multiples of `step` from `from` to `to`, ends included; at most 400. */
export function ticksBetween(from: number, to: number, step: number): number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.min(Math.floor(to / step + 1e-9), first + 400);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => {
    const value = (first + k) * step;
    return Math.abs(value) < step * 1e-6 ? 0 : value;
  });
}
