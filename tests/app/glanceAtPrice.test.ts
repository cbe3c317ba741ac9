/** A price at a glance is the price of `appraise` to eight digits, or none; it is never called final. */
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { appraise, currentModel } from "../../src/app/appraiseSubject.ts";
import { openableDemos } from "../../src/app/demo/demoClasses.ts";
import { glance } from "../../src/app/glanceAtPrice.ts";
import { openDemo } from "../../src/app/openDemo.ts";
import type { Ports } from "../../src/app/ports.ts";
import { rememberEvidence } from "../../src/app/rememberEvidence.ts";
import type { RequestInput } from "../../src/contract/requests.ts";
import type { NewAssetClass } from "../../src/domain/assetClass.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { SaleColumns } from "../../src/domain/sale.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { attribute, CLASS, model, SUBJECT, sales } from "../fixtures/randomClass.ts";
import { testPorts } from "./ports.ts";

const RELATIVE = 1e-8;
const LEVELS = [0.5, 0.9];

/** A class in memory behind the two requests. */
function openClass(assetClass: NewAssetClass, columns: SaleColumns) {
  const store = {
    assetClasses: { get: () => ({ ...assetClass, id: 1, dataVersion: 1 }) },
    sales: { readColumns: () => columns },
    editions: { latest: () => null },
  };
  return openStored({ store } as unknown as Ports, 1);
}

function openStored(ports: Ports, classId: number) {
  const memory = rememberEvidence();
  const input = (wanted: PriceModel, subject: Subject) =>
    ({ classId, model: wanted, subject, levels: LEVELS }) as RequestInput<"glance">;
  return {
    usual: () => currentModel(ports, { classId } as RequestInput<"currentModel">).model,
    glance: (wanted: PriceModel, subject: Subject = SUBJECT) => glance(ports, memory, input(wanted, subject)),
    appraise: (wanted: PriceModel, subject: Subject = SUBJECT) =>
      appraise(ports, memory, input(wanted, subject)).appraisal,
  };
}

type Opened = ReturnType<typeof openClass>;

function near(found: number, wanted: number): void {
  expect(Math.abs(found - wanted)).toBeLessThanOrEqual(RELATIVE * Math.abs(wanted));
}

function same(opened: Opened, wanted: PriceModel, subject: Subject = SUBJECT): void {
  const glanced = opened.glance(wanted, subject)!;
  const { report, priced } = opened.appraise(wanted, subject);
  expect(glanced.isFinal).toBe(false);
  near(glanced.price.amount, priced!.price.amount);
  expect(glanced.price.rangeForOneSale).toHaveLength(LEVELS.length);
  priced!.price.rangeForOneSale.forEach(({ level, low, high }, at) => {
    const range = glanced.price.rangeForOneSale[at]!;
    expect(range.level).toBe(level);
    near(range.low, low);
    near(range.high, high);
  });
  expect(new Set(glanced.coefficients.map((one) => one.attribute))).toEqual(new Set(report.attributes));
}

const withTwins: NewAssetClass = {
  ...CLASS,
  attributes: [...CLASS.attributes, attribute("power"), attribute("horses"), attribute("total")],
};

/** horses = 1.25 × power, total = hours + power. */
function twinSales(): SaleColumns {
  const columns = sales({ seed: 8, count: 200, together: 0.4 });
  const power = columns.values.pull!.map((pull, i) => Math.round(20 + 3 * pull + (i % 7)));
  const horses = power.map((value) => 1.25 * value);
  const total = power.map((value, i) => value + columns.values.hours![i]!);
  return { ...columns, values: { ...columns.values, power, horses, total } };
}

const KEYS = ["hours", "pull", "built", "make", "remote"];
const TWINS = ["power", "horses", "total"];
const twinModel = (change: Partial<PriceModel> = {}): PriceModel => {
  const plain = model();
  const attributes = [...plain.attributes, ...TWINS.map((key) => ({ key, form: "line" as const, reference: null }))];
  return { ...plain, attributes, ...change };
};
const twinSubject = { ...SUBJECT, values: { ...SUBJECT.values, power: 40, horses: 50, total: 4240 } };

