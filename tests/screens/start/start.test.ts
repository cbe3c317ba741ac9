import { expect, test } from "vitest";
import { nameOfFile } from "../../../src/screens/start/StartFromFile.tsx";

test("a class is named after its file until a person says otherwise", () => {
  expect(nameOfFile("auction-results_2026.csv")).toBe("Auction results 2026");
  expect(nameOfFile("organs")).toBe("Organs");
  expect(nameOfFile(`${"x".repeat(200)}.csv`)).toHaveLength(80);
});
