/** What moves together and the ways on, through the handlers: each preview is what the changed model then gives. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { MovingReport } from "../../src/domain/movingTogether.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;
let found: MovingReport;

beforeAll(async () => {
  handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
  found = await handlers.waysOn({ classId, model, subject, level: 0.9 } as never);
});

async function appraised(asked: PriceModel) {
  return (await handlers.appraise({ classId, model: asked, subject, levels: [0.9] } as never)).appraisal;
}

describe("what moves together in the demo class", () => {
  test("names age and hours as moving together, as common practice has it, and says that the price does not suffer", () => {
    const keys = found.groups.map(({ members }) => members.map(({ key }) => key));
    expect(keys, JSON.stringify(found.groups)).toContainEqual(expect.arrayContaining(["built", "hours"]));
    expect(found.priceSentence).toMatch(/^The price does not suffer/);
    for (const { times } of found.groups[0]!.members) expect(times).toBeGreaterThan(1);
  });

  test("offers to keep, to leave out each, and to blend in two ways", () => {
    const members = found.groups[0]!.members.length;
    expect(found.ways.map(({ kind }) => kind)).toEqual([
      "keep",
      ...Array.from({ length: members }, () => "leaveOut"),
      "blend",
      "blend",
    ]);
    expect(found.ways.every(({ refused }) => refused === null)).toBe(true);
  });

  test("previews for each way the price, range, error and readings that its model then gives, to the bit", async () => {
    for (const way of found.ways) {
      const { priced, report } = await appraised(way.model);
      const [range] = priced!.price.rangeForOneSale;
      expect(way.price).toEqual({ amount: priced!.price.amount, low: range!.low, high: range!.high });
      expect(way.looTypicalError).toBe(report.looTypicalError);
      for (const read of way.reads)
        expect(report.coefficients.map(({ moneyPerStep }) => moneyPerStep)).toContain(read.money);
    }
  });

  test("takes with an attribute its copies, so that what is left is told more surely", async () => {
    const [keep, ...others] = found.ways;
    const keys = found.groups[0]!.members.map(({ key }) => key);
    const copies = found.dependencies.flatMap(({ choices }) =>
      choices.some(({ key }) => keys.includes(key))
        ? choices.map(({ key }) => key).filter((key) => !keys.includes(key))
        : [],
    );
    expect(copies.length).toBeGreaterThan(0);
    const widthOf = ({ low95, high95 }: MovingReport["ways"][number]["reads"][number]): number => high95! - low95!;
    for (const { kind, model: changed, reads } of others) {
      const { report } = await appraised(changed);
      const gone = kind === "leaveOut" ? changed.leftOut : [...keys, ...copies];
      const without = changed.leftOut.filter((key) => !model.leftOut.includes(key));
      expect(without.length).toBeGreaterThan(0);
      expect(report.attributes.filter((key) => gone.includes(key))).toEqual([]);
      for (const read of reads.filter(({ key }) => keys.includes(key))) {
        expect(widthOf(read)).toBeLessThan(widthOf(keep!.reads.find(({ key }) => key === read.key)!));
      }
    }
  });

  test("shows for each exact dependency that the price is the same whichever is left out", async () => {
    const { dependencies } = (await appraised(model)).report;
    expect(found.dependencies.map(({ equation }) => equation)).toEqual(dependencies.map(({ equation }) => equation));
    expect(found.dependencies.length).toBeGreaterThan(0);
    for (const { apart, choices } of found.dependencies) {
      expect(choices.filter(({ price }) => price !== null).length).toBeGreaterThan(1);
      expect(apart).toBeLessThan(1e-9);
    }
  });
});
