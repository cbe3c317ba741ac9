/** The health of the demo's model through the handlers, and the market index against a planted one. */
import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { computeAppraisal } from "../../src/app/computeAppraisal.ts";
import { createHandlers } from "../../src/app/handlers.ts";
import { marketIndex } from "../../src/hedonic/marketIndex.ts";
import { percentEffect } from "../../src/numerics/percentEffect.ts";
import { openStore } from "../../src/store/openStore.ts";
import { CLASS, model as drawnModel, sales } from "../fixtures/randomClass.ts";
import { testPorts } from "./ports.ts";

describe("health of the demo class", () => {
  test("names every check with a sentence and what to do, and the power and index beside them", async () => {
    const handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
    const { classId } = await handlers.openDemo({});
    const { model } = await handlers.currentModel({ classId });
    const health = await handlers.health({ classId, model, subject: null } as never);
    expect(health.checks.length).toBeGreaterThan(4);
    expect(health.checks.every(({ sentence, whatToDo, label }) => sentence && whatToDo && label)).toBe(true);
    const order = health.checks.map(({ verdict }) => ["trouble", "look", "fine"].indexOf(verdict));
    expect([...order].sort((a, b) => a - b)).toEqual(order);
    expect(health.power!.best).toBeGreaterThan(-1);
    expect(health.power!.best).toBeLessThan(1);
    expect(health.responses!.lnPrice.rootMeanSquare).toBeGreaterThan(0);
    expect(health.index[0]).toMatchObject({ level: 100, low95: 100, high95: 100 });
    expect(health.index.every(({ level, low95, high95 }) => low95 <= level && level <= high95)).toBe(true);
    expect(health.headline.length).toBeGreaterThan(20);
  });
});

describe("percentEffect", () => {
  interface Effects {
    readonly df: number;
    readonly effects: Record<
      string,
      { halvorsenPalmquist: number; kennedy: number; vanGarderenShahExact: number; approxVar: number }
    >;
    readonly coefficients: Record<string, number>;
    readonly se: Record<string, number>;
  }
  const read = (name: string) =>
    JSON.parse(readFileSync(new URL(`../reference/timedummy/${name}`, import.meta.url), "utf8"));

  test.each(["houseprices", "diamonds600"])("is that of the yes/no columns of %s", (name) => {
    const { df, effects, coefficients, se } = read("percentEffects.json")[name] as Effects;
    for (const [column, expected] of Object.entries(effects)) {
      const found = percentEffect(coefficients[column]!, se[column]! ** 2, df);
      expect(found.naive / expected.halvorsenPalmquist).toBeCloseTo(1, 10);
      expect(found.kennedy / expected.kennedy).toBeCloseTo(1, 10);
      expect(found.unbiased / expected.vanGarderenShahExact).toBeCloseTo(1, 9);
      expect(found.variance / expected.approxVar).toBeCloseTo(1, 9);
    }
  });

  test("gives the planted price index, period by period", () => {
    const { dfResidual, index } = read("expected.json") as {
      dfResidual: number;
      index: { delta: string; se: string; naive: string; kennedy: string; exactUnbiased: string }[];
    };
    for (const one of index) {
      const found = percentEffect(Number(one.delta), Number(one.se) ** 2, dfResidual);
      expect((100 + found.naive) / Number(one.naive)).toBeCloseTo(1, 12);
      expect((100 + found.kennedy) / Number(one.kennedy)).toBeCloseTo(1, 12);
      expect((100 + found.unbiased) / Number(one.exactUnbiased)).toBeCloseTo(1, 10);
    }
  });
});

describe("marketIndex", () => {
  const run = (market: "line" | "quarters" | "none", response: "price" | "lnPrice") => {
    const columns = sales({ seed: 8, count: 150, together: 0.5 });
    const input = {
      assetClass: CLASS,
      sales: columns,
      model: drawnModel({ market, response }),
      subject: null,
      levels: [0.9],
    };
    return computeAppraisal(input);
  };

  test("by quarter is the coefficient of the quarter, less half its variance", () => {
    const { fit, errors, appraisal } = run("quarters", "lnPrice");
    const index = marketIndex(fit, errors);
    const last = appraisal.report.coefficients.filter(({ attribute }) => attribute === "market").at(-1)!;
    expect(index.at(-1)!.level).toBeCloseTo(100 * Math.exp(last.estimate - last.standardError! ** 2 / 2), 8);
    expect(index.at(-1)!.high95).toBeCloseTo(100 * Math.exp(last.high95!), 8);
    expect(index.reduce((sum, { sales: count }) => sum + count, 0)).toBe(150);
  });

  test("of a plain price is in shares of the average price, and of no movement there is none", () => {
    const { fit, errors } = run("line", "price");
    const [first, second] = marketIndex(fit, errors);
    expect(first!.level).toBe(100);
    expect(second!.level).not.toBe(100);
    const none = run("none", "lnPrice");
    expect(marketIndex(none.fit, none.errors)).toEqual([]);
  });
});
