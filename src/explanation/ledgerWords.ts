/**
 * The ledger in sentences: direction, amount and reason, one true sentence per attribute.
 * Words only; every number comes from the ledger row, rounded as the printed table rounds it.
 */
import type { LedgerRow } from "../domain/appraisal.ts";
import { MARKET_KEY } from "../domain/attribute.ts";
import { formatMoney, formatNumber, listWords, lowerStart, niceStep, roundTo, roundToAddUp } from "../domain/format.ts";

/** How one step of the row's attribute moves each left-out number, by key. */
export type ComesWith = ReadonlyMap<string, Move>;

export interface Move {
  readonly amount: number;
  readonly unit: string;
}

/** A carried part smaller than this share of the row's largest part is not worth a clause. */
const WORTH_SAYING = 0.05;

/**
 * Step that a row's money is shown in: three digits of its largest part, never below 1.
 * Table and sentence share it, so that they never disagree.
 */
export function moneyStep(row: Pick<LedgerRow, "money">): number {
  const largest = Math.max(Math.abs(row.money.own), Math.abs(row.money.coefficient), 1);
  return Math.max(1, Math.min(10, niceStep(largest / 100)));
}

/** The row's money as it is shown: rounded so that own and carried parts add up to the coefficient. */
function asShown({ money: { coefficient, own, carried } }: LedgerRow, step: number): LedgerRow["money"] {
  const whole = roundTo(coefficient, step);
  const [shownOwn, ...parts] = roundToAddUp([own, ...carried.map((part) => part.amount)], whole, step);
  return { coefficient: whole, own: shownOwn!, carried: carried.map((part, at) => ({ ...part, amount: parts[at]! })) };
}

function money(amount: number, step: number, currencyCode: string): string {
  return formatMoney(Math.abs(roundTo(amount, step)), currencyCode);
}

function moreOrLess(amount: number, step: number, currencyCode: string): string {
  if (roundTo(amount, step) === 0) return "no difference";
  return `${money(amount, step, currencyCode)} ${amount < 0 ? "less" : "more"}`;
}

/** "Each extra 1,000 h", "Each extra year of age", "Make Orveld, against Tessaly,", "Coupler, yes against no,", "A sale 12 months later". */
export function subjectOf(row: Pick<LedgerRow, "attribute" | "label" | "level" | "stepWords">): string {
  if (row.attribute === MARKET_KEY) {
    if (row.level === null) return `A sale ${row.stepWords} later`;
    return row.stepWords.startsWith("from ")
      ? `Market movement ${row.stepWords}`
      : `A sale in ${row.level}, ${row.stepWords},`;
  }
  if (row.stepWords.startsWith("from ")) return `${row.label} ${row.stepWords}`;
  if (row.level === null) return `Each extra ${stepOfLabel(row)}`;
  return row.stepWords.startsWith("against")
    ? `${row.label} ${row.level}, ${row.stepWords},`
    : `${row.label}, ${row.stepWords},`;
}

/** "1,000 h" where the unit already says it, else "10 kW of power", "year of age", "10 % more lot size". */
function stepOfLabel({ label, stepWords }: Pick<LedgerRow, "label" | "stepWords">): string {
  const name = lowerStart(label.replace(/ \([^)]*\)$/, ""));
  if (stepWords.endsWith("more")) return `${stepWords.replace(/ more$/, "")} of ${name}`;
  const [size, unit] = stepWords.split("\u00a0");
  if (unit === undefined) return stepWords === "1" ? name : `${stepWords} of ${name}`;
  if (unit.length === 1 && name.startsWith(unit)) return stepWords;
  return `${size === "1" ? unit : stepWords} of ${name}`;
}

export function rowSentence(row: LedgerRow, comesWith: ComesWith, currencyCode: string): string {
  const step = moneyStep(row);
  const shown = asShown(row, step);
  const now = `${subjectOf(row)} goes with ${moreOrLess(row.money.coefficient, step, currencyCode)}`;
  const strongest = strongestCarried(row);
  if (row.carriedParts.length === 0) return `${now}, the other attributes alike.`;
  if (strongest === null) return `${now}; next to nothing of it is carried.`;
  const part = row.carriedParts.find((one) => one.from === strongest.from)!;
  const own = `among items alike in ${alikeIn(row)} it is ${moreOrLess(shown.own, step, currencyCode)}`;
  const turned = row.signTurned ? ", the other way round" : "";
  const amount = shown.carried.find((one) => one.from === strongest.from)!.amount;
  const carried = `${money(amount, step, currencyCode)} ${strongest.amount < 0 ? "less" : "more"} is carried for ${lowerStart(part.fromLabel)}`;
  return `${now}; ${own}${turned}, and ${carried}${reason(row, comesWith.get(strongest.from))}.`;
}

