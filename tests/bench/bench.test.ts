/**
 * The benchmark's own sums, not its times: the rows it promises, the arithmetic of ratios, the table as printed, and that the
 * exact fit it counts digits against is exact.
 */
import { describe, expect, test } from "vitest";
import { drawData } from "./drawData.ts";
import { collinearDesign, correctDigits, exactCoefficients, solveWhole } from "./exactFit.ts";
import { fitFast } from "./fitFast.ts";
import { type Figure, growthExponent, isMet, median, plainFigure, ratioFigure, takeTurns } from "./measure.ts";
import { shortNumber, tableOf } from "./printTable.ts";
import { ROWS, reachOf } from "./rows.ts";

describe("what is measured", () => {
  test("every row of the work list is there with its reach", () => {
    const reaches = ROWS.flatMap(({ id, reaches }) =>
      Object.entries(reaches).map(([what, reach]) => [id, what, reach]),
    );
    expect(reaches).toEqual([
      ["fit", "numpy lstsq", 6],
      ["fit", "R .lm.fit", 5],
      ["fit", "R lm", 10],
      ["guarded", "numpy lstsq", 3],
      ["guarded", "correct digits up to condition 1e5", 15],
      ["careful", "numpy lstsq", 1.5],
      ["careful", "correct digits up to condition 1e8", 15],
      ["levels", "numpy lstsq", 20],
      ["levels", "R .lm.fit", 15],
      ["small", "numpy lstsq", 1.5],
      ["threads", "one thread", 1.8],
      ["live", "switch one attribute", 0.05],
      ["live", "switch one attribute, a choice of 6 levels", 0.05],
      ["live", "add one sale", 0.05],
      ["live", "remove one sale", 0.05],
      ["sets", "R² + leave-one-out error (rows) + shares", 20],
      ["rows", "R, each function called by itself", 10],
      ["rows", "R, all from one shared lm.influence", 10],
      ["load", "rows to arrays", 2000],
      ["load", "from the columnar copy", 200],
      ["memory", "numpy lstsq", 5],
      ["memory", "numpy lstsq, design row by row (as column_stack makes it)", 5],
    ]);
    expect(new Set(ROWS.map(({ id }) => id)).size).toBe(ROWS.length);
  });

  test("a reach is found by row and name, none where only a number is shown, and an unknown row is refused", () => {
    expect(reachOf("fit", "R lm")).toBe(10);
    expect(reachOf("fit", "numpy normal equations")).toBeNull();
    expect(() => reachOf("fits", "R lm")).toThrow("there is no row fits");
  });
});

describe("the arithmetic", () => {
  test("the median is the middle value, or the mean of the two middle ones", () => {
    expect(median([3, 1, 2])).toBe(2);
    expect(median([4, 1, 2, 10])).toBe(3);
    expect(median([])).toBeNaN();
  });

  test("a ratio is the reference's median over ours; its spread comes from the rounds", () => {
    const figure = ratioFigure({ row: "fit", what: "numpy lstsq" }, [10, 20, 10], [60, 100, 80], 6);
    expect(figure).toMatchObject({ value: 8, low: 5, high: 8, unit: "×", better: "more" });
    expect(isMet(figure)).toBe(true);
    expect(isMet({ ...figure, reach: 8.5 })).toBe(false);
  });

  test("a time is met from below, and nothing is judged without a reach", () => {
    const figure = plainFigure({ row: "load", what: "rows to arrays" }, "ms", [1900, 2100, 2300], 2000);
    expect(figure).toMatchObject({ value: 2100, low: 1900, high: 2300 });
    expect(isMet(figure)).toBe(false);
    expect(isMet({ ...figure, reach: 2100 })).toBe(true);
    expect(isMet({ ...figure, reach: null })).toBeNull();
  });

  test("contenders take turns after one warm-up each", async () => {
    const order: string[] = [];
    const run = (name: string) => () => order.push(name);
    const times = await takeTurns([run("a"), run("b")], 2);
    expect(order.join("")).toBe("ababab");
    expect(times).toEqual([
      [3, 5],
      [4, 6],
    ]);
  });

  test("time in proportion to n has exponent 1, to its square 2", () => {
    expect(growthExponent([10, 100, 1000], [3, 30, 300])).toBeCloseTo(1, 12);
    expect(growthExponent([10, 100, 1000], [1, 100, 10000])).toBeCloseTo(2, 12);
  });
});

