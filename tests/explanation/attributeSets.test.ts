/** Every attribute set at once says what a fit of each set by itself says, and counts, spans and averages them truly. */
import { describe, expect, test } from "vitest";
import { attributeSets, criteria } from "../../src/explanation/attributeSets.ts";
import { fitColumns, plainRule } from "../../src/hedonic/fitPriceModel.ts";
import { numbersOf, valueAt } from "../../src/numerics/column.ts";
import { estimatePrice } from "../../src/valuation/estimatePrice.ts";
import { plainDesign } from "../fixtures/plainDesign.ts";
import { drawFrom } from "../fixtures/randomClass.ts";
import { referenceSales } from "../fixtures/referenceSales.ts";

/** 80 invented sales: age and hours move together, a choice of three makes, a yes/no that does nothing, a market line. */
function drawn(seed: number, ln = true) {
  const draw = drawFrom(seed);
  const n = 80;
  const age = Float64Array.from({ length: n }, () => 10 * draw());
  const hours = age.map((years) => 800 * years + 2500 * draw());
  const make = Array.from({ length: n }, () => Math.floor(3 * draw()));
  const coupler = Float64Array.from({ length: n }, () => Math.round(draw()));
  const month = Float64Array.from({ length: n }, (_, i) => i / 2);
  const prices = age.map((years, i) => {
    const noise = 0.2 * (draw() + draw() - 1);
    return 40000 * Math.exp(-0.06 * years - hours[i]! / 60000 + 0.1 * make[i]! + 0.002 * month[i]! + noise);
  });
  const design = plainDesign(
    [
      { key: "age", values: age, kind: "line" },
      { key: "hours", values: hours, kind: "line" },
      { key: "make", values: make, kind: "choice" },
      { key: "coupler", values: coupler, kind: "yesNo" },
      { key: "market", values: month, kind: "line" },
    ],
    prices,
    { ln },
  );
  const groups = design.groups.map((group) => ({ ...group, isMarket: group.key === "market" }));
  return { design: { ...design, groups }, groups, row: { x: Float64Array.of(4, 5200, 1, 0, 1, 39), notKnown: [] } };
}

