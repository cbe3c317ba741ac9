/** "The evidence": what came in, what is used, and what is not used by reason, adding up; sources, channels, verification. */
import type { OutReason } from "../../domain/appraisal.ts";
import { formatDay, formatNumber, listWords } from "../../domain/format.ts";
import { plural } from "../figures.ts";
import type { Section } from "../sheetContent.ts";
import type { SheetContext } from "./context.ts";

const REASON_WORDS: Readonly<Record<OutReason, string>> = {
  "set-aside": "set aside by a person",
  channel: "channel not taken",
  "too-early": "sold too early",
  "too-late": "sold too late",
  "after-effective-date": "sold after the effective date",
  "not-verified": "not verified",
  "other-currency": "other currency",
  "other-price-basis": "other price basis",
  "value-missing": "a value is missing",
  "no-logarithm": "no logarithm of a value",
};

/** Reasons with a cell of their own; the rest stand together. */
const CELLS = 6;
const SOURCES = 4;
const DETAILS = 8;
/** Letters of what people wrote, in a note of one paragraph. */
const BRIEF = 70;

function brief(text: string): string {
  return text.length <= BRIEF ? text : `${text.slice(0, BRIEF - 2).trimEnd()} …`;
}

interface Reason {
  readonly words: string;
  readonly count: number;
}

function reasons({ appraisal }: SheetContext): Reason[] {
  const counts = new Map<string, number>();
  for (const { reason, saleIds } of appraisal.evidence.out) {
    const words = REASON_WORDS[reason] ?? reason;
    counts.set(words, (counts.get(words) ?? 0) + saleIds.length);
  }
  const all = [...counts].map(([words, count]) => ({ words, count })).sort((a, b) => b.count - a.count);
  if (all.length <= CELLS) return all;
  const rest = all.slice(CELLS - 1);
  return [
    ...all.slice(0, CELLS - 1),
    { words: `${rest.length} other reasons`, count: rest.reduce((sum, one) => sum + one.count, 0) },
  ];
}

function sourcesWords({ sheet }: SheetContext): string {
  const counts = new Map<string, number>();
  for (const { source } of sheet.evidence.rows) counts.set(source, (counts.get(source) ?? 0) + 1);
  const all = [...counts]
    .filter(([source]) => source.trim() !== "")
    .sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1));
  if (all.length === 0) return "";
  const named = all.slice(0, SOURCES).map(([source, count]) => `${brief(source)} (${formatNumber(count)})`);
  const rest = all.length - named.length;
  if (rest > 0) named.push(`${rest} ${plural(rest, "other")}`);
  return ` Sources: ${listWords(named)}.`;
}

/** The reasons in detail, the commonest first. */
function detailsWords({ appraisal }: SheetContext): string {
  const details = appraisal.evidence.out
    .filter(({ detail }) => detail !== null && detail !== "")
    .sort((a, b) => b.saleIds.length - a.saleIds.length);
  if (details.length === 0) return "";
  const said = details
    .slice(0, DETAILS)
    .map(
      ({ reason, detail, saleIds }) =>
        `${REASON_WORDS[reason] ?? reason}: ${brief(detail!)} (${formatNumber(saleIds.length)})`,
    );
  const rest = details.length - said.length;
  if (rest > 0) said.push(`${formatNumber(rest)} further ${plural(rest, "reason")}`);
  return ` Not used, in detail: ${said.join("; ")}.`;
}

function note(context: SheetContext): string {
  const { evidence } = context.appraisal;
  const when =
    evidence.firstSoldOn === null || evidence.lastSoldOn === null
      ? ""
      : `Sold ${formatDay(evidence.firstSoldOn)} to ${formatDay(evidence.lastSoldOn)}; `;
  const channels = evidence.channels.map(({ channel, count }) => `${formatNumber(count)} ${channel}`).join(", ");
  const open = evidence.used - evidence.verifiedCount;
  const verified =
    open === 0
      ? "all verified"
      : evidence.verifiedCount === 0
        ? "none verified"
        : `${formatNumber(evidence.verifiedCount)} verified, ${formatNumber(open)} not`;
  return `${when}${channels === "" ? "" : `${channels}; `}${verified}.${sourcesWords(context)}${detailsWords(context)}`;
}

export function evidenceSection(context: SheetContext): Section {
  const { evidence } = context.appraisal;
  const out = evidence.read - evidence.used;
  const carry = `${formatNumber(evidence.used)} ${plural(evidence.used, "sale carries", "sales carry")} the price`;
  const lead =
    out === 0
      ? `All ${formatNumber(evidence.read)} ${plural(evidence.read, "record")} came into the evidence: ${carry}.`
      : `Of ${formatNumber(evidence.read)} ${plural(evidence.read, "record")}, ${carry} and ${formatNumber(out)} ${plural(out, "does", "do")} not, each for a reason on file.`;
  return {
    heading: "The evidence",
    lead,
    parts: [
      {
        kind: "counts",
        counts: {
          cameIn: formatNumber(evidence.read),
          used: formatNumber(evidence.used),
          restHead: out === 0 ? "" : `${formatNumber(out)} not used, of these`,
          rest: reasons(context).map(({ words, count }) => ({ count: formatNumber(count), words })),
        },
      },
      { kind: "note", text: note(context) },
    ],
  };
}
