/** The verb sets on the demo's own store and subject: words, tables and JSON say the same, and bad options are refused. */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { formatMoney } from "../../../src/domain/format.ts";
import { runCommand } from "../../../src/shells/cli/runCommand.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-sets-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function run(...words: string[]): Promise<{ code: number; out: string; err: string }> {
  const [out, err]: [string[], string[]] = [[], []];
  const code = await runCommand(words, { out: (text) => void out.push(text), err: (text) => void err.push(text) });
  return { code, out: out.join("\n"), err: err.join("\n") };
}

const common = [
  "--store",
  join(folder, "demo.sqlite"),
  "--class",
  "Telehandlers",
  "--subject",
  join(folder, "subject.json"),
];

beforeAll(async () => {
  expect((await run("demo", "--out", folder)).code).toBe(0);
}, 60_000);

describe("sets", () => {
  test("says the span of the price, and prints the sets, averages, coefficients and shares", async () => {
    const { code, out } = await run("sets", ...common);
    expect(code).toBe(0);
    const { out: json } = await run("sets", ...common, "--json");
    const found = JSON.parse(json);
    expect(found.ok).toBe(true);
    expect(out).toContain(found.headline);
    for (const part of [
      "Sets that weigh most",
      "Price averaged over sets",
      "Span of each coefficient",
      "What putting it in",
    ])
      expect(out).toContain(part);
    expect(out).toContain(formatMoney(found.stacked.price, "EUR"));
    expect(found.marks.price).toHaveLength(2 ** found.attributes.length);
  });

  test("takes the set in use from --leave-out, and how many sets count from --within", async () => {
    const narrow = JSON.parse((await run("sets", ...common, "--within", "2", "--json")).out);
    const wide = JSON.parse((await run("sets", ...common, "--within", "40", "--leave-out", "age", "--json")).out);
    expect(narrow.defensible.length).toBeLessThan(wide.defensible.length);
    expect(wide.current).toBe(
      narrow.current - 2 ** narrow.attributes.findIndex(({ key }: { key: string }) => key === "built"),
    );
    const { out } = await run("sets", ...common, "--leave-out", "age");
    expect(out).toMatch(/without age, in use/);
  });

  test("refuses a share that is none, with code 1 and a sentence", async () => {
    const { code, err } = await run("sets", ...common, "--within", "ten");
    expect(code).toBe(1);
    expect(err).toMatch(/could not be read/);
  });
});

test("holds attributes in every set and out of every set; sets of the rest are priced as before", async () => {
  const read = async (...more: string[]) => JSON.parse((await run("sets", ...common, ...more, "--json")).out);
  const all = await read();
  const held = await read("--always-in", "hours", "--always-out", "age");
  expect(held.attributes).toHaveLength(all.attributes.length - 2);
  expect(held.marks.price).toHaveLength(2 ** held.attributes.length);
  expect(held.sentences.join(" ")).toContain("Held in every set by wish: hours; out of every set by wish: age.");
  const keys: string[] = all.attributes.map(({ key }: { key: string }) => key);
  const wider = (set: number): number =>
    held.attributes.reduce(
      (sum: number, { key }: { key: string }, g: number) => sum + (((set >> g) & 1) === 1 ? 2 ** keys.indexOf(key) : 0),
      2 ** keys.indexOf("hours"),
    );
  held.marks.price.forEach((price: number | null, set: number) => {
    const before = all.marks.price[wider(set)];
    if (price === null || before === null) expect(price).toBe(before);
    else expect(Math.abs(price / before - 1)).toBeLessThan(1e-9);
  });
  const both = await run("sets", ...common, "--always-in", "age", "--always-out", "age");
  expect(both.code).toBe(1);
  expect(both.err).toMatch(/at once/);
});
