/** Several items priced together through the handlers, on the demo class. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;
const levels = [0.9];

beforeAll(async () => {
  handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
});

const lot = async (subjects: readonly Subject[]) => handlers.priceLot({ classId, model, subjects, levels } as never);

describe("several items together", () => {
  test("price one item as appraising it does, alone and as a sum", async () => {
    const found = await lot([subject]);
    const { priced } = (await handlers.appraise({ classId, model, subject, levels } as never)).appraisal;
    expect(found.items[0]!.amount / priced!.price.amount).toBeCloseTo(1, 12);
    expect(found.joint!.rangesOfAverage[0]!.low / priced!.price.rangeForOneSale[0]!.low).toBeCloseTo(1, 10);
    expect(found.notKnown.map(({ key }) => key)).toEqual(["service_record"]);
  });

  test("have a sum that is surer than one item as a share, less so than if no error were shared", async () => {
    const found = await lot([subject, subject, subject, subject]);
    const width = ({ low, high }: { low: number; high: number }): number => Math.log(high / low);
    const one = width(found.items[0]!.rangeForOneSale[0]!);
    const together = width(found.joint!.rangesOfAverage[0]!);
    expect(together).toBeLessThan(one);
    expect(together).toBeGreaterThan(one / 2);
  });

  test("are refused when they speak of different days", async () => {
    const other = { ...subject, effectiveOn: "2020-01-01" } as Subject;
    await expect(lot([subject, other])).rejects.toMatchObject({ code: "different-days" });
  });
});
