import { expect, test } from "vitest";
import { amountInWords, numberInWords } from "../../src/sheet/amountInWords.ts";

test("an amount stands in words with its currency's name", () => {
  expect(amountInWords(38500, "EUR")).toBe("thirty-eight thousand five hundred euro");
  expect(amountInWords(41850, "GBP")).toBe("forty-one thousand eight hundred and fifty pounds sterling");
  expect(amountInWords(1, "USD")).toBe("one US dollar");
  expect(amountInWords(2, "XTS")).toBe("two XTS");
});

test.each([
  [0, "zero"],
  [13, "thirteen"],
  [20, "twenty"],
  [99, "ninety-nine"],
  [100, "one hundred"],
  [101, "one hundred and one"],
  [1000, "one thousand"],
  [1005, "one thousand and five"],
  [12_012, "twelve thousand and twelve"],
  [250_000, "two hundred and fifty thousand"],
  [1_234_567, "one million two hundred and thirty-four thousand five hundred and sixty-seven"],
  [2_000_000_003, "two billion and three"],
  [-1200, "minus one thousand two hundred"],
  [1e15, "1000000000000000"],
])("%d reads %s", (number, words) => {
  expect(numberInWords(number)).toBe(words);
});
