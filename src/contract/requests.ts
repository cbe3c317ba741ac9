/**
 * Everything a shell may ask for, as plain data: one entry per request with the check of its input; outputs are types.
 * A shell is only a transport: it passes a name and an input, and hands back a Reply.
 */
import { z } from "zod";
import type { Appraisal, GlancedPrice } from "../domain/appraisal.ts";
import type { AssetClass, AssetClassSummary } from "../domain/assetClass.ts";
import type { AttributePair } from "../domain/attributePair.ts";
import type { EverySet } from "../domain/attributeSets.ts";
import type { Comparison } from "../domain/comparison.ts";
import type {
  ColumnMatch,
  DuplicateRow,
  HeldBackRow,
  ImportBatch,
  JournalEntry,
  ReadingOptions,
  StoredHeldBackRow,
} from "../domain/importRecord.ts";
import type { PricedLot } from "../domain/lot.ts";
import type { ModelHealth } from "../domain/modelHealth.ts";
import type { MovingReport } from "../domain/movingTogether.ts";
import type { Edition, PriceModel } from "../domain/priceModel.ts";
import type { PuttingIn } from "../domain/puttingIn.ts";
import type { Sale } from "../domain/sale.ts";
import type { SheetRecord, VerificationReport } from "../domain/sheetRecord.ts";
import type { Subject } from "../domain/subject.ts";

const id = z.number().int().positive();
const day = z.string().regex(/^\d{4}-\d{2}-\d{2}$/, "a day as YYYY-MM-DD");
const text = z.string().max(2000);
const value = z.union([z.number().finite(), z.string().max(500), z.boolean(), z.null()]);
const channel = z.enum(["auction", "dealer", "private", "asking"]);
const priceBasis = z.object({ premium: z.enum(["in", "out", "none"]), tax: z.enum(["in", "out"]) });
const currencyCode = z.string().regex(/^[A-Z]{3}$/, "a currency as three capital letters, such as EUR");

export const attributeInput = z.object({
  key: z.string().regex(/^[a-z][a-z0-9_]*$/),
  label: z.string().min(1).max(80),
  kind: z.enum(["number", "choice", "yesNo", "built"]),
  unit: z.string().max(20).nullable(),
  step: z.number().positive(),
  levels: z.array(z.string().min(1).max(120)),
  lowest: z.number().nullable(),
  highest: z.number().nullable(),
  expectedDirection: z.enum(["up", "down"]).nullable(),
  notes: text,
  decimals: z.number().int().min(0).max(6),
  archived: z.boolean(),
});

export const priceModelInput = z.object({
  response: z.enum(["price", "lnPrice"]),
  attributes: z.array(
    z.object({
      key: z.string(),
      form: z.enum(["line", "ln", "spline", "choice", "yesNo"]),
      reference: z.string().nullable(),
      knots: z.number().int().min(3).max(7).exactOptional(),
      reading: z.enum(["reference", "sumToZero"]).exactOptional(),
      rare: z.enum(["keep", "merge", "pool"]).exactOptional(),
    }),
  ),
  leftOut: z.array(z.string()),
  market: z.enum(["none", "line", "quarters", "spline"]),
  filter: z.object({
    channels: z.array(channel).nullable(),
    soldFrom: day.nullable(),
    soldTo: day.nullable(),
    verifiedOnly: z.boolean(),
  }),
  interactions: z
    .array(z.object({ a: z.string(), b: z.string() }))
    .max(20)
    .exactOptional(),
  blends: z
    .array(
      z.object({
        key: z.string().regex(/^blend_/),
        label: z.string().min(1).max(80),
        members: z.array(
          z.object({ key: z.string(), sign: z.union([z.literal(1), z.literal(-1)]), weight: z.number().min(0) }),
        ),
        weighting: z.enum(["equal", "firstComponent", "own"]),
      }),
    )
    .max(10)
    .exactOptional(),
  halfLifeMonths: z.number().positive().max(1200).nullable().exactOptional(),
  estimator: z
    .union([
      z.object({ kind: z.enum(["leastSquares", "huber", "mm"]) }),
      z.object({ kind: z.literal("ridge"), penalty: z.number().min(0).nullable() }),
    ])
    .exactOptional(),
  errors: z
    .union([
      z.object({ kind: z.enum(["even", "HC0", "HC1", "HC2", "HC3"]) }),
      z.object({ kind: z.literal("cluster"), by: z.string() }),
    ])
    .exactOptional(),
  range: z.enum(["exact", "jackknife+", "cv+", "variance"]).exactOptional(),
});

