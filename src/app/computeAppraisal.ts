/**
 * The one computation behind every screen, command and sheet: evidence + model + subject → the whole result object.
 * Pure: no store, no clock, no random draw; the same input gives the same bits. Verifying a sheet calls it again.
 */
import type { Appraisal, EvidenceAccount, Ledger, ModelReport, PricePart } from "../domain/appraisal.ts";
import type { NewAssetClass } from "../domain/assetClass.ts";
import type { Day } from "../domain/day.ts";
import { AppError } from "../domain/errors.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import type { SaleColumns } from "../domain/sale.ts";
import type { Subject } from "../domain/subject.ts";
import { selectEvidence } from "../evidence/selectEvidence.ts";
import { carryOver } from "../explanation/carryOver.ts";
import { nearSales } from "../explanation/nearSales.ts";
import { pull, pullWeights } from "../explanation/pull.ts";
import { pullBySource } from "../explanation/pullBySource.ts";
import { summariseSets } from "../explanation/setSummary.ts";
import { accountForFit, errorsFor } from "../hedonic/accountForFit.ts";
import { buildDesign } from "../hedonic/buildDesign.ts";
import type { FitErrors } from "../hedonic/errorRules/errors.ts";
import type { Estimate } from "../hedonic/estimators/estimator.ts";
import { estimate } from "../hedonic/estimators/index.ts";
import type { AttributeGroup, Design, Fit, FitRule, SubjectRow } from "../hedonic/fit.ts";
import { fitColumns } from "../hedonic/fitPriceModel.ts";
import { reportModel } from "../hedonic/reportModel.ts";
import { type ResolvedSet, resolveDependencies } from "../hedonic/resolveDependencies.ts";
import { writeCaveats } from "../sheet/writeCaveats.ts";
import { buildUp } from "../valuation/buildUp.ts";
import { chooseRange } from "../valuation/chooseRange.ts";
import { describeSubject, marketHeldAt } from "../valuation/describeSubject.ts";
import { estimatePrice } from "../valuation/estimatePrice.ts";
import { measureReach } from "../valuation/measureReach.ts";
import { notKnowing } from "../valuation/notKnowing.ts";
import { notKnownEffects } from "../valuation/notKnown.ts";

export interface AppraisalInput {
  readonly assetClass: NewAssetClass;
  readonly sales: SaleColumns;
  readonly model: PriceModel;
  readonly subject: Subject | null;
  readonly levels: readonly number[];
  /** Bounds the evidence where there is no subject; a subject brings its own effective date. */
  readonly effectiveOn?: Day;
  /** Also every attribute set in brief, as a sheet prints it. */
  readonly withSets?: boolean;
}

export interface ComputedAppraisal {
  readonly appraisal: Appraisal;
  /** Rows of `sales` that are evidence. */
  readonly used: Int32Array;
  /** The fit in use and the subject on its columns, for what is worked out beside the result. */
  readonly fit: Fit;
  readonly row: SubjectRow | null;
  /** Errors under the model's rule; null at an even spread with every sale counting alike. */
  readonly errors: FitErrors | null;
  /** Groups of the reference set after exact dependencies, in the model or not. */
  readonly reference: readonly AttributeGroup[];
}

/** What is the same for every attribute set, subject and way of estimating: which sales count, and their columns. */
export interface PreparedEvidence {
  readonly account: EvidenceAccount;
  readonly used: Int32Array;
  readonly design: Design;
}

export function prepareEvidence({ sales, assetClass, model, ...input }: AppraisalInput): PreparedEvidence {
  const until = input.subject?.effectiveOn ?? input.effectiveOn ?? null;
  const { account, used } = selectEvidence(sales, assetClass, model, until);
  return { account, used, design: buildDesign(sales, used, assetClass, model, until) };
}