describe("a glance", () => {
  test("is the price of appraise to eight digits, whatever is left out or not known", () => {
    const opened = openClass(CLASS, sales({ seed: 3, count: 120, together: 0.6 }));
    opened.appraise(model());
    const drawn = fc.record({
      leftOut: fc.subarray(KEYS),
      notKnown: fc.subarray(KEYS),
      response: fc.constantFrom("lnPrice" as const, "price" as const),
    });
    fc.assert(
      fc.property(drawn, ({ leftOut, notKnown, response }) => {
        const values = Object.fromEntries(Object.entries(SUBJECT.values).filter(([key]) => !notKnown.includes(key)));
        opened.appraise(model({ response }));
        same(opened, model({ leftOut, response }), { ...SUBJECT, values });
      }),
      { seed: 21, numRuns: 60 },
    );
  });

  test("is the price of appraise on every demo class, with each attribute left out in turn", () => {
    const ports = testPorts();
    openDemo(ports, openableDemos());
    const demos = openableDemos();
    expect(demos.length).toBeGreaterThan(1);
    for (const { assetClass, marks } of demos) {
      const classId = ports.store.assetClasses.findByName(assetClass.name)!;
      const opened = openStored(ports, classId);
      const usual = opened.usual();
      opened.appraise(usual, marks.subject);
      same(opened, usual, marks.subject);
      for (const { key } of usual.attributes) same(opened, { ...usual, leftOut: [key] }, marks.subject);
    }
  });

  test("takes older sales for less, products for the columns they are, and a product away with its attribute", () => {
    const opened = openClass(CLASS, sales({ seed: 4, count: 150, together: 0.3 }));
    const wanted = model({ halfLifeMonths: 12, range: "exact", interactions: [{ a: "hours", b: "remote" }] });
    opened.appraise(wanted);
    same(opened, wanted);
    same(opened, { ...wanted, leftOut: ["remote"] });
    same(opened, wanted);
  });

  test("leaves out of attributes that repeat each other the same one as appraise", () => {
    const opened = openClass(withTwins, twinSales());
    opened.appraise(twinModel(), twinSubject);
    fc.assert(
      fc.property(fc.subarray([...KEYS, ...TWINS]), fc.subarray(TWINS), (leftOut, notKnown) => {
        const known = Object.entries(twinSubject.values).filter(([key]) => !notKnown.includes(key));
        same(opened, twinModel({ leftOut }), { ...twinSubject, values: Object.fromEntries(known) });
      }),
      { seed: 22, numRuns: 80 },
    );
  });

  test("is none before the evidence is in memory, after another version of the model's columns, and for what moments cannot say", () => {
    const opened = openClass(CLASS, sales({ seed: 5, count: 60, together: 0.5 }));
    expect(opened.glance(model())).toBeNull();
    opened.appraise(model());
    expect(opened.glance(model())).not.toBeNull();
    expect(opened.glance(model({ market: "none" }))).toBeNull();
    expect(opened.glance(model({ estimator: { kind: "huber" } }))).toBeNull();
    expect(opened.glance(model({ range: "jackknife+" }))).toBeNull();
    opened.appraise(model({ halfLifeMonths: 12 }));
    expect(opened.glance(model({ halfLifeMonths: 12 }))).toBeNull();
    const pooled = model().attributes.map((one) => (one.key === "make" ? { ...one, rare: "pool" as const } : one));
    opened.appraise(model({ attributes: pooled }));
    expect(opened.glance(model({ attributes: pooled }))).toBeNull();
  });

  test("is none where columns are so nearly dependent that moments hold fewer than eight digits", () => {
    const columns = twinSales();
    const horses = columns.values.power!.map((power, i) => 1.25 * power + ((i * 37) % 11) * 1e-5);
    const opened = openClass(withTwins, { ...columns, values: { ...columns.values, horses } });
    opened.appraise(twinModel({ leftOut: ["total"] }), twinSubject);
    expect(opened.glance(twinModel({ leftOut: ["total"] }), twinSubject)).toBeNull();
    same(opened, twinModel({ leftOut: ["total", "horses"] }), twinSubject);
  });

  test("is none without residual degrees of freedom", () => {
    const opened = openClass(CLASS, sales({ seed: 6, count: 8, together: 0.5 }));
    opened.appraise(model({ leftOut: ["make", "remote"] }));
    expect(() => opened.appraise(model())).toThrow(expect.objectContaining({ code: "too-few-sales" }));
    expect(opened.glance(model())).toBeNull();
  });
});
