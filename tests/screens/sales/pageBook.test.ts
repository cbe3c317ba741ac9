import { describe, expect, test, vi } from "vitest";
import type { RequestInput, SalesPage } from "../../../src/contract/requests.ts";
import type { Sale } from "../../../src/domain/sale.ts";
import { NO_FILTER } from "../../../src/screens/sales/filters.ts";
import { PAGE, PageBook, type SalesQuery } from "../../../src/screens/sales/pageBook.ts";

const query: SalesQuery = { classId: 1, sort: { by: "soldOn", descending: true }, filter: NO_FILTER };
const sale = (id: number): Sale => ({ id }) as Sale;

/** A register of `total` sales numbered by their place; remembers the offsets that were asked. */
function registerOf(total: number) {
  const asked: number[] = [];
  const ask = async ({ offset, limit }: RequestInput<"listSales">): Promise<SalesPage> => {
    asked.push(offset);
    const count = Math.max(0, Math.min(limit, total - offset));
    return { total, rows: Array.from({ length: count }, (_, at) => sale(offset + at)) };
  };
  const errorOf = () => ({ family: "bug", code: "x", what: "It failed.", where: null, whatToDo: null }) as const;
  return { asked, ask, errorOf };
}

const settle = () => new Promise((resolve) => setTimeout(resolve, 60));

describe("the register's page book", () => {
  test("reads the first window of a new query and knows how many there are", async () => {
    const register = registerOf(1_000_000);
    const book = new PageBook(register);
    expect(book.total).toBeNull();
    book.open(query);
    await settle();
    expect(book.total).toBe(1_000_000);
    expect(book.rowAt(0)?.id).toBe(0);
    expect(book.rowAt(PAGE - 1)?.id).toBe(PAGE - 1);
    expect(book.rowAt(PAGE)).toBeNull();
    expect(register.asked).toEqual([0]);
  });

  test("asks only where a scroll rests, not for the pages it passes over", async () => {
    const register = registerOf(1_000_000);
    const book = new PageBook(register);
    book.open(query);
    await settle();
    for (let row = 0; row < 900_000; row += 30_000) book.need(row, row + 40);
    book.need(912_340, 912_380);
    await settle();
    expect(register.asked).toEqual([0, 912_300]);
    expect(book.rowAt(912_345)?.id).toBe(912_345);
  });

  test("holds no more than its near pages of a large register", async () => {
    const register = registerOf(1_000_000);
    const book = new PageBook(register);
    book.open(query);
    await settle();
    for (let page = 1; page <= 62; page++) {
      book.need(page * PAGE, page * PAGE + 10);
      await new Promise((resolve) => setTimeout(resolve, 33));
    }
    await settle();
    expect([...book.rows()].length).toBeLessThanOrEqual(60 * PAGE);
    expect(book.rowAt(62 * PAGE)?.id).toBe(62 * PAGE);
    expect(book.rowAt(0)).toBeNull();
    book.need(0, 10);
    await settle();
    expect(book.rowAt(0)?.id).toBe(0);
  });

  test("reads a small register whole, for the marks on the rail", async () => {
    const book = new PageBook(registerOf(640));
    book.open(query);
    await settle();
    expect([...book.rows()].map(([row]) => row).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 640 }, (_, at) => at),
    );
  });

  test("keeps the rows of the query before until the new one has answered, and takes no late answer", async () => {
    const waiting: (() => void)[] = [];
    const register = registerOf(50);
    const book = new PageBook({
      ...register,
      ask: (input) => new Promise((resolve) => waiting.push(() => void register.ask(input).then(resolve))),
    });
    book.open(query);
    waiting.shift()!();
    await settle();
    book.open({ ...query, sort: { by: "price", descending: false } });
    expect(book.isStale).toBe(true);
    expect(book.rowAt(3)?.id).toBe(3);
    book.open({ ...query, sort: { by: "title", descending: false } });
    const [late, latest] = [waiting.shift()!, waiting.shift()!];
    latest();
    await settle();
    expect(book.isStale).toBe(false);
    const told = vi.fn();
    book.subscribe(told);
    late();
    await settle();
    expect(told).not.toHaveBeenCalled();
  });

  test("says a refusal, and asks that page again when it is needed", async () => {
    let fails = true;
    const register = registerOf(10);
    const ask = (input: RequestInput<"listSales">) => (fails ? Promise.reject(new Error("no")) : register.ask(input));
    const book = new PageBook({ ...register, ask });
    book.open(query);
    await settle();
    expect(book.error?.what).toBe("It failed.");
    expect(book.total).toBeNull();
    fails = false;
    book.need(0, 5);
    await settle();
    expect(book.error).toBeNull();
    expect(book.rowAt(9)?.id).toBe(9);
  });
});
