/**
 * The main job on the real screens, as a valuer does it: open the demo, bring an ugly file in, mend what is held back, leave age
 * out and read the ledger, price an item whose hours are not known, issue the sheet, verify it, and find it all in the journal.
 */
import { readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { Locator, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { describeNeeding } from "../tools.ts";
import { demoFile, fitsIn, lookAt, openWorkshop, type Workshop } from "./workshop.ts";

describeNeeding("chromium", "the main job on the screens", (executablePath) => {
  let workshop: Workshop;
  let page: Page;

  beforeAll(async () => {
    workshop = await openWorkshop(executablePath);
    page = workshop.page;
    page.setDefaultTimeout(10_000);
  });

  afterAll(async () => {
    await workshop?.close();
  });

  const go = async (place: string): Promise<void> => {
    await page
      .getByRole("navigation", { name: "Places" })
      .getByRole("link", { name: new RegExp(`^${place}`) })
      .click();
  };
  const heldBackFile = (): Locator => page.locator("section section", { hasText: "marrowby-week-18.csv" });
  const heldBackRow = (row: number): Locator =>
    heldBackFile()
      .locator("li")
      .filter({ has: page.getByText(`row ${row}`, { exact: true }) });
  const strip = (): Locator => page.getByRole("region", { name: "Price strip" });

  test("starts with two doors, and the demo's opens on a priced item", async () => {
    await page.getByRole("button", { name: "Open the demo class" }).waitFor();
    await page.getByText("Start a class from a file").waitFor();
    expect(await lookAt(page, "start")).toEqual([]);
    await page.getByRole("button", { name: "Open the demo class" }).click();
    await strip().getByText("€37,000").waitFor();
    expect(await strip().textContent()).toContain("597 of 640 sales");
  });

  test("shows the register with a reason for each sale that is no evidence", async () => {
    await go("Sales");
    const grid = page.getByRole("grid");
    await grid.getByText("in evidence").first().waitFor();
    expect(await grid.getAttribute("aria-rowcount")).toBe("641");
    await page.getByText("597 of 640 sales are evidence; 43 are not, and each says why.").waitFor();
    expect(await lookAt(page, "sales")).toEqual([]);
    await page.getByTitle("List: asking prices, kept out by the filter").click();
    await grid.getByText("filtered: asking").first().waitFor();
    expect(await grid.getAttribute("aria-rowcount")).toBe("19");
    await page.getByText("show all", { exact: true }).click();
    await expect.poll(() => grid.getAttribute("aria-rowcount")).toBe("641");
  });

  test("sets a sale aside by keyboard alone, says before what it does, and undoes it", async () => {
    const grid = page.getByRole("grid");
    await grid.focus();
    for (const key of ["End", "Home", "PageDown", "ArrowDown", " ", "x"]) await page.keyboard.press(key);
    await page.getByText(/It is not among the 40 sales|It carries .* of this price/).waitFor();
    expect(await lookAt(page, "sales-set-aside")).toEqual([]);
    await page.keyboard.press("ArrowDown");
    await page.keyboard.press("Enter");
    await page.getByText(/set aside: part of a larger deal\./).waitFor();
    await page.getByText("596 of 640 sales are evidence").waitFor();
    await page.getByRole("button", { name: "Undo" }).click();
    await page.getByText("597 of 640 sales are evidence").waitFor();
  });

  test("narrows the register by the hairline under a column's head, and by the same numbers as fields", async () => {
    const grid = page.getByRole("grid");
    const rowCount = async (): Promise<number> => Number(await grid.getAttribute("aria-rowcount"));
    const line = await grid.locator("th", { hasText: "hours" }).locator("svg").boundingBox();
    await page.mouse.move(line!.x + 3, line!.y + 7);
    await page.mouse.down();
    await page.mouse.move(line!.x + line!.width / 2, line!.y + 7, { steps: 4 });
    await page.mouse.up();
    await page.getByRole("button", { name: /^Narrow hours from [\d,]+$/ }).waitFor();
    await expect.poll(rowCount).toBeLessThan(500);
    await page.getByRole("button", { name: /^Narrow/ }).click();
    await page.getByLabel("hours from").fill("");
    await expect.poll(rowCount).toBe(641);
    await page.getByLabel("hours to").fill("1000");
    await expect.poll(rowCount).toBeLessThan(100);
    await page.keyboard.press("Escape");
    await page.getByText("show all", { exact: true }).click();
    await expect.poll(rowCount).toBe(641);
  });

  test("verifies a picked sale with how it was verified", async () => {
    await page.getByRole("searchbox").fill("MB-1675");
    await expect.poll(() => page.getByRole("grid").getAttribute("aria-rowcount")).toBe("2");
    await page.getByRole("grid").focus();
    await page.keyboard.press("v");
    await page.getByRole("button", { name: "invoice" }).click();
    await page.getByText("Sale MB-1675 verified: invoice.").waitFor();
    await page.getByRole("searchbox").fill("");
    await expect.poll(() => page.getByRole("grid").getAttribute("aria-rowcount")).toBe("641");
  });

  test("accounts for every row of the ugly file before anything is written", async () => {
    await page.getByRole("button", { name: "Bring in sales" }).click();
    await page.getByText("Pick a file of sales, or drop it here").waitFor();
    await page.locator("input[type=file]").setInputFiles(demoFile("marrowby-week-18.csv"));
    await page.getByText("37 of 46 rows can be taken in; 8 are held back").waitFor();
    expect(await page.getByLabel("Letters").inputValue()).toBe("1");
    await page.getByText("The decimal mark is a comma").waitFor();
    expect(await page.getByLabel("What Hours is").inputValue()).toBe("attribute hours");
    await page.getByText("same reference and day: sale MB-1675").waitFor();
    expect(await lookAt(page, "bring-in")).toEqual([]);
  });

  test("answers at once when a column is said to be something else", async () => {
    await page.getByLabel("What Price is").selectOption("nothing");
    await page.getByText("Say which column holds the price").waitFor();
    await page.getByLabel("What Price is").selectOption("price");
    await page.getByText("37 of 46 rows can be taken in; 8 are held back").waitFor();
  });

  test("takes the sales in and has the held-back rows mended", async () => {
    await page.getByRole("button", { name: "Take in 37 sales" }).click();
    await page.getByText("46 rows read: 37 brought in, 8 held back, 1 duplicate.").waitFor();
    await page.getByText("634 of 677 sales are evidence").waitFor();
    expect(await lookAt(page, "sales-held-back")).toEqual([]);
    for (const row of [14, 22, 23, 38, 40]) {
      await heldBackRow(row)
        .getByRole("button", { name: /^Read as/ })
        .click();
      await page.getByText(`Row ${row} is in the register now.`).waitFor();
    }
    await heldBackRow(17).getByRole("button", { name: "Mend" }).click();
    await heldBackRow(17).getByLabel("Auction date").fill("30.04.2026");
    await heldBackRow(17).getByRole("button", { name: "Bring this row in" }).click();
    await page.getByText("Row 17 is in the register now.").waitFor();
    for (const [row, why] of [
      [29, "no rate for Swedish kronor"],
      [44, "two machines under one price"],
    ] as const) {
      await heldBackRow(row).getByRole("button", { name: "Leave out" }).click();
      await page.getByLabel(`Why is row ${row} left out?`).fill(why);
      await page.keyboard.press("Enter");
      await page.getByText(`Row ${row} is left out: ${why}`).waitFor();
    }
    await page.getByText("640 of 683 sales are evidence").waitFor();
    await expect.poll(() => heldBackFile().count()).toBe(0);
  });

  test("defines the attributes and says how each lies in the evidence", async () => {
    await go("Attributes");
    await page.getByText("11 attributes of a machine").waitFor();
    await page.getByRole("button", { name: "Hours", exact: true }).click();
    await page.getByText(/Hours in the evidence: .* the middle half lies between/).waitFor();
    expect(await lookAt(page, "attributes")).toEqual([]);
    await page.getByRole("button", { name: "Add attribute" }).click();
    await page.getByLabel("Name", { exact: true }).fill("Hours");
    await page.getByRole("form").getByRole("button", { name: "Add attribute" }).click();
    await page.getByText("Another attribute has this name already.").waitFor();
    await page.getByLabel("Name", { exact: true }).fill("Forks");
    await page.getByLabel("Unit").fill("mm");
    expect(await lookAt(page, "attributes-form")).toEqual([]);
    await page.getByRole("form").getByRole("button", { name: "Add attribute" }).click();
    await page.getByText("12 attributes of a machine").waitFor();
    await page.getByRole("button", { name: "Archive" }).click();
    await page.getByText("11 attributes of a machine").waitFor();
  });

  test("leaves age out and reads in the ledger what hours carry for it", async () => {
    await go("Price model");
    const age = page.getByRole("switch", { name: /^Age,/ });
    expect(await age.getAttribute("aria-checked")).toBe("true");
    expect(await lookAt(page, "price-model")).toEqual([]);
    await age.click();
    await expect.poll(() => age.getAttribute("aria-checked")).toBe("false");
    const headline = page.getByRole("main").getByText(/^With age(,| and| left) .*each extra 1,000\sh reads −€\d/);
    await headline.waitFor();
    expect(await headline.textContent()).toMatch(/as each 1,000\sh comes with|most of the rest is age/);
    await page.getByText("The price moves from").waitFor();
    expect(await strip().textContent()).toMatch(/from|▲|▼/);
    expect(await lookAt(page, "price-model-age-out")).toEqual([]);
  });

  test("prices the item with hours not known, wider and saying so", async () => {
    await go("Appraise");
    await page.getByRole("checkbox", { name: "Hours not known" }).check();
    await page.getByText(/Not known: hours, which widens the range by about €/).waitFor();
    expect(await lookAt(page, "appraise")).toEqual([]);
  });

  test("issues the sheet, which stands when it is verified", async () => {
    await go("Sheets");
    await page.getByText("everything a headline price needs is stated").waitFor();
    await page.getByTitle(/^Draft sheet for/).waitFor();
    expect(await lookAt(page, "sheet-draft")).toEqual([]);
    await page.getByRole("button", { name: "Issue sheet" }).click();
    await page.getByRole("button", { name: "Save PDF" }).waitFor();
    await page.getByRole("button", { name: "Verify" }).click();
    await page.getByText(/^The sheet stands: no byte was changed/).waitFor();
    await page.getByText("the journal here knows it").waitFor();
    expect(await lookAt(page, "sheet-issued")).toEqual([]);
  });

  test("verifies the saved file, and catches one changed byte", async () => {
    const download = page.waitForEvent("download");
    await page.getByRole("button", { name: "Save PDF" }).click();
    const saved = join(workshop.folder, "sheet.pdf");
    await (await download).saveAs(saved);
    await page.getByRole("link", { name: "Verify a sheet" }).click();
    const door = page.locator("input[type=file]");
    await door.setInputFiles(saved);
    await page.getByText(/^The sheet stands: no byte was changed/).waitFor();
    expect(await lookAt(page, "sheet-verified")).toEqual([]);
    const bytes = readFileSync(saved);
    const at = Math.floor(bytes.length / 2);
    bytes[at] = bytes[at]! ^ 1;
    const changed = join(workshop.folder, "changed.pdf");
    writeFileSync(changed, bytes);
    await door.setInputFiles(changed);
    await page.getByText("bytes were changed").waitFor();
  });

  test("withdraws a sheet with a reason, and keeps it in the list", async () => {
    await page.locator("a", { hasText: "issued" }).first().click();
    await page.getByRole("button", { name: "Withdraw" }).click();
    await page.getByLabel(/^Why is the sheet withdrawn/).fill("hours have been read meanwhile");
    await page.keyboard.press("Enter");
    await page.getByText("withdrawn: hours have been read meanwhile").waitFor();
  });

  test("shows it all in a journal whose chain is whole", async () => {
    await go("Journal");
    await page.getByText(/The journal is whole/).waitFor();
    for (const words of [
      "marrowby-week-18.csv: 46 rows read: 37 brought in, 8 held back, 1 duplicate.",
      "1 sale verified: invoice",
      "Row 17 of marrowby-week-18.csv mended and brought in.",
      "Row 44 of marrowby-week-18.csv left out: two machines under one price",
      "Attribute Forks archived; its values stay.",
    ]) {
      await page.getByText(words).first().waitFor();
    }
    expect(await page.getByText(/^Sheet \d{4}-0001 issued: Tessaly TH-740/).count()).toBe(1);
    expect(await page.getByText(/^Sheet \d{4}-0001 withdrawn/).count()).toBe(1);
    expect(await lookAt(page, "journal")).toEqual([]);
  });

  test("undoes the file whole, and the price goes back to what it rested on", async () => {
    await go("Sales");
    await page.getByRole("button", { name: "Bring in sales" }).click();
    await page.getByTitle("Undo the import of marrowby-week-18.csv").click();
    const batch = page.locator("li", { hasText: "marrowby-week-18.csv" });
    await batch.getByText("leave the register").waitFor();
    await batch.getByRole("button", { name: "Undo whole" }).last().click();
    await page.getByText("undone", { exact: true }).waitFor();
    expect(await lookAt(page, "bring-in-undone")).toEqual([]);
    await expect.poll(async () => strip().textContent()).toContain("of 640 sales");
  });

  test("starts another class from a file through the second door", async () => {
    await page.getByLabel("Asset class").selectOption({ label: "Start another class …" });
    await page.locator("input[type=file]").setInputFiles(demoFile("reed-organs.csv"));
    await page.getByLabel("Name of the class").fill("Organs of another kind");
    await page.getByLabel("What one of them is called").fill("organ");
    await page.getByText(/of 92 rows can be taken in/).waitFor();
    expect(await lookAt(page, "start-from-file")).toEqual([]);
    await page.getByRole("button", { name: /^Start with \d+ sales/ }).click();
    await page.getByText(/reed-organs.csv: 92 rows read/).waitFor();
    expect(await page.getByLabel("Asset class").locator("option:checked").textContent()).toBe("Organs of another kind");
  });

  test("needs no sideways scrolling in a narrow window", async () => {
    for (const place of ["Sales", "Attributes", "Price model", "Appraise", "Sheets", "Journal"]) {
      await go(place);
      for (const width of [1024, 800]) expect([place, width, await fitsIn(page, width)]).toEqual([place, width, true]);
    }
  });

  test("wrote nothing to the console that a developer would have to look at", () => {
    expect(workshop.complaints).toEqual([]);
  });

  test("says what happened and what to do when the program has ended", async () => {
    await go("Sales");
    await page.getByRole("grid").getByText("in evidence").first().waitFor();
    await workshop.endProgram();
    await page.getByRole("button", { name: /^sold on/ }).click();
    await page.getByRole("alert").getByText("The program does not answer.").first().waitFor();
    expect(await lookAt(page, "ended")).toEqual([]);
  });
});
