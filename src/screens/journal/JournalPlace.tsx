/** The journal: who did what when, newest first, and whether the chain of its entries is intact. Nothing here can be changed. */
import { useCallback, useEffect, useState } from "react";
import type { RequestOutput } from "../../contract/requests.ts";
import type { PlainError } from "../../domain/errors.ts";
import { formatNumber } from "../../domain/format.ts";
import type { JournalEntry } from "../../domain/importRecord.ts";
import { Busy, Button, EmptyState, ErrorNote, Notice, Sentence } from "../parts/index.ts";
import { plainErrorOf } from "../workbench/useAppraisal.ts";
import { useWorkbench } from "../workbench/workbench.ts";
import css from "./JournalPlace.module.css";
import { WhoWorksHere } from "./WhoWorksHere.tsx";
import { dayHeading, timeOf } from "./when.ts";

type Page = RequestOutput<"listJournal">;

const PAGE = 100;

/** Entries so far; one more page is read at a time. */
function useJournal() {
  const { client } = useWorkbench();
  const [entries, setEntries] = useState<readonly JournalEntry[]>([]);
  const [head, setHead] = useState<Omit<Page, "entries"> | null>(null);
  const [error, setError] = useState<PlainError | null>(null);
  const [isReading, setReading] = useState(false);
  const read = useCallback(
    async (offset: number) => {
      setReading(true);
      try {
        const { entries: page, ...rest } = await client.ask("listJournal", { offset, limit: PAGE });
        setEntries((now) => (offset === 0 ? page : [...now, ...page]));
        setHead(rest);
        setError(null);
      } catch (cause) {
        setError(plainErrorOf(cause));
      } finally {
        setReading(false);
      }
    },
    [client],
  );
  useEffect(() => {
    void read(0);
  }, [read]);
  return { entries, head, error, isReading, readMore: () => void read(entries.length) };
}

export function JournalPlace() {
  const { client } = useWorkbench();
  const { entries, head, error, isReading, readMore } = useJournal();
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls is reached by key
    <section className={css.journal} aria-label="Journal" tabIndex={0}>
      {error === null ? null : <ErrorNote error={error} />}
      {head === null ? (
        error === null ? (
          <Busy words="Reading the journal …" />
        ) : null
      ) : (
        <>
          {head.chainIntact ? (
            <Sentence>{head.chainSentence}</Sentence>
          ) : (
            <Notice kind="refusal" title="The journal has been touched">
              <p>{head.chainSentence}</p>
            </Notice>
          )}
          <WhoWorksHere client={client} />
          {entries.length === 0 ? (
            <EmptyState sentence="Nothing has been done yet: the first import, edition or sheet opens the journal." />
          ) : (
            <Entries entries={entries} />
          )}
          {entries.length < head.total ? (
            <Button onClick={readMore} disabled={isReading}>
              {isReading ? "Reading …" : `Older entries (${formatNumber(head.total - entries.length)})`}
            </Button>
          ) : null}
        </>
      )}
    </section>
  );
}

function Entries({ entries }: { entries: readonly JournalEntry[] }) {
  const { classes } = useWorkbench();
  const nameOf = (id: number | null): string => classes.find((one) => one.id === id)?.name ?? "";
  return (
    <table className={css.entries}>
      <caption className="vh">Journal entries, newest first</caption>
      <thead>
        <tr>
          <th scope="col" className="num">
            no.
          </th>
          <th scope="col">when</th>
          <th scope="col">what</th>
          <th scope="col">class</th>
          <th scope="col">by</th>
          <th scope="col">seal</th>
        </tr>
      </thead>
      <tbody>
        {entries.map((entry, at) => {
          const isNewDay = at === 0 || dayHeading(entries[at - 1]!.atUtc) !== dayHeading(entry.atUtc);
          return (
            <tr key={entry.id} className={isNewDay ? css.newDay : undefined}>
              <td className="num soft">{formatNumber(entry.id)}</td>
              <td className={css.when}>
                <span className={isNewDay ? undefined : css.sameDay}>{dayHeading(entry.atUtc)}</span>{" "}
                <span className="soft">{timeOf(entry.atUtc)}</span>
              </td>
              <td className={css.what}>
                <details>
                  <summary>{entry.sentence}</summary>
                  <Facts entry={entry} />
                </details>
              </td>
              <td className="soft">{nameOf(entry.assetClassId)}</td>
              <td>{entry.by}</td>
              <td className={css.seal} title={entry.digest}>
                {entry.digest.slice(0, 8)}
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

/** What the entry keeps beside its sentence; long lists by their length. */
function Facts({ entry }: { entry: JournalEntry }) {
  const words = (value: unknown): string => {
    const text = typeof value === "string" ? value : JSON.stringify(value);
    return text.length > 300 ? `${text.slice(0, 300)} …` : text;
  };
  return (
    <dl className={css.facts}>
      <dt>act</dt>
      <dd>{entry.act}</dd>
      {Object.entries(entry.facts).map(([name, value]) => (
        <div key={name} style={{ display: "contents" }}>
          <dt>{name}</dt>
          <dd>{words(value)}</dd>
        </div>
      ))}
      <dt>seal before</dt>
      <dd>{entry.previousDigest}</dd>
      <dt>seal</dt>
      <dd>{entry.digest}</dd>
    </dl>
  );
}
