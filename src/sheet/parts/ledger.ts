/**
 * "Which attributes are in, and what the ones left out would say": the carry-over ledger, each coefficient as its own part and
 * what it carries, and each left-out attribute with its reason. Parts of a row are rounded so that they add up.
 */
import type { LedgerRow } from "../../domain/appraisal.ts";
import { formatMoney, formatSigned, listWords, lowerStart, roundTo, roundToAddUp } from "../../domain/format.ts";
import { moneyTo, rowStep, signedTo } from "../figures.ts";
import type { LedgerLine, Part, Section, Words } from "../sheetContent.ts";
import type { SheetContext } from "./context.ts";

/** Left-out attributes with a column of their own; the rest stand together. */
const OWN_COLUMNS = 2;

interface Column {
  readonly head: string;
  readonly keys: ReadonlySet<string>;
}

/** The left-out attributes that carry most, then the others together. */
function columns({ appraisal }: SheetContext): Column[] {
  const { leftOut, rows } = appraisal.ledger;
  const size = new Map(leftOut.map(({ key }) => [key, 0]));
  for (const row of rows) {
    for (const { from, amount } of row.money.carried) size.set(from, (size.get(from) ?? 0) + Math.abs(amount));
  }
  const sorted = leftOut
    .map((one, index) => ({ ...one, index }))
    .sort((a, b) => size.get(b.key)! - size.get(a.key)! || a.index - b.index);
  const own = sorted.length <= OWN_COLUMNS + 1 ? sorted : sorted.slice(0, OWN_COLUMNS);
  const others = sorted.slice(own.length);
  const heads: Column[] = own.map(({ key, label }) => ({ head: lowerStart(label), keys: new Set([key]) }));
  if (others.length > 0) {
    heads.push({ head: `${others.length} others`, keys: new Set(others.map(({ key }) => key)) });
  }
  return heads;
}

/** Of a choice with several levels only the subject's own is shown; where it is the reference, the level that differs most. */
function shownRows({ appraisal, priced }: SheetContext): LedgerRow[] {
  const rows = appraisal.ledger.rows.filter(({ attribute }) => attribute !== "intercept");
  return rows.filter((row) => {
    const family = rows.filter(({ attribute }) => attribute === row.attribute);
    if (row.level === null || family.length === 1) return true;
    const own = family.find(({ level }) => level === priced.subject.values[row.attribute]);
    const shown =
      own ??
      family.reduce((best, one) => (Math.abs(one.money.coefficient) > Math.abs(best.money.coefficient) ? one : best));
    return row === shown;
  });
}

/** "Hours" "per 1,000 h", "Make Quern" "against Tessaly", "Coupler" "yes against no". */
function nameOf({ label, level, stepWords }: LedgerRow): { label: string; unit: string } {
  if (level === null) return { label, unit: stepWords === "1" ? "each" : `per ${stepWords.replace(/^1\u00a0/, "")}` };
  return { label: stepWords.startsWith(level) ? label : `${label} ${level}`, unit: stepWords };
}

function lineOf(row: LedgerRow, heads: readonly Column[]): LedgerLine {
  const step = rowStep(row.money);
  const coefficient = roundTo(row.money.coefficient, step);
  const [own, ...each] = roundToAddUp(
    [row.money.own, ...row.money.carried.map(({ amount }) => amount)],
    coefficient,
    step,
  );
  const shown = row.money.carried.map(({ from }, index) => ({ from, amount: each[index]! }));
  const sumsOf = (carried: LedgerRow["money"]["carried"]): number[] =>
    heads.map(({ keys }) => carried.filter(({ from }) => keys.has(from)).reduce((sum, { amount }) => sum + amount, 0));
  const range = row.moneyRange95;
  return {
    ...nameOf(row),
    coefficient: formatSigned(coefficient),
    range: range === null ? "not known" : `${signedTo(step, range.low)} to ${signedTo(step, range.high)}`,
    own: formatSigned(own ?? coefficient),
    carried: sumsOf(shown).map((part) => formatSigned(part)),
    sentence: row.sentence,
    ownMoney: row.money.own,
    carriedMoney: sumsOf(row.money.carried),
    coefficientMoney: row.money.coefficient,
  };
}

export function ledgerSection(context: SheetContext): Section {
  const { appraisal, sign } = context;
  const heads = columns(context);
  const shown = shownRows(context);
  const lines = shown.map((row) => lineOf(row, heads));
  const hidden = appraisal.ledger.rows.filter(({ attribute }) => attribute !== "intercept").length - shown.length;
  const carriedHeads = heads.map(({ head }) => head);
  const table: Part = {
    kind: "ledger",
    table: {
      currencySign: sign,
      rangeHead: `95\u00a0% range, ${sign}`,
      carriedHeads,
      lines,
      alt: `Own and carried parts of each coefficient: ${lines
        .map(
          (line) =>
            `${line.label} ${line.unit}: ${line.coefficient}, of it own ${line.own}${carriedHeads.map((head, k) => `, carried for ${head} ${line.carried[k]}`).join("")}`,
        )
        .join("; ")}.`,
    },
  };
  const levels =
    hidden > 0
      ? ` Of a choice with several levels one is shown: this ${context.itemWord}’s own, or the one furthest from it.`
      : "";
  const note: Part = {
    kind: "note",
    text: `As used here = own part + carried parts, exactly. Money is read at the average sale, other attributes alike; see caution 9.${levels}`,
  };
  const parts: Part[] = lines.length > 0 ? [table, note] : [];
  const out = leftOutWords(context);
  if (out.length > 0) parts.push({ kind: "paragraphs", items: out, size: "small" });
  return { heading: "Which attributes are in, and what the ones left out would say", lead: leadWords(context), parts };
}

function leadWords({ appraisal }: SheetContext): string {
  const { leftOut } = appraisal.ledger;
  const { headline } = appraisal.ledger;
  if (headline !== "") return headline;
  return leftOut.length === 0
    ? "Nothing of the reference set is left out."
    : `Left out of the reference set: ${listWords(leftOut.map(({ label }) => lowerStart(label)))}.`;
}

function leftOutWords({ appraisal, priced, currencyCode, step }: SheetContext): Words[] {
  const ownOf = new Map<string, string>();
  for (const one of appraisal.ledger.leftOutOwn) {
    if (ownOf.has(one.key)) continue;
    const compared = one.stepWords.startsWith("against") ? `${one.level}, ${one.stepWords},` : `“${one.level}”`;
    const what = one.level === null ? `${one.stepWords} more` : compared;
    const sense = one.money < 0 ? "less" : "more";
    ownOf.set(
      one.key,
      ` Beside the full set, ${what} goes with ${moneyTo(Math.min(step, 10), Math.abs(one.money), currencyCode)} ${sense}.`,
    );
  }
  return appraisal.report.leftOut.map(({ key, label, sentence }) => {
    const effect = priced.notKnown.find((one) => one.key === key);
    const read =
      effect?.wouldRead.map(({ value, amount }) => `${formatMoney(roundTo(amount, step), currencyCode)} if ${value}`) ??
      [];
    const would = read.length === 0 ? "" : ` The price would read ${listWords(read)}.`;
    return [
      { text: `Left out: ${lowerStart(label)}. `, bold: true },
      { text: `${sentence}${ownOf.get(key) ?? ""}${would}` },
    ];
  });
}
