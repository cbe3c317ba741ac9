/**
 * The ledger as it is printed: own part, at most two carried columns (the rest together), what it reads, half its range. Parts
 * are rounded so that what is printed adds up; the exact value is kept for hover and focus.
 */
import type { Ledger, LedgerRow } from "../../domain/appraisal.ts";
import { MARKET_KEY } from "../../domain/attribute.ts";
import { listWords, lowerStart, roundTo, roundToAddUp } from "../../domain/format.ts";
import { amountWords, partRanges, rowRangeWords } from "../../domain/ledgerRanges.ts";
import { rowStep } from "../charts/figures.ts";

export interface LedgerColumn {
  readonly keys: readonly string[];
  /** "for age", "for 3 others" */
  readonly heading: string;
  readonly label: string;
}

export interface PrintedRow {
  readonly id: string;
  readonly name: string;
  readonly step: string;
  /** Exact: own part, then one per column; their sum is the coefficient in money. */
  readonly parts: readonly number[];
  readonly printed: readonly number[];
  /** "−710 ± 160" per part, 95 %; null where no range is known or several parts share the column. */
  readonly partRanges: readonly (string | null)[];
  /** "own part −710 ± 160; carried for age −1,430 ± 210" */
  readonly rangeWords: string | null;
  readonly reads: number;
  readonly exactReads: number;
  readonly halfRange: number | null;
  readonly range: { readonly low: number; readonly high: number } | null;
  readonly signTurned: boolean;
  readonly sentence: string;
  /** Index of the carried column that moves this row most, when it moves it noticeably. */
  readonly mostCarried: number | null;
  readonly attribute: string;
  /** Key of the attribute that this row carries most for; null where it carries nothing. */
  readonly carriesFor: string | null;
}

const MOST_COLUMNS = 2;
/** A carried part of this share of the own part is worth the eye. */
const NOTICEABLE = 0.25;

function carriedFrom(row: LedgerRow, keys: readonly string[]): number {
  return row.money.carried.reduce((sum, part) => (keys.includes(part.from) ? sum + part.amount : sum), 0);
}

/** The attributes that are carried, largest first; those past the second share a column. */
export function ledgerColumns(ledger: Ledger): LedgerColumn[] {
  const labels = new Map<string, string>();
  const sizes = new Map<string, number>();
  for (const row of ledger.rows) {
    const scale = Math.max(Math.abs(row.money.own), Math.abs(row.money.coefficient), 1e-9);
    for (const part of row.carriedParts) labels.set(part.from, part.fromLabel);
    for (const part of row.money.carried) {
      sizes.set(part.from, (sizes.get(part.from) ?? 0) + Math.abs(part.amount) / scale);
    }
  }
  const keys = [...labels.keys()].sort((a, b) => (sizes.get(b) ?? 0) - (sizes.get(a) ?? 0));
  const single = keys.length > MOST_COLUMNS ? keys.slice(0, MOST_COLUMNS - 1) : keys;
  const rest = keys.slice(single.length);
  const columns = single.map((key) => {
    const label = lowerStart(labels.get(key)!);
    return { keys: [key], heading: `for ${label}`, label };
  });
  if (rest.length === 0) return columns;
  const names = listWords(rest.map((key) => lowerStart(labels.get(key)!)));
  return [...columns, { keys: rest, heading: `for ${rest.length} others`, label: names }];
}

export function nameOf(row: Pick<LedgerRow, "label" | "level" | "attribute" | "stepWords">): string {
  if (row.level === null || row.level === "yes" || row.stepWords.startsWith("from ")) return row.label;
  return row.attribute === "channel" ? `Sold through ${row.level}` : row.level;
}

/** A column of several attributes has no range of its own: how their errors move together is not known here. */
function rangesOf(row: LedgerRow, columns: readonly LedgerColumn[]): (string | null)[] {
  const ranges = partRanges(row);
  const keys = [null, ...columns.map((column) => (column.keys.length === 1 ? column.keys[0]! : undefined))];
  return keys.map((key) => {
    const one = ranges.find(({ from }) => from === key);
    return one === undefined || one.halfRange === null ? null : amountWords(one.amount, one.halfRange);
  });
}

function carriesMost({ money }: LedgerRow): string | null {
  const sorted = [...money.carried].sort((a, b) => Math.abs(b.amount) - Math.abs(a.amount));
  return sorted[0]?.from ?? null;
}

export function printRow(row: LedgerRow, columns: readonly LedgerColumn[]): PrintedRow {
  const step = rowStep(row.money);
  const parts = [row.money.own, ...columns.map((column) => carriedFrom(row, column.keys))];
  const printed = roundToAddUp(parts, row.money.coefficient, step);
  const range = row.moneyRange95;
  const carried = parts.slice(1).map(Math.abs);
  const most = carried.length === 0 ? null : carried.indexOf(Math.max(...carried));
  const isNoticeable = most !== null && carried[most]! >= NOTICEABLE * Math.abs(row.money.own);
  return {
    id: `${row.attribute} ${row.level ?? ""}`,
    name: nameOf(row),
    step: row.stepWords === "yes against no" ? "yes" : row.stepWords,
    parts,
    printed,
    partRanges: rangesOf(row, columns),
    rangeWords: rowRangeWords(row),
    reads: printed.reduce((sum, part) => sum + part, 0),
    exactReads: row.money.coefficient,
    halfRange: range === null ? null : Math.max(step, roundTo((range.high - range.low) / 2, step)),
    range,
    signTurned: row.signTurned,
    sentence: row.sentence,
    mostCarried: isNoticeable ? most : null,
    attribute: row.attribute,
    carriesFor: carriesMost(row),
  };
}

/** Market movement last but for the channels, as on the sheet: rows come in the order of the model. */
export function printLedger(ledger: Ledger): { columns: readonly LedgerColumn[]; rows: readonly PrintedRow[] } {
  const columns = ledgerColumns(ledger);
  const isLast = (row: LedgerRow): number => (row.attribute === MARKET_KEY ? 1 : row.attribute === "channel" ? 2 : 0);
  const ordered = [...ledger.rows].sort((a, b) => isLast(a) - isLast(b));
  return { columns, rows: ordered.map((row) => printRow(row, columns)) };
}
