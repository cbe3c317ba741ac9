/** What the Sheets place says of adjustments, of a withdrawn sheet and of a verification. */
import { renderToStaticMarkup } from "react-dom/server";
import { expect, test } from "vitest";
import { TELEHANDLER_ENGAGEMENT } from "../../../src/app/demo/telehandlerClass.ts";
import type { VerificationReport } from "../../../src/domain/sheetRecord.ts";
import { Adjustments } from "../../../src/screens/sheets/Adjustments.tsx";
import { missingFrom } from "../../../src/screens/sheets/DraftSheet.tsx";
import { Verified } from "../../../src/screens/sheets/VerificationView.tsx";

test("a headline price names what it lacks", () => {
  expect(missingFrom(TELEHANDLER_ENGAGEMENT)).toEqual([]);
  expect(missingFrom({ ...TELEHANDLER_ENGAGEMENT, premise: " ", marketLevel: "" })).toEqual([
    "premise of value",
    "market level",
  ]);
});

test("adjustments alike in every word each stand, cents included", () => {
  const one = { label: "New tyres", amount: 800.5, reason: "fitted in May" };
  const html = renderToStaticMarkup(
    <Adjustments adjustments={[one, one]} currencyCode="EUR" onChange={() => undefined} />,
  );
  expect(html.match(/\+800\.50/g)).toHaveLength(2);
});

function report(change: Partial<VerificationReport> = {}): VerificationReport {
  return {
    verdict: "stands",
    sentence: "The sheet stands.",
    bytesIntact: true,
    fingerprintEqual: true,
    textEqual: true,
    figures: [{ name: "price", printed: 1, recomputed: 1, equal: true }],
    equalCount: 1,
    differentCount: 0,
    programVersion: "0.1.0",
    sameProgramVersion: true,
    knownToJournal: null,
    sheetNumber: "2026-0001",
    title: "winch",
    problems: [],
    ...change,
  };
}

test("a verification says nothing of a journal that was not asked, and plainly that one does not know it", () => {
  expect(renderToStaticMarkup(<Verified report={report()} />)).not.toContain("journal");
  expect(renderToStaticMarkup(<Verified report={report({ knownToJournal: false })} />)).toContain("does not know it");
});

test("an altered sheet shows its problems and only the figures that differ", () => {
  const figures = [
    { name: "price", printed: 1, recomputed: 2, equal: false },
    { name: "average", printed: 3, recomputed: 3, equal: true },
  ];
  const html = renderToStaticMarkup(
    <Verified report={report({ verdict: "altered", differentCount: 1, figures, problems: ["The price differs."] })} />,
  );
  expect(html).toContain("The price differs.");
  expect(html).toContain(">price<");
  expect(html).not.toContain(">average<");
});
