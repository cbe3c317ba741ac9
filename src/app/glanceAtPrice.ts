/**
 * The price at a glance: coefficients, price and exact range for one sale from the moments of the evidence in memory, so that
 * switching an attribute costs O(p²) whatever the number of sales. Never final: not refined, and `appraise` replaces it.
 * Symbols as in numerics/liveFit.ts; the range as in valuation/estimatePrice.ts.
 */
import type { RequestInput, RequestOutput } from "../contract/requests.ts";
import type { GlancedPrice } from "../domain/appraisal.ts";
import type { PriceModel } from "../domain/priceModel.ts";
import type { Design, SubjectRow } from "../hedonic/fit.ts";
import { resolvedBefore } from "../hedonic/resolveDependencies.ts";
import { type LiveFit, openLiveFit } from "../numerics/liveFit.ts";
import { NumericsError } from "../numerics/numericsError.ts";
import { tUpperQuantile } from "../numerics/studentT.ts";
import { describeSubject } from "../valuation/describeSubject.ts";
import { staying } from "./computeAppraisal.ts";
import type { Ports } from "./ports.ts";
import type { EvidenceMemory } from "./rememberEvidence.ts";

/** Moments carry the square of the columns' condition: below this pivot fewer than eight digits are certain. */
const SMALLEST_PIVOT = 1e-7;

/** One per design in memory; it goes when the design does. */
const LIVE = new WeakMap<Design, LiveFit>();

/**
 * Null when the evidence is not in memory, the model asks for another estimator, pooled levels or another kind of range, or the
 * moments alone are not certain enough. Refuses what describeSubject refuses.
 */
export function glance(ports: Ports, memory: EvidenceMemory, input: RequestInput<"glance">): RequestOutput<"glance"> {
  const assetClass = ports.store.assetClasses.get(input.classId);
  const { model, subject, levels } = input;
  const remembered = memory.peek(assetClass, { assetClass, model, subject, levels });
  if (remembered === null) return null;
  const { design } = remembered.prepared;
  if (!isPlain(model, design)) return null;
  const row = describeSubject(design, assetClass, subject);
  const live = switchedTo(design, model, row);
  return live === null ? null : priceFrom(live, design, row, levels);
}

/** Least squares without pooled levels, with the range by Student's t, which weighted sales get only when it is asked for. */
function isPlain({ estimator, range, attributes }: PriceModel, { weights }: Design): boolean {
  const isLeast = estimator === undefined || estimator.kind === "leastSquares";
  const isExact = range === "exact" || (range === undefined && weights === null);
  return isLeast && isExact && attributes.every(({ rare }) => rare !== "pool");
}

/** The live fit of the design with the model's columns in; null where they cannot be told apart from moments. */
function switchedTo(design: Design, model: PriceModel, row: SubjectRow): LiveFit | null {
  const reference = resolvedBefore(design, model, row.notKnown);
  if (reference === null) return null;
  const wanted = new Set(reference.filter(staying(model, row)).flatMap((group) => [...group.columns]));
  const live = LIVE.get(design) ?? openLiveFit(design.moments, []);
  LIVE.set(design, live);
  const { columns } = live.answer();
  const isIn = new Set(columns);
  try {
    // Out first: what comes in may depend on it.
    live.switchColumns(columns.filter((column) => !wanted.has(column)));
    live.switchColumns([...wanted].filter((column) => !isIn.has(column)));
    return live;
  } catch (cause) {
    if (cause instanceof NumericsError && cause.code === "rankDeficient") return null;
    throw cause;
  }
}

function priceFrom(live: LiveFit, design: Design, row: SubjectRow, levels: readonly number[]): GlancedPrice | null {
  const answer = live.answer();
  const { residualStandardError: s, residualDf } = answer;
  if (s === null || answer.smallestPivot < SMALLEST_PIVOT) return null;
  const { fitted, leverage } = live.estimateAt(row.x);
  const back = design.responseForm === "lnPrice" ? Math.exp : (value: number) => value;
  const rangeForOneSale = levels.map((level) => {
    const half = tUpperQuantile((1 - level) / 2, residualDf) * s * Math.sqrt(1 + leverage);
    return { level, low: back(fitted - half), high: back(fitted + half) };
  });
  const coefficients = answer.columns.map((column, at) => {
    const { attribute, level } = design.columns[column]!;
    return { attribute, level, value: answer.slopes[at]!, standardError: answer.standardErrors[at]! };
  });
  return { price: { amount: back(fitted), rangeForOneSale }, coefficients, isFinal: answer.isFinal };
}
