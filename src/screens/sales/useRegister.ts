/** What a person does in the register: which sales are shown, which are picked, where the cursor stands, what is being asked. */
import { useCallback, useMemo, useState } from "react";
import type { Sale } from "../../domain/sale.ts";
import { NO_FILTER } from "./filters.ts";
import type { PageBook, SalesFilter, SalesQuery } from "./pageBook.ts";
import { useSalesPages } from "./useSalesPages.ts";

export type Asking = "verify" | "setAside" | null;

export interface Cursor {
  readonly row: number;
  /** Index into the shown columns; 0 is the pick box. */
  readonly column: number;
}

export interface Register {
  readonly query: SalesQuery;
  readonly book: PageBook;
  /** Changes whenever a page came. */
  readonly version: number;
  readonly cursor: Cursor;
  readonly picked: ReadonlyMap<number, Sale>;
  readonly asking: Asking;
  /** What an act would be done to: the picked sales, else the one under the cursor. */
  readonly meant: readonly Sale[];
  setFilter(filter: SalesFilter): void;
  sortBy(id: string): void;
  moveTo(cursor: Cursor): void;
  pick(sales: readonly Sale[], isPicked: boolean): void;
  clearPicks(): void;
  ask(asking: Asking): void;
}

const NEWEST_FIRST = { by: "soldOn", descending: true };

export function useRegister(classId: number): Register {
  const [filter, setOnlyFilter] = useState<SalesFilter>(NO_FILTER);
  const [sort, setSort] = useState(NEWEST_FIRST);
  const [cursor, moveTo] = useState<Cursor>({ row: 0, column: 3 });
  const [picked, setPicked] = useState<ReadonlyMap<number, Sale>>(new Map());
  const [asking, ask] = useState<Asking>(null);
  const query = useMemo(() => ({ classId, sort, filter }), [classId, sort, filter]);
  const { book, version } = useSalesPages(query);

  const setFilter = useCallback((next: SalesFilter) => {
    setOnlyFilter(next);
    moveTo((now) => ({ ...now, row: 0 }));
  }, []);
  const sortBy = useCallback((by: string) => {
    setSort((now) => ({ by, descending: now.by === by ? !now.descending : false }));
    moveTo((now) => ({ ...now, row: 0 }));
  }, []);
  const pick = useCallback((sales: readonly Sale[], isPicked: boolean) => {
    setPicked((now) => {
      const next = new Map(now);
      for (const sale of sales) {
        if (isPicked) next.set(sale.id, sale);
        else next.delete(sale.id);
      }
      return next;
    });
  }, []);
  const clearPicks = useCallback(() => setPicked(new Map()), []);

  // biome-ignore lint/correctness/useExhaustiveDependencies: the version says that rows came
  const meant = useMemo(() => {
    const current = new Map([...book.rows()].map(([, sale]) => [sale.id, sale]));
    if (picked.size > 0) return [...picked.values()].map((sale) => current.get(sale.id) ?? sale);
    const under = book.rowAt(cursor.row);
    return under === null ? [] : [under];
  }, [book, version, picked, cursor.row]);

  return useMemo(
    () => ({ query, book, version, cursor, picked, asking, meant, setFilter, sortBy, moveTo, pick, clearPicks, ask }),
    [query, book, version, cursor, picked, asking, meant, setFilter, sortBy, pick, clearPicks],
  );
}