/** The attributes left out, or that there are several of them. */
function alikeIn(row: LedgerRow): string {
  return row.carriedParts.length > 2
    ? "what is left out"
    : listWords(row.carriedParts.map((part) => lowerStart(part.fromLabel)));
}

function reason(row: LedgerRow, move: Move | undefined): string {
  const words = moveWords(row, move);
  return words === null ? "" : `, because among these sales ${words}`;
}

/** "each 1,000 h comes with 1.3 more years", or null where there is nothing to say. */
function moveWords(row: LedgerRow, move: Move | undefined): string | null {
  if (move === undefined || move.amount === 0) return null;
  const decimals = Math.abs(move.amount) >= 10 ? 0 : Math.abs(move.amount) >= 1 ? 1 : 2;
  const step =
    row.level === null && row.attribute !== MARKET_KEY ? `each ${row.stepWords.replace(/^1\u00a0/, "")}` : "it";
  return `${step} comes with ${formatNumber(Math.abs(move.amount), decimals)} ${move.amount < 0 ? "fewer" : "more"} ${move.unit}`;
}

function strongestCarried(row: LedgerRow): { from: string; amount: number } | null {
  const largest = Math.max(Math.abs(row.money.own), Math.abs(row.money.coefficient));
  let strongest: { from: string; amount: number } | null = null;
  for (const part of row.money.carried) {
    if (Math.abs(part.amount) < WORTH_SAYING * largest) continue;
    if (strongest === null || Math.abs(part.amount) > Math.abs(strongest.amount)) strongest = part;
  }
  return strongest;
}

/** The one sentence over the ledger: the row that carries most. */
export function ledgerHeadline(
  described: readonly { readonly row: LedgerRow; readonly moves: ComesWith }[],
  leftOut: readonly { key: string; label: string }[],
  currencyCode: string,
): string {
  const rows = described.map(({ row }) => row);
  if (rows.length === 0) return "No attribute is in the model: every item is priced at the average of the evidence.";
  if (leftOut.length === 0) {
    return "Every attribute of the reference set is in the model, so each coefficient says only its own part.";
  }
  const most = rows.reduce((best, row) => (carriedSize(row) > carriedSize(best) ? row : best));
  const step = moneyStep(most);
  const names = listWords(leftOut.map((one) => lowerStart(one.label)));
  if (roundTo(carriedSize(most), step) === 0) {
    return `With ${names} left out, next to nothing is carried by the attributes that stay.`;
  }
  const turned = most.signTurned ? "; the sign has turned" : "";
  const strongest = strongestCarried(most);
  const { moves } = described.find(({ row }) => row === most)!;
  const why = strongest === null ? null : moveWords(most, moves.get(strongest.from));
  const label = leftOut.find((one) => one.key === strongest?.from)?.label ?? "";
  const rest = most.money.coefficient - most.money.own;
  const share = (strongest?.amount ?? 0) / rest >= 0.5 ? "most" : "the largest part";
  return (
    `With ${names} left out, ${startLow(subjectOf(most))} reads ${signed(most.money.coefficient, step, currencyCode)}. ` +
    `Among items alike in ${leftOut.length === 1 ? "that" : "those"} it is ${signed(asShown(most, step).own, step, currencyCode)}${turned}` +
    `${why === null ? "" : `; ${share} of the rest is ${lowerStart(label)}, as ${why}`}.`
  );
}

function startLow(text: string): string {
  return /^(Each|A) /.test(text) ? lowerFirst(text) : text;
}

function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

function carriedSize(row: LedgerRow): number {
  return Math.max(0, ...row.money.carried.map((part) => Math.abs(part.amount)));
}

function signed(amount: number, step: number, currencyCode: string): string {
  return formatMoney(roundTo(amount, step), currencyCode);
}
