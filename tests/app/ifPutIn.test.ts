/** What left-out attributes would do if they came in: what putting them in does. */
import { expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

test("age put back changes coefficients and price as the model with it says", async () => {
  const handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  const { classId } = await handlers.openDemo({});
  const { model: whole } = await handlers.currentModel({ classId });
  const { subject } = (await handlers.loadDraft({ classId }))!;
  const priced = async (model: PriceModel) =>
    (await handlers.appraise({ classId, model, subject, levels: [0.9] } as never)).appraisal;
  const model = { ...whole, leftOut: ["built"] };
  const [now, then] = [await priced(model), await priced({ ...whole, leftOut: [] })];
  const { averagePrice } = now.report;
  const found = await handlers.ifPutIn({ classId, model, subject, averagePrice } as never);
  const age = found.find(({ key }) => key === "built")!;
  expect(age.priceMove).toBeCloseTo(then.priced!.price.amount - now.priced!.price.amount, 6);
  const hours = age.changes.find(({ attribute }) => attribute === "hours")!;
  expect(hours.from).toBeCloseTo(now.ledger.rows.find(({ attribute }) => attribute === "hours")!.money.coefficient, 6);
  const moneyThen = then.report.coefficients.find(({ attribute }) => attribute === "hours")!.moneyPerStep!;
  expect(hours.to * then.report.averagePrice).toBeCloseTo(moneyThen * averagePrice, 2);
  expect(age.own).toHaveLength(1);
  expect(age.own[0]!.money).toBeLessThan(0);
});