/** The evidence is bounded by the subject's effective date. Refuses what selectEvidence … fitColumns refuse (AppError). */
export function computeAppraisal(input: AppraisalInput, prepared = prepareEvidence(input)): ComputedAppraisal {
  const { assetClass, model, subject } = input;
  const { account, used, design } = prepared;
  const row = subject === null ? null : describeSubject(design, assetClass, subject);
  const resolved = resolveDependencies(design, model, row?.notKnown ?? []);
  const stays = staying(model, row);
  const kept = resolved.referenceGroups.filter(stays);
  const estimated = estimate(design, kept, model.estimator);
  const short = fitColumns(design, kept, estimated.rule);
  const long = fitReference(design, resolved, short);
  const leftOut = leftOutOf(design, model, resolved, row);
  const errors = errorsFor(model, short, estimated, input.sales.sources);
  const fitted = accountForFit(model, short, estimated, errors, input.sales);
  const report = reportModel({ fit: short, model, resolved, leftOut, reference: long ?? short, errors, fitted });
  const ledger = ledgerOf(long, short, report, assetClass.currencyCode);
  const priced =
    subject === null || row === null
      ? null
      : {
          ...pricePart(input, short, long, row, subject, errors, estimated),
          ...(input.withSets
            ? {
                sets: summariseSets({
                  reference: resolved.referenceGroups,
                  fit: short,
                  row,
                  currencyCode: assetClass.currencyCode,
                }),
              }
            : {}),
        };
  const { name, itemWord, currencyCode, invented } = assetClass;
  const found = { assetClass: { name, itemWord, currencyCode, invented }, evidence: account, report, ledger, priced };
  return {
    appraisal: { ...found, caveats: writeCaveats(found) },
    used,
    fit: short,
    row,
    errors,
    reference: resolved.referenceGroups,
  };
}

/** The subject's price alone, from the attributes of the model that it has values for; null without a subject. */
export function priceOf(input: AppraisalInput, { design }: PreparedEvidence): number | null {
  const { assetClass, model, subject } = input;
  if (subject === null) return null;
  const row = describeSubject(design, assetClass, subject);
  const { referenceGroups } = resolveDependencies(design, model, row.notKnown);
  const kept = referenceGroups.filter(staying(model, row));
  const { rule } = estimate(design, kept, model.estimator);
  return estimatePrice(fitColumns(design, kept, rule), row, [], null).amount;
}

/** The fit in use alone, the subject on its columns and the reference set, for what needs no result object. */
export function fitInUse(
  { assetClass, model, subject }: AppraisalInput,
  { design }: PreparedEvidence,
): Pick<ComputedAppraisal, "fit" | "row" | "reference"> {
  const row = subject === null ? null : describeSubject(design, assetClass, subject);
  const { referenceGroups: reference } = resolveDependencies(design, model, row?.notKnown ?? []);
  const kept = reference.filter(staying(model, row));
  return { fit: fitColumns(design, kept, estimate(design, kept, model.estimator).rule), row, reference };
}

/** Attributes in use: not left out and known; a product while both of its attributes are, a blend while all of its members are. */
export function staying({ leftOut }: PriceModel, row: SubjectRow | null): (group: AttributeGroup) => boolean {
  const isIn = (key: string): boolean => !leftOut.includes(key) && !row?.notKnown.includes(key);
  return ({ key, product, blend }) =>
    isIn(key) &&
    (product === null || (isIn(product.a) && isIn(product.b))) &&
    (blend === null || blend.members.every(isIn));
}

/** The model's estimator on the sales that are kept. */
function refitRuleOf({ design, groups }: Fit, model: PriceModel): (kept: Float64Array) => FitRule {
  return (kept) => {
    const weights = design.weights === null ? kept : kept.map((one, i) => one * design.weights![i]!);
    return estimate({ ...design, weights }, groups, model.estimator).rule;
  };
}

/** The whole reference set fitted, or null when it has more coefficients than the sales can carry and the set in use has not. */
function fitReference(design: Design, resolved: ResolvedSet, short: Fit): Fit | null {
  if (resolved.referenceGroups.length === short.groups.length) return short;
  try {
    return fitColumns(design, resolved.referenceGroups, short.rule);
  } catch (cause) {
    if (cause instanceof AppError && cause.code === "too-few-sales") return null;
    throw cause;
  }
}

