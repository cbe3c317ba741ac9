/** The verb lot on the demo's own store: each item and all together, in words and in JSON, and files it cannot read. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { formatMoney } from "../../../src/domain/format.ts";
import { runCommand } from "../../../src/shells/cli/runCommand.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-lot-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function run(...words: string[]): Promise<{ code: number; out: string; err: string }> {
  const [out, err]: [string[], string[]] = [[], []];
  const code = await runCommand(words, { out: (text) => void out.push(text), err: (text) => void err.push(text) });
  return { code, out: out.join("\n"), err: err.join("\n") };
}

const lot = (path: string, ...more: string[]) =>
  run("lot", "--store", join(folder, "demo.sqlite"), "--class", "Telehandlers", "--subjects", path, ...more);

function written(name: string, items: unknown): string {
  const path = join(folder, name);
  writeFileSync(path, JSON.stringify(items));
  return path;
}

const own = (): { title: string; values: Record<string, unknown> } =>
  JSON.parse(readFileSync(join(folder, "subject.json"), "utf8"));

beforeAll(async () => {
  expect((await run("demo", "--out", folder)).code).toBe(0);
}, 60_000);

describe("lot", () => {
  test("prices each item as the verb price does, and prints the sum with its range", async () => {
    const first = own();
    const second = { ...first, title: "", values: { ...first.values, hours: 7000 } };
    const { title: _, ...nameless } = second;
    const path = written("items.json", { items: [first, nameless] });
    const { code, out } = await lot(path, "--levels", "90");
    expect(code).toBe(0);
    const found = JSON.parse((await lot(path, "--levels", "90", "--json")).out);
    const alone = await run(
      ...["price", "--store", join(folder, "demo.sqlite"), "--class", "Telehandlers", "--levels", "90"],
      ...["--subject", join(folder, "subject.json"), "--json"],
    );
    const { amount } = JSON.parse(alone.out).price;
    expect(Math.abs(found.items[0].amount / amount - 1)).toBeLessThan(1e-12);
    const added = found.items[0].amount + found.items[1].amount;
    expect(found.joint.sum).toBeGreaterThan(added);
    expect(found.joint.sum).toBeLessThan(added * 1.01);
    expect(out).toContain("more than the single medians added");
    for (const figure of [found.items[1].amount, found.joint.sum, found.joint.average])
      expect(out).toContain(formatMoney(figure, "EUR"));
    expect(out).toContain("Item 2");
  });

  test("refuses a file without items, and leaves out for all what one does not have, saying so", async () => {
    const { code, err } = await lot(written("none.json", { items: [] }));
    expect(code).not.toBe(0);
    expect(err).toContain("no list of items");
    const first = own();
    const { hours: _, ...values } = first.values;
    const { out } = await lot(written("some.json", { items: [first, { ...first, values }] }));
    expect(out).toMatch(/Hours.* not known for every item/);
  });
});