describe.each([true, false])("every set of four attributes beside the market; ln: %s", (ln) => {
  const { design, groups, row } = drawn(11, ln);
  const fit = fitColumns(design, [groups[0]!, groups[2]!, groups[4]!]);
  const found = attributeSets({ reference: groups, fit, row, currencyCode: "EUR" });
  const fits = Array.from({ length: 16 }, (_, set) =>
    fitColumns(design, [...groups.filter((_, g) => g < 4 && (set >> g) % 2 === 1), groups[4]!]),
  );
  const priced = fits.map((one) => estimatePrice(one, row, [0.9], null));

  test("has the price, range, fit and error of each fitted by itself", () => {
    expect(found.attributes.map(({ key }) => key)).toEqual(["age", "hours", "make", "coupler"]);
    expect(found.alwaysIn.map(({ key }) => key)).toEqual(["market"]);
    expect(found.errorKind).toBe("leave-one-out");
    fits.forEach(({ solution, leverages }, set) => {
      const { amount, rangeForOneSale } = priced[set]!;
      expect(found.figures.price[set]! / amount).toBeCloseTo(1, 11);
      expect(found.figures.low[set]! / rangeForOneSale[0]!.low).toBeCloseTo(1, 10);
      expect(found.figures.high[set]! / rangeForOneSale[0]!.high).toBeCloseTo(1, 10);
      const press = solution.residuals.reduce((sum, e, i) => sum + (e / (1 - leverages[i]!)) ** 2, 0);
      const rms = Math.sqrt(press / 80);
      expect(found.figures.error[set]! / (ln ? Math.expm1(rms) : rms / solution.responseMean)).toBeCloseTo(1, 10);
      const p = solution.rank;
      const deviance = 80 * (Math.log((2 * Math.PI * solution.residualSumOfSquares) / 80) + 1);
      expect(found.figures.aicc[set]).toBeCloseTo(deviance + 2 * (p + 1) + (2 * (p + 1) * (p + 2)) / (80 - p - 2), 8);
      expect(found.figures.bic[set]).toBeCloseTo(deviance + (p + 1) * Math.log(80), 8);
      expect(found.figures.generalisedError[set]).toBeCloseTo(
        Math.sqrt(80 * solution.residualSumOfSquares) / (80 - p),
        ln ? 10 : 5,
      );
    });
  });

  test("counts as defensible what errs within a tenth of the best, best first", () => {
    const error = found.figures.error as number[];
    const best = Math.min(...error);
    expect([...found.defensible].sort((a, b) => a - b)).toEqual(
      error.flatMap((one, set) => (one <= 1.1 * best ? [set] : [])),
    );
    expect(error[found.defensible[0]!]).toBe(best);
    expect(found.defensible.length).toBeGreaterThan(1);
    expect(found.sentences[0]).toContain(`${found.defensible.length} of 16 attribute sets are defensible`);
    const amounts = found.defensible.map((set) => priced[set]!.amount);
    expect(found.price!.low / Math.min(...amounts)).toBeCloseTo(1, 11);
    expect(found.price!.high / Math.max(...amounts)).toBeCloseTo(1, 11);
  });

  test("can count by AICc instead", () => {
    const byAicc = attributeSets({
      reference: groups,
      fit,
      row,
      currencyCode: "EUR",
      rule: { kind: "aicc", distance: 4 },
    });
    const aicc = byAicc.figures.aicc as number[];
    const best = Math.min(...aicc);
    expect(byAicc.defensible.every((set) => aicc[set]! <= best + 4)).toBe(true);
    expect(byAicc.defensible).toHaveLength(aicc.filter((one) => one <= best + 4).length);
    expect(byAicc.sentences[0]).toContain("AICc within 4 of the best");
  });

  test("spans each coefficient over all sets that have it, counts its signs, and knows the one in use", () => {
    const hours = found.coefficients.find(({ attribute }) => attribute === "hours")!;
    const values = fits.flatMap(({ columns, solution }) => {
      const at = columns.indexOf(1);
      return at < 0 ? [] : [solution.slopes[at]!];
    });
    expect(values).toHaveLength(8);
    expect(hours.all.low / Math.min(...values)).toBeCloseTo(1, 9);
    expect(hours.all.high / Math.max(...values)).toBeCloseTo(1, 9);
    expect(hours.signs).toEqual({ above: 0, below: 8 });
    expect(hours.now).toBeNull();
    const age = found.coefficients.find(({ attribute }) => attribute === "age")!;
    expect(age.now! / fit.solution.slopes[0]!).toBeCloseTo(1, 10);
    const average = ln ? Math.exp(fit.solution.responseMean) : fit.solution.responseMean;
    const money = ln ? average * Math.expm1(fit.solution.slopes[0]!) : fit.solution.slopes[0]!;
    expect(age.money.now! / money).toBeCloseTo(1, 9);
    expect(found.coefficients.map(({ level }) => level)).toContain("level 2");
  });

  test("says what switching one attribute does, from the current set and over all pairs", () => {
    expect(found.current).toBe(0b101);
    const coupler = found.switches[3]!;
    expect(coupler.priceSwitched! / priced[0b1101]!.amount).toBeCloseTo(1, 11);
    const changes = Array.from({ length: 8 }, (_, set) => priced[set + 8]!.amount - priced[set]!.amount);
    expect(coupler.pairs).toBe(8);
    expect(coupler.mean! / (changes.reduce((sum, one) => sum + one, 0) / 8)).toBeCloseTo(1, 7);
    const moves = [0b100, 0b111, 0b001, 0b1101].map((set) => Math.abs(priced[set]!.amount - priced[0b101]!.amount));
    expect(found.movesMost).toBe(["age", "hours", "make", "coupler"][moves.indexOf(Math.max(...moves))]);
    for (const { key, inDefensible } of found.switches) {
      const bit = 1 << ["age", "hours", "make", "coupler"].indexOf(key);
      const having = found.defensible.filter((set) => (set & bit) !== 0).length;
      expect(inDefensible).toBe(having === 0 ? "never" : having === found.defensible.length ? "always" : "sometimes");
    }
  });

  test("averages prices by Akaike weight, doubt about the set widening the range", () => {
    const aicc = found.figures.aicc as number[];
    const best = Math.min(...aicc);
    const raw = aicc.map((one) => Math.exp((best - one) / 2));
    const total = raw.reduce((sum, one) => sum + one, 0);
    const mean = raw.reduce((sum, one, set) => sum + (one / total) * priced[set]!.fitted, 0);
    const averaged = found.averaged!;
    expect(averaged.price / (ln ? Math.exp(mean) : mean)).toBeCloseTo(1, 11);
    expect(averaged.addedWidth).toBeGreaterThan(0);
    expect(averaged.low).toBeLessThan(averaged.price);
    expect(averaged.weights[0]!.weight).toBeCloseTo(1 / total, 10);
    expect(averaged.weights.every(({ weight }) => weight > 0.01)).toBe(true);
  });

  test("averages by stacking: no mixture of the defensible sets errs less on sales priced without themselves", () => {
    const stacked = found.stacked!;
    const lists = found.defensible.map((set) => {
      const { solution, leverages } = fits[set]!;
      return solution.residuals.map((e, i) => e / (1 - leverages[i]!));
    });
    const typical = (weights: readonly number[]): number => {
      const sum = lists[0]!.reduce((total, _, i) => {
        return total + weights.reduce((error, weight, k) => error + weight * lists[k]![i]!, 0) ** 2;
      }, 0);
      const rms = Math.sqrt(sum / 80);
      return ln ? Math.expm1(rms) : rms / fit.solution.responseMean;
    };
    const weightOf = new Map(stacked.weights.map(({ set, weight }) => [set, weight]));
    const weights = found.defensible.map((set) => weightOf.get(set) ?? 0);
    expect(stacked.over).toBe(found.defensible.length);
    expect(stacked.error / typical(weights)).toBeCloseTo(1, 4);
    expect(stacked.errorOfBest / found.figures.error[found.defensible[0]!]!).toBeCloseTo(1, 10);
    expect(stacked.error).toBeLessThanOrEqual(stacked.errorOfBest);
    const draw = drawFrom(3);
    for (let trial = 0; trial < 200; trial++) {
      const raw = weights.map(() => -Math.log(1 - draw()));
      const total = raw.reduce((sum, one) => sum + one, 0);
      expect(stacked.error).toBeLessThan(typical(raw.map((one) => one / total)) * (1 + 1e-12));
    }
    const mean = weights.reduce((sum, weight, k) => sum + weight * priced[found.defensible[k]!]!.fitted, 0);
    expect(stacked.price / (ln ? Math.exp(mean) : mean)).toBeCloseTo(1, 4);
    expect(stacked.addedWidth).toBeGreaterThanOrEqual(0);
  });

  test("is plain JSON data", () => {
    expect(JSON.parse(JSON.stringify(found))).toEqual(found);
  });
});

