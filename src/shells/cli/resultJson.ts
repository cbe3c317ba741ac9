/**
 * The result as JSON for machines: full precision, nothing rounded. Shapes are those that the command line promises; more may
 * be added, nothing of these goes away.
 */
import type { Appraisal, ModelReport, PricePart } from "../../domain/appraisal.ts";
import type { DuplicateRow, HeldBackRow } from "../../domain/importRecord.ts";
import { partRanges } from "../../domain/ledgerRanges.ts";

/** How attributes are named in the answer: by key for a store, by column heading for a file. */
export type Naming = (key: string) => string;

/** What came of the rows of a file before any sale was evidence. */
export interface FileAccount {
  readonly read: number;
  readonly heldBack: readonly HeldBackRow[];
  readonly duplicates: readonly DuplicateRow[];
}

function evidenceJson({ evidence }: Appraisal, file: FileAccount | null) {
  return {
    read: file?.read ?? evidence.read,
    used: evidence.used,
    heldBack: file?.heldBack ?? [],
    duplicates: file?.duplicates ?? [],
    setAside: evidence.out.map(({ reason, detail, sentence, saleIds }) => ({
      reason,
      detail,
      count: saleIds.length,
      sentence,
      sales: saleIds,
    })),
    firstSoldOn: evidence.firstSoldOn,
    lastSoldOn: evidence.lastSoldOn,
  };
}

function modelJson(report: ModelReport, nameOf: Naming) {
  return {
    response: report.response === "lnPrice" ? "ln" : "price",
    attributes: report.attributes.map(nameOf),
    leftOut: report.leftOut.map(({ key, why, sentence }) => ({ attribute: nameOf(key), why, sentence })),
    n: report.n,
    p: report.p,
    rank: report.rank,
    residualDf: report.residualDf,
    s: report.s,
    r2: report.r2,
    adjustedR2: report.adjustedR2,
    looR2: report.looR2,
    digitsToTrust: report.digitsToTrust,
    condition: report.condition,
    path: report.path,
    averagePrice: report.averagePrice,
    smearing: report.smearing,
    coefficients: report.coefficients.map((one) => ({
      attribute: nameOf(one.attribute),
      level: one.level,
      estimate: one.estimate,
      standardError: one.standardError,
      hc3StandardError: one.hc3StandardError,
      low95: one.low95,
      high95: one.high95,
    })),
    dependencies: report.dependencies.map((one) => ({
      equation: one.equation,
      sentence: one.sentence,
      attributes: one.attributes.map(nameOf),
      choices: one.choices.map(({ key }) => nameOf(key)),
      leftOut: one.resolvedBy === null ? null : nameOf(one.resolvedBy.key),
    })),
  };
}

function ledgerJson({ ledger }: Appraisal, nameOf: Naming) {
  return ledger.rows.map((row) => ({
    attribute: nameOf(row.attribute),
    level: row.level,
    coefficient: row.coefficient,
    ownPart: row.ownPart,
    carriedParts: row.carriedParts.map(({ from, amount }) => ({ from: nameOf(from), amount })),
    money: { ...row.money, carried: row.money.carried.map((part) => ({ ...part, from: nameOf(part.from) })) },
    parts: partRanges(row).map(({ from, amount, halfRange }) => ({
      from: from === null ? null : nameOf(from),
      money: amount,
      low95: halfRange === null ? null : amount - halfRange,
      high95: halfRange === null ? null : amount + halfRange,
    })),
  }));
}

function pricedJson(priced: PricePart | null, nameOf: Naming) {
  if (priced === null) return { price: null, builtUp: null, notKnown: [], pull: [], reach: null };
  const { price, pull, reach } = priced;
  return {
    price,
    builtUp: { ...priced.builtUp, steps: priced.builtUp.steps.map((step) => ({ ...step, key: nameOf(step.key) })) },
    notKnown: priced.notKnown.map((one) => ({ ...one, key: nameOf(one.key) })),
    pull: pull.top,
    pullBySource: pull.bySource,
    pullRest: { count: pull.restCount, weight: pull.restWeight },
    reach: { ...reach, attributes: reach.attributes.map((one) => ({ ...one, key: nameOf(one.key) })) },
  };
}

export function resultJson(appraisal: Appraisal, file: FileAccount | null = null, nameOf: Naming = (key) => key) {
  return {
    ok: true,
    currencyCode: appraisal.assetClass.currencyCode,
    invented: appraisal.assetClass.invented,
    evidence: evidenceJson(appraisal, file),
    model: modelJson(appraisal.report, nameOf),
    ...pricedJson(appraisal.priced, nameOf),
    ledger: ledgerJson(appraisal, nameOf),
    ledgerHeadline: appraisal.ledger.headline,
    caveats: appraisal.caveats,
  };
}