export const subjectInput = z.object({
  title: z.string().max(200),
  serial: z.string().max(200).nullable(),
  identifiedBy: z.string().max(500).nullable(),
  values: z.record(z.string(), value),
  effectiveOn: day,
});

export const engagementInput = z.object({
  client: text,
  intendedUsers: text,
  intendedUse: text,
  interest: text,
  basisOfValue: text,
  basisDefinition: text,
  premise: text,
  marketLevel: text,
  priceBasisWords: text,
  inspected: text,
  reportOn: day,
  exposureTime: text,
  earlierSales: text,
  equipment: text,
  practice: text,
  practiceLine: text,
  valuer: text,
  ownCaveats: z.array(text),
});

const levels = z.array(z.number().gt(0).lt(1)).min(1).max(6);

export const sheetRequestInput = z.object({
  model: priceModelInput,
  subject: subjectInput,
  engagement: engagementInput,
  levels,
  overrideReason: text.nullable(),
  adjustments: z.array(z.object({ label: text, amount: z.number().finite(), reason: text })),
});

export const readingOptionsInput = z.object({
  encoding: z.enum(["utf-8", "utf-16le", "utf-16be", "windows-1252"]),
  delimiter: z.enum([",", ";", "\t", "|"]),
  decimalMark: z.enum([".", ","]),
  thousandsMark: z.enum(["", ",", ".", " ", "'"]),
  dateOrder: z.enum(["ymd", "dmy", "mdy"]),
  hasHeading: z.boolean(),
});

const columnTarget = z.union([
  z.object({ to: z.literal("attribute"), key: z.string() }),
  z.object({
    to: z.literal("newAttribute"),
    label: z.string().min(1),
    kind: z.enum(["number", "choice", "yesNo", "built"]),
    unit: z.string().nullable(),
  }),
  z.object({
    to: z.enum(["price", "soldOn", "currency", "channel", "source", "reference", "title", "notes", "premium", "tax"]),
  }),
  z.object({ to: z.literal("nothing") }),
]);

export const columnMatchInput = z.object({
  columns: z.array(z.object({ heading: z.string(), target: columnTarget })),
  fixed: z.object({ soldOn: day.nullable(), currencyCode, channel, source: text, priceBasis }),
});

export const newAssetClassInput = z.object({
  name: z.string().trim().min(1).max(80),
  itemWord: z.string().trim().min(1).max(40),
  currencyCode,
  priceBasis,
  invented: z.boolean(),
  attributes: z.array(attributeInput),
});

/** A file as picked, uploaded or piped: its name and its bytes (base64 across a shell). */
const file = z.object({ fileName: z.string().min(1).max(300), bytesBase64: z.string() });

const salesQuery = z.object({
  classId: id,
  offset: z.number().int().min(0),
  limit: z.number().int().min(1).max(500),
  /** "soldOn", "price", "title", "channel", "reference", "id", "verified", "state" or an attribute key. */
  sort: z.object({ by: z.string(), descending: z.boolean() }),
  filter: z.object({
    /** Found in title, reference, source or notes. */
    search: z.string().max(200),
    soldFrom: day.nullable(),
    soldTo: day.nullable(),
    channels: z.array(channel).nullable(),
    state: z.enum(["any", "in", "setAside"]),
    verified: z.enum(["any", "yes", "no"]),
    batchId: id.nullable(),
    /** By attribute key: numbers between, or any of these levels, or missing. */
    values: z.record(
      z.string(),
      z.object({
        low: z.number().nullable(),
        high: z.number().nullable(),
        levels: z.array(z.string()).nullable(),
        missing: z.boolean().nullable(),
      }),
    ),
  }),
});

