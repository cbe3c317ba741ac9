/** The main job through the handlers, on the demo class: open, appraise, leave out, not known, save, issue, verify. */
import { createHash } from "node:crypto";
import { beforeAll, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { Handlers } from "../../src/contract/client.ts";
import type { Appraisal } from "../../src/domain/appraisal.ts";
import type { PriceModel } from "../../src/domain/priceModel.ts";
import type { Subject } from "../../src/domain/subject.ts";
import { readFonts } from "../../src/shells/readFonts.ts";
import { openStore } from "../../src/store/openStore.ts";

const LEVELS = [0.5, 0.8, 0.9, 0.95];
let handlers: Handlers;
let classId: number;
let model: PriceModel;
let subject: Subject;

beforeAll(async () => {
  handlers = createHandlers({
    store: openStore(":memory:"),
    nowUtc: () => "2026-06-02T09:00:00Z",
    today: () => "2026-06-02",
    sha256: (data) => createHash("sha256").update(data).digest("hex"),
    log: (cause) => {
      throw cause;
    },
    programVersion: "0.1.0",
    fonts: readFonts(),
  });
  ({ classId } = await handlers.openDemo({}));
  ({ model } = await handlers.currentModel({ classId }));
  subject = (await handlers.loadDraft({ classId }))!.subject;
});

async function appraise(change: Partial<{ model: PriceModel; subject: Subject }> = {}): Promise<Appraisal> {
  const { appraisal } = await handlers.appraise({ classId, model, subject, levels: LEVELS, ...change } as never);
  return appraisal;
}

test("every sale of the register is evidence or out for a reason", async () => {
  const { evidence } = await appraise();
  expect(evidence.read).toBe(evidence.used + evidence.out.reduce((sum, one) => sum + one.saleIds.length, 0));
  console.log(JSON.stringify(evidence, (k, v) => (k === "saleIds" ? v.length : v), 1));
});

test("prints", async () => {
  const a = await appraise();
  console.log(a.report.dependencies, a.report.leftOut, a.priced?.price, a.ledger.headline, a.ledger.rows.map((r) => r.sentence), a.priced?.reach.sentence, a.priced?.notKnown, a.priced?.pull.sentence, a.caveats);
  const b = await appraise({ model: { ...model, leftOut: ["built", "age"] } });
  console.log(model.attributes.map((x) => x.key), b.ledger.headline, b.ledger.rows.map((r) => r.sentence), b.ledger.identityError, b.priced?.price.amount);
});
