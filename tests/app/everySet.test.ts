/** Every attribute set through the handlers, on the demo class: what it says is what each set's own model says. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import { type EverySet, leftOutFor } from "../../src/domain/attributeSets.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

const RULE = { kind: "error", share: 0.1 } as const;
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;
let found: EverySet;

beforeAll(async () => {
  handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
  found = await ask(model);
});

async function ask(asked: PriceModel, rule: object = RULE): Promise<EverySet> {
  return handlers.everySet({ classId, model: asked, subject, rule } as never);
}

async function priceOf(asked: PriceModel) {
  const { appraisal } = await handlers.appraise({ classId, model: asked, subject, levels: [0.9] } as never);
  return { price: appraisal.priced!.price, report: appraisal.report };
}

/** The model whose attribute set is this one. */
function modelOf(set: number): PriceModel {
  return { ...model, leftOut: leftOutFor(found, set, model) };
}

describe("every attribute set of the demo class", () => {
  test("has one mark for each set of the attributes known for the item, and the market in all of them", () => {
    expect(found.marks.price).toHaveLength(2 ** found.attributes.length);
    expect(found.attributes.map(({ key }) => key)).toContain("hours");
    expect(found.notKnown.map(({ key }) => key)).toEqual(["service_record"]);
    expect(found.current).toBe(2 ** found.attributes.length - 1);
    expect(found.cautions).toEqual([]);
  });

  test("prices each set as the model with that set prices the item, range and error too", async () => {
    const all = 2 ** found.attributes.length - 1;
    const age = 2 ** found.attributes.findIndex(({ key }) => key === "built");
    for (const set of [all, all - age, 0b1010101 & all, 3]) {
      const { price, report } = await priceOf(modelOf(set));
      expect(Math.abs(found.marks.price[set]! / price.amount - 1)).toBeLessThan(1e-8);
      expect(found.marks.error[set]! / report.looTypicalError!).toBeCloseTo(1, 4);
    }
  });

  test("lists sets with the price and range that choosing them gives", async () => {
    for (const one of found.listed.slice(0, 3)) {
      const { price } = await priceOf(modelOf(one.set));
      const range = price.rangeForOneSale[0]!;
      expect(Math.abs(one.price! / price.amount - 1)).toBeLessThan(1e-8);
      expect(Math.abs(one.low! / range.low - 1)).toBeLessThan(1e-8);
      expect(Math.abs(one.high! / range.high - 1)).toBeLessThan(1e-8);
    }
    const weights = found.listed.map(({ weight }) => weight!);
    expect(weights).toEqual([...weights].sort((a, b) => b - a));
    expect(sum(weights)).toBeLessThanOrEqual(1 + 1e-12);
    expect(found.listed.map(({ set }) => set)).toContain(found.current);
  });

  test("spans the price of the set in use, which is defensible here, and both averages lie inside", async () => {
    const { price } = await priceOf(model);
    expect(found.defensible).toContain(found.current);
    for (const amount of [price.amount, found.averaged!.price, found.stacked!.price]) {
      expect(amount).toBeGreaterThanOrEqual(found.price!.low);
      expect(amount).toBeLessThanOrEqual(found.price!.high);
    }
    expect(found.stacked!.error).toBeLessThanOrEqual(found.stacked!.errorOfBest);
  });

  test("widens the span with the rule, and narrows to the best set alone", async () => {
    const wide = await ask(model, { kind: "error", share: 0.5 });
    const best = await ask(model, { kind: "error", share: 0 });
    expect(best.defensible).toEqual([found.defensible[0]]);
    expect(wide.defensible.length).toBeGreaterThan(found.defensible.length);
    expect(wide.price!.low).toBeLessThanOrEqual(found.price!.low);
    expect(wide.price!.high).toBeGreaterThanOrEqual(found.price!.high);
    expect(wide.marks).toEqual(found.marks);
    for (const [k, { all, defensible, now }] of wide.coefficients.entries()) {
      expect(all.low).toBeLessThanOrEqual(defensible?.low ?? all.low);
      expect(all.high).toBeGreaterThanOrEqual(found.coefficients[k]!.defensible?.high ?? all.high);
      if (now !== null) expect(now).toBeGreaterThanOrEqual(all.low);
    }
  });

  test("hours alone are worth several times what they are beside age, with the sign kept [common practice, no source]", () => {
    const hours = found.coefficients.find(({ attribute }) => attribute === "hours")!;
    expect(hours.signs.above).toBe(0);
    expect(hours.all.low / hours.now!).toBeGreaterThan(2);
  });

  test("follows the model: with age left out that set is the current one, on the same prices", async () => {
    const without = await ask({ ...model, leftOut: ["built"] });
    const age = 2 ** found.attributes.findIndex(({ key }) => key === "built");
    expect(without.attributes.map(({ key }) => key)).toEqual(found.attributes.map(({ key }) => key));
    expect(without.current).toBe(found.current - age);
    without.marks.price.forEach((price, set) => {
      expect(price! / found.marks.price[set]!).toBeCloseTo(1, 9);
    });
  });
});

describe("shares of the demo class", () => {
  test("add up to R² and to the item's distance from the average price, by both rules", async () => {
    const { report, price } = await priceOf(model);
    const { shares, alwaysIn, r2, distance } = found.shares!;
    expect(r2).toBeCloseTo(report.r2!, 10);
    expect(sum(shares.map((one) => one.r2)) + alwaysIn.r2).toBeCloseTo(r2, 12);
    expect(sum(shares.map((one) => one.distance!)) + alwaysIn.distance!).toBeCloseTo(distance!, 11);
    const average = price.fitted - distance!;
    expect(Math.exp(average)).toBeGreaterThan(0);
    expect(found.shares!.sentences.join(" ")).toContain("not of what causes a price");
    expect(found.shares!.sentences.at(-1)).toMatch(/^The two rules part most on /);
  });
});

describe("what cannot be answered", () => {
  test("is refused without an item", async () => {
    await expect(
      (async () => handlers.everySet({ classId, model, subject: null, rule: RULE } as never))(),
    ).rejects.toThrow(/No item is described yet/);
  });

  test("is refused with too few sales, as a price is", async () => {
    const none = { ...model, filter: { ...model.filter, soldFrom: "2099-01-01" } };
    await expect((async () => ask(none))()).rejects.toThrow(/No sale is left/);
  });

  test("with every attribute left out there is nothing to share out, and the sets are the same", async () => {
    const none = await ask({ ...model, leftOut: model.attributes.map(({ key }) => key) });
    expect([none.current, none.shares]).toEqual([0, null]);
    expect(none.sharesRefused).toMatch(/nothing to share out/);
    expect(none.defensible).toEqual(found.defensible);
  });

  test("with coefficients pulled toward zero there is no average, and prices are still rounded alike", async () => {
    const ridge = await ask({ ...model, estimator: { kind: "ridge", penalty: null } });
    expect([ridge.averaged, ridge.stacked, ridge.doubt]).toEqual([null, null, null]);
    expect(ridge.step).toBeGreaterThanOrEqual(100);
    expect(ridge.headline).toMatch(/the price lies between €[\d,]+00 and €[\d,]+00\.$/);
  });

  test("a way of estimating that weighs sales is said to be kept for all sets", async () => {
    const huber = await ask({ ...model, estimator: { kind: "huber" } });
    expect(huber.cautions[0]).toContain("weights of the sales");
  });
});