function ledgerOf(long: Fit | null, short: Fit, report: ModelReport, currencyCode: string): Ledger {
  const ledger = carryOver({ long: long ?? short, short, report, currencyCode });
  if (long !== null) return ledger;
  const headline =
    "The whole reference set has more coefficients than these sales can carry, so what is carried for the attributes left out cannot be told.";
  return { ...ledger, headline };
}

function leftOutOf(
  design: Design,
  model: PriceModel,
  resolved: ResolvedSet,
  row: SubjectRow | null,
): ModelReport["leftOut"] {
  return design.groups.flatMap((group): ModelReport["leftOut"][number][] => {
    const { key, label } = group;
    const exact = resolved.exactOut.find((one) => one.key === key);
    if (exact !== undefined) return [{ key, label, why: "exact", sentence: exact.sentence }];
    if (model.leftOut.includes(key))
      return [{ key, label, why: "person", sentence: `${label} is left out by choice.` }];
    const parts = group.blend?.members ?? (group.product === null ? [] : [group.product.a, group.product.b]);
    if (parts.some((part) => model.leftOut.includes(part))) {
      return [{ key, label, why: "person", sentence: `${label} is left out, as one of its attributes is.` }];
    }
    if (!row?.notKnown.includes(key)) return [];
    const sentence = `${label} is not known for this item, so the model without it prices it.`;
    return [{ key, label, why: "not-known", sentence }];
  });
}

function pricePart(
  input: AppraisalInput,
  short: Fit,
  long: Fit | null,
  row: SubjectRow,
  subject: Subject,
  errors: FitErrors | null,
  estimated: Estimate,
): PricePart {
  const { assetClass, sales, levels } = input;
  const weights = pullWeights(short, row);
  const refitRule = refitRuleOf(short, input.model);
  const range = chooseRange({
    fit: short,
    row,
    levels,
    model: input.model,
    isExact: estimated.exactRange,
    refitRule,
  });
  const price = {
    ...estimatePrice(short, row, levels, marketHeldAt(short.design, subject), errors),
    rangeForOneSale: range.ranges,
    range: range.account,
    ...(estimated.exactRange ? {} : { effectiveSales: 1 / weights.reduce((sum, w) => sum + w * w, 0) }),
  };
  const unknown = (long?.groups ?? []).filter(
    (group) => group.product === null && row.notKnown.includes(group.key) && !input.model.leftOut.includes(group.key),
  );
  return {
    subject,
    price,
    builtUp: buildUp(short, row, subject),
    pull: {
      ...pull({
        fit: short,
        row,
        sales,
        fitted: price.fitted,
        amount: price.amount,
        currencyCode: assetClass.currencyCode,
      }),
      bySource: pullBySource({ fit: short, row, sales, weights, refitRule }),
    },
    near: nearSales({
      fit: short,
      row,
      sales,
      weights,
      amount: price.amount,
      currencyCode: assetClass.currencyCode,
    }),
    reach: measureReach(short, row, subject, assetClass.itemWord),
    notKnown: notKnownEffects(short, row, unknown, assetClass),
    notKnowing: notKnowing(short, row, unknown, assetClass.currencyCode),
  };
}

/**
 * The same from a sheet's own evidence: its rows are all evidence already. What the rows cannot tell (how many sales were
 * read and why others were out) is taken as stated; everything else is worked out again.
 */
export function recomputeAppraisal(input: AppraisalInput, stated: Appraisal): Appraisal {
  const { appraisal } = computeAppraisal({ ...input, withSets: stated.priced?.sets !== undefined });
  const { evidence } = appraisal;
  const account = { ...evidence, read: stated.evidence.read, out: stated.evidence.out };
  const found = { ...appraisal, evidence: account };
  return { ...found, caveats: writeCaveats(found) };
}
