/**
 * What a sheet's PDF says about itself, read from its bytes alone: the attached evidence and the seal. The input is taken to be
 * hostile: the file must be one of ours byte for byte in its build, the attachment is capped in size, and its JSON is checked
 * before anyone relies on its shape.
 */
import type { SheetEvidence } from "../domain/sheetRecord.ts";
import { parseCanonicalJson } from "./canonicalJson.ts";
import { EVIDENCE_FILE } from "./parts/closing.ts";
import { follow, type PdfFile, readPdf, unreadable } from "./read/pdfObjects.ts";
import { readSeal } from "./sealPdf.ts";

export interface ReadSheet {
  readonly evidence: SheetEvidence;
  readonly sealFound: boolean;
  /** The file's bytes give the digest that it carries. */
  readonly sealIntact: boolean;
  /** The digest that the file carries, as the journal keeps it; "" without a seal. */
  readonly digest: string;
  readonly file: PdfFile;
}

/** Errors: AppError sheet/unreadable or sheet/too-large for anything that is not a sheet of this program. */
export function readSheetEvidence(bytes: Uint8Array): ReadSheet {
  const file = readPdf(bytes);
  const evidence = checkedEvidence(attachmentText(file));
  const seal = readSeal(bytes);
  return { evidence, sealFound: seal.at !== null, sealIntact: seal.intact, digest: seal.carried, file };
}

function attachmentText(file: PdfFile): string {
  const named = [...file.objects.values()].filter(
    ({ body }) => body.includes("/Type /Filespec") && body.includes(`/UF (${EVIDENCE_FILE})`),
  );
  if (named.length !== 1) {
    throw unreadable(
      named.length === 0
        ? "This PDF carries no evidence: it is not a sheet of this program."
        : "This PDF carries its evidence more than once, and which one counts cannot be told.",
    );
  }
  const data = follow(file, /\/EF <<([\s\S]*?)>>/.exec(named[0]!.body)?.[1] ?? "", "F")?.stream();
  if (data == null) throw unreadable("The evidence of this sheet is missing.");
  try {
    return new TextDecoder("utf-8", { fatal: true, ignoreBOM: true }).decode(data);
  } catch (cause) {
    throw unreadable("The evidence of this sheet is not text.", cause);
  }
}

function checkedEvidence(text: string): SheetEvidence {
  let value: unknown;
  try {
    value = parseCanonicalJson(text);
  } catch (cause) {
    throw unreadable("The evidence of this sheet is damaged: it is not the text that it should be.", cause);
  }
  const fault = faultOf(value, SHAPE, "sheet");
  if (fault !== null) throw unreadable(`The evidence of this sheet is damaged: ${fault}.`);
  return value as SheetEvidence;
}

type Shape =
  | "text"
  | "number"
  | "flag"
  | "any"
  | { readonly list: Shape }
  | { readonly members: Readonly<Record<string, Shape>> };

const list = (shape: Shape): Shape => ({ list: shape });
const members = (shapes: Readonly<Record<string, Shape>>): Shape => ({ members: shapes });
const RANGES = list(members({ level: "number", low: "number", high: "number" }));
const ATTRIBUTE = members({ key: "text", label: "text", kind: "text", decimals: "number", levels: list("text") });

/** The members that reading, recomputing and printing rely on; others may be there. */
const SHAPE = members({
  schema: "text",
  program: "text",
  programVersion: "text",
  sheetNumber: "text",
  issuedOn: "text",
  editionNumber: "number",
  assetClass: members({
    name: "text",
    itemWord: "text",
    currencyCode: "text",
    invented: "flag",
    attributes: list(ATTRIBUTE),
  }),
  request: members({
    model: members({
      response: "text",
      attributes: list(members({ key: "text", form: "text" })),
      leftOut: list("text"),
      market: "text",
    }),
    subject: members({ title: "text", values: "any", effectiveOn: "text" }),
    engagement: "any",
    levels: list("number"),
    adjustments: list(members({ label: "text", amount: "number", reason: "text" })),
  }),
  evidence: members({
    keys: list("text"),
    attributes: list(ATTRIBUTE),
    rows: list(
      members({
        id: "number",
        title: "text",
        soldOn: "text",
        priceMinor: "number",
        currencyCode: "text",
        channel: "text",
        source: "text",
        verified: "flag",
        values: list("any"),
      }),
    ),
  }),
  evidenceFingerprint: "text",
  appraisal: members({
    assetClass: members({ name: "text", itemWord: "text", currencyCode: "text", invented: "flag" }),
    evidence: members({
      read: "number",
      used: "number",
      out: list("any"),
      channels: list("any"),
      verifiedCount: "number",
    }),
    report: members({
      response: "text",
      attributes: list("text"),
      leftOut: list("any"),
      n: "number",
      p: "number",
      coefficients: list("any"),
      dependencies: list("any"),
    }),
    ledger: members({ leftOut: list("any"), rows: list("any"), headline: "text" }),
    priced: members({
      subject: members({ title: "text", effectiveOn: "text" }),
      price: members({ centre: "text", amount: "number", rangeForOneSale: RANGES, rangeForAverage: RANGES }),
      builtUp: members({ start: "number", steps: list("any"), end: "number" }),
      pull: members({ top: list("any"), sentence: "text" }),
      reach: members({ verdict: "text", attributes: list("any") }),
      notKnown: list("any"),
    }),
    caveats: list(members({ headline: "text", text: "text", wouldRead: list("text") })),
  }),
  conclusion: members({ amount: "number", roundingStep: "number", rangeForOneSale: RANGES, rangeForAverage: RANGES }),
});

const SCHEMA = "lotwright-sheet/1";

/** What is wrong with a value, in words with its place; null when it has the shape. */
function faultOf(value: unknown, shape: Shape, place: string): string | null {
  if (place === "sheet.schema" && value !== SCHEMA) return "it is written in a form that this program does not know";
  if (shape === "any") return value === undefined ? `${place} is missing` : null;
  if (shape === "text") return typeof value === "string" ? null : `${place} is no text`;
  if (shape === "number") return typeof value === "number" ? null : `${place} is no number`;
  if (shape === "flag") return typeof value === "boolean" ? null : `${place} is neither yes nor no`;
  if ("list" in shape) {
    if (!Array.isArray(value)) return `${place} is no list`;
    for (let k = 0; k < value.length; k++) {
      const fault = faultOf(value[k], shape.list, `${place}[${k}]`);
      if (fault !== null) return fault;
    }
    return null;
  }
  if (value === null || typeof value !== "object" || Array.isArray(value)) return `${place} is missing`;
  for (const [key, inner] of Object.entries(shape.members)) {
    const fault = faultOf((value as Record<string, unknown>)[key], inner, `${place}.${key}`);
    if (fault !== null) return fault;
  }
  return null;
}
