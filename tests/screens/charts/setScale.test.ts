/** Where marks of sets stand: in the order of price and error, apart enough to be read, and found again by pointing. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  errorTicks,
  familyOf,
  inOrder,
  nearestSet,
  partingAttributes,
  type SetMarks,
  setScale,
} from "../../../src/screens/charts/setScale.ts";

const FRAME = { left: 44, right: 900, top: 34, bottom: 320 };

/** 2^k sets whose error grows by a factor for each attribute left out. */
function marksOf(factors: readonly number[]): SetMarks {
  const sets = Array.from({ length: 2 ** factors.length }, (_, set) => set);
  return {
    attributes: factors.map((_, g) => ({ key: `a${g}`, label: `A${g}` })),
    price: sets.map((set) => 40_000 + 317 * ((set * 7919) % 101)),
    error: sets.map((set) =>
      factors.reduce((error, factor, g) => ((set >> g) % 2 === 1 ? error : error * factor), 0.1),
    ),
  };
}

const anyMarks = fc.array(fc.double({ min: 1.001, max: 2, noNaN: true }), { minLength: 1, maxLength: 7 }).map(marksOf);

describe("the scale of the strip", () => {
  test("keeps every mark inside the frame, dearer further right and worse further down", () => {
    fc.assert(
      fc.property(anyMarks, (marks) => {
        const { x, y } = setScale(marks, FRAME)!;
        for (const [set, error] of marks.error.entries()) {
          const [across, down] = [x(marks.price[set]!), y(error!)];
          expect(across > FRAME.left && across < FRAME.right && down > FRAME.top && down < FRAME.bottom).toBe(true);
        }
        const byError = inOrder(marks.error).map((set) => y(marks.error[set]!));
        expect(byError).toEqual([...byError].sort((a, b) => a - b));
      }),
      { seed: 12, numRuns: 60 },
    );
  });

  test("has ticks of errors within the marks, thirty pixels apart at least", () => {
    fc.assert(
      fc.property(anyMarks, (marks) => {
        const scale = setScale(marks, FRAME)!;
        const ticks = errorTicks(scale);
        ticks.forEach((tick, k) => {
          expect(tick).toBeGreaterThan(scale.best);
          expect(tick).toBeLessThanOrEqual(scale.worst * 1.02);
          if (k > 0) expect(scale.y(tick) - scale.y(ticks[k - 1]!)).toBeGreaterThanOrEqual(30);
        });
      }),
      { seed: 13, numRuns: 60 },
    );
  });

  test("finds a mark again by pointing at it, and none far from all", () => {
    const marks = marksOf([1.5, 1.3, 1.1]);
    const scale = setScale(marks, FRAME)!;
    for (const set of marks.price.keys())
      expect(nearestSet(marks, scale, { x: scale.x(marks.price[set]!), y: scale.y(marks.error[set]!) }, 10)).toBe(set);
    expect(nearestSet(marks, scale, { x: -500, y: -500 }, 10)).toBeNull();
  });

  test("parts the marks by the two attributes whose leaving out costs most, and by none that cost nothing", () => {
    const marks = marksOf([1.05, 1.6, 1.001, 1.3]);
    expect(partingAttributes(marks)).toEqual([1, 3]);
    expect(partingAttributes(marksOf([1.001, 1.002]))).toEqual([]);
    expect([0b1010, 0b0010, 0b1000, 0].map((set) => familyOf(set, [1, 3]))).toEqual([0, 1, 2, 3]);
  });

  test("leaves out sets without price or error, and is none without any", () => {
    const marks = marksOf([1.5, 1.3]);
    const some = { ...marks, price: [null, ...marks.price.slice(1)] };
    expect(setScale(some, FRAME)!.worst).toBeLessThan(marks.error[0]!);
    expect(setScale({ ...marks, price: marks.price.map(() => null) }, FRAME)).toBeNull();
  });
});