describe("the table", () => {
  const slow: Figure = ratioFigure({ row: "fit", what: "numpy lstsq" }, [10, 10], [20, 40], 6);

  test("numbers have three significant digits and no powers of ten", () => {
    expect([0, 0.0123456, 1.5, 12.34, 123.4, 123456].map(shortNumber)).toEqual([
      "0",
      "0.0123",
      "1.50",
      "12.3",
      "123",
      "123456",
    ]);
  });

  test("says what is met, what is not, and what was skipped and why", () => {
    const fast = plainFigure({ row: "live", what: "add one sale" }, "µs", [16], 50);
    const text = tableOf([fast, slow], [{ row: "fit", what: "R lm", why: "not installed" }]);
    const lines = text.split("\n").map((line) => line.replaceAll(/ {2,}/g, " | "));
    expect(lines).toEqual([
      "against / what | figure | spread | reach | medians",
      "",
      "fit from columns in memory, 10⁶ × 30",
      " | numpy lstsq | 3.00 × | 2.00–4.00 | ≥ 6.00 × | NOT MET | 10.0 ms, reference 30.0 ms",
      " | R lm: SKIPPED — not installed",
      "",
      "all coefficients and standard errors after a change, p = 30",
      " | add one sale | 16.0 µs | ≤ 50.0 µs | met",
    ]);
  });
});

describe("the exact fit", () => {
  test("solves whole numbers exactly", () => {
    // 2x + y = 5 and x + 3y = 5 at x = 2, y = 1.
    const [x, y] = solveWhole([
      [2n, 1n, 5n],
      [1n, 3n, 5n],
    ]);
    expect([x!.top * 1n === 2n * x!.bottom, y!.top === y!.bottom]).toEqual([true, true]);
    // Slope 2.25 and intercept 11/12 of x = 0, 1, 2 and y = 1, 3, 5.5, here with y fourfold to be whole.
    const [intercept, slope] = exactCoefficients([Float64Array.of(0, 1, 2)], Float64Array.of(4, 12, 22));
    expect(intercept!.top * 3n).toBe(11n * intercept!.bottom);
    expect(slope!.top).toBe(9n * slope!.bottom);
  });

  test("refuses columns that depend on each other", () => {
    const x = Float64Array.of(1, 2, 4);
    expect(() => exactCoefficients([x, x], Float64Array.of(1, 2, 3))).toThrow("depend on each other");
  });

  test("counts the digits of the worst coefficient", () => {
    const exact = [
      { top: 1n, bottom: 3n },
      { top: -2n, bottom: 1n },
    ];
    expect(correctDigits([1 / 3, -2], exact)).toBeGreaterThan(15.9);
    expect(correctDigits([1 / 3, -2.002], exact)).toBeCloseTo(3, 6);
    expect(correctDigits([0, -2], exact)).toBe(0);
    expect(correctDigits([Number.NaN, -2], exact)).toBe(0);
    expect(correctDigits([1 / 3], exact)).toBe(0);
  });

  test("agrees with a fit of a tame design to nine digits", () => {
    const { columns, response, coefficients } = collinearDesign(100, 400, 4, 5);
    const { intercept, slopes } = fitFast({ columns, response });
    expect(correctDigits([intercept, ...slopes], coefficients)).toBeGreaterThan(9);
    expect(
      correctDigits(
        [intercept, ...slopes].map((b) => b * 1.001),
        coefficients,
      ),
    ).toBeLessThan(3.01);
  });
});

test("the data are the same at every run, on columns that the design names", () => {
  const shape = { rows: 50, numeric: 3, levels: [3, 2] };
  const [one, two] = [drawData(shape), drawData(shape)];
  expect(one).toEqual(two);
  expect(one.columns).toHaveLength(3 + 2 + 1);
  expect(drawData(shape, 1).response).not.toEqual(one.response);
});
