import { expect, test } from "vitest";
import { dayHeading, timeOf } from "../../../src/screens/journal/when.ts";

const locale = { tag: "en-GB" };

test("a moment is read as day and time in the zone of the reader", () => {
  expect(dayHeading("2026-05-31T23:30:05Z", locale, "UTC")).toBe("31 May 2026");
  expect(dayHeading("2026-05-31T23:30:05Z", locale, "Europe/Berlin")).toBe("1 Jun 2026");
  expect(timeOf("2026-05-31T23:30:05Z", locale, "Europe/Berlin")).toBe("01:30:05");
});

test("what is no moment stays as it was written", () => {
  expect(dayHeading("unknown", locale, "UTC")).toBe("unknown");
});
