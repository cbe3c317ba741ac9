/** Comparing through the handlers, on the demo class: two sets, two editions, and what cannot be compared. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { Comparison } from "../../src/domain/comparison.ts";
import type { Edition, PriceModel } from "../../src/domain/priceModel.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;
let before: Edition;
let after: Edition;

beforeAll(async () => {
  handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
  before = await handlers.saveEdition({ classId, model } as never);
  const { rows } = await handlers.listSales({
    classId,
    offset: 0,
    limit: 12,
    sort: { by: "price", descending: true },
    filter: {
      search: "",
      soldFrom: null,
      soldTo: null,
      channels: ["dealer"],
      state: "in",
      verified: "any",
      batchId: null,
      values: {},
    },
  });
  await handlers.setAsideSales({ classId, saleIds: rows.map(({ id }) => id), reason: "tried" });
  after = await handlers.saveEdition({ classId, model } as never);
});

async function compare(first: object, second: object): Promise<Comparison> {
  return handlers.compare({ classId, first, second, subject, level: 0.9 } as never);
}

function total({ causes }: Comparison): number {
  return causes.reduce((sum, { amount }) => sum + amount, 0);
}

describe("two attribute sets on the same sales", () => {
  test("share the move of the price out over the attributes that differ", async () => {
    const found = await compare({ model }, { model: { ...model, leftOut: ["built", "tyres_left"] } });
    const [first, second] = found.sides;
    expect(found.causes.map(({ kind }) => kind)).toEqual(["attribute", "attribute"]);
    expect(found.causes.map(({ label }) => label)).toContain("Leaving out age");
    expect(total(found)).toBeCloseTo(second.price!.amount - first.price!.amount, 6);
    expect(found.sales).toMatchObject({ onlyFirst: 0, onlySecond: 0, both: first.saleCount });
    const hours = found.coefficients.find(({ attribute }) => attribute === "hours")!;
    expect(hours.second!).toBeLessThan(hours.first!);
    expect(hours.parts.reduce((sum, part) => sum + part.amount, 0)).toBeCloseTo(hours.difference!, 6);
    expect(found.cautions).toEqual([]);
  });
});

describe("two editions", () => {
  test("name the sales that only one rests on, and what they do to the price", async () => {
    const found = await compare({ editionId: before.id }, { editionId: after.id });
    expect(found.sides.map(({ editionNumber }) => editionNumber)).toEqual([before.number, after.number]);
    expect(found.sales.onlyFirst).toBeGreaterThan(0);
    expect(found.sales.onlySecond).toBe(0);
    expect(found.sales.both).toBe(found.sides[1].saleCount);
    expect(found.sales.listed.every(({ side, moves }) => side === 1 && moves !== null)).toBe(true);
    expect(found.causes.map(({ kind }) => kind)).toEqual(["sales"]);
    expect(total(found)).toBeCloseTo(found.sides[1].price!.amount - found.sides[0].price!.amount, 6);
    expect(found.cautions[0]).toMatch(/cannot be split exactly/);
  });

  test("share out over attributes, sales and settings at once when all of them differ", async () => {
    const other = { ...model, leftOut: ["built"], market: "none" as const };
    const found = await compare({ editionId: before.id }, { model: other });
    expect(found.causes.map(({ kind }) => kind).sort()).toEqual(["attribute", "sales", "settings"]);
    expect(total(found)).toBeCloseTo(found.sides[1].price!.amount - found.sides[0].price!.amount, 6);
    expect(found.headline).toMatch(/^Edition \d+ prices the item at €[\d,]+, the model without age at €[\d,]+: /);
  });

  test("are refused when there is no such edition", async () => {
    await expect(compare({ editionId: 999 }, { model })).rejects.toThrow(/no such edition/i);
  });
});
