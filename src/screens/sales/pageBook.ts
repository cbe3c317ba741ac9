/**
 * The register's pages as they are needed: windows of a hundred sales, kept while they are near, so that a register of a
 * million scrolls without holding a million rows. Knows nothing of React; tells its listeners when something came.
 */
import type { RequestInput, SalesPage } from "../../contract/requests.ts";
import type { PlainError } from "../../domain/errors.ts";
import type { Sale } from "../../domain/sale.ts";

export type SalesQuery = Omit<RequestInput<"listSales">, "offset" | "limit">;
export type SalesFilter = SalesQuery["filter"];

export const PAGE = 100;
/** Pages kept; the farthest from what is looked at go first. */
const KEPT = 60;
/** A register of this many is read whole in the background, so that the rail can mark all of it. */
const WHOLE = 2000;
/** A scroll passes over many pages: only where it rests for this long is asked. */
const REST_MS = 30;

export interface PageBookPorts {
  ask(input: RequestInput<"listSales">): Promise<SalesPage>;
  errorOf(cause: unknown): PlainError;
}

export class PageBook {
  readonly #ports: PageBookPorts;
  readonly #listeners = new Set<() => void>();
  #query: SalesQuery | null = null;
  #pages = new Map<number, readonly Sale[]>();
  #asked = new Set<number>();
  #wanted = { first: 0, last: PAGE - 1 };
  #generation = 0;
  #answered = 0;
  #rest: ReturnType<typeof setTimeout> | null = null;
  #version = 0;
  #total: number | null = null;
  #error: PlainError | null = null;

  constructor(ports: PageBookPorts) {
    this.#ports = ports;
  }

  /** Number of hits; null until the first answer. */
  get total(): number | null {
    return this.#total;
  }

  get error(): PlainError | null {
    return this.#error;
  }

  /** True while the rows shown are those of the query before. */
  get isStale(): boolean {
    return this.#answered !== this.#generation;
  }

  readonly subscribe = (tell: () => void): (() => void) => {
    this.#listeners.add(tell);
    return () => this.#listeners.delete(tell);
  };

  readonly version = (): number => this.#version;

  rowAt(index: number): Sale | null {
    return this.#pages.get(Math.floor(index / PAGE))?.[index % PAGE] ?? null;
  }

  /** All rows at hand, with their places. */
  *rows(): Generator<readonly [number, Sale]> {
    for (const [page, sales] of this.#pages) {
      for (let at = 0; at < sales.length; at++) yield [page * PAGE + at, sales[at]!];
    }
  }

  /** A new query starts at its top; the same one again (the data changed) is read anew where one is. */
  open(query: SalesQuery): void {
    const isSame = this.#query !== null && JSON.stringify(query) === JSON.stringify(this.#query);
    if (!isSame) this.#wanted = { first: 0, last: PAGE - 1 };
    this.#query = query;
    this.#generation++;
    this.#asked = new Set();
    this.#askWanted();
  }

  /** Rows that are looked at now, both ends included. */
  need(first: number, last: number): void {
    this.#wanted = { first: Math.max(0, first), last: Math.max(first, last) };
    this.#rest ??= setTimeout(() => {
      this.#rest = null;
      this.#askWanted();
    }, REST_MS);
  }

  #askWanted(): void {
    this.#askPages(Math.floor(this.#wanted.first / PAGE), Math.floor(this.#wanted.last / PAGE));
  }

  #askPages(first: number, last: number): void {
    if (this.#query === null) return;
    for (let page = first; page <= last; page++) {
      const lies = this.#total === null || this.isStale || page * PAGE < Math.max(1, this.#total);
      if (lies && !this.#asked.has(page)) void this.#askPage(this.#query, page);
    }
  }

  async #askPage(query: SalesQuery, page: number): Promise<void> {
    const generation = this.#generation;
    this.#asked.add(page);
    try {
      const answer = await this.#ports.ask({ ...query, offset: page * PAGE, limit: PAGE });
      if (generation === this.#generation) this.#keep(page, answer);
    } catch (cause) {
      if (generation !== this.#generation) return;
      this.#asked.delete(page);
      this.#error = this.#ports.errorOf(cause);
      this.#tell();
    }
  }

  #keep(page: number, { total, rows }: SalesPage): void {
    if (this.isStale) {
      this.#pages = new Map();
      this.#answered = this.#generation;
    }
    this.#total = total;
    this.#error = null;
    this.#pages.set(page, rows);
    this.#forget();
    this.#tell();
    if (total <= WHOLE) this.#askPages(0, Math.ceil(total / PAGE) - 1);
  }

  #forget(): void {
    const middle = (this.#wanted.first + this.#wanted.last) / 2 / PAGE;
    while (this.#pages.size > KEPT) {
      const farthest = [...this.#pages.keys()].reduce((a, b) => (Math.abs(a - middle) > Math.abs(b - middle) ? a : b));
      this.#pages.delete(farthest);
      this.#asked.delete(farthest);
    }
  }

  #tell(): void {
    this.#version++;
    for (const tell of this.#listeners) tell();
  }
}