describe("what cannot be said is not said", () => {
  test("an attribute the subject has no value for is in no set, and without a subject there are no prices", () => {
    const { design, groups, row } = drawn(12);
    const x = row.x.slice();
    x[1] = Number.NaN;
    const fit = fitColumns(design, [groups[0]!, groups[4]!]);
    const found = attributeSets({ reference: groups, fit, row: { x, notKnown: ["hours"] }, currencyCode: "EUR" });
    expect(found.attributes.map(({ key }) => key)).toEqual(["age", "make", "coupler"]);
    expect(found.notKnown.map(({ key }) => key)).toEqual(["hours"]);
    const none = attributeSets({ reference: groups, fit, row: null, currencyCode: "EUR" });
    expect([none.price, none.averaged, none.movesMost]).toEqual([null, null, null]);
    expect(none.figures.price.every((price) => price === null)).toBe(true);
    expect(none.figures.error.every((error) => error !== null)).toBe(true);
  });

  test("a product counts only beside both of its attributes", () => {
    const { design, groups, row } = drawn(13);
    const product = { ...groups[3]!, key: "age*hours" };
    const reference = [groups[0]!, groups[1]!, product, groups[4]!];
    const found = attributeSets({ reference, fit: fitColumns(design, reference), row, currencyCode: "EUR" });
    expect(found.figures.price.map((price) => price !== null)).toEqual([
      true,
      true,
      true,
      true,
      false,
      false,
      false,
      true,
    ]);
    expect(found.sentences[0]).toContain("of 5 attribute sets");
  });

  test("under a penalty there are prices and errors, but no range and no weight by AICc", () => {
    const { design, groups, row } = drawn(14);
    const rule = { ...plainRule(design), penalty: Float64Array.of(90, 1e5, 4, 4, 4, 0) };
    const fit = fitColumns(design, groups, rule);
    const found = attributeSets({ reference: groups, fit, row, currencyCode: "EUR" });
    expect(found.figures.price[15]! / estimatePrice(fit, row, [], null).amount).toBeCloseTo(1, 11);
    expect([found.figures.low[15], found.figures.aicc[15], found.averaged]).toEqual([null, null, null]);
    expect(found.stacked).toBeNull();
    expect(found.figures.error[15]).toBeGreaterThan(0);
  });

  test("of more than fifteen attributes those that the fit can least do without are in every set", () => {
    const draw = drawFrom(15);
    const values = Array.from({ length: 17 }, () => Float64Array.from({ length: 60 }, () => draw()));
    const prices = values[0]!.map((_, i) => 100 + 90 * values[3]![i]! + 80 * values[8]![i]! + draw());
    const design = plainDesign(
      values.map((one, j) => ({ key: `a${j}`, values: one, kind: "line" as const })),
      prices,
    );
    const found = attributeSets({
      reference: design.groups,
      fit: fitColumns(design, design.groups),
      row: { x: Float64Array.from(values, (one) => one[7]!), notKnown: [] },
      currencyCode: "EUR",
    });
    expect(found.alwaysIn.map(({ key }) => key)).toEqual(["a3", "a8"]);
    expect(found.figures.price).toHaveLength(32768);
    expect(found.sentences.at(-1)).toBe(
      "Of 17 attributes 15 can be in or out in every combination; A3 and A8, which the fit can least do without, are in every set.",
    );
  });
});