/** One side of a comparison: a saved edition, or a model. */
const sideChoice = z.union([z.object({ editionId: id }), z.object({ model: priceModelInput })]);

/** Which attribute sets count as defensible. */
const defensibleRule = z.union([
  z.object({ kind: z.literal("error"), share: z.number().min(0).max(10) }),
  z.object({ kind: z.literal("aicc"), distance: z.number().min(0).max(1e6) }),
]);

const none = z.object({});
const byClass = z.object({ classId: id });
const saleIds = z.array(id).min(1).max(100_000);

/** Input checks by request name. */
export const requestInputs = {
  listClasses: none,
  createClass: z.object({ assetClass: newAssetClassInput }),
  openDemo: none,
  describeClass: byClass,
  addAttribute: z.object({ classId: id, attribute: attributeInput }),
  changeAttribute: z.object({ classId: id, key: z.string(), attribute: attributeInput }),
  archiveAttribute: z.object({ classId: id, key: z.string(), archived: z.boolean() }),
  listSales: salesQuery,
  setAsideSales: z.object({ classId: id, saleIds, reason: z.string().trim().min(1).max(500) }),
  putBackSales: z.object({ classId: id, saleIds }),
  verifySales: z.object({ classId: id, saleIds, how: z.string().trim().min(1).max(200) }),
  previewImport: file.extend({
    classId: id.nullable(),
    options: readingOptionsInput.nullable(),
    match: columnMatchInput.nullable(),
  }),
  importSales: file.extend({ classId: id, options: readingOptionsInput, match: columnMatchInput }),
  /** First door: a class made from a file. */
  startClassFromFile: file.extend({
    name: z.string().trim().min(1).max(80),
    itemWord: z.string().trim().min(1).max(40),
    options: readingOptionsInput,
    match: columnMatchInput,
  }),
  listBatches: byClass,
  undoBatch: z.object({ classId: id, batchId: id }),
  listHeldBack: byClass,
  mendHeldBack: z.object({ classId: id, heldBackId: id, cells: z.record(z.string(), z.string()) }),
  leaveOutHeldBack: z.object({ classId: id, heldBackId: id, reason: text }),
  currentModel: byClass,
  appraise: z.object({ classId: id, model: priceModelInput, subject: subjectInput.nullable(), levels }),
  glance: z.object({ classId: id, model: priceModelInput, subject: subjectInput, levels }),
  compare: z.object({
    classId: id,
    first: sideChoice,
    second: sideChoice,
    subject: subjectInput.nullable(),
    level: z.number().gt(0).lt(1),
  }),
  health: z.object({ classId: id, model: priceModelInput, subject: subjectInput.nullable() }),
  everySet: z.object({
    classId: id,
    model: priceModelInput,
    subject: subjectInput.nullable(),
    rule: defensibleRule,
    /** Attributes held in every set, or out of every set. */
    alwaysIn: z.array(z.string()).max(200).optional(),
    alwaysOut: z.array(z.string()).max(200).optional(),
  }),
  priceLot: z.object({ classId: id, model: priceModelInput, subjects: z.array(subjectInput).min(1).max(500), levels }),
  /** What each left-out attribute would do, alone put in; money is read at the average price of the model in use. */
  ifPutIn: z.object({
    classId: id,
    model: priceModelInput,
    subject: subjectInput.nullable(),
    averagePrice: z.number().positive(),
  }),
  /** How two attributes move together among the evidence. */
  pairOf: z.object({
    classId: id,
    model: priceModelInput,
    subject: subjectInput.nullable(),
    a: z.string(),
    b: z.string(),
  }),
  waysOn: z.object({
    classId: id,
    model: priceModelInput,
    subject: subjectInput.nullable(),
    level: z.number().gt(0).lt(1),
  }),
  saveEdition: z.object({ classId: id, model: priceModelInput }),
  listEditions: byClass,
  saveDraft: z.object({ classId: id, subject: subjectInput, engagement: engagementInput.nullable() }),
  loadDraft: byClass,
  previewSheet: z.object({ classId: id, request: sheetRequestInput }),
  issueSheet: z.object({ classId: id, request: sheetRequestInput }),
  listSheets: byClass,
  readSheet: z.object({ sheetId: id }),
  withdrawSheet: z.object({ sheetId: id, reason: z.string().trim().min(1).max(500) }),
  verifySheet: z.object({ bytesBase64: z.string() }),
  listJournal: z.object({ offset: z.number().int().min(0), limit: z.number().int().min(1).max(500) }),
  readSettings: none,
  changeSettings: z.object({ person: text, credentials: text, practice: text, practiceLine: text }),
} as const;

