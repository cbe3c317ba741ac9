/**
 * The journal: append-only, each entry sealed with the SHA-256 of the entry before it and its own canonical text, so that
 * an entry altered, taken out or put in between is found. Triggers refuse UPDATE and DELETE.
 */
import { createHash } from "node:crypto";
import type { Database } from "better-sqlite3";
import type { JournalEntry } from "../domain/importRecord.ts";

export type NewJournalEntry = Omit<JournalEntry, "id" | "previousDigest" | "digest">;

export interface ChainVerdict {
  readonly intact: boolean;
  readonly sentence: string;
  /** First entry that does not fit, or null. */
  readonly brokenAt: number | null;
}

interface JournalRow {
  id: number;
  at_utc: string;
  by_whom: string;
  act: string;
  class_id: number | null;
  sentence: string;
  facts_json: string;
  previous_digest: string;
  digest: string;
}

/** What stands before the first entry. */
export const FIRST_DIGEST = "0".repeat(64);
const COLUMNS = "id, at_utc, by_whom, act, class_id, sentence, facts_json, previous_digest, digest";

/** SHA-256 over the previous digest, a line end and the entry as a JSON array; hexadecimal. */
function sealOf(row: Omit<JournalRow, "digest">): string {
  const canonical = JSON.stringify([
    row.id,
    row.at_utc,
    row.by_whom,
    row.act,
    row.class_id,
    row.sentence,
    row.facts_json,
  ]);
  return createHash("sha256").update(`${row.previous_digest}\n${canonical}`, "utf8").digest("hex");
}

function rowToEntry(row: JournalRow): JournalEntry {
  return {
    id: row.id,
    atUtc: row.at_utc,
    by: row.by_whom,
    act: row.act,
    assetClassId: row.class_id,
    sentence: row.sentence,
    facts: JSON.parse(row.facts_json) as Record<string, unknown>,
    previousDigest: row.previous_digest,
    digest: row.digest,
  };
}

export type Journal = ReturnType<typeof journalOf>;

export function journalOf(db: Database) {
  const selectLast = db.prepare<[], JournalRow>(`SELECT ${COLUMNS} FROM journal ORDER BY id DESC LIMIT 1`);
  const selectAll = db.prepare<[], JournalRow>(`SELECT ${COLUMNS} FROM journal ORDER BY id`);
  const selectPage = db.prepare<[number, number], JournalRow>(
    `SELECT ${COLUMNS} FROM journal ORDER BY id DESC LIMIT ? OFFSET ?`,
  );
  const selectCount = db.prepare<[], number>("SELECT count(*) FROM journal").pluck();
  const selectSheetDigests = db.prepare<[], { number: string; digest: string }>(
    "SELECT number, digest FROM sheets ORDER BY id",
  );
  const selectIssued = db.prepare<[string], JournalRow>(
    `SELECT ${COLUMNS} FROM journal WHERE act = 'sheet-issued' AND json_extract(facts_json, '$.digest') = ? LIMIT 1`,
  );
  const insertRow = db.prepare(
    `INSERT INTO journal (id, at_utc, by_whom, act, class_id, sentence, facts_json, previous_digest, digest)
     VALUES (@id, @at_utc, @by_whom, @act, @class_id, @sentence, @facts_json, @previous_digest, @digest)`,
  );

  function broken(id: number): ChainVerdict {
    return {
      intact: false,
      brokenAt: id,
      sentence: `The journal has been altered: entry ${id} does not fit the one before it.`,
    };
  }

  /** Every issued sheet leaves its digest in the journal; one that is missing there means that the end was cut off. */
  function missingSheet(digests: ReadonlySet<unknown>): ChainVerdict | null {
    const sheet = selectSheetDigests.all().find(({ digest }) => !digests.has(digest));
    if (sheet === undefined) return null;
    return {
      intact: false,
      brokenAt: null,
      sentence: `The journal has been shortened: it no longer tells of sheet ${sheet.number}, which is in the store.`,
    };
  }

  return {
    append(entry: NewJournalEntry): JournalEntry {
      const last = selectLast.get();
      const unsealed = {
        id: (last?.id ?? 0) + 1,
        at_utc: entry.atUtc,
        by_whom: entry.by,
        act: entry.act,
        class_id: entry.assetClassId,
        sentence: entry.sentence,
        facts_json: JSON.stringify(entry.facts),
        previous_digest: last?.digest ?? FIRST_DIGEST,
      };
      const row: JournalRow = { ...unsealed, digest: sealOf(unsealed) };
      insertRow.run(row);
      return rowToEntry(row);
    },
    /** Newest first. */
    list: (offset: number, limit: number): JournalEntry[] => selectPage.all(limit, offset).map(rowToEntry),
    count: (): number => selectCount.get()!,
    /** The entry that tells of the issue of the sheet with this digest, or null. */
    findSheetIssued(digest: string): JournalEntry | null {
      const row = selectIssued.get(digest);
      return row === undefined ? null : rowToEntry(row);
    },
    /** Walks the whole chain, then asks whether every sheet in the store is told of ("sheet-issued", facts.digest). */
    verifyChain(): ChainVerdict {
      let previous = FIRST_DIGEST;
      let expectedId = 1;
      const sheetDigests = new Set<unknown>();
      for (const row of selectAll.iterate()) {
        if (row.id !== expectedId || row.previous_digest !== previous || sealOf(row) !== row.digest)
          return broken(row.id);
        if (row.act === "sheet-issued") sheetDigests.add((JSON.parse(row.facts_json) as { digest?: unknown }).digest);
        previous = row.digest;
        expectedId++;
      }
      const entries = expectedId === 2 ? "1 entry" : `${expectedId - 1} entries`;
      return (
        missingSheet(sheetDigests) ?? {
          intact: true,
          brokenAt: null,
          sentence: `The journal is whole: ${entries}, each fits the one before it.`,
        }
      );
    },
  };
}
