/** Commands from words to exit code, in this process and against real stores: what is printed, where, and with which code. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { runCommand } from "../../../src/shells/cli/runCommand.ts";
import { VERBS } from "../../../src/shells/cli/verbs/index.ts";

const folder = mkdtempSync(join(tmpdir(), "lotwright-cli-"));
const at = (name: string): string => join(folder, name);
beforeAll(() => void vi.stubEnv("LOTWRIGHT_HOME", at("home")));
afterAll(() => {
  vi.unstubAllEnvs();
  rmSync(folder, { recursive: true, force: true });
});

interface Ran {
  code: number;
  out: string;
  err: string;
}

async function run(...words: string[]): Promise<Ran> {
  const [out, err]: [string[], string[]] = [[], []];
  const code = await runCommand(words, { out: (text) => void out.push(text), err: (text) => void err.push(text) });
  return { code, out: out.join("\n"), err: err.join("\n") };
}

// biome-ignore lint/suspicious/noExplicitAny: the shape of each answer is what the tests below look at.
async function runJson(...words: string[]): Promise<{ code: number; json: any }> {
  const { code, out } = await run(...words, "--json");
  return { code, json: JSON.parse(out) };
}

/** Sixty invented boats: price = 50,000 − 3 h + 900 kW-ish terms with a wiggle that no attribute explains. */
function salesText(): string {
  const rows = Array.from({ length: 60 }, (_, k) => {
    const hours = 200 + ((k * 137) % 4000);
    const length = 6 + ((k * 7) % 9);
    const hull = ["oak", "steel", "glass"][k % 3]!;
    const trailer = k % 4 === 0 ? "yes" : "no";
    const wiggle = ((k * k * 31) % 97) * 20;
    const price =
      50_000 - 3 * hours + 2_500 * length + (hull === "steel" ? 4_000 : 0) + (trailer === "yes" ? 1_500 : 0) + wiggle;
    const day = `2025-${String(1 + (k % 12)).padStart(2, "0")}-${String(1 + (k % 28)).padStart(2, "0")}`;
    return `B${k + 1},${day},${price},${hours},${length},${hull},${trailer}`;
  });
  return ["Reference,Sold on,Price,Hours,Length,Hull,Trailer", ...rows, "B61,2025-05-05,5l200,900,8,oak,no"].join("\n");
}

beforeAll(() => {
  writeFileSync(at("boats.csv"), salesText());
  const item = { Hours: 1500, Length: 9, Hull: "oak", Trailer: false };
  writeFileSync(at("subject.json"), JSON.stringify({ title: "Ketch", effectiveOn: "2025-12-31", values: item }));
});

const TRY = ["--price", "Price", "--attributes", "Hours,Length,Hull,Trailer"];

describe("help", () => {
  test("lists every verb, and each verb says its options", async () => {
    const general = await run("help");
    expect(general.code).toBe(0);
    for (const verb of VERBS) {
      expect(general.out).toContain(verb.name);
      const { out } = await run("help", verb.name);
      for (const option of Object.keys(verb.options)) expect(out).toContain(`--${option}`);
      expect((await run(verb.name, "--help")).out).toBe(out);
    }
    expect((await run()).out).toBe(general.out);
  });
});