export interface ImportPreview {
  readonly options: ReadingOptions;
  readonly match: ColumnMatch;
  readonly headings: readonly string[];
  /** First rows as read, verbatim. */
  readonly sampleRows: readonly { row: number; cells: readonly string[] }[];
  readonly read: number;
  readonly accepted: number;
  readonly heldBack: readonly HeldBackRow[];
  readonly duplicates: readonly DuplicateRow[];
  readonly blankRows: number;
  /** What was detected and why, each a sentence. */
  readonly detected: readonly string[];
}

export interface ImportOutcome {
  readonly batch: ImportBatch;
  readonly sentence: string;
}

export interface SalesPage {
  readonly total: number;
  readonly rows: readonly Sale[];
}

export interface Settings {
  readonly person: string;
  readonly credentials: string;
  readonly practice: string;
  readonly practiceLine: string;
}

export interface Draft {
  readonly subject: Subject;
  readonly engagement: z.infer<typeof engagementInput> | null;
  readonly savedAtUtc: string;
}

/** Outputs by request name. */
export interface RequestOutputs {
  listClasses: readonly AssetClassSummary[];
  createClass: AssetClass;
  openDemo: { classId: number };
  describeClass: { assetClass: AssetClass; summary: AssetClassSummary };
  addAttribute: AssetClass;
  changeAttribute: AssetClass;
  archiveAttribute: AssetClass;
  listSales: SalesPage;
  setAsideSales: { changed: number };
  putBackSales: { changed: number };
  verifySales: { changed: number };
  previewImport: ImportPreview;
  importSales: ImportOutcome;
  startClassFromFile: ImportOutcome & { classId: number };
  listBatches: readonly ImportBatch[];
  undoBatch: { removed: number };
  listHeldBack: readonly StoredHeldBackRow[];
  mendHeldBack: { accepted: boolean; row: StoredHeldBackRow | null; saleId: number | null };
  leaveOutHeldBack: { left: number };
  /** The model the class is looked at with: of the latest edition, else the usual one over all attributes. */
  currentModel: { model: PriceModel; edition: Edition | null };
  appraise: { appraisal: Appraisal; dataVersion: number; milliseconds: number };
  /** At once, from what is in memory; null when that cannot answer. What `appraise` answers to the same takes its place. */
  glance: GlancedPrice | null;
  compare: Comparison;
  health: ModelHealth;
  everySet: EverySet;
  priceLot: PricedLot;
  /** Null where there is no picture of the two. */
  pairOf: AttributePair | null;
  ifPutIn: readonly PuttingIn[];
  /** What moves together, and every way on worked out before it is applied. */
  waysOn: MovingReport;
  saveEdition: Edition;
  listEditions: readonly Edition[];
  saveDraft: { savedAtUtc: string };
  loadDraft: Draft | null;
  previewSheet: { bytesBase64: string; pageCount: number };
  issueSheet: { sheet: SheetRecord; bytesBase64: string };
  listSheets: readonly SheetRecord[];
  readSheet: { sheet: SheetRecord; bytesBase64: string };
  withdrawSheet: SheetRecord;
  verifySheet: VerificationReport;
  listJournal: { total: number; entries: readonly JournalEntry[]; chainIntact: boolean; chainSentence: string };
  readSettings: Settings;
  changeSettings: Settings;
}

export type RequestName = keyof typeof requestInputs;
export type RequestInput<Name extends RequestName> = z.infer<(typeof requestInputs)[Name]>;
export type RequestOutput<Name extends RequestName> = RequestOutputs[Name];
