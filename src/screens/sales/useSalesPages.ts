/** The register's pages for a query, read again when the class's data changed. */
import { useEffect, useMemo, useSyncExternalStore } from "react";
import { plainErrorOf } from "../workbench/useAppraisal.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import { PageBook, type SalesQuery } from "./pageBook.ts";

export function useSalesPages(query: SalesQuery | null): { book: PageBook; version: number } {
  const { client, assetClass } = useWorkbench();
  const book = useMemo(
    () => new PageBook({ ask: (input) => client.ask("listSales", input), errorOf: plainErrorOf }),
    [client],
  );
  const stamp = assetClass?.dataVersion ?? 0;
  // biome-ignore lint/correctness/useExhaustiveDependencies: the stamp says that the data behind the same query changed
  useEffect(() => {
    if (query !== null) book.open(query);
  }, [book, query, stamp]);
  return { book, version: useSyncExternalStore(book.subscribe, book.version) };
}
