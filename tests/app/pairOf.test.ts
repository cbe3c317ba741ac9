/** Two attributes of the demo class, and how they move together. */
import { beforeAll, describe, expect, test } from "vitest";
import { createHandlers } from "../../src/app/handlers.ts";
import type { AttributePair } from "../../src/domain/attributePair.ts";
import { openStore } from "../../src/store/openStore.ts";
import { testPorts } from "./ports.ts";

let ask: (a: string, b: string) => Promise<AttributePair | null>;

beforeAll(async () => {
  const handlers = createHandlers(testPorts({ store: openStore(":memory:") }));
  const { classId } = await handlers.openDemo({});
  const { model } = await handlers.currentModel({ classId });
  const { subject } = (await handlers.loadDraft({ classId }))!;
  ask = async (a, b) => handlers.pairOf({ classId, model: { ...model, leftOut: ["built"] }, subject, a, b } as never);
});

describe("a pair of attributes", () => {
  test("hours and age correlate at about 0.9 (common practice, no source), and the item lies among them", async () => {
    const found = (await ask("hours", "built"))!;
    expect(found.correlation).toBeGreaterThan(0.85);
    expect(found.correlation).toBeLessThan(0.95);
    expect(found.subject).not.toBeNull();
    expect(found.picture.kind).toBe("points");
    if (found.picture.kind !== "points") return;
    const [x, y] = found.picture.points.reduce(([p, q], [a, b]) => [p + a, q + b] as const, [0, 0] as const);
    const n = found.picture.points.length;
    const sum = (of: (a: number, b: number) => number) =>
      found.picture.kind === "points" ? found.picture.points.reduce((s, [a, b]) => s + of(a - x / n, b - y / n), 0) : 0;
    const plain = sum((a, b) => a * b) / Math.sqrt(sum((a) => a * a) * sum((_, b) => b * b));
    expect(found.correlation).toBeCloseTo(plain, n === found.sales ? 10 : 1);
    expect(Math.sign(found.slope!)).toBe(Math.sign(found.partialCorrelation!));
    expect(found.sentence).toMatch(/comes with [\d.,]+ years more of age/);
  });

  test("of a choice and a number gives means per level that weigh to the mean of all", async () => {
    const [found, turned] = [(await ask("make", "hours"))!, (await ask("hours", "make"))!];
    expect(turned).toEqual(found);
    if (found.picture.kind !== "levels") throw new Error("no levels");
    expect(found.picture.levels.reduce((sum, { count }) => sum + count, 0)).toBe(found.sales);
  });

  test("there is none of an attribute with itself, of two choices, or of what the class has not", async () => {
    expect(await ask("hours", "hours")).toBeNull();
    expect(await ask("hours", "nothing")).toBeNull();
    expect(await ask("make", "coupler")).toBeNull();
  });
});