describe("refusals", () => {
  test("are a sentence on stderr, code 1, and with --json an object on stdout", async () => {
    for (const words of [
      ["frobnicate"],
      ["price"],
      ["try", "a", "b"],
      ["verify", at("none.pdf")],
      ["refit", "--nonsense"],
    ]) {
      const { code, out, err } = await run(...words);
      expect([code, out]).toEqual([1, ""]);
      expect(err).toMatch(/^[A-Z"].*[.…]$/s);
      const { json } = await runJson(...words);
      expect(json).toMatchObject({ ok: false, error: { code: expect.any(String), what: expect.any(String) } });
    }
  });

  test("a store that is not there is not made by asking it for a price", async () => {
    const { code, err } = await run(
      "price",
      "--store",
      at("none.sqlite"),
      "--class",
      "Boats",
      "--subject",
      at("subject.json"),
    );
    expect(code).toBe(1);
    expect(err).toContain("no store");
  });
});

describe("try", () => {
  test("fits in memory, counts every row, and prices the subject", async () => {
    const { code, json } = await runJson("try", at("boats.csv"), ...TRY, "--subject", at("subject.json"));
    expect(code).toBe(0);
    expect(json.evidence).toMatchObject({ read: 61, used: 60 });
    expect(json.evidence.heldBack).toHaveLength(1);
    expect(json.evidence.heldBack[0].row).toBe(62);
    expect(json.model).toMatchObject({ response: "price", n: 60, p: 6, rank: 6, residualDf: 54 });
    const coefficient = (attribute: string, level: string | null = null): number =>
      json.model.coefficients.find(
        (one: { attribute: string; level: string | null }) => one.attribute === attribute && one.level === level,
      ).estimate;
    expect(coefficient("Hours")).toBeCloseTo(-3, 0);
    expect(Math.abs(coefficient("Length") - 2500)).toBeLessThan(100);
    expect(json.price.rangeForOneSale.map(({ level }: { level: number }) => level)).toEqual([0.5, 0.8, 0.9, 0.95]);
    for (const { low, high } of json.price.rangeForOneSale) {
      expect(low).toBeLessThan(json.price.amount);
      expect(high).toBeGreaterThan(json.price.amount);
    }
    expect(json.reach.verdict).toBe("inside");
  });

  test("splits every coefficient exactly when an attribute is left out", async () => {
    const { json } = await runJson("try", at("boats.csv"), ...TRY, "--leave-out", "Length");
    expect(json.model.attributes).toEqual(["Hours", "Hull", "Trailer"]);
    expect(json.price).toBeNull();
    expect(json.ledger.length).toBeGreaterThan(0);
    for (const row of json.ledger) {
      const carried = row.carriedParts.reduce((sum: number, { amount }: { amount: number }) => sum + amount, 0);
      expect(Math.abs(row.ownPart + carried - row.coefficient)).toBeLessThan(
        1e-9 * Math.max(1, Math.abs(row.coefficient)),
      );
    }
  });

  test("takes ln and choices at their word", async () => {
    const words = ["try", at("boats.csv"), ...TRY, "--response", "ln", "--ln", "Hours", "--choices", "Length"];
    const { json } = await runJson(...words, "--subject", at("subject.json"));
    expect(json.model.response).toBe("ln");
    expect(json.price.centre).toBe("median");
    expect(
      json.model.coefficients.filter(({ attribute }: { attribute: string }) => attribute === "Length"),
    ).toHaveLength(8);
  });

  test("says it in sentences first, in words and without a currency that nobody named", async () => {
    const { out } = await run("try", at("boats.csv"), ...TRY, "--subject", at("subject.json"));
    expect(out).toContain("Ketch is priced at");
    expect(out).toContain("61 rows read: 60 accepted, 1 held back, 0 duplicates.");
    expect(out).not.toMatch(/undefined|NaN|null|XXX|\u00a4/);
  });

  test("refuses unknown and doubled columns and contradictions, naming the option", async () => {
    const tries: [string[], string][] = [
      [["--price", "Cost", "--attributes", "Hours"], "--price"],
      [["--price", "Price", "--attributes", "Hours,Hours"], "--attributes"],
      [["--price", "Price", "--attributes", "Hours,Price"], "--attributes"],
      [["--price", "Price", "--attributes", "Hours", "--leave-out", "Length"], "--leave-out"],
      [["--price", "Price", "--attributes", "Hull", "--ln", "Hull"], "--ln"],
      [["--price", "Price", "--attributes", "Hours", "--levels", "0"], "--levels"],
      [["--price", "Price", "--attributes", "Hours", "--response", "log"], "--response"],
    ];
    for (const [words, where] of tries) {
      const { code, err } = await run("try", at("boats.csv"), ...words);
      expect(code).toBe(1);
      expect(err).toContain(where);
    }
  });
});

describe("the main job on a store", () => {
  const store = ["--store", at("boats.sqlite"), "--class", "Boats"];
  const pdf = at("sheet.pdf");

  test("a dry run writes nothing", async () => {
    const { code, err } = await run("import", at("boats.csv"), ...store, "--dry-run");
    expect(code).toBe(1);
    expect(err).toContain("no store");
  });

  test("import, refit, price, sheet and verify follow on each other", async () => {
    const imported = await runJson("import", at("boats.csv"), ...store);
    expect(imported.code).toBe(0);
    expect(imported.json).toMatchObject({ read: 61, accepted: 60, dryRun: false });

    expect((await runJson("refit", ...store)).json).toMatchObject({ ok: true, edition: { number: 1, saleCount: 60 } });

    const priced = await runJson("price", ...store, "--subject", at("subject.json"));
    expect(priced.code).toBe(0);
    expect(priced.json).toMatchObject({ edition: 1, evidence: { read: 60, used: 60 } });

    const issued = await runJson("sheet", ...store, "--subject", at("subject.json"), "--out", pdf);
    expect(issued.code).toBe(0);
    expect(readFileSync(pdf).subarray(0, 5).toString()).toBe("%PDF-");

    const verified = await runJson("verify", pdf);
    expect(verified.code).toBe(0);
    expect(verified.json).toMatchObject({ ok: true, verdict: "stands", differentCount: 0, knownToJournal: null });
    expect((await runJson("verify", pdf, "--store", at("boats.sqlite"))).json.knownToJournal).toBe(true);
  });

  test("an altered sheet is refused with code 1", async () => {
    const bytes = readFileSync(pdf);
    const middle = Math.floor(bytes.length / 2);
    bytes[middle] = bytes[middle]! ^ 1;
    writeFileSync(at("altered.pdf"), bytes);
    const { code, json } = await runJson("verify", at("altered.pdf"));
    expect(code).toBe(1);
    expect(json.ok).toBe(false);
  });

  test("an unknown class is refused with the names there are", async () => {
    const { err } = await run("refit", "--store", at("boats.sqlite"), "--class", "Ships");
    expect(err).toContain("Boats");
  });
});

describe("demo", () => {
  test("runs the main job, keeps its store and sheet where it is told, and never writes over one", async () => {
    const { code, json } = await runJson("demo", "--out", at("demo"));
    expect(code).toBe(0);
    expect(json).toMatchObject({ invented: true, edition: 1, verification: { verdict: "stands" } });
    expect(readFileSync(json.out).subarray(0, 5).toString()).toBe("%PDF-");
    expect((await run("demo", "--out", at("demo"))).code).toBe(1);
  });
});
