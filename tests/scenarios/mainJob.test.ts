/**
 * The main job through the real screens: the built loopback shell, a real store, a real browser. Ugly file in, rows mended,
 * age left out, hours not known, sheet issued and verified, and the journal tells it all. Pictures for people to look at go
 * to .artefacts/, in both themes; axe finds nothing serious on any place.
 */
import { type ChildProcess, spawn } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { createRequire } from "node:module";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { type Browser, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { CHROMIUM_FLAGS, describeNeeding } from "../tools.ts";

const top = fileURLToPath(new URL("../..", import.meta.url));
const server = join(top, "out", "main", "server.js");
const pictures = join(top, ".artefacts");
const axe = readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");
const PLACES = ["sales", "attributes", "price-model", "appraise", "sheets", "journal"];

/** Starts the built shell on a store of its own and waits for its address. */
async function serve(home: string): Promise<{ child: ChildProcess; address: string }> {
  const child = spawn(process.execPath, [server], { env: { ...process.env, LOTWRIGHT_HOME: home } });
  const address = await new Promise<string>((resolve, reject) => {
    let text = "";
    const read = (piece: Buffer) => {
      text += piece.toString();
      const found = /http:\/\/127\.0\.0\.1:\d+\/#token=[\w-]+/.exec(text);
      if (found !== null) resolve(found[0]);
    };
    child.stdout?.on("data", read);
    child.stderr?.on("data", read);
    child.on("exit", (code) => reject(new Error(`the shell ended with ${code}: ${text}`)));
  });
  return { child, address };
}

describeNeeding("chromium", "the main job in the window", (executablePath) => {
  const home = mkdtempSync(join(tmpdir(), "lotwright-scenario-"));
  const faults: string[] = [];
  let child: ChildProcess;
  let browser: Browser;
  let page: Page;

  beforeAll(async () => {
    expect(existsSync(server), "run `npm run build` first").toBe(true);
    mkdirSync(pictures, { recursive: true });
    const served = await serve(home);
    child = served.child;
    browser = await chromium.launch({ executablePath, headless: true, args: [...CHROMIUM_FLAGS] });
    page = await browser.newPage({ viewport: { width: 1440, height: 900 }, colorScheme: "light" });
    page.setDefaultTimeout(15_000);
    page.on("pageerror", (fault) => faults.push(fault.message));
    page.on("console", (line) => {
      if (line.type() === "error") faults.push(line.text());
    });
    await page.goto(served.address);
  });

  afterAll(async () => {
    await browser?.close();
    child?.kill("SIGINT");
    rmSync(home, { recursive: true, force: true });
  });

  const go = async (place: string): Promise<void> => {
    await page.evaluate((hash) => {
      window.location.hash = hash;
    }, `#/${place}`);
  };
  const picture = (name: string) => page.screenshot({ path: join(pictures, `${name}.png`) });
  const priceOnStrip = async (): Promise<string> =>
    (await page.getByRole("region", { name: "Price strip" }).textContent())?.match(/€\d\d,\d{3}/)?.[0] ?? "";

  test("the demo class opens from the first door", async () => {
    await page.getByRole("button", { name: "Open the demo class" }).click();
    await page.getByText("Demo class, invented data").waitFor();
    await expect.poll(priceOnStrip).toMatch(/^€\d\d,\d{3}$/);
  });

  test("an ugly week's list comes in: read = taken in + held back + duplicates", async () => {
    await go("sales");
    await page.getByRole("button", { name: "Bring in sales" }).click();
    await page
      .locator("input[type=file]")
      .first()
      .setInputFiles(join(top, "demo-db", "marrowby-week-18.csv"));
    await page.getByText(/37 of 46 rows can be taken in; 8 are held back/).waitFor();
    await picture("bring-in");
    await page.getByRole("button", { name: "Take in 37 sales" }).click();
    await expect.poll(() => page.getByRole("link", { name: /^Sales/ }).textContent()).toContain("677");
  });

  test("a held-back row is read as suggested, another mended by hand", async () => {
    await go("appraise");
    await go("sales");
    await page.getByText(/17 rows held back/).waitFor();
    await page
      .getByRole("button", { name: /Read as Brannock/ })
      .first()
      .click();
    await page.getByText(/16 rows held back/).waitFor();
    const row = page.getByRole("listitem").filter({ hasText: "31.04.2026" });
    await row.getByRole("button", { name: "Mend" }).click();
    await page.getByLabel("Auction date").fill("30.04.2026");
    await page.getByRole("button", { name: "Bring this row in" }).click();
    await page.getByText(/15 rows held back/).waitFor();
    await picture("sales");
  });

  test("with age left out, the ledger says what hours carry for it, and the price answers", async () => {
    await go("price-model");
    const before = await priceOnStrip();
    await page.getByRole("switch", { name: /^Age/ }).click();
    await page
      .getByText(/With age .*left out, each extra 1,000.h reads/)
      .first()
      .waitFor();
    await expect.poll(priceOnStrip).not.toBe(before);
    await picture("price-model-without-age");
    await page.getByRole("button", { name: "Put age back" }).click();
    await expect.poll(priceOnStrip).toBe(before);
  });

  test("with hours not known, the range is wider for that reason, and it is said", async () => {
    await go("appraise");
    await page.getByRole("checkbox", { name: "Hours not known" }).check();
    await page
      .getByText(/Not known: hours, which widens the range/)
      .first()
      .waitFor();
    await picture("appraise-hours-not-known");
  });

  test("the sheet is issued, and verified to the last bit", async () => {
    await go("sheets/draft");
    await page.getByRole("button", { name: "Issue sheet" }).click();
    await page
      .getByText(/2026-0001/)
      .first()
      .waitFor();
    await page.getByRole("button", { name: "Verify" }).first().click();
    await page
      .getByText(/The sheet stands: no byte was changed/)
      .first()
      .waitFor();
    await picture("sheet-verified");
  });

  test("the journal tells it all, and its chain is whole", async () => {
    await go("journal");
    for (const sentence of [
      /Sheet 2026-0001 issued/,
      /marrowby-week-18\.csv: 46 rows read/,
      /Row 17 of marrowby.*mended/,
    ]) {
      await page.getByText(sentence).first().waitFor();
    }
    await page
      .getByText(/The journal is whole|journal is whole/)
      .first()
      .waitFor();
  });

  test.each(["light", "dark"] as const)(
    "every place, %s, has a picture and nothing serious for axe to find",
    async (theme) => {
      await page.emulateMedia({ colorScheme: theme });
      for (const place of PLACES) {
        await go(place);
        await page.waitForTimeout(700);
        await picture(`${place}-${theme}`);
        await page.evaluate(axe);
        const serious = await page.evaluate(async () => {
          const { violations } = await (window as unknown as { axe: typeof import("axe-core") }).axe.run({
            exclude: ["iframe"],
          });
          return violations
            .filter(({ impact }) => impact === "serious" || impact === "critical")
            .map(
              ({ id, nodes }) =>
                `${id}: ${nodes
                  .slice(0, 3)
                  .map(({ html }) => html.slice(0, 140))
                  .join(" | ")}`,
            );
        });
        expect(serious, `${place}, ${theme}`).toEqual([]);
      }
    },
  );

  test("nothing was written to the browser's console as an error", () => {
    expect(faults).toEqual([]);
  });
});
