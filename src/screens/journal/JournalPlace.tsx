/** The journal: who did what when, newest first, and whether its chain of digests holds. Nothing in it can be changed. */
import { useCallback, useState } from "react";
import { formatDay, formatNumber } from "../../domain/format.ts";
import type { JournalEntry } from "../../domain/importRecord.ts";
import { Busy, Button, EmptyState, ErrorNote, Sentence } from "../parts/index.ts";
import { useRead } from "../workbench/useTask.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./JournalPlace.module.css";

const PAGE = 100;

export function JournalPlace() {
  const { client, summary } = useWorkbench();
  const [offset, setOffset] = useState(0);
  const [search, setSearch] = useState("");
  // A new count of sheets or editions means that something was written since.
  const stamp = `${summary?.sheetCount} ${summary?.editionCount} ${summary?.saleCount}`;
  // biome-ignore lint/correctness/useExhaustiveDependencies: `stamp` asks again when the class has changed
  const ask = useCallback(() => client.ask("listJournal", { offset, limit: PAGE }), [client, offset, stamp]);
  const { value, error } = useRead(ask);
  if (error !== null) return <ErrorNote error={error} />;
  if (value === null) return <Busy words="Reading the journal" />;
  const wanted = search.trim().toLowerCase();
  const entries = value.entries.filter((one) => `${one.act} ${one.sentence} ${one.by}`.toLowerCase().includes(wanted));
  return (
    <div className={css.place}>
      <Sentence>
        {formatNumber(value.total)} {value.total === 1 ? "entry" : "entries"}. {value.chainSentence}
      </Sentence>
      <p className={css.chain} data-intact={value.chainIntact}>
        {value.chainIntact
          ? "Each entry holds the digest of the one before it."
          : "The chain is broken: do not rely on it."}
      </p>
      <label className={css.search}>
        Find in this page
        <input value={search} onChange={(event) => setSearch(event.target.value)} />
      </label>
      {value.total === 0 ? (
        <EmptyState sentence="Nothing has been done yet. Bringing sales in, setting one aside, saving an edition and issuing a sheet each leave an entry." />
      ) : (
        <Entries entries={entries} />
      )}
      <div className={css.pages}>
        <Button disabled={offset === 0} onClick={() => setOffset(Math.max(0, offset - PAGE))}>
          Newer
        </Button>
        <span className="soft">
          {formatNumber(offset + 1)}–{formatNumber(Math.min(value.total, offset + PAGE))} of {formatNumber(value.total)}
        </span>
        <Button disabled={offset + PAGE >= value.total} onClick={() => setOffset(offset + PAGE)}>
          Older
        </Button>
      </div>
    </div>
  );
}

function Entries({ entries }: { readonly entries: readonly JournalEntry[] }) {
  return (
    <table className={css.entries}>
      <caption className="vh">Journal, newest first</caption>
      <thead>
        <tr>
          <th scope="col" className="num">
            no.
          </th>
          <th scope="col">when, UTC</th>
          <th scope="col">who</th>
          <th scope="col">what</th>
          <th scope="col">digest</th>
        </tr>
      </thead>
      <tbody>
        {entries.map((entry) => (
          <tr key={entry.id}>
            <td className="num soft">{entry.id}</td>
            <td className="soft">
              {formatDay(entry.atUtc.slice(0, 10))} {entry.atUtc.slice(11, 19)}
            </td>
            <td>{entry.by}</td>
            <td>
              <details>
                <summary>{entry.sentence}</summary>
                <pre>{JSON.stringify(entry.facts, null, 1)}</pre>
              </details>
            </td>
            <td className="soft">
              <span className={css.digest} title={entry.digest}>
                {entry.digest.slice(0, 12)}
              </span>
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
