/**
 * What the columns of a tried file are: the wishes by the file's own headings, kinds judged by the cells where nobody said
 * them, and the column match that follows.
 */
import type { AttributeKind } from "../domain/attribute.ts";
import { AppError } from "../domain/errors.ts";
import type { ColumnMatch, ColumnTarget } from "../domain/importRecord.ts";
import { matchColumns } from "../import/matchColumns.ts";
import { isNotStated } from "../import/reading.ts";
import { readNumber } from "../import/readNumber.ts";
import type { RawTable } from "../import/readSalesFile.ts";
import type { TryRequest } from "./tryFile.ts";

/** ISO 4217 for "no currency": the file has no such column. */
const NO_CURRENCY = "XXX";
/** What a file may say beside price and attributes, and is taken at its word for. */
const OTHER_TARGETS = ["soldOn", "reference", "title", "currency", "channel"];

export function refusal(code: string, what: string, where: string, whatToDo: string): AppError {
  return new AppError({ family: "request", code, what, where, whatToDo });
}

/** The heading as the file writes it. */
function headingOf(name: string, table: RawTable, option: string): string {
  const wanted = name.trim().toLowerCase();
  const found =
    table.headings.find((heading) => heading === name) ??
    table.headings.find((heading) => heading.toLowerCase() === wanted);
  if (found !== undefined) return found;
  throw refusal(
    "unknown-column",
    `The file has no column "${name}".`,
    option,
    `Its columns are: ${table.headings.join(", ")}.`,
  );
}

export interface Wishes {
  readonly price: string;
  readonly attributes: readonly string[];
  readonly choices: readonly string[];
  readonly ln: readonly string[];
  readonly leaveOut: readonly string[];
}

function memberOf(attributes: readonly string[], heading: string, option: string): string {
  if (attributes.includes(heading)) return heading;
  throw refusal("not-in-set", `"${heading}" is not in the reference set.`, option, "Name it under --attributes too.");
}

/** All wishes by the file's own headings; refuses names that are no column, stand twice or contradict each other. */
export function wishesOf(request: TryRequest, table: RawTable): Wishes {
  const price = headingOf(request.price, table, "--price");
  const attributes = request.attributes.map((name) => headingOf(name, table, "--attributes"));
  const twice = attributes.find((heading, index) => heading === price || attributes.indexOf(heading) !== index);
  if (twice !== undefined) {
    throw refusal(
      "named-twice",
      `The column "${twice}" is named twice.`,
      "--attributes",
      "Name each column once, and the price under --price only.",
    );
  }
  const among = (names: readonly string[], option: string): string[] =>
    names.map((name) => memberOf(attributes, headingOf(name, table, option), option));
  const wishes = {
    price,
    attributes,
    choices: among(request.choices, "--choices"),
    ln: among(request.ln, "--ln"),
    leaveOut: among(request.leaveOut, "--leave-out"),
  };
  const both = wishes.ln.find((heading) => wishes.choices.includes(heading));
  if (both === undefined) return wishes;
  throw refusal(
    "contradiction",
    `"${both}" can't be a choice and enter by its logarithm.`,
    "--ln",
    "Leave it out of one of the two.",
  );
}

const YES_NO = /^(yes|no|y|n|true|false)$/i;
/** Mostly numbers: the cells that are none will be held back with their reason, rather than make the whole column a choice. */
const MOSTLY = 0.9;

/** Numbers unless the cells say otherwise: text is a choice, yes and no are yes/no, full days are a built day. */
function kindOf(table: RawTable, heading: string, proposed: ColumnTarget): AttributeKind {
  const at = table.headings.indexOf(heading);
  const filled = table.rows.map(({ cells }) => (cells[at] ?? "").trim()).filter((cell) => !isNotStated(cell));
  if (filled.length > 0 && filled.every((cell) => YES_NO.test(cell))) return "yesNo";
  if (filled.filter((cell) => readNumber(cell, table.options).ok).length >= MOSTLY * filled.length) return "number";
  if (proposed.to !== "newAttribute") return "choice";
  // Numbers with their unit in the cell are recognised by the import.
  return proposed.kind === "yesNo" ? "choice" : proposed.kind;
}

function targetFor(heading: string, table: RawTable, proposed: ColumnTarget, wishes: Wishes): ColumnTarget {
  if (heading === wishes.price) return { to: "price" };
  if (wishes.attributes.includes(heading)) {
    const kind = wishes.choices.includes(heading) ? "choice" : kindOf(table, heading, proposed);
    const unit = proposed.to === "newAttribute" ? proposed.unit : null;
    return { to: "newAttribute", label: heading, kind, unit };
  }
  return OTHER_TARGETS.includes(proposed.to) ? proposed : { to: "nothing" };
}

export function matchFor(table: RawTable, wishes: Wishes, request: TryRequest): ColumnMatch {
  const proposal = matchColumns(table, [], null);
  const columns = proposal.columns.map(({ heading, target }) => ({
    heading,
    target: targetFor(heading, table, target, wishes),
  }));
  const says = (word: string): boolean => columns.some(({ target }) => target.to === word);
  const currencyCode = says("currency") ? proposal.fixed.currencyCode : NO_CURRENCY;
  const fixed = {
    ...proposal.fixed,
    soldOn: says("soldOn") ? null : request.today,
    currencyCode,
    source: request.fileName,
  };
  return { columns, fixed };
}