test("many sales in many sets are tried by tenths, and the best sets exactly besides", () => {
  const draw = drawFrom(16);
  const values = Array.from({ length: 12 }, () => Float64Array.from({ length: 25000 }, () => draw()));
  const prices = values[0]!.map((one, i) => 100 + 20 * one + 9 * values[1]![i]! + 8 * draw());
  const design = plainDesign(
    values.map((one, j) => ({ key: `a${j}`, values: one, kind: "line" as const })),
    prices,
  );
  const fit = fitColumns(design, design.groups.slice(0, 3));
  const found = attributeSets({ reference: design.groups, fit, row: null, currencyCode: "EUR" });
  expect(found.errorKind).toBe("ten-folds");
  expect(found.leaveOneOut).toHaveLength(20);
  expect(found.leaveOneOut[0]!.set).toBe(found.current);
  const { leverages, solution } = fit;
  const press = solution.residuals.reduce((sum, e, i) => sum + (e / (1 - leverages[i]!)) ** 2, 0);
  expect(found.leaveOneOut[0]!.error / (Math.sqrt(press / 25000) / solution.responseMean)).toBeCloseTo(1, 10);
  expect(Math.abs(found.figures.error[found.current]! / found.leaveOneOut[0]!.error - 1)).toBeLessThan(1e-3);
});

test("criteria agree with the published ones of the houses", () => {
  const { expected } = referenceSales("houseprices");
  const { AIC, BIC, sse } = expected.ols;
  const { aicc, bic } = criteria(sse, 546, 12);
  expect(aicc).toBeCloseTo(AIC + (2 * 13 * 14) / (546 - 14), 8);
  expect(bic).toBeCloseTo(BIC, 8);
});

describe("600 stones, whose size is said three times over", () => {
  const stones = referenceSales("diamonds600");
  const columns = stones.terms.flatMap((key, t) =>
    stones.groups[t]!.map((j) => ({ key: stones.groups[t]!.length > 1 ? stones.names[j]! : key, j })),
  );
  const plain = plainDesign(
    columns.map(({ key, j }) => ({ key, values: numbersOf(stones.columns[j]!), kind: "line" as const })),
    stones.response.map(Math.exp),
    { ln: true },
  );
  const groups = stones.terms.map((key, t) => ({
    ...plain.groups[0]!,
    key,
    label: key,
    columns: stones.groups[t]!.map((j) => columns.findIndex((one) => one.j === j)),
  }));
  const design = { ...plain, groups };
  const row = { x: Float64Array.from(columns, ({ j }) => valueAt(stones.columns[j]!, 17)), notKnown: [] };
  const found = attributeSets({ reference: groups, fit: fitColumns(design, groups), row, currencyCode: "EUR" });

  test("reports by itself that cut, colour and clarity turn their signs where size is left out", () => {
    const turning = found.coefficients.filter(({ signs: { above, below } }) => above > 0 && below > 0);
    const quality = (word: string) => turning.filter(({ attribute }) => attribute === word).length;
    for (const key of ["cut", "color", "clarity"]) expect([key, quality(key) > 0]).toEqual([key, true]);
    const ladder = stones.expected.ladder.models;
    const ofClarity = found.coefficients.find(({ attribute, all }) => attribute === "clarity" && all.low < -1)!;
    expect(ofClarity.all.low).toBeLessThanOrEqual(ladder.M1.coefficients.clarityVVS1 + 1e-9);
    expect(ofClarity.now).toBeGreaterThan(0);
    expect(found.turns).toMatch(/coefficients change sign somewhere in the \d+ sets \(/);
  });
});
