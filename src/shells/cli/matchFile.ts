/**
 * A person's column match as a file, laid over what the program proposes: only what is said is changed. A column's target may
 * be a word ("price", "soldOn", "nothing", an attribute's key) or the target object of the import itself.
 */
import type { ImportPreview } from "../../contract/requests.ts";
import type { ColumnMatch, ColumnTarget, ReadingOptions } from "../../domain/importRecord.ts";
import { refuse } from "./verb.ts";

const WORDS = [
  "price",
  "soldOn",
  "currency",
  "channel",
  "source",
  "reference",
  "title",
  "notes",
  "premium",
  "tax",
  "nothing",
];

function targetOf(given: unknown): ColumnTarget {
  // What kind of object it is, is checked with the request's input.
  if (typeof given !== "string") return given as ColumnTarget;
  if (WORDS.includes(given)) return { to: given } as ColumnTarget;
  return { to: "attribute", key: given };
}

function targetsByHeading(columns: unknown): Map<string, ColumnTarget> {
  if (Array.isArray(columns)) {
    const rows = columns as { heading: string; target: unknown }[];
    return new Map(rows.map(({ heading, target }) => [heading, targetOf(target)]));
  }
  return new Map(
    Object.entries((columns ?? {}) as Record<string, unknown>).map(([heading, given]) => [heading, targetOf(given)]),
  );
}

/** The proposal with the file's wishes in it; refuses a heading that the sales file does not have. */
export function applyMatchFile(
  file: Record<string, unknown>,
  path: string,
  proposal: ImportPreview,
): { options: ReadingOptions; match: ColumnMatch } {
  const wished = targetsByHeading(file.columns);
  const headings = proposal.match.columns.map(({ heading }) => heading);
  const unknown = [...wished.keys()].find((heading) => !headings.includes(heading));
  if (unknown !== undefined) {
    throw refuse(
      "unknown-column",
      `The sales file has no column "${unknown}".`,
      path,
      `Its columns are: ${headings.join(", ")}.`,
    );
  }
  const columns = proposal.match.columns.map(({ heading, target }) => ({
    heading,
    target: wished.get(heading) ?? target,
  }));
  const fixed = { ...proposal.match.fixed, ...((file.fixed ?? {}) as object) };
  return { options: { ...proposal.options, ...((file.options ?? {}) as object) }, match: { columns, fixed } };
}
